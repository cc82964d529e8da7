package resonators

import (
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
