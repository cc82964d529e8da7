package study

import (
	"context"
	"math"

	"stillroom/acoustics"
	"stillroom/app/project"
)

// withDefaults fills the zero fields of o with their documented defaults.
func (o Options) withDefaults() Options {
	if o.FromHz == 0 {
		o.FromHz = 16
	}
	if o.ToHz == 0 {
		o.ToHz = 250
	}
	if o.Points == 0 {
		o.Points = 200
	}
	if o.ModesToHz == 0 {
		o.ModesToHz = 200
	}
	if o.FieldDeg == 0 {
		o.FieldDeg = 90
	}
	if o.MapCells == 0 {
		o.MapCells = 28
	}
	return o
}

// levels returns the options that the levels depend on.
func (o Options) levels() Options {
	return Options{FromHz: o.FromHz, ToHz: o.ToHz, Points: o.Points, ModesToHz: o.ModesToHz}
}

// Run computes a project. Stages whose inputs are those of former, which may
// be nil, are taken over from it. After each stage progress, where not nil, is
// given what is there so far; it must not block. The error is that of ctx, or
// says what of the project cannot be computed.
//
// Run is a pure function: the result does not depend on former.
func Run(ctx context.Context, p project.Project, o Options, former *Result, progress func(*Result)) (*Result, error) {
	o = o.withDefaults()
	var past stages
	if former != nil {
		past = former.stages
	}
	if progress == nil {
		progress = func(*Result) {}
	}

	if err := tooLarge(p, max(o.ToHz, o.ModesToHz), mostModes); err != nil {
		return nil, err
	}
	shell, err := shellStage(p, o, past.shell)
	if err != nil {
		return nil, err
	}
	kit := kitStage(p, shell.room.Air, o.FieldDeg, o.Coarse, past.kit)
	if err := ctx.Err(); err != nil {
		return nil, err
	}
	field, err := fieldStage(ctx, p, o, shell, kit, past.field)
	if err != nil {
		return nil, err
	}

	r := newResult(p, o, shell, kit, field)
	r.rate(shell.limit)
	r.judge(shell.criteria)
	r.settle(field.field, kit.units)
	r.assign(kit.units)
	if err := r.mapStage(ctx, o, field); err != nil {
		return nil, err
	}
	r.Stage = StageLevel
	r.find()
	r.stages = stages{shell: shell, kit: kit, field: field, poles: past.poles, rings: past.rings, robust: past.robust}
	progress(r.copied())

	poles, err := polesStage(ctx, o, field, past.poles)
	if err != nil {
		return nil, err
	}
	r = r.copied()
	r.stages.poles = poles
	r.takePoles(poles.poles)
	if o.Ringing {
		r.stages.rings = ringingStage(o, field, poles, past.rings)
		r.Ringing = r.stages.rings.ringing
	}
	r.Stage = StageTreated
	r.judge(shell.criteria)
	r.find()
	return r.tolerated(ctx, past.robust, progress)
}

// tolerated adds what tolerances make of a complete result, where it is asked for.
func (r *Result) tolerated(ctx context.Context, past *robustPart, progress func(*Result)) (*Result, error) {
	if r.Options.Samples == 0 || len(r.Project.Absorbers) == 0 {
		r.stages.robust = past
		return r, nil
	}
	if past == nil || past.poles != r.stages.poles || past.samples != r.Options.Samples {
		progress(r.copied())
		g, err := r.robust(ctx, r.Options.Samples, func(soFar *Robustness) {
			part := r.copied()
			part.Robustness = soFar
			progress(part)
		})
		if err != nil {
			return nil, err
		}
		past = &robustPart{r.stages.poles, r.Options.Samples, g}
	}
	r = r.copied()
	r.stages.robust, r.Robustness = past, past.robustness
	return r, nil
}

// Frequencies returns n ≥ 2 log-spaced frequencies from lo to hi, both included exactly.
func Frequencies(lo, hi float64, n int) []float64 {
	hz := make([]float64, n)
	for i := range hz {
		hz[i] = lo * math.Pow(hi/lo, float64(i)/float64(n-1))
	}
	hz[0], hz[n-1] = lo, hi
	return hz
}

// newResult gathers the stages up to the treated level.
func newResult(p project.Project, o Options, shell *shellPart, kit *kitPart, field *fieldPart) *Result {
	r := &Result{
		Project:     p,
		Options:     o,
		Air:         shell.room.Air,
		Room:        shell.room,
		VolumeM3:    shell.room.Box.Volume(),
		AreaM2:      shell.room.Box.SurfaceArea(),
		SchroederHz: shell.schroeder,

		Reverberation: shell.reverb,
		Bands:         shell.bands,
		Levels:        levelsOf(field),
		Absorbers:     append([]AbsorberRow(nil), kit.rows...),
	}
	r.Modes = make([]ModeRow, len(shell.modes))
	for i, m := range shell.modes {
		osc := m.Oscillator()
		r.Modes[i] = ModeRow{
			Mode:       m,
			Oscillator: osc,
			Wavelength: r.Air.SpeedOfSound / m.Hz,
			LevelDB:    field.modeLevels[i],
			LimitS:     shell.limit.Seconds(m.Hz),
			Strongest:  strongest(m.Order),
		}
	}
	return r
}

// copied returns a shallow copy whose mode and absorber rows may be written to.
func (r *Result) copied() *Result {
	c := *r
	c.Modes = append([]ModeRow(nil), r.Modes...)
	c.Absorbers = append([]AbsorberRow(nil), r.Absorbers...)
	return &c
}

// takePoles sets what became of each mode and the absorbers' own poles.
func (r *Result) takePoles(poles acoustics.Poles) {
	limit := limitCurve(r.Project.Limits)
	row := func(p acoustics.Pole, absorber int) PoleRow {
		return PoleRow{Oscillator: p.Oscillator, LevelDB: p.LevelDB, Absorber: absorber, LimitS: limit.Seconds(p.Natural)}
	}
	r.PolesCounted, r.PolesFound = poles.Counted, poles.Found
	if len(r.Absorbers) == 0 {
		return
	}
	for i := range r.Modes {
		if i < len(poles.Modes) && poles.Modes[i] != nil {
			r.Modes[i].Treated = []PoleRow{row(*poles.Modes[i], -1)}
		}
	}
	r.AbsorberPoles = make([]PoleRow, len(poles.Absorbers))
	for i, p := range poles.Absorbers {
		r.AbsorberPoles[i] = row(p.Pole, p.Owner)
	}
	r.pair()
}
