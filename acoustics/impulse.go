package acoustics

import (
	"math"
	"math/cmplx"
)

// Partial is one decaying oscillation of the pressure at a seat.
type Partial struct {
	Omega   complex128 // complex angular frequency, 1/s, Re and Im above 0
	Residue complex128 // of the pressure per unit source there
}

// Partials is the impulse response at a seat as a sum of decaying oscillations,
// of one unit-gain loudspeaker's free field at 1 m,
//
//	h(t) = 4π·Σ 2·Re(j·Residue·e^{jωt}), t > 0
//
// in 1/s: the inverse Fourier transform of the pressure, closed round its poles,
// each of which has a twin at −ω*. It holds once the latest loudspeaker's delay
// is over; the uniform mode, which does not oscillate, and whatever rings for
// less than 0.02 s are left out.
type Partials []Partial

// BarePartials returns the partials of the bare modes up to a frequency in Hz at
// a seat, their residues
//
//	−c²·ψ(r)·Σ_s g_s·exp(−jωτ_s)·ψ(s)/(2VΛ·ω_d), ω = ω_d + jδ
func (f *Field) BarePartials(upTo float64, seat int) Partials {
	var (
		list Partials
		c    = f.room.Air.SpeedOfSound
		at   = len(f.units) + len(f.sources) + seat
	)
	for i, m := range f.modes.damped {
		if m.Hz > upTo {
			break
		}
		omega := f.bareRoot(i)
		if real(omega) == 0 || imag(omega) > tallest {
			continue
		}
		var drive complex128
		for q, s := range f.sources {
			w := complex(f.weights[len(f.units)+q][i]*s.Gain, 0)
			drive += w * cmplx.Exp(-1i*omega*complex(s.Delay, 0))
		}
		strength := -c * c * f.weights[at][i] * f.modes.share[i] / (2 * real(omega))
		list = append(list, Partial{omega, complex(strength, 0) * drive})
	}
	return list
}

// Partials returns the partials of the treated room at a seat.
func (p Poles) Partials(seat int) Partials {
	var list Partials
	add := func(q Pole) {
		if q.Residues[seat] != 0 && real(q.Omega) > 0 {
			list = append(list, Partial{q.Omega, q.Residues[seat]})
		}
	}
	for _, q := range p.Modes {
		if q != nil {
			add(*q)
		}
	}
	for _, q := range p.Absorbers {
		add(q.Pole)
	}
	return list
}

// Impulse returns h at a time in s, 1/s.
func (p Partials) Impulse(t float64) float64 {
	var sum float64
	for _, q := range p {
		sum += 2 * real(1i*q.Residue*cmplx.Exp(1i*q.Omega*complex(t, 0)))
	}
	return 4 * math.Pi * sum
}

// fadeIn is the time constant of Ringing's window, in periods of the frequency
// looked at.
const fadeIn = 1.5

// Ringing returns what still sounds after a time in s, as levels in dB at
// frequencies in Hz: the Fourier transform of the impulse response from that time
// on, faded in over about two periods,
//
//	20 log10|∫_t^∞ (1 − e^{−b(τ−t)})³·h(τ)·e^{−jω'τ} dτ|, indexed [time][frequency]
//
// b = f/1.5, in closed form: each partial's part is that of its amplitude at t
// times 6b³/(D(D+b)(D+2b)(D+3b)), D = j(ω' − ω). The fading keeps an oscillation
// from leaking over the whole picture, as a sharp cut does (1/D alone). A partial
// decays in it at its own T60 at every frequency.
//
// Source of the picture, a spectrum cut off later and later: Shorter, BBC
// Quarterly 1 (1946) 38 (from memory); the window is ours.
func (p Partials) Ringing(hz, times []float64) [][]float64 {
	levels := make([][]float64, len(times))
	for k := range levels {
		levels[k] = make([]float64, len(hz))
	}
	amplitude := make([][2]complex128, len(times)*len(p))
	for k, t := range times {
		for i, q := range p {
			v := 1i * q.Residue * cmplx.Exp(1i*q.Omega*complex(t, 0))
			amplitude[k*len(p)+i] = [2]complex128{v, cmplx.Conj(v)}
		}
	}
	weight := make([][2]complex128, len(p))
	for n, f := range hz {
		w := complex(2*math.Pi*f, 0)
		for i, q := range p {
			weight[i] = [2]complex128{faded(1i*(w-q.Omega), f/fadeIn), faded(1i*(w+cmplx.Conj(q.Omega)), f/fadeIn)}
		}
		for k := range times {
			var sum complex128
			for i, g := range weight {
				a := &amplitude[k*len(p)+i]
				sum += a[0]*g[0] + a[1]*g[1]
			}
			levels[k][n] = decibels(sum)
		}
	}
	return levels
}

// faded returns the transform of (1 − e^{−bt})³ e^{−Dt}, t > 0.
func faded(d complex128, rate float64) complex128 {
	b := complex(rate, 0)
	return 6 * b * b * b / (d * (d + b) * (d + 2*b) * (d + 3*b))
}
