package sheets

import (
	"image"
	"image/color"
	"math"

	"codeberg.org/go-pdf/fpdf"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// canvas lets the figures draw as vectors on a page: a vg.Canvas over a PDF
// document, its origin at the lower left of a rectangle of the page.
type canvas struct {
	doc   *fpdf.Fpdf
	x, y  float64 // of the rectangle's lower left corner, points from the top left
	w, h  float64
	state ink
	stack []ink
}

// ink is what Push keeps and Pop gives back.
type ink struct {
	width  vg.Length
	dash   []vg.Length
	offset vg.Length
	colour color.Color
}

var _ vg.Canvas = (*canvas)(nil)

// on returns a drawing canvas on a rectangle of the page, in points from the
// page's top left. end must be called when the drawing is done.
func on(doc *fpdf.Fpdf, x, y, w, h float64) (c draw.Canvas, end func()) {
	v := &canvas{doc: doc, x: x, y: y + h, w: w, h: h, state: ink{width: 1, colour: color.Black}}
	doc.ClipRect(x, y, w, h, false)
	return draw.Canvas{Canvas: v, Rectangle: vg.Rectangle{Max: vg.Point{X: vg.Length(w), Y: vg.Length(h)}}}, func() {
		doc.ClipEnd()
		doc.SetDashPattern(nil, 0)
		doc.SetLineWidth(0.5)
		doc.SetDrawColor(0, 0, 0)
		doc.SetFillColor(255, 255, 255)
		doc.SetTextColor(0, 0, 0)
	}
}

func (c *canvas) px(p vg.Point) (x, y float64) { return c.x + float64(p.X), c.y - float64(p.Y) }

func (c *canvas) SetLineWidth(w vg.Length) {
	c.state.width = w
	c.doc.SetLineWidth(float64(w))
}

func (c *canvas) SetLineDash(pattern []vg.Length, offset vg.Length) {
	c.state.dash, c.state.offset = pattern, offset
	dash := make([]float64, len(pattern))
	for i, d := range pattern {
		dash[i] = float64(d)
	}
	c.doc.SetDashPattern(dash, float64(offset))
}

func (c *canvas) SetColor(col color.Color) {
	c.state.colour = col
	n := color.NRGBAModel.Convert(col).(color.NRGBA)
	c.doc.SetDrawColor(int(n.R), int(n.G), int(n.B))
	c.doc.SetFillColor(int(n.R), int(n.G), int(n.B))
	c.doc.SetTextColor(int(n.R), int(n.G), int(n.B))
}

func (c *canvas) Rotate(rad float64) {
	c.doc.TransformRotate(rad*180/math.Pi, c.x, c.y)
}

func (c *canvas) Translate(p vg.Point) {
	c.doc.TransformTranslate(float64(p.X), -float64(p.Y))
}

func (c *canvas) Scale(x, y float64) { c.doc.TransformScale(x*100, y*100, c.x, c.y) }

func (c *canvas) Push() {
	c.stack = append(c.stack, c.state)
	c.doc.TransformBegin()
}

func (c *canvas) Pop() {
	c.doc.TransformEnd()
	last := len(c.stack) - 1
	s := c.stack[last]
	c.stack = c.stack[:last]
	c.SetLineWidth(s.width)
	c.SetLineDash(s.dash, s.offset)
	c.SetColor(s.colour)
}

func (c *canvas) trace(p vg.Path) {
	for _, e := range p {
		x, y := c.px(e.Pos)
		switch e.Type {
		case vg.MoveComp:
			c.doc.MoveTo(x, y)
		case vg.LineComp:
			c.doc.LineTo(x, y)
		case vg.ArcComp:
			c.arc(e)
		case vg.CurveComp:
			if len(e.Control) == 2 {
				x1, y1 := c.px(e.Control[0])
				x2, y2 := c.px(e.Control[1])
				c.doc.CurveBezierCubicTo(x1, y1, x2, y2, x, y)
			} else {
				x1, y1 := c.px(e.Control[0])
				c.doc.CurveTo(x1, y1, x, y)
			}
		case vg.CloseComp:
			c.doc.ClosePath()
		}
	}
}

// arc is drawn by chords of a few degrees.
func (c *canvas) arc(e vg.PathComp) {
	n := max(2, int(math.Ceil(math.Abs(e.Angle)/(math.Pi/24))))
	for i := range n + 1 {
		a := e.Start + e.Angle*float64(i)/float64(n)
		x, y := c.px(vg.Point{X: e.Pos.X + e.Radius*vg.Length(math.Cos(a)), Y: e.Pos.Y + e.Radius*vg.Length(math.Sin(a))})
		c.doc.LineTo(x, y)
	}
}

func (c *canvas) Stroke(p vg.Path) {
	if c.state.width <= 0 || len(p) == 0 {
		return
	}
	c.trace(p)
	c.doc.DrawPath("D")
}

func (c *canvas) Fill(p vg.Path) {
	if len(p) == 0 {
		return
	}
	c.trace(p)
	c.doc.DrawPath("f")
}

func (c *canvas) FillString(f font.Face, p vg.Point, s string) {
	if s == "" {
		return
	}
	style := ""
	if f.Font.Weight > 0 {
		style = "B"
	}
	c.doc.SetFont(family, style, float64(f.Font.Size))
	x, y := c.px(p)
	c.doc.Text(x, y, s)
}

func (c *canvas) DrawImage(vg.Rectangle, image.Image) {
	panic("sheets: figures on paper hold no images")
}
