package verbs

import (
	"cmp"
	"fmt"
	"math"
	"strings"

	"stillroom/acoustics"
	"stillroom/app/study"
)

type checkJSON struct {
	Criteria []criterionJSON `json:"criteria"`
}

type criterionJSON struct {
	ID     string `json:"id"`
	Title  string `json:"title"`
	Source string `json:"source"`
	Figure number `json:"figure"`
	Limit  number `json:"limit"`
	Unit   string `json:"unit"`
	Met    *bool  `json:"met"`
}

func criterionOf(c acoustics.Criterion) criterionJSON {
	out := criterionJSON{ID: c.ID, Title: c.Title, Source: c.Source, Figure: number(c.Figure), Limit: number(c.Limit), Unit: c.Unit}
	if c.Verdict != acoustics.Information {
		met := c.Verdict == acoustics.Met
		out.Met = &met
	}
	return out
}

func runCheck(c *call) error {
	p, as, err := c.loadAs()
	if err != nil {
		return err
	}
	list, err := study.Criteria(p)
	if err != nil {
		return err
	}
	out := checkJSON{[]criterionJSON{}}
	rows := [][]string{{"id", "title", "source", "figure", "limit", "unit", "met"}}
	for _, x := range list {
		out.Criteria = append(out.Criteria, criterionOf(x))
		rows = append(rows, []string{x.ID, x.Title, x.Source, cell(x.Figure), cell(x.Limit), x.Unit, x.Verdict.String()})
	}
	return c.answer(as, out, rows, func() error { return checkText(c, list) })
}

// checkText writes the criteria for a terminal, and what to do about those that
// are not met.
func checkText(c *call, list []acoustics.Criterion) error {
	rows := [][]string{{"met", "criterion", "figure", "limit", "source"}}
	var advice []string
	for _, x := range list {
		rows = append(rows, []string{cmp.Or(x.Verdict.String(), "–"), x.Title, measured(x.Figure, x.Unit), measured(x.Limit, x.Unit), x.Source})
		if todo := x.WhatToDo(); todo != "" {
			advice = append(advice, x.ID+": "+todo)
		}
	}
	fmt.Fprintln(c.stdout, "Calculated of the room without absorbers, where nothing else is said. A figure without a limit is for information.")
	fmt.Fprintln(c.stdout)
	if err := writeText(c.stdout, rows); err != nil {
		return err
	}
	if len(advice) > 0 {
		fmt.Fprintf(c.stdout, "\nWhat to do about what is not met:\n%s\n", strings.Join(advice, "\n"))
	}
	return nil
}

// measured writes a figure with its unit, whole numbers of things without
// decimals.
func measured(v float64, unit string) string {
	text := shown(v, 2)
	if v == math.Round(v) && (unit == "bands" || unit == "pairs" || unit == "modes") {
		text = shown(v, 0)
	}
	if unit == "" || text == "–" {
		return text
	}
	return text + " " + unit
}
