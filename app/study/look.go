package study

import (
	"cmp"
	"context"
	"math"
	"slices"

	"stillroom/acoustics"
	"stillroom/resonators"
	"stillroom/resonators/tuning"
)

// neighbours works out what a proposal does to the modes within a third of an octave.
func (r *Result) neighbours(ctx context.Context, q TuneRequest, p *Proposal) error {
	m := r.Modes[q.Mode].Mode
	field, err := r.newBench(q).place(ctx, p.Absorber)
	if err != nil {
		return err
	}
	seen, err := r.look(ctx, field, m.Order, m.Hz, true)
	if err != nil {
		return err
	}
	p.Neighbours = nil
	for i, n := range r.Modes {
		if i != q.Mode && math.Abs(math.Log(n.Mode.Hz/m.Hz)) < math.Log(around) {
			p.Neighbours = append(p.Neighbours, Neighbour{Mode: i, Before: n.own(), After: seen.others[n.Mode.Order]})
		}
	}
	return nil
}

// own returns the T60 of the pole that a mode is as the room stands, s; 0 where it is no
// longer listed.
func (m ModeRow) own() float64 {
	if len(m.Treated) > 0 {
		return m.Treated[0].Oscillator.T60()
	}
	if len(m.Absorbers) > 0 {
		return 0
	}
	return m.Oscillator.T60()
}

// look is what is seen of a mode, its neighbours and the last absorber in a room.
type look struct {
	own, near []PoleRow
	others    map[[3]int]float64 // T60 of the neighbours' own poles, s
}

// after returns the poles that the mode and its absorber have.
func (l look) after() []PoleRow { return heard(l.own, l.near) }

// look follows a mode of an order near a frequency in Hz, its neighbours where they are
// wanted, and those poles of the last absorber that come of units resonating there.
func (r *Result) look(ctx context.Context, f *acoustics.Field, order [3]int, hz float64, neighbours bool) (look, error) {
	l := look{others: map[[3]int]float64{}}
	low, high := hz/around, hz*around
	only := order
	if neighbours {
		only = [3]int{}
	}
	poles, err := f.PolesNear(ctx, low, high, len(r.Project.Absorbers), only)
	if err != nil {
		return l, err
	}
	i := -1
	for _, m := range f.ModesNear(low, high) {
		if !neighbours && m.Order != order {
			continue
		}
		i++
		p := poles.Modes[i]
		if p == nil {
			continue
		}
		if m.Order == order {
			l.own = append(l.own, PoleRow{Oscillator: p.Oscillator, LevelDB: p.LevelDB, Absorber: -1})
		} else {
			l.others[m.Order] = p.T60()
		}
	}
	for _, p := range poles.Absorbers {
		if p.Natural > low {
			l.near = append(l.near, PoleRow{Oscillator: p.Oscillator, LevelDB: p.LevelDB, Absorber: p.Owner})
		}
	}
	return l, nil
}

// Now returns the longest T60 of a mode as it stands, s.
func (m ModeRow) Now() float64 {
	if t := m.LongestTreated(); t > 0 {
		return t
	}
	return m.Oscillator.T60()
}

// unheard is how far below the loudest pole of the mode and its absorber a pole may
// lie at every seat and be left out of account, dB.
const unheard = 20

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

// weathered is how many of the best proposals are looked at more closely: in air colder
// and warmer by weatherC, and for what they do to the neighbours.
const (
	weathered = 5
	weatherC  = 5.0
)

// weather works out what colder and warmer air do to a proposal.
func (r *Result) weather(ctx context.Context, q TuneRequest, p *Proposal) error {
	m := r.Modes[q.Mode].Mode
	for _, x := range []struct {
		by float64
		to *float64
	}{{-weatherC, &p.ColderS}, {weatherC, &p.WarmerS}} {
		with := r.Project.AddAbsorber(p.Absorber)
		with.Air.TemperatureC = math.Max(-20, math.Min(50, with.Air.TemperatureC+x.by))
		shell, err := shellStage(with, r.Options, nil)
		if err != nil {
			return err
		}
		var (
			hz  = m.Hz * shell.room.Air.SpeedOfSound / r.Air.SpeedOfSound
			kit = newKit(with, shell.room.Air, 90, nil, false)
			f   = r.stages.field
		)
		field, err := acoustics.NewField(ctx, shell.room, f.sources, f.seats, kit.units, fieldAbove*hz)
		if err != nil {
			return err
		}
		seen, err := r.look(ctx, field, m.Order, hz, false)
		if err != nil {
			return err
		}
		if after := seen.after(); len(after) > 0 {
			*x.to = after[0].Oscillator.T60()
		}
	}
	return nil
}

// tolerances returns how far dimensions may be off, by the slowest of the poles that
// an absorber and its mode have; none where there is no pole.
func tolerances(pulls []resonators.Sensitivity, after []PoleRow) []tuning.Tolerance {
	if len(after) == 0 {
		return nil
	}
	return tuning.Tolerances(pulls, after[0].Oscillator.HalfPowerWidth())
}

// Tolerances returns how far each dimension of a placed absorber may be off: while f0
// moves by no more than half of the half-power width of the slowest pole that the mode
// it is tuned to has; none where it is tuned to no mode.
func (r *Result) Tolerances(absorber int) []tuning.Tolerance {
	row := r.Absorbers[absorber]
	if row.Target < 0 {
		return nil
	}
	return tolerances(row.Sensitivities, heard(r.Modes[row.Target].Treated, r.Modes[row.Target].Pair))
}
