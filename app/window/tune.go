package window

import (
	"context"
	"fmt"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
)

// tuner is the dialog that proposes absorbers for one mode.
type tuner struct {
	c      *controller
	mode   int
	found  []study.Proposal
	picked int
	cancel context.CancelFunc

	list  *schedule
	say   *widget.Label
	about *widget.Label
	hide  func()
}

func tuneColumns() []scheduleColumn {
	return []scheduleColumn{{"Kind", 14, false}, {"Where", 22, false}, {"Units", 7, true}, {"f0 Hz", 7, true}, {"Q", 6, true}, {"μ", 7, true},
		{"Longest T60 s", 14, true}, {"Meets", 7, false}, {"Dimensions", 44, false}}
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
	depth := newPathEntry(lengthMM.write(300, c.state.system()), nil, nil)
	target := newPathEntry(fmt.Sprintf("%.2f s", m.LimitS), nil, nil)
	kinds := widget.NewCheckGroup([]string{"box with a neck", "panel on a cavity"}, nil)
	kinds.Horizontal = true
	kinds.SetSelected(kinds.Options)
	search := func() { t.search(depth.Text, target.Text, kinds.Selected) }
	cancel := func() { t.close() }
	depth.OnSubmitted, target.OnSubmitted = func(string) { search() }, func(string) { search() }
	depth.escape, target.escape = cancel, cancel
	head := widget.NewLabel(fmt.Sprintf("Mode %s, %s, rings %s against a limit of %s. Its pressure is greatest %s.", m.Mode, units.Hertz(m.Mode.Hz),
		units.Seconds(m.Oscillator.T60()), units.Seconds(m.LimitS), m.Strongest))
	head.Wrapping = fyne.TextWrapWord
	ask := container.NewHBox(widget.NewLabel("Depth at hand"), container.NewGridWrap(fyne.NewSize(90, 28), depth),
		widget.NewLabel("T60 wanted"), container.NewGridWrap(fyne.NewSize(80, 28), target), kinds, widget.NewButton("Propose", search))
	top := container.NewVBox(head, ask, t.say)
	body := container.NewBorder(top, t.about, nil, nil, t.list)
	t.hide = c.ask("Tune an absorber", body, fyne.NewSize(980, 540), nil,
		choice{"Place it", true, t.place}, choice{"Cancel", false, t.stop})
	search()
}

func (t *tuner) stop() {
	if t.cancel != nil {
		t.cancel()
	}
}

func (t *tuner) close() {
	t.stop()
	t.hide()
}

// search asks the tuner in the background; an earlier search gives way.
func (t *tuner) search(depth, target string, kinds []string) {
	t.stop()
	mm, err := lengthMM.read(depth, t.c.state.system())
	if err != nil {
		t.say.SetText(err.Error())
		return
	}
	seconds, err := units.ParseNumber(target, "s")
	if err != nil || seconds <= 0 {
		t.say.SetText("T60 wanted must be a time above 0 s.")
		return
	}
	q := study.TuneRequest{Mode: t.mode, DepthM: mm / 1000, TargetS: seconds}
	for _, k := range kinds {
		q.Kinds = append(q.Kinds, map[string]string{"box with a neck": "neck", "panel on a cavity": "panel"}[k])
	}
	if len(q.Kinds) == 0 {
		t.say.SetText("Choose a kind of absorber.")
		return
	}
	ctx, cancel := context.WithCancel(t.c.ctx)
	t.cancel = cancel
	t.say.SetText("Looking for what can be built …")
	r, do := t.c.state.Result, t.c.do
	go func() {
		found, err := study.Tune(ctx, r, q, func(done, total int) {
			do(func() {
				if ctx.Err() == nil {
					t.say.SetText(fmt.Sprintf("Trying proposal %d of %d in the room …", done+1, total))
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
	t.found = found
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
	sys := t.c.state.system()
	for k, p := range t.found {
		longest, meets := 0.0, "no"
		if len(p.After) > 0 {
			longest = p.After[0].Oscillator.T60()
		}
		if p.Meets {
			meets = "yes"
		}
		a := p.Absorber
		rows = append(rows, scheduleRow{item: k, cells: []string{sheets.KindWords(a.Kind), p.Spot, fmt.Sprint(a.Units), fmt.Sprintf("%.1f", p.F0Hz),
			fmt.Sprintf("%.1f", p.Q), fmt.Sprintf("%.4f", p.Candidate.Coupling), fmt.Sprintf("%.2f", longest), meets, strings.Join(sheets.Dimensions(a, sys), "; ")},
			keys: []float64{0, float64(a.Surface), float64(a.Units), p.F0Hz, p.Q, p.Candidate.Coupling, longest, 0, 0}})
	}
	text := ""
	if i < len(t.found) {
		t.picked = i
		text = t.words(t.found[i])
	}
	t.about.SetText(text)
	t.list.show(rows, t.picked, t.c.state.Dark)
}

// words says what a proposal does and needs.
func (t *tuner) words(p study.Proposal) string {
	sys := t.c.state.system()
	var after []string
	for _, q := range p.After {
		after = append(after, fmt.Sprintf("%s %s", units.Hertz(q.Oscillator.Natural), units.Seconds(q.Oscillator.T60())))
	}
	a := p.Absorber
	s := fmt.Sprintf("%d × %s × %s %s. After: %s.", a.Units, units.Small(a.Size[0], sys), units.Small(a.Size[1], sys), p.Spot, strings.Join(after, ", "))
	switch {
	case p.MinVolumeM3 > 0:
		s += fmt.Sprintf(" For the time wanted at least %s of box here.", units.Litres(p.MinVolumeM3, sys))
	case p.MinAreaM2 > 0:
		s += fmt.Sprintf(" For the time wanted at least %s of panel here.", units.Area(p.MinAreaM2, sys))
	}
	return s + " Calculated: measure a first one before more are built."
}

// place puts the picked proposal into the project.
func (t *tuner) place() {
	t.stop()
	if t.picked < 0 || t.picked >= len(t.found) {
		return
	}
	p := t.c.state.Project.AddAbsorber(t.found[t.picked].Absorber)
	if errs := p.Validate(); len(errs) > 0 {
		t.c.tell("It does not fit", errs.Error())
		return
	}
	t.c.edit("place a tuned absorber", p, "", true)
	t.c.selected(Selection{t.c.state.Selection.Mode, len(p.Absorbers) - 1, -1, -1, -1})
	t.c.log("placed %s", t.found[t.picked].Absorber.ID)
}
