package acoustics

// (contract: declarations fixed; bodies and file split are the owner's)

// Atmosphere is the state of the air as people give it.
type Atmosphere struct {
	TemperatureC        float64 // −20…50 °C
	RelativeHumidityPct float64 // 0…100 %
	PressureKPa         float64 // 60…110 kPa
}

// Air holds the properties of moist air that acoustics needs.
type Air struct {
	Atmosphere   Atmosphere
	SpeedOfSound float64 // c, m/s (Cramer 1993)
	Density      float64 // ρ, kg/m³ (CIPM-2007)
	Viscosity    float64 // η, Pa·s (Sutherland)
	Prandtl      float64 // 0.71
	HeatRatio    float64 // γ = 1.40
	Pressure     float64 // static, Pa
}

// NewAir: error is a *RangeError. func NewAir(a Atmosphere) (Air, error)
// func (a Air) Attenuation(hz float64) float64        // dB/m, ISO 9613-1
// func (a Air) EnergyAttenuation(hz float64) float64  // m, 1/m
// func (a Air) Extrapolated() bool                    // outside 0…30 °C

// BandAbsorption is the random-incidence coefficient at one band centre.
type BandAbsorption struct {
	Hz    float64 // exact or nominal band centre
	Alpha float64 // 0…1 (values above 1 of a data sheet are taken as they are, clamped on conversion)
}

// Finish is an ordinary surface.
type Finish struct {
	ID, Name, Source string
	Absorption       []BandAbsorption // rising in Hz
}

// func (f Finish) Coefficient(hz float64) float64     // log-f interpolation, ends held (hz = 0 allowed)
// func AdmittanceFromDiffuse(alpha float64) float64   // real β
// func DiffuseFromImpedance(zeta float64) float64

// FinishShare is a finish on a share of a surface's area.
type FinishShare struct {
	Finish Finish
	Share  float64
}

// Lining is what one surface carries; shares add to 1.
type Lining []FinishShare

// func (l Lining) Admittance(hz float64) float64      // real β, mean of β by share
// func (l Lining) Coefficient(hz float64) float64     // mean of α by share

// Walls are the linings of the six surfaces, indexed by Surface.
type Walls [6]Lining

// Kind says how many axes a mode runs along.
type Kind int

// Kinds of mode. Uniform is the (0,0,0) mode, which no table lists.
const (
	Uniform Kind = iota
	Axial
	Tangential
	Oblique
)

// String: "uniform", "axial", "tangential", "oblique".

// Mode is one mode of the rigid room.
type Mode struct {
	Order [3]int
	Hz    float64 // natural frequency
	Norm  float64 // Λ = ⟨ψ²⟩
}

// func (m Mode) Kind() Kind
// func (m Mode) String() string   // "(1,0,0)"
// func (b Box) Modes(c, upTo float64) []Mode   // without the uniform one, rising in Hz, ties by order
// func (b Box) UniformMode() Mode
// func (b Box) Value(m Mode, p Point) float64  // ψ
// func (b Box) WallIntegral(m Mode, s Surface) float64 // ∫ψ² dS, m²
// func (b Box) Mean(m Mode, p Patch) float64   // û, mean of ψ over the patch (a square of equal area for mouths)
// func (b Box) CountBelow(c, hz float64) (exact int, asymptote float64)
// func (b Box) ModeDensity(c, hz float64) float64  // dN/df of the asymptote

// Damping lists what takes a mode's energy; all decay constants in 1/s.
type Damping struct {
	Wall [6]float64
	Air  float64
}

// Total returns δ.
func (d Damping) Total() float64 {
	t := d.Air
	for _, w := range d.Wall {
		t += w
	}
	return t
}

// DampedMode is a mode of the bare room.
type DampedMode struct {
	Mode
	Damping Damping
}

// Oscillator returns the mode as an oscillator.
func (m DampedMode) Oscillator() Oscillator {
	return Oscillator{Natural: m.Hz, Decay: m.Damping.Total()}
}

// func ModalDamping(b Box, m Mode, w Walls, a Air) Damping   // first order

// Room is the bare room: shape, air and walls.
type Room struct {
	Box   Box
	Air   Air
	Walls Walls
}

// func (r Room) Modes(upTo float64) []DampedMode
// func (r Room) SabineTime(hz float64) float64  // with air
// func (r Room) SchroederHz() float64           // T mean of 500 and 1000 Hz Sabine with air
