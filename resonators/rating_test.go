package resonators

import "testing"

func TestWeightedISO11654(t *testing.T) {
	for _, c := range []struct {
		alpha [5]int
		want  int
		shape string
		from  string
	}{
		{[5]int{35, 70, 65, 60, 55}, 60, "", "ISO 11654:1997, annex A, from memory"},
		{[5]int{35, 100, 65, 60, 55}, 60, "M", "ISO 11654:1997, annex A, second example, from memory"},
		{[5]int{40, 75, 95, 100, 100}, 70, "MH", "by hand: the limit 0.10 is met exactly"},
		{[5]int{80, 85, 50, 30, 25}, 35, "LM", "by hand"},
		{[5]int{100, 100, 100, 100, 100}, 100, "", "by hand: nothing absorbs more"},
		{[5]int{0, 0, 0, 0, 0}, 0, "", "by hand: nothing absorbs less"},
	} {
		if w, shape := weightedHundredths(c.alpha); w != c.want || shape != c.shape {
			t.Errorf("%v: α_w = %d(%s), want %d(%s) (%s)", c.alpha, w, shape, c.want, c.shape, c.from)
		}
	}
}

func TestPracticalISO11654(t *testing.T) {
	// ISO 11654:1997, 4.1, its example of rounding: 0.92 → 0.90, 0.93 → 0.95.
	for _, c := range []struct {
		thirds [3]float64
		want   int
	}{
		{[3]float64{.92, .92, .92}, 90}, {[3]float64{.93, .93, .93}, 95}, {[3]float64{1.1, 1.1, 1.1}, 100},
		{[3]float64{.924, .925, .926}, 95}, // the mean 0.925 rounds to 0.93 first
		{[3]float64{0, 0, .07}, 0}, {[3]float64{.01, .03, .035}, 5},
	} {
		if got := practicalHundredths(c.thirds); got != c.want {
			t.Errorf("%v: %d, want %d", c.thirds, got, c.want)
		}
	}
}
