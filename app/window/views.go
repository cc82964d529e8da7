package window

import (
	"fmt"
	"slices"

	"stillroom/app/figures"
)

// keepCurve keeps an absorber's curve on the absorption lane, to compare what comes
// after with it; −1 drops what is kept.
func (c *controller) keepCurve(absorber int) {
	switch r := c.state.Result; {
	case absorber < 0:
		c.state.Kept = nil
	case r != nil && absorber < len(r.Absorbers):
		row := r.Absorbers[absorber]
		row.ID = fmt.Sprintf("%s kept", row.ID)
		c.state.Kept = append(slices.Clone(c.state.Kept), row)
	}
	c.lanes.show(c.state)
}

// stopStudy ends a study that runs; what it has shown stays, and the next edit begins
// another.
func (c *controller) stopStudy() {
	c.runner.stop()
	c.say("Stopped. The next edit calculates again.")
	c.log("study stopped")
}

// switchTolerances shows what building tolerances and temperature make of the treated
// room, or not.
func (c *controller) switchTolerances() {
	c.state.Off = !c.state.Off
	c.study()
}

// switchField takes the diffuse field to 78° or to 90°.
func (c *controller) switchField() {
	c.state.To78 = !c.state.To78
	c.study()
}

// switchMap shows the level over the drawings, or the selected mode's pattern.
func (c *controller) switchMap() {
	c.state.Map = !c.state.Map
	c.study()
}

// fold folds a lane, or folds it out.
func (c *controller) fold(lane string) {
	folded := slices.Clone(c.state.Folded)
	if i := slices.Index(folded, lane); i >= 0 {
		folded = slices.Delete(folded, i, i+1)
	} else {
		folded = append(folded, lane)
	}
	c.state.Folded, c.settings.Folded = folded, folded
	c.settings.save()
	c.lanes.show(c.state)
	if lane == string(figures.RingingLane) {
		c.study()
	}
}

func (c *controller) foldDetails() {
	c.settings.Details = !c.settings.Details
	if c.settings.Details {
		c.details.root.Show()
		c.outer.SetOffset(c.settings.Outer)
	} else {
		c.settings.Outer = c.outer.Offset
		c.details.root.Hide()
		c.outer.SetOffset(1)
	}
	c.settings.save()
}

func (c *controller) switchDark() {
	c.state.Dark = !c.state.Dark
	c.settings.Dark = c.state.Dark
	c.settings.save()
	c.app.Settings().SetTheme(look{c.state.Dark})
	c.refresh()
}

func (c *controller) switchUnits() {
	c.state.US = !c.state.US
	c.settings.US = c.state.US
	c.settings.save()
	c.refresh()
}
