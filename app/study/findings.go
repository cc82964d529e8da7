package study

import (
	"fmt"
	"sort"
	"strings"
)

// find writes the plain findings, worst first: problem modes that nothing
// brings under their limit, then absorbers that meet no mode, then what the
// absorbers have mended.
func (r *Result) find() {
	r.Findings = r.Findings[:0:0]
	open, mended := r.problems()
	for _, i := range open {
		r.Findings = append(r.Findings, Finding{Text: r.openText(i), Mode: i, Worst: len(r.Findings) == 0})
	}
	for a, row := range r.Absorbers {
		if row.Report.Oscillator != nil && row.Target < 0 && r.Stage >= StageLevel {
			r.Findings = append(r.Findings, Finding{Mode: -1, Text: fmt.Sprintf(
				"Absorber %s resonates at %.1f Hz and meets no mode that is strong where it stands.",
				r.Absorbers[a].ID, row.Report.Oscillator.Natural)})
		}
	}
	for _, i := range mended {
		r.Findings = append(r.Findings, Finding{Text: r.mendedText(i), Mode: i})
	}
	if len(open) == 0 && len(mended) == 0 {
		r.Findings = append(r.Findings, Finding{Mode: -1, Text: fmt.Sprintf(
			"No mode up to %.0f Hz rings over its limit and sounds at a seat.", r.Options.ModesToHz)})
	}
	r.Cautions = r.cautions()
}

// problems splits the problem modes, in the order of their rank, into those
// still over their limit and those that treatment brings under it.
func (r *Result) problems() (open, mended []int) {
	for i, m := range r.Modes {
		if !m.Problem {
			continue
		}
		if over, known := r.Modes[i].stillOver(r.Stage); known && !over {
			mended = append(mended, i)
		} else {
			open = append(open, i)
		}
	}
	byRank := func(s []int) {
		sort.Slice(s, func(a, b int) bool { return r.Modes[s[a]].Rank < r.Modes[s[b]].Rank })
	}
	byRank(open)
	byRank(mended)
	return open, mended
}

// Poles returns the poles shown for the mode after treatment: the one it
// became and those of the absorbers tuned to it.
func (m ModeRow) Poles() []PoleRow {
	return append(append([]PoleRow(nil), m.Treated...), m.Pair...)
}

// LongestTreated returns the longest T60 in seconds among the poles that the
// mode has after treatment, 0 where there is none.
func (m ModeRow) LongestTreated() float64 {
	var t float64
	for _, p := range m.Poles() {
		t = max(t, p.Oscillator.T60())
	}
	return t
}

// stillOver says whether one of the mode's poles is over its limit after
// treatment, and whether that is known yet.
func (m ModeRow) stillOver(stage Stage) (over, known bool) {
	if stage < StageTreated || len(m.Absorbers) == 0 && len(m.Treated) == 0 {
		return true, false
	}
	for _, p := range m.Poles() {
		if p.Oscillator.T60() > p.LimitS {
			return true, true
		}
	}
	return false, true
}

func (r *Result) openText(i int) string {
	m := r.Modes[i]
	s := fmt.Sprintf("Mode %s at %.1f Hz rings %.2f s, limit %.2f s", m.Mode, m.Mode.Hz, m.Oscillator.T60(), m.LimitS)
	if _, known := m.stillOver(r.Stage); known && m.LongestTreated() > 0 {
		s += fmt.Sprintf("; treated %.2f s", m.LongestTreated())
		if names := r.names(m.Absorbers); names != "" {
			s += " by " + names
		}
	}
	return s + "."
}

func (r *Result) mendedText(i int) string {
	m := r.Modes[i]
	s := fmt.Sprintf("Mode %s at %.1f Hz: %.2f s", m.Mode, m.Mode.Hz, m.Oscillator.T60())
	if t := m.LongestTreated(); t > 0 {
		s += fmt.Sprintf(" becomes %.2f s", t)
	} else {
		s += " is gone"
	}
	if names := r.names(m.Absorbers); names != "" {
		s += " with " + names
	}
	return s + fmt.Sprintf(", limit %.2f s: met.", m.LimitS)
}

// names joins the ids of absorbers.
func (r *Result) names(absorbers []int) string {
	ids := make([]string, len(absorbers))
	for i, a := range absorbers {
		ids[i] = r.Absorbers[a].ID
	}
	return strings.Join(ids, ", ")
}

// cautions lists the limits of the models that this project touches.
func (r *Result) cautions() []string {
	c := []string{
		"Calculated: rigid-walled mode shapes, damping to first order in the walls' absorption. Light partitions absorb and shift more than this says.",
	}
	if r.Air.Extrapolated() {
		c = append(c, "The speed of sound is extrapolated: its formula is published for 0 to 30 °C.")
	}
	for _, a := range r.Absorbers {
		for _, w := range a.Report.Warnings {
			c = append(c, "Absorber "+a.ID+": "+w)
		}
	}
	if len(r.Absorbers) > 0 {
		c = append(c, "Calculated absorbers want a check by measurement before they are built in number.")
	}
	if r.Stage == StageTreated && r.PolesCounted != r.PolesFound {
		c = append(c, fmt.Sprintf("The treated room has %d oscillations in the searched range, of which %d were followed.", r.PolesCounted, r.PolesFound))
	}
	return c
}
