package figures_test

import (
	"bytes"
	"context"
	"image"
	"image/color"
	"math"
	"testing"

	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/figures"
	"stillroom/app/internal/testcase"
	"stillroom/app/project"
	"stillroom/app/study"
)

func studied(t testing.TB, name string) *study.Result {
	t.Helper()
	r, err := study.Run(context.Background(), testcase.Sample(t, name), study.Options{ModesToHz: 250, Ringing: true}, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

// The ruler is one formula: there and back is the same frequency, the ends lie on
// the frame, and equal ratios are equally far.
func TestRuler(t *testing.T) {
	v := figures.View{FromHz: 16, ToHz: 250}
	const w = vg.Length(500)
	f := figures.LaneFrame()
	if got := v.X(16, w); math.Abs(float64(got-f.Left)) > 1e-9 {
		t.Errorf("16 Hz at %v, want %v", got, f.Left)
	}
	if got := v.X(250, w); math.Abs(float64(got-(w-f.Right))) > 1e-9 {
		t.Errorf("250 Hz at %v, want %v", got, w-f.Right)
	}
	if a, b := v.X(40, w)-v.X(20, w), v.X(200, w)-v.X(100, w); math.Abs(float64(a-b)) > 1e-9 {
		t.Errorf("an octave is %v here and %v there", a, b)
	}
	for _, hz := range []float64{17, 63, 249} {
		if got := v.HzAt(v.X(hz, w), w); math.Abs(got-hz) > 1e-9 {
			t.Errorf("%v Hz comes back as %v", hz, got)
		}
	}
}

func TestPlacementThereAndBack(t *testing.T) {
	for _, dims := range [][3]float64{{2, 2, 2}, {5.2, 3.9, 2.6}, {20, 12, 6}, {4, 18, 3}} {
		p := project.New()
		p.Room.Length, p.Room.Width, p.Room.Height = dims[0], dims[1], dims[2]
		const w, h = vg.Length(400), vg.Length(300)
		at := figures.PlanPlacement(p, w, h)
		x, y := at.To(dims[0], dims[1])
		if x > w || y > h || x < 0 || y < 0 {
			t.Errorf("%v: the far corner lies off the sheet at %v, %v", dims, x, y)
		}
		gx, gy := at.From(at.To(1.23, 0.77))
		if math.Abs(gx-1.23) > 1e-9 || math.Abs(gy-0.77) > 1e-9 {
			t.Errorf("%v: 1.23, 0.77 comes back as %v, %v", dims, gx, gy)
		}
	}
}

// Every picture shows something in every format, and the same bytes each time.
func TestPicturesAreWrittenAndRepeat(t *testing.T) {
	r := studied(t, "edit-suite")
	v := figures.DefaultView(r)
	v.Mode = 0
	for _, name := range []string{"modes", "density", "level", "decay", "ringing", "absorption", "plan", "section"} {
		for _, format := range figures.Formats() {
			var a, b bytes.Buffer
			if err := figures.Write(&a, format, name, r, v, figures.Print()); err != nil {
				t.Fatalf("%s as %s: %v", name, format, err)
			}
			if err := figures.Write(&b, format, name, r, v, figures.Print()); err != nil {
				t.Fatal(err)
			}
			if a.Len() < 800 {
				t.Errorf("%s as %s has only %d bytes", name, format, a.Len())
			}
			if format != "pdf" && !bytes.Equal(a.Bytes(), b.Bytes()) {
				t.Errorf("%s as %s differs from one time to the next", name, format)
			}
		}
	}
	if err := figures.Write(&bytes.Buffer{}, "gif", "modes", r, v, figures.Print()); err == nil {
		t.Error("gif is accepted")
	}
	if err := figures.Write(&bytes.Buffer{}, "png", "nothing", r, v, figures.Print()); err == nil {
		t.Error("a lane called nothing is accepted")
	}
}

// A loud mode is drawn darker than one the seat cannot hear.
func TestInkFollowsLevel(t *testing.T) {
	r := studied(t, "edit-suite")
	v := figures.DefaultView(r)
	const w, h = 1400, 240
	img := figures.Render(nil, w, h, 1, figures.Paper().Paper, func(c draw.Canvas) { figures.DrawLane(c, figures.ModesLane, r, v, figures.Paper()) })
	perPixel := vg.Inch / 96
	dark := func(i int) float64 {
		for _, hit := range figures.ModeHits(r, v, w*perPixel, h*perPixel) {
			if hit.Mode == i {
				x := int(float64(hit.X / perPixel))
				y := h - int(float64((hit.Y0+(hit.Y1-hit.Y0)*0.7)/perPixel))
				least := 255.0
				for d := -1; d <= 1; d++ {
					least = math.Min(least, float64(color.GrayModel.Convert(img.At(x+d, y)).(color.Gray).Y))
				}
				return least
			}
		}
		t.Fatalf("mode %d is not in the lane", i)
		return 0
	}
	// (1,0,0) is among the loudest at the seat, (0,1,0) has a node there.
	if loud, still := dark(0), dark(1); loud >= still-40 {
		t.Errorf("the loud mode is %v light, the one at a node %v", loud, still)
	}
}

// The ground is the paper's own colour, by day and by night, in a buffer that is
// new or used.
func TestGroundIsThePaper(t *testing.T) {
	r := studied(t, "edit-suite")
	for name, style := range map[string]figures.Style{"day": figures.Paper(), "night": figures.Night()} {
		style.Laid = true
		var img *image.RGBA
		for range 2 {
			img = figures.Render(img, 300, 120, 1, style.Paper, func(c draw.Canvas) { figures.DrawLane(c, figures.LevelLane, r, figures.DefaultView(r), style) })
			if got, want := img.At(1, 1), color.RGBAModel.Convert(style.Paper); got != want {
				t.Errorf("%s: the ground is %v, the paper %v", name, got, want)
			}
		}
	}
}

func BenchmarkPictures(b *testing.B) {
	r := studied(b, "edit-suite")
	v := figures.DefaultView(r)
	v.Mode = 4
	for _, name := range []string{"modes", "density", "level", "decay", "ringing", "absorption", "plan", "section"} {
		b.Run(name, func(b *testing.B) {
			style := figures.Paper()
			style.Laid = true
			paint, _ := figures.Painter(name, r, v, style)
			img := figures.Render(nil, 700, 200, 1, style.Paper, paint)
			for b.Loop() {
				figures.Render(img, 700, 200, 1, style.Paper, paint)
			}
		})
	}
}
