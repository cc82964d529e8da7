package acoustics

import (
	"math"
	"math/cmplx"
)

// residueStep is the relative step of ω for derivatives at a root: far below
// the distance of any two roots that are told apart.
const residueStep = 1e-7

// residues returns the residue of the pressure at each seat at a pole, 0 where
// the pole is nothing there, with delays by the real part of its frequency, as levels
// are reckoned.
func (w *follower) residues(a *path) []complex128 {
	if a.mode >= 0 {
		return w.modeResidues(a)
	}
	return w.unitResidues(a)
}

// modeResidues are those of a pole that a mode has become. With the mode's own
// term set apart, the treated room's response between two ports is
//
//	T′ + φ_r·φ_s/(VΛ·F(ω)), φ = ψ − jωρ·G′·(Z + jωρG′)^-1·û
//
// with F the secular function and φ the mode's shape with the units in it, so
// that the residue is φ_r·φ_s/(VΛ·F′).
func (w *follower) modeResidues(a *path) []complex128 {
	f := w.f
	var (
		h     = a.root * residueStep
		slope complex128
	)
	if f.touched(a.mode) {
		slope = (w.secular(a, a.root+h, 1) - w.secular(a, a.root-h, 1)) / (2 * h)
	} else {
		c := complex(f.room.Air.SpeedOfSound, 0)
		slope = -2*a.root/(c*c) + 2i*complex(f.modes.loss[a.mode], 0)/c
	}
	w.secular(a, a.root, 1) // leaves (Z + jωρG′)^-1·û in rhs
	var (
		r    = len(f.units)
		jwr  = 1i * a.root * complex(f.room.Air.Density, 0)
		wave = func(port int) complex128 {
			v := complex(f.weights[r+port][a.mode], 0)
			for q, u := range w.rhs {
				v -= jwr * w.t.toUnit(port, q) * u
			}
			return v
		}
		drive, whole = w.driven(wave)
	)
	residues := make([]complex128, len(f.seats))
	for e := range residues {
		if v := wave(len(f.sources)+e) * drive; cmplx.Abs(v) > nothing*whole {
			residues[e] = v * complex(f.modes.share[a.mode], 0) / slope
		}
	}
	return residues
}

// unitResidues are those of a pole that a unit's resonance has become, from the
// null vector x of the matrix A = Z + jωρG, which is symmetric: the residue is
//
//	−jωρ·(G_r·x)·(x·G_s)/(x·A′·x)
func (w *follower) unitResidues(a *path) []complex128 {
	f := w.f
	r := len(f.units)
	h := a.root * residueStep
	w.matrix(a.root+h, 1, -1)
	slope := append([]complex128(nil), w.lu.a...)
	w.matrix(a.root-h, 1, -1)
	for i, v := range w.lu.a {
		slope[i] = (slope[i] - v) / (2 * h)
	}
	w.matrix(a.root, 1, -1)
	w.lu.factor()
	x := w.rhs
	for u := range x {
		x[u] = 0
	}
	x[a.unit] = 1
	for range 2 { // inverse iteration at the root
		w.lu.solve(x)
		var most float64
		for _, v := range x {
			most = math.Max(most, cmplx.Abs(v))
		}
		for u := range x {
			x[u] /= complex(most, 0)
		}
	}
	var norm complex128
	for p := range r {
		for q := range r {
			norm += x[p] * slope[p*r+q] * x[q]
		}
	}
	var (
		jwr  = 1i * a.root * complex(f.room.Air.Density, 0)
		wave = func(port int) complex128 {
			var v complex128
			for q, u := range x {
				v += w.t.toUnit(port, q) * u
			}
			return v
		}
		drive, whole = w.driven(wave)
	)
	residues := make([]complex128, len(f.seats))
	for e := range residues {
		if v := wave(len(f.sources)+e) * drive; cmplx.Abs(v) > nothing*whole {
			residues[e] = -jwr * v / norm
		}
	}
	return residues
}

// driven returns a wave's value at the sources, each with its amplitude, added
// up, and the product of the greatest values that it and a seat's could have.
func (w *follower) driven(wave func(port int) complex128) (sum complex128, whole float64) {
	var most, gains float64
	for q, s := range w.f.sources {
		v := wave(q)
		amplitude := w.t.drive(q)
		if w.whole {
			amplitude = complex(s.Gain, 0) * cmplx.Exp(-1i*w.t.omega*complex(s.Delay, 0))
		}
		sum += amplitude * v
		gains += math.Abs(s.Gain)
		most = math.Max(most, cmplx.Abs(v))
	}
	for e := range w.f.seats {
		most = math.Max(most, cmplx.Abs(wave(len(w.f.sources)+e)))
	}
	return sum, gains * most * most
}

// residueLevels returns the level in dB of a pole's own peak at each seat,
//
//	20 log10(4π·|residue|/Im ω)
//
// NaN where it is nothing there.
func residueLevels(residues []complex128, root complex128) []float64 {
	levels := make([]float64, len(residues))
	for e, v := range residues {
		levels[e] = math.NaN()
		if v != 0 {
			levels[e] = 20 * math.Log10(4*math.Pi*cmplx.Abs(v)/imag(root))
		}
	}
	return levels
}

// delayed returns the true residues, with delays by the pole's whole frequency, given
// those by its real part: the same where nothing is delayed.
func (w *follower) delayed(a *path, residues []complex128) []complex128 {
	late := false
	for _, s := range w.f.sources {
		late = late || s.Delay != 0
	}
	if !late {
		return residues
	}
	w.whole = true
	defer func() { w.whole = false }()
	return w.residues(a)
}
