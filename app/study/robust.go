package study

import (
	"context"
	"math"
	"math/rand/v2"

	"stillroom/app/project"
)

// Robustness is what building tolerances and the air's temperature make of the treated
// room: the range over many rooms whose dimensions are off at random.
type Robustness struct {
	Samples int
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

// robust samples the treated room. Where it is stopped it returns the error of ctx.
func (r *Result) robust(ctx context.Context, samples int) (*Robustness, error) {
	source := rand.New(rand.NewPCG(seedOfTolerances, uint64(samples)))
	g := &Robustness{Samples: samples, T60: make([][2]float64, len(r.Modes))}
	for _, seat := range r.Levels.Treated {
		g.Lowest = append(g.Lowest, append([]float64(nil), seat...))
		g.Highest = append(g.Highest, append([]float64(nil), seat...))
	}
	for i, m := range r.Modes {
		g.T60[i] = [2]float64{m.LongestTreated(), m.LongestTreated()}
	}
	o := r.Options
	o.Ringing, o.MapHz, o.Samples = false, 0, 0
	for range samples {
		p := offAtRandom(r.Project, source)
		s, err := Run(ctx, p, o, nil, nil)
		if err != nil {
			return nil, err
		}
		g.take(r, s)
	}
	return g, nil
}

// take widens the ranges by one sample.
func (g *Robustness) take(r, s *Result) {
	for seat := range g.Lowest {
		for i, v := range s.Levels.Treated[seat] {
			g.Lowest[seat][i] = math.Min(g.Lowest[seat][i], v)
			g.Highest[seat][i] = math.Max(g.Highest[seat][i], v)
		}
	}
	byOrder := map[[3]int]float64{}
	for _, m := range s.Modes {
		byOrder[m.Mode.Order] = m.LongestTreated()
	}
	for i, m := range r.Modes {
		if t := byOrder[m.Mode.Order]; t > 0 && g.T60[i][0] > 0 {
			g.T60[i] = [2]float64{math.Min(g.T60[i][0], t), math.Max(g.T60[i][1], t)}
		}
	}
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
