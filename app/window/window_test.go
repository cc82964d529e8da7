package window

import (
	"bytes"
	"math"
	"os"
	"path/filepath"
	"reflect"
	"slices"
	"strings"
	"testing"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/test"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/figures"
	"stillroom/app/project"
	"stillroom/samples"
)

// hand drives the window without a display. Functions for the UI goroutine wait
// in a queue that the test works off, so that nothing runs beside it.
type hand struct {
	*controller
	t     *testing.T
	queue chan func()
	log   bytes.Buffer
}

func open(t *testing.T) *hand {
	t.Helper()
	h := &hand{t: t, queue: make(chan func(), 100_000)}
	a := test.NewTempApp(t)
	a.Settings().SetTheme(look{})
	w := a.NewWindow("test")
	h.controller = newController(a, w, defaultSettings(), func(f func()) { h.queue <- f })
	h.events = &h.log
	h.recovery = recovery{path: filepath.Join(t.TempDir(), "unsaved.json")}
	h.menus()
	w.Resize(fyne.NewSize(1280, 800))
	if err := h.sample("edit-suite"); err != nil {
		t.Fatal(err)
	}
	t.Cleanup(func() { h.end(); h.runner.stop(); w.Close() })
	h.settle()
	return h
}

// until works the queue off until something is so.
func (h *hand) until(what string, so func() bool) {
	h.t.Helper()
	late := time.After(2 * time.Minute)
	for !so() {
		select {
		case f := <-h.queue:
			f()
		case <-late:
			h.t.Fatalf("waited in vain until %s\n%s", what, h.log.String())
		}
	}
}

// settle waits until the document as it stands is studied whole and drawn.
func (h *hand) settle() {
	h.t.Helper()
	h.until("all is studied and drawn", func() bool {
		r := h.state.Result
		return r != nil && r.Stage == 3 && reflect.DeepEqual(r.Project, h.history.Current()) && !h.easel.busy && len(h.queue) == 0
	})
}

// field returns the field of a name in the details.
func (h *hand) field(name string) *field {
	h.t.Helper()
	for _, f := range h.details.fields {
		if f.name.Text == name {
			return f
		}
	}
	h.t.Fatalf("no field %q", name)
	return nil
}

// typed puts a text into a field as typing and Enter would.
func (h *hand) typed(name, text string) *field {
	h.t.Helper()
	f := h.field(name)
	h.win.Canvas().Focus(f)
	f.SetText("")
	test.Type(f, text)
	f.TypedKey(&fyne.KeyEvent{Name: fyne.KeyReturn})
	return f
}

func at(x, y float32) fyne.PointEvent { return fyne.PointEvent{Position: fyne.NewPos(x, y)} }

func press(d *drawing, p fyne.Position) {
	d.MouseDown(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: p}, Button: desktop.MouseButtonPrimary})
}

// drag takes hold at a place of the drawing and moves in steps.
func (h *hand) drag(from fyne.Position, dx, dy float32, steps int) {
	d := h.drawing
	press(d, from)
	for i := 1; i <= steps; i++ {
		p := fyne.NewPos(from.X+dx*float32(i)/float32(steps), from.Y+dy*float32(i)/float32(steps))
		d.Dragged(&fyne.DragEvent{PointEvent: fyne.PointEvent{Position: p}, Dragged: fyne.NewDelta(dx/float32(steps), dy/float32(steps))})
	}
	d.DragEnd()
}

// run carries out a command by its label, as menu and shortcut do.
func (h *hand) run(label string) {
	h.t.Helper()
	for _, x := range h.commands() {
		if x.label == label {
			h.guard(x)()
			return
		}
	}
	h.t.Fatalf("no command %q", label)
}

// answer presses a button of the dialog that is open.
func (h *hand) answer(text string) {
	h.t.Helper()
	top := h.win.Canvas().Overlays().Top()
	if top == nil {
		h.t.Fatal("no dialog is open")
	}
	for _, o := range test.LaidOutObjects(top) {
		if b, ok := o.(*answerButton); ok && b.Text == text {
			b.OnTapped()
			return
		}
	}
	h.t.Fatalf("the dialog has no answer %q", text)
}

func TestTypingALengthEditsTheRoom(t *testing.T) {
	h := open(t)
	h.typed("Length", "5,45 m")
	if got := h.history.Current().Room.Length; got != 5.45 {
		t.Fatalf("the length is %v", got)
	}
	h.settle()
	if got := h.state.Result.Modes[0].Mode.Hz; math.Abs(got-h.state.Result.Air.SpeedOfSound/(2*5.45)) > 1e-9 {
		t.Errorf("the first mode is at %v Hz", got)
	}
	if h.history.Undoable() != "change length" || !h.history.Dirty() {
		t.Errorf("undo is %q, dirty %v", h.history.Undoable(), h.history.Dirty())
	}
	// Feet and inches in one field, the other units still understood.
	h.typed("Length", "18 ft")
	if got := h.history.Current().Room.Length; math.Abs(got-5.4864) > 1e-9 {
		t.Errorf("18 ft are %v m", got)
	}
	h.typed("Height", "260 cm")
	if got := h.history.Current().Room.Height; got != 2.6 {
		t.Errorf("260 cm are %v m", got)
	}
}

func TestErrorsStandBesideTheirFields(t *testing.T) {
	h := open(t)
	before := h.history.Current()
	for text, want := range map[string]string{"0.2 m": "between", "long": "length", "101": "between"} {
		f := h.typed("Length", text)
		if !f.fault.Visible() || !strings.Contains(f.fault.Text, want) {
			t.Errorf("%q: the error is %q", text, f.fault.Text)
		}
	}
	if !reflect.DeepEqual(before, h.history.Current()) {
		t.Error("a wrong entry changed the project")
	}
	f := h.field("Length")
	f.TypedKey(&fyne.KeyEvent{Name: fyne.KeyEscape})
	if f.fault.Visible() || f.Text != "5.3 m" {
		t.Errorf("Esc leaves %q and the error %q", f.Text, f.fault.Text)
	}
	// A number that is none is refused, not taken as zero.
	h.selected(Selection{-1, 0, -1, -1, -1})
	for _, text := range []string{"NaN", "1e999", "", "-4"} {
		if f := h.typed("Gauze", text); !f.fault.Visible() {
			t.Errorf("gauze %q is accepted", text)
		}
	}
}

func TestArrowKeysStepAFieldAsOneUndo(t *testing.T) {
	h := open(t)
	f := h.field("Length")
	h.win.Canvas().Focus(f)
	for range 5 {
		f.TypedKey(&fyne.KeyEvent{Name: fyne.KeyUp})
	}
	if got := h.history.Current().Room.Length; got != 5.35 {
		t.Errorf("five steps lead to %v m", got)
	}
	h.run("Undo")
	if got := h.history.Current().Room.Length; got != 5.3 {
		t.Errorf("one undo leads to %v m", got)
	}
}

func TestDraggingALoudspeakerIsOneStep(t *testing.T) {
	h := open(t)
	before := h.history.Current()
	l := before.Loudspeakers[0]
	from := h.drawing.position(0, l.At[0], l.At[1])
	metre := h.drawing.position(0, 1, 0).X - h.drawing.position(0, 0, 0).X
	h.drag(from, metre/2, 0, 20)
	got := h.history.Current().Loudspeakers[0].At
	if math.Abs(got[0]-(l.At[0]+0.5)) > 0.0051 || got[1] != l.At[1] {
		t.Errorf("half a metre leads from %v to %v", l.At, got)
	}
	if r := math.Round(got[0]*100) / 100; math.Abs(r-got[0]) > 1e-9 {
		t.Errorf("%v m is not on the centimetre", got[0])
	}
	if h.state.Dragging {
		t.Error("the drag has not ended")
	}
	h.settle()
	h.run("Undo")
	if !reflect.DeepEqual(h.history.Current(), before) || h.history.Undoable() != "" {
		t.Errorf("one undo does not take the drag back: %q is left", h.history.Undoable())
	}
	h.run("Redo")
	if h.history.Current().Loudspeakers[0].At != got {
		t.Error("redo does not bring it back")
	}
	h.settle()
}

func TestDraggingWalls(t *testing.T) {
	h := open(t)
	p := h.history.Current()
	metre := h.drawing.position(0, 1, 0).X - h.drawing.position(0, 0, 0).X
	h.drag(h.drawing.position(0, p.Room.Length, p.Room.Width*0.6), -metre*0.3, 0, 10)
	if got := h.history.Current().Room.Length; math.Abs(got-5.0) > 0.006 {
		t.Errorf("the back wall 0.3 m forward leaves a length of %v", got)
	}
	h.settle()
	q := h.history.Current()
	h.drag(h.drawing.position(0, 0, q.Room.Width*0.9), -metre*0.2, 0, 10)
	after := h.history.Current()
	if d := after.Room.Length - q.Room.Length; math.Abs(d-0.2) > 0.006 {
		t.Errorf("the front wall 0.2 m outward changes the length by %v", d)
	}
	// Everything keeps its place before the far wall.
	if d := after.Seats[0].At[0] - q.Seats[0].At[0]; math.Abs(d-0.2) > 0.006 {
		t.Errorf("the seat moves by %v with the front wall", d)
	}
	h.settle()
	// The ceiling, in the section.
	h.drag(h.drawing.position(1, 2.0, after.Room.Height), 0, -metre*0.1, 10)
	if got := h.history.Current().Room.Height; got <= after.Room.Height {
		t.Errorf("the ceiling moved up leaves %v m of %v", got, after.Room.Height)
	}
}

func TestEscTakesADragBack(t *testing.T) {
	h := open(t)
	before := h.history.Current()
	s := before.Seats[0]
	d := h.drawing
	from := d.position(0, s.At[0], s.At[1])
	press(d, from)
	d.Dragged(&fyne.DragEvent{PointEvent: at(from.X+50, from.Y)})
	d.pace.flush()
	if reflect.DeepEqual(h.history.Current(), before) {
		t.Fatal("the drag does nothing")
	}
	d.TypedKey(&fyne.KeyEvent{Name: fyne.KeyEscape})
	d.Dragged(&fyne.DragEvent{PointEvent: at(from.X+70, from.Y)})
	d.DragEnd()
	if !reflect.DeepEqual(h.history.Current(), before) || h.history.Dirty() {
		t.Error("Esc does not take the drag back")
	}
}

func TestArrowKeysNudge(t *testing.T) {
	h := open(t)
	seat := h.history.Current().Seats[0].At
	press(h.drawing, h.drawing.position(0, seat[0], seat[1]))
	h.drawing.MouseUp(nil)
	if h.state.Selection.Seat != 0 {
		t.Fatalf("selected is %+v", h.state.Selection)
	}
	for _, k := range []fyne.KeyName{fyne.KeyRight, fyne.KeyRight, fyne.KeyUp, fyne.KeyPageUp} {
		h.drawing.TypedKey(&fyne.KeyEvent{Name: k})
	}
	got := h.history.Current().Seats[0].At
	for i, want := range [3]float64{seat[0] + 0.02, seat[1] + 0.01, seat[2] + 0.01} {
		if math.Abs(got[i]-want) > 1e-9 {
			t.Errorf("nudged to %v from %v", got, seat)
		}
	}
	h.run("Undo")
	if h.history.Current().Seats[0].At != seat {
		t.Error("nudges that follow one another are not one step")
	}
}

// A mode that is selected in one region is selected in all.
func TestSelectionEverywhere(t *testing.T) {
	h := open(t)
	want := 3
	v := h.state.view()
	// In the lanes, by a click on its bar.
	var lane *lane
	for _, one := range h.lanes.list {
		if one.name == figures.ModesLane {
			lane = one
		}
	}
	size := lane.pic.Size()
	var hit figures.ModeHit
	for _, x := range figures.ModeHits(h.state.Result, v, vgOf(h.lanes.Size().Width), vgOf(size.Height)) {
		if x.Mode == want {
			hit = x
		}
	}
	p := fyne.NewPos(float32(hit.X/unit), lane.pic.Position().Y+size.Height-float32((hit.Y0+hit.Y1)/2/unit))
	h.lanes.MouseUp(&desktop.MouseEvent{PointEvent: fyne.PointEvent{Position: p}})
	h.selectedEverywhere(want)
	// In the schedule, by a click on its row.
	h.modes.MouseDown(&desktop.MouseEvent{PointEvent: at(40, rowHeight*2.5)})
	h.selectedEverywhere(1)
	// By the arrow keys of either.
	h.modes.TypedKey(&fyne.KeyEvent{Name: fyne.KeyDown})
	h.selectedEverywhere(2)
	h.lanes.TypedKey(&fyne.KeyEvent{Name: fyne.KeyLeft})
	h.selectedEverywhere(1)
	// An edit leaves the same mode selected by its order, wherever it now stands.
	order := h.state.Result.Modes[1].Mode.Order
	h.typed2(1, "6.4 m")
	h.settle()
	if got := h.state.Result.Modes[h.state.Selection.Mode].Mode.Order; got != order {
		t.Errorf("after an edit %v is selected, before it %v", got, order)
	}
}

// typed2 changes a dimension without the details' form, which shows a mode.
func (h *hand) typed2(axis int, text string) {
	h.t.Helper()
	v, err := lengthM.read(text, h.state.system())
	if err != nil {
		h.t.Fatal(err)
	}
	h.edit("change", h.history.Current().WithDimension(axis, v, false), "", true)
}

func (h *hand) selectedEverywhere(mode int) {
	h.t.Helper()
	if h.state.Selection.Mode != mode || h.modes.chosen != mode || h.lanes.state.Selection.Mode != mode ||
		h.drawing.state.Selection.Mode != mode || h.details.about != (subject{"mode", mode}) {
		h.t.Errorf("mode %d: state %d, schedule %d, lanes %d, drawing %d, details %+v", mode, h.state.Selection.Mode, h.modes.chosen,
			h.lanes.state.Selection.Mode, h.drawing.state.Selection.Mode, h.details.about)
	}
	if h.mend.Hidden {
		h.t.Error("no step is offered for the mode that is selected")
	}
}

// Edits while a study runs: the latest wins, and what is shown belongs together.
func TestLatestEditWins(t *testing.T) {
	h := open(t)
	for i := range 30 {
		h.typed2(0, shortest(4+float64(i)/10)+" m")
	}
	h.settle()
	if got := h.state.Result.Project.Room.Length; math.Abs(got-6.9) > 1e-9 {
		t.Errorf("the last of thirty edits is 6.9 m, the result has %v", got)
	}
	if strings.Count(h.log.String(), "result stage 3") > 25 {
		t.Error("every stale edit was studied to its end")
	}
}

func TestSaveOpenAndUnsavedChanges(t *testing.T) {
	h := open(t)
	file := filepath.Join(t.TempDir(), "mine")
	h.typed("Length", "5.45 m")
	h.run("Save")
	entry := h.win.Canvas().Focused().(*pathEntry)
	entry.SetText(file)
	h.answer("Save")
	p, err := project.Load(file + ".stillroom")
	if err != nil || p.Room.Length != 5.45 || h.history.Dirty() {
		t.Fatalf("saved: %v, length %v, dirty %v", err, p.Room.Length, h.history.Dirty())
	}
	if !strings.Contains(h.win.Title(), "mine.stillroom") || strings.Contains(h.win.Title(), "changed") {
		t.Errorf("the title is %q", h.win.Title())
	}
	// What is typed but not yet entered is not lost by a command.
	f := h.field("Width")
	h.win.Canvas().Focus(f)
	f.SetText("4 m")
	h.run("Save")
	if p, _ := project.Load(file + ".stillroom"); p.Room.Width != 4 {
		t.Errorf("saved is a width of %v, typed was 4 m", p.Room.Width)
	}
	// Unsaved work is asked about; cancelling keeps it, discarding drops it.
	h.typed("Width", "4.2 m")
	h.run("New")
	h.answer("Cancel")
	if h.history.Current().Room.Width != 4.2 {
		t.Error("cancel lost the work")
	}
	h.run("New")
	h.answer("Discard")
	if h.path != "" || h.history.Current().Room.Width == 4.2 {
		t.Error("no new document")
	}
	h.settle()
	h.open(file + ".stillroom")
	h.settle()
	if h.state.Project.Room.Width != 4 {
		t.Errorf("opened is a width of %v", h.state.Project.Room.Width)
	}
	// Save on the way: the question's first answer.
	h.typed("Width", "4.4 m")
	h.run("New")
	h.answer("Save")
	if p, _ := project.Load(file + ".stillroom"); p.Room.Width != 4.4 || h.path != "" {
		t.Errorf("saved on the way: width %v, document %q", p.Room.Width, h.path)
	}
	// A file with errors is told of, and nothing changes.
	if err := os.WriteFile(file, []byte(`{"stillroom": 1}`), 0o600); err != nil {
		t.Fatal(err)
	}
	kept := h.history.Current()
	h.open(file)
	if !strings.Contains(h.log.String(), "room: is required") || !reflect.DeepEqual(kept, h.history.Current()) {
		t.Error("a broken file is not told of")
	}
	h.answer("Close")
}

func TestUnsavedWorkSurvives(t *testing.T) {
	h := open(t)
	h.typed("Length", "5.77 m")
	path, p, ok := h.recovery.found()
	if !ok || path != "" || p.Room.Length != 5.77 {
		t.Fatalf("kept: %v, %q, length %v", ok, path, p.Room.Length)
	}
	h.offer(path, p)
	h.answer("Recover")
	if h.history.Current().Room.Length != 5.77 || !h.history.Dirty() {
		t.Error("the recovered work is not there as unsaved work")
	}
	h.run("New")
	h.answer("Discard")
	if _, _, ok := h.recovery.found(); ok {
		t.Error("what was discarded is still kept")
	}
}

func TestExportWritesTheSet(t *testing.T) {
	h := open(t)
	pdf := filepath.Join(t.TempDir(), "set.pdf")
	h.run("Export sheets…")
	h.win.Canvas().Focused().(*pathEntry).SetText(pdf)
	h.answer("Export")
	h.until("the set is written", func() bool { return strings.Contains(h.log.String(), "exported") })
	if data, _ := os.ReadFile(pdf); !bytes.HasPrefix(data, []byte("%PDF")) {
		t.Error("the set is no PDF")
	}
}

// Commands do nothing under a dialog, nor where they are not enabled.
func TestCommandsAreGuarded(t *testing.T) {
	h := open(t)
	before := h.history.Current()
	h.run("Undo")
	h.run("Remove what is selected")
	h.run("Tune an absorber to this mode…")
	if h.win.Canvas().Overlays().Top() != nil || !reflect.DeepEqual(before, h.history.Current()) {
		t.Error("a command that is not enabled did something")
	}
	h.typed("Length", "5.5 m")
	h.run("New")
	h.run("Undo")
	if h.history.Current().Room.Length != 5.5 {
		t.Error("undo went on under a dialog")
	}
	h.answer("Cancel")
}

// In a field, undo is the field's own while it holds what is not yet entered.
func TestUndoInAField(t *testing.T) {
	h := open(t)
	h.typed("Length", "5.5 m")
	f := h.field("Length")
	h.win.Canvas().Focus(f)
	test.Type(f, "7")
	h.run("Undo")
	if h.history.Current().Room.Length != 5.5 {
		t.Error("undo in a field took the document back")
	}
}

func TestRemoveAndAdd(t *testing.T) {
	h := open(t)
	h.selected(Selection{-1, 1, -1, -1, -1})
	h.run("Remove what is selected")
	if n := len(h.history.Current().Absorbers); n != 1 {
		t.Fatalf("%d absorbers are left", n)
	}
	h.settle()
	h.selected(Selection{-1, -1, -1, 0, -1})
	h.run("Remove what is selected")
	if len(h.history.Current().Seats) != 1 {
		t.Error("the only seat was removed")
	}
	h.details.addAbsorber()
	h.details.addLoudspeaker()
	h.details.addSeat()
	p := h.history.Current()
	if len(p.Absorbers) != 2 || len(p.Loudspeakers) != 3 || len(p.Seats) != 2 || len(p.Validate()) != 0 {
		t.Errorf("added: %d absorbers, %d loudspeakers, %d seats, %v", len(p.Absorbers), len(p.Loudspeakers), len(p.Seats), p.Validate())
	}
	h.settle()
}

// Every form of every kind and thing shows its fields with units, and each of
// them takes its own value back unchanged.
func TestEveryFormTakesItsOwnValues(t *testing.T) {
	h := open(t)
	p := h.history.Current()
	size := [2]float64{0.5, 0.5}
	for i, kind := range project.Kinds() {
		a := project.Absorber{ID: "K" + kind, Surface: 5, Centre: [2]float64{0.5 + 0.6*float64(i), 3}, Size: size, Units: 1}.OfKind(kind)
		p = p.AddAbsorber(a)
	}
	if errs := p.Validate(); len(errs) > 0 {
		t.Fatal(errs)
	}
	h.edit("add all kinds", p, "", true)
	h.settle()
	for _, us := range []bool{false, true} {
		if h.state.US != us {
			h.switchUnits()
		}
		for i := range h.details.names {
			h.details.chooser.SetSelectedIndex(i)
			before := h.history.Current()
			for _, f := range h.details.fields {
				h.win.Canvas().Focus(f)
				f.finish()
				text := f.Text
				f.SetText(text + " ")
				f.finish()
				if f.fault.Visible() {
					t.Errorf("%s, %q: its own value %q is refused: %s", h.details.chooser.Selected, f.name.Text, text, f.fault.Text)
				}
			}
			if !us && !reflect.DeepEqual(before, h.history.Current()) {
				t.Errorf("%s: looking at it changed the project", h.details.chooser.Selected)
			}
		}
	}
}

// The units of a person are lossless: switching there and back, or committing a
// field unchanged, moves nothing.
func TestUnitsAreLossless(t *testing.T) {
	h := open(t)
	before := h.history.Current()
	h.run("Feet and inches")
	if got := h.field("Length").Text; !strings.Contains(got, "′") {
		t.Errorf("the length reads %q", got)
	}
	h.run("Feet and inches")
	if !reflect.DeepEqual(before, h.history.Current()) || h.history.Dirty() {
		t.Error("switching units changed the project")
	}
}

func TestScheduleSortsAndReveals(t *testing.T) {
	h := open(t)
	s := h.modes
	column := slices.IndexFunc(s.columns, func(c scheduleColumn) bool { return c.head == "T60 s" })
	s.sortBy(column)
	for i := 1; i < len(s.rows); i++ {
		if s.rows[i].keys[column] < s.rows[i-1].keys[column] {
			t.Fatal("the rows do not rise")
		}
	}
	s.sortBy(column)
	if s.rows[0].keys[column] < s.rows[len(s.rows)-1].keys[column] {
		t.Error("the second time they do not fall")
	}
	s.sortBy(column)
	if s.rows[0].item != 0 {
		t.Error("the third time they are not as given")
	}
	// Ranks: what has none comes last, both ways.
	s.sortBy(0)
	if s.rows[0].cells[0] != "1" {
		t.Errorf("the first by rank has %q", s.rows[0].cells[0])
	}
	s.sortBy(0)
	if s.rows[0].cells[0] == "" {
		t.Error("falling, the modes that are no problem come first")
	}
	h.selectMode(len(h.state.Result.Modes) - 1)
	if i := s.index(); float32(i)*rowHeight < s.top || float32(i+1)*rowHeight > s.top+s.Size().Height {
		t.Error("what is selected elsewhere is not scrolled into view")
	}
}

func TestRulerZoomsAboutThePointerAndKeepsItsLimits(t *testing.T) {
	from, to := zoom(16, 250, 63, 0.5)
	if share := math.Log(63/from) / math.Log(to/from); math.Abs(share-math.Log(63./16)/math.Log(250./16)) > 1e-12 {
		t.Errorf("63 Hz moved: %v to %v Hz", from, to)
	}
	for range 50 {
		from, to = zoom(from, to, 40, 1/zoomNotch)
	}
	if to/from < narrowestRuler*0.999 {
		t.Errorf("zoomed in to %v … %v Hz", from, to)
	}
	for range 80 {
		from, to = zoom(from, to, 40, zoomNotch)
	}
	if from < rulerLow || to > rulerHigh {
		t.Errorf("zoomed out to %v … %v Hz", from, to)
	}
	from, to = pan(30, 60, 5)
	if to != rulerHigh || math.Abs(to/from-2) > 1e-9 {
		t.Errorf("panned to %v … %v Hz", from, to)
	}
}

// Pictures are drawn at the size they are shown in, and drawn again at another.
func TestPicturesFollowTheirSize(t *testing.T) {
	h := open(t)
	for _, size := range []fyne.Size{{Width: 1920, Height: 1080}, {Width: 1000, Height: 640}} {
		h.win.Resize(size)
		h.win.Canvas().Capture()
		h.until("the pictures are drawn", func() bool { return !h.easel.busy && len(h.queue) == 0 })
		for _, one := range h.lanes.list {
			if one.folded {
				continue
			}
			if b := one.pic.shown.Bounds(); b.Dx() != one.pic.w || b.Dy() != one.pic.h || b.Dx() < 100 {
				t.Errorf("%v: the lane %s is drawn %d × %d, wanted %d × %d", size, one.name, b.Dx(), b.Dy(), one.pic.w, one.pic.h)
			}
		}
	}
}

// Nothing is laid over anything else, and no text leaves the window, at the
// sizes that screens have, with a long title, many absorbers, small and large
// rooms, by day and night, in both systems of units.
func TestNothingLeavesTheWindow(t *testing.T) {
	h := open(t)
	long := h.history.Current()
	long.Title = strings.Repeat("A very long title ", 11)
	booth := project.New()
	booth.Room.Length, booth.Room.Width, booth.Room.Height = 2, 1.5, 2.1
	booth.Loudspeakers[0].At, booth.Loudspeakers[1].At = [3]float64{0.4, 0.4, 1}, [3]float64{0.4, 1.1, 1}
	booth.Seats[0].At = [3]float64{1.5, 0.7, 1.2}
	hall := project.New()
	hall.Room.Length, hall.Room.Width, hall.Room.Height = 20, 12, 6
	for name, p := range map[string]project.Project{"long title": long, "booth": booth, "hall": hall} {
		h.begin(p, "", true)
		h.until("the levels are there", func() bool { return h.state.Result != nil })
		for _, size := range []fyne.Size{{Width: 1280, Height: 800}, {Width: 1920, Height: 1080}} {
			h.win.Resize(size)
			for range 2 {
				h.switchDark()
				h.switchUnits()
				whole := h.win.Canvas().Size()
				for _, o := range test.LaidOutObjects(h.win.Content()) {
					pos := h.app.Driver().AbsolutePositionForObject(o)
					if l, ok := o.(*widget.Label); ok && l.Visible() && (pos.X < 0 || pos.X+l.Size().Width > whole.Width+1) {
						t.Errorf("%s at %v: %q leaves the window", name, size, l.Text)
					}
				}
				for _, f := range h.details.fields {
					if room := f.Position().X - f.name.Position().X; f.name.MinSize().Width > room {
						t.Errorf("%s at %v: %q runs into its entry", name, size, f.name.Text)
					}
				}
			}
		}
	}
}

// The samples of the menu open.
func TestSamplesOpen(t *testing.T) {
	h := open(t)
	for _, name := range samples.Names()[1:] {
		if err := h.sample(name); err != nil {
			t.Fatal(err)
		}
		h.until("the levels are there", func() bool { return h.state.Result != nil })
	}
}

// What an absorber is calculated to do stands under its fields, with its section.
func TestAbsorberFiguresAreShown(t *testing.T) {
	h := open(t)
	h.selected(Selection{-1, 1, -1, -1, -1})
	h.settle()
	h.win.Canvas().Capture()
	h.until("the section is drawn", func() bool { return !h.easel.busy && len(h.queue) == 0 })
	seen := map[string]bool{}
	for _, o := range test.LaidOutObjects(h.details.form) {
		switch o := o.(type) {
		case *canvas.Text:
			if o.Text == "73.2 Hz" && o.Visible() {
				seen["resonance"] = true
			}
		case *widget.Label:
			if strings.Contains(o.Text, "Practical coefficients") && o.Size().Height > 60 && o.Visible() {
				seen["words"] = true
			}
		case *picture:
			if o.shown.Bounds().Dx() > 100 {
				seen["section"] = true
			}
		}
	}
	for _, what := range []string{"resonance", "words", "section"} {
		if !seen[what] {
			t.Errorf("the %s is not shown", what)
		}
	}
}

// A schedule that lay under another shows what came meanwhile.
func TestHiddenScheduleCatchesUp(t *testing.T) {
	h := open(t)
	h.tabs.SelectIndex(1)
	h.details.addAbsorber()
	h.typed2(0, "6.2 m")
	h.settle()
	h.tabs.SelectIndex(0)
	want := h.modes.rows[0].cells[3]
	found := false
	for _, row := range h.modes.r.cells {
		found = found || row[3].Text == want
	}
	if !found {
		t.Errorf("the schedule does not show %s Hz, the first mode of the longer room", want)
	}
}
