package window

import (
	"cmp"
	"image/color"
	"math"
	"slices"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/canvas"
	"fyne.io/fyne/v2/driver/desktop"
	"fyne.io/fyne/v2/widget"
)

// scheduleColumn is one column: its heading, its share of the width, and
// whether it holds figures, set to the right.
type scheduleColumn struct {
	head  string
	share float32
	right bool
}

// scheduleRow is one row: its cells, what each sorts by, and what it stands for.
type scheduleRow struct {
	cells  []string
	keys   []float64
	item   int
	strong bool // a problem
}

// schedule is a sortable table of which one row is selected. It draws only the
// rows that show.
type schedule struct {
	widget.BaseWidget
	columns  []scheduleColumn
	rows     []scheduleRow
	chosen   int // item of the selected row, −1 for none
	onSelect func(item int)
	dark     bool
	sorted   int // column, −1: as given
	falling  bool
	top      float32 // scrolled by
	r        *scheduleRenderer
}

var (
	_ fyne.Scrollable   = (*schedule)(nil)
	_ fyne.Focusable    = (*schedule)(nil)
	_ desktop.Mouseable = (*schedule)(nil)
)

const rowHeight = 20

func newSchedule(columns []scheduleColumn, onSelect func(item int)) *schedule {
	s := &schedule{columns: columns, onSelect: onSelect, chosen: -1, sorted: -1}
	s.ExtendBaseWidget(s)
	return s
}

// show puts rows in place and selects one; a selection from elsewhere is
// scrolled into view.
func (s *schedule) show(rows []scheduleRow, chosen int, dark bool) {
	moved := chosen != s.chosen
	s.rows, s.chosen, s.dark = rows, chosen, dark
	s.sort()
	if moved {
		s.reveal()
	}
	if s.Visible() {
		s.Refresh()
	}
}

// Show shows the rows put in place while another schedule lay on top.
func (s *schedule) Show() {
	s.BaseWidget.Show()
	s.Refresh()
}

func (s *schedule) sort() {
	if s.sorted < 0 {
		return
	}
	rows := slices.Clone(s.rows)
	slices.SortStableFunc(rows, func(a, b scheduleRow) int {
		x, y := a.keys[s.sorted], b.keys[s.sorted]
		switch {
		case math.IsNaN(x) || math.IsNaN(y):
			// What has no figure comes last either way.
			return boolInt(math.IsNaN(x)) - boolInt(math.IsNaN(y))
		case s.falling:
			return cmp.Compare(y, x)
		}
		return cmp.Compare(x, y)
	})
	s.rows = rows
}

func boolInt(b bool) int {
	if b {
		return 1
	}
	return 0
}

// index returns the row of the chosen item, −1 for none.
func (s *schedule) index() int {
	return slices.IndexFunc(s.rows, func(r scheduleRow) bool { return r.item == s.chosen })
}

func (s *schedule) reveal() {
	i := s.index()
	if i < 0 {
		return
	}
	y, room := float32(i)*rowHeight, s.Size().Height-rowHeight
	if y < s.top {
		s.top = y
	}
	if y+rowHeight > s.top+room {
		s.top = y + rowHeight - room
	}
}

// Scrolled scrolls the rows.
func (s *schedule) Scrolled(e *fyne.ScrollEvent) {
	s.top -= e.Scrolled.DY * 1.5
	s.clamp()
	s.Refresh()
}

func (s *schedule) clamp() {
	s.top = min(s.top, float32(len(s.rows))*rowHeight-(s.Size().Height-rowHeight))
	s.top = max(s.top, 0)
}

// MouseDown selects a row, or sorts by the heading it is on.
func (s *schedule) MouseDown(e *desktop.MouseEvent) {
	if c := fyne.CurrentApp().Driver().CanvasForObject(s); c != nil {
		c.Focus(s)
	}
	if e.Position.Y < rowHeight {
		s.sortBy(s.columnAt(e.Position.X))
		return
	}
	i := int((e.Position.Y - rowHeight + s.top) / rowHeight)
	if i >= 0 && i < len(s.rows) {
		s.onSelect(s.rows[i].item)
	}
}

// MouseUp does nothing.
func (s *schedule) MouseUp(*desktop.MouseEvent) {}

// sortBy sorts by a column, the other way round where it is sorted so already,
// and as given the third time.
func (s *schedule) sortBy(column int) {
	switch {
	case column != s.sorted:
		s.sorted, s.falling = column, false
	case !s.falling:
		s.falling = true
	default:
		s.sorted, s.falling = -1, false
		slices.SortStableFunc(s.rows, func(a, b scheduleRow) int { return a.item - b.item })
	}
	s.sort()
	s.reveal()
	s.Refresh()
}

func (s *schedule) columnAt(x float32) int {
	for i, edge := range s.edges()[1:] {
		if x < edge {
			return i
		}
	}
	return len(s.columns) - 1
}

// edges returns where columns begin and the last ends.
func (s *schedule) edges() []float32 {
	var whole float32
	for _, c := range s.columns {
		whole += c.share
	}
	x := float32(6)
	edges := []float32{x}
	for _, c := range s.columns {
		x += (s.Size().Width - 12) * c.share / whole
		edges = append(edges, x)
	}
	return edges
}

// TypedKey moves the selection.
func (s *schedule) TypedKey(e *fyne.KeyEvent) {
	i := s.index()
	page := max(1, int((s.Size().Height-rowHeight)/rowHeight)-1)
	switch e.Name {
	case fyne.KeyUp:
		i--
	case fyne.KeyDown:
		i++
	case fyne.KeyPageUp:
		i -= page
	case fyne.KeyPageDown:
		i += page
	case fyne.KeyHome:
		i = 0
	case fyne.KeyEnd:
		i = len(s.rows) - 1
	default:
		return
	}
	if len(s.rows) > 0 {
		s.onSelect(s.rows[max(0, min(len(s.rows)-1, i))].item)
	}
}

// FocusGained, FocusLost and TypedRune make the schedule take keys.
func (s *schedule) FocusGained() {}

// FocusLost changes nothing.
func (s *schedule) FocusLost() {}

// TypedRune takes no letters.
func (s *schedule) TypedRune(rune) {}

// CreateRenderer keeps a cell for each that shows.
func (s *schedule) CreateRenderer() fyne.WidgetRenderer {
	r := &scheduleRenderer{s: s, rule: canvas.NewLine(color.Black), band: canvas.NewRectangle(color.Transparent)}
	for range s.columns {
		r.heads = append(r.heads, canvas.NewText("", color.Black))
	}
	s.r = r
	return r
}

type scheduleRenderer struct {
	s     *schedule
	band  *canvas.Rectangle // behind the selected row
	rule  *canvas.Line
	heads []*canvas.Text
	cells [][]*canvas.Text
}

func (r *scheduleRenderer) Layout(size fyne.Size) {
	rows := max(0, int(math.Ceil(float64(size.Height-rowHeight)/rowHeight)))
	for len(r.cells) < rows {
		var row []*canvas.Text
		for range r.s.columns {
			row = append(row, canvas.NewText("", color.Black))
		}
		r.cells = append(r.cells, row)
	}
	r.s.clamp()
	r.Refresh()
}

func (r *scheduleRenderer) MinSize() fyne.Size { return fyne.NewSize(200, 3*rowHeight) }

func (r *scheduleRenderer) Refresh() {
	s := r.s
	style := look{s.dark}.style()
	edges := s.edges()
	for i, c := range s.columns {
		mark := ""
		if i == s.sorted {
			mark = " ▴"
			if s.falling {
				mark = " ▾"
			}
		}
		r.set(r.heads[i], c.head+mark, edges, i, 0, blend(style.Paper, style.Ink, 0.75), true)
	}
	r.rule.StrokeColor = blend(style.Paper, style.Ink, 0.4)
	r.rule.Position1 = fyne.NewPos(0, rowHeight-1)
	r.rule.Position2 = fyne.NewPos(s.Size().Width, rowHeight-1)
	r.band.Hide()
	first := int(s.top / rowHeight)
	for k, row := range r.cells {
		i := first + k
		y := rowHeight + float32(k)*rowHeight
		shows := i < len(s.rows) && y+rowHeight <= s.Size().Height+2
		for c, cell := range row {
			if !shows {
				cell.Hide()
				continue
			}
			ink := style.Ink
			if s.rows[i].strong && c == 0 {
				ink = style.Warning
			}
			r.set(cell, s.rows[i].cells[c], edges, c, y, ink, s.rows[i].strong)
			cell.Show()
		}
		if shows && s.rows[i].item == s.chosen {
			r.band.FillColor = translucent(style.Slate, 60)
			r.band.Move(fyne.NewPos(0, y))
			r.band.Resize(fyne.NewSize(s.Size().Width, rowHeight))
			r.band.Show()
		}
	}
	canvas.Refresh(s)
}

// set places one cell's text.
func (r *scheduleRenderer) set(t *canvas.Text, text string, edges []float32, column int, y float32, ink color.Color, bold bool) {
	t.TextSize = 11.5
	t.TextStyle = fyne.TextStyle{Bold: bold}
	t.Color = ink
	room := edges[column+1] - edges[column] - 8
	t.Text = fitted(text, room, t.TextSize, t.TextStyle)
	t.Alignment = fyne.TextAlignLeading
	if r.s.columns[column].right {
		t.Alignment = fyne.TextAlignTrailing
	}
	t.Move(fyne.NewPos(edges[column], y+3))
	t.Resize(fyne.NewSize(room, rowHeight-4))
}

// fitted cuts a text with an ellipsis where it is wider than its room.
func fitted(text string, room, size float32, style fyne.TextStyle) string {
	if fyne.MeasureText(text, size, style).Width <= room {
		return text
	}
	runes := []rune(text)
	for len(runes) > 0 {
		runes = runes[:len(runes)-1]
		if fyne.MeasureText(string(runes)+"…", size, style).Width <= room {
			break
		}
	}
	return string(runes) + "…"
}

func (r *scheduleRenderer) Objects() []fyne.CanvasObject {
	objects := []fyne.CanvasObject{r.band, r.rule}
	for _, h := range r.heads {
		objects = append(objects, h)
	}
	for _, row := range r.cells {
		for _, c := range row {
			objects = append(objects, c)
		}
	}
	return objects
}

func (r *scheduleRenderer) Destroy() {}
