package acoustics

import (
	"context"
	"math"
	"runtime"
	"sort"
	"sync"
)

// distant is what the modes well above a stretch of frequency, and the static
// sums, add to the responses on that stretch: smooth there, and therefore
// taken as an interpolating polynomial in ω, good to six figures of the unit's
// own response at least. It serves where very many evaluations are wanted.
type distant struct {
	low, high float64      // the stretch in Re ω, rad/s
	near      int          // modes below this index are summed one by one
	whole     int          // modes that the polynomial was made from
	middle    complex128   // of the Chebyshev points, which lie along Re ω
	half      float64      // half their reach
	terms     int          // of the polynomial
	factors   []complex128 // its Chebyshev coefficients, [pair·terms + j]
}

const (
	// stretchWidth is the width of a stretch, rad/s, and nearAbove how far above
	// it modes are still summed one by one. They are chosen together with the
	// number of terms: the nearest mode left to the polynomial lies well outside
	// the ellipse on which the stretch's corners lie, so that each term makes the
	// error about half of what it was.
	distantTerms = 14
	stretchWidth = 2 * math.Pi * 40
	nearAbove    = 0.9 * tallest
)

// tallest is the greatest Im ω that is of interest, rad/s: that of a pole of the
// shortest T60 listed.
const tallest = 3 * math.Ln10 / shortestT60

// newDistants covers Re ω between two frequencies in Hz.
func (f *Field) newDistants(ctx context.Context, from, upTo float64) ([]distant, error) {
	var (
		start = 2 * math.Pi * from
		count = int(math.Ceil((2*math.Pi*upTo - start) / stretchWidth))
		width = (2*math.Pi*upTo - start) / float64(count)
		all   = make([]distant, count)
		group sync.WaitGroup
	)
	workers := min(runtime.GOMAXPROCS(0), count)
	for w := range workers {
		group.Go(func() {
			t := f.newTransfer()
			// The highest stretches, which are dear, first.
			for i := count - 1 - w; i >= 0 && ctx.Err() == nil; i -= workers {
				all[i] = distant{low: start + float64(i)*width, high: start + float64(i+1)*width}
				f.fitDistant(&all[i], t)
			}
		})
	}
	group.Wait()
	return all, ctx.Err()
}

// fitDistant works the polynomial out from the complete sums at its points.
func (f *Field) fitDistant(d *distant, t *transfer) {
	nearest := (d.high + nearAbove) / (2 * math.Pi)
	d.near = sort.Search(len(f.modes.damped), func(i int) bool { return f.modes.damped[i].Hz > nearest })
	d.middle = complex((d.low+d.high)/2, tallest/2)
	d.half = (d.high - d.low) / 2
	d.terms = distantTerms
	d.whole = max(d.near, f.reach(math.Hypot(d.high, tallest)/(2*math.Pi)))
	pairs := f.pairs()
	d.factors = make([]complex128, pairs*d.terms)
	for i := range d.terms {
		angle := math.Pi * (float64(i) + 0.5) / float64(d.terms)
		t.complete(d.middle+complex(d.half*math.Cos(angle), 0), d.near, d.whole)
		for at := range pairs {
			// The discrete cosine transform, a point's share at a time.
			for j := range d.terms {
				d.factors[at*d.terms+j] += (t.gamma[at] - t.base*complex(f.uniform[at], 0)) * complex(2/float64(d.terms)*math.Cos(float64(j)*angle), 0)
			}
		}
	}
	for at := range pairs {
		d.factors[at*d.terms] /= 2
	}
}

// holds reports whether the polynomial serves at ω.
func (d *distant) holds(omega complex128) bool {
	x, y := real(omega), imag(omega)
	return x >= d.low && x <= d.high && y > -0.25*tallest && y < 1.25*tallest
}

// powers fills in the Chebyshev polynomials at ω.
func (d *distant) powers(omega complex128, to []complex128) {
	z := (omega - d.middle) / complex(d.half, 0)
	to[0], to[1] = 1, z
	for j := 2; j < d.terms; j++ {
		to[j] = 2*z*to[j-1] - to[j-2]
	}
}

// at returns the polynomial of a pair.
func (d *distant) at(pair int, powers []complex128) complex128 {
	var sum complex128
	for j, c := range d.factors[pair*d.terms : (pair+1)*d.terms] {
		sum += c * powers[j]
	}
	return sum
}

// distantFor returns the stretch that serves at ω, nil for none.
func distantFor(all []distant, omega complex128) *distant {
	for i := range all {
		if all[i].holds(omega) {
			return &all[i]
		}
	}
	return nil
}
