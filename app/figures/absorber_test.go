package figures

import (
	"bytes"
	"flag"
	"image"
	"image/color"
	"image/png"
	"math"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
	"pgregory.net/rapid"

	"stillroom/app/project"
	"stillroom/app/units"
)

var update = flag.Bool("update", false, "write the pictures of the absorbers anew")

// of returns an absorber of a kind with the kind's defaults, changed.
func of(kind string, change func(a *project.Absorber)) project.Absorber {
	a := project.Absorber{ID: "A1", Size: [2]float64{1.2, 0.6}, Units: 1}.OfKind(kind)
	if change != nil {
		change(&a)
	}
	return a
}

// specimens show what each kind can have.
func specimens() map[string]project.Absorber {
	fill := func(mm float64, face bool) *project.Fill {
		return &project.Fill{ThicknessMM: mm, FlowPaSM2: 10_000, AtFace: face}
	}
	return map[string]project.Absorber{
		"neck": of("neck", func(a *project.Absorber) {
			a.Size = [2]float64{0.5, 0.5}
			a.Neck.LengthMM, a.Neck.GauzePaSM, a.Neck.Fill = 120, 40, &project.NeckFill{Share: 0.3, FlowPaSM2: 10_000}
		}),
		"panel": of("panel", func(a *project.Absorber) { a.Panel.Fill = fill(50, false) }),
		"perforated": of("perforated", func(a *project.Absorber) {
			a.Perforated.Fill, a.Perforated.GauzePaSM, a.Perforated.Partitioned = fill(40, true), 200, true
		}),
		"slotted":         of("slotted", func(a *project.Absorber) { a.Slotted.Fill = fill(60, false) }),
		"microperforated": of("microperforated", func(a *project.Absorber) { a.Microperforated.Partitioned = true }),
		"porous":          of("porous", func(a *project.Absorber) { a.Porous.GapMM = 50 }),
	}
}

// The pictures are those looked at when they were last written. Letters and
// slanting edges may come out a shade different on another processor: a pixel
// differs where a channel is off by more than 32 of 255, and 0.1 % may differ,
// less than a dashed line of gauze is.
func TestAbsorberPictures(t *testing.T) {
	const (
		delta = 32
		share = 0.001
	)
	for kind, a := range specimens() {
		s := Paper()
		got := Render(nil, 480, 330, 1, s.Paper, func(c draw.Canvas) { DrawAbsorber(c, a, false, s) })
		name := filepath.Join("testdata", "absorber-"+kind+".png")
		if *update {
			var b bytes.Buffer
			if err := png.Encode(&b, got); err != nil {
				t.Fatal(err)
			}
			if err := os.MkdirAll("testdata", 0o755); err != nil {
				t.Fatal(err)
			}
			if err := os.WriteFile(name, b.Bytes(), 0o644); err != nil {
				t.Fatal(err)
			}
		}
		data, err := os.ReadFile(name)
		if err != nil {
			t.Fatalf("%v: write it with go test ./app/figures -run AbsorberPictures -update, and look at it", err)
		}
		want, err := png.Decode(bytes.NewReader(data))
		if err != nil {
			t.Fatal(err)
		}
		if off := differing(t, got, want, delta); off > share {
			t.Errorf("%s: %.2f %% of the pixels differ, at most %.2f %% may", name, 100*off, 100*share)
		}
	}
}

// differing returns the share of pixels that differ by more than delta.
func differing(t *testing.T, a, b image.Image, delta int) float64 {
	t.Helper()
	if a.Bounds() != b.Bounds() {
		t.Fatalf("the pictures measure %v and %v", a.Bounds(), b.Bounds())
	}
	n, r := 0, a.Bounds()
	for y := r.Min.Y; y < r.Max.Y; y++ {
		for x := r.Min.X; x < r.Max.X; x++ {
			p, q := color.RGBAModel.Convert(a.At(x, y)).(color.RGBA), color.RGBAModel.Convert(b.At(x, y)).(color.RGBA)
			for _, d := range []int{int(p.R) - int(q.R), int(p.G) - int(q.G), int(p.B) - int(q.B)} {
				if d > delta || d < -delta {
					n++
					break
				}
			}
		}
	}
	return float64(n) / float64(r.Dx()*r.Dy())
}

// Sheet, fill and slats are drawn to one scale, upright and across.
func TestAbsorberIsToScale(t *testing.T) {
	s := Paper()
	for _, size := range [][2]vg.Length{{190, 170}, {480, 330}, {500, 150}} {
		a := of("slotted", func(a *project.Absorber) {
			a.Slotted.PanelMM = 30
			a.Slotted.Fill = &project.Fill{ThicknessMM: 50, FlowPaSM2: 10_000}
		})
		c := drawn(a, false, s, size[0]*px, size[1]*px)
		var slat, fill frame
		for _, f := range c.fills {
			w := f.x1 - f.x0
			switch {
			case f.col == s.Ochre && w > slat.x1-slat.x0:
				slat = f.frame
			case w > 0.3*size[0]*px && f.col != s.Ochre:
				fill = f.frame
			}
		}
		scale := (fill.y1 - fill.y0) / 50
		for what, c := range map[string][2]vg.Length{
			"slat's thickness": {slat.y1 - slat.y0, 30}, "slat's width": {slat.x1 - slat.x0, 40}, "cavity": {fill.y1 - slat.y1, 100},
		} {
			if got := c[0] / scale; math.Abs(float64(got-c[1])) > 1e-6 {
				t.Errorf("%v: the %s is %v mm at the fill's scale, not %v", size, what, got, c[1])
			}
		}
	}
}

// Every dimension stands beside the section, in the units asked for.
func TestAbsorberDimensions(t *testing.T) {
	for kind, want := range map[string][2]string{
		"neck":            {"120 mm|18 mm|278.7 mm|314.7 mm|83.6 mm|Ø 100 mm", "11/16″|11″|12 3/8″|3 5/16″|4 3/4″|Ø 3 15/16″"},
		"panel":           {"100 mm|106 mm|50 mm|6 mm", "1 15/16″|1/4″|3 15/16″|4 3/16″"},
		"perforated":      {"100 mm|106 mm|25 mm|40 mm|6 mm|Ø 6 mm", "1 9/16″|1/4″|1″|3 15/16″|4 3/16″|Ø 1/4″"},
		"slotted":         {"100 mm|120 mm|20 mm|40 mm|5 mm|60 mm", "1 9/16″|13/16″|2 3/8″|3 15/16″|3/16″|4 3/4″"},
		"microperforated": {"0.8 mm|100 mm|100.8 mm|Hole Ø 0.5 mm|Pitch 4 mm", "0.031″|3 15/16″|3 15/16″|Hole Ø 0.02″|Pitch 0.157″"},
		"porous":          {"100 mm|150 mm|50 mm", "1 15/16″|3 15/16″|5 7/8″"},
	} {
		for i, us := range []bool{false, true} {
			var got []string
			for _, l := range drawn(specimens()[kind], us, Print(), 190*px, 170*px).letters {
				got = append(got, l.text)
			}
			slices.Sort(got)
			if text := strings.Join(got, "|"); text != want[i] {
				t.Errorf("%s: %s\nwant %s", kind, text, want[i])
			}
		}
	}
}

func TestSmallLengthsKeepTheirMeaning(t *testing.T) {
	for _, c := range []struct {
		mm         float64
		metric, us string
	}{
		{0.05, "0.05 mm", "0.002″"}, {0.25, "0.25 mm", "0.01″"}, {0.8, "0.8 mm", "0.031″"}, {6, "6 mm", "1/4″"},
		{12.5, "12.5 mm", "1/2″"}, {100, "100 mm", "3 15/16″"}, {0, "0 mm", "0″"}, {2000, "2000 mm", "78 3/4″"},
	} {
		if m, us := small(c.mm, units.Metric), small(c.mm, units.US); m != c.metric || us != c.us {
			t.Errorf("%v mm is %q and %q, want %q and %q", c.mm, m, us, c.metric, c.us)
		}
	}
}

// Whatever a file may hold, the section is drawn within the canvas, with every
// dimension, and no letters lie on others, on a line of a dimension or on the
// absorber.
func TestAbsorberOfAnyDimensions(t *testing.T) {
	styles := []Style{Paper(), Night(), Print()}
	rapid.Check(t, func(t *rapid.T) {
		a := anyAbsorber(t)
		w, h := rapid.IntRange(180, 500).Draw(t, "w"), rapid.IntRange(150, 350).Draw(t, "h")
		inOrder(t, a, rapid.Bool().Draw(t, "us"), rapid.SampledFrom(styles).Draw(t, "style"), px*vg.Length(w), px*vg.Length(h))
	})
}

// Those that have gone wrong, or nearly: texts that have no room beside their
// line, a neck longer than its box, a box deep as a shaft, a sheet all hole.
func TestAwkwardAbsorbers(t *testing.T) {
	neck := func(cavity, mouth, length, side float64) project.Absorber {
		return of("neck", func(a *project.Absorber) {
			a.Size = [2]float64{side, side}
			a.Neck.CavityL, a.Neck.MouthDiameterMM, a.Neck.LengthMM = cavity, mouth, length
		})
	}
	for _, a := range []project.Absorber{
		of("slotted", func(a *project.Absorber) {
			a.Size[0], a.Slotted = 50, &project.Slotted{SlatMM: 500.5, SlotMM: 50, PanelMM: 100, CavityMM: 1000.5}
		}),
		of("slotted", func(a *project.Absorber) {
			a.Size[0], a.Slotted = 50, &project.Slotted{SlatMM: 750.2, SlotMM: 2.24, PanelMM: 100, CavityMM: 1000.5}
		}),
		of("perforated", func(a *project.Absorber) { a.Size[0], a.Perforated.HoleMM, a.Perforated.PitchMM = 0.05, 100, 101 }),
		of("microperforated", func(a *project.Absorber) {
			a.Size[0], a.Microperforated = 50, &project.Microperforated{PanelMM: 50.1, HoleMM: 62, PitchMM: 62.6, CavityMM: 6.7}
		}),
		of("panel", func(a *project.Absorber) {
			a.Panel.Fill = &project.Fill{ThicknessMM: 100, FlowPaSM2: 1e4, AtFace: true}
			a.Panel.ThicknessMM = 0.1
		}),
		neck(60, 100, 2000, 1), neck(60, 100, 0, 0.5), neck(5000, 5, 50, 0.01), neck(0.05, 1000, 5, 100),
	} {
		for _, size := range [][2]vg.Length{{180, 150}, {299, 350}, {305, 150}, {500, 350}} {
			for _, us := range []bool{false, true} {
				inOrder(t, a, us, Paper(), size[0]*px, size[1]*px)
			}
		}
	}
}

// inOrder checks a section as drawn on a canvas.
func inOrder(t rapid.TB, a project.Absorber, us bool, s Style, w, h vg.Length) {
	c := drawn(a, us, s, w, h)
	for _, f := range c.all {
		if f.x0 < 0 || f.y0 < 0 || f.x1 > w || f.y1 > h {
			t.Fatalf("%v is painted outside of %v × %v", f, w, h)
		}
	}
	b, _ := builds(a, View{US: us}.system())
	for _, d := range slices.Concat(b.left, b.right) {
		c.holds(t, d.value)
	}
	if b.openings != nil {
		c.holds(t, b.openings.size.value)
		c.holds(t, b.openings.step.value)
	}
	for i, l := range c.letters {
		for _, m := range c.letters[:i] {
			if l.meets(m.frame) {
				t.Fatalf("%q lies on %q: %v, %v", l.text, m.text, l.frame, m.frame)
			}
		}
		for _, f := range slices.Concat(c.fills, c.lines) {
			if f.col != s.Paper && f.col != s.Faint && l.meets(f.frame) {
				t.Fatalf("%q lies on what is drawn: %v, %v", l.text, l.frame, f)
			}
		}
	}
}

// Small canvases and absorbers without a block are survived.
func TestAbsorberWithoutRoomOrBlock(t *testing.T) {
	for _, a := range specimens() {
		for _, size := range []vg.Length{1, 20, 60, 100, 140} {
			for _, f := range drawn(a, true, Paper(), size*px, size*px/2).all {
				if f.x0 < 0 || f.y0 < 0 || f.x1 > size*px || f.y1 > size*px/2 {
					t.Errorf("%s: %v is painted outside of %v", a.Kind, f, size)
				}
			}
		}
		bare := a
		bare.Neck, bare.Panel, bare.Perforated, bare.Slotted, bare.Microperforated, bare.Porous = nil, nil, nil, nil, nil, nil
		if c := drawn(bare, false, Paper(), 200, 150); len(c.letters) > 0 {
			t.Errorf("%s without its block has %d letterings", a.Kind, len(c.letters))
		}
		flat := a
		flat.Size = [2]float64{}
		drawn(flat, false, Paper(), 200, 150)
	}
}

// anyAbsorber draws an absorber of any kind, every number anywhere in its range,
// as even over its decades as over itself.
func anyAbsorber(t *rapid.T) project.Absorber {
	a := of(rapid.SampledFrom(project.Kinds()).Draw(t, "kind"), nil)
	number := func(key string, most float64) float64 {
		r, ok := project.FieldRange("absorbers[]." + key)
		if !ok {
			t.Fatalf("no range for %s", key)
		}
		lo, hi := r.Min, min(r.Max, most)
		u := rapid.Float64Range(0, 1).Draw(t, key)
		if rapid.Bool().Draw(t, "log") && lo > 0 {
			return min(hi, lo*math.Pow(hi/lo, u))
		}
		return lo + (hi-lo)*u
	}
	most := math.Inf(1)
	fill := func(cavity float64) *project.Fill {
		if rapid.Bool().Draw(t, "filled") {
			return &project.Fill{ThicknessMM: number("panel.fill.thickness_mm", cavity), FlowPaSM2: 1e4, AtFace: rapid.Bool().Draw(t, "face")}
		}
		return nil
	}
	gauze := float64(rapid.IntRange(0, 1).Draw(t, "gauze"))
	parted := rapid.Bool().Draw(t, "parted")
	a.Size = [2]float64{number("size_m[]", most), number("size_m[]", most)}
	switch a.Kind {
	case "neck":
		a.Size = [2]float64{max(a.Size[0], 0.02), max(a.Size[1], 0.02)}
		n := project.Neck{CavityL: number("neck.cavity_l", most), LengthMM: number("neck.length_mm", most), GauzePaSM: gauze}
		n.MouthDiameterMM = number("neck.mouth_diameter_mm", 790*min(a.Size[0], a.Size[1]))
		fit := a.Size[0] * a.Size[1] / 2 / (math.Pi / 4e6 * n.MouthDiameterMM * n.MouthDiameterMM)
		n.Mouths = rapid.IntRange(1, int(max(1, min(100, fit)))).Draw(t, "mouths")
		if parted {
			n.Fill = &project.NeckFill{Share: number("neck.fill.share", most), FlowPaSM2: 1e4}
		}
		a.Neck = &n
	case "panel":
		a.Panel.ThicknessMM, a.Panel.CavityMM = number("panel.thickness_mm", most), number("panel.cavity_mm", most)
		a.Panel.Fill = fill(a.Panel.CavityMM)
	case "perforated":
		p := project.Perforated{PanelMM: number("perforated.panel_mm", most), PitchMM: number("perforated.pitch_mm", most), CavityMM: number("perforated.cavity_mm", most), Partitioned: parted, GauzePaSM: gauze}
		p.HoleMM, p.Fill = number("perforated.hole_mm", 0.99*p.PitchMM), fill(p.CavityMM)
		a.Perforated = &p
	case "slotted":
		p := project.Slotted{SlatMM: number("slotted.slat_mm", most), SlotMM: number("slotted.slot_mm", most), PanelMM: number("slotted.panel_mm", most), CavityMM: number("slotted.cavity_mm", most), Partitioned: parted}
		p.Fill = fill(p.CavityMM)
		a.Slotted = &p
	case "microperforated":
		p := project.Microperforated{PanelMM: number("microperforated.panel_mm", most), PitchMM: number("microperforated.pitch_mm", most), CavityMM: number("microperforated.cavity_mm", most), Partitioned: parted}
		p.HoleMM = number("microperforated.hole_mm", 0.99*p.PitchMM)
		a.Microperforated = &p
	case "porous":
		a.Porous.ThicknessMM, a.Porous.GapMM = number("porous.thickness_mm", most), number("porous.gap_mm", most)
		if parted {
			a.Porous.GapMM = 0
		}
	}
	return a
}
