package window

import (
	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/study"
	"stillroom/samples"
)

// command is one thing the user can do: menu, toolbar and shortcut are made
// from it.
type command struct {
	menu, label string
	key         fyne.KeyName
	shift       bool
	enabled     func() bool
	run         func()
	on          func() bool // of what is switched on and off; nil for others
	// edits is true where an entry that has the focus wants the shortcut first.
	edits func() fyne.Shortcut
}

// commands lists all commands, in the order of the menus.
func (c *controller) commands() []command {
	always := func() bool { return true }
	return []command{
		{menu: "File", label: "New", key: fyne.KeyN, enabled: always, run: func() { c.guarded(c.newDocument) }},
		{menu: "File", label: "Open…", key: fyne.KeyO, enabled: always, run: func() { c.guarded(c.openDialog) }},
		{menu: "File", label: "Save", key: fyne.KeyS, enabled: always, run: func() { c.save(nil) }},
		{menu: "File", label: "Save as…", key: fyne.KeyS, shift: true, enabled: always, run: func() { c.saveAs(nil) }},
		{menu: "File", label: "Export sheets…", key: fyne.KeyE, enabled: func() bool { return c.state.Result != nil }, run: c.export},
		{menu: "Edit", label: "Undo", key: fyne.KeyZ, enabled: func() bool { return c.history.Undoable() != "" }, run: c.undo,
			edits: func() fyne.Shortcut { return &fyne.ShortcutUndo{} }},
		{menu: "Edit", label: "Redo", key: fyne.KeyZ, shift: true, enabled: func() bool { return c.history.Redoable() != "" }, run: c.redo,
			edits: func() fyne.Shortcut { return &fyne.ShortcutRedo{} }},
		{menu: "", label: "Redo", key: fyne.KeyY, enabled: func() bool { return c.history.Redoable() != "" }, run: c.redo},
		{menu: "Edit", label: "Remove what is selected", enabled: c.removable, run: c.remove},
		{menu: "Mode", label: "Tune an absorber to this mode…", key: fyne.KeyT, enabled: func() bool { return c.state.Result != nil && c.state.Selection.Mode >= 0 },
			run: func() { c.tune(c.state.Selection.Mode) }},
		{menu: "Mode", label: "Plan for all problem modes…", key: fyne.KeyG, enabled: func() bool { return c.state.Result != nil && c.state.Result.Stage == study.StageTreated }, run: c.planAll},
		{menu: "Mode", label: "Next problem", key: fyne.KeyP, enabled: func() bool { return c.state.Result != nil }, run: func() { c.finding(1) }},
		{menu: "Mode", label: "Stop calculating", key: fyne.KeyPeriod, enabled: func() bool { return c.state.Busy }, run: c.stopStudy},
		{menu: "View", label: "Details", key: fyne.KeyD, enabled: always, run: c.foldDetails, on: func() bool { return c.settings.Details }},
		{menu: "View", label: "Night", key: fyne.KeyL, enabled: always, run: c.switchDark, on: func() bool { return c.state.Dark }},
		{menu: "View", label: "Feet and inches", key: fyne.KeyU, enabled: always, run: c.switchUnits, on: func() bool { return c.state.US }},
		{menu: "View", label: "Level over the drawing", key: fyne.KeyM, enabled: func() bool { return c.state.Result != nil }, run: c.switchMap,
			on: func() bool { return c.state.Map }},
		{menu: "View", label: "Band of tolerances", key: fyne.KeyB, enabled: always, run: c.switchTolerances, on: func() bool { return c.state.Off }},
		{menu: "View", label: "Diffuse field to 78°", enabled: always, run: c.switchField, on: func() bool { return c.state.To78 }},
		{menu: "View", label: "Whole ruler", key: fyne.Key0, enabled: always, run: func() { c.ruler(rulerFrom, rulerTo) }},
	}
}

// guard runs a command where it may: never under a dialog, never disabled, and
// where an entry has the focus that edit of the entry's own instead.
func (c *controller) guard(x command) func() {
	return func() {
		if len(c.win.Canvas().Overlays().List()) > 0 {
			return
		}
		focused := c.win.Canvas().Focused()
		if entry := entryOf(focused); entry != nil && x.edits != nil {
			if f, ok := focused.(*field); ok && f.Text != f.was || !ok {
				entry.TypedShortcut(x.edits())
				return
			}
		}
		if f, ok := focused.(*field); ok {
			f.finish()
		}
		if x.enabled() {
			x.run()
			if x.on != nil {
				c.menus() // with its mark
			}
		}
	}
}

func entryOf(f fyne.Focusable) *widget.Entry {
	switch e := f.(type) {
	case *field:
		return &e.Entry
	case *pathEntry:
		return &e.Entry
	case *widget.Entry:
		return e
	}
	return nil
}

func (x command) shortcut() *desktop.CustomShortcut {
	m := fyne.KeyModifierShortcutDefault
	if x.shift {
		m |= fyne.KeyModifierShift
	}
	return &desktop.CustomShortcut{KeyName: x.key, Modifier: m}
}

// menus builds the main menu anew.
func (c *controller) menus() {
	byName := map[string]*fyne.Menu{}
	var list []*fyne.Menu
	for _, x := range c.commands() {
		run := c.guard(x)
		if x.menu == "" {
			c.win.Canvas().AddShortcut(x.shortcut(), func(fyne.Shortcut) { run() })
			continue
		}
		m := byName[x.menu]
		if m == nil {
			m = fyne.NewMenu(x.menu)
			byName[x.menu] = m
			list = append(list, m)
		}
		item := fyne.NewMenuItem(x.label, run)
		item.Checked = x.on != nil && x.on()
		if x.key != "" {
			item.Shortcut = x.shortcut()
		}
		m.Items = append(m.Items, item)
	}
	file := byName["File"]
	file.Items = append(file.Items, fyne.NewMenuItemSeparator())
	var starts []*fyne.MenuItem
	for _, name := range samples.Names() {
		starts = append(starts, fyne.NewMenuItem(name, func() {
			c.guarded(func() {
				if err := c.sample(name); err != nil {
					c.tell("The sample cannot be opened", err.Error())
				}
			})
		}))
	}
	sample := fyne.NewMenuItem("Samples", nil)
	sample.ChildMenu = fyne.NewMenu("", starts...)
	file.Items = append(file.Items, sample)
	if len(c.settings.Recent) > 0 {
		recent := fyne.NewMenuItem("Recent", nil)
		recent.ChildMenu = fyne.NewMenu("")
		for _, path := range c.settings.Recent {
			recent.ChildMenu.Items = append(recent.ChildMenu.Items, fyne.NewMenuItem(path, func() { c.guarded(func() { c.open(path) }) }))
		}
		file.Items = append(file.Items, recent)
	}
	c.win.SetMainMenu(fyne.NewMainMenu(list...))
}

// removable reports whether something is selected that can be removed.
func (c *controller) removable() bool {
	s, p := c.state.Selection, c.state.Project
	return s.Absorber >= 0 && s.Absorber < len(p.Absorbers) ||
		s.Loudspeaker >= 0 && s.Loudspeaker < len(p.Loudspeakers) && len(p.Loudspeakers) > 1 ||
		s.Seat >= 0 && s.Seat < len(p.Seats) && len(p.Seats) > 1
}

// remove removes what is selected.
func (c *controller) remove() {
	s, p := c.state.Selection, c.state.Project
	switch {
	case s.Absorber >= 0:
		c.edit("remove absorber", p.WithoutAbsorber(s.Absorber), "", true)
	case s.Loudspeaker >= 0:
		c.edit("remove loudspeaker", p.WithoutLoudspeaker(s.Loudspeaker), "", true)
	case s.Seat >= 0:
		c.edit("remove seat", p.WithoutSeat(s.Seat), "", true)
	}
}
