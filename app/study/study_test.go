package study_test

import (
	"context"
	"errors"
	"math"
	"reflect"
	"testing"

	"stillroom/app/internal/testcase"
	"stillroom/app/project"
	"stillroom/app/study"
	"stillroom/samples"
)

func run(t testing.TB, p project.Project, former *study.Result) *study.Result {
	t.Helper()
	r, err := study.Run(context.Background(), p, study.Options{Points: 60, ModesToHz: 120}, former, nil)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// same compares what is shown of two results.
func same(a, b *study.Result) bool {
	return reflect.DeepEqual(a.Levels, b.Levels) && reflect.DeepEqual(a.Findings, b.Findings) &&
		reflect.DeepEqual(a.Cautions, b.Cautions) && reflect.DeepEqual(a.Bands, b.Bands) && sameModes(a, b)
}

func sameModes(a, b *study.Result) bool {
	if len(a.Modes) != len(b.Modes) || len(a.AbsorberPoles) != len(b.AbsorberPoles) {
		return false
	}
	for i := range a.Modes {
		x, y := a.Modes[i], b.Modes[i]
		if x.Mode != y.Mode || x.Rank != y.Rank || math.Abs(x.LongestTreated()-y.LongestTreated()) > 0 {
			return false
		}
	}
	return true
}

// A result does not depend on the one it took stages over from.
func TestFormerResultChangesNothing(t *testing.T) {
	p := testcase.Sample(t, "edit-suite")
	first := run(t, p, nil)
	edits := map[string]project.Project{
		"the same":            p,
		"a seat moved":        p.WithSeat(0, project.Seat{ID: "desk", At: [3]float64{2.5, 1.6, 1.1}}),
		"a loudspeaker moved": p.WithLoudspeaker(0, project.Loudspeaker{ID: "L", At: [3]float64{0.9, 1, 1}}),
		"a wall moved":        p.WithDimension(0, 5.6, false),
		"an absorber gone":    p.WithoutAbsorber(0),
		"none left":           p.WithoutAbsorber(0).WithoutAbsorber(0),
	}
	warm := p
	warm.Air.TemperatureC = 27
	edits["warmer air"] = warm
	for name, q := range edits {
		if a, b := run(t, q, nil), run(t, q, first); !same(a, b) {
			t.Errorf("%s: the result differs with a former one", name)
		}
	}
}

// Progress brings the levels before the poles, and the last word is complete.
func TestStages(t *testing.T) {
	p := testcase.Sample(t, "edit-suite")
	var stages []study.Stage
	r, err := study.Run(context.Background(), p, study.Options{Points: 20, ModesToHz: 80}, nil, func(part *study.Result) {
		stages = append(stages, part.Stage)
		if len(part.Levels.Treated[0]) != 20 {
			t.Errorf("the partial result has %d levels", len(part.Levels.Treated[0]))
		}
		for _, m := range part.Modes {
			if len(m.Treated) > 0 {
				t.Error("the partial result has treated poles")
			}
		}
	})
	if err != nil {
		t.Fatal(err)
	}
	if !reflect.DeepEqual(stages, []study.Stage{study.StageLevel}) || r.Stage != study.StageTreated {
		t.Errorf("stages %v, at the end %v", stages, r.Stage)
	}
	if len(r.AbsorberPoles) == 0 || len(r.Modes[0].Treated) == 0 {
		t.Error("the complete result has no treated poles")
	}
	if r.PolesCounted != r.PolesFound {
		t.Errorf("%d poles counted, %d followed", r.PolesCounted, r.PolesFound)
	}
}

func TestRunStopsWhenTold(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	_, err := study.Run(ctx, testcase.Sample(t, "edit-suite"), study.Options{}, nil, func(*study.Result) { cancel() })
	if !errors.Is(err, context.Canceled) {
		t.Errorf("the error is %v, want that of the context", err)
	}
}

// Without absorbers the treated curve is the bare one, to the bit.
func TestNothingTreatsAnEmptyRoom(t *testing.T) {
	p := testcase.Sample(t, "edit-suite").WithoutAbsorber(0).WithoutAbsorber(0)
	r := run(t, p, nil)
	if !reflect.DeepEqual(r.Levels.Bare, r.Levels.Treated) {
		t.Error("bare and treated levels differ")
	}
	for _, m := range r.Modes {
		if len(m.Poles()) != 0 {
			t.Fatalf("mode %v has treated poles", m.Mode)
		}
	}
}

// Every sample is a valid project whose poles are all found.
func TestSamples(t *testing.T) {
	for _, name := range samples.Names() {
		r := run(t, testcase.Sample(t, name), nil)
		if r.PolesCounted != r.PolesFound {
			t.Errorf("%s: %d poles counted, %d followed", name, r.PolesCounted, r.PolesFound)
		}
		if len(r.Findings) == 0 || len(r.Modes) == 0 {
			t.Errorf("%s: no findings or no modes", name)
		}
	}
}

// What the tuner proposes for the worst problem below 100 Hz can be built where it
// says, meets the mode, and lets it ring less.
func TestTunerProposesWhatHelps(t *testing.T) {
	p := testcase.Sample(t, "edit-suite").WithoutAbsorber(0).WithoutAbsorber(0)
	r := run(t, p, nil)
	mode := -1
	for i, m := range r.Modes {
		if m.Problem && (mode < 0 || m.Rank < r.Modes[mode].Rank) && m.Mode.Hz < 100 {
			mode = i
		}
	}
	if mode < 0 {
		t.Fatal("the sample has no problem below 100 Hz")
	}
	found, err := study.Tune(context.Background(), r, study.TuneRequest{Mode: mode}, nil)
	if err != nil {
		t.Fatal(err)
	}
	kinds := map[string]bool{}
	for _, f := range found {
		kinds[f.Absorber.Kind] = true
		with := p.AddAbsorber(f.Absorber)
		if errs := with.Validate(); len(errs) > 0 {
			t.Errorf("%s %s: %v", f.Absorber.Kind, f.Spot, errs)
		}
		if c, ok := f.Candidate, f.Absorber.Kind == "neck"; ok && math.Abs(f.F0Hz/c.WantedHz-1) > 0.1 {
			t.Errorf("%s: resonance %.2f Hz, wanted about %.2f Hz", f.Absorber.Kind, f.F0Hz, c.WantedHz)
		}
	}
	if !kinds["neck"] || !kinds["panel"] {
		t.Errorf("kinds proposed: %v, want a neck box and a panel", kinds)
	}
	best := found[0]
	if got, was := best.After[0].Oscillator.T60(), best.Before.T60(); got > 0.75*was {
		t.Errorf("the best proposal leaves %.2f s of %.2f s", got, was)
	}
	again := run(t, p.AddAbsorber(best.Absorber), nil)
	if len(again.Modes[mode].Absorbers) == 0 {
		t.Error("the placed absorber is not assigned to its mode")
	}
}

func benchmarkDrag(b *testing.B, points int) {
	p := testcase.Sample(b, "edit-suite")
	r, err := study.Run(context.Background(), p, study.Options{Points: points, ModesToHz: 250}, nil, nil)
	if err != nil {
		b.Fatal(err)
	}
	i := 0
	for b.Loop() {
		i++
		ctx, cancel := context.WithCancel(context.Background())
		q := p.WithDimension(0, 5.3+0.01*float64(i%30+1), false)
		study.Run(ctx, q, study.Options{Points: points, ModesToHz: 250}, r, func(part *study.Result) { r = part; cancel() })
		cancel()
	}
}

// BenchmarkWallDrag is a study as far as the levels with a wall moved.
func BenchmarkWallDrag(b *testing.B) { benchmarkDrag(b, 400) }

// BenchmarkComplete is a whole study, poles and all.
func BenchmarkComplete(b *testing.B) {
	p := testcase.Sample(b, "edit-suite")
	for b.Loop() {
		if _, err := study.Run(context.Background(), p, study.Options{Points: 400}, nil, nil); err != nil {
			b.Fatal(err)
		}
	}
}

// The spread over the seats is between them.
func TestLevelsSpreadOverSeats(t *testing.T) {
	p := testcase.Sample(t, "listening-room")
	l, err := study.Level(p, study.Options{Points: 30})
	if err != nil {
		t.Fatal(err)
	}
	for i := range l.Hz {
		a, b := l.Treated[0][i], l.Treated[1][i]
		if l.Lowest[i] != math.Min(a, b) || l.Highest[i] != math.Max(a, b) {
			t.Errorf("%g Hz: %v and %v of %v and %v dB", l.Hz[i], l.Lowest[i], l.Highest[i], a, b)
		}
	}
}
