package study

import (
	"context"
	"math"
	"math/rand/v2"
	"slices"

	"stillroom/app/project"
)

// Robustness is what building tolerances and the air's temperature make of the treated
// room: the range over many rooms whose dimensions are off at random.
type Robustness struct {
	// Samples is how many rooms it holds so far, of Wanted.
	Samples, Wanted int
	// Lowest and Highest are the treated levels, dB, indexed [seat][frequency of
	// Result.Levels].
	Lowest, Highest [][]float64
	// T60 is the range of each mode's longest decay after treatment, s, in the order of
	// Result.Modes; 0 where it is not listed.
	T60 [][2]float64
}

// Tolerances that are sampled, each even over ± its width. Common practice: cavities
// and boxes to a few millimetres, drilled holes a little wide, sheets by their mass, the
// flow resistivity of wool and gauze as makers differ.
const (
	offCavity = 4.0  // mm
	offNeck   = 2.0  // mm
	offHole   = 0.15 // mm
	offPitch  = 0.5  // mm
	offSheet  = 0.3  // mm, at most a twentieth of a thin sheet
	offVolume = 0.02 // of it
	offMass   = 0.07 // of it
	offYoungs = 0.2  // of it
	offFlow   = 0.4  // of it
	offGauze  = 0.3  // of it
	offAirC   = 5.0  // °C
)

// seedOfTolerances makes the samples the same each time.
const seedOfTolerances = 20_260_101

// robust samples the treated room, with coarse tiles where there are many, and takes
// over what each sample changes of the room as it is. Each is given the range so far.
// Where it is stopped it returns the error of ctx.
func (r *Result) robust(ctx context.Context, samples int, each func(*Robustness)) (*Robustness, error) {
	source := rand.New(rand.NewPCG(seedOfTolerances, uint64(samples)))
	g := &Robustness{Wanted: samples, T60: make([][2]float64, len(r.Modes))}
	for _, seat := range r.Levels.Treated {
		g.Lowest, g.Highest = append(g.Lowest, slices.Clone(seat)), append(g.Highest, slices.Clone(seat))
	}
	for i, m := range r.Modes {
		g.T60[i] = [2]float64{m.LongestTreated(), m.LongestTreated()}
	}
	o := r.Options
	o.Ringing, o.MapHz, o.Samples, o.Coarse = false, 0, 0, true
	base, err := Run(ctx, r.Project, o, nil, nil)
	if err != nil {
		return nil, err
	}
	for range samples {
		s, err := Run(ctx, offAtRandom(r.Project, source), o, nil, nil)
		if err != nil {
			return nil, err
		}
		g = g.with(r, base, s)
		each(g)
	}
	return g, nil
}

// with returns the ranges widened by one sample s of the room r, of which base is what
// the sample is compared with.
func (g *Robustness) with(r, base, s *Result) *Robustness {
	w := &Robustness{Samples: g.Samples + 1, Wanted: g.Wanted, T60: slices.Clone(g.T60)}
	for seat := range g.Lowest {
		lowest, highest := slices.Clone(g.Lowest[seat]), slices.Clone(g.Highest[seat])
		for i, v := range r.Levels.Treated[seat] {
			v += s.Levels.Treated[seat][i] - base.Levels.Treated[seat][i]
			lowest[i], highest[i] = math.Min(lowest[i], v), math.Max(highest[i], v)
		}
		w.Lowest, w.Highest = append(w.Lowest, lowest), append(w.Highest, highest)
	}
	longest := func(of *Result) map[[3]int]float64 {
		m := map[[3]int]float64{}
		for _, x := range of.Modes {
			m[x.Mode.Order] = x.LongestTreated()
		}
		return m
	}
	off, on := longest(s), longest(base)
	for i, m := range r.Modes {
		if t, u := off[m.Mode.Order], on[m.Mode.Order]; t > 0 && u > 0 && w.T60[i][0] > 0 {
			v := m.LongestTreated() * t / u
			w.T60[i] = [2]float64{math.Min(w.T60[i][0], v), math.Max(w.T60[i][1], v)}
		}
	}
	return w
}

// offAtRandom returns a project whose absorbers and air are off by their tolerances.
// A figure that would leave its range stays at the end of it.
func offAtRandom(p project.Project, source *rand.Rand) project.Project {
	p = p.Clone()
	even := func() float64 { return 2*source.Float64() - 1 }
	by := func(v *float64, width, least float64) { *v = math.Max(least, *v+width*even()) }
	share := func(v *float64, width float64) { *v *= 1 + width*even() }
	fill := func(f *project.Fill, cavity float64) {
		if f != nil {
			share(&f.FlowPaSM2, offFlow)
			f.ThicknessMM = math.Min(f.ThicknessMM, cavity)
		}
	}
	p.Air.TemperatureC = math.Max(-20, math.Min(50, p.Air.TemperatureC+offAirC*even()))
	for i := range p.Absorbers {
		a := &p.Absorbers[i]
		switch {
		case a.Neck != nil:
			share(&a.Neck.CavityL, offVolume)
			by(&a.Neck.LengthMM, offNeck, 1)
			by(&a.Neck.MouthDiameterMM, offHole, 5)
			share(&a.Neck.GauzePaSM, offGauze)
			if a.Neck.Fill != nil {
				share(&a.Neck.Fill.FlowPaSM2, offFlow)
			}
		case a.Panel != nil:
			share(&a.Panel.MassKgM2, offMass)
			share(&a.Panel.YoungsGPa, offYoungs)
			by(&a.Panel.CavityMM, offCavity, 1)
			fill(a.Panel.Fill, a.Panel.CavityMM)
		case a.Perforated != nil:
			b := a.Perforated
			by(&b.PanelMM, math.Min(offSheet, b.PanelMM/20), 0.1)
			by(&b.HoleMM, math.Min(offHole, b.HoleMM/20), 0.05)
			by(&b.PitchMM, math.Min(offPitch, b.PitchMM/20), b.HoleMM*1.05)
			by(&b.CavityMM, offCavity, 1)
			share(&b.GauzePaSM, offGauze)
			fill(b.Fill, b.CavityMM)
		case a.Slotted != nil:
			b := a.Slotted
			by(&b.SlotMM, math.Min(offPitch, b.SlotMM/5), 0.05)
			by(&b.CavityMM, offCavity, 1)
			fill(b.Fill, b.CavityMM)
		case a.Microperforated != nil:
			b := a.Microperforated
			by(&b.HoleMM, b.HoleMM/20, 0.05)
			by(&b.PitchMM, b.PitchMM/40, b.HoleMM*1.05)
			by(&b.CavityMM, offCavity, 1)
		case a.Porous != nil:
			share(&a.Porous.FlowPaSM2, offFlow)
			by(&a.Porous.ThicknessMM, math.Min(3, a.Porous.ThicknessMM/10), 1)
		}
	}
	return p
}
