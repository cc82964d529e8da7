package sheets

import "strings"

// column is one column of a table: its heading and whether it holds figures, set
// to the right. A column is as wide as what it holds; those with a share divide
// among them what is left of the page's width, and wrap.
type column struct {
	head  string
	share float64
	right bool
}

// widest is how wide a column without a share may become, points; beyond it
// wraps.
const widest = 110.0

// edges returns where the columns begin and the last one ends.
func (s *writer) edges(columns []column, rows [][]string) []float64 {
	var (
		widths = make([]float64, len(columns))
		rest   = s.w - 2*margin
		shares float64
	)
	for i, c := range columns {
		shares += c.share
		if c.share > 0 {
			continue
		}
		for word := range strings.FieldsSeq(c.head) {
			widths[i] = max(widths[i], s.width(word, "B"))
		}
		for _, r := range rows {
			for line := range strings.SplitSeq(r[i], "\n") {
				widths[i] = max(widths[i], s.width(line, ""))
			}
		}
		// A little more than the letters: rounding must not break a line.
		widths[i] = min(widest, widths[i]) + 2*cellPad + 1
		rest -= widths[i]
	}
	edges := []float64{margin}
	for i, c := range columns {
		switch {
		case c.share > 0:
			widths[i] = rest * c.share / shares
		case shares == 0:
			widths[i] *= (s.w - 2*margin) / (s.w - 2*margin - rest)
		}
		edges = append(edges, edges[i]+widths[i])
	}
	return edges
}

// width returns how wide a text of a table is, points.
func (s *writer) width(text, style string) float64 {
	s.doc.SetFont(family, style, textSize)
	return s.doc.GetStringWidth(text)
}

// table writes rows under their headings; a page that is full goes on with the
// headings again.
func (s *writer) table(columns []column, rows [][]string) {
	edges := s.edges(columns, rows)
	heads := make([]string, len(columns))
	for i, c := range columns {
		heads[i] = c.head
	}
	// The headings do not stand alone at the foot of a page.
	if len(rows) > 0 && s.y+s.rowHeight(edges, heads)+s.rowHeight(edges, rows[0]) > s.bottom() {
		s.page()
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
