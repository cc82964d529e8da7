package window

import (
	"image/color"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/widget"
)

// field is one line of a form: a name, an entry, and an error beside it. It
// commits on Enter and when it loses the focus, takes back on Esc, and steps
// with the up and down keys where there is something to step.
type field struct {
	widget.Entry
	name   *canvas.Text
	fault  *canvas.Text
	was    string // as last shown: unchanged text never edits
	commit func(text string) error
	step   func(by int)
	// changed is told when an error comes or goes: the form takes more or less room.
	changed func()
}

var _ fyne.Focusable = (*field)(nil)

func newField(name string, commit func(string) error, step func(int)) *field {
	f := &field{name: canvas.NewText(name, color.Black), fault: canvas.NewText("", color.Black), commit: commit, step: step}
	f.name.TextSize, f.fault.TextSize = 11.5, 10.5
	f.fault.Hide()
	f.ExtendBaseWidget(f)
	f.OnSubmitted = func(string) { f.finish() }
	return f
}

// show puts a value in, unless the user is at it.
func (f *field) show(text string, dark bool) {
	style := look{dark}.style()
	f.name.Color, f.fault.Color = style.Ink, style.Warning
	f.name.Refresh()
	if f.Text != f.was || text == f.was {
		return
	}
	f.was = text
	f.SetText(text)
	f.complain("")
}

// finish commits what was typed, if anything was.
func (f *field) finish() {
	text := strings.TrimSpace(f.Text)
	if text == f.was {
		f.complain("")
		return
	}
	if err := f.commit(text); err != nil {
		f.complain(err.Error())
		return
	}
	f.was = f.Text
	f.complain("")
}

// complain shows an error under the field, or takes it away.
func (f *field) complain(text string) {
	if text == f.fault.Text {
		return
	}
	f.fault.Text = text
	if text == "" {
		f.fault.Hide()
	} else {
		f.fault.Show()
	}
	f.fault.Refresh()
	if f.changed != nil {
		f.changed()
	}
}

// FocusLost commits.
func (f *field) FocusLost() {
	f.Entry.FocusLost()
	f.finish()
}

// TypedKey takes back on Esc and steps on up and down.
func (f *field) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyEscape:
		f.SetText(f.was)
		f.complain("")
	case fyne.KeyUp:
		f.stepBy(1)
	case fyne.KeyDown:
		f.stepBy(-1)
	default:
		f.Entry.TypedKey(e)
	}
}

func (f *field) stepBy(by int) {
	if f.step == nil {
		return
	}
	f.finish()
	if f.fault.Text == "" {
		f.was = f.Text
		f.step(by)
	}
}
