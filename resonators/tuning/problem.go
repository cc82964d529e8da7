package tuning

import (
	"cmp"
	"math"

	"stillroom/acoustics"
	"stillroom/resonators"
)

// Goal is what an absorber is tuned for.
type Goal int

// The goals.
const (
	FastestDecay Goal = iota // both poles of the pair decay as fast as can be
	LowPeak                  // the lowest response to a loudspeaker
	LeastVolume              // within the target, with the least that is built
)

// Occupied is a rectangle of a surface that is taken: another absorber, a door,
// a window.
type Occupied struct {
	Surface      acoustics.Surface
	Centre, Size [2]float64 // m
	Depth        float64    // m into the room; 0 for what is flush
}

// Problem is one mode and what may be done about it.
type Problem struct {
	Mode  acoustics.DampedMode
	Box   acoustics.Box
	Air   acoustics.Air
	Kinds []string // of Kinds(); none: all of them
	// Surfaces that may be built on; none: all six.
	Surfaces []acoustics.Surface
	Depth    float64 // how far the absorber may stand out from its surface, m
	Occupied []Occupied
	// TargetT60 is the decay time asked for, s; 0: half of the mode's own.
	TargetT60 float64
	Goal      Goal
	// Stock is what may be built from; nil: CommonStock.
	Stock *Stock
	// Reactance, where not nil, gives the imaginary part of the absorber's
	// impedance at its spot in the room at a frequency in Hz, with the air mass
	// that the room puts before it, in any unit: only its zero counts. nil: by the
	// absorber's own reckoning.
	Reactance func(a resonators.Absorber, at resonators.Placement, hz float64) float64
	// MostUnits is how many units there may be in all; 0: 6.
	MostUnits int
	// Most is how many candidates are wanted; 0: 12.
	Most int
}

// Kinds returns the kinds of absorber that are proposed.
func Kinds() []string {
	return []string{"neck", "panel", "perforated", "slotted", "microperforated", "porous"}
}

// Candidate is one absorber that can be built, at the spot it goes to.
type Candidate struct {
	Absorber resonators.Absorber
	At       resonators.Placement
	Depth    float64 // m from the surface
	Build    Build

	Strength float64 // û, root mean square of the mode over the units
	Coupling float64 // μ of all units
	// What the target asks for at this spot: coupling, and the total volume of
	// boxes (m³) or area of panel (m²) that gives it; the other is 0.
	LeastCoupling, LeastVolume, LeastArea float64

	WantedHz      float64 // where the goal wants the resonance
	Oscillator    acoustics.Oscillator
	WantedDamping float64 // the goal's ζ_a
	// Pair is what mode and absorber become, slowest decay first.
	Pair [2]acoustics.Oscillator
	// Meets reports whether both of the pair decay within the target.
	Meets bool
}

// Build holds what a joiner needs beside the absorber's acoustic values.
type Build struct {
	// A neck box: its outside (width, height along the surface, depth), the
	// board's thickness and the tube. The neck runs inwards from the front.
	Outside [3]float64 // m
	Board   float64    // m
	Tube    Tube
	// A panel's sheet.
	Sheet Sheet
}

// Tolerance is a dimension's pull on the resonance, and how far it may be off
// while f0 moves by no more than half of the half-power width of the pair's
// slower pole.
type Tolerance struct {
	resonators.Sensitivity
	Allowed float64 // ±, SI
}

// Tolerances returns how far each dimension may be off while f0 moves by no more than
// half of a half-power width in Hz: that of the pair's slower pole.
func Tolerances(pulls []resonators.Sensitivity, width float64) []Tolerance {
	var list []Tolerance
	for _, s := range pulls {
		list = append(list, Tolerance{Sensitivity: s, Allowed: s.Tolerance(width / 2)})
	}
	return list
}

// target returns the T60 asked for, s.
func (p Problem) target() float64 {
	if p.TargetT60 > 0 {
		return p.TargetT60
	}
	return p.Mode.Oscillator().T60() / 2
}

// needed returns the least coupling ratio for the target.
func (p Problem) needed() float64 {
	o := p.Mode.Oscillator()
	return NeededCoupling(o.DampingRatio(), DampingFor(o.Natural, p.target()))
}

// wanted returns where the goal wants an absorber of the coupling ratio mu, Hz,
// and with which damping ratio.
func (p Problem) wanted(mu float64) (hz, damping float64) {
	o := p.Mode.Oscillator()
	if p.Goal == LowPeak {
		tuning, damping, _ := LowestPeak(mu)
		return o.Natural * tuning, damping
	}
	return o.Natural, FastestDamping(o.DampingRatio(), mu)
}

// mostUnits returns the budget of units.
func (p Problem) mostUnits() int { return cmp.Or(p.MostUnits, mostUnits) }

// byWorth puts candidates that meet the target first, then, by the goal, those that
// take less of the room or whose slower pole decays faster.
func (p Problem) byWorth(a, b Candidate) int {
	switch {
	case a.Meets && !b.Meets:
		return -1
	case b.Meets && !a.Meets:
		return 1
	case p.Goal == LeastVolume && a.Meets:
		if c := cmp.Compare(a.Volume(), b.Volume()); c != 0 {
			return c
		}
	}
	return cmp.Compare(a.Pair[0].T60(), b.Pair[0].T60())
}

// Volume returns what all units take of the room, m³.
func (c Candidate) Volume() float64 {
	return c.At.Size[0] * c.At.Size[1] * float64(c.At.Units) * c.Depth
}

// reactance returns the imaginary part of the absorber's impedance at a
// frequency, at its spot.
func (p Problem) reactance(a resonators.Absorber, at resonators.Placement, hz float64) float64 {
	if p.Reactance != nil {
		return p.Reactance(a, at, hz)
	}
	return imag(a.Specific(complex(2*math.Pi*hz, 0), p.Air))
}

// natural returns the absorber's natural frequency at its spot, Hz, near its
// own reckoning; 0 where there is none.
func (p Problem) natural(a resonators.Absorber, at resonators.Placement, alone float64) float64 {
	lo, hi := alone/2, alone*2
	if p.reactance(a, at, lo) >= 0 || p.reactance(a, at, hi) <= 0 {
		return 0
	}
	for range 40 {
		mid := (lo + hi) / 2
		if p.reactance(a, at, mid) < 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2
}

// settle fills in what follows from a candidate's absorber and place.
func (p Problem) settle(c Candidate) (Candidate, bool) {
	e, ok := resonators.EquivalentOf(c.Absorber, p.Air, c.At.Size)
	if !ok {
		return c, false
	}
	squared := squaredStrength(p.Box, p.Mode.Mode, c.At)
	volume, norm := p.Box.Volume(), p.Mode.Norm
	mass := e.Mass // acoustic, of one unit
	if _, neck := c.Absorber.(resonators.Neck); !neck {
		mass /= c.At.Size[0] * c.At.Size[1]
	}
	c.Strength = math.Sqrt(squared / float64(c.At.Units))
	c.Coupling = Coupling(squared, norm, volume, mass, e.Oscillator.Natural, p.Air)
	c.LeastCoupling = p.needed()
	c.WantedHz, c.WantedDamping = p.wanted(c.Coupling)
	c.Oscillator = e.Oscillator
	c.Oscillator.Natural = p.natural(c.Absorber, c.At, e.Oscillator.Natural)
	if c.Oscillator.Natural == 0 {
		return c, false
	}
	c.Pair = Pair(p.Mode.Oscillator(), c.Oscillator, c.Coupling)
	c.Meets = c.Pair[0].T60() <= p.target()
	mean := squared / float64(c.At.Units)
	switch c.Absorber.(type) {
	case resonators.Neck:
		c.LeastVolume = BoxVolume(c.LeastCoupling, mean, norm, volume)
	default:
		c.LeastArea = PanelArea(c.LeastCoupling, mean, norm, volume, e.Mass, e.Oscillator.Natural, p.Air)
	}
	return c, true
}
