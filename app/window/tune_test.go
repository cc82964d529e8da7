package window

import (
	"reflect"
	"strings"
	"testing"

	"fyne.io/fyne/v2/test"
	"fyne.io/fyne/v2/widget"

	"stillroom/acoustics"
	"stillroom/app/project"
)

func TestTunerPlacesAnAbsorber(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	h := open(t)
	h.selectMode(0)
	before := h.history.Current()
	h.run("Tune an absorber to this mode…")
	h.until("there are proposals", func() bool { return strings.Contains(h.log.String(), "proposals ") })
	if strings.Contains(h.log.String(), "proposals 0") {
		t.Fatal("nothing is proposed")
	}
	h.answer("Place it")
	after := h.history.Current()
	if len(after.Absorbers) != len(before.Absorbers)+1 || len(after.Validate()) != 0 {
		t.Fatalf("%d absorbers, valid %v", len(after.Absorbers), after.Validate())
	}
	if h.state.Selection.Absorber != len(after.Absorbers)-1 || h.state.Selection.Mode != 0 {
		t.Errorf("selected is %+v", h.state.Selection)
	}
	h.settle()
	h.run("Undo")
	if !reflect.DeepEqual(h.history.Current(), before) {
		t.Error("one undo does not take the absorber away")
	}
}

// A plan's absorbers are placed as one edit; stopped, what there is so far can be.
func TestPlannerPlaces(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	h := open(t)
	p := h.history.Current()
	p.Absorbers = nil
	h.edit("bare", p, "", true)
	h.settle()
	before := h.history.Current()
	h.run("Plan for all problem modes…")
	press := func(text string) {
		t.Helper()
		for _, o := range test.LaidOutObjects(h.win.Canvas().Overlays().Top()) {
			if b, ok := o.(*widget.Button); ok && b.Text == text {
				test.Tap(b)
				return
			}
		}
		t.Fatalf("there is no button %q", text)
	}
	for _, o := range test.LaidOutObjects(h.win.Canvas().Overlays().Top()) {
		if e, ok := o.(*pathEntry); ok && e.Text == "120 Hz" {
			e.SetText("70 Hz")
		}
	}
	press("Plan")
	h.until("the plan is there", func() bool { return strings.Contains(h.log.String(), "plan ") })
	h.answer("Place them")
	after := h.history.Current()
	if len(after.Absorbers) == 0 || len(after.Validate()) != 0 {
		t.Fatalf("%d absorbers, valid %v", len(after.Absorbers), after.Validate())
	}
	h.run("Undo")
	if !reflect.DeepEqual(h.history.Current(), before) {
		t.Error("one undo does not take the plan away")
	}
}

// What the tuner has found stays when it is stopped, and can be placed.
func TestTunerStops(t *testing.T) {
	h := open(t)
	h.selectMode(3)
	h.run("Tune an absorber to this mode…")
	var list *schedule
	for _, o := range test.LaidOutObjects(h.win.Canvas().Overlays().Top()) {
		if s, ok := o.(*schedule); ok {
			list = s
		}
	}
	h.until("there is a first proposal", func() bool { return len(list.rows) > 0 })
	for _, o := range test.LaidOutObjects(h.win.Canvas().Overlays().Top()) {
		if b, ok := o.(*widget.Button); ok && b.Text == "Stop" {
			test.Tap(b)
		}
	}
	h.answer("Place it")
	if n := len(h.history.Current().Absorbers); n != 3 {
		t.Errorf("%d absorbers after placing what was found", n)
	}
}

// The band of tolerances comes and goes with its command, and rests in a drag.
func TestBandOfTolerances(t *testing.T) {
	h := open(t)
	h.run("Band of tolerances")
	h.until("the band is there", func() bool { return h.state.Result.Robustness != nil })
	h.dragging(true)
	p := h.history.Current()
	h.edit("move", p.WithSeat(0, project.Seat{ID: "desk", At: acoustics.Point{3, 2, 1.2}}), "drag", false)
	h.until("the band is left out", func() bool { return h.state.Result.Robustness == nil })
	h.dragging(false)
	h.until("the band is back", func() bool { return h.state.Result.Robustness != nil })
	h.run("Band of tolerances")
	h.until("the band is gone", func() bool { return h.state.Result.Robustness == nil })
}
