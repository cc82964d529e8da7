package window

import (
	"bytes"
	"errors"
	"fmt"
	"io"
	"os"
	"path/filepath"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/dialog"
	"fyne.io/fyne/v2/storage"
	"fyne.io/fyne/v2/widget"
	"github.com/google/renameio/v2/maybe"

	"stillroom/app/project"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/samples"
)

func join(dir, name string) string { return filepath.Join(dir, name) }
func base(path string) string      { return filepath.Base(path) }

func exists(path string) bool {
	_, err := os.Stat(path)
	return !errors.Is(err, os.ErrNotExist)
}

// begin puts a document in place. path is where it is on disk, "" for nowhere.
func (c *controller) begin(p project.Project, path string, onDisk bool) {
	c.path = path
	c.history = project.NewHistory(p, onDisk)
	c.state.Selection = Selection{-1, -1, -1, -1, -1}
	c.state.Result, c.state.Ears = nil, 0
	c.runner.restart()
	c.forget()
	c.changed()
	c.log("document %s", path)
}

// sample puts a copy of a sample in place.
func (c *controller) sample(name string) error {
	data, err := samples.Read(name)
	if err != nil {
		return err
	}
	p, err := project.Parse(data)
	if err != nil {
		return err
	}
	c.begin(p, "", true)
	return nil
}

// open reads a file.
func (c *controller) open(path string) {
	p, err := project.Load(path)
	if err != nil {
		c.tell("The file cannot be opened", path+"\n\n"+err.Error())
		return
	}
	c.begin(p, path, true)
	c.settings.remember(path)
	c.menus()
}

// guarded asks what becomes of unsaved work before going on.
func (c *controller) guarded(then func()) {
	if !c.history.Dirty() {
		then()
		return
	}
	l := widget.NewLabel("The project has changes that are not saved.")
	c.ask("Save the changes?", l, fyne.NewSize(440, 140), nil,
		choice{"Save", true, func() { c.save(then) }},
		choice{"Discard", false, func() { c.forget(); then() }},
		choice{"Cancel", false, nil})
}

// save writes the document where it is, or asks where.
func (c *controller) save(then func()) {
	if c.path == "" {
		c.saveAs(then)
		return
	}
	c.write(c.path, then)
}

func (c *controller) saveAs(then func()) {
	suggestion := c.path
	if suggestion == "" {
		suggestion = join(c.folder(), fileName(c.history.Current().Title)+project.Suffix)
	}
	c.askPath("Save", suggestion, project.Suffix, "Save the project as", func(path string) { c.write(path, then) })
}

func (c *controller) write(path string, then func()) {
	if err := project.Save(path, c.history.Current()); err != nil {
		c.tell("The file was not saved", err.Error())
		return
	}
	c.path = path
	c.history.Saved()
	c.forget()
	c.settings.remember(path)
	c.menus()
	c.changed()
	c.say("Saved " + path)
	c.log("saved %s", path)
	if then != nil {
		then()
	}
}

// folder is where files are suggested.
func (c *controller) folder() string {
	if c.path != "" {
		return filepath.Dir(c.path)
	}
	if dir, err := os.UserHomeDir(); err == nil {
		return dir
	}
	return "."
}

// fileName makes a name for a file of a title.
func fileName(title string) string {
	var b strings.Builder
	for _, r := range strings.ToLower(strings.TrimSpace(title)) {
		switch {
		case r >= 'a' && r <= 'z' || r >= '0' && r <= '9':
			b.WriteRune(r)
		case b.Len() > 0 && !strings.HasSuffix(b.String(), "-"):
			b.WriteByte('-')
		}
	}
	if name := strings.Trim(b.String(), "-"); name != "" {
		return name
	}
	return "room"
}

// openDialog picks a file to open.
func (c *controller) openDialog() {
	d := dialog.NewFileOpen(func(r fyne.URIReadCloser, err error) {
		if err != nil || r == nil {
			return
		}
		path := r.URI().Path()
		r.Close()
		c.open(path)
	}, c.win)
	d.SetFilter(storage.NewExtensionFileFilter([]string{project.Suffix}))
	if u, err := storage.ListerForURI(storage.NewFileURI(c.folder())); err == nil {
		d.SetLocation(u)
	}
	d.Resize(fyne.NewSize(760, 520))
	d.Show()
}

// export writes the printed set in the background.
func (c *controller) export() {
	letter := widget.NewRadioGroup([]string{"A4", "Letter"}, nil)
	letter.Horizontal = true
	letter.SetSelected(map[bool]string{false: "A4", true: "Letter"}[c.settings.US])
	suggestion := join(c.folder(), fileName(c.history.Current().Title)+".pdf")
	var entry *pathEntry
	var hide func()
	done := func() {
		path := strings.TrimSpace(entry.Text)
		if path == "" {
			return
		}
		if !strings.HasSuffix(strings.ToLower(path), ".pdf") {
			path += ".pdf"
		}
		hide()
		c.confirmOver(path, func() { c.writeSheets(path, sheets.Options{Letter: letter.Selected == "Letter", US: c.state.US}) })
	}
	entry = newPathEntry(suggestion, done, func() { hide() })
	body := container.NewVBox(widget.NewLabel("Write mode schedule, plan, section, absorbers and cautions to"), entry, letter)
	hide = c.ask("Export sheets", body, fyne.NewSize(620, 190), entry, choice{"Export", true, done}, choice{"Cancel", false, nil})
}

// writeSheets studies the project once more for paper and writes the set.
func (c *controller) writeSheets(path string, o sheets.Options) {
	p := c.history.Current()
	c.say("Writing " + path + " …")
	c.background(func() error {
		r, err := study.Run(c.ctx, p, study.Options{Points: 600, Ringing: true}, nil, nil)
		if err != nil {
			return err
		}
		var b bytes.Buffer
		if err := sheets.Write(&b, r, o); err != nil {
			return err
		}
		return writeWhole(path, &b)
	}, func(err error) {
		if err != nil {
			c.tell("The sheets were not written", err.Error())
			return
		}
		c.say("Wrote " + path)
		c.log("exported %s", path)
	})
}

// writeWhole writes a file whole or not at all.
func writeWhole(path string, from io.Reader) error {
	data, err := io.ReadAll(from)
	if err != nil {
		return err
	}
	if err := maybe.WriteFile(path, data, 0o644); err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, err)
	}
	return nil
}
