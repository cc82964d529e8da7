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
}

func (f *Field) newFollower() *follower {
	r := len(f.units)
	return &follower{f: f, t: f.newTransfer(), lu: newLU(r), rhs: make([]complex128, r)}
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
	for p := range r {
		for q := range p {
			v := jwr * complex(s, 0) * w.t.unitPair(p, q)
			w.lu.a[p*r+q], w.lu.a[q*r+p] = v, v
		}
		own := complex(f.alone(p), 0)
		part := complex(1+detuning*(1-s)*float64(p)/float64(r), 0)
		w.lu.a[p*r+p] = f.units[p].Impedance(omega) + jwr*(part*own+complex(s, 0)*(w.t.unitPair(p, p)-own))
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
	trust = 0.35
	// settled is the relative change at which a root is taken as found.
	settled = 1e-12
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
	var root complex128
	if a.mode >= 0 {
		root = f.bareRoot(a.mode)
	} else {
		root = complex(2*math.Pi*f.units[a.unit].Natural, 0)
	}
	root, ok := w.correct(a, root, 0)
	if !ok {
		return
	}
	var (
		s, step  = 0.0, firstStep
		velocity complex128 // d root/d s, of the last step
		first    = true
	)
	for s < 1 {
		if ctx.Err() != nil || step < leastStep {
			return
		}
		to := math.Min(1, s+step)
		guess := root + velocity*complex(to-s, 0)
		next, ok := w.correct(a, guess, to)
		// The tolerance has a floor: a root that hardly moves is always believed.
		moved := cmplx.Abs(next-root) + 1e-5*cmplx.Abs(root)
		if !ok || (!first && cmplx.Abs(next-guess) > trust*moved) || cmplx.Abs(next-root) > 0.03*cmplx.Abs(root) {
			if first && ok && cmplx.Abs(next-root) <= 1e-3*cmplx.Abs(root) {
				// accepted below: the first step has no prediction
			} else {
				step /= 2
				continue
			}
		}
		velocity = (next - root) / complex(to-s, 0)
		root, s, first = next, to, false
		step = math.Min(step*2, 0.25)
	}
	a.root, a.found = root, real(root) > 0
}

// correct finds the zero near a guess by the secant method.
func (w *follower) correct(a *path, guess complex128, s float64) (complex128, bool) {
	var (
		x0 = guess
		x1 = guess * complex(1+1e-6, 1e-6)
		f0 = w.secular(a, x0, s)
		f1 = w.secular(a, x1, s)
	)
	for range 12 {
		if f1 == f0 {
			return x1, f1 == 0
		}
		x2 := x1 - f1*(x1-x0)/(f1-f0)
		if cmplx.IsNaN(x2) || cmplx.Abs(x2-guess) > 0.3*cmplx.Abs(guess) {
			return 0, false
		}
		x0, f0 = x1, f1
		x1 = x2
		if cmplx.Abs(x1-x0) < settled*cmplx.Abs(x1) {
			return x1, true
		}
		f1 = w.secular(a, x1, s)
		if cmplx.Abs(x1-x0) < 1e-9*cmplx.Abs(x1) {
			return x1, true
		}
	}
	return 0, false
}
