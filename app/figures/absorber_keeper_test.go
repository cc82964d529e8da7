package figures

import (
	"fmt"
	"image"
	"image/color"
	"math"
	"strings"

	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
	"pgregory.net/rapid"

	"stillroom/app/project"
)

// drawn draws an absorber on a canvas that keeps what is drawn.
func drawn(a project.Absorber, us bool, s Style, w, h vg.Length) *keeper {
	k := &keeper{}
	c := draw.Canvas{Canvas: k, Rectangle: vg.Rectangle{Max: vg.Point{X: w, Y: h}}}
	DrawAbsorber(c, a, us, s)
	return k
}

// keeper is a canvas that keeps where it was painted on.
type keeper struct {
	all     []painted // everything
	fills   []painted
	lines   []painted // of two points each
	letters []words
	col     color.Color
	width   vg.Length
	at      vg.Point // shift
	turned  bool     // by a quarter
	stack   []keeper
}

type painted struct {
	frame
	col color.Color
}

type words struct {
	frame
	text string
}

func (k *keeper) holds(t rapid.TB, value string) {
	for _, l := range k.letters {
		if l.text == value || strings.HasSuffix(l.text, " "+value) || value == "" {
			return
		}
	}
	t.Fatalf("%s is not written: %v", value, k.letters)
}

func (k *keeper) SetLineWidth(w vg.Length)                     { k.width = w }
func (k *keeper) SetLineDash(pattern []vg.Length, _ vg.Length) {}
func (k *keeper) SetColor(c color.Color)                       { k.col = c }
func (k *keeper) Rotate(rad float64)                           { k.turned = rad != 0 }
func (k *keeper) Translate(p vg.Point)                         { k.at = p }
func (k *keeper) Scale(x, y float64)                           { panic("scaled") }
func (k *keeper) Push()                                        { k.stack = append(k.stack, keeper{at: k.at, turned: k.turned}) }
func (k *keeper) DrawImage(vg.Rectangle, image.Image)          { panic("an image") }

func (k *keeper) Pop() {
	last := k.stack[len(k.stack)-1]
	k.at, k.turned, k.stack = last.at, last.turned, k.stack[:len(k.stack)-1]
}

func (k *keeper) Stroke(p vg.Path) {
	f := bounds(p)
	k.all = append(k.all, painted{f.grown(k.width / 2), k.col})
	if len(p) == 2 {
		k.lines = append(k.lines, painted{f, k.col})
	}
}

func (k *keeper) Fill(p vg.Path) {
	k.all = append(k.all, painted{bounds(p), k.col})
	k.fills = append(k.fills, painted{bounds(p), k.col})
}

// FillString keeps the frame of the letters: 0.74 of their size above the line
// and 0.21 below.
func (k *keeper) FillString(f font.Face, at vg.Point, s string) {
	size, w := f.Font.Size, f.Width(s)
	box := frame{at.X, at.Y - 0.21*size, at.X + w, at.Y + 0.74*size}
	if k.turned {
		box = frame{k.at.X - box.y1, k.at.Y + box.x0, k.at.X - box.y0, k.at.Y + box.x1}
	}
	k.all = append(k.all, painted{box, k.col})
	k.letters = append(k.letters, words{box, s})
}

func bounds(p vg.Path) frame {
	f := frame{vg.Length(math.Inf(1)), vg.Length(math.Inf(1)), vg.Length(math.Inf(-1)), vg.Length(math.Inf(-1))}
	for _, c := range p {
		if c.Type == vg.CloseComp {
			continue
		}
		if math.IsNaN(float64(c.Pos.X + c.Pos.Y)) {
			panic(fmt.Sprintf("a path goes through %v", c.Pos))
		}
		f.x0, f.y0 = min(f.x0, c.Pos.X-c.Radius), min(f.y0, c.Pos.Y-c.Radius)
		f.x1, f.y1 = max(f.x1, c.Pos.X+c.Radius), max(f.y1, c.Pos.Y+c.Radius)
	}
	return f
}

func (f frame) grown(by vg.Length) frame {
	return frame{f.x0 - by, f.y0 - by, f.x1 + by, f.y1 + by}
}
