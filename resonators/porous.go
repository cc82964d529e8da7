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
