package window

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
	"stillroom/resonators/tuning"
)

// tuner is the dialog that proposes absorbers for one mode.
type tuner struct {
	c      *controller
	mode   int
	found  []study.Proposal
	picked int
	cancel context.CancelFunc

	ask   wishes
	list  *schedule
	say   *widget.Label
	about *widget.Label
	stop  *widget.Button
	hide  func()
}

// wishes are the entries by which the user says what may be built.
type wishes struct {
	depth, target, units *pathEntry
	goal                 *widget.Select
	kinds, surfaces      *widget.CheckGroup
}

// goals are what may be tuned for, in the words of the dialog.
func goalWords() []string {
	return []string{"the fastest decay", "the lowest level at the seats", "the least volume under the limit"}
}

// newWishes makes the entries; target is "" where each mode has its own.
func newWishes(s State, target string) wishes {
	w := wishes{depth: newPathEntry(lengthMM.write(300, s.system()), nil, nil), target: newPathEntry(target, nil, nil),
		units: newPathEntry("6", nil, nil), goal: widget.NewSelect(goalWords(), nil)}
	w.goal.SetSelectedIndex(0)
	var kinds, surfaces []string
	for _, k := range tuning.Kinds() {
		kinds = append(kinds, sheets.KindWords(k))
	}
	for _, x := range acoustics.Surfaces() {
		surfaces = append(surfaces, x.String())
	}
	w.kinds, w.surfaces = widget.NewCheckGroup(kinds, nil), widget.NewCheckGroup(surfaces, nil)
	w.kinds.Horizontal, w.surfaces.Horizontal = true, true
	w.kinds.SetSelected(kinds)
	w.surfaces.SetSelected(surfaces)
	return w
}

// each sets what Enter and Esc mean in all entries.
func (w wishes) each(enter, escape func()) {
	for _, e := range []*pathEntry{w.depth, w.target, w.units} {
		e.OnSubmitted = func(string) { enter() }
		e.escape = escape
	}
}

// form lays the entries out, buttons at the end.
func (w wishes) form(withTarget bool, buttons ...fyne.CanvasObject) fyne.CanvasObject {
	sized := func(e fyne.CanvasObject, width float32) fyne.CanvasObject {
		return container.NewGridWrap(fyne.NewSize(width, 30), e)
	}
	first := container.NewHBox(widget.NewLabel("Depth at hand"), sized(w.depth, 90))
	if withTarget {
		first.Add(widget.NewLabel("T60 wanted"))
		first.Add(sized(w.target, 80))
	}
	first.Add(widget.NewLabel("Units at most"))
	first.Add(sized(w.units, 44))
	first.Add(widget.NewLabel("For"))
	first.Add(sized(w.goal, 250))
	for _, b := range buttons {
		first.Add(b)
	}
	return container.NewVBox(first, w.kinds, container.NewHBox(widget.NewLabel("On"), w.surfaces))
}

// request reads the entries; the error says what is wrong with which.
func (w wishes) request(s State) (study.TuneRequest, error) {
	q := study.TuneRequest{System: "metric", Goal: tuning.Goal(w.goal.SelectedIndex())}
	if s.US {
		q.System = "us"
	}
	mm, err := lengthMM.read(w.depth.Text, s.system())
	if err != nil || !(mm >= 20 && mm <= 2000) {
		return q, fmt.Errorf("the depth at hand must be between %s and %s", lengthMM.write(20, s.system()), lengthMM.write(2000, s.system()))
	}
	q.DepthM = mm / 1000
	if w.target.Text != "" {
		if q.TargetS, err = units.ParseNumber(w.target.Text, "s"); err != nil || !(q.TargetS >= 0.02 && q.TargetS <= 20) {
			return q, fmt.Errorf("the T60 wanted must be between 0.02 s and 20 s")
		}
	}
	n, err := units.ParseNumber(w.units.Text, "")
	if err != nil || n != float64(int(n)) || n < 1 || n > 60 {
		return q, fmt.Errorf("the units must be a whole number between 1 and 60")
	}
	q.MostUnits = int(n)
	for _, k := range tuning.Kinds() {
		if slices.Contains(w.kinds.Selected, sheets.KindWords(k)) {
			q.Kinds = append(q.Kinds, k)
		}
	}
	for _, x := range acoustics.Surfaces() {
		if slices.Contains(w.surfaces.Selected, x.String()) {
			q.Surfaces = append(q.Surfaces, x)
		}
	}
	switch {
	case len(q.Kinds) == 0:
		return q, fmt.Errorf("choose a kind of absorber")
	case len(q.Surfaces) == 0:
		return q, fmt.Errorf("choose a surface")
	}
	return q, nil
}

func tuneColumns() []scheduleColumn {
	return []scheduleColumn{{"Kind", 15, false}, {"Where", 20, false}, {"Units", 6, true}, {"f0 Hz", 7, true}, {"Q", 6, true}, {"μ", 7, true},
		{"T60 s", 7, true}, {"Meets", 6, false}, {"Peak dB", 8, true}, {"Volume", 9, true}, {"Dimensions", 40, false}}
}

// tune opens the tuner for a mode.
func (c *controller) tune(mode int) {
	if c.state.Result == nil || mode < 0 || mode >= len(c.state.Result.Modes) {
		return
	}
	t := &tuner{c: c, mode: mode, picked: -1, say: widget.NewLabel(""), about: widget.NewLabel("")}
	m := c.state.Result.Modes[mode]
	t.about.Wrapping = fyne.TextWrapWord
	t.list = newSchedule(tuneColumns(), t.pick)
	t.list.show(nil, -1, c.state.Dark)
	t.ask = newWishes(c.state, fmt.Sprintf("%.2f s", m.LimitS))
	t.ask.each(t.search, func() { t.close() })
	head := widget.NewLabel(fmt.Sprintf("Mode %s, %s, rings %s against a limit of %s. Its pressure is greatest %s.", m.Mode, units.Hertz(m.Mode.Hz),
		units.Seconds(m.Now()), units.Seconds(m.LimitS), m.Strongest))
	head.Wrapping = fyne.TextWrapWord
	t.stop = widget.NewButton("Stop", t.halt)
	t.stop.Disable()
	top := container.NewVBox(head, t.ask.form(true, widget.NewButton("Propose", t.search), t.stop), t.say)
	body := container.NewBorder(top, t.about, nil, nil, t.list)
	t.hide = c.ask("Tune an absorber", body, fyne.NewSize(1130, 640), nil,
		choice{"Place it", true, t.place}, choice{"Cancel", false, t.halt})
	t.search()
}

// halt stops a search; what it has found so far stays.
func (t *tuner) halt() {
	if t.cancel != nil {
		t.cancel()
		t.cancel = nil
		t.stop.Disable()
		t.say.SetText(fmt.Sprintf("Stopped: %d proposals so far, best first.", len(t.found)))
	}
}

func (t *tuner) close() {
	t.halt()
	t.hide()
}

// search asks the tuner in the background; an earlier search gives way.
func (t *tuner) search() {
	t.halt()
	q, err := t.ask.request(t.c.state)
	if err != nil {
		t.say.SetText(err.Error())
		return
	}
	q.Mode = t.mode
	ctx, cancel := context.WithCancel(t.c.ctx)
	t.cancel = cancel
	t.stop.Enable()
	t.say.SetText("Looking for what can be built …")
	r, do := t.c.state.Result, t.c.do
	go func() {
		found, err := study.Tune(ctx, r, q, func(done, total int, soFar []study.Proposal) {
			do(func() {
				if ctx.Err() == nil {
					t.found = soFar
					t.say.SetText(fmt.Sprintf("%d of %d tried in the room …", done, total))
					t.pick(max(0, t.picked))
				}
			})
		})
		do(func() {
			if ctx.Err() == nil {
				t.show(found, err)
			}
		})
	}()
}

// show lists the proposals and picks the best.
func (t *tuner) show(found []study.Proposal, err error) {
	t.found, t.cancel = found, nil
	t.stop.Disable()
	switch {
	case err != nil:
		t.say.SetText(err.Error())
	case len(found) == 0:
		t.say.SetText("Nothing of this depth can be tuned to the mode where there is room. Give more depth, or free a surface.")
	default:
		t.say.SetText(fmt.Sprintf("%d proposals, calculated in the room as a whole, best first.", len(found)))
	}
	t.pick(0)
	t.c.log("proposals %d", len(found))
}

// pick shows one proposal's figures.
func (t *tuner) pick(i int) {
	t.picked = -1
	var rows []scheduleRow
	for k, p := range t.found {
		rows = append(rows, proposalRow(k, p, t.c.state))
	}
	text := ""
	if i < len(t.found) {
		t.picked = i
		text = proposalWords(t.found[i], t.c.state)
	}
	t.about.SetText(text)
	t.list.show(rows, t.picked, t.c.state.Dark)
}

// orDash writes a figure, a dash where there is none.
func orDash(v float64, places int) string {
	if v == 0 {
		return "–"
	}
	return fmt.Sprintf("%.*f", places, v)
}

// proposalRow is a proposal's line in the list.
func proposalRow(k int, p study.Proposal, s State) scheduleRow {
	meets := "no"
	if p.Meets {
		meets = "yes"
	}
	a := p.Absorber
	return scheduleRow{item: k, cells: []string{sheets.KindWords(a.Kind), p.Spot, fmt.Sprint(a.Units), orDash(p.F0Hz, 1), orDash(p.Q, 1),
		orDash(p.Candidate.Coupling, 4), fmt.Sprintf("%.2f", p.Longest()), meets, strings.TrimSuffix(units.Decibels(p.PeakAfter), " dB"),
		units.Volume(p.VolumeM3, s.system()), strings.Join(sheets.Dimensions(a, s.system()), "; ")},
		keys: []float64{0, float64(a.Surface), float64(a.Units), p.F0Hz, p.Q, p.Candidate.Coupling, p.Longest(), 0, p.PeakAfter, p.VolumeM3, 0}}
}

// proposalWords says what a proposal does and needs.
func proposalWords(p study.Proposal, s State) string {
	sys := s.system()
	var after []string
	for i, q := range p.After {
		if i == 4 {
			after = append(after, fmt.Sprintf("%d more", len(p.After)-i))
			break
		}
		after = append(after, fmt.Sprintf("%s %s", units.Hertz(q.Oscillator.Natural), units.Seconds(q.Oscillator.T60())))
	}
	a := p.Absorber
	t := []string{fmt.Sprintf("%d × %s × %s %s. After: %s. Peak at the seats %s, was %s. Sheet to cut %s.", a.Units, units.Small(a.Size[0], sys), units.Small(a.Size[1], sys), p.Spot,
		strings.Join(after, ", "), units.Decibels(p.PeakAfter), units.Decibels(p.PeakBefore), units.Area(p.SheetM2, sys))}
	switch {
	case p.MinVolumeM3 > 0:
		t = append(t, fmt.Sprintf("For the time wanted at least %s of box here.", units.Litres(p.MinVolumeM3, sys)))
	case p.MinAreaM2 > 0:
		t = append(t, fmt.Sprintf("For the time wanted at least %s of it here.", units.Area(p.MinAreaM2, sys)))
	}
	if n := neighbourWords(p, s); n != "" {
		t = append(t, n)
	}
	if p.ColderS > 0 {
		t = append(t, fmt.Sprintf("5 °C colder %s, warmer %s.", units.Seconds(p.ColderS), units.Seconds(p.WarmerS)))
	}
	return strings.Join(append(t, "Calculated: measure a first one before more are built."), " ")
}

// neighbourWords says what a proposal does to the modes beside its own.
func neighbourWords(p study.Proposal, s State) string {
	var list []string
	for _, n := range p.Neighbours {
		if s.Result != nil && n.Mode < len(s.Result.Modes) {
			list = append(list, fmt.Sprintf("%s %.2f to %.2f s", s.Result.Modes[n.Mode].Mode, n.Before, n.After))
		}
	}
	if len(list) == 0 {
		return ""
	}
	return "Neighbours: " + strings.Join(list, ", ") + "."
}

// place puts the picked proposal into the project.
func (t *tuner) place() {
	t.halt()
	if t.picked < 0 || t.picked >= len(t.found) {
		return
	}
	p := t.c.state.Project.AddAbsorber(t.found[t.picked].Absorber)
	if t.c.take("place a tuned absorber", p) {
		t.c.selected(Selection{t.c.state.Selection.Mode, len(p.Absorbers) - 1, -1, -1, -1})
		t.c.log("placed %s", t.found[t.picked].Absorber.ID)
	}
}

// take puts a project with proposed absorbers in place, where it fits what has
// been edited meanwhile.
func (c *controller) take(label string, p project.Project) bool {
	if errs := p.Validate(); len(errs) > 0 {
		c.tell("It does not fit", errs.Error())
		return false
	}
	c.edit(label, p, "", true)
	return true
}
