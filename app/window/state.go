// Package window is the Fyne window. It shows results and makes edits; it
// computes nothing.
package window

import (
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
	CursorHz  float64 // the common cursor, 0 for none
	US        bool    // feet and inches
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
	// Ears chooses the seat whose levels are shown.
	Ears func(seat int)
}
