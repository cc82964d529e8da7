package resonators

import (
	"encoding/json"
	"math"
	"math/cmplx"
	"os"
	"testing"

	"pgregory.net/rapid"
)

// pair is a complex number as [real, imaginary].
type pair [2]float64

func (p pair) value() complex128 { return complex(p[0], p[1]) }

// besselValues are the check values of testdata/bessel, worked out with 60
// figures by the program beside them.
type besselValues struct {
	// Holes are J1(x)/J0(x) and J2(x)/(x²J0(x)) for x = s·√−j, and the bracket
	// 1 − tanh(y)/y of a slit for y = s·√j.
	Holes []struct {
		S        float64
		Quotient pair `json:"j1_over_j0"`
		Ratio    pair
		Slit     pair
	}
	// Plane is J2(x)/(x²J0(x)) for y = x² anywhere, and by how many times its
	// relative change exceeds that of y.
	Plane []struct {
		Y, Ratio  pair
		Condition float64
	}
	// Zeros are the first of J0, J1 and J2.
	Zeros struct {
		J0 []float64 `json:"0"`
		J1 []float64 `json:"1"`
		J2 []float64 `json:"2"`
	}
}

func readBesselValues(t *testing.T) besselValues {
	t.Helper()
	data, err := os.ReadFile("testdata/bessel/values.json")
	if err != nil {
		t.Fatal(err)
	}
	var v besselValues
	if err := json.Unmarshal(data, &v); err != nil {
		t.Fatal(err)
	}
	if len(v.Holes) < 40 || len(v.Plane) < 20 || len(v.Zeros.J0) < 40 || len(v.Zeros.J1) < 40 || len(v.Zeros.J2) < 40 {
		t.Fatal("values are missing")
	}
	return v
}

const (
	// rounding is the relative rounding of one operation.
	rounding = 1.0 / (1 << 53)
	// fewRoundings is what a backward recurrence or a short series leaves: the
	// errors of its first steps die on the way, those of the last dozen stay.
	fewRoundings = 12 * rounding
)

func near(got, want complex128, tolerance float64) bool {
	return cmplx.Abs(got-want) <= tolerance*cmplx.Abs(want)
}

// The ratios of holes and slits on the ray on which real frequencies lie, from
// the narrowest pores to the widest mouths.
func TestHoleRatiosPublishedDigits(t *testing.T) {
	for _, c := range readBesselValues(t).Holes {
		y := complex(0, -c.S*c.S)
		ratio := besselRatio(y)
		if !near(ratio, c.Ratio.value(), fewRoundings) {
			t.Errorf("s = %g: J2/(x²J0) = %v, want %v", c.S, ratio, c.Ratio)
		}
		// 2J1/(xJ0) = 1 + y·J2/(x²J0) of the recurrence of three orders. For wide
		// holes the two cancel all but 2/s of the 1, and so lose s/2.
		x := cmplx.Sqrt(y)
		if got := x * (1 + y*ratio) / 2; !near(got, c.Quotient.value(), fewRoundings*(1+c.S/2)) {
			t.Errorf("s = %g: J1/J0 by the recurrence %v, want %v", c.S, got, c.Quotient)
		}
		if c.S > hankelFrom {
			if got := hankelQuotient(x); !near(got, c.Quotient.value(), fewRoundings) {
				t.Errorf("s = %g: J1/J0 by Hankel's series %v, want %v", c.S, got, c.Quotient)
			}
		}
		if got := slitBracket(-y); !near(got, c.Slit.value(), fewRoundings) {
			t.Errorf("s = %g: the slit's bracket %v, want %v", c.S, got, c.Slit)
		}
	}
}

// The ratio at damped frequencies and anywhere else, near its poles too.
func TestHoleRatioAnywherePublishedDigits(t *testing.T) {
	for _, c := range readBesselValues(t).Plane {
		if got := besselRatio(c.Y.value()); !near(got, c.Ratio.value(), fewRoundings*(1+c.Condition)) {
			t.Errorf("y = %v: %v, want %v", c.Y, got, c.Ratio)
		}
	}
}

// The poles are the zeros of J0 and the zeros are those of J2; where J1 is zero
// J2/J0 is −1. The first of each by Abramowitz & Stegun, Handbook of
// Mathematical Functions, 1964, table 9.5, from memory, and 40 worked out apart.
func TestHoleRatioPolesAndZeros(t *testing.T) {
	zeros := readBesselValues(t).Zeros
	const tableDigits = 2e-10 // ten decimals, the last of them uncertain from memory
	for i, want := range []float64{2.4048255577, 5.5200781103, 8.6537279129, 11.7915344391, 14.9309177086} {
		if math.Abs(zeros.J0[i]-want) > tableDigits {
			t.Errorf("zero %d of J0: %v, the table has %v", i+1, zeros.J0[i], want)
		}
	}
	for i, want := range []float64{3.8317059702, 7.0155866698, 10.1734681351, 13.3236919363, 16.4706300509} {
		if math.Abs(zeros.J1[i]-want) > tableDigits {
			t.Errorf("zero %d of J1: %v, the table has %v", i+1, zeros.J1[i], want)
		}
	}
	for i, j := range zeros.J0 {
		// Beside a pole J1/(xJ0) is 2/(j²−y) + 1/j² and a term in j²−y, so that
		// the ratio's reciprocal is far/(1 − far·(1 − 2/j²)/y) with far = y·(j²−y)/4
		// but for (δj²)²/4 of it at the relative distance δ.
		const delta = 1e-6
		for _, d := range []float64{delta, -delta} {
			y := j * j * (1 + d)
			far := -y * j * j * d / 4
			want := far / (1 - far*(1-2/(j*j))/y)
			// y itself rounds, of which δ is left.
			if got := 1 / besselRatio(complex(y, 0)); !near(got, complex(want, 0), sq(j*j*delta)/4+fewRoundings/delta) {
				t.Errorf("pole %d, %g beside it: 1/ratio = %v, want %v", i+1, d, got, want)
			}
		}
	}
	for i, j := range zeros.J1 {
		y := complex(j*j, 0)
		// y·ratio + 1 = 2J1/(xJ0) passes zero with the slope 1/y.
		if got := y * besselRatio(y); !near(got, -1, fewRoundings) {
			t.Errorf("zero %d of J1: J2/J0 = %v, want −1", i+1, got)
		}
	}
	for i, j := range zeros.J2 {
		const aside = 1e-13 // relative, some hundred roundings
		below, above := besselRatio(complex(j*j*(1-aside), 0)), besselRatio(complex(j*j*(1+aside), 0))
		if real(below)*real(above) >= 0 {
			t.Errorf("zero %d of J2: the ratio is %v below and %v above", i+1, below, above)
		}
	}
}

// J1(x)/(x·J0(x)) is the sum of its poles, 2·Σ 1/(j_k² − y) over all zeros j_k of
// J0 (Mittag-Leffler; Rayleigh's Σ 1/j_k² = 1/4 at y = 0).
func TestHoleRatioIsTheSumOfItsPoles(t *testing.T) {
	known := readBesselValues(t).Zeros.J0
	// All further zeros by McMahon's expansion (Abramowitz & Stegun 1964, 9.5.12),
	// right to 1e-11 from the fortieth on.
	const terms = 20000
	squares := make([]float64, 0, terms)
	for k := 1; k <= terms; k++ {
		beta := (float64(k) - 0.25) * math.Pi
		e := 1 / (8 * beta)
		j := beta + e - 124.0/3*e*e*e + 120928.0/15*math.Pow(e, 5)
		if k <= len(known) {
			if k > 20 && math.Abs(j-known[k-1]) > 1e-9 {
				t.Fatalf("McMahon's zero %d is %v, not %v", k, j, known[k-1])
			}
			j = known[k-1]
		}
		squares = append(squares, j*j)
	}
	for _, y := range []complex128{
		1e-9, 1, -7, 3 - 4i, 6 - 2i, -80i, 100 - 40i, 300 - 300i, 620 - 100i, 900 - 30i, -2000 - 1i, -2500i,
	} {
		var sum complex128
		for i := len(squares) - 1; i >= 0; i-- { // the small ones first
			sum += 2 / (complex(squares[i], 0) - y)
		}
		// What is left of the sum, by its integral from half a step before.
		sum += complex(2/(math.Pi*math.Pi*(terms+0.25)), 0)
		q := (1 + y*besselRatio(y)) / 2
		// The rest's own y/j⁴ and curvature are below 1e-13; the sum of many
		// terms rounds to about 1e-14.
		if cmplx.Abs(q-sum) > 2e-13+10*rounding*cmplx.Abs(y) {
			t.Errorf("y = %v: J1/(xJ0) = %v, the poles add up to %v", y, q, sum)
		}
	}
}

// J0' = −J1 and J1' = J0 − J1/x make q = J1/(x·J0) obey 2y·q' = 1 − 2q + y·q²
// over y = x²; q' by differences of the fourth order.
func TestHoleRatioDerivative(t *testing.T) {
	q := func(y complex128) complex128 { return (1 + y*besselRatio(y)) / 2 }
	rapid.Check(t, func(t *rapid.T) {
		y := cmplx.Rect(logBetween(t, "|y|", 1e-4, 1e5), rapid.Float64Range(-math.Pi, -0.3).Draw(t, "arg y"))
		h := y * 0.001
		slope := (8*(q(y+h)-q(y-h)) - (q(y+2*h) - q(y-2*h))) / (12 * h)
		// The difference misses h⁴/30 of the fifth derivative. Of one pole's share
		// 2/(j²−y) that is 8·0.001⁴·(|y|/|j²−y|)⁵ of 2y·q', and 0.3 rad from the
		// poles' axis |y|/|j²−y| < 3.4: 3.7e-9 of it. All shares together are less
		// than four times their sum. The rounding of q is 1e-16/0.001 in 2y·q'.
		want := 1 - 2*q(y) + y*q(y)*q(y)
		if got := 2 * y * slope; cmplx.Abs(got-want) > 1.5e-8*cmplx.Abs(q(y))+1e-12 {
			t.Fatalf("y = %v: 2y·q' = %v, want %v", y, got, want)
		}
		if a, b := besselRatio(cmplx.Conj(y)), cmplx.Conj(besselRatio(y)); !near(a, b, fewRoundings) {
			t.Fatalf("y = %v: the mirrored argument has %v, not %v", y, a, b)
		}
	})
}

// A narrow hole of diameter d through a sheet t has the impedance
// 32ηt/d² + jω·4ρt/3, and deviates from it as the next terms of the series in
// s = (d/2)√(ωρ/η) say: s⁴/1152 of the resistance, −s⁴/5760 of the mass. A
// narrow slit b has 12ηt/b² + jω·6ρt/5, with s⁴/525 and −s⁴/4725 for
// s = (b/2)√(ωρ/η).
//
// The limits: Crandall, Theory of Vibrating Systems and Sound, 1926; the next
// terms: by expanding the Bessel functions and the tangent, worked out apart.
func TestNarrowHolesApproachTheirLimits(t *testing.T) {
	const (
		across, sheet = 0.4e-3, 2e-3
		// What follows is smaller by s⁴ times less than 1/500.
		nextTerm = 1.0 / 500
	)
	for _, s := range []float64{0.01, 0.03, 0.1, 0.3, 0.5, 1} {
		w := complex(s*s*testAir.Viscosity/(testAir.Density*sq(across/2)), 0)
		s4 := s * s * s * s
		for _, c := range []struct {
			name                           string
			z                              complex128
			resistance, mass, moreR, lessX float64
		}{
			{"hole", roundPore(w, across/2, testAir) * sheet, 32, 4.0 / 3, 1.0 / 1152, 1.0 / 5760},
			{"slit", slitPore(w, across, testAir) * sheet, 12, 6.0 / 5, 1.0 / 525, 1.0 / 4725},
		} {
			r := real(c.z)/(c.resistance*testAir.Viscosity*sheet/sq(across)) - 1
			x := imag(c.z)/(real(w)*c.mass*testAir.Density*sheet) - 1
			// Roundings of a mass beside a resistance 1/s² as large.
			if math.Abs(r-c.moreR*s4) > nextTerm*s4*s4+fewRoundings {
				t.Errorf("%s, s = %g: resistance %.3e above its limit, want %.3e", c.name, s, r, c.moreR*s4)
			}
			if math.Abs(x+c.lessX*s4) > nextTerm*s4*s4+fewRoundings*(1+8/(s*s)) {
				t.Errorf("%s, s = %g: mass %.3e below its limit, want %.3e", c.name, s, -x, c.lessX*s4)
			}
		}
	}
}

// A wide hole has the resistance (t/d)·√(8ηρω) and as much reactance above jωρt,
// a wide slit (t/b)·√(2ηρω); the resistances deviate by 3/(√2·s) and √2/s of
// that, the reactances by what falls as 1/s².
//
// The limits: Crandall 1926, Ingard 1953; the next terms: from Hankel's series
// J1/J0 ≈ −j·(1 + j/2x) and from tanh y ≈ 1, worked out apart.
func TestWideHolesApproachTheirLimits(t *testing.T) {
	const (
		across, sheet = 20e-3, 6e-3
		// What follows is 1/s² of the limit with a factor of order one: 3/√2 and
		// less by the series carried one term further.
		order = 4.0
	)
	for _, s := range []float64{10, 30, 100, 300, 1000} {
		w := s * s * testAir.Viscosity / (testAir.Density * sq(across/2))
		loss := sheet / across * math.Sqrt(8*testAir.Viscosity*testAir.Density*w)
		for _, c := range []struct {
			name        string
			z           complex128
			limit, more float64
		}{
			{"hole", roundPore(complex(w, 0), across/2, testAir) * sheet, loss, 3 / math.Sqrt2},
			{"slit", slitPore(complex(w, 0), across, testAir) * sheet, loss / 2, math.Sqrt2},
		} {
			r := real(c.z)/c.limit - 1
			x := (imag(c.z)-w*testAir.Density*sheet)/c.limit - 1
			if math.Abs(r-c.more/s) > order/sq(s)+fewRoundings*s {
				t.Errorf("%s, s = %g: resistance %.4e above its limit, want %.4e", c.name, s, r, c.more/s)
			}
			if math.Abs(x) > order/sq(s)+fewRoundings*s {
				t.Errorf("%s, s = %g: reactance of the loss %.4e off its limit", c.name, s, x)
			}
		}
	}
}
