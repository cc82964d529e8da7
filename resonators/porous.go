package resonators

import "stillroom/acoustics"

// Porous is a porous layer with an optional air gap behind.
type Porous struct {
	Thickness, FlowResistivity, Gap float64
	JCA                             *JCA
}

// Kind returns "porous".
func (p Porous) Kind() string { return "porous" }

// front is nothing: the layer meets the room.
func (p Porous) front(complex128, acoustics.Air) complex128 { return 0 }

func (p Porous) cavity() cavity {
	var c cavity
	c.add(layer{thickness: p.Thickness, flow: p.FlowResistivity, jca: p.JCA})
	c.add(layer{thickness: p.Gap})
	return c
}

// extended is true: sound travels sideways in the layer and in the gap.
func (p Porous) extended() bool { return true }

// Specific returns layer and gap before the wall, at normal incidence.
func (p Porous) Specific(omega complex128, air acoustics.Air) complex128 {
	return faceSpecific(p, omega, air)
}

// InRoom returns the impedance of an area of the face, Pa·s/m³.
func (p Porous) InRoom(omega complex128, area float64, air acoustics.Air) complex128 {
	return faceInRoom(p, omega, area, air)
}

// Validate returns nil, or all *ValueError of the layer joined.
func (p Porous) Validate() error {
	c := checker{kind: p.Kind()}
	c.positive("Thickness", p.Thickness, metres)
	c.positive("FlowResistivity", p.FlowResistivity, flowUnit)
	c.notNegative("Gap", p.Gap, metres)
	c.jca("JCA.", p.JCA)
	return c.result()
}

// dimensions lists none: there is no resonance to depend on them.
func (p Porous) dimensions() []dimension { return nil }

// refilled has nothing to keep full.
func (p Porous) refilled(Absorber) Absorber { return p }

// sized takes nothing from the unit's size.
func (p Porous) sized([2]float64) Absorber { p.JCA = p.JCA.clone(); return p }

// warnings says where the layer is outside what Miki's model means.
func (p Porous) warnings(_ acoustics.Air, o *acoustics.Oscillator) []string {
	if p.JCA != nil {
		return nil
	}
	return mikiWarnings("The porous layer", p.FlowResistivity, o)
}

// whole leaves a unit to be cut into tiles.
func (p Porous) whole(at acoustics.Patch) (acoustics.Patch, bool) { return at, false }
