// Package sheets writes the printed set: mode schedule, plan and section,
// lanes, absorber list and cautions, as a PDF of vectors and text.
package sheets

import (
	"bytes"
	"fmt"
	"io"
	"time"

	"codeberg.org/go-fonts/liberation/liberationsansbold"
	"codeberg.org/go-fonts/liberation/liberationsansregular"
	"codeberg.org/go-pdf/fpdf"

	"stillroom/app/study"
	"stillroom/app/units"
)

// Options say how the set is written.
type Options struct {
	Letter bool   // US Letter instead of A4
	US     bool   // feet and inches
	Date   string // printed as given; empty: none
}

// family is the name under which the lettering is embedded.
const family = "lettering"

// Sizes and places on the page, points.
const (
	margin    = 40.0
	titleRoom = 54.0 // the title block's height
	rowRoom   = 12.5 // a table row's height
	textSize  = 7.5
)

// writer is one set being written.
type writer struct {
	doc   *fpdf.Fpdf
	r     *study.Result
	o     Options
	sys   units.System
	sheet string // name of the sheet being written
	w, h  float64
	y     float64
}

// Write writes the set of a complete result. The same result and options give
// the same bytes.
func Write(out io.Writer, r *study.Result, o Options) error {
	size := "A4"
	if o.Letter {
		size = "Letter"
	}
	doc := fpdf.New("P", "pt", size, "")
	doc.SetCatalogSort(true)
	doc.SetCreationDate(time.Unix(0, 0).UTC())
	doc.SetModificationDate(time.Unix(0, 0).UTC())
	doc.SetProducer("Stillroom", true)
	doc.SetTitle(r.Project.Title, true)
	doc.SetAutoPageBreak(false, 0)
	doc.SetMargins(margin, margin, margin)
	doc.AddUTF8FontFromBytes(family, "", liberationsansregular.TTF)
	doc.AddUTF8FontFromBytes(family, "B", liberationsansbold.TTF)
	doc.AliasNbPages("{pages}")
	s := &writer{doc: doc, r: r, o: o}
	if o.US {
		s.sys = units.US
	}
	s.w, s.h = doc.GetPageSize()
	s.modeSchedule()
	s.criteria()
	s.planAndSection()
	s.lanes()
	s.decayInTime()
	s.absorberList()
	s.build()
	s.cautions()
	var b bytes.Buffer
	if err := doc.Output(&b); err != nil {
		return fmt.Errorf("sheets: %w", err)
	}
	_, err := out.Write(b.Bytes())
	return err
}

// page begins a page of the current sheet with its title block.
func (s *writer) page() {
	s.doc.AddPage()
	d := s.doc
	d.SetDrawColor(20, 20, 20)
	d.SetLineWidth(0.8)
	d.SetDashPattern(nil, 0)
	top := s.h - margin - titleRoom
	d.Rect(margin, top, s.w-2*margin, titleRoom, "D")
	right := s.w - margin - 150
	d.Line(right, top, right, top+titleRoom)
	d.SetLineWidth(0.4)
	d.Line(right, top+titleRoom/2, s.w-margin, top+titleRoom/2)
	title := s.r.Project.Title
	if title == "" {
		title = "Untitled room"
	}
	s.line(margin+8, top+16, right-margin-16, title, 12, "B")
	people := ""
	if s.r.Project.PreparedFor != "" {
		people = "Prepared for " + s.r.Project.PreparedFor
	}
	if s.r.Project.PreparedBy != "" {
		if people != "" {
			people += ", "
		}
		people += "by " + s.r.Project.PreparedBy
	}
	s.line(margin+8, top+30, right-margin-16, people, textSize, "")
	s.line(margin+8, top+45, right-margin-16, "Calculated figures. "+s.o.Date, textSize, "")
	s.line(right+8, top+17, 134, s.sheet, 10, "B")
	s.line(right+8, top+44, 134, fmt.Sprintf("Page %d / {pages}", d.PageNo()), textSize, "")
	s.y = margin
}

// bottom is where the page's own space ends.
func (s *writer) bottom() float64 { return s.h - margin - titleRoom - 10 }

// line writes one line, its letters made smaller and at last cut with an
// ellipsis where it is wider than the room for it.
func (s *writer) line(x, y, room float64, text string, size float64, style string) {
	d := s.doc
	d.SetTextColor(16, 16, 16)
	for d.SetFont(family, style, size); d.GetStringWidth(text) > room && size > 6; size -= 0.5 {
		d.SetFont(family, style, size-0.5)
	}
	runes := []rune(text)
	for d.GetStringWidth(text) > room && len(runes) > 1 {
		runes = runes[:len(runes)-1]
		text = string(runes) + "…"
	}
	d.Text(x, y, text)
}

// heading writes a heading over what follows.
func (s *writer) heading(text string) {
	// It takes what it heads, the first lines at least, with it to a new page.
	if s.y+75 > s.bottom() {
		s.page()
	}
	s.y += 14
	s.line(margin, s.y, s.w-2*margin, text, 11, "B")
	s.y += 8
}

// paragraph writes wrapped text, over to new pages as needed.
func (s *writer) paragraph(text string, size float64) {
	s.doc.SetFont(family, "", size)
	for _, l := range s.wrap(text, s.w-2*margin, size) {
		if s.y+size*1.4 > s.bottom() {
			s.page()
		}
		s.y += size * 1.4
		s.line(margin, s.y, s.w-2*margin+2, l, size, "")
	}
	s.y += size * 0.5
}

// wrap breaks text into lines of at most the given width.
func (s *writer) wrap(text string, room, size float64) []string {
	s.doc.SetFont(family, "", size)
	// The splitter takes the cells' own margins off the room.
	return s.doc.SplitText(text, room+2*s.doc.GetCellMargin())
}
