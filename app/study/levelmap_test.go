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

// The mean over the seats is that of the squared pressures, within the range.
func TestMeanOfTheSeats(t *testing.T) {
	l, err := Level(testcase.Sample(t, "listening-room"), Options{Points: 30})
	if err != nil {
		t.Fatal(err)
	}
	if len(l.Treated) != 2 {
		t.Fatalf("%d seats, want 2", len(l.Treated))
	}
	for i := range l.Hz {
		a, b := math.Pow(10, l.Treated[0][i]/10), math.Pow(10, l.Treated[1][i]/10)
		if want := 10 * math.Log10((a+b)/2); math.Abs(l.Mean[i]-want) > 1e-9 || l.Mean[i] < l.Lowest[i] || l.Mean[i] > l.Highest[i] {
			t.Errorf("%.1f Hz: mean %.3f dB of %.3f to %.3f dB, by hand %.3f dB", l.Hz[i], l.Mean[i], l.Lowest[i], l.Highest[i], want)
		}
	}
}
