package window

import (
	"slices"
	"strings"
	"testing"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"

	"stillroom/acoustics"
	"stillroom/app/figures"
	"stillroom/app/project"
	"stillroom/app/study"
)

// The ringing is calculated when its lane is folded out, by its heading.
func TestRingingIsFoldedOut(t *testing.T) {
	h := open(t)
	if h.state.Result.Ringing != nil {
		t.Fatal("the ringing is calculated, though its lane is folded")
	}
	for _, one := range h.lanes.list {
		if one.name == figures.RingingLane {
			at := one.title.Position().AddXY(5, 5)
			h.lanes.MouseDown(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: at}, Button: desktop.MouseButtonPrimary})
		}
	}
	h.until("the ringing is there", func() bool { return h.state.Result.Ringing != nil })
	if slices.Contains(h.settings.Folded, string(figures.RingingLane)) {
		t.Error("the settings still have the lane folded")
	}
	h.cursor(63)
	for _, one := range h.lanes.list {
		if one.name == figures.RingingLane && !strings.Contains(one.reading.Text, "T20") {
			t.Errorf("its reading is %q", one.reading.Text)
		}
	}
}

// The map of the level follows the selected mode, is coarse in a drag and sharp
// after it.
func TestMapFollows(t *testing.T) {
	h := open(t)
	h.switchMap()
	h.selectMode(4)
	at := func() float64 { return h.state.Result.Modes[4].Mode.Hz }
	h.until("the map is of the selected mode", func() bool { p := h.state.Result.Plan; return p != nil && p.Hz == at() })
	fine := h.state.Result.Plan.Columns
	h.dragging(true)
	h.edit("move", h.history.Current().WithSeat(0, project.Seat{ID: "desk", At: acoustics.Point{3, 2, 1.2}}), "drag", false)
	h.until("the map is coarse", func() bool { return h.state.Result.Plan.Columns < fine })
	h.dragging(false)
	h.until("the map is sharp", func() bool { return h.state.Result.Plan.Columns == fine })
	h.switchMap()
	h.until("the map is gone", func() bool { return h.state.Result.Plan == nil })
}

// A long study is stopped by its command: what there is stays, and an edit begins anew.
func TestStudyIsStopped(t *testing.T) {
	h := open(t)
	p := h.history.Current()
	// A wide absorber that resonates takes seconds up to 250 Hz.
	a := project.Absorber{ID: "W", Surface: acoustics.Ceiling, Centre: [2]float64{1.9, 1.9}, Size: [2]float64{2.4, 2.4}, Units: 1}.OfKind("perforated")
	h.edit("a wide absorber", p.AddAbsorber(a), "", true)
	h.until("the levels are there", func() bool { return len(h.state.Result.Absorbers) == 3 && h.state.Busy })
	if h.state.Result.Stage == study.StageTreated {
		t.Fatal("the study is over before it can be stopped: take a wider absorber")
	}
	h.run("Stop calculating")
	h.until("it rests", func() bool { return !h.state.Busy })
	if h.state.Result.Stage == study.StageTreated {
		t.Error("it went on to the end")
	}
	h.run("Undo")
	h.settle()
}
