// Package study turns a project into results: a pure function of the project,
// staged, cancellable, its stages reused while their own inputs have not
// changed. Window, figures, papers and verbs read the same Result, so they
// cannot disagree.
package study

import (
	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/resonators"
)

// Options say how far a study goes. The zero value of a field is its default.
type Options struct {
	FromHz, ToHz float64 // range of the level curves, default 16…250 Hz
	Points       int     // number of log-spaced points, both ends included, default 200
	ModesToHz    float64 // modes are listed up to here, default 200 Hz
	Ringing      bool    // Result.Ringing is wanted
	// Coarse takes coarser tiles where there are many: a preview while something moves.
	Coarse bool
	// FieldDeg is the greatest angle of incidence of the diffuse field for the
	// absorbers' coefficients, degrees; default 90, building practice has 78.
	FieldDeg float64
	// Samples is how many rooms with tolerances Result.Robustness is worked out from; 0
	// for none.
	Samples int
	// MapHz is the frequency at which Result.Plan and Result.Section are wanted, 0
	// for none; they lie through the seat of index MapSeat, with about MapCells cells
	// along the longer side, default 28.
	MapHz             float64
	MapSeat, MapCells int
}

// Stage says how much of a Result is there.
type Stage int

// Stages in their order. A Result of a stage holds all that the earlier ones hold.
const (
	StageModes   Stage = iota + 1 // air, modes, damping, bare level, counts
	StageLevel                    // absorbers and the treated level
	StageTreated                  // poles of the treated room: complete
)

// Result is all that is computed of a project. It is immutable: nobody changes
// a Result or a slice of one.
type Result struct {
	Project project.Project
	Options Options
	Stage   Stage

	Air      acoustics.Air
	Room     acoustics.Room
	VolumeM3 float64
	AreaM2   float64
	// SchroederHz is 2000·√(T/V), T by Sabine with air, mean of 500 and 1000 Hz.
	SchroederHz float64

	Modes  []ModeRow // rising in frequency, up to Options.ModesToHz
	Bands  []BandRow // third octaves 16 … 250 Hz
	Levels Levels

	Absorbers []AbsorberRow // in the order of the project's absorbers
	// AbsorberPoles are the poles of the treated room that grew from an
	// absorber's own resonance. From StageTreated on.
	AbsorberPoles []PoleRow
	// PolesCounted and PolesFound: the argument principle's count and what was followed.
	PolesCounted, PolesFound int

	// Reverberation is the diffuse-field estimate by octaves, 125 to 4000 Hz.
	Reverberation []ReverberationRow

	// Robustness is the range under building tolerances; nil where it is not asked for or
	// nothing treats the room.
	Robustness *Robustness
	// Plan and Section are the level over the room at Options.MapHz; nil where they
	// are not asked for.
	Plan, Section *LevelMap
	// Ringing is the decay in time; nil where Options do not ask for it and before
	// StageTreated.
	Ringing *Ringing

	// Criteria are the published figures of merit of the bare room, its loudspeakers
	// and its first seat.
	Criteria []acoustics.Criterion

	// Findings are plain sentences, worst first.
	Findings []Finding
	// Cautions are limits of the models that apply to this project, plain sentences.
	Cautions []string

	stages stages
}

// ModeRow is one mode of the bare room and what becomes of it.
type ModeRow struct {
	Mode       acoustics.DampedMode
	Oscillator acoustics.Oscillator
	Wavelength float64   // m
	LevelDB    []float64 // own peak at each seat; NaN where it is nothing
	LimitS     float64   // longest T60 allowed at its frequency
	Problem    bool
	// Rank is 1 for the worst problem, 2 for the next…; 0 where it is none.
	Rank int
	// Treated is the pole this mode became (none where nothing treats the room,
	// or before StageTreated, or where it rings for less than 0.02 s).
	Treated []PoleRow
	// Pair are the absorber poles that belong with this mode as a tuned pair,
	// shown beside Treated in window and papers.
	Pair []PoleRow
	// Absorbers are the indices of the project's absorbers assigned to this
	// mode: those whose band of action holds its frequency and that couple to it.
	Absorbers []int
	// Strongest says in words a joiner understands where its pressure is greatest.
	Strongest string
}

// PoleRow is one damped oscillation of the treated room.
type PoleRow struct {
	Oscillator acoustics.Oscillator
	LevelDB    []float64 // per seat, NaN where it is nothing
	Absorber   int       // index of the absorber it grew from; −1 for a mode's pole
	LimitS     float64
}

// BandRow is one third-octave band's mode count.
type BandRow struct {
	Nominal              string
	CentreHz, LoHz, HiHz float64
	Count                int     // modes in the band
	Asymptote            float64 // three-term asymptote's difference over the band
}

// ReverberationRow is one octave's reverberation times, s, with air. They are
// estimates for a diffuse field: below the Schroeder frequency they are not meant.
type ReverberationRow struct {
	Nominal                      string
	Hz                           float64
	Sabine, Eyring, ArauPuchades float64
	Meant                        bool // the octave lies above the Schroeder frequency
}

// Levels are the level curves, dB re the free field of one unit-gain
// loudspeaker at 1 m, indexed [seat][frequency].
type Levels struct {
	Hz            []float64
	Bare, Treated [][]float64 // Treated equals Bare where there is no absorber; nil before StageLevel
	// Lowest, Highest and Mean are the treated levels over all seats, indexed
	// [frequency]; the mean is that of the squared pressures.
	Lowest, Highest, Mean []float64
}

// AbsorberRow is one absorber of the project.
type AbsorberRow struct {
	ID, Kind string
	Design   resonators.Absorber
	Report   resonators.Report
	Units    int // as placed
	// InRoomHz is where it resonates in its place, with the air that the room
	// puts before it; 0 where it is broadband.
	InRoomHz float64
	AreaM2   float64 // of all units together
	// Target is the index in Modes of the mode it is nearest tuned to and couples
	// with; −1 where there is none.
	Target int
	// Section is what one unit takes in at its resonance, alone in a wall; nil where it
	// has none or is not small beside the wave.
	Section *resonators.CrossSection
	// Derivatives of f0 and Q with its dimensions.
	Sensitivities []resonators.Sensitivity
}

// Finding is one sentence of the findings line, and what it is about.
type Finding struct {
	Text  string
	Mode  int // index in Modes, −1 for none
	Worst bool
}
