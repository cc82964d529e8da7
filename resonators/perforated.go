package resonators

import (
	"math"

	"stillroom/acoustics"
)

// Perforated is a panel with round holes on a square pitch.
type Perforated struct {
	Sheet, Hole, Pitch, Cavity float64 // m; Hole is the diameter
	Partitioned                bool
	Fill                       *Fill
	Gauze                      float64 // Pa·s/m
}

// Kind returns "perforated".
func (p Perforated) Kind() string { return "perforated" }

// OpenShare returns ε = πd²/4b².
func (p Perforated) OpenShare() float64 { return math.Pi / 4 * sq(p.Hole/p.Pitch) }

// front returns the impedance of the perforated sheet on its face, Pa·s/m,
//
//	Z = (Z_pore·t + r_ends + jω(ρ + ρ_in)·δ + r_g)/ε
//
// with δ the end correction of one side. Where fill touches the holes ρ_in is
// its complex effective density, which brings its flow resistance too. The
// sheet itself does not move.
func (p Perforated) front(omega complex128, air acoustics.Air) complex128 {
	eps := p.OpenShare()
	pore := roundPore(omega, p.Hole/2, air)*complex(p.Sheet, 0) + complex(p.Gauze, 0)
	return holesFront(omega, pore, holeEnd(p.Hole/2, eps), eps, p.Cavity, p.Fill, air)
}

// holesFront returns the impedance on the face of a sheet whose holes have the
// given impedance (Pa·s/m over the hole), the end correction end (m) on each
// side and the open share eps.
func holesFront(omega, pore complex128, end, eps, depth float64, f *Fill, air acoustics.Air) complex128 {
	inner := complex(air.Density, 0)
	if f.touches(depth) {
		inner = porousFluid(omega, f.FlowResistivity, f.JCA, air).density(omega)
	}
	ends := complex(0, end) * omega * (complex(air.Density, 0) + inner)
	return (pore + edgeResistance(omega, air) + ends) / complex(eps, 0)
}

func (p Perforated) cavity() cavity { return filledCavity(p.Cavity, p.Fill) }
func (p Perforated) extended() bool { return !p.Partitioned }

// Specific returns the holes over cavity and fill, at normal incidence.
func (p Perforated) Specific(omega complex128, air acoustics.Air) complex128 {
	return faceSpecific(p, omega, air)
}

// InRoom returns the impedance of an area of the face, Pa·s/m³. The air between
// and before the holes is in it; the room adds what moves before the area as a
// whole.
func (p Perforated) InRoom(omega complex128, area float64, air acoustics.Air) complex128 {
	return faceInRoom(p, omega, area, air)
}

// Validate returns nil, or all *ValueError of the panel joined.
func (p Perforated) Validate() error {
	c := checker{kind: p.Kind()}
	c.positive("Sheet", p.Sheet, metres)
	c.hole(p.Hole, p.Pitch)
	c.positive("Cavity", p.Cavity, metres)
	c.notNegative("Gauze", p.Gauze, rayls)
	c.fill(p.Fill, p.Cavity)
	return c.result()
}

// dimensions lists what the resonance depends on.
func (p Perforated) dimensions() []dimension {
	d := []dimension{
		{"Sheet", millimetre, p.Sheet, func(x float64) Absorber { p := p; p.Sheet = x; return p }},
		{"Hole", tenthMM, p.Hole, func(x float64) Absorber { p := p; p.Hole = x; return p }},
		{"Pitch", millimetre, p.Pitch, func(x float64) Absorber { p := p; p.Pitch = x; return p }},
		{"Cavity", millimetre, p.Cavity, func(x float64) Absorber { p := p; p.Cavity = x; return p }},
		{"Gauze", edgeStep, p.Gauze, func(x float64) Absorber { p := p; p.Gauze = x; return p }},
	}
	return append(d, fillDimensions(p.Fill, p.Cavity, func(f *Fill) Absorber { p := p; p.Fill = f; return p })...)
}

// refilled keeps a cavity that was full full when its depth has changed.
func (p Perforated) refilled(was Absorber) Absorber {
	p.Fill = keptFull(p.Fill, was.(Perforated).Cavity, p.Cavity)
	return p
}

// sized takes nothing from the unit's size.
func (p Perforated) sized([2]float64) Absorber { p.Fill = p.Fill.clone(); return p }

// warnings says where holes or fill are outside what the model means.
func (p Perforated) warnings(_ acoustics.Air, o *acoustics.Oscillator) []string {
	return append(crowding("holes", p.OpenShare()), fillWarnings(p.Fill, o)...)
}

// whole leaves a unit to be cut into tiles.
func (p Perforated) whole(at acoustics.Patch) (acoustics.Patch, bool) { return at, false }
