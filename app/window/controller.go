package window

import (
	"context"
	"fmt"
	"io"
	"strings"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/project"
	"stillroom/app/study"
)

// controller holds the document and the state, gives it to the regions and
// carries out what they ask for. All of it belongs to the UI goroutine.
type controller struct {
	app      fyne.App
	win      fyne.Window
	do       func(func())
	ctx      context.Context // ends with the window
	end      context.CancelFunc
	history  *project.History
	path     string // of the document, "" for none
	state    State
	runner   *runner
	settings *settings
	recovery recovery
	events   io.Writer // the log that tests read; nil for none

	easel     *easel
	drawing   *drawing
	lanes     *lanes
	details   *details
	modes     *schedule
	absorbers *schedule
	criteria  *schedule
	line      *widget.Label // of findings
	mend      *widget.Button
	found     int // which finding the line shows
	judged    int // which criterion is selected
	status    *canvas.Text
	working   *canvas.Text

	outer, inner, lower *container.Split
	tabs                *container.AppTabs
	started             time.Time
	frames              int
	edited              time.Time     // when the project was last submitted
	lag                 time.Duration // from an edit to its levels, last seen
}

// slowStudy is the lag from which a drag shows the drawing without waiting for
// the results that belong to it.
const slowStudy = 60 * time.Millisecond

// newController makes the window's content; do puts functions on the UI
// goroutine.
func newController(a fyne.App, w fyne.Window, s *settings, do func(func())) *controller {
	c := &controller{app: a, win: w, do: do, settings: s, history: project.NewHistory(project.New(), true), started: time.Now(), judged: -1}
	c.ctx, c.end = context.WithCancel(context.Background())
	c.state = State{Selection: Selection{-1, -1, -1, -1, -1}, FromHz: rulerFrom, ToHz: rulerTo, US: s.US, Dark: s.Dark, Folded: s.Folded}
	c.runner = &runner{do: do, show: c.result, busy: c.busy}
	actions := Actions{Edit: c.edit, Select: c.selected, Ruler: c.ruler, Cursor: c.cursor, Dragging: c.dragging, Tune: c.tune, Fold: c.fold, Keep: c.keepCurve, Ears: c.ears}
	c.easel = &easel{do: do}
	c.easel.hung = func() { c.log("frame %d", c.easel.rounds) }
	c.drawing = newDrawing(actions, c.easel)
	c.lanes = newLanes(actions, c.easel)
	c.details = newDetails(actions, c.easel, c)
	c.modes = newSchedule(modeColumns(), c.selectMode)
	c.absorbers = newSchedule(absorberColumns(), func(i int) {
		c.selected(Selection{c.state.Selection.Mode, i, -1, -1, -1})
	})
	c.criteria = newSchedule(criteriaColumns(), c.selectCriterion)
	c.compose()
	return c
}

// compose lays the window out.
func (c *controller) compose() {
	c.line = widget.NewLabel("")
	c.line.Truncation = fyne.TextTruncateEllipsis
	c.mend = widget.NewButton("Tune an absorber to this mode", func() { c.tune(c.state.Selection.Mode) })
	c.mend.Importance = widget.HighImportance
	c.mend.Hide()
	before := widget.NewButton("‹", func() { c.finding(-1) })
	after := widget.NewButton("›", func() { c.finding(1) })
	findings := container.NewBorder(nil, nil, container.NewHBox(before, after), c.mend, c.line)
	c.status, c.working = canvas.NewText("", nil), canvas.NewText("", nil)
	c.status.TextSize, c.working.TextSize = 10.5, 10.5
	foot := container.NewBorder(nil, nil, c.status, c.working)
	c.tabs = container.NewAppTabs(container.NewTabItem("Modes", c.modes), container.NewTabItem("Absorbers", c.absorbers), container.NewTabItem("Criteria", c.criteria))
	c.inner = container.NewHSplit(c.drawing, c.lanes)
	c.lower = container.NewVSplit(c.inner, c.tabs)
	c.outer = container.NewHSplit(c.lower, c.details.root)
	c.inner.Offset, c.lower.Offset, c.outer.Offset = c.settings.Inner, c.settings.Lower, c.settings.Outer
	if !c.settings.Details {
		c.details.root.Hide()
		c.outer.Offset = 1
	}
	c.win.SetContent(container.NewBorder(findings, foot, nil, nil, c.outer))
}

// edit puts an edited project in place.
func (c *controller) edit(label string, p project.Project, key string, final bool) {
	c.history.Do(label, p, key)
	if final {
		c.history.Rest()
	}
	c.keep()
	c.changed()
	c.log("edit %s", label)
}

func (c *controller) undo() {
	if c.history.Undo() {
		c.keep()
		c.changed()
		c.log("undo")
	}
}

func (c *controller) redo() {
	if c.history.Redo() {
		c.keep()
		c.changed()
		c.log("redo")
	}
}

// keep writes unsaved work down against a crash, not at every step of a drag.
func (c *controller) keep() {
	if !c.state.Dragging && c.history.Dirty() {
		c.recovery.keep(c.path, c.history.Current())
	}
}

// forget drops what was kept against a crash.
func (c *controller) forget() { c.recovery.drop() }

// changed shows the document as it stands and has it studied.
func (c *controller) changed() {
	c.state.Project = c.history.Current()
	c.trimSelection()
	c.edited = time.Now()
	c.study()
	if c.state.Dragging {
		// The rest follows with the result, so that the window is painted once.
		c.details.show(c.state)
		if c.lag > slowStudy {
			c.drawing.show(c.state)
		}
		return
	}
	c.title()
	c.refresh()
}

// study asks for what the window shows of the document.
func (c *controller) study() { c.runner.submit(c.state.Project, c.state.options()) }

// trimSelection lets go of what is not there any more.
func (c *controller) trimSelection() {
	s, p := &c.state.Selection, c.state.Project
	if s.Absorber >= len(p.Absorbers) {
		s.Absorber = -1
	}
	if s.Loudspeaker >= len(p.Loudspeakers) {
		s.Loudspeaker = -1
	}
	if s.Seat >= len(p.Seats) {
		s.Seat = -1
	}
	if c.state.Ears >= len(p.Seats) {
		c.state.Ears = 0
	}
}

// result takes a result from the runner.
func (c *controller) result(r *study.Result, err error) {
	if err != nil {
		c.say("This cannot be computed: " + err.Error())
		return
	}
	old := c.state.Result
	c.state.Result = r
	if m := c.state.Selection.Mode; m >= 0 && old != nil && m < len(old.Modes) {
		c.state.Selection.Mode = sameMode(old, r, m)
	}
	c.frames++
	c.lag = time.Since(c.edited)
	if c.state.Dragging {
		c.drawing.show(c.state)
		c.lanes.show(c.state)
		c.showFinding()
		c.schedules()
	} else {
		c.refresh()
	}
	if g := r.Robustness; g != nil && g.Samples < g.Wanted {
		c.working.Text = fmt.Sprintf("tolerances: room %d of %d …  ", g.Samples+1, g.Wanted)
		c.working.Refresh()
	}
	c.log("result stage %d frame %d", r.Stage, c.frames)
	c.places()
}

// sameMode returns the index in a new result of the mode that the old one has at
// m: the same order.
func sameMode(old, r *study.Result, m int) int {
	order := old.Modes[m].Mode.Order
	for i, x := range r.Modes {
		if x.Mode.Order == order {
			return i
		}
	}
	return -1
}

// refresh gives the state to all regions.
func (c *controller) refresh() {
	s := c.state
	if s.Result != nil && !fits(s) {
		// A result of another document's shape: wait for its own.
		s.Result = nil
	}
	c.drawing.show(s)
	c.lanes.show(s)
	c.details.show(s)
	c.schedules()
	c.showFinding()
	style := look{s.Dark}.style()
	c.status.Color, c.working.Color = style.Ink, style.Ink
}

// schedules shows the rows of both schedules.
func (c *controller) schedules() {
	s := c.state
	c.modes.show(modeRows(s), s.Selection.Mode, s.Dark)
	c.absorbers.show(absorberRows(s), s.Selection.Absorber, s.Dark)
	c.criteria.show(criteriaRows(s), c.judged, s.Dark)
}

// fits reports whether a result has what the project's lists ask for.
func fits(s State) bool {
	r := s.Result.Project
	return len(r.Seats) == len(s.Project.Seats) && len(r.Absorbers) == len(s.Project.Absorbers)
}

func (c *controller) selected(s Selection) {
	c.state.Selection = s
	if s.Mode >= 0 && c.state.Result != nil {
		for i, f := range c.state.Result.Findings {
			if f.Mode == s.Mode {
				c.found = i
			}
		}
	}
	c.refresh()
	if c.state.Map {
		c.study()
	}
	c.log("selected mode %d absorber %d loudspeaker %d seat %d", s.Mode, s.Absorber, s.Loudspeaker, s.Seat)
}

func (c *controller) selectMode(i int) {
	c.selected(Selection{i, -1, -1, -1, -1})
}

// selectCriterion says a criterion in full at the foot.
func (c *controller) selectCriterion(i int) {
	c.judged = i
	c.schedules()
	if r := c.state.Result; r != nil && i < len(r.Criteria) {
		x := r.Criteria[i]
		c.say(strings.TrimSpace(x.Title+". "+x.WhatToDo()) + " Source: " + x.Source)
	}
}

func (c *controller) ruler(from, to float64) {
	c.state.FromHz, c.state.ToHz = from, to
	c.lanes.show(c.state)
}

func (c *controller) cursor(hz float64) {
	c.state.CursorHz = hz
	c.lanes.state = c.state
	c.lanes.read()
}

func (c *controller) dragging(on bool) {
	c.state.Dragging = on
	if !on {
		c.keep()
		c.study() // in full, not as previewed
	}
}

func (c *controller) ears(seat int) {
	c.state.Ears = seat
	c.refresh()
	if c.state.Map {
		c.study()
	}
}

// showFinding writes the line of findings.
func (c *controller) showFinding() {
	r := c.state.Result
	if r == nil || len(r.Findings) == 0 {
		c.mend.Hide()
		return
	}
	c.found = max(0, min(c.found, len(r.Findings)-1))
	f := r.Findings[c.found]
	if text := fmt.Sprintf("%d of %d: %s", c.found+1, len(r.Findings), f.Text); text != c.line.Text {
		c.line.SetText(text)
	}
	if c.state.Selection.Mode >= 0 {
		c.mend.Show()
	} else {
		c.mend.Hide()
	}
}

// finding goes to another finding and selects its mode.
func (c *controller) finding(by int) {
	r := c.state.Result
	if r == nil || len(r.Findings) == 0 {
		return
	}
	c.found = (c.found + by + len(r.Findings)) % len(r.Findings)
	if m := r.Findings[c.found].Mode; m >= 0 {
		c.selected(Selection{m, -1, -1, -1, -1})
	}
	c.showFinding()
}

func (c *controller) newDocument() { c.begin(project.New(), "", true) }

// title names the document in the window's frame.
func (c *controller) title() {
	name := "untitled"
	if c.path != "" {
		name = base(c.path)
	}
	if c.history.Dirty() {
		name += " (changed)"
	}
	c.win.SetTitle(name + " – Stillroom")
}

// say writes the status line.
func (c *controller) say(text string) {
	c.status.Text = "  " + text
	c.status.Refresh()
}

// busy shows that a study runs.
func (c *controller) busy(on bool) {
	c.state.Busy = on
	c.working.Text = ""
	if on {
		c.working.Text = "calculating …  "
	}
	c.working.Refresh()
}

// background runs work off the UI goroutine and hands its error back on it.
func (c *controller) background(work func() error, done func(error)) {
	go func() {
		err := work()
		c.do(func() {
			if c.ctx.Err() == nil {
				done(err)
			}
		})
	}()
}
