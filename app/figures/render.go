package figures

import (
	"fmt"
	"image"
	"image/color"
	imagedraw "image/draw"
	"io"

	"git.sr.ht/~sbinet/gg"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/draw"
	"gonum.org/v1/plot/vg/vgimg"
	"gonum.org/v1/plot/vg/vgpdf"
	"gonum.org/v1/plot/vg/vgsvg"

	"stillroom/app/study"
)

// Render draws into an image of the given size in pixels, one window unit being
// scale pixels, on a ground of paper's colour. A buffer of that size may be
// given to be drawn over and returned; nil makes a new one.
func Render(buffer *image.RGBA, w, h int, scale float64, paper color.Color, paint func(draw.Canvas)) *image.RGBA {
	if buffer == nil || buffer.Rect.Dx() != w || buffer.Rect.Dy() != h {
		buffer = image.NewRGBA(image.Rect(0, 0, w, h))
	}
	ctx := gg.NewContextForRGBA(buffer)
	ctx.SetLineCapButt()
	ctx.InvertY()
	dpi := int(96*scale + 0.5)
	c := vgimg.NewWith(vgimg.UseDPI(dpi), vgimg.UseImageWithContext(buffer, ctx))
	// The canvas has laid a white ground.
	imagedraw.Draw(buffer, buffer.Rect, image.NewUniform(paper), image.Point{}, imagedraw.Src)
	paint(draw.New(c))
	return buffer
}

// Names of the drawings that [Write] knows beside the lanes.
const (
	PlanName    = "plan"
	SectionName = "section"
)

// Painter returns what draws a lane or drawing by name, false where there is
// none of that name.
func Painter(name string, r *study.Result, v View, s Style) (paint func(draw.Canvas), ok bool) {
	switch name {
	case PlanName:
		return func(c draw.Canvas) { DrawPlan(c, r, v, s) }, true
	case SectionName:
		return func(c draw.Canvas) { DrawSection(c, r, v, s) }, true
	}
	lane, ok := LaneNamed(name)
	if !ok {
		return nil, false
	}
	return func(c draw.Canvas) {
		title := pen{c, s}
		title.ground()
		title.text(LaneFrame().Left, title.height()-10*px, lane.Title(), s.Text, atLeft, s.Ink)
		DrawLane(draw.Crop(c, 0, 0, 0, -16*px), lane, r, v, s)
	}, true
}

// Formats lists the formats of [Write].
func Formats() []string { return []string{"png", "svg", "pdf"} }

// Write writes a lane or drawing as a picture of its own: png at 192 dots per
// inch, svg or pdf. The name and format must be known ones.
func Write(w io.Writer, format, name string, r *study.Result, v View, s Style) error {
	paint, ok := Painter(name, r, v, s)
	if !ok {
		return fmt.Errorf("no lane or drawing is called %q", name)
	}
	width, height := 900*px, 300*px
	if name == PlanName || name == SectionName {
		height = 620 * px
	}
	var c interface {
		vg.CanvasSizer
		io.WriterTo
	}
	switch format {
	case "png":
		c = vgimg.PngCanvas{Canvas: vgimg.NewWith(vgimg.UseWH(width, height), vgimg.UseDPI(192))}
	case "svg":
		c = vgsvg.New(width, height)
	case "pdf":
		c = vgpdf.New(width, height)
	default:
		return fmt.Errorf("no picture format is called %q", format)
	}
	paint(draw.New(c))
	_, err := c.WriteTo(w)
	return err
}
