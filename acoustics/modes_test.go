package acoustics

import (
	"fmt"
	"math"
	"slices"
	"testing"

	"pgregory.net/rapid"
)

var kuttruffRoom = Box{4.7, 4.1, 3.1}

const kuttruffSpeed = 340.0

// Kuttruff, Room Acoustics, table 3.1 (from memory; each worked out again): a
// room of 4.7 × 4.1 × 3.1 m, c = 340 m/s. An edition prints 68.55 for (0,1,1).
var kuttruffTable = []struct {
	order [3]int
	hz    float64
}{
	{[3]int{1, 0, 0}, 36.17}, {[3]int{0, 1, 0}, 41.46}, {[3]int{0, 0, 1}, 54.84}, {[3]int{1, 1, 0}, 55.02},
	{[3]int{1, 0, 1}, 65.69}, {[3]int{0, 1, 1}, 68.75}, {[3]int{2, 0, 0}, 72.34}, {[3]int{1, 1, 1}, 77.68},
	{[3]int{0, 2, 0}, 82.93}, {[3]int{2, 1, 0}, 83.38}, {[3]int{1, 2, 0}, 90.47}, {[3]int{2, 0, 1}, 90.78},
	{[3]int{0, 2, 1}, 99.42}, {[3]int{2, 1, 1}, 99.80}, {[3]int{1, 2, 1}, 105.79}, {[3]int{3, 0, 0}, 108.51},
	{[3]int{0, 0, 2}, 109.68}, {[3]int{2, 2, 0}, 110.05}, {[3]int{1, 0, 2}, 115.49}, {[3]int{3, 1, 0}, 116.16},
	{[3]int{0, 1, 2}, 117.25}, {[3]int{3, 0, 1}, 121.58}, {[3]int{1, 1, 2}, 122.71}, {[3]int{2, 2, 1}, 122.95},
	{[3]int{0, 3, 0}, 124.39},
}

func TestModesKuttruff(t *testing.T) {
	modes := kuttruffRoom.Modes(kuttruffSpeed, 125)
	if len(modes) != len(kuttruffTable) {
		t.Fatalf("%d modes up to 125 Hz, the table has %d", len(modes), len(kuttruffTable))
	}
	for i, want := range kuttruffTable {
		if m := modes[i]; m.Order != want.order || math.Abs(m.Hz-want.hz) > 0.0051 {
			t.Errorf("mode %d is %v at %.3f Hz, the table has %v at %.2f", i, m, m.Hz, want.order, want.hz)
		}
	}
}

func TestCountBelowAgainstAsymptote(t *testing.T) {
	// Exact counts by listing; asymptote of Maa and Bolt 1939 by hand.
	for _, c := range []struct {
		hz        float64
		exact     int
		asymptote float64
	}{{100, 14, 14.44}, {150, 37, 38.34}, {200, 81, 79.73}, {300, 233, 234.07}, {500, 960, 962.7}} {
		exact, asymptote := kuttruffRoom.CountBelow(kuttruffSpeed, c.hz)
		if exact != c.exact || math.Abs(asymptote-c.asymptote) > 0.051 {
			t.Errorf("below %g Hz: %d modes, asymptote %.2f; want %d and %.2f", c.hz, exact, asymptote, c.exact, c.asymptote)
		}
		const h = 1e-3
		_, above := kuttruffRoom.CountBelow(kuttruffSpeed, c.hz+h)
		_, below := kuttruffRoom.CountBelow(kuttruffSpeed, c.hz-h)
		if got, want := kuttruffRoom.ModeDensity(kuttruffSpeed, c.hz), (above-below)/(2*h); !near(got, want, 1e-6) {
			t.Errorf("density at %g Hz is %v, the asymptote's slope %v", c.hz, got, want)
		}
	}
}

// drawBox draws a room between a booth and a hall.
func drawBox(t *rapid.T) Box {
	side := rapid.Float64Range(1.2, 18)
	return Box{side.Draw(t, "length"), side.Draw(t, "width"), side.Draw(t, "height")}
}

// The list must be every triple of orders, counted by the slow obvious loop.
func TestModesAreAllOfThem(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b, upTo := drawBox(t), rapid.Float64Range(10, 180).Draw(t, "up to")
		type key [3]int
		want := map[key]float64{}
		for i := range 60 {
			for j := range 60 {
				for k := range 60 {
					x, y, z := float64(i)/b.Length, float64(j)/b.Width, float64(k)/b.Height
					if hz := 343.0 / 2 * math.Sqrt(x*x+y*y+z*z); hz <= upTo && i+j+k > 0 {
						want[key{i, j, k}] = hz
					}
				}
			}
		}
		got := b.Modes(343, upTo)
		if len(got) != len(want) {
			t.Fatalf("%v up to %g Hz: %d modes, the loop finds %d", b, upTo, len(got), len(want))
		}
		for _, m := range got {
			if hz, ok := want[m.Order]; !ok || !near(hz, m.Hz, 1e-12) {
				t.Fatalf("%v at %v Hz, the loop has %v", m, m.Hz, hz)
			}
		}
		if !slices.IsSortedFunc(got, byFrequency) {
			t.Fatal("the modes are not in order")
		}
	})
}

func TestModesScaleAndPermute(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		b, k := drawBox(t), rapid.Float64Range(0.3, 3).Draw(t, "scale")
		modes := b.Modes(343, 150)
		big := Box{b.Length * k, b.Width * k, b.Height * k}
		for _, m := range modes {
			x := frequency(343, square(m.Order[0], big.Length), square(m.Order[1], big.Width), square(m.Order[2], big.Height))
			if !near(x*k, m.Hz, 1e-12) {
				t.Fatalf("scaled by %v, %v moves from %v to %v Hz", k, m, m.Hz, x)
			}
		}
		turned := Box{b.Height, b.Length, b.Width}.Modes(343, 150)
		if len(turned) != len(modes) {
			t.Fatalf("%d modes, turned %d", len(modes), len(turned))
		}
		for i := range modes {
			if turned[i].Hz != modes[i].Hz {
				t.Fatalf("mode %d: %v Hz, turned %v", i, modes[i].Hz, turned[i].Hz)
			}
		}
	})
}

func square(n int, l float64) float64 { q := float64(n) / l; return q * q }

func TestCubicRoom(t *testing.T) {
	modes := Box{3, 3, 3}.Modes(343, 60)
	for i := range 3 {
		if modes[i].Hz != modes[0].Hz || modes[i].Kind() != Axial {
			t.Errorf("mode %d of a cube is %v at %v Hz", i, modes[i], modes[i].Hz)
		}
	}
}

func TestKindNormAndString(t *testing.T) {
	for _, c := range []struct {
		order [3]int
		kind  Kind
		norm  float64
	}{{[3]int{2, 0, 0}, Axial, 0.5}, {[3]int{0, 1, 3}, Tangential, 0.25}, {[3]int{1, 1, 1}, Oblique, 0.125}} {
		var m Mode
		for _, x := range (Box{5, 4, 3}).Modes(343, 250) {
			if x.Order == c.order {
				m = x
			}
		}
		if m.Kind() != c.kind || m.Norm != c.norm {
			t.Errorf("%v is %v with Λ = %v, want %v and %v", c.order, m.Kind(), m.Norm, c.kind, c.norm)
		}
		if want := fmt.Sprintf("(%d,%d,%d)", c.order[0], c.order[1], c.order[2]); m.String() != want {
			t.Errorf("%v prints as %q", c.order, m)
		}
	}
}

// Λ is the mean of ψ² over the room and ∫ψ² dS that over a wall; û the mean of ψ
// over a patch: each against midpoints.
func TestModeMeansAgainstQuadrature(t *testing.T) {
	b := Box{5.3, 3.86, 2.58}
	patch := Patch{Surface: Right, Centre: [2]float64{2.1, 0.9}, Size: [2]float64{1.2, 0.7}}
	const n = 60
	for _, m := range b.Modes(343, 110) {
		var norm, wall, mean float64
		for i := range n {
			for j := range n {
				u, v := (float64(i)+0.5)/n, (float64(j)+0.5)/n
				for k := range n {
					p := Point{u * b.Length, v * b.Width, (float64(k) + 0.5) / n * b.Height}
					norm += b.Value(m, p) * b.Value(m, p) / (n * n * n)
				}
				p := b.OnSurface(Right, u*b.Length, v*b.Height)
				wall += b.Value(m, p) * b.Value(m, p) / (n * n) * b.Area(Right)
				q := b.OnSurface(Right, patch.Centre[0]+(u-0.5)*patch.Size[0], patch.Centre[1]+(v-0.5)*patch.Size[1])
				mean += b.Value(m, q) / (n * n)
			}
		}
		if !near(norm, m.Norm, 1e-9) || !near(wall, b.WallIntegral(m, Right), 1e-9) || math.Abs(mean-b.Mean(m, patch)) > 1e-3 {
			t.Errorf("%v: Λ %v against %v, ∫ψ²dS %v against %v, û %v against %v", m, m.Norm, norm, b.WallIntegral(m, Right), wall, b.Mean(m, patch), mean)
		}
	}
}

func BenchmarkRoomModes(b *testing.B) {
	r := studio(b)
	for b.Loop() {
		r.Modes(800)
	}
}
