package verbs

import (
	"context"
	"fmt"
	"strconv"
	"strings"

	"stillroom/app/project"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
)

type planJSON struct {
	Goal  string         `json:"goal"`
	Steps []planStepJSON `json:"steps"`
	Open  []openModeJSON `json:"open"`
}

type planStepJSON struct {
	Order    [3]int           `json:"mode"`
	F        number           `json:"f_hz"`
	Before   number           `json:"before_s"`
	After    number           `json:"after_s"`
	Limit    number           `json:"limit_s"`
	Absorber project.Absorber `json:"absorber"`
	Where    string           `json:"where"`
	Volume   number           `json:"volume_m3"`
	Sheet    number           `json:"sheet_m2"`
}

type openModeJSON struct {
	Order [3]int `json:"mode"`
	F     number `json:"f_hz"`
	T60   number `json:"t60_s"`
	Limit number `json:"limit_s"`
}

// plan answers with absorbers for some modes, or for all problem modes where none is
// named, each mode's decay as the whole plan leaves it.
func (c *call) plan(r *study.Result, modes []int, as, goal string, q study.TuneRequest) error {
	plan, err := study.PlanFor(context.Background(), r, study.PlanRequest{Each: q, Modes: modes}, nil)
	if err != nil {
		return err
	}
	out := planJSON{Goal: goal, Steps: []planStepJSON{}, Open: []openModeJSON{}}
	rows := [][]string{{"mode", "f_hz", "before_s", "after_s", "limit_s", "kind", "units", "where", "volume_m3", "sheet_m2", "dimensions"}}
	for _, s := range plan.Steps {
		m := r.Modes[s.Mode]
		x := planStepJSON{m.Mode.Order, number(m.Mode.Hz), number(m.Now()), number(plan.After.Modes[s.Mode].Now()), number(m.LimitS), s.Proposal.Absorber,
			s.Proposal.Spot, number(s.Proposal.VolumeM3), number(s.Proposal.SheetM2)}
		out.Steps = append(out.Steps, x)
		rows = append(rows, []string{orderWords(x.Order), cell(float64(x.F)), cell(float64(x.Before)), cell(float64(x.After)), cell(float64(x.Limit)), x.Absorber.Kind,
			strconv.Itoa(x.Absorber.Units), x.Where, cell(float64(x.Volume)), cell(float64(x.Sheet)), strings.Join(sheets.Dimensions(x.Absorber, units.Metric), "; ")})
	}
	for _, i := range plan.Open {
		m := plan.After.Modes[i]
		out.Open = append(out.Open, openModeJSON{m.Mode.Order, number(m.Mode.Hz), number(m.Now()), number(m.LimitS)})
	}
	return c.answer(as, out, rows, func() error { return planText(c, out) })
}

func orderWords(o [3]int) string { return fmt.Sprintf("%d %d %d", o[0], o[1], o[2]) }

func planText(c *call, out planJSON) error {
	fmt.Fprintf(c.stdout, "A plan, calculated in the treated room as a whole.\n\n")
	rows := [][]string{{"id", "for mode", "Hz", "before s", "after s", "limit s", "kind", "units", "where", "volume m³"}}
	for _, x := range out.Steps {
		rows = append(rows, []string{x.Absorber.ID, orderWords(x.Order), shown(float64(x.F), 1), shown(float64(x.Before), 2), shown(float64(x.After), 2), shown(float64(x.Limit), 2),
			x.Absorber.Kind, strconv.Itoa(x.Absorber.Units), x.Where, shown(float64(x.Volume), 3)})
	}
	if err := writeText(c.stdout, rows); err != nil {
		return err
	}
	for _, x := range out.Steps {
		fmt.Fprintf(c.stdout, "\n%s. %s, %s\n", x.Absorber.ID, sheets.KindWords(x.Absorber.Kind), strings.Join(sheets.Dimensions(x.Absorber, units.Metric), "; "))
	}
	if len(out.Open) == 0 {
		fmt.Fprintln(c.stdout, "\nAll are under their limits with it.")
		return nil
	}
	fmt.Fprintln(c.stdout, "\nStill over the limit:")
	for _, m := range out.Open {
		fmt.Fprintf(c.stdout, "mode %s at %.1f Hz: %.2f s, limit %.2f s\n", orderWords(m.Order), float64(m.F), float64(m.T60), float64(m.Limit))
	}
	return nil
}
