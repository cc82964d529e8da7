package study

import (
	"context"
	"fmt"
	"math"
	"reflect"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/resonators"
)

// stages holds the parts of a study with the inputs they were made from, so
// that a later run can take over those whose inputs are the same. Moving a seat
// never recomputes modes. Parts are never changed once made.
type stages struct {
	shell  *shellPart
	kit    *kitPart
	field  *fieldPart
	poles  *polesPart
	rings  *ringingPart
	robust *robustPart
}

// shellPart is what shape, air, linings and limits decide.
type shellPart struct {
	from struct {
		air      project.Air
		room     project.Room
		finishes []project.Finish
		limits   project.Limits
		modesTo  float64
	}
	room      acoustics.Room
	modes     []acoustics.DampedMode
	bands     []BandRow
	schroeder float64
	criteria  []acoustics.Criterion
	reverb    []ReverberationRow
	limit     acoustics.LimitCurve
}

func shellStage(p project.Project, o Options, past *shellPart) (*shellPart, error) {
	s := new(shellPart)
	s.from.air, s.from.room, s.from.finishes, s.from.limits, s.from.modesTo = p.Air, p.Room, p.Finishes, p.Limits, o.ModesToHz
	if past != nil && reflect.DeepEqual(past.from, s.from) {
		return past, nil
	}
	air, err := airOf(p)
	if err != nil {
		return nil, err
	}
	walls, err := linings(p)
	if err != nil {
		return nil, err
	}
	s.room = acoustics.Room{
		Box:   acoustics.Box{Length: p.Room.Length, Width: p.Room.Width, Height: p.Room.Height},
		Air:   air,
		Walls: walls,
	}
	s.modes = s.room.Modes(o.ModesToHz)
	s.schroeder = s.room.SchroederHz()
	s.criteria = s.room.Criteria()
	s.reverb = reverberation(s.room)
	s.limit = limitCurve(p.Limits)
	s.bands = countBands(s.room)
	return s, nil
}

func airOf(p project.Project) (acoustics.Air, error) {
	air, err := acoustics.NewAir(acoustics.Atmosphere{
		TemperatureC:        p.Air.TemperatureC,
		RelativeHumidityPct: p.Air.RelativeHumidityPct,
		PressureKPa:         p.Air.PressureKPa,
	})
	if err != nil {
		return air, fmt.Errorf("air: %w", err)
	}
	return air, nil
}

// How many modes up to the highest frequency asked for are worked with: for the
// levels some hundred megabytes with those above that the sums take in, for the
// poles some minutes. A room with more is no room to be treated mode by mode.
const (
	mostModes       = 10_000
	mostModesLevels = 100_000
)

// tooLarge refuses a room with more modes than most.
func tooLarge(p project.Project, hz, most float64) error {
	air, err := airOf(p)
	if err != nil {
		return err
	}
	box := acoustics.Box{Length: p.Room.Length, Width: p.Room.Width, Height: p.Room.Height}
	_, count := box.CountBelow(air.SpeedOfSound, hz)
	if count <= most {
		return nil
	}
	return fmt.Errorf("room: has about %.0f modes up to %.0f Hz, more than the %.0f that are worked with: ask for a lower frequency; a room as large as this is not treated mode by mode",
		count, hz, most)
}

// kitPart is what the absorbers' own figures depend on.
type kitPart struct {
	absorbers []project.Absorber
	air       acoustics.Air
	fieldDeg  float64
	coarse    bool
	rows      []AbsorberRow
	units     []acoustics.Unit
}

func kitStage(p project.Project, air acoustics.Air, fieldDeg float64, coarse bool, past *kitPart) *kitPart {
	if past != nil && past.air == air && past.fieldDeg == fieldDeg && past.coarse == coarse && reflect.DeepEqual(past.absorbers, p.Absorbers) {
		return past
	}
	k := newKit(p, air, fieldDeg, past, true)
	k.coarse = coarse
	if coarse {
		k.coarsen(p)
	}
	return k
}

// Previews take tiles twice as wide where there are more than many, and four times
// where there are more than very many.
const manyTiles, veryManyTiles = 24, 150

// coarsen places the units anew, with coarser tiles where there are many.
func (k *kitPart) coarsen(p project.Project) {
	coarser := 1.0
	switch n := len(k.units); {
	case n > veryManyTiles:
		coarser = 4
	case n > manyTiles:
		coarser = 2
	default:
		return
	}
	k.units = nil
	for i, a := range p.Absorbers {
		at := resonators.Placement{Surface: a.Surface, Centre: a.Centre, Size: a.Size, Units: a.Units}
		k.units = append(k.units, resonators.PlaceCoarse(k.rows[i].Design, k.air, at, i, coarser)...)
	}
}

// newKit makes the absorbers' rows and units; without reports where only the
// units are wanted.
func newKit(p project.Project, air acoustics.Air, fieldDeg float64, past *kitPart, reports bool) *kitPart {
	k := &kitPart{absorbers: p.Absorbers, air: air, fieldDeg: fieldDeg}
	for i, a := range p.Absorbers {
		design := Design(a)
		row := AbsorberRow{ID: a.ID, Kind: a.Kind, Design: design, Units: a.Units,
			AreaM2: float64(a.Units) * a.Size[0] * a.Size[1], Target: -1}
		if old := past.rowOf(a, air, fieldDeg); old != nil {
			row.Report, row.Sensitivities, row.Section = old.Report, old.Sensitivities, old.Section
		} else if reports {
			row.Report = resonators.AnalyseWithin(design, air, a.Size, fieldDeg*math.Pi/180)
			if s, ok := resonators.CrossSectionOf(design, air, a.Size, resonators.InWall); ok {
				row.Section = &s
			}
			row.Sensitivities = resonators.Sensitivities(design, air, a.Size)
		}
		k.rows = append(k.rows, row)
		at := resonators.Placement{Surface: a.Surface, Centre: a.Centre, Size: a.Size, Units: a.Units}
		k.units = append(k.units, resonators.PlaceUnits(design, air, at, i)...)
	}
	return k
}

// rowOf finds the row of an absorber of the same design and size in the same
// air, wherever it stood.
func (k *kitPart) rowOf(a project.Absorber, air acoustics.Air, fieldDeg float64) *AbsorberRow {
	if k == nil || k.air != air || k.fieldDeg != fieldDeg {
		return nil
	}
	for i, b := range k.absorbers {
		b.ID, b.Surface, b.Centre, b.Units = a.ID, a.Surface, a.Centre, a.Units
		if reflect.DeepEqual(a, b) {
			return &k.rows[i]
		}
	}
	return nil
}

// fieldPart is what positions decide: static sums, levels, the modes' own
// levels at the seats.
type fieldPart struct {
	shell   *shellPart
	kit     *kitPart
	sources []acoustics.Source
	seats   []acoustics.Point
	options Options

	field      *acoustics.Field
	hz         []float64
	levels     acoustics.Levels
	modeLevels [][]float64
}

func fieldStage(ctx context.Context, p project.Project, o Options, shell *shellPart, kit *kitPart, past *fieldPart) (*fieldPart, error) {
	f := &fieldPart{shell: shell, kit: kit, sources: sources(p), seats: seats(p), options: o.levels()}
	if past != nil && past.shell == shell && past.kit == kit && past.options == f.options &&
		reflect.DeepEqual(past.sources, f.sources) && reflect.DeepEqual(past.seats, f.seats) {
		return past, nil
	}
	var err error
	if past != nil && past.shell == shell && past.options == f.options {
		f.field, err = past.field.Rearranged(ctx, f.sources, f.seats, kit.units)
	} else {
		f.field, err = acoustics.NewField(ctx, shell.room, f.sources, f.seats, kit.units, max(o.ToHz, o.ModesToHz))
	}
	if err != nil {
		return nil, err
	}
	f.hz = Frequencies(o.FromHz, o.ToHz, o.Points)
	f.levels, err = f.field.Levels(ctx, f.hz)
	if err != nil {
		return nil, err
	}
	f.modeLevels = make([][]float64, len(shell.modes))
	for i, m := range shell.modes {
		at := make([]float64, len(f.seats))
		for s := range at {
			at[s] = f.field.ModeLevel(m, s)
		}
		f.modeLevels[i] = at
	}
	return f, nil
}

// polesPart is the treated room's poles.
type polesPart struct {
	field *fieldPart
	poles acoustics.Poles
}

func polesStage(ctx context.Context, o Options, field *fieldPart, past *polesPart) (*polesPart, error) {
	if past != nil && past.field == field {
		return past, nil
	}
	if len(field.kit.units) == 0 {
		return &polesPart{field: field}, nil
	}
	poles, err := field.field.Poles(ctx, o.ModesToHz, nil)
	if err != nil {
		return nil, err
	}
	return &polesPart{field: field, poles: poles}, nil
}

// sources turns the project's loudspeakers into monopoles.
func sources(p project.Project) []acoustics.Source {
	s := make([]acoustics.Source, len(p.Loudspeakers))
	for i, l := range p.Loudspeakers {
		gain := math.Pow(10, l.GainDB/20)
		if l.Inverted {
			gain = -gain
		}
		s[i] = acoustics.Source{At: l.At, Gain: gain, Delay: l.DelayMS / 1000}
	}
	return s
}

// seats returns the places of the project's seats.
func seats(p project.Project) []acoustics.Point {
	s := make([]acoustics.Point, len(p.Seats))
	for i, seat := range p.Seats {
		s[i] = seat.At
	}
	return s
}

// robustPart is what tolerances make of the room whose poles it was made with.
type robustPart struct {
	poles      *polesPart
	samples    int
	robustness *Robustness
}
