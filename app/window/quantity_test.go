package window

import (
	"math"
	"testing"

	"stillroom/app/units"
)

// What a field writes it reads back, and what people write beside it.
func TestQuantities(t *testing.T) {
	for _, c := range []struct {
		q       quantity
		v       float64
		metric  string
		us      string
		loosely map[string]float64 // other ways to write it, in metric
	}{
		{lengthM, 5.3, "5.3 m", "17′ 4 11/16″", map[string]float64{"530 cm": 5.3, "5,3": 5.3, "17'": 5.1816}},
		{lengthMM, 116, "116 mm", "4 9/16″", map[string]float64{"11.6 cm": 116, "116": 116, "4 in": 101.6}},
		{massKgM2, 4.5, "4.5 kg/m²", "0.9217 lb/ft²", map[string]float64{"4,5": 4.5, "1 lb/ft²": 4.882428}},
		{shareOfArea, 0.85, "85 %", "85 %", map[string]float64{"85": 0.85, "12.5 %": 0.125}},
		{inUnit("dB", 1), -3, "−3 dB", "−3 dB", map[string]float64{"-3": -3, "−3 dB": -3}},
	} {
		if got := c.q.write(c.v, units.Metric); got != c.metric {
			t.Errorf("%v is written %q, want %q", c.v, got, c.metric)
		}
		if got := c.q.write(c.v, units.US); got != c.us {
			t.Errorf("%v is written %q in US units, want %q", c.v, got, c.us)
		}
		if got, err := c.q.read(c.metric, units.Metric); err != nil || math.Abs(got-c.v) > 1e-9 {
			t.Errorf("%q is read as %v, %v", c.metric, got, err)
		}
		if got, err := c.q.read(c.us, units.US); err != nil || math.Abs(got/c.v-1) > 0.02 {
			t.Errorf("%q is read as %v, %v", c.us, got, err)
		}
		for text, want := range c.loosely {
			if got, err := c.q.read(text, units.Metric); err != nil || math.Abs(got-want) > 1e-6 {
				t.Errorf("%q is read as %v, %v; want %v", text, got, err, want)
			}
		}
	}
	for _, q := range []quantity{lengthM, lengthMM, massKgM2, shareOfArea, perCent} {
		for _, text := range []string{"", "wide", "NaN", "Inf", "1e400", "3 apples"} {
			if v, err := q.read(text, units.Metric); err == nil {
				t.Errorf("%q is read as %v", text, v)
			}
		}
	}
}
