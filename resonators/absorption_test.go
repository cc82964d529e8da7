package resonators

import (
	"math"
	"math/cmplx"
	"testing"

	"stillroom/acoustics"

	"pgregory.net/rapid"
)

// face is a locally reacting face of a constant impedance.
type face complex128

func (f face) Kind() string                                  { return "face" }
func (f face) Specific(complex128, acoustics.Air) complex128 { return complex128(f) }
func (f face) InRoom(_ complex128, s float64, _ acoustics.Air) complex128 {
	return complex128(f) / complex(s, 0)
}
func (f face) Validate() error { return nil }

// Paris 1928 and London 1950, over 90° and over 78°, normalised by sin²: worked
// out apart from this code.
func TestLocalDiffuseLondon(t *testing.T) {
	for _, c := range []struct {
		z                  complex128
		normal, full, less float64
	}{
		{.2, .55556, .404711, .418283}, {.5, .88889, .716900, .738500}, {1, 1, .909645, .931925}, {1.5, .96, .950821, .968911},
		{2, .88889, .938884, .951833}, {3, .75, .868810, .872376}, {5, .55556, .719941, .711065}, {10, .33058, .489064, .468930},
		{20, .18141, .297267, .275513}, {1 + 1i, .8, .781124, .797935}, {2 - 1i, .8, .870452, .880707},
		{1.5 - .5i, .92308, .925208, .942238}, {.5 - 3i, .17778, .224894, .225979}, {5 + 10i, .14706, .237335, .223077},
	} {
		if got := NormalAbsorption(face(c.z), 100, testAir); math.Abs(got-c.normal) > 6e-6 {
			t.Errorf("z = %v: normal α = %.6f, want %.5f", c.z, got, c.normal)
		}
		if got := DiffuseAbsorption(face(c.z), 100, FullField, testAir); math.Abs(got-c.full) > 2e-6 {
			t.Errorf("z = %v: α to 90° = %.7f, want %.6f", c.z, got, c.full)
		}
		if got := DiffuseAbsorption(face(c.z), 100, FieldIncidence, testAir); math.Abs(got-c.less) > 2e-6 {
			t.Errorf("z = %v: α to 78° = %.7f, want %.6f", c.z, got, c.less)
		}
	}
}

// The transfer matrix at each angle by the slow obvious way: the product of the
// layers' matrices, and Paris's integral by midpoints.
func TestExtendedDiffuseAgainstMatrices(t *testing.T) {
	layers := []Absorber{
		Porous{Thickness: 0.05, FlowResistivity: 10000, Gap: 0.05},
		Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 0.1, Fill: &Fill{Thickness: 0.05, FlowResistivity: 10000}},
	}
	rapid.Check(t, func(t *rapid.T) {
		a := layers[rapid.IntRange(0, 1).Draw(t, "kind")]
		hz := rapid.Float64Range(40, 2500).Draw(t, "hz")
		w := omegaOf(hz)
		k0 := w / complex(testAir.SpeedOfSound, 0)
		const n = 3000
		var sum float64
		for i := range n {
			theta := (float64(i) + 0.5) / n * math.Pi / 2
			lateral := k0 * complex(math.Sin(theta), 0)
			matrix := func(m medium, d float64) [2][2]complex128 {
				kz := cmplx.Sqrt(m.k*m.k - lateral*lateral)
				z := m.zc * m.k / kz
				c, s := cmplx.Cos(kz*complex(d, 0)), cmplx.Sin(kz*complex(d, 0))
				return [2][2]complex128{{c, 1i * z * s}, {1i * s / z, c}}
			}
			air, wool := plainAir(w, testAir), mikiFluid(w, 10000, testAir)
			one, two := matrix(wool, 0.05), matrix(air, 0.05)
			front := complex128(0)
			if p, ok := a.(Perforated); ok {
				one, two = two, one
				front = p.front(w, testAir)
			}
			// p = A·p', v = C·p' at the rigid wall.
			pa := one[0][0]*two[0][0] + one[0][1]*two[1][0]
			va := one[1][0]*two[0][0] + one[1][1]*two[1][0]
			z := (front + pa/va) / complex(testAir.Density*testAir.SpeedOfSound, 0) * complex(math.Cos(theta), 0)
			r := cmplx.Abs((z - 1) / (z + 1))
			sum += (1 - r*r) * math.Sin(2*theta) * math.Pi / 2 / n
		}
		if got := DiffuseAbsorption(a, hz, FullField, testAir); math.Abs(got-sum) > 1.5e-4 {
			t.Fatalf("%s at %g Hz: α = %v, by matrices %v", a.Kind(), hz, got, sum)
		}
	})
}

// A third-octave value is the mean over log f of the band, right to 0.002: by
// very many equal log-f midpoints.
func TestThirdOctavesAreLogMeans(t *testing.T) {
	for _, s := range specimens() {
		if s.name == "deep" {
			continue // its comb of modes has a test of its own below
		}
		a := fitted(s.absorber, unitSize)
		thirds := thirdOctaves(a, testAir, FullField)
		for _, i := range []int{0, 4, 7, 11, 15, 20, 24} {
			const n = 300
			var normal, diffuse float64
			for j := range n {
				hz := thirds[i].Hz * math.Pow(10, ((float64(j)+0.5)/n-0.5)/10)
				normal += NormalAbsorption(a, hz, testAir) / n
				if j%10 == 5 {
					diffuse += DiffuseAbsorption(a, hz, FullField, testAir) / (n / 10)
				}
			}
			if math.Abs(normal-thirds[i].Normal) > 1e-3 || math.Abs(diffuse-thirds[i].Diffuse) > 2e-3 {
				t.Errorf("%s, %s Hz: %.4f and %.4f, by midpoints %.4f and %.4f", s.name, thirds[i].Nominal,
					thirds[i].Normal, thirds[i].Diffuse, normal, diffuse)
			}
		}
	}
}

// A cavity of 1 m has a resonance each 172 Hz; nothing may slip between points.
func TestThirdOctavesOfDeepCavity(t *testing.T) {
	var deep Absorber
	for _, s := range specimens() {
		if s.name == "deep" {
			deep = s.absorber
		}
	}
	for _, b := range thirdOctaves(deep, testAir, FullField) {
		if b.Hz < 400 {
			continue
		}
		const n = 20000
		var normal float64
		for j := range n {
			normal += NormalAbsorption(deep, b.Hz*math.Pow(10, ((float64(j)+0.5)/n-0.5)/10), testAir) / n
		}
		if math.Abs(normal-b.Normal) > 1e-3 {
			t.Errorf("%s Hz: %.5f, by %d midpoints %.5f", b.Nominal, b.Normal, n, normal)
		}
	}
}
