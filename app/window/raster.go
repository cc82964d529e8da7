package window

import (
	"image"
	"image/color"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/widget"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/figures"
)

// picture shows a figure. It is drawn in the background into the image that is
// not shown, the latest wish winning, and swapped in when done.
type picture struct {
	widget.BaseWidget
	do     func(func())
	paint  func(draw.Canvas)
	raster *canvas.Raster

	shown, spare *image.RGBA
	w, h         int // wanted, pixels
	scale        float64
	busy, again  bool
	frames       int // drawn so far
	drawn        func()
}

func newPicture(do func(func())) *picture {
	p := &picture{do: do, shown: image.NewRGBA(image.Rect(0, 0, 1, 1)), scale: 1}
	p.shown.Set(0, 0, color.Transparent)
	p.raster = canvas.NewRaster(p.generate)
	p.ExtendBaseWidget(p)
	return p
}

// show draws a new figure.
func (p *picture) show(paint func(draw.Canvas)) {
	p.paint = paint
	p.request()
}

// generate hands out the image there is; a size it has not is drawn afterwards.
func (p *picture) generate(w, h int) image.Image {
	if size := p.Size(); size.Width > 0 && (w != p.w || h != p.h) {
		p.w, p.h, p.scale = w, h, float64(w)/float64(size.Width)
		p.request()
	}
	return p.shown
}

func (p *picture) request() {
	if p.paint == nil || p.w <= 1 || p.h <= 1 {
		return
	}
	if p.busy {
		p.again = true
		return
	}
	p.busy, p.again = true, false
	paint, buffer, w, h, scale := p.paint, p.spare, p.w, p.h, p.scale
	p.spare = nil
	go func() {
		img := figures.Render(buffer, w, h, scale, paint)
		p.do(func() { p.swap(img) })
	}()
}

func (p *picture) swap(img *image.RGBA) {
	p.spare, p.shown = p.shown, img
	p.busy = false
	p.frames++
	p.raster.Refresh()
	if p.drawn != nil {
		p.drawn()
	}
	if p.again {
		p.request()
	}
}

// CreateRenderer shows the raster alone.
func (p *picture) CreateRenderer() fyne.WidgetRenderer { return widget.NewSimpleRenderer(p.raster) }

// MinSize lets the layout decide.
func (p *picture) MinSize() fyne.Size { return fyne.NewSize(20, 20) }
