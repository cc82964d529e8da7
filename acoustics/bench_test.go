package acoustics

import (
	"context"
	"testing"
)

// The study of a room of 53 m³ with 8 units at 400 frequencies from 16 Hz to
// 250 Hz, from nothing: modes, static sums, levels.

func BenchmarkBare(b *testing.B)    { benchmarkLevels(b, 0) }
func BenchmarkTreated(b *testing.B) { benchmarkLevels(b, 8) }

func benchmarkLevels(b *testing.B, units int) {
	hz := logSpaced(16, 250, 400)
	room := studio(b)
	all := eightBottles(room)[:units]
	b.ReportAllocs()
	for b.Loop() {
		f, err := NewField(context.Background(), room, studioSources(), []Point{{2.9, 1.93, 1.2}}, all, 250)
		if err != nil {
			b.Fatal(err)
		}
		if _, err := f.Levels(context.Background(), hz); err != nil {
			b.Fatal(err)
		}
	}
}

// BenchmarkPoles finds and counts the poles of the treated room up to 150 Hz.
func BenchmarkPoles(b *testing.B) {
	f := studioField(b, eightBottles(studio(b)))
	b.ReportAllocs()
	for b.Loop() {
		p, err := f.Poles(context.Background(), 150, nil)
		if err != nil {
			b.Fatal(err)
		}
		if p.Found != p.Counted {
			b.Fatalf("found %d of %d", p.Found, p.Counted)
		}
	}
}

// BenchmarkLargeRoom is the bare level of a room of 252 m³ at four seats, 400
// frequencies to 250 Hz, from nothing.
func BenchmarkLargeRoom(b *testing.B) {
	hz := logSpaced(16, 250, 400)
	room := studio(b)
	room.Box = Box{9, 7, 4}
	seats := []Point{{5, 3.5, 1.2}, {6, 3.5, 1.2}, {5, 2.5, 1.2}, {6, 4.5, 1.2}}
	b.ReportAllocs()
	for b.Loop() {
		f, err := NewField(context.Background(), room, studioSources(), seats, nil, 250)
		if err != nil {
			b.Fatal(err)
		}
		if _, err := f.Levels(context.Background(), hz); err != nil {
			b.Fatal(err)
		}
	}
}
