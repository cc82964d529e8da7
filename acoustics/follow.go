package acoustics

import (
	"context"
	"math"
	"math/cmplx"
)

// follower follows zeros from weak coupling. One goroutine's own.
type follower struct {
	f   *Field
	t   *transfer
	lu  *luMatrix
	rhs []complex128
	// springs is the power of ω that the determinant's phase is taken with.
	springs int
	// whole takes delays by the whole of a complex frequency.
	whole bool
}

func (f *Field) newFollower(distants []distant) *follower {
	r := len(f.units)
	w := &follower{f: f, t: f.newTransfer(), lu: newLU(r), rhs: make([]complex128, r)}
	w.t.distants, w.t.unitsOnly = distants, true
	return w
}

// alone is the static air mass before a unit, S_1 of its own pair, in 1/m.
func (f *Field) alone(u int) float64 { return f.sums[u*(u+1)/2+u][0] }

// detuning parts identical units at weak coupling by a little air mass each, so
// that their paths start apart; it is gone at s = 1. splitting does the same for
// modes of equal frequency.
const (
	detuning  = 0.01
	splitting = 1e-5
)

// matrix fills in Z + jωρ·(diag S_1 + s·(G − diag S_1)), without the own term of
// mode except.
func (w *follower) matrix(omega complex128, s float64, except int) {
	f := w.f
	w.t.at(omega, except)
	r := len(f.units)
	jwr := 1i * omega * complex(f.room.Air.Density, 0)
	var z complex128
	for p := range r {
		for q := range p {
			v := jwr * complex(s, 0) * w.t.unitPair(p, q)
			w.lu.a[p*r+q], w.lu.a[q*r+p] = v, v
		}
		own := complex(f.alone(p), 0)
		part := complex(1+detuning*(1-s)*float64(p)/float64(r), 0)
		z = f.impedance(p, omega, z)
		w.lu.a[p*r+p] = z + jwr*(part*own+complex(s, 0)*(w.t.unitPair(p, p)-own))
	}
}

// secular returns the function of a path whose zero the path follows at
// coupling s. For a mode
//
//	F(ω) = k_n² − k² + 2jkδ_n/c + s·jωρ/(VΛ)·ûᵀ·(Z + jωρG′)^-1·û
//
// with G′ the response without the mode's own term; for a unit 1/(A^-1)_uu of
// the whole matrix A, in the unit's place.
func (w *follower) secular(a *path, omega complex128, s float64) complex128 {
	f := w.f
	w.matrix(omega, s, a.mode)
	w.lu.factor()
	for u := range w.rhs {
		w.rhs[u] = 0
		if a.mode >= 0 {
			w.rhs[u] = complex(f.weights[u][a.mode], 0)
		}
	}
	if a.mode < 0 {
		w.rhs[a.unit] = 1
		w.lu.solve(w.rhs)
		return 1 / w.rhs[a.unit]
	}
	w.lu.solve(w.rhs)
	var sum complex128
	for u, v := range w.rhs {
		sum += complex(f.weights[u][a.mode], 0) * v
	}
	var (
		m     = &f.modes
		k     = omega / complex(f.room.Air.SpeedOfSound, 0)
		split = complex(1+splitting*(1-s)*float64(a.mode%7), 0)
		own   = complex(m.k2[a.mode], 0)*split - k*k + 2i*k*complex(m.loss[a.mode], 0)
	)
	return own + complex(s*m.share[a.mode]*f.room.Air.Density, 0)*1i*omega*sum
}

const (
	firstStep = 0.02 // of s
	leastStep = 1e-6 // below this a path is given up; the count will miss it
	// trust is how far a corrected root may lie from the predicted one, as a
	// share of the step the root took.
	trust = 0.1
	// settled is the relative change at which a root is taken as found, onTheWay
	// that at which a path goes on.
	settled, onTheWay = 1e-11, 1e-7
	// hopeless is the decay from which a unit is so damped that its pole will
	// not be listed: that of the shortest T60 and a fifth. The count will miss it
	// where the room undamps it after all.
	hopeless = 1.2 * tallest
)

// follow carries a path from s = 0 to s = 1 by prediction and correction, with
// steps that shrink where the prediction is poor, as it is where two paths come
// near one another.
func (w *follower) follow(ctx context.Context, a *path) {
	f := w.f
	if a.mode >= 0 && !f.touched(a.mode) {
		a.root, a.found = f.bareRoot(a.mode), true
		return
	}
	var start complex128
	if a.mode >= 0 {
		start = f.bareRoot(a.mode)
	} else {
		start = f.unitStart(a.unit)
	}
	var slope complex128 // of the secular function, as last seen
	root, ok := w.correct(a, start, 0, &slope, onTheWay)
	if !ok || a.mode < 0 && imag(root) > hopeless {
		return
	}
	var (
		s, step = 0.0, firstStep
		trail   = trail{{0, root}}
	)
	for s < 1 {
		a.last = root
		if ctx.Err() != nil || step < leastStep {
			return
		}
		to := math.Min(1, s+step)
		guess := trail.at(to)
		kept := slope
		next, ok := w.correct(a, guess, to, &slope, onTheWay)
		if !ok || !believed(root, guess, next, len(trail) == 1) {
			step /= 2
			slope = kept
			continue
		}
		if imag(next) > 2*hopeless {
			return
		}
		root, s = next, to
		trail = append(trail, waypoint{to, next})
		step = math.Min(step*2, 0.34)
	}
	end, ok := w.correct(a, root, 1, &slope, settled)
	a.root, a.found = end, ok && real(end) > 0
}

// unitStart returns about where a unit rings with the air before it, by the oscillator
// that its impedance is at its resonance,
//
//	ω = √(ω0² − δ²) + jδ, δ = R/X′
//
// so that a heavily damped one is found too.
func (f *Field) unitStart(u int) complex128 {
	const h = 1e-5 // relative
	var (
		unit    = f.units[u]
		density = f.room.Air.Density
		w0      = 2 * math.Pi * unit.Natural
	)
	if hz, ok := unit.resonance(f.alone(u), density); ok {
		w0 = 2 * math.Pi * hz
	}
	hz := w0 / (2 * math.Pi)
	slope := (unit.Reactance(hz*(1+h), f.alone(u), density) - unit.Reactance(hz*(1-h), f.alone(u), density)) / (2 * h * w0)
	decay := real(unit.Impedance(complex(w0, 0))) / slope
	if !(decay > 0 && decay < 0.95*w0) {
		return complex(w0, 0)
	}
	return complex(math.Sqrt(w0*w0-decay*decay), decay)
}

// waypoint is a place that a path has come by.
type waypoint struct {
	s    float64
	root complex128
}

// trail is a path's way so far.
type trail []waypoint

// at returns where the path is expected at s: the polynomial through the last
// three places, by Neville's scheme.
func (t trail) at(s float64) complex128 {
	last := t[max(0, len(t)-3):]
	var value [3]complex128
	for i, p := range last {
		value[i] = p.root
	}
	for gap := 1; gap < len(last); gap++ {
		for i := range len(last) - gap {
			a, b := last[i].s, last[i+gap].s
			value[i] = (complex(s-b, 0)*value[i] - complex(s-a, 0)*value[i+1]) / complex(a-b, 0)
		}
	}
	return value[0]
}

// believed reports whether a step from root to next is short and near enough to
// what was predicted. The tolerance has a floor: a root that hardly moves is
// always believed; the first step has no prediction and must be short.
func believed(root, guess, next complex128, first bool) bool {
	moved := cmplx.Abs(next - root)
	if first {
		return moved <= 1e-3*cmplx.Abs(root)
	}
	return moved <= 0.03*cmplx.Abs(root) && cmplx.Abs(next-guess) <= trust*(moved+1e-5*cmplx.Abs(root))
}

// correct finds the zero near a guess by the secant method, the first step by
// the slope of the secular function there, where it is known. It leaves the
// slope it has seen last.
func (w *follower) correct(a *path, guess complex128, s float64, slope *complex128, tolerance float64) (complex128, bool) {
	x0 := guess
	f0 := w.secular(a, x0, s)
	if *slope == 0 {
		h := x0 * complex(1e-6, 1e-6)
		*slope = (w.secular(a, x0+h, s) - f0) / h
	}
	for range 12 {
		x1 := x0 - f0 / *slope
		if cmplx.IsNaN(x1) || cmplx.Abs(x1-guess) > 0.3*cmplx.Abs(guess) {
			return 0, false
		}
		if cmplx.Abs(x1-x0) < tolerance*cmplx.Abs(x1) {
			return x1, true
		}
		f1 := w.secular(a, x1, s)
		if f1 == f0 {
			return x1, f1 == 0
		}
		*slope = (f1 - f0) / (x1 - x0)
		x0, f0 = x1, f1
	}
	return 0, false
}
