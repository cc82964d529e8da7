package figures

import (
	"fmt"
	"image/color"

	"gonum.org/v1/plot/vg"

	"stillroom/app/study"
)

// absorption draws each absorber's diffuse coefficient, and under them those that
// are kept for comparison.
func (p lanePen) absorption() {
	_, y0, _, y1 := p.field()
	a := scale{lo: 0, hi: 1.05, y0: y0, y1: y1}
	if len(p.r.Absorbers) == 0 && len(p.v.Kept) == 0 {
		x0, _, x1, _ := p.field()
		p.text((x0+x1)/2, (y0+y1)/2, "No absorbers yet", p.s.Text, atMiddle, mix(p.s.Paper, p.s.Ink, 0.6))
	}
	p.marks(a, []float64{0, 0.25, 0.5, 0.75, 1}, "%.2f")
	if deg := p.r.Options.FieldDeg; deg < 90 {
		x0, _, _, _ := p.field()
		p.text(x0+6*px, y1-7*px, fmt.Sprintf("angles to %.0f°", deg), p.s.Text*0.92, atLeft, p.s.Ink)
	}
	dashes := [][]vg.Length{nil, {6 * px, 3 * px}, {2 * px, 2 * px}, {8 * px, 3 * px, 2 * px, 3 * px}}
	var used []frame
	for _, row := range p.v.Kept {
		used = p.coefficient(a, row, 1.1*px, p.s.Slate, []vg.Length{3 * px, 3 * px}, used)
	}
	for _, i := range p.absorberOrder() {
		w := 1.3 * px
		if i == p.v.Absorber {
			w = 2.6 * px
		}
		used = p.coefficient(a, p.r.Absorbers[i], w, p.s.Ochre, dashes[i%len(dashes)], used)
	}
}

// coefficient draws one curve with its name over its highest point where there is
// room, and returns what lettering has taken.
func (p lanePen) coefficient(a scale, row study.AbsorberRow, width vg.Length, ink color.Color, dash []vg.Length, used []frame) []frame {
	var pts []vg.Point
	for _, t := range row.Report.ThirdOctaves {
		if p.sees(t.Hz) {
			pts = append(pts, vg.Point{X: p.x(t.Hz), Y: a.y(t.Diffuse)})
		}
	}
	p.curve(pts, width, ink, dash...)
	best := highest(pts)
	if best < 0 {
		return used
	}
	x, y, size := pts[best].X, pts[best].Y+7*px, p.s.Text*0.85
	half := p.measure(row.ID, size)/2 + 2*px
	left, _, right, _ := p.field()
	x = max(left+half, min(right-half, x))
	at := frame{x - half, y - size/2, x + half, y + size/2}
	if taken(used, at) {
		return used
	}
	p.text(x, y, row.ID, size, atMiddle, p.s.Ink)
	return append(used, at)
}

func highest(pts []vg.Point) int {
	best := -1
	for i, q := range pts {
		if best < 0 || q.Y > pts[best].Y {
			best = i
		}
	}
	return best
}
