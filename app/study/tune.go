package study

import (
	"cmp"
	"context"
	"fmt"
	"runtime"
	"slices"
	"sync"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/resonators"
	"stillroom/resonators/tuning"
)

// TuneRequest asks for absorbers tuned to one mode.
type TuneRequest struct {
	Mode      int                 // index in Result.Modes
	Kinds     []string            // of tuning.Kinds; none: all
	Surfaces  []acoustics.Surface // that may be built on; none: all six
	DepthM    float64             // how far it may stand out; 0: 0.3 m
	TargetS   float64             // T60 asked for, s; 0: the mode's limit
	Goal      tuning.Goal
	MostUnits int    // budget of units; 0: 6
	System    string // whose stock: "metric" or "us"; "": metric
}

// Proposal is an absorber that can be built, in its place, and what it is
// calculated to do.
type Proposal struct {
	Absorber    project.Absorber // with an id fresh in the project
	Candidate   tuning.Candidate // the start that the closed forms gave
	F0Hz, Q     float64          // at its spot in the room; 0 where broadband
	MinVolumeM3 float64          // at least this much box volume for the target; 0 for others
	MinAreaM2   float64          // at least this much panel for the target; 0 for boxes
	Before      acoustics.Oscillator
	// After are the poles that mode and absorber have in the treated room as a
	// whole, longest decay first, those that no seat hears left out.
	After []PoleRow
	// PeakBefore and PeakAfter are the highest treated levels within about a sixth of an
	// octave of the mode at any seat, without and with the proposal, dB, at the same
	// frequencies.
	PeakBefore, PeakAfter float64
	Neighbours            []Neighbour // modes within a third of an octave; of the best few
	VolumeM3, SheetM2     float64     // of all units
	Tolerances            []tuning.Tolerance
	// ColderS and WarmerS are the longest T60 of After with the air 5 °C colder and
	// warmer, s; 0 where not worked out.
	ColderS, WarmerS float64
	Meets            bool   // all of After within the target
	Spot             string // where it goes, in words
}

// Neighbour is what a proposal does to another mode.
type Neighbour struct {
	Mode          int     // index in Result.Modes
	Before, After float64 // longest T60, s; After 0 where it is no longer listed
}

// defaultDepth is how far an absorber may stand out where nothing is said, m.
const defaultDepth = 0.3

// TuneProgress is told how far a search is, and the ranking so far.
type TuneProgress func(done, total int, soFar []Proposal)

// Tune proposes absorbers for one mode of a result, best first. The closed forms
// give starts; each is refined in the treated room over what can be built, and what
// the room as a whole does decides: first those that meet the target, then by the
// goal. It is deterministic. progress may be nil; it is called from several
// goroutines, one at a time.
func Tune(ctx context.Context, r *Result, q TuneRequest, progress TuneProgress) ([]Proposal, error) {
	if q.Mode < 0 || q.Mode >= len(r.Modes) {
		return nil, fmt.Errorf("tune: there is no mode number %d", q.Mode)
	}
	candidates, err := tuning.Propose(ctx, r.problem(q))
	if err != nil {
		return nil, err
	}
	var (
		found = make([]*Proposal, len(candidates))
		mutex sync.Mutex
		group sync.WaitGroup
		done  int
		first error
		next  = make(chan int)
	)
	for range runtime.GOMAXPROCS(0) {
		group.Go(func() {
			for i := range next {
				p, known, err := r.try(ctx, q, candidates[i])
				mutex.Lock()
				switch {
				case err != nil:
					first = cmp.Or(first, err)
				case known:
					found[i] = &p
				}
				done++
				if progress != nil && ctx.Err() == nil {
					progress(done, len(candidates), ranked(found, q.Goal))
				}
				mutex.Unlock()
			}
		})
	}
	for i := range candidates {
		next <- i
	}
	close(next)
	group.Wait()
	if first != nil {
		return nil, first
	}
	out := ranked(found, q.Goal)
	for i := range min(len(out), weathered) {
		if err := cmp.Or(r.weather(ctx, q, &out[i]), r.neighbours(ctx, q, &out[i])); err != nil {
			return nil, err
		}
	}
	return out, ctx.Err()
}

// ranked returns the proposals there are, best first, each absorber once.
func ranked(found []*Proposal, goal tuning.Goal) []Proposal {
	var out []Proposal
	for _, p := range found {
		if p != nil && !slices.ContainsFunc(out, p.same) {
			out = append(out, *p)
		}
	}
	slices.SortStableFunc(out, func(a, b Proposal) int { return better(a, b, goal) })
	return out
}

// same reports whether another proposal is the same absorber in the same place.
func (p *Proposal) same(o Proposal) bool {
	return p.Absorber.Kind == o.Absorber.Kind && p.Absorber.Surface == o.Absorber.Surface && p.Absorber.Centre == o.Absorber.Centre &&
		p.Absorber.Size == o.Absorber.Size && p.Absorber.Units == o.Absorber.Units && p.F0Hz == o.F0Hz && p.VolumeM3 == o.VolumeM3
}

// better puts what meets the target first, then what serves the goal best.
func better(a, b Proposal, goal tuning.Goal) int {
	switch {
	case a.Meets && !b.Meets:
		return -1
	case b.Meets && !a.Meets:
		return 1
	case goal == tuning.LowPeak:
		return cmp.Compare(a.PeakAfter, b.PeakAfter)
	case goal == tuning.LeastVolume && a.Meets:
		return cmp.Compare(a.VolumeM3, b.VolumeM3)
	}
	return cmp.Compare(a.Longest(), b.Longest())
}

// Longest returns the longest T60 of the poles after treatment, s.
func (p Proposal) Longest() float64 {
	if len(p.After) == 0 {
		return 0
	}
	return p.After[0].Oscillator.T60()
}

// target returns the decay asked for, s.
func (r *Result) target(q TuneRequest) float64 {
	if q.TargetS > 0 {
		return q.TargetS
	}
	return r.Modes[q.Mode].LimitS
}

// leastMargin is by how much the closed forms, which know only the pair, must fall
// under the target where the least volume is wanted, so that the whole room does.
const leastMargin = 0.88

// problem puts the request in the tuner's terms.
func (r *Result) problem(q TuneRequest) tuning.Problem {
	stock := TunerStock(r.Project, cmp.Or(q.System, "metric"))
	loads := acoustics.NewAirLoads(r.Room.Box)
	p := tuning.Problem{
		Mode: r.Modes[q.Mode].Mode, Box: r.Room.Box, Air: r.Air,
		Kinds: q.Kinds, Surfaces: q.Surfaces, Depth: cmp.Or(q.DepthM, defaultDepth), TargetT60: r.target(q),
		Goal: q.Goal, MostUnits: q.MostUnits, Stock: &stock,
		Reactance: func(a resonators.Absorber, at resonators.Placement, hz float64) float64 {
			u := resonators.AsWhole(a, r.Air, at)
			return u.Reactance(hz, loads.Of(u.Patch), r.Air.Density)
		},
	}
	if q.Goal == tuning.LeastVolume {
		p.TargetT60 *= leastMargin
	}
	for _, a := range r.Project.Absorbers {
		lo, hi := a.Extent()
		p.Occupied = append(p.Occupied, tuning.Occupied{
			Surface: a.Surface,
			Centre:  [2]float64{(lo[0] + hi[0]) / 2, (lo[1] + hi[1]) / 2},
			Size:    [2]float64{hi[0] - lo[0], hi[1] - lo[1]},
			Depth:   Depth(a),
		})
	}
	for _, k := range r.Project.KeepOut {
		p.Occupied = append(p.Occupied, tuning.Occupied{Surface: k.Surface, Centre: k.Centre, Size: k.Size})
	}
	return p
}

// around are the frequencies about a mode between which its neighbours and the poles
// that come of it are looked at, as a ratio: a third of an octave, and a little.
const around = 1.28

// try refines a candidate in the room, builds it into the project and looks at what
// becomes of the mode; false where the mode's pole is lost on the way, so that nothing
// can be said of it.
func (r *Result) try(ctx context.Context, q TuneRequest, c tuning.Candidate) (Proposal, bool, error) {
	m := r.Modes[q.Mode]
	a := buildable(c)
	a.ID = r.Project.FreshAbsorberID()
	a, err := r.refined(ctx, q, a, c)
	if err != nil {
		return Proposal{}, false, err
	}
	p := Proposal{Absorber: a, Candidate: c, MinVolumeM3: c.LeastVolume, MinAreaM2: c.LeastArea, Before: m.Oscillator,
		Spot: spot(r.Room.Box, c.At), VolumeM3: Volume(a), SheetM2: SheetArea(a)}
	b := r.newBench(q)
	field, err := b.place(ctx, a)
	if err != nil {
		return p, false, err
	}
	design := Design(a)
	if e, ok := resonators.EquivalentOf(design, r.Air, a.Size); ok {
		p.F0Hz, p.Q = e.Oscillator.Natural, e.Oscillator.Q()
		if hz, ok := field.UnitResonance(len(r.stages.kit.units)); ok {
			p.F0Hz = hz
		}
	}
	seen, err := r.look(ctx, field, m.Mode.Order, m.Mode.Hz, false)
	if err != nil {
		return p, false, err
	}
	if len(seen.own) == 0 {
		return p, false, nil
	}
	p.After = seen.after()
	p.Meets = p.Longest() <= r.target(q)
	if p.PeakBefore, err = b.peak(ctx, r.stages.field.field); err != nil {
		return p, false, err
	}
	if p.PeakAfter, err = b.peak(ctx, field); err != nil {
		return p, false, err
	}
	p.Tolerances = tolerances(resonators.Sensitivities(design, r.Air, a.Size), p.After)
	return p, true, nil
}
