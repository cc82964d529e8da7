package study

import (
	"context"
	"errors"
	"math"
	"reflect"
	"slices"
	"testing"
	"time"

	"stillroom/acoustics"
	"stillroom/app/internal/testcase"
	"stillroom/app/project"
	"stillroom/resonators/tuning"
)

// bareSuite is the sample edit suite without its absorbers.
func bareSuite(t testing.TB, o Options) *Result {
	t.Helper()
	p := testcase.Sample(t, "edit-suite")
	p.Absorbers = nil
	r, err := Run(context.Background(), p, o, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func tuned(t testing.TB, r *Result, q TuneRequest) []Proposal {
	t.Helper()
	list, err := Tune(context.Background(), r, q, nil)
	if err != nil {
		t.Fatal(err)
	}
	return list
}

// The ranking serves the goal, every proposal is a valid edit within the wishes, and
// what is said of it is what the room with it does.
func TestProposalsServeTheGoal(t *testing.T) {
	r := bareSuite(t, Options{ModesToHz: 90, ToHz: 120, Points: 60})
	r.Project = r.Project.AddKeepOut(project.KeepOut{Surface: acoustics.Back, Centre: [2]float64{1.9, 1.2}, Size: [2]float64{3.6, 2.2}})
	for _, goal := range []tuning.Goal{tuning.FastestDecay, tuning.LowPeak, tuning.LeastVolume} {
		q := TuneRequest{Mode: 0, Goal: goal, DepthM: 0.35, MostUnits: 4, Kinds: []string{"neck", "perforated"},
			Surfaces: []acoustics.Surface{acoustics.Front, acoustics.Back, acoustics.Floor}}
		list := tuned(t, r, q)
		if len(list) < 3 {
			t.Fatalf("goal %d: %d proposals", goal, len(list))
		}
		if !list[0].Meets && goal != tuning.LowPeak {
			t.Errorf("goal %d: the best rings %.2f s", goal, list[0].Longest())
		}
		for i, p := range list {
			a := p.Absorber
			if errs := r.Project.AddAbsorber(a).Validate(); len(errs) > 0 {
				t.Errorf("goal %d, %d: %v", goal, i, errs)
			}
			if !slices.Contains(q.Kinds, a.Kind) || !slices.Contains(q.Surfaces, a.Surface) || a.Units > q.MostUnits || Depth(a) > 0.36 {
				t.Errorf("goal %d, %d: a %s of %d units on the %v, %.3f m deep, was not asked for", goal, i, a.Kind, a.Units, a.Surface, Depth(a))
			}
			k := r.Project.KeepOut[0]
			if project.Overlap(a, project.Absorber{Surface: k.Surface, Centre: k.Centre, Size: k.Size, Units: 1}) {
				t.Errorf("goal %d, %d: it stands where it must not", goal, i)
			}
			if i > 0 && better(p, list[i-1], goal) < 0 {
				t.Errorf("goal %d: %d is better than the one before it", goal, i)
			}
			if p.Meets != (p.Longest() <= r.Modes[0].LimitS) {
				t.Errorf("goal %d, %d: %.2f s against %.2f s, meets %v", goal, i, p.Longest(), r.Modes[0].LimitS, p.Meets)
			}
		}
		best := list[0]
		with, err := Run(context.Background(), r.Project.AddAbsorber(best.Absorber), Options{ModesToHz: 90, ToHz: 120, Points: 60}, nil, nil)
		if err != nil {
			t.Fatal(err)
		}
		var near []PoleRow
		for _, p := range with.AbsorberPoles {
			if math.Abs(math.Log(p.Oscillator.Natural/r.Modes[0].Mode.Hz)) < math.Log(around) {
				near = append(near, p)
			}
		}
		if got := heard(with.Modes[0].Treated, near)[0].Oscillator.T60(); math.Abs(got/best.Longest()-1) > 0.005 || with.PolesFound != with.PolesCounted {
			t.Errorf("goal %d: it is said to leave %.3f s and leaves %.3f s (%d poles of %d)", goal, best.Longest(), got, with.PolesFound, with.PolesCounted)
		}
		if best.ColderS == 0 || best.WarmerS == 0 || math.Abs(best.ColderS/best.Longest()-1) > 0.5 {
			t.Errorf("goal %d: colder %.3f s, warmer %.3f s", goal, best.ColderS, best.WarmerS)
		}
	}
}

// The room decides: refined, an absorber serves the goal no worse than where the
// closed forms put it.
func TestRefiningNeverWorsens(t *testing.T) {
	r := bareSuite(t, Options{ModesToHz: 90, ToHz: 120, Points: 60})
	for _, goal := range []tuning.Goal{tuning.FastestDecay, tuning.LowPeak} {
		q := TuneRequest{Mode: 0, Goal: goal, Kinds: []string{"neck", "panel"}, Surfaces: []acoustics.Surface{acoustics.Back, acoustics.Left}}
		candidates, err := tuning.Propose(context.Background(), r.problem(q))
		if err != nil {
			t.Fatal(err)
		}
		improved := false
		for _, c := range candidates {
			start := buildable(c)
			start.ID = "X"
			a, err := r.refined(context.Background(), q, start, c)
			if err != nil {
				t.Fatal(err)
			}
			b := r.newBench(q)
			was, is := b.worth(context.Background(), start), b.worth(context.Background(), a)
			if is > was {
				t.Errorf("goal %d, %s: %.4f becomes %.4f", goal, start.Kind, was, is)
			}
			improved = improved || is < was*0.97
		}
		if !improved {
			t.Errorf("goal %d: nothing is improved by refining", goal)
		}
	}
}

// The same request gives the same answer, and a stopped one stops at once.
func TestTuneRepeatsAndStops(t *testing.T) {
	r := bareSuite(t, Options{ModesToHz: 90, ToHz: 120, Points: 60})
	q := TuneRequest{Mode: 0, Kinds: []string{"neck", "perforated"}, Surfaces: []acoustics.Surface{acoustics.Back, acoustics.Floor}}
	strip := func(list []Proposal) []Proposal {
		for i := range list {
			list[i].Candidate = tuning.Candidate{}
		}
		return list
	}
	if a, b := strip(tuned(t, r, q)), strip(tuned(t, r, q)); !reflect.DeepEqual(a, b) {
		t.Error("asked twice, it answers differently")
	}
	ctx, stop := context.WithCancel(context.Background())
	seen := 0
	start := time.Now()
	_, err := Tune(ctx, r, TuneRequest{Mode: 0, Kinds: []string{"neck", "panel"}}, func(done, total int, soFar []Proposal) {
		if seen++; seen == 2 {
			if len(soFar) == 0 || total < 4 {
				t.Errorf("after %d of %d there are %d proposals", done, total, len(soFar))
			}
			stop()
		}
	})
	if !errors.Is(err, context.Canceled) {
		t.Errorf("stopped, it returns %v", err)
	}
	if seen > 3 {
		t.Errorf("it went on for %d more after it was stopped (%v)", seen-2, time.Since(start))
	}
}

// A plan for the problem modes below 90 Hz brings them under their limits, as the
// room with all its absorbers says; with one absorber allowed, it says what is left.
func TestPlanBringsModesUnder(t *testing.T) {
	r := bareSuite(t, Options{ModesToHz: 110, ToHz: 120, Points: 60})
	var wanted []int
	for i, m := range r.Modes {
		if m.Problem && m.Mode.Hz < 90 {
			wanted = append(wanted, i)
		}
	}
	if len(wanted) < 2 {
		t.Fatalf("the sample has %d problem modes below 90 Hz", len(wanted))
	}
	q := PlanRequest{Modes: wanted, Each: TuneRequest{DepthM: 0.35, Kinds: []string{"neck"}}}
	plan, err := PlanFor(context.Background(), r, q, nil)
	if err != nil {
		t.Fatal(err)
	}
	if errs := plan.Project().Validate(); len(errs) > 0 {
		t.Fatal(errs)
	}
	again, err := Run(context.Background(), plan.Project(), r.Options, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	for _, i := range wanted {
		if over := again.overLimit(i); over != slices.Contains(plan.Open, i) {
			t.Errorf("mode %v: over its limit %v, the plan says %v is open", again.Modes[i].Mode, over, plan.Open)
		}
	}
	if len(plan.Open) > 0 || len(plan.Steps) == 0 {
		t.Errorf("%d absorbers leave %v open", len(plan.Steps), plan.Open)
	}
	q.Absorbers, q.Each.MostUnits = 1, 1
	q.Each.DepthM = 0.12
	small, err := PlanFor(context.Background(), r, q, nil)
	if err != nil {
		t.Fatal(err)
	}
	if len(small.Steps) > 1 || len(small.Open) == 0 {
		t.Errorf("with one shallow absorber there are %d, and %v is open", len(small.Steps), small.Open)
	}
}

// The band of tolerances holds the design, is wider than nothing where an absorber acts,
// and is the same each time.
func TestBandOfTolerances(t *testing.T) {
	p := testcase.Sample(t, "edit-suite")
	o := Options{Points: 40, ModesToHz: 80, Samples: 6}
	stages := 0
	r, err := Run(context.Background(), p, o, nil, func(*Result) { stages++ })
	if err != nil {
		t.Fatal(err)
	}
	g := r.Robustness
	if g == nil || stages != 2+6 || g.Samples != 6 {
		t.Fatalf("robustness %v after %d partial results", g, stages)
	}
	wide := 0.0
	for i, v := range r.Levels.Treated[0] {
		if v < g.Lowest[0][i] || v > g.Highest[0][i] {
			t.Errorf("%.1f Hz: %.2f dB is not between %.2f and %.2f dB", r.Levels.Hz[i], v, g.Lowest[0][i], g.Highest[0][i])
		}
		wide = math.Max(wide, g.Highest[0][i]-g.Lowest[0][i])
	}
	if wide < 0.5 {
		t.Errorf("the band is at most %.2f dB wide", wide)
	}
	for i, m := range r.Modes {
		if now := m.LongestTreated(); now < g.T60[i][0] || now > g.T60[i][1] {
			t.Errorf("%v: %.3f s is not in %v", m.Mode, now, g.T60[i])
		}
	}
	again, err := Run(context.Background(), p, o, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(again.Robustness, g) {
		t.Error("asked twice, the band differs")
	}
	// Taken over by a run with the same absorbers, as it is.
	later, err := Run(context.Background(), p, o, r, nil)
	if err != nil {
		t.Fatal(err)
	}
	if later.Robustness != g {
		t.Error("the band is worked out anew for the same room")
	}
}

// The cut list makes the box: its boards enclose the air that the absorber has.
func TestCutListEnclosesTheAir(t *testing.T) {
	a := project.Absorber{Kind: "neck", Size: [2]float64{0.5, 0.4}, Units: 3, Neck: &project.Neck{CavityL: 40, MouthDiameterMM: 100, LengthMM: 120, Mouths: 1}}
	var inside float64
	boards := 0
	for _, c := range CutList(a) {
		if c.Part == "sides, long" {
			inside = c.H
		}
		if c.Thickness > 0 {
			boards += c.Count
		}
	}
	if air := (0.5 - 2*BoxBoard) * (0.4 - 2*BoxBoard) * inside; math.Abs(air-0.040) > 1e-9 {
		t.Errorf("the boards enclose %.2f L, not 40 L", 1000*air)
	}
	if boards != 18 {
		t.Errorf("%d boards for three boxes, want 18", boards)
	}
	if got := Depth(a); math.Abs(got-inside-2*BoxBoard) > 1e-12 {
		t.Errorf("the box is %.4f m deep, its inside %.4f m", got, inside)
	}
	for _, kind := range project.Kinds() {
		b := project.Absorber{Size: [2]float64{1.2, 0.6}, Units: 2}.OfKind(kind)
		for _, c := range CutList(b) {
			if c.Count < 1 || !(c.W > 0) || !(c.H > 0) || c.Thickness < 0 {
				t.Errorf("%s: part %+v", kind, c)
			}
		}
	}
}

func BenchmarkTuneAllKinds(b *testing.B) {
	r := bareSuite(b, Options{})
	for b.Loop() {
		tuned(b, r, TuneRequest{Mode: 3})
	}
}

func BenchmarkTolerances(b *testing.B) {
	p := testcase.Sample(b, "edit-suite")
	r, err := Run(context.Background(), p, Options{Points: 400, ModesToHz: 250}, nil, nil)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if _, err := r.robust(context.Background(), 24, func(*Robustness) {}); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkTiles is a complete study with a surface of 6 m² in tiles.
func BenchmarkTiles(b *testing.B) {
	for _, kind := range []string{"porous", "perforated"} {
		for _, to := range []float64{90, 150} {
			b.Run(kind+map[float64]string{90: "To90", 150: "To150"}[to], func(b *testing.B) {
				p := testcase.Sample(b, "edit-suite")
				a := project.Absorber{ID: "X", Surface: acoustics.Ceiling, Centre: [2]float64{2, 1.9}, Size: [2]float64{2.45, 2.45}, Units: 1}.OfKind(kind)
				p = p.AddAbsorber(a)
				for b.Loop() {
					if _, err := Run(context.Background(), p, Options{Points: 400, ModesToHz: to}, nil, nil); err != nil {
						b.Fatal(err)
					}
				}
			})
		}
	}
}

// asFarAsLevels studies a project up to its levels, as a drag does.
func asFarAsLevels(p project.Project, o Options, former *Result) (last *Result) {
	ctx, cancel := context.WithCancel(context.Background())
	defer cancel()
	Run(ctx, p, o, former, func(r *Result) { last = r; cancel() })
	return last
}

// BenchmarkTiledDrag is what a drag of a tiled surface asks for at each step: the
// levels with coarser tiles.
func BenchmarkTiledDrag(b *testing.B) {
	for name, side := range map[string]float64{"1.4m2": 1.2, "6m2": 2.45, "13m2": 3.6} {
		b.Run(name, func(b *testing.B) {
			p := testcase.Sample(b, "edit-suite")
			a := project.Absorber{ID: "X", Surface: acoustics.Ceiling, Centre: [2]float64{1.9, 1.9}, Size: [2]float64{side, side}, Units: 1}.OfKind("porous")
			p = p.AddAbsorber(a)
			o := Options{Points: 400, ModesToHz: 250, Coarse: true}
			r := asFarAsLevels(p, o, nil)
			for i := 0; b.Loop(); i++ {
				a.Centre[0] = 1.9 + 0.01*float64(i%30)
				r = asFarAsLevels(p.WithAbsorber(2, a), o, r)
			}
		})
	}
}

// BenchmarkOneOfTwenty is what changing a dimension of one of twenty absorbers asks for,
// as far as the levels.
func BenchmarkOneOfTwenty(b *testing.B) {
	p := testcase.Sample(b, "edit-suite")
	p.Absorbers = nil
	for i := range 20 {
		a := project.Absorber{ID: p.FreshAbsorberID(), Surface: acoustics.Ceiling, Size: [2]float64{0.5, 0.5}, Units: 1,
			Centre: [2]float64{0.3 + 0.5*float64(i%8), 0.3 + 0.6*float64(i/8)}}.OfKind([]string{"neck", "panel", "perforated"}[i%3])
		p = p.AddAbsorber(a)
	}
	o := Options{Points: 400, ModesToHz: 250}
	r := asFarAsLevels(p, o, nil)
	for i := 0; b.Loop(); i++ {
		q := p.Clone()
		q.Absorbers[1].Panel.CavityMM = 80 + float64(i%40)
		r = asFarAsLevels(q, o, r)
	}
}
