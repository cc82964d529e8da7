package sheets_test

import (
	"bytes"
	"context"
	"fmt"
	"os/exec"
	"regexp"
	"strconv"
	"strings"
	"testing"

	"stillroom/app/internal/testcase"
	"stillroom/app/project"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
)

func studied(t testing.TB, p project.Project) *study.Result {
	t.Helper()
	r, err := study.Run(context.Background(), p, study.Options{Ringing: true}, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	return r
}

func written(t testing.TB, r *study.Result, o sheets.Options) []byte {
	t.Helper()
	var b bytes.Buffer
	if err := sheets.Write(&b, r, o); err != nil {
		t.Fatal(err)
	}
	return b.Bytes()
}

// tool runs a reader of PDFs on a set.
func tool(t *testing.T, pdf []byte, name string, args ...string) string {
	t.Helper()
	if _, err := exec.LookPath(name); err != nil {
		t.Fatalf("%s is needed (package poppler-utils): %v", name, err)
	}
	c := exec.Command(name, args...)
	c.Stdin = bytes.NewReader(pdf)
	out, err := c.Output()
	if err != nil {
		t.Fatalf("%s: %v", name, err)
	}
	return string(out)
}

func textOf(t *testing.T, pdf []byte) string { return tool(t, pdf, "pdftotext", "-layout", "-", "-") }

func pagesOf(t *testing.T, pdf []byte) int {
	t.Helper()
	m := regexp.MustCompile(`Pages:\s+(\d+)`).FindStringSubmatch(tool(t, pdf, "pdfinfo", "-"))
	n, err := strconv.Atoi(m[1])
	if err != nil {
		t.Fatal(err)
	}
	return n
}

// The set says the study's own figures, names every absorber with its dimensions,
// numbers its pages and carries the cautions.
func TestSetOfSample(t *testing.T) {
	p := testcase.Sample(t, "edit-suite")
	r := studied(t, p)
	pdf := written(t, r, sheets.Options{})
	text := textOf(t, pdf)
	for _, m := range r.Modes {
		row := regexp.MustCompile(fmt.Sprintf(`%d ?%d ?%d +%s +%s`, m.Mode.Order[0], m.Mode.Order[1], m.Mode.Order[2],
			regexp.QuoteMeta(fmt.Sprintf("%.1f", m.Mode.Hz)), m.Mode.Kind()))
		if !row.MatchString(text) {
			t.Errorf("no row of mode %v at %.1f Hz", m.Mode, m.Mode.Hz)
		}
		if !strings.Contains(text, fmt.Sprintf("%.2f", m.Oscillator.T60())) {
			t.Errorf("the T60 of %v, %.2f s, is not there", m.Mode, m.Oscillator.T60())
		}
	}
	for _, want := range []string{p.Title, "Mode schedule", "Plan and section", "Absorbers", "Criteria", "Schroeder frequency", "Cautions", "Decay in time", "T20", "A1", "A2", "153", "118.6 mm", "109 mm", "116 mm",
		"asbestos", "licensed", "Calculated", "Mineral fibre", "5.30 m", "desk"} {
		if !strings.Contains(text, want) {
			t.Errorf("the set does not say %q", want)
		}
	}
	n := pagesOf(t, pdf)
	for i := range n {
		if want := fmt.Sprintf("Page %d / %d", i+1, n); !strings.Contains(text, want) {
			t.Errorf("no page says %q", want)
		}
	}
	// Vectors and text only.
	// The list of images has two lines of heading.
	if images := strings.Count(tool(t, pdf, "pdfimages", "-list", "-"), "\n"); images > 2 {
		t.Errorf("the set holds images: %d lines", images)
	}
	if fonts := tool(t, pdf, "pdffonts", "-"); strings.Count(fonts, "yes no  yes") != 2 {
		t.Errorf("the lettering is not embedded:\n%s", fonts)
	}
}

// The same result gives the same bytes.
func TestSetRepeats(t *testing.T) {
	r := studied(t, testcase.Sample(t, "edit-suite"))
	if !bytes.Equal(written(t, r, sheets.Options{}), written(t, r, sheets.Options{})) {
		t.Error("written twice it is not the same to the byte")
	}
}

// US paper and units: no metric length is left in the tables.
func TestSetInFeetAndInches(t *testing.T) {
	p := testcase.Sample(t, "edit-suite")
	r := studied(t, p)
	pdf := written(t, r, sheets.Options{Letter: true, US: true})
	text := textOf(t, pdf)
	if !strings.Contains(tool(t, pdf, "pdfinfo", "-"), "letter") {
		t.Error("the paper is not Letter")
	}
	if want := units.Length(p.Room.Length, units.US); !strings.Contains(text, want) {
		t.Errorf("the length %s is not there", want)
	}
	// The reference distance of levels and the name of a published finish stay.
	text = strings.NewReplacer("free field at 1 m", "", "Gypsum board 13 mm on studs at 400 mm", "").Replace(text)
	if m := regexp.MustCompile(`\d m\b|\d mm\b`).FindString(text); m != "" {
		t.Errorf("a metric length is left: %q", m)
	}
}

// Forty absorbers, long texts and many modes run on over pages with the headings
// again, and nothing is lost.
func TestLongSet(t *testing.T) {
	p := testcase.Sample(t, "edit-suite")
	p.Title = strings.Repeat("A very long title of a house with many rooms ", 4)
	p.PreparedFor = strings.Repeat("A client with a long name ", 7)
	p.Room.Length, p.Room.Width, p.Room.Height = 12, 9, 5
	a := p.Absorbers[1]
	p.Absorbers = nil
	for i := range 40 {
		b := a.Clone()
		b.ID = fmt.Sprintf("long-identifier-of-a-panel-number-%02d", i)
		b.Size = [2]float64{0.6, 0.6}
		b.Centre = [2]float64{0.4 + 0.7*float64(i%10), 0.4 + 0.7*float64(i/10)}
		p.Absorbers = append(p.Absorbers, b)
	}
	if errs := p.Validate(); len(errs) > 0 {
		t.Fatal(errs)
	}
	r, err := study.Run(context.Background(), p, study.Options{ModesToHz: 90, ToHz: 90}, nil, nil)
	if err != nil {
		t.Fatal(err)
	}
	text := textOf(t, written(t, r, sheets.Options{}))
	var pages []string
	for _, page := range strings.Split(text, "\f") {
		if strings.TrimSpace(page) != "" {
			pages = append(pages, page)
		}
	}
	flat := strings.Join(strings.Fields(text), "")
	for _, b := range p.Absorbers {
		if !strings.Contains(flat, b.ID) {
			// An id may be wrapped within its column.
			t.Errorf("%s is lost", b.ID)
		}
	}
	schedules := 0
	for i, page := range pages {
		if !strings.Contains(page, fmt.Sprintf("Page %d / %d", i+1, len(pages))) {
			t.Errorf("page %d is not numbered:\n%s", i+1, page)
		}
		if strings.Contains(page, "Mode schedule") {
			schedules++
			if !strings.Contains(page, "T60") || !strings.Contains(page, "Pressure is greatest") {
				t.Errorf("page %d goes on without headings", i+1)
			}
		}
	}
	if schedules < 2 {
		t.Errorf("%d modes on %d page", len(r.Modes), schedules)
	}
}

func BenchmarkSet(b *testing.B) {
	r := studied(b, testcase.Sample(b, "edit-suite"))
	for b.Loop() {
		written(b, r, sheets.Options{})
	}
}
