package units

import (
	"math"
	"testing"

	"pgregory.net/rapid"
)

func TestLengthsAreWritten(t *testing.T) {
	for _, c := range []struct {
		m      float64
		s      System
		length string
		small  string
	}{
		{5.2, Metric, "5.20 m", "5200 mm"},
		{0.0125, Metric, "0.01 m", "12.5 mm"},
		{5.2, US, "17′ 0 3/4″", "204 3/4″"},
		{0.0254, US, "0′ 1″", "1″"},
		{0.3048 * 12, US, "12′ 0″", "144″"},
		{-0.5, Metric, "−0.50 m", "−500 mm"},
	} {
		if got := Length(c.m, c.s); got != c.length {
			t.Errorf("Length(%g, %d) = %q, want %q", c.m, c.s, got, c.length)
		}
		if got := Small(c.m, c.s); got != c.small {
			t.Errorf("Small(%g, %d) = %q, want %q", c.m, c.s, got, c.small)
		}
	}
}

func TestLengthsAreRead(t *testing.T) {
	for _, c := range []struct {
		text  string
		s     System
		small bool
		want  float64
	}{
		{"5.2", Metric, false, 5.2},
		{"5,2 m", Metric, false, 5.2},
		{"5200 mm", US, false, 5.2},
		{"50", Metric, true, 0.05},
		{"17' 3/4\"", US, false, 17*Foot + 0.75*Inch},
		{"17 ft 3/4 in", Metric, false, 17*Foot + 0.75*Inch},
		{"17′ 0 3/4″", US, false, 17*Foot + 0.75*Inch},
		{"6 1/2\"", US, true, 6.5 * Inch},
		{"6 1/2", US, true, 6.5 * Inch},
		{"12' 6", US, false, 12.5 * Foot},
		{"−0.5 m", Metric, false, -0.5},
	} {
		got, err := ParseLength(c.text, c.s, c.small)
		if err != nil || math.Abs(got-c.want) > 1e-12 {
			t.Errorf("ParseLength(%q) = %v, %v; want %v", c.text, got, err, c.want)
		}
	}
	for _, bad := range []string{"", "m", "5 x", "five", "1/0", "' 3", "1e999999"} {
		if v, err := ParseLength(bad, Metric, false); err == nil {
			t.Errorf("ParseLength(%q) = %v, want an error", bad, v)
		}
	}
}

// What is written in feet and inches is read back to within half a thirty-second
// of an inch, the rounding of the writing.
func TestWrittenLengthsAreReadBack(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		m := rapid.Float64Range(0, 100).Draw(t, "m")
		got, err := ParseLength(Length(m, US), US, false)
		if err != nil || math.Abs(got-m) > Inch/32*1.0001 {
			t.Fatalf("%v written %q and read %v, %v", m, Length(m, US), got, err)
		}
	})
}

func TestNumbersAreRead(t *testing.T) {
	for text, c := range map[string]struct {
		unit string
		want float64
	}{"20": {"°C", 20}, " 2,5 °C": {"°C", 2.5}, "−3 dB": {"dB", -3}, "50 %": {"%", 50}, "-3db": {"dB", -3}, "7": {"", 7}, "1e3 Pa·s/m²": {"Pa·s/m²", 1000}} {
		if got, err := ParseNumber(text, c.unit); err != nil || got != c.want {
			t.Errorf("ParseNumber(%q, %q) = %v, %v; want %v", text, c.unit, got, err, c.want)
		}
	}
	for _, bad := range []string{"", "NaN", "Inf", "x", "1e999", "3 apples", "10 kPa", "dB"} {
		if v, err := ParseNumber(bad, "dB"); err == nil {
			t.Errorf("ParseNumber(%q) = %v, want an error", bad, v)
		}
	}
}

func FuzzParseLength(f *testing.F) {
	f.Add("17' 3/4\"")
	f.Add("5,2 m")
	f.Fuzz(func(t *testing.T, s string) {
		if v, err := ParseLength(s, US, false); err == nil && (math.IsNaN(v) || math.IsInf(v, 0)) {
			t.Fatalf("%q gave %v", s, v)
		}
	})
}

// What the short form would round away keeps its figures, and reads back.
func TestFineLengths(t *testing.T) {
	for _, c := range []struct {
		m          float64
		metric, us string
	}{
		{0.0005, "0.5 mm", "0.02″"}, {0.00025, "0.25 mm", "0.01″"}, {0.006, "6 mm", "1/4″"}, {0.0008, "0.8 mm", "0.031″"}, {0.05, "50 mm", "1 15/16″"}, {0, "0 mm", "0″"},
	} {
		if got := Small(c.m, Metric); got != c.metric {
			t.Errorf("%g m: %q, want %q", c.m, got, c.metric)
		}
		if got := Small(c.m, US); got != c.us {
			t.Errorf("%g m: %q, want %q", c.m, got, c.us)
		}
		for _, s := range []System{Metric, US} {
			if back, err := ParseLength(Small(c.m, s), s, true); err != nil || math.Abs(back-c.m) > 0.1*c.m {
				t.Errorf("%q reads back as %g m, %v", Small(c.m, s), back, err)
			}
		}
	}
}
