package resonators

import (
	"fmt"
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

// Validate returns nil, or all *ValueError of the panel joined.
func (p Panel) Validate() error {
	c := checker{kind: p.Kind()}
	c.positive("Mass", p.Mass, "kg/m²")
	c.notNegative("Youngs", p.Youngs, "Pa")
	if p.Youngs > 0 {
		c.positive("Thickness", p.Thickness, metres)
		c.positive("Size[0]", p.Size[0], metres)
		c.positive("Size[1]", p.Size[1], metres)
	}
	c.need(p.Poisson >= 0 && p.Poisson <= 0.5, "Poisson", p.Poisson, "", "between 0 and 0.5")
	c.notNegative("LossFactor", p.LossFactor, "")
	c.positive("Cavity", p.Cavity, metres)
	c.notNegative("Edge", p.Edge, rayls)
	c.fill(p.Fill, p.Cavity)
	return c.result()
}

// dimensions lists what the resonance depends on.
func (p Panel) dimensions() []dimension {
	d := []dimension{
		{"Mass", massStep, p.Mass, func(x float64) Absorber { p := p; p.Mass = x; return p }},
		{"Cavity", millimetre, p.Cavity, func(x float64) Absorber { p := p; p.Cavity = x; return p }},
		{"Edge", edgeStep, p.Edge, func(x float64) Absorber { p := p; p.Edge = x; return p }},
	}
	if p.Youngs > 0 {
		d = append(d,
			dimension{"Thickness", tenthMM, p.Thickness, func(x float64) Absorber { p := p; p.Thickness = x; return p }},
			dimension{"Youngs", youngsStep, p.Youngs, func(x float64) Absorber { p := p; p.Youngs = x; return p }},
			dimension{"LossFactor", ratioStep, p.LossFactor, func(x float64) Absorber { p := p; p.LossFactor = x; return p }},
			dimension{"Size[0]", millimetre, p.Size[0], func(x float64) Absorber { p := p; p.Size[0] = x; return p }},
			dimension{"Size[1]", millimetre, p.Size[1], func(x float64) Absorber { p := p; p.Size[1] = x; return p }})
	}
	return append(d, fillDimensions(p.Fill, p.Cavity, func(f *Fill) Absorber { p := p; p.Fill = f; return p })...)
}

// refilled keeps a cavity that was full full when its depth has changed.
func (p Panel) refilled(was Absorber) Absorber {
	p.Fill = keptFull(p.Fill, was.(Panel).Cavity, p.Cavity)
	return p
}

// sized takes the unit's size for the sheet's where none is given.
func (p Panel) sized(size [2]float64) Absorber {
	if p.Size == [2]float64{} {
		p.Size = size
	}
	p.Fill = p.Fill.clone()
	return p
}

// plateClear is how far the sheet's own resonance should stay above that of its
// mass on the air spring.
const plateClear = 1.5

// warnings says where the sheet or the fill is outside what the model means.
func (p Panel) warnings(air acoustics.Air, o *acoustics.Oscillator) []string {
	return append(p.stiffness(air), fillWarnings(p.Fill, o)...)
}

// stiffness says what the sheet's own bending does to the tuning.
func (p Panel) stiffness(air acoustics.Air) []string {
	if p.Youngs == 0 {
		return []string{"The sheet is taken as limp: its bending stiffness is not counted."}
	}
	plate, spring := p.PlateHz(), p.AirSpringHz(air)
	switch {
	case plate >= plateClear*spring:
		return []string{fmt.Sprintf(
			"The sheet's own stiffness, not the air behind it, sets the resonance: the plate alone is at %.1f Hz, the mass on the air at %.1f Hz. The edge's fixing decides.",
			plate, spring)}
	case plate > spring:
		return []string{fmt.Sprintf(
			"The sheet's own plate resonance at %.1f Hz is less than 1.5 times the air-spring resonance at %.1f Hz: the edge's fixing shifts the tuning.",
			plate, spring)}
	}
	return nil
}

// whole makes a unit one piece: its sheet moves as one.
func (p Panel) whole(at acoustics.Patch) (acoustics.Patch, bool) { return at, true }
