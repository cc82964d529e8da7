package resonators

import "stillroom/acoustics"

// (contract: declarations fixed; bodies and file split are the owner's)

// Fill is a porous layer in a cavity.
type Fill struct {
	Thickness       float64 // m
	FlowResistivity float64 // Pa·s/m²
	AtFace          bool    // touching the panel rather than the wall
	JCA             *JCA    // nil: Miki
}

// JCA are the further parameters of a Johnson-Champoux-Allard fluid.
type JCA struct {
	Porosity, Tortuosity, ViscousLength, ThermalLength float64 // –, –, m, m
}

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

// Panel is a membrane absorber: a sheet over a cavity. a×b of the sheet is Size.
type Panel struct {
	Mass, Thickness, Youngs, Poisson, LossFactor float64    // kg/m², m, Pa (0: limp), –, –
	Cavity, Edge                                 float64    // m, Pa·s/m
	Size                                         [2]float64 // m
	Fill                                         *Fill
}

// Perforated is a panel with round holes on a square pitch.
type Perforated struct {
	Sheet, Hole, Pitch, Cavity float64 // m; Hole is the diameter
	Partitioned                bool
	Fill                       *Fill
	Gauze                      float64 // Pa·s/m
}

// Slotted is a front of slats with gaps.
type Slotted struct {
	Slat, Slot, Sheet, Cavity float64 // m
	Partitioned               bool
	Fill                      *Fill
}

// Microperforated is Maa's panel.
type Microperforated struct {
	Sheet, Hole, Pitch, Cavity float64 // m
	Partitioned                bool
}

// Porous is a porous layer with an optional air gap behind.
type Porous struct {
	Thickness, FlowResistivity, Gap float64
	JCA                             *JCA
}

// Absorber is what every kind answers. All values are plain and immutable.
type Absorber interface {
	// Kind is the name used in project files.
	Kind() string
	// Specific returns the normal-incidence specific impedance z of the face
	// (for a neck box Z·w·h/ρc over its front, with its outer end correction).
	Specific(omega complex128, air acoustics.Air) complex128
	// InRoom returns the acoustic impedance Z = p/U of a unit or tile of the
	// given area (m², ignored by necks) as acoustics.Unit wants it.
	InRoom(omega complex128, area float64, air acoustics.Air) complex128
	// Diffuse and Normal absorption at a frequency are package functions, see Report.
}

// func Analyse(a Absorber, air acoustics.Air, size [2]float64) Report
// func PlaceUnits(a Absorber, air acoustics.Air, at Placement, owner int) []acoustics.Unit

// Placement is where an absorber's units are: the centre of the first, the
// size of one, and how many stand beside it in the direction of the rising first
// coordinate, touching.
type Placement struct {
	Surface acoustics.Surface
	Centre  [2]float64 // m
	Size    [2]float64 // m
	Units   int
}

// Report is all that is said of one absorber on its own.
type Report struct {
	// Oscillator is nil where the absorber is broadband.
	Oscillator *acoustics.Oscillator
	Band       [2]float64 // band of action f0(√(1+ζ²) ∓ ζ), Hz; zero where broadband
	// The equivalent oscillator, per face area for wide kinds (kg/m², N/m³,
	// Pa·s/m), acoustic for necks (kg/m⁴, Pa/m³, Pa·s/m³); zero where broadband.
	Mass, Stiffness, Resistance float64
	ThirdOctaves                []ThirdOctave // nominal 20 Hz … 5 kHz
	Practical                   []OctaveValue // ISO 11654 practical coefficients 125 … 4000 Hz (from the diffuse values)
	AlphaW                      float64
	AlphaWShape                 string        // "", "L", "M", "LM", …
	Impedance                   []ImpedanceAt // at the third-octave centres: specific; for necks acoustic with the outer end correction
	Warnings                    []string      // plain sentences: Miki out of range, sheet resonance near, …
}

// ThirdOctave holds the band means of the absorption coefficients.
type ThirdOctave struct {
	Nominal         string  // "31.5"
	Hz              float64 // exact centre
	Normal, Diffuse float64
}

// OctaveValue is one octave band's practical coefficient.
type OctaveValue struct {
	Nominal string
	Alpha   float64
}

// ImpedanceAt is an impedance at a frequency.
type ImpedanceAt struct {
	Hz float64
	Z  complex128
}

// Sensitivity is what one step of one dimension does.
type Sensitivity struct {
	Dimension string  // in words: "cavity depth", "neck length", …
	Key       string  // the project file's key, as "cavity_mm"
	Step      float64 // in SI
	F0PerStep float64 // Hz
	QPerStep  float64
}
