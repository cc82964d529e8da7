package window

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
)

// planner is the dialog that proposes absorbers for all problem modes.
type planner struct {
	c      *controller
	plan   study.Plan
	cancel context.CancelFunc

	ask       wishes
	absorbers *pathEntry
	upTo      *pathEntry
	these     *pathEntry
	list      *schedule
	say       *widget.Label
	stop      *widget.Button
	hide      func()
}

func planColumns() []scheduleColumn {
	return []scheduleColumn{{"Id", 6, false}, {"For mode", 14, false}, {"Before s", 8, true}, {"After s", 8, true}, {"Limit s", 8, true}, {"Kind", 16, false},
		{"Where", 22, false}, {"Units", 6, true}, {"Volume", 9, true}, {"Dimensions", 44, false}}
}

// planAll opens the planner.
func (c *controller) planAll() {
	t := &planner{c: c, say: widget.NewLabel("Brings the problem modes under their limits, the worst first.")}
	t.say.Wrapping = fyne.TextWrapWord
	t.list = newSchedule(planColumns(), func(int) {})
	t.list.show(nil, -1, c.state.Dark)
	t.ask = newWishes(c.state, "")
	t.absorbers = newPathEntry("8", nil, nil)
	t.upTo = newPathEntry("120 Hz", nil, nil)
	t.these = newPathEntry("", nil, nil)
	t.these.SetPlaceHolder("such as 1,0,0 2,0,0")
	t.ask.each(t.search, func() { t.close() })
	for _, e := range []*pathEntry{t.absorbers, t.upTo, t.these} {
		e.OnSubmitted, e.escape = func(string) { t.search() }, func() { t.close() }
	}
	t.stop = widget.NewButton("Stop", t.halt)
	t.stop.Disable()
	sized := func(e fyne.CanvasObject, w float32) fyne.CanvasObject {
		return container.NewGridWrap(fyne.NewSize(w, 30), e)
	}
	budget := container.NewHBox(widget.NewLabel("Absorbers at most"), sized(t.absorbers, 44), widget.NewLabel("Problem modes up to"), sized(t.upTo, 80),
		widget.NewLabel("or these"), sized(t.these, 220),
		widget.NewButton("Plan", t.search), t.stop)
	body := container.NewBorder(container.NewVBox(t.ask.form(false), budget, t.say), nil, nil, nil, t.list)
	t.hide = c.ask("Plan for all problem modes", body, fyne.NewSize(1130, 600), nil,
		choice{"Place them", true, t.place}, choice{"Cancel", false, t.halt})
}

// halt stops a search; what is planned so far stays.
func (t *planner) halt() {
	if t.cancel != nil {
		t.cancel()
		t.cancel = nil
		t.stop.Disable()
		t.say.SetText(fmt.Sprintf("Stopped: %d absorbers so far.", len(t.plan.Steps)))
	}
}

func (t *planner) close() {
	t.halt()
	t.hide()
}

// wanted lists the modes that are named, or else the problem modes up to a frequency.
func (t *planner) wanted(hz float64) ([]int, error) {
	var list []int
	for name := range strings.FieldsSeq(t.these.Text) {
		at := slices.IndexFunc(t.c.state.Result.Modes, func(m study.ModeRow) bool {
			o := m.Mode.Order
			return strings.Trim(name, "();") == fmt.Sprintf("%d,%d,%d", o[0], o[1], o[2])
		})
		if at < 0 {
			return nil, fmt.Errorf("%q is no mode up to 250 Hz: write each as 1,0,0", name)
		}
		list = append(list, at)
	}
	if len(list) > 0 {
		return list, nil
	}
	for i, m := range t.c.state.Result.Modes {
		if m.Problem && m.Mode.Hz <= hz {
			list = append(list, i)
		}
	}
	if len(list) == 0 {
		return nil, fmt.Errorf("no mode up to there is a problem")
	}
	return list, nil
}

// search plans in the background.
func (t *planner) search() {
	t.halt()
	each, err := t.ask.request(t.c.state)
	most, errMost := units.ParseNumber(t.absorbers.Text, "")
	hz, errHz := units.ParseNumber(t.upTo.Text, "Hz")
	switch {
	case err != nil:
		t.say.SetText(err.Error())
		return
	case errMost != nil || most != float64(int(most)) || most < 1 || most > 40:
		t.say.SetText("the absorbers must be a whole number between 1 and 40")
		return
	case errHz != nil || !(hz >= 20 && hz <= 250):
		t.say.SetText("the frequency must be between 20 and 250 Hz")
		return
	}
	r, do := t.c.state.Result, t.c.do
	if r == nil {
		return
	}
	modes, err := t.wanted(hz)
	if err != nil {
		t.say.SetText(err.Error())
		return
	}
	q := study.PlanRequest{Each: each, Absorbers: int(most), Modes: modes}
	ctx, cancel := context.WithCancel(t.c.ctx)
	t.cancel = cancel
	t.stop.Enable()
	t.say.SetText("Planning …")
	go func() {
		plan, err := study.PlanFor(ctx, r, q, func(next int, soFar study.Plan) {
			do(func() {
				if ctx.Err() == nil && next >= 0 {
					m := soFar.After.Modes[next]
					t.say.SetText(fmt.Sprintf("Absorber %d: mode %s at %s, %s against a limit of %s …", len(soFar.Steps)+1, m.Mode, units.Hertz(m.Mode.Hz), units.Seconds(m.Now()), units.Seconds(m.LimitS)))
					t.show(soFar, r)
				}
			})
		})
		do(func() {
			if ctx.Err() != nil {
				return
			}
			t.cancel = nil
			t.stop.Disable()
			t.show(plan, r)
			t.say.SetText(planWords(plan, err))
			t.c.log("plan %d open %d", len(plan.Steps), len(plan.Open))
		})
	}()
}

// planWords says how a plan ends.
func planWords(p study.Plan, err error) string {
	switch {
	case err != nil:
		return err.Error()
	case len(p.Open) == 0:
		return fmt.Sprintf("%d absorbers bring all of them under their limits.", len(p.Steps))
	}
	var list []string
	for _, i := range p.Open {
		m := p.After.Modes[i]
		list = append(list, fmt.Sprintf("%s at %s, %.2f s against %.2f s", m.Mode, units.Hertz(m.Mode.Hz), m.Now(), m.LimitS))
	}
	return fmt.Sprintf("%d absorbers are the best there is here. Still over the limit: %s.", len(p.Steps), strings.Join(list, "; "))
}

// show lists the plan's absorbers.
func (t *planner) show(plan study.Plan, before *study.Result) {
	t.plan = plan
	var rows []scheduleRow
	sys := t.c.state.system()
	for k, s := range plan.Steps {
		a, m := s.Proposal.Absorber, before.Modes[s.Mode]
		now := plan.After.Modes[s.Mode].Now()
		rows = append(rows, scheduleRow{item: k, cells: []string{a.ID, fmt.Sprintf("%s %s", m.Mode, units.Hertz(m.Mode.Hz)), fmt.Sprintf("%.2f", m.Now()), fmt.Sprintf("%.2f", now),
			fmt.Sprintf("%.2f", m.LimitS), sheets.KindWords(a.Kind), s.Proposal.Spot, fmt.Sprint(a.Units), units.Volume(s.Proposal.VolumeM3, sys), strings.Join(sheets.Dimensions(a, sys), "; ")},
			keys: []float64{float64(k), m.Mode.Hz, m.Now(), now, m.LimitS, 0, 0, float64(a.Units), s.Proposal.VolumeM3, 0}})
	}
	t.list.show(rows, -1, t.c.state.Dark)
}

// place puts all of the plan's absorbers into the project as one edit.
func (t *planner) place() {
	t.halt()
	if len(t.plan.Steps) == 0 {
		return
	}
	p := t.c.state.Project
	for _, s := range t.plan.Steps {
		p = p.AddAbsorber(s.Proposal.Absorber)
	}
	if t.c.take("place a plan's absorbers", p) {
		t.c.log("placed %d", len(t.plan.Steps))
	}
}
