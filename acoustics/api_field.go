package acoustics

// (contract: declarations fixed; bodies and file split are the owner's)

// Source is a monopole of constant volume acceleration.
type Source struct {
	At    Point
	Gain  float64 // amplitude factor, negative where inverted
	Delay float64 // s
}

// Patch is a rectangle on a surface, or a box's round mouths at its centre.
type Patch struct {
	Surface Surface
	Centre  [2]float64 // along the surface's in-plane axes, m
	Size    [2]float64 // m; for mouths ignored
	// MouthRadius > 0 makes the patch Mouths round mouths of that radius
	// (m) which act as one opening at Centre.
	MouthRadius float64
	Mouths      int
}

// Unit is one absorber unit as the room knows it: a place and an admittance.
type Unit struct {
	Patch Patch
	// Impedance returns the acoustic impedance Z = p/U in Pa·s/m³ at the
	// complex angular frequency omega (rad/s), without the outer air mass of
	// round mouths, which the room supplies. It must be analytic near the real
	// axis and safe for concurrent use.
	Impedance func(omega complex128) complex128
	// Natural is the frequency in Hz near which Z has its own resonance, by the
	// absorber's own reckoning; 0 where it has none (broadband).
	Natural float64
	// Owner is the index of the absorber the unit belongs to.
	Owner int
}

// Field is the sound field of a room with loudspeakers, seats and absorber
// units in place: the static sums worked out once, reused at every frequency.
//
// func NewField(ctx context.Context, r Room, sources []Source, seats []Point, units []Unit, upTo float64) (*Field, error)
//     upTo: the highest frequency (Hz) asked for later.
// func (f *Field) Levels(ctx context.Context, hz []float64) (Levels, error)
// func (f *Field) ModeLevel(m DampedMode, seat int) float64  // own peak, dB; NaN for nothing (node, cancelled: below −200 dB)
// func (f *Field) Poles(ctx context.Context, upTo float64, progress func(done, total int)) (Poles, error)

// Levels are levels in dB re the free field of one unit-gain source at 1 m,
// indexed [seat][frequency].
type Levels struct {
	Bare, Treated [][]float64
}

// Pole is one damped oscillation of the treated room.
type Pole struct {
	Oscillator           // natural frequency |ω|/2π and decay Im ω
	LevelDB    []float64 // per seat: 20 log10(4π|residue|/Im ω); NaN for nothing
}

// Poles are those of the treated room below the limit asked for, T60 ≥ 0.02 s.
type Poles struct {
	// Modes[i] is the pole that the bare mode i became by continuation from
	// weak coupling, nil where it is no longer listed; in the order of
	// Room.Modes(upTo).
	Modes []*Pole
	// Absorbers are those that grew from units' own resonances; Owner of each
	// beside it.
	Absorbers []AbsorberPole
	// Counted is the number of poles the argument principle finds inside the
	// stated contour, Found those that were followed there; equal when none is lost.
	Counted, Found int
}

// AbsorberPole is a pole that grew from the resonance of a unit.
type AbsorberPole struct {
	Pole
	Owner int
}
