package project

import (
	"strconv"

	"stillroom/acoustics"
)

// Suffix is the ending of the name of a project file.
const Suffix = ".stillroom"

// FallbackFinish is the finish of a surface with no entry, where the file has
// no finish of its own.
const FallbackFinish = "plaster-on-masonry"

// The names of the published decay limits.
const (
	MusicLimits      = "music-2015"
	ArtificialLimits = "artificial-2015"
)

// Curves lists the names that Limits.Curve may have.
func Curves() []string { return []string{MusicLimits, ArtificialLimits} }

// DefaultAir returns 20 °C, 50 % relative humidity, 101.325 kPa.
func DefaultAir() Air {
	return Air{TemperatureC: 20, RelativeHumidityPct: 50, PressureKPa: 101.325}
}

// DefaultLimits returns the published limits for music.
func DefaultLimits() Limits { return Limits{Curve: MusicLimits} }

// New returns a small valid project: an empty room with a pair of loudspeakers
// and a seat.
func New() Project {
	return Project{
		Air:  DefaultAir(),
		Room: Room{Length: 5, Width: 4, Height: 2.5},
		Loudspeakers: []Loudspeaker{
			{ID: "L", At: acoustics.Point{1, 1.2, 1.2}},
			{ID: "R", At: acoustics.Point{1, 2.8, 1.2}},
		},
		Seats:  []Seat{{ID: "seat", At: acoustics.Point{2.4, 2, 1.2}}},
		Limits: DefaultLimits(),
	}
}

// DefaultNeck returns a box of 60 L with one neck.
func DefaultNeck() Neck {
	return Neck{CavityL: 60, MouthDiameterMM: 100, LengthMM: 250, Mouths: 1}
}

// DefaultNeckFill returns a cavity half filled.
func DefaultNeckFill() NeckFill { return NeckFill{Share: 0.5, FlowPaSM2: 10_000} }

// DefaultPanel returns 6 mm plywood, simply supported, over 100 mm of air.
func DefaultPanel() Panel {
	return Panel{MassKgM2: 3.6, ThicknessMM: 6, YoungsGPa: 7, Poisson: 0.3, LossFactor: 0.03, CavityMM: 100}
}

// DefaultPerforated returns a 6 mm sheet with 6 mm holes over 100 mm of air.
func DefaultPerforated() Perforated {
	return Perforated{PanelMM: 6, HoleMM: 6, PitchMM: 25, CavityMM: 100}
}

// DefaultSlotted returns 40 mm slats with 5 mm gaps over 100 mm of air.
func DefaultSlotted() Slotted {
	return Slotted{SlatMM: 40, SlotMM: 5, PanelMM: 20, CavityMM: 100}
}

// DefaultMicroperforated returns a 0.8 mm sheet with 0.5 mm holes over 100 mm
// of air.
func DefaultMicroperforated() Microperforated {
	return Microperforated{PanelMM: 0.8, HoleMM: 0.5, PitchMM: 4, CavityMM: 100}
}

// DefaultPorous returns 100 mm of light mineral wool on the wall.
func DefaultPorous() Porous { return Porous{ThicknessMM: 100, FlowPaSM2: 8000} }

// DefaultFill returns 50 mm of mineral wool at the wall.
func DefaultFill() Fill { return Fill{ThicknessMM: 50, FlowPaSM2: 10_000} }

// DefaultFluid returns the four parameters of a common mineral wool.
func DefaultFluid() Fluid {
	return Fluid{Porosity: 0.97, Tortuosity: 1.02, ViscousUM: 80, ThermalUM: 160}
}

// withDefaultBlock returns the absorber as one of that kind with the kind's
// defaults. An unknown kind gets no block.
func (a Absorber) withDefaultBlock(kind string) Absorber {
	a.Kind = kind
	a.Neck, a.Panel, a.Perforated, a.Slotted, a.Microperforated, a.Porous = nil, nil, nil, nil, nil, nil
	switch kind {
	case "neck":
		b := DefaultNeck()
		a.Neck = &b
	case "panel":
		b := DefaultPanel()
		a.Panel = &b
	case "perforated":
		b := DefaultPerforated()
		a.Perforated = &b
	case "slotted":
		b := DefaultSlotted()
		a.Slotted = &b
	case "microperforated":
		b := DefaultMicroperforated()
		a.Microperforated = &b
	case "porous":
		b := DefaultPorous()
		a.Porous = &b
	}
	return a
}

// OfKind returns the absorber in its place as one of another kind, with that
// kind's defaults. It panics on a kind that Kinds does not list.
func (a Absorber) OfKind(kind string) Absorber {
	if !contains(Kinds(), kind) {
		panic("project: no absorber of kind " + strconv.Quote(kind))
	}
	return a.withDefaultBlock(kind)
}

// FreshAbsorberID returns the first of "A1", "A2", … that no absorber has.
func (p Project) FreshAbsorberID() string {
	return fresh("A", len(p.Absorbers), func(i int) string { return p.Absorbers[i].ID })
}

// FreshLoudspeakerID returns the first of "S1", "S2", … that no loudspeaker has.
func (p Project) FreshLoudspeakerID() string {
	return fresh("S", len(p.Loudspeakers), func(i int) string { return p.Loudspeakers[i].ID })
}

// FreshSeatID returns the first of "seat1", "seat2", … that no seat has.
func (p Project) FreshSeatID() string {
	return fresh("seat", len(p.Seats), func(i int) string { return p.Seats[i].ID })
}

// FreshFinishID returns the first of "finish1", "finish2", … that no finish of
// the file has.
func (p Project) FreshFinishID() string {
	return fresh("finish", len(p.Finishes), func(i int) string { return p.Finishes[i].ID })
}

func fresh(prefix string, count int, id func(i int) string) string {
	return freshIDs(prefix, count, id)()
}

// freshIDs returns a source of ids that none of those given has.
func freshIDs(prefix string, count int, id func(i int) string) func() string {
	taken := map[string]bool{}
	for i := range count {
		taken[id(i)] = true
	}
	n := 0
	return func() string {
		for {
			n++
			if s := prefix + strconv.Itoa(n); !taken[s] {
				return s
			}
		}
	}
}
