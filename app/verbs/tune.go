package verbs

import (
	"context"
	"fmt"
	"math"
	"slices"
	"strconv"
	"strings"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
	"stillroom/resonators/tuning"
)

type tuneJSON struct {
	Mode       tunedModeJSON   `json:"mode"`
	Goal       string          `json:"goal"`
	Target     number          `json:"target_s"`
	Candidates []candidateJSON `json:"candidates"`
}

type tunedModeJSON struct {
	Order [3]int `json:"order"`
	F     number `json:"f_hz"`
	T60   number `json:"t60_s"`
	Limit number `json:"limit_s"`
}

type candidateJSON struct {
	Rank        int              `json:"rank"`
	Absorber    project.Absorber `json:"absorber"`
	Where       string           `json:"where"`
	F0          number           `json:"f0_hz"`
	Q           number           `json:"q"`
	Coupling    number           `json:"coupling_ratio"`
	After       []poleJSON       `json:"after"`
	T60         number           `json:"t60_after_s"`
	Meets       bool             `json:"meets"`
	PeakBefore  number           `json:"peak_before_db"`
	PeakAfter   number           `json:"peak_after_db"`
	Volume      number           `json:"volume_m3"`
	Sheet       number           `json:"sheet_m2"`
	LeastVolume number           `json:"least_volume_m3"`
	LeastArea   number           `json:"least_area_m2"`
	Neighbours  []neighbourJSON  `json:"neighbours"`
	Tolerances  []toleranceJSON  `json:"tolerances"`
	Colder      number           `json:"t60_5c_colder_s"`
	Warmer      number           `json:"t60_5c_warmer_s"`
}

type neighbourJSON struct {
	Order  [3]int `json:"order"`
	F      number `json:"f_hz"`
	Before number `json:"before_s"`
	After  number `json:"after_s"`
}

type toleranceJSON struct {
	Dimension string `json:"dimension"`
	HzPerStep number `json:"hz_per_step"`
	Step      string `json:"step"`
	Allowed   string `json:"allowed"`
}

// allProblems in place of a mode asks for a plan for all problem modes.
const allProblems = "problems"

// goals names what may be tuned for.
func goals() map[string]tuning.Goal {
	return map[string]tuning.Goal{"decay": tuning.FastestDecay, "level": tuning.LowPeak, "volume": tuning.LeastVolume}
}

func runTune(c *call) error {
	var (
		mode    = c.flags.String("mode", "", "")
		kind    = c.flags.String("kind", "", "")
		surface = c.flags.String("surface", "", "")
		depth   = c.flags.Float64("depth", 300, "")
		goal    = c.flags.String("goal", "decay", "")
		target  = c.flags.Float64("target", 0, "")
		most    = c.flags.Int("units", 0, "")
		stock   = c.flags.String("stock", "metric", "")
	)
	p, as, err := c.loadAs()
	if err != nil {
		return err
	}
	q := study.TuneRequest{DepthM: *depth / 1000, TargetS: *target, MostUnits: *most, System: *stock, Goal: goals()[*goal]}
	var orders [][3]int
	if *mode != allProblems {
		for _, one := range strings.Split(*mode, ";") {
			order, err := orderOf(one)
			if err != nil {
				return err
			}
			orders = append(orders, order)
		}
	}
	if err := oneOf("goal", *goal, "decay", "level", "volume"); err != nil {
		return err
	}
	if err := oneOf("stock", *stock, "metric", "us"); err != nil {
		return err
	}
	if *kind != "" {
		if err := oneOf("kind", *kind, project.Kinds()...); err != nil {
			return err
		}
		q.Kinds = []string{*kind}
	}
	if *surface != "" {
		s, ok := acoustics.SurfaceNamed(*surface)
		if !ok {
			return wrongf("--surface must be front, back, left, right, floor or ceiling, is %q", *surface)
		}
		q.Surfaces = []acoustics.Surface{s}
	}
	switch {
	case !(*depth >= 20 && *depth <= 2000):
		return wrongf("--depth must be between 20 and 2000 mm, is %g", *depth)
	case c.isSet("target") && !(*target >= 0.02 && *target <= 20):
		return wrongf("--target must be between 0.02 and 20 s, is %g", *target)
	case c.isSet("units") && (*most < 1 || *most > 60):
		return wrongf("--units must be between 1 and 60, is %d", *most)
	}
	r, index, err := c.studyOf(p, orders)
	if err != nil {
		return err
	}
	if len(orders) != 1 {
		return c.plan(r, index, as, *goal, q)
	}
	q.Mode = index[0]
	found, err := study.Tune(context.Background(), r, q, nil)
	if err != nil {
		return err
	}
	out := tuneOf(r, q, *goal, found)
	return c.answer(as, out, tuneCSV(out), func() error { return tuneText(c, r, q, out, found) })
}

// orderOf reads a mode's order, as 1,0,0.
func orderOf(text string) ([3]int, error) {
	var order [3]int
	parts := strings.Split(text, ",")
	if len(parts) != 3 {
		return order, wrongf("--mode must be three whole numbers such as 1,0,0, several of them with ; between, or problems, is %q", text)
	}
	for i, p := range parts {
		n, err := strconv.Atoi(strings.TrimSpace(p))
		if err != nil || n < 0 || n > 1000 {
			return order, wrongf("--mode must be three whole numbers such as 1,0,0, several of them with ; between, or problems, is %q", text)
		}
		order[i] = n
	}
	if order == [3]int{} {
		return order, wrongf("--mode 0,0,0 is the uniform pressure, which no absorber is tuned to")
	}
	return order, nil
}

// studyOf studies a project as far as modes need it, and finds them.
func (c *call) studyOf(p project.Project, orders [][3]int) (*study.Result, []int, error) {
	r, err := c.study(p, study.Options{Points: 200})
	if err != nil {
		return nil, nil, err
	}
	var list []int
	for _, order := range orders {
		at := slices.IndexFunc(r.Modes, func(m study.ModeRow) bool { return m.Mode.Order == order })
		if at < 0 {
			return nil, nil, wrongf("--mode %d,%d,%d is not among the modes up to %.0f Hz", order[0], order[1], order[2], r.Options.ModesToHz)
		}
		list = append(list, at)
	}
	return r, list, nil
}

func tuneOf(r *study.Result, q study.TuneRequest, goal string, found []study.Proposal) tuneJSON {
	m := r.Modes[q.Mode]
	target := q.TargetS
	if target == 0 {
		target = m.LimitS
	}
	out := tuneJSON{Mode: tunedModeJSON{m.Mode.Order, number(m.Mode.Hz), number(m.Oscillator.T60()), number(m.LimitS)},
		Goal: goal, Target: number(target), Candidates: []candidateJSON{}}
	for i, p := range found {
		x := candidateJSON{Rank: i + 1, Absorber: p.Absorber, Where: p.Spot, F0: orNull(p.F0Hz), Q: orNull(p.Q), Coupling: orNull(p.Candidate.Coupling),
			After: []poleJSON{}, T60: number(p.Longest()), Meets: p.Meets, PeakBefore: number(p.PeakBefore), PeakAfter: number(p.PeakAfter),
			Volume: number(p.VolumeM3), Sheet: number(p.SheetM2), LeastVolume: orNull(p.MinVolumeM3), LeastArea: orNull(p.MinAreaM2),
			Neighbours: []neighbourJSON{}, Tolerances: []toleranceJSON{}, Colder: orNull(p.ColderS), Warmer: orNull(p.WarmerS)}
		for _, a := range p.After {
			x.After = append(x.After, poleJSON{number(a.Oscillator.Natural), number(a.Oscillator.T60()), number(a.LevelDB[0])})
		}
		for _, n := range p.Neighbours {
			x.Neighbours = append(x.Neighbours, neighbourJSON{r.Modes[n.Mode].Mode.Order, number(r.Modes[n.Mode].Mode.Hz), number(n.Before), number(n.After)})
		}
		for _, t := range p.Tolerances {
			words, steps := sheets.Step(t.Sensitivity, units.Metric)
			x.Tolerances = append(x.Tolerances, toleranceJSON{t.Dimension, number(t.F0PerStep * steps), words, sheets.Allowed(t, units.Metric)})
		}
		out.Candidates = append(out.Candidates, x)
	}
	return out
}

// orNull turns a figure that is not there into null.
func orNull(v float64) number {
	if v == 0 {
		return number(math.NaN())
	}
	return number(v)
}

func tuneCSV(out tuneJSON) [][]string {
	rows := [][]string{{"rank", "kind", "surface", "centre_1_m", "centre_2_m", "size_1_m", "size_2_m", "units", "where", "f0_hz", "q", "coupling_ratio",
		"t60_after_s", "meets", "peak_before_db", "peak_after_db", "volume_m3", "sheet_m2", "least_volume_m3", "least_area_m2", "dimensions"}}
	for _, x := range out.Candidates {
		a := x.Absorber
		row := []string{strconv.Itoa(x.Rank), a.Kind, a.Surface.String()}
		for _, v := range []float64{a.Centre[0], a.Centre[1], a.Size[0], a.Size[1]} {
			row = append(row, cell(v))
		}
		row = append(row, strconv.Itoa(a.Units), x.Where)
		for _, v := range []number{x.F0, x.Q, x.Coupling, x.T60} {
			row = append(row, cell(float64(v)))
		}
		row = append(row, strconv.FormatBool(x.Meets))
		for _, v := range []number{x.PeakBefore, x.PeakAfter, x.Volume, x.Sheet, x.LeastVolume, x.LeastArea} {
			row = append(row, cell(float64(v)))
		}
		rows = append(rows, append(row, strings.Join(sheets.Dimensions(a, units.Metric), "; ")))
	}
	return rows
}

// tuneText writes the ranking for a terminal, and each candidate's dimensions.
func tuneText(c *call, r *study.Result, q study.TuneRequest, out tuneJSON, found []study.Proposal) error {
	m := r.Modes[q.Mode]
	fmt.Fprintf(c.stdout, "Mode %s, %.1f Hz, rings %.2f s; wanted %.2f s. Calculated in the treated room as a whole.\n\n", m.Mode, m.Mode.Hz, m.Oscillator.T60(), float64(out.Target))
	if len(found) == 0 {
		_, err := fmt.Fprintln(c.stdout, "Nothing of this depth can be tuned to the mode where there is room.")
		return err
	}
	rows := [][]string{{"rank", "kind", "units", "where", "f0 Hz", "Q", "T60 s", "meets", "peak dB", "volume m³", "sheet m²"}}
	for _, x := range out.Candidates {
		meets := "no"
		if x.Meets {
			meets = "yes"
		}
		rows = append(rows, []string{strconv.Itoa(x.Rank), x.Absorber.Kind, strconv.Itoa(x.Absorber.Units), x.Where, shown(float64(x.F0), 1), shown(float64(x.Q), 1),
			shown(float64(x.T60), 2), meets, shown(float64(x.PeakAfter), 1), shown(float64(x.Volume), 3), shown(float64(x.Sheet), 2)})
	}
	if err := writeText(c.stdout, rows); err != nil {
		return err
	}
	for i, x := range out.Candidates {
		a := x.Absorber
		fmt.Fprintf(c.stdout, "\n%d. %s, %d × %s × %s, %s\n   %s\n", x.Rank, sheets.KindWords(a.Kind), a.Units, units.Small(a.Size[0], units.Metric), units.Small(a.Size[1], units.Metric),
			x.Where, strings.Join(sheets.Dimensions(a, units.Metric), "; "))
		for _, n := range x.Neighbours {
			fmt.Fprintf(c.stdout, "   mode %d,%d,%d at %.1f Hz: %s s, then %s s\n", n.Order[0], n.Order[1], n.Order[2], float64(n.F), shown(float64(n.Before), 2), shown(float64(n.After), 2))
		}
		for _, t := range x.Tolerances {
			fmt.Fprintf(c.stdout, "   %s: %+.2f Hz; %s\n", t.Step, float64(t.HzPerStep), t.Allowed)
		}
		if p := found[i]; p.ColderS > 0 {
			fmt.Fprintf(c.stdout, "   5 °C colder %.2f s, 5 °C warmer %.2f s\n", p.ColderS, p.WarmerS)
		}
	}
	fmt.Fprintln(c.stdout, "\nCalculated: measure a first one before more are built.")
	return nil
}
