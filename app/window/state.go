// Package window is the Fyne window. It shows results and makes edits; it
// computes nothing.
package window

import (
	"slices"

	"stillroom/app/figures"
	"stillroom/app/project"
	"stillroom/app/study"
)

// Selection is what the user has picked; −1 is nothing.
type Selection struct {
	Mode, Absorber, Loudspeaker, Seat int
	// Surface is an acoustics.Surface, −1 for none.
	Surface int
}

// State is the one truth of what the window shows. Regions are given it by
// show(State) and keep nothing of their own that it holds.
type State struct {
	Project project.Project // as edited last
	Result  *study.Result   // nil before the first; may lag behind Project
	Busy    bool            // a study runs
	// Dragging is true while a pointer drags something: the papers' second-order
	// things may wait.
	Dragging bool

	Selection Selection
	Ears      int     // the seat whose levels are shown
	FromHz    float64 // the ruler
	ToHz      float64
	CursorHz  float64             // the common cursor, 0 for none
	Map       bool                // the drawings show the level at the selected mode's frequency
	Off       bool                // what building tolerances make of it is shown
	To78      bool                // the diffuse field ends at 78°
	Kept      []study.AbsorberRow // curves kept for comparison
	Folded    []string            // names of the lanes that are folded
	US        bool                // feet and inches
	Dark      bool
}

// Actions is what a region may ask for. All are called on the UI goroutine.
type Actions struct {
	// Edit puts an edited project in place. Edits with the same non-empty merge
	// key that follow one another are one step of undo; final ends such a run.
	Edit func(label string, p project.Project, mergeKey string, final bool)
	// Select changes the selection.
	Select func(Selection)
	// Ruler zooms and pans the common frequency ruler.
	Ruler func(fromHz, toHz float64)
	// Cursor moves the common cursor; 0 takes it away.
	Cursor func(hz float64)
	// Dragging tells that a pointer drag begins or ends.
	Dragging func(bool)
	// Tune asks for an absorber tuned to the mode of that index.
	Tune func(mode int)
	// Fold folds a lane or folds it out again.
	Fold func(lane string)
	// Keep keeps an absorber's curve for comparison; −1 drops all that is kept.
	Keep func(absorber int)
	// Ears chooses the seat whose levels are shown.
	Ears func(seat int)
}

// offSamples is how many rooms with tolerances the band is worked out from.
const offSamples = 24

// dragCells is how fine the map of the level is while something is dragged.
const dragCells = 14

// options returns how far the study has to go for what the window shows.
func (s State) options() study.Options {
	o := study.Options{Points: 400, ModesToHz: 250, Ringing: !slices.Contains(s.Folded, string(figures.RingingLane))}
	if s.Map {
		o.MapHz, o.MapSeat = s.mapHz(), s.ears()
	}
	if s.To78 {
		o.FieldDeg = 78
	}
	if s.Off && !s.Dragging {
		o.Samples = offSamples
	}
	if s.Dragging {
		o.MapCells, o.Coarse = dragCells, true
	}
	return o
}

// mapHz returns the frequency of the map of the level: the selected mode's, else
// the worst problem's, else the lowest mode's; 0 where none is known yet.
func (s State) mapHz() float64 {
	if s.Result == nil || len(s.Result.Modes) == 0 {
		return 0
	}
	if m := s.Selection.Mode; m >= 0 && m < len(s.Result.Modes) {
		return s.Result.Modes[m].Mode.Hz
	}
	for _, m := range s.Result.Modes {
		if m.Rank == 1 {
			return m.Mode.Hz
		}
	}
	return s.Result.Modes[0].Mode.Hz
}
