package window

import (
	"image"
	"image/color"
	"slices"
	"sync"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/widget"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/app/figures"
)

// easel draws pictures in the background, round by round: all that are wanted at
// one time, side by side, put up together so that the window is painted once.
// What is wanted meanwhile waits for the next round, the latest wish winning.
type easel struct {
	do     func(func())
	wanted []*picture
	busy   bool
	rounds int
	hung   func() // after each round
}

// want asks for a picture to be drawn. Those asked for in one turn of the UI
// goroutine share a round.
func (e *easel) want(p *picture) {
	if !slices.Contains(e.wanted, p) {
		e.wanted = append(e.wanted, p)
	}
	if !e.busy {
		e.busy = true
		e.do(e.round)
	}
}

// round draws what is wanted.
func (e *easel) round() {
	var jobs []job
	for _, p := range e.wanted {
		jobs = append(jobs, p.job())
	}
	e.wanted = nil
	go func() {
		var group sync.WaitGroup
		for i := range jobs {
			group.Go(func() { jobs[i].draw() })
		}
		group.Wait()
		e.do(func() { e.hang(jobs) })
	}()
}

// hang puts the drawn pictures up.
func (e *easel) hang(jobs []job) {
	for _, j := range jobs {
		j.p.swap(j.img)
	}
	e.rounds++
	if e.hung != nil {
		e.hung()
	}
	if len(e.wanted) > 0 {
		e.round()
		return
	}
	e.busy = false
}

// job is one picture to be drawn as it was wanted.
type job struct {
	p     *picture
	img   *image.RGBA
	w, h  int
	scale float64
	paper color.Color
	paint func(draw.Canvas)
}

func (j *job) draw() { j.img = figures.Render(j.img, j.w, j.h, j.scale, j.paper, j.paint) }

// picture shows a figure. It is drawn into the image that is not shown.
type picture struct {
	widget.BaseWidget
	easel  *easel
	paint  func(draw.Canvas)
	paper  color.Color
	raster *canvas.Raster

	shown, spare *image.RGBA
	w, h         int // wanted, pixels
	scale        float64
}

func newPicture(e *easel) *picture {
	p := &picture{easel: e, shown: image.NewRGBA(image.Rect(0, 0, 1, 1)), scale: 1}
	p.raster = canvas.NewRaster(p.generate)
	p.ExtendBaseWidget(p)
	return p
}

// show draws a new figure on paper of a colour.
func (p *picture) show(paper color.Color, paint func(draw.Canvas)) {
	p.paint, p.paper = paint, paper
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
	if p.paint != nil && p.w > 1 && p.h > 1 {
		p.easel.want(p)
	}
}

func (p *picture) job() job {
	j := job{p: p, img: p.spare, w: p.w, h: p.h, scale: p.scale, paper: p.paper, paint: p.paint}
	p.spare = nil
	return j
}

func (p *picture) swap(img *image.RGBA) {
	p.spare, p.shown = p.shown, img
	p.raster.Refresh()
}

// CreateRenderer shows the raster alone.
func (p *picture) CreateRenderer() fyne.WidgetRenderer { return widget.NewSimpleRenderer(p.raster) }

// MinSize lets the layout decide.
func (p *picture) MinSize() fyne.Size { return fyne.NewSize(20, 20) }
