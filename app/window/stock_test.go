package window

import (
	"testing"

	"fyne.io/fyne/v2/test"
	"fyne.io/fyne/v2/widget"

	"stillroom/acoustics"
	"stillroom/app/project"
)

// chosen answers the dialog that is open: it selects the row whose text begins so,
// and presses the main button.
func (h *hand) chosen(text string) {
	h.t.Helper()
	overlay := h.win.Canvas().Overlays().Top()
	if overlay == nil {
		h.t.Fatal("no dialog is open")
	}
	var list *widget.List
	var search *pathEntry
	for _, o := range test.LaidOutObjects(overlay) {
		switch o := o.(type) {
		case *widget.List:
			list = o
		case *pathEntry:
			search = o
		}
	}
	search.SetText(text)
	if list.Length() == 0 {
		h.t.Fatalf("%q is not in the list", text)
	}
	list.Select(0)
	search.OnSubmitted("")
}

// A sheet from the stock fills the panel's fields; kept in the project's stock, it
// is offered first.
func TestStockFillsFields(t *testing.T) {
	h := open(t)
	h.selected(Selection{-1, 1, -1, -1, -1})
	h.settle()
	h.details.fromStock(1, "A sheet", h.state.sheetParts())
	h.chosen("plasterboard 12.5")
	b := h.history.Current().Absorbers[1].Panel
	if b.ThicknessMM != 12.5 || b.MassKgM2 < 8.5 || b.MassKgM2 > 10 {
		t.Errorf("after taking plasterboard from stock the panel is %+v", *b)
	}
	h.details.keepInStock(1)
	for _, o := range test.LaidOutObjects(h.win.Canvas().Overlays().Top()) {
		if e, ok := o.(*pathEntry); ok {
			e.SetText("our board")
			e.OnSubmitted("")
			break
		}
	}
	if s := h.history.Current().Stock.Sheets; len(s) != 1 || s[0].Name != "our board" || s[0].ThicknessMM != 12.5 {
		t.Errorf("the project's stock is %+v", s)
	}
	if first := h.state.sheetParts()[0]; first.text != "our board" {
		t.Errorf("the first sheet offered is %q", first.text)
	}
	// Every kind's parts fit a project of that kind.
	for _, kind := range project.Kinds() {
		p := h.history.Current().Clone()
		p.Absorbers[1] = p.Absorbers[1].OfKind(kind)
		s := h.state
		s.Project = p
		var parts []part
		switch kind {
		case "neck":
			parts = append(s.tubeParts(), s.gauzeParts(func(a *project.Absorber, v float64) { a.Neck.GauzePaSM = v })...)
		case "panel":
			parts = s.sheetParts()
		case "perforated":
			parts = s.boardParts(func(a *project.Absorber, mm float64) { a.Perforated.PanelMM = mm })
		case "slotted":
			parts = s.slatParts()
		case "porous":
			parts = s.woolParts(func(a *project.Absorber, mm, flow float64) { a.Porous.ThicknessMM, a.Porous.FlowPaSM2 = mm, flow })
		}
		for _, x := range parts {
			q := p.Clone()
			x.use(&q.Absorbers[1])
			if errs := q.Validate(); len(errs) > 0 {
				t.Errorf("%s from stock: %v", x.text, errs)
			}
		}
	}
}

// A finish of the user's own is made in the window, with its faults said.
func TestOwnFinish(t *testing.T) {
	h := open(t)
	h.ownFinish(func(id string) {
		p := h.history.Current()
		h.edit("line", p.WithLining(acoustics.Back, []project.FinishShare{{Finish: id, Share: 1}}), "", true)
	})
	fill := func(texts ...string) (last *pathEntry) {
		i := 0
		for _, o := range test.LaidOutObjects(h.win.Canvas().Overlays().Top()) {
			if e, ok := o.(*pathEntry); ok && i < len(texts) {
				e.SetText(texts[i])
				i++
				last = e
			}
		}
		return last
	}
	fill("Felt", "our own measurement", "7").OnSubmitted("")
	if len(h.history.Current().Finishes) != 0 || h.win.Canvas().Overlays().Top() == nil {
		t.Fatal("a coefficient of 7 is taken")
	}
	fill("Felt", "our own measurement", "0.1", "0.2").OnSubmitted("")
	p := h.history.Current()
	if len(p.Finishes) != 1 || p.Finishes[0].Absorption["125"] != 0.2 || p.Lining(acoustics.Back)[0].Finish != p.Finishes[0].ID {
		t.Errorf("the finishes are %+v, the back wall's %+v", p.Finishes, p.Lining(acoustics.Back))
	}
}

// An area to keep free is added, drawn and removed again.
func TestKeepFree(t *testing.T) {
	h := open(t)
	h.details.about = subject{"surface", int(acoustics.Right)}
	h.details.show(h.state)
	press := func(text string) {
		t.Helper()
		for _, o := range test.LaidOutObjects(h.details.form) {
			if b, ok := o.(*widget.Button); ok && b.Text == text {
				test.Tap(b)
				return
			}
		}
		t.Fatalf("there is no button %q", text)
	}
	press("Add an area")
	if k := h.history.Current().KeepOut; len(k) != 1 || k[0].Surface != acoustics.Right {
		t.Fatalf("the areas are %+v", k)
	}
	press("Remove this area")
	if k := h.history.Current().KeepOut; len(k) != 0 {
		t.Errorf("the areas are %+v", k)
	}
}

// A kept curve stays on the lane while its absorber changes.
func TestKeptCurve(t *testing.T) {
	h := open(t)
	h.keepCurve(1)
	before := h.state.Kept[0].Report.ThirdOctaves[6].Diffuse
	p := h.history.Current().Clone()
	p.Absorbers[1].Panel.CavityMM /= 2
	p.Absorbers[1].Panel.Fill = nil
	h.edit("halve the cavity", p, "", true)
	h.settle()
	if h.state.Kept[0].Report.ThirdOctaves[6].Diffuse != before || h.state.Result.Absorbers[1].Report.ThirdOctaves[6].Diffuse == before {
		t.Error("the kept curve moves with its absorber")
	}
	h.keepCurve(-1)
	if len(h.state.Kept) != 0 {
		t.Error("the curve is still kept")
	}
}
