package study

import (
	"cmp"
	"context"
	"fmt"
	"math"
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
	// PeakBefore and PeakAfter are the highest treated levels within a sixth of an
	// octave of the mode at any seat, without and with the proposal, dB.
	PeakBefore, PeakAfter float64
	Neighbours            []Neighbour // modes within a third of an octave
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
				p, err := r.try(ctx, q, candidates[i])
				mutex.Lock()
				if err != nil {
					first = cmp.Or(first, err)
				} else {
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
		if err := r.weather(ctx, q, &out[i]); err != nil {
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

// try refines a candidate in the room, builds it into the project and asks the
// treated room as a whole.
func (r *Result) try(ctx context.Context, q TuneRequest, c tuning.Candidate) (Proposal, error) {
	m := r.Modes[q.Mode]
	a := buildable(c)
	a.ID = r.Project.FreshAbsorberID()
	a, err := r.refined(ctx, q, a, c)
	if err != nil {
		return Proposal{}, err
	}
	p := Proposal{Absorber: a, Candidate: c, MinVolumeM3: c.LeastVolume, MinAreaM2: c.LeastArea, Before: m.Oscillator,
		Spot: spot(r.Room.Box, c.At), VolumeM3: Volume(a), SheetM2: SheetArea(a)}
	treated, err := r.with(ctx, q, a, 0)
	if err != nil {
		return p, err
	}
	row := treated.Absorbers[len(treated.Absorbers)-1]
	if o := row.Report.Oscillator; o != nil {
		p.F0Hz, p.Q = row.InRoomHz, o.Q()
	}
	p.After = treated.after(q.Mode)
	p.Meets = len(p.After) > 0 && p.Longest() <= r.target(q) || len(p.After) == 0
	p.PeakBefore, p.PeakAfter = r.peakNear(m.Mode.Hz), treated.peakNear(m.Mode.Hz)
	for i, n := range r.Modes {
		if i == q.Mode || i >= len(treated.Modes) || math.Abs(math.Log(n.Mode.Hz/m.Mode.Hz)) > math.Log(around) {
			continue
		}
		p.Neighbours = append(p.Neighbours, Neighbour{Mode: i, Before: n.Now(), After: treated.Modes[i].Now()})
	}
	p.Tolerances = tolerances(row, p.After)
	return p, nil
}

// Now returns the longest T60 of a mode as it stands, s.
func (m ModeRow) Now() float64 {
	if t := m.LongestTreated(); t > 0 {
		return t
	}
	return m.Oscillator.T60()
}

// with studies the project with one more absorber, the air warmer by some °C, as far
// as the request's mode needs it.
func (r *Result) with(ctx context.Context, q TuneRequest, a project.Absorber, warmer float64) (*Result, error) {
	p := r.Project
	p.Absorbers = append(slices.Clone(p.Absorbers), a)
	p.Air.TemperatureC = math.Max(-20, math.Min(50, p.Air.TemperatureC+warmer))
	hz := r.Modes[q.Mode].Mode.Hz
	o := Options{FromHz: hz / around, ToHz: hz * around, Points: 60, ModesToHz: around * hz * 1.02, FieldDeg: r.Options.FieldDeg}
	return Run(ctx, p, o, nil, nil)
}

// unheard is how far below the loudest pole of the mode and its absorber a pole may
// lie at every seat and be left out of account, dB.
const unheard = 20

// after returns the poles that a mode and the last absorber of a project have, the
// longest first: the mode's own, and those of the absorber that lie near it and that
// some seat hears.
func (r *Result) after(mode int) []PoleRow {
	hz := r.Modes[mode].Mode.Hz
	var near []PoleRow
	for _, p := range r.AbsorberPoles {
		if p.Absorber == len(r.Project.Absorbers)-1 && math.Abs(math.Log(p.Oscillator.Natural/hz)) < math.Log(around) {
			near = append(near, p)
		}
	}
	return heard(r.Modes[mode].Treated, near)
}

// heard joins a mode's own poles and those of its absorber, the longest first, without
// those of the absorber that no seat hears.
func heard(own, near []PoleRow) []PoleRow {
	loudness := func(p PoleRow) float64 {
		top := math.Inf(-1)
		for _, l := range p.LevelDB {
			if l > top { // NaN is not
				top = l
			}
		}
		return top
	}
	loudest := math.Inf(-1)
	for _, p := range slices.Concat(own, near) {
		loudest = math.Max(loudest, loudness(p))
	}
	list := slices.Clone(own)
	for _, p := range near {
		if math.IsInf(loudest, -1) || loudness(p) >= loudest-unheard {
			list = append(list, p)
		}
	}
	slices.SortStableFunc(list, func(a, b PoleRow) int { return cmp.Compare(a.Oscillator.Decay, b.Oscillator.Decay) })
	return list
}

// peakNear returns the highest treated level within a sixth of an octave of a
// frequency at any seat, dB.
func (r *Result) peakNear(hz float64) float64 {
	top := math.Inf(-1)
	for _, seat := range r.Levels.Treated {
		for i, f := range r.Levels.Hz {
			if math.Abs(math.Log2(f/hz)) < 1.0/6 {
				top = math.Max(top, seat[i])
			}
		}
	}
	return top
}

// weathered is how many of the best proposals are tried in colder and warmer air, by
// weatherC each way.
const (
	weathered = 5
	weatherC  = 5.0
)

// weather works out what colder and warmer air do to a proposal.
func (r *Result) weather(ctx context.Context, q TuneRequest, p *Proposal) error {
	for _, x := range []struct {
		by float64
		to *float64
	}{{-weatherC, &p.ColderS}, {weatherC, &p.WarmerS}} {
		t, err := r.with(ctx, q, p.Absorber, x.by)
		if err != nil {
			return err
		}
		if after := t.after(q.Mode); len(after) > 0 {
			*x.to = after[0].Oscillator.T60()
		}
	}
	return nil
}

// tolerances returns each dimension's pull and how far it may be off while f0 moves
// by no more than half of the half-power width of the treated pair's slowest pole.
func tolerances(row AbsorberRow, after []PoleRow) []tuning.Tolerance {
	if len(after) == 0 {
		return nil
	}
	var list []tuning.Tolerance
	for _, s := range row.Sensitivities {
		list = append(list, tuning.Tolerance{Sensitivity: s, Allowed: s.Tolerance(after[0].Oscillator.HalfPowerWidth() / 2)})
	}
	return list
}
