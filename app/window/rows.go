package window

import (
	"fmt"
	"math"
	"strings"

	"stillroom/acoustics"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
)

func modeColumns() []scheduleColumn {
	return []scheduleColumn{{"No.", 4, true}, {"Mode", 7, false}, {"Kind", 9, false}, {"Hz", 7, true}, {"Wavelength", 10, true},
		{"T60 s", 7, true}, {"Limit s", 7, true}, {"Width Hz", 8, true}, {"Level dB", 8, true}, {"Treated s", 8, true}, {"Absorbers", 10, false}, {"Pressure is greatest", 30, false}}
}

// modeRows lists the mode schedule.
func modeRows(s State) []scheduleRow {
	if s.Result == nil {
		return nil
	}
	ears := s.ears()
	var rows []scheduleRow
	for i, m := range s.Result.Modes {
		rank, treated := "", "–"
		rankKey := math.NaN()
		if m.Problem {
			rank, rankKey = fmt.Sprint(m.Rank), float64(m.Rank)
		}
		longest := m.LongestTreated()
		if longest > 0 {
			treated = fmt.Sprintf("%.2f", longest)
		} else {
			longest = math.NaN()
		}
		order := m.Mode.Order
		rows = append(rows, scheduleRow{
			item: i, strong: m.Problem,
			cells: []string{rank, fmt.Sprintf("%d %d %d", order[0], order[1], order[2]), m.Mode.Kind().String(), fmt.Sprintf("%.1f", m.Mode.Hz),
				units.Length(m.Wavelength, s.system()), fmt.Sprintf("%.2f", m.Oscillator.T60()), fmt.Sprintf("%.2f", m.LimitS),
				fmt.Sprintf("%.1f", m.Oscillator.HalfPowerWidth()), strings.TrimSuffix(units.Decibels(m.LevelDB[ears]), " dB"),
				treated, absorberNames(s.Result, m.Absorbers), m.Strongest},
			keys: []float64{rankKey, float64(order[0]*10000 + order[1]*100 + order[2]), float64(m.Mode.Kind()), m.Mode.Hz, m.Wavelength,
				m.Oscillator.T60(), m.LimitS, m.Oscillator.HalfPowerWidth(), m.LevelDB[ears], longest, float64(len(m.Absorbers)), 0},
		})
	}
	return rows
}

func absorberNames(r *study.Result, list []int) string {
	var ids []string
	for _, a := range list {
		ids = append(ids, r.Absorbers[a].ID)
	}
	return strings.Join(ids, ", ")
}

func absorberColumns() []scheduleColumn {
	return []scheduleColumn{{"Id", 7, false}, {"Kind", 14, false}, {"Units", 5, true}, {"On", 7, false}, {"Front", 14, false},
		{"f0 Hz", 7, true}, {"Q", 6, true}, {"Acts, Hz", 11, true}, {"αw", 7, true}, {"For mode", 12, false}, {"Dimensions", 40, false}}
}

// absorberRows lists the absorber schedule.
func absorberRows(s State) []scheduleRow {
	if s.Result == nil {
		return nil
	}
	var rows []scheduleRow
	for i, a := range s.Result.Absorbers {
		if i >= len(s.Project.Absorbers) {
			break
		}
		p := s.Project.Absorbers[i]
		f0, q, acts, target := "–", "–", "broadband", ""
		f0Key, qKey, targetKey := math.NaN(), math.NaN(), math.NaN()
		if o := a.Report.Oscillator; o != nil {
			f0, q, acts = fmt.Sprintf("%.1f", o.Natural), fmt.Sprintf("%.1f", o.Q()), fmt.Sprintf("%.0f to %.0f", a.Report.Band[0], a.Report.Band[1])
			f0Key, qKey = o.Natural, o.Q()
		}
		if a.Target >= 0 {
			m := s.Result.Modes[a.Target].Mode
			target, targetKey = fmt.Sprintf("%d %d %d, %.1f Hz", m.Order[0], m.Order[1], m.Order[2], m.Hz), m.Hz
		}
		w := fmt.Sprintf("%.2f", a.Report.AlphaW)
		if a.Report.AlphaWShape != "" {
			w += "(" + a.Report.AlphaWShape + ")"
		}
		rows = append(rows, scheduleRow{
			item: i,
			cells: []string{a.ID, sheets.KindWords(a.Kind), fmt.Sprint(p.Units), p.Surface.String(),
				units.Small(p.Size[0], s.system()) + " × " + units.Small(p.Size[1], s.system()), f0, q, acts, w, target,
				strings.Join(sheets.Dimensions(p, s.system()), "; ")},
			keys: []float64{float64(i), float64(i), float64(p.Units), float64(p.Surface), a.AreaM2, f0Key, qKey, f0Key, a.Report.AlphaW, targetKey, 0},
		})
	}
	return rows
}

func criteriaColumns() []scheduleColumn {
	return []scheduleColumn{{"Met", 5, false}, {"Criterion", 50, false}, {"Figure", 10, true}, {"Limit", 10, true}, {"What to do", 42, false}, {"Source", 30, false}}
}

// criteriaRows lists the criteria; what is not met is strong.
func criteriaRows(s State) []scheduleRow {
	if s.Result == nil {
		return nil
	}
	var rows []scheduleRow
	for i, c := range s.Result.Criteria {
		rows = append(rows, scheduleRow{item: i, strong: c.Verdict == acoustics.NotMet,
			cells: []string{c.Verdict.String(), c.Title, sheets.Measured(c.Figure, c.Unit, s.system()), sheets.Measured(c.Limit, c.Unit, s.system()), c.WhatToDo(), c.Source},
			keys:  []float64{float64(c.Verdict), float64(i), c.Figure, c.Limit, float64(i), float64(i)}})
	}
	return rows
}
