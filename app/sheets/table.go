package sheets

// column is one column of a table: its heading, its share of the page's width,
// and whether it holds figures, set to the right.
type column struct {
	head  string
	share float64
	right bool
}

// table writes rows under their headings; a page that is full goes on with the
// headings again. A cell that is too wide wraps.
func (s *writer) table(columns []column, rows [][]string) {
	whole := 0.0
	for _, c := range columns {
		whole += c.share
	}
	width := s.w - 2*margin
	var edges []float64
	x := margin
	for _, c := range columns {
		edges = append(edges, x)
		x += width * c.share / whole
	}
	edges = append(edges, x)
	heads := make([]string, len(columns))
	for i, c := range columns {
		heads[i] = c.head
	}
	s.row(columns, edges, heads, "B", true)
	for i, r := range rows {
		if s.y+s.rowHeight(edges, r) > s.bottom() {
			s.page()
			s.row(columns, edges, heads, "B", true)
		}
		s.row(columns, edges, r, "", i == len(rows)-1)
	}
	s.y += 4
}

const cellPad = 3.0

func (s *writer) cells(edges []float64, r []string) [][]string {
	out := make([][]string, len(r))
	for i, text := range r {
		out[i] = s.wrap(text, edges[i+1]-edges[i]-2*cellPad, textSize)
	}
	return out
}

func (s *writer) rowHeight(edges []float64, r []string) float64 {
	lines := 1
	for _, c := range s.cells(edges, r) {
		lines = max(lines, len(c))
	}
	return rowRoom + float64(lines-1)*textSize*1.25
}

func (s *writer) row(columns []column, edges []float64, r []string, style string, strong bool) {
	height := s.rowHeight(edges, r)
	for i, lines := range s.cells(edges, r) {
		for k, text := range lines {
			s.doc.SetFont(family, style, textSize)
			x := edges[i] + cellPad
			room := edges[i+1] - edges[i] - 2*cellPad
			if columns[i].right {
				x = edges[i+1] - cellPad - min(room, s.doc.GetStringWidth(text))
			}
			s.line(x, s.y+9+float64(k)*textSize*1.25, room+0.5, text, textSize, style)
		}
	}
	s.y += height
	s.doc.SetDrawColor(190, 190, 190)
	s.doc.SetLineWidth(0.3)
	if strong {
		s.doc.SetDrawColor(30, 30, 30)
		s.doc.SetLineWidth(0.6)
	}
	s.doc.Line(margin, s.y, s.w-margin, s.y)
}
