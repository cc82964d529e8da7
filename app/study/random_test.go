package study_test

import (
	"context"
	"math/rand/v2"
	"testing"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/app/study"
)

// randomProject is a room between a booth and a hall with up to four absorbers
// of any kind anywhere, some of them absurd, all of them valid.
func randomProject(t *testing.T, seed uint64) project.Project {
	t.Helper()
	rng := rand.New(rand.NewPCG(seed, 1))
	u := func(lo, hi float64) float64 { return lo + (hi-lo)*rng.Float64() }
	finishes := []string{"plaster-on-masonry", "gypsum-on-studs", "window-glass", "carpet-on-felt", "acoustical-tile", "door-solid"}
	p := project.New()
	p.Room.Length, p.Room.Width, p.Room.Height = u(2, 7), u(1.8, 5), u(2, 3.5)
	for s := range p.Room.Surfaces {
		p.Room.Surfaces[s] = []project.FinishShare{{Finish: finishes[rng.IntN(len(finishes))], Share: 1}}
	}
	point := func() acoustics.Point {
		return acoustics.Point{u(.2, p.Room.Length-.2), u(.2, p.Room.Width-.2), u(.3, p.Room.Height-.3)}
	}
	for i := range p.Loudspeakers {
		p.Loudspeakers[i].At = point()
	}
	p.Seats[0].At = point()
	for range 1 + rng.IntN(4) {
		s := acoustics.Surface(rng.IntN(6))
		first, second := s.InPlane()
		a := project.Absorber{ID: p.FreshAbsorberID(), Surface: s, Size: [2]float64{u(.3, 1.2), u(.3, 1.2)}, Units: 1 + rng.IntN(2)}.OfKind(project.Kinds()[rng.IntN(6)])
		a.Centre = [2]float64{u(0, p.Room.Dimension(first)), u(0, p.Room.Dimension(second))}
		if a.Neck != nil {
			a.Neck.CavityL, a.Neck.MouthDiameterMM, a.Neck.LengthMM, a.Neck.GauzePaSM = u(10, 200), u(40, 160), u(10, 300), u(0, 60)
		}
		if a.Panel != nil {
			a.Panel.CavityMM = u(40, 300)
			if rng.IntN(2) == 0 {
				f := project.DefaultFill()
				f.ThicknessMM = 30
				a.Panel.Fill = &f
			}
		}
		if q := p.AddAbsorber(p.Room.Onto(a)); len(q.Validate()) == 0 {
			p = q
		}
	}
	if errs := p.Validate(); len(errs) > 0 {
		t.Fatalf("seed %d: %v", seed, errs)
	}
	return p
}

// Whatever stands in a room, no pole is lost: the argument principle counts what
// was followed, all of it decays, and every mode below the limit became one.
func TestNoPoleIsLost(t *testing.T) {
	for seed := range uint64(24) {
		p := randomProject(t, seed)
		r, err := study.Run(context.Background(), p, study.Options{ModesToHz: 150, ToHz: 150}, nil, nil)
		if err != nil {
			t.Fatal(err)
		}
		if r.PolesFound != r.PolesCounted {
			t.Errorf("seed %d: %d poles found of %d", seed, r.PolesFound, r.PolesCounted)
		}
		for _, m := range r.Modes {
			for _, q := range m.Treated {
				if !(q.Oscillator.Decay > 0) || !(q.Oscillator.Natural > 0) {
					t.Errorf("seed %d: mode %v became %+v", seed, m.Mode, q.Oscillator)
				}
			}
		}
	}
}
