package assets

import (
	"math"
	"strings"
	"testing"
)

// Rows of the built-in list against the printed tables they name.
func TestFinishesAgainstTheirSources(t *testing.T) {
	for id, row := range map[string]struct {
		source string
		alpha  map[float64]float64
	}{
		"gypsum-on-studs": {"Everest", map[float64]float64{125: .29, 250: .10, 500: .05, 1000: .04, 2000: .07, 4000: .09}},
		"window-glass":    {"", map[float64]float64{125: .35, 250: .25, 500: .18, 1000: .12, 2000: .07, 4000: .04}},
		"acoustical-tile": {"Everest", map[float64]float64{125: .09, 250: .28, 500: .78, 1000: .84, 2000: .73, 4000: .64}},
		"door-solid":      {"Barron", map[float64]float64{125: .10, 250: .07, 500: .05, 1000: .04, 2000: .04, 4000: .04}},
	} {
		f, ok := FinishByID(id)
		if !ok {
			t.Errorf("no finish %q", id)
			continue
		}
		if !strings.Contains(f.Source, row.source) {
			t.Errorf("%s: source %q, want %q", id, f.Source, row.source)
		}
		for hz, want := range row.alpha {
			if got := f.Coefficient(hz); math.Abs(got-want) > 1e-12 {
				t.Errorf("%s at %g Hz: %v, printed is %v", id, hz, got, want)
			}
		}
	}
}

func TestFinishesAreSourced(t *testing.T) {
	list := Finishes()
	if len(list) < 12 {
		t.Errorf("%d finishes, want 12 or more", len(list))
	}
	for _, f := range list {
		if f.Source == "" || f.Name == "" || len(f.Absorption) < 6 {
			t.Errorf("%s: name %q, source %q, %d bands", f.ID, f.Name, f.Source, len(f.Absorption))
		}
		for i, a := range f.Absorption {
			if i > 0 && a.Hz <= f.Absorption[i-1].Hz {
				t.Errorf("%s: the bands do not rise", f.ID)
			}
		}
	}
	if _, ok := FinishByID("plaster-on-masonry"); !ok {
		t.Error("the default finish is not in the list")
	}
}

func TestReadFinishesRefuses(t *testing.T) {
	const good = `{"id":"a","name":"A","group":"g","source":"s","absorption":{"125":0.1}}`
	if _, err := readFinishes([]byte("[" + good + "]")); err != nil {
		t.Fatal(err)
	}
	for what, data := range map[string]string{
		"an id twice":          "[" + good + "," + good + "]",
		"no source":            strings.Replace("["+good+"]", `"source":"s"`, `"source":""`, 1),
		"a coefficient over 1": strings.Replace("["+good+"]", "0.1", "1.1", 1),
		"a band that is none":  strings.Replace("["+good+"]", `"125"`, `"low"`, 1),
		"broken JSON":          "[" + good,
	} {
		if _, err := readFinishes([]byte(data)); err == nil {
			t.Errorf("a list with %s is read", what)
		}
	}
}

// The usual cautions are all there.
func TestCautions(t *testing.T) {
	var all string
	for _, c := range Cautions() {
		if c.Topic == "" || c.Text == "" {
			t.Errorf("an empty caution: %+v", c)
		}
		all += strings.ToLower(c.Topic + " " + c.Text + " ")
	}
	for _, word := range []string{"dust", "skin", "fire", "load", "asbestos", "ventilation", "electric", "escape", "tool", "code", "licensed"} {
		if !strings.Contains(all, word) {
			t.Errorf("no caution speaks of %q", word)
		}
	}
}

// Whatever is read as a list of finishes, nothing panics, and what is read
// without error keeps the list's rules.
func FuzzReadFinishes(f *testing.F) {
	f.Add(finishesJSON)
	f.Add([]byte(`[{"id":"a","name":"A","group":"g","source":"s","absorption":{"125":0.1,"31.5":0}}]`))
	f.Add([]byte(`[{"id":"a","absorption":{"1e999":null}}]`))
	f.Fuzz(func(t *testing.T, data []byte) {
		list, err := readFinishes(data)
		if err != nil {
			return
		}
		seen := map[string]bool{}
		for _, x := range list {
			if x.ID == "" || seen[x.ID] || x.Source == "" {
				t.Fatalf("%+v is let through", x)
			}
			seen[x.ID] = true
			for _, hz := range []float64{0, 20, 100, 1e4} {
				if a := x.Coefficient(hz); !(a >= 0 && a <= 1) {
					t.Fatalf("%s absorbs %v at %g Hz", x.ID, a, hz)
				}
			}
		}
	})
}
