package figures

import (
	"image/color"
	"math"
	"sort"
	"strings"
	"sync"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"golang.org/x/image/font/opentype"
	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
)

// lettering is the one family of letters, read once.
var lettering = sync.OnceValue(func() *font.Cache {
	parse := func(data []byte) *opentype.Font {
		f, err := opentype.Parse(data)
		if err != nil {
			panic("figures: " + err.Error())
		}
		return f
	}
	return font.NewCache(font.Collection{
		{Font: font.Font{Typeface: "Liberation", Variant: "Sans"}, Face: parse(liberationsansregular.TTF)},
		{Font: font.Font{Typeface: "Liberation", Variant: "Sans", Weight: 2}, Face: parse(liberationsansbold.TTF)},
	})
})

// pen draws on a canvas in a style.
type pen struct {
	c draw.Canvas
	s Style
}

func (p pen) width() vg.Length  { return p.c.Max.X - p.c.Min.X }
func (p pen) height() vg.Length { return p.c.Max.Y - p.c.Min.Y }

// at moves from the canvas's lower left corner.
func (p pen) at(x, y vg.Length) vg.Point { return vg.Point{X: p.c.Min.X + x, Y: p.c.Min.Y + y} }

// ground fills the canvas with paper, where it is not laid already.
func (p pen) ground() {
	if !p.s.Laid {
		p.fill(0, 0, p.width(), p.height(), p.s.Paper)
	}
}

// fill fills a rectangle.
func (p pen) fill(x0, y0, x1, y1 vg.Length, col color.Color) {
	p.c.SetColor(col)
	p.c.Fill(box(p.at(x0, y0), p.at(x1, y1)))
}

// outline strokes a rectangle.
func (p pen) outline(x0, y0, x1, y1, width vg.Length, col color.Color, dash ...vg.Length) {
	p.stroke(width, col, dash...)
	p.c.Stroke(box(p.at(x0, y0), p.at(x1, y1)))
}

// stroke sets the line style.
func (p pen) stroke(width vg.Length, col color.Color, dash ...vg.Length) {
	p.c.SetColor(col)
	p.c.SetLineWidth(width)
	p.c.SetLineDash(dash, 0)
}

// line strokes one line.
func (p pen) line(x0, y0, x1, y1, width vg.Length, col color.Color, dash ...vg.Length) {
	p.stroke(width, col, dash...)
	var path vg.Path
	path.Move(p.at(x0, y0))
	path.Line(p.at(x1, y1))
	p.c.Stroke(path)
}

// curve strokes a polyline.
func (p pen) curve(pts []vg.Point, width vg.Length, col color.Color, dash ...vg.Length) {
	if len(pts) < 2 {
		return
	}
	p.stroke(width, col, dash...)
	var path vg.Path
	path.Move(p.at(pts[0].X, pts[0].Y))
	for _, q := range pts[1:] {
		path.Line(p.at(q.X, q.Y))
	}
	p.c.Stroke(path)
}

// disc fills a circle.
func (p pen) disc(x, y, r vg.Length, col color.Color) {
	var path vg.Path
	c := p.at(x, y)
	path.Move(vg.Point{X: c.X + r, Y: c.Y})
	path.Arc(c, r, 0, 2*math.Pi)
	path.Close()
	p.c.SetColor(col)
	p.c.Fill(path)
}

// ring strokes a circle, as a polygon of so many sides that no eye counts them.
func (p pen) ring(x, y, r, width vg.Length, col color.Color) {
	sides := 8 + int(2*r/px)
	var path vg.Path
	for i := range sides {
		sin, cos := math.Sincos(2 * math.Pi * float64(i) / float64(sides))
		q := p.at(x+r*vg.Length(cos), y+r*vg.Length(sin))
		if i == 0 {
			path.Move(q)
		} else {
			path.Line(q)
		}
	}
	path.Close()
	p.stroke(width, col)
	p.c.Stroke(path)
}

// polygon fills a closed path.
func (p pen) polygon(col color.Color, pts ...vg.Point) {
	var path vg.Path
	path.Move(p.at(pts[0].X, pts[0].Y))
	for _, q := range pts[1:] {
		path.Line(p.at(q.X, q.Y))
	}
	path.Close()
	p.c.SetColor(col)
	p.c.Fill(path)
}

// Places of a text relative to its point.
const (
	atLeft   = 0.0
	atMiddle = 0.5
	atRight  = 1.0
)

// face returns the letters of a size.
func (p pen) face(size vg.Length, bold bool) font.Face {
	f := font.Font{Typeface: "Liberation", Variant: "Sans"}
	if bold {
		f.Weight = 2
	}
	return lettering().Lookup(f, size)
}

// text writes a line whose vertical middle is at y and which begins, is centred
// or ends at x.
func (p pen) text(x, y vg.Length, s string, size vg.Length, align float64, col color.Color) {
	f := p.face(size, false)
	p.c.SetColor(col)
	p.c.FillString(f, p.at(x-f.Width(s)*vg.Length(align), y-0.36*size), s)
}

// upright writes a line turned to read upwards, centred on its point.
func (p pen) upright(x, y vg.Length, s string, size vg.Length, col color.Color) {
	f := p.face(size, false)
	at := p.at(x, y)
	p.c.Push()
	p.c.Translate(at)
	p.c.Rotate(math.Pi / 2)
	p.c.SetColor(col)
	p.c.FillString(f, vg.Point{X: -f.Width(s) / 2, Y: -0.36 * size}, s)
	p.c.Pop()
}

// measure returns the width of a line.
func (p pen) measure(s string, size vg.Length) vg.Length {
	f := p.face(size, false)
	return f.Width(s)
}

// fitted cuts a line with an ellipsis where it is wider than its room; nothing is
// left where there is not even room for a few letters.
func (p pen) fitted(s string, size, room vg.Length) string {
	if p.measure(s, size) <= room {
		return s
	}
	runes := []rune(s)
	cut := func(n int) string { return strings.TrimRight(string(runes[:n]), " ,:") + "…" }
	// The first length that is too long: those below it fit.
	n := sort.Search(len(runes), func(n int) bool { return p.measure(cut(n), size) > room })
	if n > 4 {
		return cut(n - 1)
	}
	return ""
}

// box returns the path of a rectangle.
func box(a, b vg.Point) vg.Path {
	var path vg.Path
	path.Move(a)
	path.Line(vg.Point{X: b.X, Y: a.Y})
	path.Line(b)
	path.Line(vg.Point{X: a.X, Y: b.Y})
	path.Close()
	return path
}
