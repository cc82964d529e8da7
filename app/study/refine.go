package study

import (
	"context"
	"math"
	"slices"

	"gonum.org/v1/gonum/optimize"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/resonators"
	"stillroom/resonators/tuning"
)

// knob is a dimension of an absorber that is cut or chosen to fit: its step is what a
// joiner works to.
type knob struct {
	at           func(*project.Absorber) *float64
	step, lo, hi float64
	reach        float64 // first step of the search, relative
}

// knobs lists what of an absorber the room tunes, within the depth at hand.
func knobs(a project.Absorber, depthMM float64) []knob {
	switch {
	case a.Neck != nil:
		return []knob{
			{func(a *project.Absorber) *float64 { return &a.Neck.LengthMM }, 1, 5, 2000, 0.04},
			{func(a *project.Absorber) *float64 { return &a.Neck.GauzePaSM }, 1, 0, 5000, 0.4}}
	case a.Panel != nil:
		most := depthMM - a.Panel.ThicknessMM
		least := 10.0
		if a.Panel.Fill != nil {
			least = a.Panel.Fill.ThicknessMM + 5
		}
		return []knob{{func(a *project.Absorber) *float64 { return &a.Panel.CavityMM }, 1, least, most, 0.06}}
	case a.Perforated != nil:
		return []knob{
			{func(a *project.Absorber) *float64 { return &a.Perforated.PitchMM }, 1, 1.5 * a.Perforated.HoleMM, 200, 0.03},
			{func(a *project.Absorber) *float64 { return &a.Perforated.GauzePaSM }, 1, 0, 5000, 0.4}}
	case a.Slotted != nil:
		least := 10.0
		if a.Slotted.Fill != nil {
			least = a.Slotted.Fill.ThicknessMM
		}
		return []knob{{func(a *project.Absorber) *float64 { return &a.Slotted.CavityMM }, 1, least, depthMM - a.Slotted.PanelMM, 0.06}}
	case a.Microperforated != nil:
		return []knob{{func(a *project.Absorber) *float64 { return &a.Microperforated.PitchMM }, 0.1, 2 * a.Microperforated.HoleMM, 30, 0.03}}
	}
	return nil
}

// How many trials a refinement has: with one knob, with two, and for a surface of
// tiles, where each trial is dear.
const (
	trialsOne, trialsTwo, trialsTiled = 14, 30, 8
)

// refined turns the knobs of an absorber so that it serves the goal best in the
// treated room, by Nelder and Mead's method from where the closed forms put it, and
// rounds them to what can be built. What the closed forms gave stays where nothing
// better is found.
func (r *Result) refined(ctx context.Context, q TuneRequest, a project.Absorber, c tuning.Candidate) (project.Absorber, error) {
	list := knobs(a, 1000*max(q.DepthM, c.Depth))
	if len(list) == 0 {
		return a, nil
	}
	b := r.newBench(q)
	outside := c.Build.Tube.Outside
	start := a.Clone()
	value := func(x project.Absorber) float64 { return b.worth(ctx, x) }
	problem := optimize.Problem{Func: func(x []float64) float64 { return value(turned(start, list, x, outside)) },
		Status: func() (optimize.Status, error) {
			if err := ctx.Err(); err != nil {
				return optimize.Failure, err
			}
			return optimize.NotTerminated, nil
		}}
	trials := trialsOne
	switch {
	case a.Neck == nil && a.Panel == nil:
		trials = trialsTiled
	case len(list) > 1:
		trials = trialsTwo
	}
	x0 := make([]float64, len(list))
	found, err := optimize.Minimize(problem, x0, &optimize.Settings{FuncEvaluations: trials, Concurrent: 1}, &optimize.NelderMead{SimplexSize: 1})
	if ctx.Err() != nil {
		return a, ctx.Err()
	}
	best, worth := start, value(start)
	if found != nil && (err == nil || found.X != nil) {
		at := turned(start, list, found.X, outside)
		// The steps next to it, one knob at a time.
		for _, by := range []float64{0, 1, -1} {
			k := list[0]
			x := at.Clone()
			*k.at(&x) = math.Max(k.lo, math.Min(k.hi, *k.at(&x)+by*k.step))
			x = displaced(start, x, outside)
			if w := value(x); w < worth {
				best, worth = x, w
			}
		}
	}
	return best, ctx.Err()
}

// turned returns an absorber with its knobs turned by x, each relative to its reach,
// rounded to steps and held to its range.
func turned(a project.Absorber, list []knob, x []float64, outside float64) project.Absorber {
	t := a.Clone()
	for i, k := range list {
		v := k.at(&t)
		from := *v
		if from == 0 {
			from = 20 * k.step
		}
		*v = math.Max(k.lo, math.Min(k.hi, math.Round(from*math.Exp(k.reach*x[i])/k.step)*k.step))
		*v = round(*v, 1000)
	}
	return displaced(a, t, outside)
}

// displaced gives a neck box the air that its neck, of an outside diameter in m,
// leaves it when it is longer or shorter than before.
func displaced(before, after project.Absorber, outside float64) project.Absorber {
	if after.Neck == nil {
		return after
	}
	change := (after.Neck.LengthMM - before.Neck.LengthMM) * mm * math.Pi / 4 * outside * outside * float64(after.Neck.Mouths)
	after.Neck.CavityL = round(math.Max(0.05, before.Neck.CavityL-change/l), 100)
	return after
}

// fieldAbove is how far above a mode the field reaches that its absorbers are tried in.
const fieldAbove = 1.6

// bench tries absorbers in the room of a result, each as far as one mode needs it.
type bench struct {
	r    *Result
	q    TuneRequest
	last *acoustics.Field
	hz   []float64
}

func (r *Result) newBench(q TuneRequest) *bench {
	m := r.Modes[q.Mode].Mode.Hz
	return &bench{r: r, q: q, hz: Frequencies(m/1.12, m*1.12, 25)}
}

// place puts one more absorber into the room.
func (b *bench) place(ctx context.Context, a project.Absorber) (*acoustics.Field, error) {
	var (
		r     = b.r
		owner = len(r.Project.Absorbers)
		at    = resonators.Placement{Surface: a.Surface, Centre: a.Centre, Size: a.Size, Units: a.Units}
		units = append(slices.Clone(r.stages.kit.units), resonators.PlaceUnits(Design(a), r.Air, at, owner)...)
		f     = r.stages.field
		err   error
	)
	if b.last == nil {
		b.last, err = acoustics.NewField(ctx, f.shell.room, f.sources, f.seats, units, fieldAbove*r.Modes[b.q.Mode].Mode.Hz)
	} else {
		b.last, err = b.last.Rearranged(ctx, f.sources, f.seats, units)
	}
	return b.last, err
}

// worth returns what the goal wants least of: the longest T60 of mode and absorber, s,
// or the highest level at the seats, dB.
func (b *bench) worth(ctx context.Context, a project.Absorber) float64 {
	f, err := b.place(ctx, a)
	if err != nil {
		return math.Inf(1)
	}
	if b.q.Goal == tuning.LowPeak {
		top, err := b.peak(ctx, f)
		if err != nil {
			return math.Inf(1)
		}
		return top
	}
	m := b.r.Modes[b.q.Mode].Mode
	seen, err := b.r.look(ctx, f, m.Order, m.Hz, false)
	if err != nil {
		return math.Inf(1)
	}
	if len(seen.own) == 0 {
		return math.Inf(1) // lost on the way: nothing is known of it
	}
	return seen.after()[0].Oscillator.T60()
}

// peak returns the highest treated level near the mode at any seat, dB.
func (b *bench) peak(ctx context.Context, f *acoustics.Field) (float64, error) {
	levels, err := f.Levels(ctx, b.hz)
	if err != nil {
		return 0, err
	}
	top := math.Inf(-1)
	for _, seat := range levels.Treated {
		top = math.Max(top, slices.Max(seat))
	}
	return top, nil
}
