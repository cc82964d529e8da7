package acoustics

import (
	"context"
	"math"
	"testing"
)

// Rooms and units that the tests and benchmarks share.

func testAir(t testing.TB) Air {
	t.Helper()
	air, err := NewAir(Atmosphere{TemperatureC: 20, RelativeHumidityPct: 50, PressureKPa: 101.325})
	if err != nil {
		t.Fatal(err)
	}
	return air
}

// flat is a finish of one coefficient at every frequency.
func flat(alpha float64) Lining {
	return Lining{{Finish{Absorption: []BandAbsorption{{125, alpha}}}, 1}}
}

// studio is a furnished room of 53 m³.
func studio(t testing.TB) Room {
	plaster := FinishShare{Finish{Absorption: []BandAbsorption{{125, .013}, {250, .015}, {500, .02}, {1000, .03}}}, 0.8}
	board := FinishShare{Finish{Absorption: []BandAbsorption{{125, .29}, {250, .10}, {500, .05}, {1000, .04}}}, 0.2}
	wall := Lining{plaster, board}
	return Room{Box{5.3, 3.86, 2.58}, testAir(t), Walls{wall, wall, wall, wall, flat(0.03), wall}}
}

// bottle is the impedance of a plain neck and cavity with a constant resistance,
//
//	Z = R + jωρl/S + ρc²/(jωV)
func bottle(air Air, area, length, volume, resistance float64) func(complex128) complex128 {
	m := complex(air.Density*length/area, 0)
	s := complex(air.Density*air.SpeedOfSound*air.SpeedOfSound/volume, 0)
	return func(omega complex128) complex128 {
		return complex(resistance, 0) + 1i*omega*m + s/(1i*omega)
	}
}

// bottleAt is a bottle of a 5 cm mouth in place, tuned by its volume.
func bottleAt(air Air, s Surface, u, v, hz float64) Unit {
	const a, length = 0.05, 0.2
	area := math.Pi * a * a
	c := air.SpeedOfSound
	volume := area / (length + 0.85*a) / math.Pow(2*math.Pi*hz/c, 2)
	return Unit{
		Patch:     Patch{Surface: s, Centre: [2]float64{u, v}, MouthRadius: a, Mouths: 1},
		Impedance: bottle(air, area, length, volume, 2*air.Density*c/area*0.01),
		Natural:   hz,
	}
}

// eightBottles are boxes in the corners and along the edges of the studio, two
// and two tuned to its lowest modes.
func eightBottles(r Room) []Unit {
	w, h := r.Box.Width, r.Box.Height
	var units []Unit
	for i, hz := range []float64{32.5, 44.5, 55, 66.5} {
		z := 0.3 + 0.4*float64(i)
		units = append(units, bottleAt(r.Air, Back, 0.3, z, hz), bottleAt(r.Air, Back, w-0.3, math.Min(h-0.3, z), hz))
	}
	for i := range units {
		units[i].Owner = i / 2
	}
	return units
}

func studioField(t testing.TB, units []Unit) *Field {
	f, err := NewField(context.Background(), studio(t), studioSources(), []Point{{2.9, 1.93, 1.2}}, units, 250)
	if err != nil {
		t.Fatal(err)
	}
	return f
}

func studioSources() []Source {
	return []Source{{At: Point{1.1, 1.18, 1.2}, Gain: 1}, {At: Point{1.1, 2.68, 1.2}, Gain: 1}}
}

// logSpaced returns n frequencies from lo to hi, both included.
func logSpaced(lo, hi float64, n int) []float64 {
	hz := make([]float64, n)
	for i := range hz {
		hz[i] = lo * math.Pow(hi/lo, float64(i)/float64(n-1))
	}
	return hz
}

// near reports whether two numbers agree within a relative tolerance.
func near(a, b, tolerance float64) bool {
	return math.Abs(a-b) <= tolerance*math.Max(math.Abs(a), math.Abs(b))
}
