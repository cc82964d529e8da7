package acoustics

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/floats"
)

// transfer is the field at one complex frequency: the responses between ports,
// and room to work in. One goroutine's own.
type transfer struct {
	f      *Field
	omega  complex128
	re, im []float64 // dynamic factors of the modes, over VΛ
	tr, ti []float64 // times a port's weights
	n      int
	kappa2 complex128
	base   complex128   // the uniform mode, common to all pairs
	gamma  []complex128 // in the order of Field.sums

	distants []distant // nil: the complete sums everywhere
	// unitsOnly leaves out all pairs but those of two units, which is all that a
	// determinant needs.
	unitsOnly bool
	powers    [distantTerms]complex128
}

func (f *Field) newTransfer() *transfer {
	n := len(f.modes.damped)
	return &transfer{f: f, re: make([]float64, n), im: make([]float64, n),
		tr: make([]float64, n), ti: make([]float64, n), gamma: make([]complex128, f.pairs())}
}

// at evaluates the responses at the complex angular frequency omega, leaving
// out the own term of mode except (−1: none), whose static parts stay. Where
// the transfer has distants, they are used.
func (t *transfer) at(omega complex128, except int) {
	t.begin(omega, t.f.reach(cmplx.Abs(omega)/(2*math.Pi)))
	if d := distantFor(t.distants, omega); d != nil && except < d.near {
		t.nearby(d, except)
		return
	}
	k := omega / complex(t.f.room.Air.SpeedOfSound, 0)
	if imag(omega) == 0 {
		t.realFactors(real(k))
	} else {
		t.factors(k)
	}
	if except >= 0 && except < t.n {
		h := t.staticPart(except)
		t.re[except], t.im[except] = real(h), imag(h)
	}
	t.sum()
}

// begin sets what all pairs share at omega, n modes being summed one by one.
func (t *transfer) begin(omega complex128, n int) {
	var (
		f = t.f
		m = &f.modes
		k = omega / complex(f.room.Air.SpeedOfSound, 0)
	)
	t.omega = omega
	t.n = n
	t.kappa2 = k*k - 2i*k*complex(m.tail[t.n], 0)
	t.base = 1 / (complex(f.room.Box.Volume(), 0) * (-k*k + 2i*k*complex(m.uniform, 0)))
}

// complete evaluates the responses from the first n modes one by one and the
// static sums, without the own terms of the modes below index near, whose static
// parts stay.
func (t *transfer) complete(omega complex128, near, n int) {
	t.begin(omega, n)
	t.factors(omega / complex(t.f.room.Air.SpeedOfSound, 0))
	for i := range near {
		h := t.staticPart(i)
		t.re[i], t.im[i] = real(h), imag(h)
	}
	t.sum()
}

// nearby evaluates the responses from the near modes one by one and the rest by
// the polynomial.
func (t *transfer) nearby(d *distant, except int) {
	var (
		m = &t.f.modes
		k = t.omega / complex(t.f.room.Air.SpeedOfSound, 0)
		n = d.near
	)
	var (
		kk = real(k)*real(k) - imag(k)*imag(k)
		ki = 2 * real(k) * imag(k)
	)
	for i := range n {
		// 1/(k_n² − k² + 2jkδ_n/c), written out
		var (
			l    = 2 * m.loss[i]
			re   = m.k2[i] - kk - l*imag(k)
			im   = l*real(k) - ki
			over = m.share[i] / (re*re + im*im)
		)
		t.re[i], t.im[i] = re*over, -im*over
	}
	if except >= 0 && except < n {
		t.re[except], t.im[except] = 0, 0
	}
	d.powers(t.omega, t.powers[:])
	t.eachSum(n, func(at int, sum complex128) {
		t.gamma[at] = t.base*complex(t.f.uniform[at], 0) + d.at(at, t.powers[:]) + sum
	})
}

// staticPart returns what stands of a mode's factor without its own term.
func (t *transfer) staticPart(i int) complex128 {
	inv := complex(t.f.modes.inverse[i], 0)
	x := t.kappa2 * inv
	return -inv * (1 + x + x*x) * complex(t.f.modes.share[i], 0)
}

// factors fills in the modes' dynamic factors at the complex wave number k.
func (t *transfer) factors(k complex128) {
	m := &t.f.modes
	kk := k * k
	for i := range t.n {
		h := complex(m.share[i], 0)/(complex(m.k2[i], 0)-kk+2i*k*complex(m.loss[i], 0)) + t.staticPart(i)
		t.re[i], t.im[i] = real(h), imag(h)
	}
}

// realFactors is factors on the real axis, without complex division.
func (t *transfer) realFactors(k float64) {
	var (
		m      = &t.f.modes
		kk     = k * k
		kr, ki = real(t.kappa2), imag(t.kappa2)
		qr, qi = kr*kr - ki*ki, 2 * kr * ki // κ⁴
	)
	for i := range t.n {
		var (
			d    = m.k2[i] - kk
			e    = 2 * k * m.loss[i]
			over = 1 / (d*d + e*e)
			inv  = m.inverse[i]
			inv2 = inv * inv
			inv3 = inv2 * inv
		)
		t.re[i] = m.share[i] * (d*over - inv - kr*inv2 - qr*inv3)
		t.im[i] = m.share[i] * (-e*over - ki*inv2 - qi*inv3)
	}
}

// sum adds up the responses of all pairs.
func (t *transfer) sum() {
	t.eachSum(t.n, func(at int, sum complex128) {
		t.gamma[at] = t.base*complex(t.f.uniform[at], 0) + t.f.sums[at].at(t.kappa2) + sum
	})
}

// eachSum adds up the factors of the first n modes over every pair that is
// wanted.
func (t *transfer) eachSum(n int, visit func(at int, sum complex128)) {
	f := t.f
	var (
		re, im = t.re[:n], t.im[:n]
		tr, ti = t.tr[:n], t.ti[:n]
		last   = -1
		sum    = func(p, q, at int) {
			if p != last {
				floats.MulTo(tr, re, f.weights[p][:n])
				floats.MulTo(ti, im, f.weights[p][:n])
				last = p
			}
			w := f.weights[q][:n]
			visit(at, complex(floats.Dot(tr, w), floats.Dot(ti, w)))
		}
	)
	if !t.unitsOnly {
		f.eachPair(sum)
		return
	}
	at := 0
	for p := range f.units {
		for q := range p + 1 {
			sum(p, q, at)
			at++
		}
	}
}

// unitPair returns Γ between two units.
func (t *transfer) unitPair(p, q int) complex128 {
	if p < q {
		p, q = q, p
	}
	return t.gamma[p*(p+1)/2+q]
}

// toUnit returns Γ between port x (0… over sources, then seats) and a unit.
func (t *transfer) toUnit(x, unit int) complex128 {
	r := len(t.f.units)
	return t.gamma[r*(r+1)/2+x*r+unit]
}

// direct returns Γ between a seat and a source.
func (t *transfer) direct(seat, source int) complex128 {
	r, s, e := len(t.f.units), len(t.f.sources), len(t.f.seats)
	return t.gamma[r*(r+1)/2+(s+e)*r+seat*s+source]
}

// drive returns each source's complex amplitude at the transfer's frequency,
// its delay by the real part so that a delay alone changes no level.
func (t *transfer) drive(source int) complex128 {
	s := t.f.sources[source]
	sin, cos := math.Sincos(-real(t.omega) * s.Delay)
	return complex(s.Gain*cos, s.Gain*sin)
}
