// Package figures draws the lanes and the drawing as pictures. Each is one
// function on a draw.Canvas, so that window, papers and the figure verb show
// the same picture. Nothing is computed here but places on paper.
package figures

import (
	"image/color"

	"gonum.org/v1/plot/vg"

	"stillroom/app/study"
)

// Lane names a picture on the common frequency ruler.
type Lane string

// The lanes, in their order down the window.
const (
	ModesLane      Lane = "modes"
	DensityLane    Lane = "density"
	LevelLane      Lane = "level"
	DecayLane      Lane = "decay"
	RingingLane    Lane = "ringing"
	AbsorptionLane Lane = "absorption"
)

// View is what of a result is to be seen: the stretch of the ruler, whose ears,
// and what is selected.
type View struct {
	FromHz, ToHz float64
	Seat         int
	Mode         int // selected mode's index in Result.Modes, −1 for none
	Absorber     int // selected absorber's index, −1 for none
	Loudspeaker  int // −1 for none
	SelectedSeat int // −1 for none
	Surface      int // selected acoustics.Surface, −1 for none
	US           bool
	Kept         []study.AbsorberRow // absorbers' curves to compare with
	Ruler        bool                // draw the frequency scale under this lane
	// PlanAt and SectionAt hold the drawings where they are while something is
	// dragged; nil fits them to the canvas.
	PlanAt, SectionAt *Placement
}

// Style is the set of inks. Two inks carry the meaning everywhere: slate for
// the room as it stands, ochre for the room treated.
type Style struct {
	Paper   color.Color // ground
	Ink     color.Color // text and the room's outline
	Faint   color.Color // grid, dimension lines
	Slate   color.Color // bare
	Ochre   color.Color // treated
	Warning color.Color // over the limit; never without a second sign
	Select  color.Color // what is selected
	Text    vg.Length   // size of ordinary lettering
	Hair    vg.Length   // thinnest line
	// Laid says that the canvas has the paper's colour already.
	Laid bool
}

// Frame is the fixed margin round a lane's data, so that all lanes share one
// frequency ruler: x = Left + (W−Left−Right)·ln(f/from)/ln(to/from).
type Frame struct{ Left, Right, Top, Bottom vg.Length }
