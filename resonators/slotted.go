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

// Validate returns nil, or all *ValueError of the slats joined.
func (s Slotted) Validate() error {
	c := checker{kind: s.Kind()}
	c.positive("Slat", s.Slat, metres)
	c.positive("Slot", s.Slot, metres)
	c.positive("Sheet", s.Sheet, metres)
	c.positive("Cavity", s.Cavity, metres)
	c.fill(s.Fill, s.Cavity)
	return c.result()
}

// dimensions lists what the resonance depends on.
func (s Slotted) dimensions() []dimension {
	d := []dimension{
		{"Slat", millimetre, s.Slat, func(x float64) Absorber { s := s; s.Slat = x; return s }},
		{"Slot", tenthMM, s.Slot, func(x float64) Absorber { s := s; s.Slot = x; return s }},
		{"Sheet", millimetre, s.Sheet, func(x float64) Absorber { s := s; s.Sheet = x; return s }},
		{"Cavity", millimetre, s.Cavity, func(x float64) Absorber { s := s; s.Cavity = x; return s }},
	}
	return append(d, fillDimensions(s.Fill, s.Cavity, func(f *Fill) Absorber { s := s; s.Fill = f; return s })...)
}

// refilled keeps a cavity that was full full when its depth has changed.
func (s Slotted) refilled(was Absorber) Absorber {
	s.Fill = keptFull(s.Fill, was.(Slotted).Cavity, s.Cavity)
	return s
}

// sized takes nothing from the unit's size.
func (s Slotted) sized([2]float64) Absorber { s.Fill = s.Fill.clone(); return s }

// warnings says where the fill is outside what its model means.
func (s Slotted) warnings(_ acoustics.Air, o *acoustics.Oscillator) []string {
	return fillWarnings(s.Fill, o)
}

// whole leaves a unit to be cut into tiles.
func (s Slotted) whole(at acoustics.Patch) (acoustics.Patch, bool) { return at, false }
