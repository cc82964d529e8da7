package resonators

import "stillroom/acoustics"

// Slotted is a front of slats with gaps.
type Slotted struct {
	Slat, Slot, Sheet, Cavity float64 // m
	Partitioned               bool
	Fill                      *Fill
}

// Kind returns "slotted".
func (s Slotted) Kind() string { return "slotted" }

// OpenShare returns ε = b/(b + w) of slots b between slats w.
func (s Slotted) OpenShare() float64 { return s.Slot / (s.Slot + s.Slat) }

// front returns the impedance of the slats on their face, Pa·s/m,
//
//	Z = (Z_slit·t + r_ends + jω(ρ + ρ_in)·δ)/ε
//
// as a perforated panel's, with the slit's impedance and end correction.
func (s Slotted) front(omega complex128, air acoustics.Air) complex128 {
	eps := s.OpenShare()
	pore := slitPore(omega, s.Slot, air) * complex(s.Sheet, 0)
	return holesFront(omega, pore, slotEnd(s.Slot, eps), eps, s.Cavity, s.Fill, air)
}

func (s Slotted) cavity() cavity { return filledCavity(s.Cavity, s.Fill) }
func (s Slotted) extended() bool { return !s.Partitioned }

// Specific returns the slots over cavity and fill, at normal incidence.
func (s Slotted) Specific(omega complex128, air acoustics.Air) complex128 {
	return faceSpecific(s, omega, air)
}

// InRoom returns the impedance of an area of the face, Pa·s/m³; see
// [Perforated.InRoom].
func (s Slotted) InRoom(omega complex128, area float64, air acoustics.Air) complex128 {
	return faceInRoom(s, omega, area, air)
}
