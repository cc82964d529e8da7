package acoustics

import "math"

// sabineFactor is 24·ln 10 = 55.26: T = (24 ln 10/c)·V/A.
const sabineFactor = 24 * math.Ln10

// SabineTime returns the reverberation time in seconds by Sabine with air,
//
//	T = (24·ln 10/c)·V/(Σ α_w·S_w + 4·m·V)
//
// with the random-incidence coefficient α_w and area S_w of each surface and
// the air's energy attenuation m at the frequency in Hz. It is +Inf where
// nothing absorbs. A diffuse-field estimate: below the Schroeder frequency it
// is not meant.
//
// Source: Kuttruff, Room Acoustics, ch. 5.
func (r Room) SabineTime(hz float64) float64 {
	return r.decayTime(r.absorptionArea(hz), hz)
}

// EyringTime returns the reverberation time in seconds by Eyring with air,
//
//	T = (24·ln 10/c)·V/(−S·ln(1 − ᾱ) + 4·m·V)
//
// with the area S of all surfaces and their mean coefficient ᾱ. Where ᾱ ≥ 1 it
// is 0.
//
// Source: Eyring, J. Acoust. Soc. Am. 1 (1930) 217.
func (r Room) EyringTime(hz float64) float64 {
	s := r.Box.SurfaceArea()
	return r.decayTime(s*eyringExponent(r.absorptionArea(hz)/s), hz)
}

// FitzroyTime returns the reverberation time in seconds of a room whose
// absorption lies unevenly on its three pairs of surfaces,
//
//	T = Σ_i (S_i/S)·T_i, T_i = (24·ln 10/c)·V/(−S·ln(1 − α_i) + 4·m·V)
//
// with the area S_i and mean coefficient α_i of each pair.
//
// Source: Fitzroy, J. Acoust. Soc. Am. 31 (1959) 893.
func (r Room) FitzroyTime(hz float64) float64 {
	var t float64
	for _, p := range r.pairs(hz) {
		t += p.weight * p.seconds
	}
	return t
}

// ArauPuchadesTime returns the reverberation time in seconds of a room whose
// absorption lies unevenly on its three pairs of surfaces,
//
//	T = Π_i T_i^(S_i/S)
//
// with the T_i of [Room.FitzroyTime].
//
// Source: Arau-Puchades, Acustica 65 (1988) 163.
func (r Room) ArauPuchadesTime(hz float64) float64 {
	var log float64
	for _, p := range r.pairs(hz) {
		log += p.weight * math.Log(p.seconds)
	}
	return math.Exp(log)
}

// SchroederHz returns the Schroeder frequency in Hz,
//
//	f = 2000·√(T/V)
//
// above which at least three modes lie within one's half-power width; V in m³
// and T in s by Sabine with air, mean of 500 Hz and 1000 Hz.
//
// Source: Schroeder & Kuttruff, J. Acoust. Soc. Am. 34 (1962) 76.
func (r Room) SchroederHz() float64 {
	return 2000 * math.Sqrt(r.midTime()/r.Box.Volume())
}

// midTime returns the mean of the Sabine times at 500 Hz and 1000 Hz, s.
func (r Room) midTime() float64 { return (r.SabineTime(500) + r.SabineTime(1000)) / 2 }

// absorptionArea returns Σ α_w·S_w in m².
func (r Room) absorptionArea(hz float64) float64 {
	var a float64
	for s, l := range r.Walls {
		a += l.Coefficient(hz) * r.Box.Area(Surface(s))
	}
	return a
}

// decayTime returns (24·ln 10/c)·V/(a + 4·m·V) in s for an absorption area a in m².
func (r Room) decayTime(a, hz float64) float64 {
	v := r.Box.Volume()
	return sabineFactor / r.Air.SpeedOfSound * v / (a + 4*r.Air.EnergyAttenuation(hz)*v)
}

// eyringExponent returns −ln(1 − α), +Inf from α = 1 on.
func eyringExponent(alpha float64) float64 {
	if alpha >= 1 {
		return math.Inf(1)
	}
	return -math.Log1p(-alpha)
}

// pairTime is the reverberation time which a pair of opposite surfaces would
// give if all surfaces were like it, with the pair's share of the area.
type pairTime struct{ weight, seconds float64 }

// pairs returns the three pairs in axis order.
func (r Room) pairs(hz float64) (p [3]pairTime) {
	s := r.Box.SurfaceArea()
	for axis := range p {
		near, far := Surface(2*axis), Surface(2*axis+1)
		alpha := (r.Walls[near].Coefficient(hz) + r.Walls[far].Coefficient(hz)) / 2
		p[axis] = pairTime{
			weight:  2 * r.Box.Area(near) / s,
			seconds: r.decayTime(s*eyringExponent(alpha), hz),
		}
	}
	return p
}
