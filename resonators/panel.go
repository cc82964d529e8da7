package resonators

import (
	"math"

	"stillroom/acoustics"
)

// Panel is a membrane absorber: a sheet over a cavity. a×b of the sheet is Size.
type Panel struct {
	Mass, Thickness, Youngs, Poisson, LossFactor float64    // kg/m², m, Pa (0: limp), –, –
	Cavity, Edge                                 float64    // m, Pa·s/m
	Size                                         [2]float64 // m
	Fill                                         *Fill
}

// Kind returns "panel".
func (p Panel) Kind() string { return "panel" }

// bendingStiffness returns the stiffness per area of the sheet's lowest mode,
// simply supported along its edges, Pa/m,
//
//	K_b = D·[(π/a)² + (π/b)²]²,  D = E·h³/(12·(1−ν²))
//
// with Young's modulus E (Pa), thickness h (m) and Poisson's ratio ν; 0 for a
// limp sheet.
//
// Source: Leissa, Vibration of Plates, NASA SP-160, 1969 (simply supported
// rectangle).
func (p Panel) bendingStiffness() float64 {
	if p.Youngs == 0 {
		return 0
	}
	d := p.Youngs * math.Pow(p.Thickness, 3) / (12 * (1 - sq(p.Poisson)))
	return d * sq(sq(math.Pi/p.Size[0])+sq(math.Pi/p.Size[1]))
}

// PlateHz returns the lowest resonance of the sheet without any cavity, Hz,
// (1/2π)·√(K_b/m); 0 for a limp sheet.
func (p Panel) PlateHz() float64 {
	return math.Sqrt(p.bendingStiffness()/p.Mass) / (2 * math.Pi)
}

// AirSpringHz returns the resonance of the sheet's mass on the air of an empty
// shallow cavity, Hz, (1/2π)·√(ρc²/(m·D)).
func (p Panel) AirSpringHz(air acoustics.Air) float64 {
	return air.SpeedOfSound / (2 * math.Pi) * math.Sqrt(air.Density/(p.Mass*p.Cavity))
}

// front returns the impedance of the sheet, Pa·s/m,
//
//	Z = jωm + K_b·(1+jη)/(jω) + r_edge
//
// with mass m per area, the sheet's loss factor η and the edge's resistance.
func (p Panel) front(omega complex128, _ acoustics.Air) complex128 {
	jw := complex(0, 1) * omega
	return jw*complex(p.Mass, 0) +
		complex(p.bendingStiffness(), 0)*complex(1, p.LossFactor)/jw +
		complex(p.Edge, 0)
}

func (p Panel) cavity() cavity { return filledCavity(p.Cavity, p.Fill) }

// extended is false: membrane absorbers are boxes, locally reacting.
func (p Panel) extended() bool { return false }

// Specific returns the sheet over cavity and fill, at normal incidence.
func (p Panel) Specific(omega complex128, air acoustics.Air) complex128 {
	return faceSpecific(p, omega, air)
}

// InRoom returns the impedance of an area of the face, Pa·s/m³.
func (p Panel) InRoom(omega complex128, area float64, air acoustics.Air) complex128 {
	return faceInRoom(p, omega, area, air)
}
