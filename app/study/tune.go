package study

import (
	"context"
	"fmt"
	"math"
	"slices"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/resonators"
	"stillroom/resonators/tuning"
)

// TuneRequest asks for absorbers tuned to one mode.
type TuneRequest struct {
	Mode     int                 // index in Result.Modes
	Kinds    []string            // "neck", "panel"; none: both
	Surfaces []acoustics.Surface // that may be built on; none: all six
	DepthM   float64             // how far it may stand out; 0: 0.3 m
	TargetS  float64             // T60 asked for, s; 0: the mode's limit
}

// Proposal is an absorber that can be built, in its place, and what it is
// calculated to do.
type Proposal struct {
	Absorber    project.Absorber // with an id fresh in the project
	Candidate   tuning.Candidate
	F0Hz, Q     float64 // at its spot in the room
	MinVolumeM3 float64 // at least this much box volume for the target; 0 for panels
	MinAreaM2   float64 // at least this much panel for the target; 0 for boxes
	Before      acoustics.Oscillator
	// After are the poles that mode and absorber have in the treated room as a
	// whole, longest decay first.
	After []PoleRow
	Meets bool   // all of After within the target
	Spot  string // where it goes, in words
}

// defaultDepth is how far an absorber may stand out where nothing is said, m.
const defaultDepth = 0.3

// Tune proposes absorbers for one mode of a result, best first: those that the
// treated room as a whole brings under the target, by the least depth of what
// they take; then the rest by their longest decay. progress, where not nil, is
// told how many proposals of how many have been tried in the room.
func Tune(ctx context.Context, r *Result, q TuneRequest, progress func(done, total int)) ([]Proposal, error) {
	if q.Mode < 0 || q.Mode >= len(r.Modes) {
		return nil, fmt.Errorf("tune: there is no mode number %d", q.Mode)
	}
	candidates, err := tuning.Propose(ctx, r.problem(q))
	if err != nil {
		return nil, err
	}
	var out []Proposal
	for i, c := range candidates {
		if progress != nil {
			progress(i, len(candidates))
		}
		p, err := r.try(ctx, q, c)
		if err != nil {
			return nil, err
		}
		out = append(out, p)
	}
	slices.SortStableFunc(out, better)
	return out, nil
}

// better puts what meets the target first, then the shorter decay.
func better(a, b Proposal) int {
	switch {
	case a.Meets && !b.Meets:
		return -1
	case b.Meets && !a.Meets:
		return 1
	case a.longest() < b.longest():
		return -1
	case a.longest() > b.longest():
		return 1
	}
	return 0
}

func (p Proposal) longest() float64 {
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

// problem puts the request in the tuner's terms.
func (r *Result) problem(q TuneRequest) tuning.Problem {
	depth := q.DepthM
	if depth == 0 {
		depth = defaultDepth
	}
	loads := acoustics.NewAirLoads(r.Room.Box)
	p := tuning.Problem{
		Mode: r.Modes[q.Mode].Mode, Box: r.Room.Box, Air: r.Air,
		Kinds: q.Kinds, Surfaces: q.Surfaces, Depth: depth, TargetT60: r.target(q),
		Reactance: func(a resonators.Absorber, at resonators.Placement, hz float64) float64 {
			u := resonators.UnitAlone(a, r.Air, at)
			return u.Reactance(hz, loads.Of(u.Patch), r.Air.Density)
		},
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
	return p
}

// try builds the candidate into the project and asks the treated room.
func (r *Result) try(ctx context.Context, q TuneRequest, c tuning.Candidate) (Proposal, error) {
	m := r.Modes[q.Mode]
	p := Proposal{
		Absorber: buildable(c), Candidate: c, F0Hz: c.Oscillator.Natural, Q: c.Oscillator.Q(),
		MinVolumeM3: c.LeastVolume, MinAreaM2: c.LeastArea, Before: m.Oscillator,
		Spot: spot(r.Room.Box, c.At),
	}
	p.Absorber.ID = r.Project.FreshAbsorberID()
	with := r.Project
	with.Absorbers = append(slices.Clone(with.Absorbers), p.Absorber)
	o := r.Options
	o.Points, o.ModesToHz = 2, min(o.ModesToHz, 1.3*m.Mode.Hz)
	treated, err := Run(ctx, with, o, nil, nil)
	if err != nil {
		return p, err
	}
	at := treated.Modes[q.Mode]
	p.After = at.Treated
	for _, pole := range treated.AbsorberPoles {
		if pole.Absorber == len(with.Absorbers)-1 {
			p.After = append(slices.Clone(p.After), pole)
		}
	}
	slices.SortStableFunc(p.After, func(a, b PoleRow) int {
		switch {
		case a.Oscillator.Decay < b.Oscillator.Decay:
			return -1
		case a.Oscillator.Decay > b.Oscillator.Decay:
			return 1
		}
		return 0
	})
	p.Meets = p.longest() <= r.target(q)
	return p, nil
}

// buildable turns a candidate into the file's terms, its dimensions rounded to
// what can be built: litres to a hundredth, millimetres to a tenth.
func buildable(c tuning.Candidate) project.Absorber {
	a := project.Absorber{Surface: c.At.Surface, Centre: c.At.Centre, Size: c.At.Size, Units: c.At.Units}
	for i := range 2 {
		a.Centre[i], a.Size[i] = round(a.Centre[i], 1e4), round(a.Size[i], 1e4)
	}
	switch d := c.Absorber.(type) {
	case resonators.Neck:
		a.Kind = "neck"
		a.Neck = &project.Neck{CavityL: round(d.Cavity/l, 100), MouthDiameterMM: round(2*d.MouthRadius/mm, 10),
			LengthMM: round(d.Length/mm, 10), Mouths: d.Mouths, GauzePaSM: round(d.Gauze, 10)}
		if d.FillShare > 0 {
			a.Neck.Fill = &project.NeckFill{Share: round(d.FillShare, 1000), FlowPaSM2: d.FillFlow}
		}
	case resonators.Panel:
		a.Kind = "panel"
		a.Panel = &project.Panel{MassKgM2: round(d.Mass, 1000), ThicknessMM: round(d.Thickness/mm, 100),
			YoungsGPa: round(d.Youngs/1e9, 1000), Poisson: d.Poisson, LossFactor: d.LossFactor,
			CavityMM: round(d.Cavity/mm, 10), EdgePaSM: round(d.Edge, 10)}
		if d.Fill != nil {
			a.Panel.Fill = &project.Fill{ThicknessMM: round(d.Fill.Thickness/mm, 10),
				FlowPaSM2: d.Fill.FlowResistivity, AtFace: d.Fill.AtFace}
		}
	default:
		panic(fmt.Sprintf("study: the tuner proposed a %s", d.Kind()))
	}
	return a
}

// round rounds v to 1/steps.
func round(v, steps float64) float64 { return math.Round(v*steps) / steps }

// spot says where a placement is: its surface, and whether in a corner, at an
// edge or free on it.
func spot(b acoustics.Box, at resonators.Placement) string {
	const near = 0.05 // m
	i, j := at.Surface.InPlane()
	d := b.Dimensions()
	ends := [2]float64{d[i], d[j]}
	length := [2]float64{at.Size[0] * float64(at.Units), at.Size[1]}
	meets := 0
	for k := range 2 {
		lo := at.Centre[k] - at.Size[k]/2
		if lo < near || ends[k]-(lo+length[k]) < near {
			meets++
		}
	}
	return [3]string{"free on the ", "at an edge of the ", "in a corner of the "}[meets] + surfaceWords(at.Surface)
}

// surfaceWords names a surface as one speaks of it.
func surfaceWords(s acoustics.Surface) string {
	switch s {
	case acoustics.Floor, acoustics.Ceiling:
		return s.String()
	default:
		return s.String() + " wall"
	}
}

// Depth returns how far an absorber stands out from its surface, in metres: its
// cavity and sheet; for a neck box its volume over its front and a front board.
func Depth(a project.Absorber) float64 {
	const board = 0.018
	switch {
	case a.Neck != nil:
		return a.Neck.CavityL*l/(a.Size[0]*a.Size[1]) + board
	case a.Panel != nil:
		return (a.Panel.CavityMM + a.Panel.ThicknessMM) * mm
	case a.Perforated != nil:
		return (a.Perforated.CavityMM + a.Perforated.PanelMM) * mm
	case a.Slotted != nil:
		return (a.Slotted.CavityMM + a.Slotted.PanelMM) * mm
	case a.Microperforated != nil:
		return (a.Microperforated.CavityMM + a.Microperforated.PanelMM) * mm
	case a.Porous != nil:
		return (a.Porous.ThicknessMM + a.Porous.GapMM) * mm
	}
	return 0
}
