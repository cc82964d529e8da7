package window

import (
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/dialog"
	"fyne.io/fyne/v2/layout"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/project"
	"stillroom/app/units"
	"stillroom/assets"
)

// choice is one answer that a dialog offers.
type choice struct {
	text string
	main bool // what Enter means
	run  func()
}

// ask shows a dialog with a body and answers; Esc means the last of them, Enter
// the main one. focus, where not nil, is where typing begins.
func (c *controller) ask(title string, body fyne.CanvasObject, size fyne.Size, focus fyne.Focusable, choices ...choice) func() {
	return c.dialog(title, body, size, focus, false, choices)
}

// askOpen shows a dialog whose main answer leaves it open: it closes itself by the
// function returned, once all is right.
func (c *controller) askOpen(title string, body fyne.CanvasObject, size fyne.Size, focus fyne.Focusable, choices ...choice) func() {
	return c.dialog(title, body, size, focus, true, choices)
}

func (c *controller) dialog(title string, body fyne.CanvasObject, size fyne.Size, focus fyne.Focusable, open bool, choices []choice) func() {
	var box *dialog.CustomDialog
	was := c.win.Canvas().OnTypedKey()
	var first *answerButton
	closed := false
	hide := func() {
		if closed {
			return
		}
		closed = true
		c.win.Canvas().SetOnTypedKey(was)
		box.Hide()
	}
	answer := func(x choice) {
		if !x.main || !open {
			hide()
		}
		if x.run != nil {
			x.run()
		}
	}
	row := container.NewHBox(layout.NewSpacer())
	for _, x := range choices {
		b := newAnswerButton(x.text, func() { answer(x) }, func() { answer(choices[len(choices)-1]) })
		if x.main {
			b.Importance = widget.HighImportance
			first = b
		}
		row.Add(b)
	}
	box = dialog.NewCustomWithoutButtons(title, container.NewBorder(nil, row, nil, nil, body), c.win)
	c.win.Canvas().SetOnTypedKey(func(e *fyne.KeyEvent) {
		switch e.Name {
		case fyne.KeyEscape:
			answer(choices[len(choices)-1])
		case fyne.KeyReturn, fyne.KeyEnter:
			for _, x := range choices {
				if x.main {
					answer(x)
					return
				}
			}
		}
	})
	box.Resize(size)
	box.Show()
	switch {
	case focus != nil:
		c.win.Canvas().Focus(focus)
	case first != nil:
		c.win.Canvas().Focus(first)
	}
	return hide
}

// answerButton is a dialog's button, which hears Enter and Esc while it has the
// focus.
type answerButton struct {
	widget.Button
	escape func()
}

func newAnswerButton(text string, tapped, escape func()) *answerButton {
	b := &answerButton{escape: escape}
	b.Text, b.OnTapped = text, tapped
	b.ExtendBaseWidget(b)
	return b
}

// TypedKey hears Enter and Esc.
func (b *answerButton) TypedKey(e *fyne.KeyEvent) {
	switch e.Name {
	case fyne.KeyEscape:
		b.escape()
	case fyne.KeyReturn, fyne.KeyEnter:
		b.OnTapped()
	default:
		b.Button.TypedKey(e)
	}
}

// tell shows a message.
func (c *controller) tell(title, text string) {
	l := widget.NewLabel(text)
	l.Wrapping = fyne.TextWrapWord
	c.log("message %s: %s", title, strings.ReplaceAll(text, "\n", " / "))
	c.ask(title, container.NewVScroll(l), fyne.NewSize(520, 240), nil, choice{"Close", true, nil})
}

// pathEntry is an entry whose Enter and Esc a dialog hears.
type pathEntry struct {
	widget.Entry
	escape func()
}

func newPathEntry(text string, enter, escape func()) *pathEntry {
	e := &pathEntry{escape: escape}
	e.ExtendBaseWidget(e)
	e.SetText(text)
	e.OnSubmitted = func(string) { enter() }
	return e
}

// TypedKey hears Esc.
func (e *pathEntry) TypedKey(k *fyne.KeyEvent) {
	if k.Name == fyne.KeyEscape {
		e.escape()
		return
	}
	e.Entry.TypedKey(k)
}

// askPath asks where to write a file; the suffix is added where it lacks.
func (c *controller) askPath(title, suggestion, suffix, hint string, write func(path string)) {
	var entry *pathEntry
	var hide func()
	done := func() {
		path := strings.TrimSpace(entry.Text)
		if path == "" {
			return
		}
		if !strings.HasSuffix(strings.ToLower(path), suffix) {
			path += suffix
		}
		hide()
		c.confirmOver(path, func() { write(path) })
	}
	entry = newPathEntry(suggestion, done, func() { hide() })
	entry.CursorColumn = len([]rune(suggestion))
	body := container.NewVBox(widget.NewLabel(hint), entry)
	hide = c.ask(title, body, fyne.NewSize(620, 160), entry,
		choice{title, true, done}, choice{"Browse…", false, func() { c.browse(title, entry.Text, suffix, hint, write) }}, choice{"Cancel", false, nil})
}

// browse picks a folder and asks for the name again.
func (c *controller) browse(title, path, suffix, hint string, write func(string)) {
	d := dialog.NewFolderOpen(func(u fyne.ListableURI, err error) {
		if err == nil && u != nil {
			path = join(u.Path(), base(path))
		}
		c.askPath(title, path, suffix, hint, write)
	}, c.win)
	d.Resize(fyne.NewSize(760, 520))
	d.Show()
}

// confirmOver asks before a file that is there is written over.
func (c *controller) confirmOver(path string, yes func()) {
	if path == c.path || !exists(path) {
		yes()
		return
	}
	l := widget.NewLabel(path + " is there already.")
	l.Wrapping = fyne.TextWrapBreak
	c.ask("Replace the file?", l, fyne.NewSize(480, 150), nil, choice{"Replace", true, yes}, choice{"Cancel", false, nil})
}

// row is one of many things to pick from.
type row struct{ id, text, group, source string }

// pick lets one row be picked among many, with a search; more are further answers.
func (c *controller) pick(title string, all []row, current string, chosen func(id string), more ...choice) {
	shown := all
	list := widget.NewList(func() int { return len(shown) }, func() fyne.CanvasObject { return widget.NewLabel("") },
		func(i widget.ListItemID, o fyne.CanvasObject) {
			o.(*widget.Label).SetText(shown[i].text + "  (" + shown[i].group + ")")
		})
	source := widget.NewLabel("")
	source.Wrapping = fyne.TextWrapWord
	picked := current
	list.OnSelected = func(i widget.ListItemID) {
		picked = shown[i].id
		source.SetText("Source: " + shown[i].source)
	}
	done := func() {
		if picked != "" {
			chosen(picked)
		}
	}
	var hide func()
	search := newPathEntry("", func() { hide(); done() }, func() { hide() })
	search.SetPlaceHolder("Search")
	search.OnChanged = func(t string) {
		shown = nil
		for _, x := range all {
			if strings.Contains(strings.ToLower(x.text+" "+x.group), strings.ToLower(strings.TrimSpace(t))) {
				shown = append(shown, x)
			}
		}
		list.UnselectAll()
		list.Refresh()
	}
	body := container.NewBorder(search, source, nil, nil, list)
	answers := append([]choice{{"Choose", true, done}}, more...)
	hide = c.ask(title, body, fyne.NewSize(600, 540), search, append(answers, choice{"Cancel", false, nil})...)
}

// chooseFinish lets one finish be picked among all, or one of the user's own made.
func (c *controller) chooseFinish(current string, chosen func(id string)) {
	var all []row
	for _, f := range c.state.Project.Finishes {
		all = append(all, row{f.ID, f.Name, "the project's own", f.Source})
	}
	for _, f := range assets.Finishes() {
		all = append(all, row{f.ID, f.Name, f.Group, f.Source})
	}
	c.pick("Choose a finish", all, current, chosen, choice{"Own finish…", false, func() { c.ownFinish(chosen) }})
}

// ownBands are the octaves that a finish of the user's own is given in.
func ownBands() []string { return []string{"63", "125", "250", "500", "1000", "2000", "4000"} }

// ownFinish asks for a finish of the user's own, adds it to the project and chooses
// it. A band left empty is not given.
func (c *controller) ownFinish(chosen func(id string)) {
	f := project.Finish{ID: c.state.Project.FreshFinishID(), Absorption: map[string]float64{}}
	say := widget.NewLabel("Random-incidence absorption coefficients by octave; an empty band is not given.")
	say.Wrapping = fyne.TextWrapWord
	var hide func()
	entries := map[string]*pathEntry{}
	var add func()
	entry := func(name string) *pathEntry {
		entries[name] = newPathEntry("", func() { add() }, func() { hide() })
		return entries[name]
	}
	form := widget.NewForm(widget.NewFormItem("Name", entry("name")), widget.NewFormItem("Source", entry("source")))
	for _, b := range ownBands() {
		form.Append(b+" Hz", entry(b))
	}
	add = func() {
		f.Name, f.Source = strings.TrimSpace(entries["name"].Text), strings.TrimSpace(entries["source"].Text)
		clear(f.Absorption)
		if f.Name == "" {
			say.SetText("It needs a name.")
			return
		}
		for _, b := range ownBands() {
			text := strings.TrimSpace(entries[b].Text)
			if text == "" {
				continue
			}
			v, err := units.ParseNumber(text, "")
			if err != nil {
				say.SetText(b + " Hz: " + err.Error())
				return
			}
			f.Absorption[b] = v
		}
		p := c.state.Project.AddFinish(f)
		if errs := p.Validate(); len(errs) > 0 {
			say.SetText(errs[0].Error())
			return
		}
		hide()
		c.edit("add a finish", p, "", true)
		chosen(f.ID)
	}
	hide = c.askOpen("A finish of your own", container.NewVBox(say, form), fyne.NewSize(480, 520), entries["name"],
		choice{"Add and choose", true, add}, choice{"Cancel", false, nil})
}
