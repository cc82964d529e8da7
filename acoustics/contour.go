package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"runtime"
	"sync"
)

// rectangle is a contour in the plane of ω: Re from left to right, Im from low
// to high, rad/s.
type rectangle struct{ left, right, low, high float64 }

func (e rectangle) holds(w complex128) bool {
	return real(w) > e.left && real(w) < e.right && imag(w) > e.low && imag(w) < e.high
}

// contour returns the rectangle that is counted in. Its left, right and upper edges are
// moved, within a tenth and a hundredth, to where no known zero or pole is near: two
// zeros side by side close to an edge turn the phase by nearly a whole turn on a
// stretch that no step would see.
func (f *Field) contour(upTo float64, paths []path) rectangle {
	// δ is never below 0: no zero lies near the lower edge.
	e := rectangle{left: math.Pi * f.room.lowestHz(), right: 2 * math.Pi * upTo, low: -0.05, high: tallest}
	clearest := func(nominal, least, step float64, distance func(root complex128, edge float64) float64) float64 {
		best, at := -1.0, nominal
		for i := range 21 {
			edge := nominal * (least + step*float64(i))
			near := math.Inf(1)
			for _, a := range paths {
				if a.found {
					near = math.Min(near, distance(a.root, edge))
				}
				if a.mode >= 0 {
					near = math.Min(near, distance(f.bareRoot(a.mode), edge))
				}
			}
			if near > best {
				best, at = near, edge
			}
		}
		return at
	}
	upright := func(root complex128, edge float64) float64 { return math.Abs(real(root) - edge) }
	e.left = clearest(e.left, 0.9, 0.005, upright)
	e.right = clearest(e.right, 0.99, 0.001, upright)
	e.high = clearest(e.high, 1, 0.002, func(root complex128, edge float64) float64 { return math.Abs(imag(root) - edge) })
	return e
}

// inside returns how many found roots of the determinant lie in a contour.
func inside(paths []path, e rectangle) int {
	n := 0
	for _, a := range paths {
		if a.found && e.holds(a.root) {
			n++
		}
	}
	return n
}

// count returns how many poles the treated room has inside a contour: the zeros
// of the determinant by the argument principle, each bare mode that units touch
// being a pole of it, and the modes that none touches.
func (f *Field) count(ctx context.Context, e rectangle, distants []distant) (int, error) {
	n := 0
	for i := range f.modes.damped {
		if e.holds(f.bareRoot(i)) {
			n++
		}
	}
	if len(f.units) == 0 {
		return n, nil
	}
	corners := []complex128{complex(e.left, e.low), complex(e.right, e.low), complex(e.right, e.high), complex(e.left, e.high)}
	// Each edge is cut into pieces of about these lengths, rad/s, then refined: the
	// lower edge runs close under the zeros, the right one between them.
	lengths := [4]float64{6, 4, 12, 12}
	for i := range lengths {
		lengths[i] /= 1 + float64(len(f.units))/manyUnits
	}
	var ends [][2]complex128
	for i, a := range corners {
		b := corners[(i+1)%4]
		pieces := int(math.Ceil(cmplx.Abs(b-a) / lengths[i]))
		for j := range pieces {
			ends = append(ends, [2]complex128{
				a + (b-a)*complex(float64(j)/float64(pieces), 0),
				a + (b-a)*complex(float64(j+1)/float64(pieces), 0)})
		}
	}
	turns := make([]float64, len(ends))
	workers := runtime.GOMAXPROCS(0)
	var group sync.WaitGroup
	for w := range workers {
		group.Go(func() {
			d := f.newFollower(distants)
			d.springs = f.springs((e.left + e.right) / 2)
			for i := w; i < len(ends) && ctx.Err() == nil; i += workers {
				a, b := ends[i][0], ends[i][1]
				turns[i] = d.turn(a, b, d.phase(a), d.phase(b), 14)
			}
		})
	}
	group.Wait()
	var sum float64
	for _, t := range turns {
		sum += t
	}
	return n + int(math.Round(sum/(2*math.Pi))), ctx.Err()
}

// phase returns the argument of the determinant, modulo 2π, times a power of ω, which has
// no zero within: of each unit that is a spring there one more, of each that is a mass
// one less, so that many units alike do not turn it by more than the steps can tell.
func (w *follower) phase(omega complex128) float64 {
	w.matrix(omega, 1, -1)
	w.lu.factor()
	return imag(w.lu.logDet()) + float64(w.springs)*cmplx.Phase(omega)
}

// turn returns how far the determinant's argument turns from a to b, cutting
// the stretch until both halves turn little and agree with the whole.
func (w *follower) turn(a, b complex128, pa, pb float64, depth int) float64 {
	m := (a + b) / 2
	pm := w.phase(m)
	var (
		first  = wrap(pm - pa)
		second = wrap(pb - pm)
		whole  = wrap(pb - pa)
	)
	if depth == 0 || math.Abs(first) < 0.8 && math.Abs(second) < 0.8 && math.Abs(first+second-whole) < 1e-9 {
		return first + second
	}
	return w.turn(a, m, pa, pm, depth-1) + w.turn(m, b, pm, pb, depth-1)
}

// manyUnits is how many units make the contour's pieces half as long.
const manyUnits = 60

// springs returns how many more units are springs than masses at an angular frequency.
func (f *Field) springs(omega float64) int {
	n := 0
	for _, u := range f.units {
		if u.Natural == 0 || 2*math.Pi*u.Natural > omega {
			n++
		} else {
			n--
		}
	}
	return n
}

// wrap brings an angle to −π…π.
func wrap(x float64) float64 { return x - 2*math.Pi*math.Round(x/(2*math.Pi)) }

// recover looks for the zeros that the count says are missing, by Newton's
// method on the determinant with the known zeros divided out and the bare
// modes' poles multiplied in: from where the paths were lost, from beside the
// units' roots, which crowd, and then from the cells that counting in ever smaller
// parts of the contour narrows them down to.
func (f *Field) recover(ctx context.Context, paths []path, e rectangle, counted int, distants []distant) ([]path, error) {
	w := f.newFollower(distants)
	try := func(s complex128, within rectangle) {
		if root, ok := w.deflated(s, paths, e); ok && within.holds(root) {
			paths = f.adopt(paths, root)
		}
	}
	for _, s := range f.recoveryStarts(paths) {
		if inside(paths, e) >= counted || ctx.Err() != nil {
			break
		}
		try(s, e)
	}
	var narrow func(c rectangle, n int) error
	narrow = func(c rectangle, n int) error {
		if inside(paths, c) >= n {
			return nil
		}
		if max(c.right-c.left, c.high-c.low) < narrowest {
			// Two units alike have two zeros side by side.
			for _, at := range [][2]float64{{0.5, 0.5}, {0.2, 0.7}, {0.8, 0.3}, {0.3, 0.2}, {0.7, 0.8}} {
				if inside(paths, c) < n {
					try(complex(c.left+at[0]*(c.right-c.left), c.low+at[1]*(c.high-c.low)), e)
				}
			}
			return nil
		}
		for _, part := range c.halves() {
			n, err := f.count(ctx, part, distants)
			if err != nil {
				return err
			}
			if err := narrow(part, n); err != nil {
				return err
			}
		}
		return nil
	}
	if err := narrow(e, counted); err != nil {
		return paths, err
	}
	return paths, ctx.Err()
}

// narrowest is the size of a cell, rad/s, from which the zeros in it are found.
const narrowest = 4.0

// halves cuts a contour across its longer side, a little off the middle, where
// symmetric rooms have no zeros.
func (e rectangle) halves() [2]rectangle {
	a, b := e, e
	if e.right-e.left > e.high-e.low {
		cut := e.left + 0.497*(e.right-e.left)
		a.right, b.left = cut, cut
	} else {
		cut := e.low + 0.497*(e.high-e.low)
		a.high, b.low = cut, cut
	}
	return [2]rectangle{a, b}
}

// recoveryStarts lists where paths were lost, and places beside the units' roots.
func (f *Field) recoveryStarts(paths []path) []complex128 {
	var starts []complex128
	for i := range paths {
		if !paths[i].found {
			starts = append(starts, f.startOf(paths[i]))
		}
	}
	for _, a := range paths {
		if a.found && a.mode < 0 {
			starts = append(starts, a.root*complex(1.002, 0.003), a.root*complex(0.998, -0.003))
		}
	}
	return starts
}

// startOf returns how far a lost path came, or where it began.
func (f *Field) startOf(a path) complex128 {
	if a.last != 0 {
		return a.last
	}
	if a.mode >= 0 {
		return f.bareRoot(a.mode) * complex(1.0003, 0.0002)
	}
	return complex(2*math.Pi*f.units[a.unit].Natural, 10)
}

// adopt gives a root to the lost path that began nearest, else to the unit that
// resonates nearest.
func (f *Field) adopt(paths []path, root complex128) []path {
	best, at := math.Inf(1), -1
	for i, a := range paths {
		if a.found || a.mode >= 0 && !f.touched(a.mode) {
			continue
		}
		if d := cmplx.Abs(f.startOf(a) - root); d < best {
			best, at = d, i
		}
	}
	if at >= 0 {
		paths[at].root, paths[at].found = root, true
		return paths
	}
	near := 0
	for u := range f.units {
		if math.Abs(f.units[u].Natural-real(root)/(2*math.Pi)) < math.Abs(f.units[near].Natural-real(root)/(2*math.Pi)) {
			near = u
		}
	}
	return append(paths, path{mode: -1, unit: near, root: root, found: true})
}

// deflated runs Newton's method on the determinant with known zeros and poles
// taken out, its logarithmic derivative by Jacobi's formula tr(A^-1·A′).
func (w *follower) deflated(x complex128, paths []path, e rectangle) (complex128, bool) {
	f := w.f
	for range 40 {
		d := w.logDerivative(x)
		for _, a := range paths {
			if a.found && (a.mode < 0 || f.touched(a.mode)) {
				d -= 1 / (x - a.root)
			}
			if a.mode >= 0 && f.touched(a.mode) {
				d += 1 / (x - f.bareRoot(a.mode))
			}
		}
		step := 1 / d
		if limit := 0.05 * cmplx.Abs(x); cmplx.Abs(step) > limit {
			step *= complex(limit/cmplx.Abs(step), 0)
		}
		x -= step
		if cmplx.IsNaN(x) || real(x) < 0.5*e.left || real(x) > 1.2*e.right || imag(x) > 2*e.high || imag(x) < -e.high {
			return 0, false
		}
		if cmplx.Abs(step) < 1e-11*cmplx.Abs(x) {
			return x, true
		}
	}
	return 0, false
}

// logDerivative returns d log det A/dω, A′ by central difference.
func (w *follower) logDerivative(x complex128) complex128 {
	r := w.lu.n
	h := x * 1e-6
	w.matrix(x+h, 1, -1)
	slope := append([]complex128(nil), w.lu.a...)
	w.matrix(x-h, 1, -1)
	for i, v := range w.lu.a {
		slope[i] = (slope[i] - v) / (2 * h)
	}
	w.matrix(x, 1, -1)
	w.lu.factor()
	var trace complex128
	for j := range r {
		for i := range r {
			w.rhs[i] = slope[i*r+j]
		}
		w.lu.solve(w.rhs)
		trace += w.rhs[j]
	}
	return trace
}
