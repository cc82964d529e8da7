package resonators

import (
	"fmt"
	"math"

	"stillroom/acoustics"
)

// Microperforated is Maa's panel.
type Microperforated struct {
	Sheet, Hole, Pitch, Cavity float64 // m
	Partitioned                bool
}

// Kind returns "microperforated".
func (m Microperforated) Kind() string { return "microperforated" }

// OpenShare returns ε = πd²/4b².
func (m Microperforated) OpenShare() float64 { return math.Pi / 4 * sq(m.Hole/m.Pitch) }

// front returns the impedance of the panel on its face, Pa·s/m,
//
//	Z = (Z_pore·t + R_s + jωρ·0.85d)/ε
//
// with the hole's exact impedance, the resistance R_s = ½√(2ηρω) of the ends and
// 0.85 of the diameter d for both ends together. The holes do not interact.
// Meant for holes below 1 mm. The paper's approximate mass term, which is
// wrong for the narrowest holes, is not used.
//
// Source: Maa, JASA 104 (1998) 2861, whose end resistance is a quarter of that
// in his papers of 1975 and 1987.
func (m Microperforated) front(omega complex128, air acoustics.Air) complex128 {
	z := roundPore(omega, m.Hole/2, air)*complex(m.Sheet, 0) +
		surfaceResistance(omega, air) +
		complex(0, air.Density*0.85*m.Hole)*omega
	return z / complex(m.OpenShare(), 0)
}

func (m Microperforated) cavity() cavity { return filledCavity(m.Cavity, nil) }
func (m Microperforated) extended() bool { return !m.Partitioned }

// Specific returns the panel over its cavity, at normal incidence.
func (m Microperforated) Specific(omega complex128, air acoustics.Air) complex128 {
	return faceSpecific(m, omega, air)
}

// InRoom returns the impedance of an area of the face, Pa·s/m³.
func (m Microperforated) InRoom(omega complex128, area float64, air acoustics.Air) complex128 {
	return faceInRoom(m, omega, area, air)
}

// Validate returns nil, or all *ValueError of the panel joined.
func (m Microperforated) Validate() error {
	c := checker{kind: m.Kind()}
	c.positive("Sheet", m.Sheet, metres)
	c.hole(m.Hole, m.Pitch)
	c.positive("Cavity", m.Cavity, metres)
	return c.result()
}

// dimensions lists what the resonance depends on.
func (m Microperforated) dimensions() []dimension {
	return []dimension{
		{"Sheet", tenthMM, m.Sheet, func(x float64) Absorber { m := m; m.Sheet = x; return m }},
		{"Hole", tenthMM, m.Hole, func(x float64) Absorber { m := m; m.Hole = x; return m }},
		{"Pitch", tenthMM, m.Pitch, func(x float64) Absorber { m := m; m.Pitch = x; return m }},
		{"Cavity", millimetre, m.Cavity, func(x float64) Absorber { m := m; m.Cavity = x; return m }},
	}
}

// refilled has nothing to keep full.
func (m Microperforated) refilled(Absorber) Absorber { return m }

// sized takes nothing from the unit's size.
func (m Microperforated) sized([2]float64) Absorber { return m }

// microOpen is the open share above which micro-perforations, which are taken
// not to interact, would share more than a quarter of their end correction.
const microOpen = 0.03

// warnings says where the holes are outside what the model means.
func (m Microperforated) warnings(acoustics.Air, *acoustics.Oscillator) []string {
	var w []string
	if m.Hole >= 1e-3 {
		w = append(w, "The model of a micro-perforated panel is meant for holes below 1 mm.")
	}
	if eps := m.OpenShare(); eps > microOpen {
		w = append(w, fmt.Sprintf("With %.1f %% open the holes influence each other, which is not counted: the true tuning is higher.", 100*eps))
	}
	return w
}

// whole leaves a unit to be cut into tiles.
func (m Microperforated) whole(at acoustics.Patch) (acoustics.Patch, bool) { return at, false }
