package window

import (
	"fmt"
	"time"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/project"
	"stillroom/samples"
)

// ID is the program's name to the system.
const ID = "stillroom.window"

// Run opens the window of an application on a project file, or on a sample where
// the name is empty, and returns when it is closed. The error says why a file
// cannot be opened.
func Run(a fyne.App, file string) error {
	start := time.Now()
	var p project.Project
	if file != "" {
		var err error
		if p, err = project.Load(file); err != nil {
			return fmt.Errorf("%s:\n%w", file, err)
		}
	}
	s := loadSettings()
	a.Settings().SetTheme(look{s.Dark})
	w := a.NewWindow("Stillroom")
	c := newController(a, w, s, fyne.Do)
	c.started = start
	c.events = openLog()
	c.recovery = newRecovery()
	c.menus()
	path, unsaved, crashed := c.recovery.found()
	if file != "" {
		c.begin(p, file, true)
		s.remember(file)
	} else if err := c.sample(samples.Names()[0]); err != nil {
		return err
	}
	w.Resize(fyne.NewSize(s.Width, s.Height))
	w.SetCloseIntercept(func() { c.guarded(func() { c.leave(); w.Close() }) })
	a.Lifecycle().SetOnStarted(func() {
		c.log("ready")
		if crashed {
			c.offer(path, unsaved)
		}
	})
	a.Lifecycle().SetOnStopped(func() {
		// A closed window has been asked about; an ended process has not.
		if c.ctx.Err() == nil && c.history.Dirty() {
			c.recovery.keep(c.path, c.history.Current())
		}
		c.end()
	})
	w.ShowAndRun()
	return nil
}

// leave keeps the window's shape and drops what was kept against a crash.
func (c *controller) leave() {
	size := c.win.Canvas().Size()
	c.settings.Width, c.settings.Height = size.Width, size.Height
	c.settings.Inner, c.settings.Lower = c.inner.Offset, c.lower.Offset
	if c.settings.Details {
		c.settings.Outer = c.outer.Offset
	}
	c.settings.save()
	c.forget()
	c.end()
	c.runner.stop()
}

// offer asks whether unsaved work of an earlier run is wanted.
func (c *controller) offer(path string, p project.Project) {
	c.recovery.keep(path, p)
	name := path
	if name == "" {
		name = "an untitled project"
	}
	l := widget.NewLabel("Unsaved work on " + name + " was kept when the program last ended.")
	l.Wrapping = fyne.TextWrapWord
	c.ask("Recover unsaved work?", container.NewVBox(l), fyne.NewSize(480, 150), nil,
		choice{"Recover", true, func() { c.begin(p, path, false); c.keep() }},
		choice{"Discard", false, c.forget})
}
