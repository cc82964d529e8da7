package window

import (
	"fmt"
	"image/color"
	"slices"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/layout"
	"fyne.io/fyne/v2/theme"
	"fyne.io/fyne/v2/widget"

	"stillroom/acoustics"
	"stillroom/app/project"
)

// subject is what the details are about.
type subject struct {
	kind  string // "room", "air", "surface", "loudspeaker", "seat", "absorber", "mode"
	index int
}

// details edits what is selected: fields with units, ranges and an error beside
// the field that has one.
type details struct {
	actions Actions
	state   State
	about   subject
	shape   string // what the form was built for; another one is built anew
	root    *fyne.Container
	form    *fyne.Container
	chooser *widget.Select
	names   []subject // in the order of the chooser
	updates []func()  // put the state's values into the form
	fields  []*field
	settled bool // the chooser is being set by us
	dialogs
	easel    *easel
	lastSeen Selection
}

// dialogs is what the details ask the user by.
type dialogs interface {
	chooseFinish(current string, chosen func(id string))
	pick(title string, rows []row, current string, chosen func(id string), more ...choice)
	askName(title, hint string, done func(name, source string))
	tell(title, text string)
}

func newDetails(a Actions, e *easel, by dialogs) *details {
	d := &details{actions: a, easel: e, dialogs: by, about: subject{kind: "room"}, form: container.NewVBox()}
	d.lastSeen = Selection{-1, -1, -1, -1, -1}
	d.chooser = widget.NewSelect(nil, d.chosen)
	scroll := container.NewVScroll(d.form)
	d.root = container.NewBorder(d.chooser, nil, nil, nil, scroll)
	return d
}

// chosen follows the chooser at the top.
func (d *details) chosen(string) {
	i := d.chooser.SelectedIndex()
	if d.settled || i < 0 || i >= len(d.names) {
		return
	}
	d.about = d.names[i]
	s := Selection{Mode: d.state.Selection.Mode, Absorber: -1, Loudspeaker: -1, Seat: -1, Surface: -1}
	switch d.about.kind {
	case "loudspeaker":
		s.Loudspeaker = d.about.index
	case "seat":
		s.Seat = d.about.index
	case "absorber":
		s.Absorber = d.about.index
	case "surface":
		s.Surface = d.about.index
	case "mode":
		s.Mode = d.about.index
	}
	d.lastSeen = s
	d.actions.Select(s)
	d.show(d.state)
}

// show follows the selection and the values.
func (d *details) show(s State) {
	d.state = s
	d.follow()
	d.fillChooser()
	if shape := d.signature(); shape != d.shape {
		d.shape = shape
		d.build()
	}
	for _, u := range d.updates {
		u()
	}
}

// follow turns to what was selected last.
func (d *details) follow() {
	s := d.state.Selection
	was := d.lastSeen
	d.lastSeen = s
	switch {
	case s.Loudspeaker >= 0 && s.Loudspeaker != was.Loudspeaker:
		d.about = subject{"loudspeaker", s.Loudspeaker}
	case s.Seat >= 0 && s.Seat != was.Seat:
		d.about = subject{"seat", s.Seat}
	case s.Absorber >= 0 && s.Absorber != was.Absorber:
		d.about = subject{"absorber", s.Absorber}
	case s.Mode >= 0 && s.Mode != was.Mode:
		d.about = subject{"mode", s.Mode}
	}
	if !d.exists(d.about) {
		d.about = subject{kind: "room"}
	}
}

func (d *details) exists(b subject) bool {
	switch b.kind {
	case "loudspeaker":
		return b.index < len(d.state.Project.Loudspeakers)
	case "seat":
		return b.index < len(d.state.Project.Seats)
	case "absorber":
		return b.index < len(d.state.Project.Absorbers)
	case "mode":
		return d.state.Result != nil && b.index < len(d.state.Result.Modes)
	}
	return true
}

// fillChooser lists all there is to edit.
func (d *details) fillChooser() {
	p := d.state.Project
	var names []string
	var subjects []subject
	add := func(name string, b subject) {
		names = append(names, name)
		subjects = append(subjects, b)
	}
	add("Room", subject{kind: "room"})
	add("Air", subject{kind: "air"})
	for _, s := range acoustics.Surfaces() {
		add("Surface: "+s.String(), subject{"surface", int(s)})
	}
	for i, l := range p.Loudspeakers {
		add("Loudspeaker "+l.ID, subject{"loudspeaker", i})
	}
	for i, s := range p.Seats {
		add("Seat "+s.ID, subject{"seat", i})
	}
	for i, a := range p.Absorbers {
		add("Absorber "+a.ID, subject{"absorber", i})
	}
	if m := d.state.Selection.Mode; d.exists(subject{"mode", m}) && m >= 0 {
		add("Mode "+d.state.Result.Modes[m].Mode.String(), subject{"mode", m})
		if d.about.kind == "mode" {
			d.about.index = m
		}
	}
	d.names = subjects
	d.settled = true
	if !slices.Equal(d.chooser.Options, names) {
		d.chooser.SetOptions(names)
	}
	if i := slices.Index(subjects, d.about); i >= 0 && d.chooser.SelectedIndex() != i {
		d.chooser.SetSelectedIndex(i)
	}
	d.settled = false
}

// signature changes whenever other fields are wanted.
func (d *details) signature() string {
	p := d.state.Project
	s := fmt.Sprint(d.about, len(p.Loudspeakers), len(p.Seats), len(p.Absorbers), d.state.US, d.state.Dark)
	switch d.about.kind {
	case "surface":
		s += fmt.Sprint(len(p.Lining(acoustics.Surface(d.about.index))), len(p.KeepOut))
	case "absorber":
		a := p.Absorbers[d.about.index]
		s += a.Kind + fmt.Sprint(a.Surface, fillOf(a) != nil, a.Neck != nil && a.Neck.Fill != nil, fillOf(a) != nil && fillOf(a).Fluid != nil, a.Porous != nil && a.Porous.Fluid != nil)
	}
	return s
}

func (d *details) build() {
	d.updates, d.fields = nil, nil
	d.form.RemoveAll()
	switch d.about.kind {
	case "room":
		d.roomForm()
	case "air":
		d.airForm()
	case "surface":
		d.surfaceForm(acoustics.Surface(d.about.index))
	case "loudspeaker":
		d.loudspeakerForm(d.about.index)
	case "seat":
		d.seatForm(d.about.index)
	case "absorber":
		d.absorberForm(d.about.index)
	case "mode":
		d.modeForm()
	}
	d.form.Refresh()
}

// edit puts an edited project in place if it is a valid one, else says what the
// field of that path did wrong.
func (d *details) edit(label, path string, p project.Project, key string) error {
	if err := fault(p.Validate(), path); err != nil {
		return err
	}
	d.actions.Edit(label, p, key, key == "")
	return nil
}

// heading adds a heading.
func (d *details) heading(text string) {
	t := canvas.NewText(text, look{d.state.Dark}.style().Ink)
	t.TextSize, t.TextStyle = 12, fyne.TextStyle{Bold: true}
	d.form.Add(container.NewPadded(t))
}

// number adds a field for a number of the project.
func (d *details) number(name, path string, q quantity, at func(*project.Project) *float64) {
	var f *field
	set := func(v float64, key string) error {
		p := d.state.Project.Clone()
		*at(&p) = v
		return d.edit("change "+strings.ToLower(name), path, p, key)
	}
	f = newField(name, func(text string) error {
		v, err := q.read(text, d.state.system())
		if err != nil {
			return err
		}
		return set(v, "")
	}, func(by int) {
		p := d.state.Project
		v := *at(&p) + float64(by)*q.step
		if err := set(tidy(v), "step-"+path); err != nil {
			f.complain(err.Error())
		}
	})
	d.add(f, func() string { p := d.state.Project; return q.write(*at(&p), d.state.system()) })
}

// text adds a field for a text of the project.
func (d *details) text(name, path string, at func(*project.Project) *string) {
	f := newField(name, func(text string) error {
		p := d.state.Project.Clone()
		*at(&p) = text
		return d.edit("change "+strings.ToLower(name), path, p, "")
	}, nil)
	d.add(f, func() string { p := d.state.Project; return *at(&p) })
}

// whole adds a field for a whole number of the project.
func (d *details) whole(name, path string, at func(*project.Project) *int) {
	var f *field
	set := func(v int, key string) error {
		p := d.state.Project.Clone()
		*at(&p) = v
		return d.edit("change "+strings.ToLower(name), path, p, key)
	}
	f = newField(name, func(text string) error {
		v, err := count.read(text, d.state.system())
		if err != nil {
			return err
		}
		if v != float64(int(v)) {
			return fmt.Errorf("must be a whole number")
		}
		return set(int(v), "")
	}, func(by int) {
		p := d.state.Project
		if err := set(*at(&p)+by, "step-"+path); err != nil {
			f.complain(err.Error())
		}
	})
	d.add(f, func() string { p := d.state.Project; return fmt.Sprint(*at(&p)) })
}

// add puts a field into the form.
func (d *details) add(f *field, value func() string) {
	f.changed = func() { d.form.Refresh() }
	d.fields = append(d.fields, f)
	row := container.New(pairLayout{}, f.name, f, f.fault)
	d.form.Add(row)
	d.updates = append(d.updates, func() { f.show(value(), d.state.Dark) })
}

// check adds a yes or no.
func (d *details) check(name string, get func(project.Project) bool, set func(*project.Project, bool)) {
	c := widget.NewCheck(name, nil)
	c.OnChanged = func(on bool) {
		if on == get(d.state.Project) {
			return
		}
		p := d.state.Project.Clone()
		set(&p, on)
		if err := d.edit("change "+strings.ToLower(name), "", p, ""); err != nil {
			c.SetChecked(!on)
		}
	}
	d.form.Add(c)
	d.updates = append(d.updates, func() { c.SetChecked(get(d.state.Project)) })
}

// choice adds a choice among names.
func (d *details) choice(name string, names []string, get func(project.Project) int, set func(*project.Project, int)) {
	label := canvas.NewText(name, look{d.state.Dark}.style().Ink)
	label.TextSize = 11.5
	s := widget.NewSelect(names, nil)
	s.OnChanged = func(string) {
		i := s.SelectedIndex()
		if i < 0 || i == get(d.state.Project) {
			return
		}
		p := d.state.Project.Clone()
		set(&p, i)
		if err := d.edit("change "+strings.ToLower(name), "", p, ""); err != nil {
			s.SetSelectedIndex(get(d.state.Project))
		}
	}
	none := canvas.NewText("", color.Transparent)
	none.Hide()
	d.form.Add(container.New(pairLayout{}, label, s, none))
	d.updates = append(d.updates, func() {
		if i := get(d.state.Project); i >= 0 && s.SelectedIndex() != i {
			s.SetSelectedIndex(i)
		}
	})
}

// note adds wrapped text that follows the state.
func (d *details) note(value func() string) {
	l := widget.NewLabel("")
	l.Wrapping = fyne.TextWrapWord
	l.SizeName = theme.SizeNameCaptionText
	d.form.Add(l)
	d.updates = append(d.updates, func() {
		if t := value(); t != l.Text {
			l.SetText(t)
			d.form.Refresh() // the lines may be more or fewer
		}
	})
}

// fact adds a name and a figure that follows the state.
func (d *details) fact(name string, value func() string) {
	style := look{d.state.Dark}.style()
	n, v := canvas.NewText(name, blend(style.Paper, style.Ink, 0.75)), canvas.NewText("", style.Ink)
	n.TextSize, v.TextSize = 11.5, 11.5
	none := canvas.NewText("", color.Transparent)
	none.Hide()
	d.form.Add(container.New(pairLayout{}, n, v, none))
	d.updates = append(d.updates, func() {
		if t := value(); t != v.Text {
			v.Text = t
			v.Refresh()
		}
	})
}

// buttons adds a row of commands.
func (d *details) buttons(list ...*widget.Button) {
	row := container.New(layout.NewGridLayoutWithColumns(len(list)))
	for _, b := range list {
		row.Add(b)
	}
	d.form.Add(container.NewPadded(row))
}

// pairLayout sets a name left of its entry, and an error under both.
type pairLayout struct{}

const nameShare = 0.44

func (pairLayout) MinSize(o []fyne.CanvasObject) fyne.Size {
	h := max(o[0].MinSize().Height, o[1].MinSize().Height)
	if o[2].Visible() {
		h += 14
	}
	return fyne.NewSize(200, h)
}

func (pairLayout) Layout(o []fyne.CanvasObject, size fyne.Size) {
	h := max(o[0].MinSize().Height, o[1].MinSize().Height)
	w := size.Width * nameShare
	o[0].Move(fyne.NewPos(6, (h-o[0].MinSize().Height)/2))
	o[0].Resize(fyne.NewSize(w-8, o[0].MinSize().Height))
	y := float32(0)
	if _, text := o[1].(*canvas.Text); text {
		y = (h - o[1].MinSize().Height) / 2
	}
	o[1].Move(fyne.NewPos(w, y))
	o[1].Resize(fyne.NewSize(size.Width-w-4, h-2*y))
	o[2].Move(fyne.NewPos(6, h))
	o[2].Resize(fyne.NewSize(size.Width-10, 14))
}
