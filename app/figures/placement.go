package figures

import (
	"gonum.org/v1/plot/vg"

	"stillroom/app/project"
)

// Placement is how metres lie on a drawing: to the right and up from the
// canvas's lower left corner. In the plan x runs to the right and y up; in the
// section x to the right and z up.
type Placement struct {
	X0, Y0        vg.Length // of the origin
	Scale         vg.Length // per metre
	Width, Height float64   // of the room as drawn, m
}

// drawingMargin is what dimension lines need round the room.
const (
	marginLeft   = 46 * px
	marginRight  = 18 * px
	marginBottom = 40 * px
	marginTop    = 20 * px
)

func place(roomW, roomH float64, w, h vg.Length) Placement {
	s := min((w-marginLeft-marginRight)/vg.Length(roomW), (h-marginBottom-marginTop)/vg.Length(roomH))
	s = max(s, 0.1)
	p := Placement{Scale: s, Width: roomW, Height: roomH}
	p.X0 = marginLeft + (w-marginLeft-marginRight-s*vg.Length(roomW))/2
	p.Y0 = marginBottom + (h-marginBottom-marginTop-s*vg.Length(roomH))/2
	return p
}

// PlanPlacement returns how the plan lies on a canvas of the given size.
func PlanPlacement(p project.Project, w, h vg.Length) Placement {
	return place(p.Room.Length, p.Room.Width, w, h)
}

// SectionPlacement returns how the long section lies on a canvas of the given size.
func SectionPlacement(p project.Project, w, h vg.Length) Placement {
	return place(p.Room.Length, p.Room.Height, w, h)
}

// To returns where a point in metres lies.
func (p Placement) To(x, y float64) (vg.Length, vg.Length) {
	return p.X0 + p.Scale*vg.Length(x), p.Y0 + p.Scale*vg.Length(y)
}

// From returns the point in metres at a place.
func (p Placement) From(x, y vg.Length) (float64, float64) {
	return float64((x - p.X0) / p.Scale), float64((y - p.Y0) / p.Scale)
}

// holding returns the placement with the room's size changed and nothing moved.
func (p Placement) holding(width, height float64) Placement {
	p.Width, p.Height = width, height
	return p
}
