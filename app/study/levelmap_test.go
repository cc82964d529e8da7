package study

import (
	"context"
	"math"
	"testing"

	"stillroom/app/internal/testcase"
)

// A map's cell is what a seat in its middle is told by the level lane.
func TestMapIsTheLevelAtItsPlaces(t *testing.T) {
	r, err := Run(context.Background(), testcase.Sample(t, "edit-suite"), Options{FromHz: 40, ToHz: 60, Points: 2, MapHz: 60}, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	for up, m := range map[int]*LevelMap{1: r.Plan, 2: r.Section} {
		i, j := m.Columns/3, m.Rows/4
		p := r.Project.Clone()
		d := r.Room.Box.Dimensions()
		at := &p.Seats[0].At
		at[0], at[up] = d[0]*(float64(i)+0.5)/float64(m.Columns), d[up]*(float64(j)+0.5)/float64(m.Rows)
		there, err := Run(context.Background(), p, r.Options, nil, nil)
		if err != nil {
			t.Fatal(err)
		}
		if got, want := m.Treated[j*m.Columns+i], there.Levels.Treated[0][1]; math.Abs(got-want) > 1e-9 {
			t.Errorf("treated %.6f dB on the map, %.6f dB at the seat", got, want)
		}
		if got, want := m.Bare[j*m.Columns+i], there.Levels.Bare[0][1]; math.Abs(got-want) > 1e-9 {
			t.Errorf("bare %.6f dB on the map, %.6f dB at the seat", got, want)
		}
		if got := m.Level(at[0], at[up], d[0], d[up]); got != m.Treated[j*m.Columns+i] {
			t.Errorf("the cell under %v reads %.3f dB", *at, got)
		}
	}
}

// The maps that a drag asks for, beside all else that it recomputes.
func BenchmarkMaps(b *testing.B) {
	p := testcase.Sample(b, "edit-suite")
	o := Options{MapHz: 50, MapCells: 14}
	r, err := Run(context.Background(), p, o, nil, nil)
	if err != nil {
		b.Fatal(err)
	}
	for b.Loop() {
		if err := r.copied().mapStage(context.Background(), o.withDefaults(), r.stages.field); err != nil {
			b.Fatal(err)
		}
	}
}
