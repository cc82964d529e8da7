package window

import (
	"fmt"
	"io"
	"os"
	"strings"
	"time"

	"fyne.io/fyne/v2"
)

// openLog opens the log that STILLROOM_UI_LOG names: what happens in the window,
// for a test that drives it from outside and waits for events instead of time.
func openLog() io.Writer {
	name := os.Getenv("STILLROOM_UI_LOG")
	if name == "" {
		return nil
	}
	f, err := os.OpenFile(name, os.O_CREATE|os.O_WRONLY|os.O_APPEND, 0o644)
	if err != nil {
		return nil
	}
	return f
}

// log writes an event with the milliseconds since the start.
func (c *controller) log(format string, args ...any) {
	if c.events != nil {
		fmt.Fprintf(c.events, "%d "+format+"\n", append([]any{time.Since(c.started).Milliseconds()}, args...)...)
	}
}

// places writes where things are in the window, in its own units.
func (c *controller) places() {
	if c.events == nil {
		return
	}
	driver := c.app.Driver()
	corner := driver.AbsolutePositionForObject(c.drawing)
	at := func(name string, p fyne.Position) {
		c.log("place %s %.1f %.1f", strings.ReplaceAll(name, " ", "-"), p.X, p.Y)
	}
	p := c.state.Project
	for _, l := range p.Loudspeakers {
		at("loudspeaker-"+l.ID, corner.Add(c.drawing.position(0, l.At[0], l.At[1])))
	}
	at("back-wall", corner.Add(c.drawing.position(0, p.Room.Length, p.Room.Width*0.7)))
	at("metre", c.drawing.position(0, 1, 0).Subtract(c.drawing.position(0, 0, 0)))
	at("schedule-row-0", driver.AbsolutePositionForObject(c.modes).Add(fyne.NewPos(60, rowHeight*1.5)))
	at("lanes", driver.AbsolutePositionForObject(c.lanes))
	for _, f := range c.details.fields {
		at("field-"+f.name.Text, driver.AbsolutePositionForObject(f).Add(fyne.NewPos(20, f.Size().Height/2)))
	}
}
