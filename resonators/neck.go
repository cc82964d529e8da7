package resonators

import (
	"fmt"
	"math"

	"stillroom/acoustics"
)

// Neck is a box with one or more round necks.
type Neck struct {
	Cavity      float64 // air volume of the box, m³
	MouthRadius float64 // m
	Length      float64 // m
	Mouths      int
	Gauze       float64    // Pa·s/m
	Front       [2]float64 // the box's front, m
	FillShare   float64    // share of the cavity's volume that is filled, 0…1
	FillFlow    float64    // Pa·s/m²
}

// Kind returns "neck".
func (n Neck) Kind() string { return "neck" }

// mouthArea returns the open area of all mouths, m².
func (n Neck) mouthArea() float64 { return float64(n.Mouths) * math.Pi * sq(n.MouthRadius) }

// wallRadius returns the radius of the part of the front that belongs to one
// mouth, R = √(w·h/(π·mouths)), m; 0 where the front is not given.
func (n Neck) wallRadius() float64 {
	return math.Sqrt(n.Front[0] * n.Front[1] / (math.Pi * float64(n.Mouths)))
}

// InRoom returns the acoustic impedance at the mouth in Pa·s/m³,
//
//	Z = (Z_pore·l + r_ends + jωρ·δ_in + r_g)/S + 1/(jωC)
//	C = V_air/ρc² + V_fill/K_fill
//
// with the mouths' area S, the neck's length l, the edges' resistance r_ends,
// the inner end correction δ_in and the gauze's flow resistance r_g. There is
// no outer end correction: the air before the mouth is the room's. The mouths
// count as one opening. The box is a lumped volume and the neck a lumped plug,
// both small beside the wave. The area argument is not used.
func (n Neck) InRoom(omega complex128, _ float64, air acoustics.Air) complex128 {
	return n.impedance(omega, 0, air)
}

// Specific returns the impedance over the box's front, Z·w·h/ρc, with the outer
// end correction 0.85a of a box that stands alone in a wide wall.
func (n Neck) Specific(omega complex128, air acoustics.Air) complex128 {
	over := n.Front[0] * n.Front[1] / (air.Density * air.SpeedOfSound)
	return n.alone(omega, air) * complex(over, 0)
}

// alone returns the acoustic impedance with the outer end correction, Pa·s/m³.
func (n Neck) alone(omega complex128, air acoustics.Air) complex128 {
	return n.impedance(omega, flangedEnd*n.MouthRadius, air)
}

func (n Neck) impedance(omega complex128, outer float64, air acoustics.Air) complex128 {
	var (
		jw   = complex(0, 1) * omega
		s    = complex(n.mouthArea(), 0)
		ends = innerEnd(n.MouthRadius, n.wallRadius()) + outer
	)
	neck := roundPore(omega, n.MouthRadius, air)*complex(n.Length, 0) +
		edgeResistance(omega, air) +
		jw*complex(air.Density*ends, 0) +
		complex(n.Gauze, 0)
	spring := 1 / (jw * n.compliance(omega, air))
	if imag(omega) == 0 {
		spring = passive(spring)
	}
	return neck/s + spring
}

// compliance returns that of the cavity, m³/Pa.
func (n Neck) compliance(omega complex128, air acoustics.Air) complex128 {
	open := n.Cavity
	var c complex128
	if n.FillShare > 0 {
		filled := n.Cavity * n.FillShare
		open -= filled
		c = complex(filled, 0) / mikiFluid(omega, n.FillFlow, air).bulkModulus(omega)
	}
	return c + complex(open/(air.Density*sq(air.SpeedOfSound)), 0)
}

// Validate returns nil, or all *ValueError of the box joined.
func (n Neck) Validate() error {
	c := checker{kind: n.Kind()}
	c.positive("Cavity", n.Cavity, "m³")
	c.positive("MouthRadius", n.MouthRadius, metres)
	c.notNegative("Length", n.Length, metres)
	c.need(n.Mouths >= 1, "Mouths", float64(n.Mouths), "", "1 or more")
	c.notNegative("Gauze", n.Gauze, rayls)
	c.positive("Front[0]", n.Front[0], metres)
	c.positive("Front[1]", n.Front[1], metres)
	area := n.Front[0] * n.Front[1]
	c.need(!(n.mouthArea() >= area), "MouthRadius", n.MouthRadius, metres,
		fmt.Sprintf("so small that the mouths fit the front of %g m²", area))
	c.need(n.FillShare >= 0 && n.FillShare <= 1, "FillShare", n.FillShare, "", "between 0 and 1")
	if n.FillShare > 0 {
		c.positive("FillFlow", n.FillFlow, flowUnit)
	}
	return c.result()
}

// dimensions lists what the resonance depends on.
func (n Neck) dimensions() []dimension {
	d := []dimension{
		{"Volume", litre, n.Cavity, func(x float64) Absorber { n := n; n.Cavity = x; return n }},
		{"MouthRadius", millimetre, n.MouthRadius, func(x float64) Absorber { n := n; n.MouthRadius = x; return n }},
		{"Length", millimetre, n.Length, func(x float64) Absorber { n := n; n.Length = x; return n }},
		{"Gauze", edgeStep, n.Gauze, func(x float64) Absorber { n := n; n.Gauze = x; return n }},
	}
	if n.FillShare > 0 {
		d = append(d,
			dimension{"FillShare", ratioStep, n.FillShare, func(x float64) Absorber { n := n; n.FillShare = x; return n }},
			dimension{"FillFlow", flowStep, n.FillFlow, func(x float64) Absorber { n := n; n.FillFlow = x; return n }})
	}
	return d
}

// refilled has nothing to keep full.
func (n Neck) refilled(Absorber) Absorber { return n }

// sized takes the unit's size for the front where none is given.
func (n Neck) sized(size [2]float64) Absorber {
	if n.Front == [2]float64{} {
		n.Front = size
	}
	return n
}

// widestMouth is the a/R_c up to which the inner end correction holds.
const widestMouth = 0.4

// lumpedShare is the share of a wave that a part may span and still be taken as
// lumped: a twelfth, at which tan(kl) exceeds kl by a tenth.
const lumpedShare = 1.0 / 12

// warnings says where the lumped model is uncertain.
func (n Neck) warnings(air acoustics.Air, o *acoustics.Oscillator) []string {
	var w []string
	if ratio := n.MouthRadius / n.wallRadius(); ratio > widestMouth {
		w = append(w, fmt.Sprintf(
			"The mouths are wide for the box's front (radius ratio %.2f, over %.1f): the inner end correction is uncertain.",
			ratio, widestMouth))
	}
	if o != nil {
		wave := air.SpeedOfSound / o.Natural
		if n.Length > lumpedShare*wave {
			w = append(w, "The neck is longer than a twelfth of the wave at resonance: taking its air as one plug overstates the frequency.")
		}
		if d := n.Cavity / (n.Front[0] * n.Front[1]); max(d, n.Front[0], n.Front[1]) > wave/4 {
			w = append(w, "The box is larger than a quarter of the wave at resonance: taking its air as one spring is uncertain.")
		}
	}
	if n.FillShare > 0 {
		w = append(w, mikiWarnings("The fill", n.FillFlow, o)...)
	}
	return w
}

// whole makes a unit its mouths, which act as one opening.
func (n Neck) whole(p acoustics.Patch) (acoustics.Patch, bool) {
	p.MouthRadius, p.Mouths = n.MouthRadius, n.Mouths
	return p, true
}
