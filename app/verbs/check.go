package verbs

import (
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
	as := c.flags.String("as", "text", "")
	file, err := c.parseFile()
	if err != nil {
		return err
	}
	if err := oneOf("as", *as, "text", "csv", "json"); err != nil {
		return err
	}
	p, err := c.load(file)
	if err != nil {
		return err
	}
	list, err := study.Criteria(p)
	if err != nil {
		return err
	}
	switch *as {
	case "json":
		out := checkJSON{[]criterionJSON{}}
		for _, x := range list {
			out.Criteria = append(out.Criteria, criterionOf(x))
		}
		return writeJSON(c.stdout, out)
	case "csv":
		rows := [][]string{{"id", "title", "source", "figure", "limit", "unit", "met"}}
		for _, x := range list {
			rows = append(rows, []string{x.ID, x.Title, x.Source, cell(x.Figure), cell(x.Limit), x.Unit, metWord(x.Verdict, "")})
		}
		return writeCSV(c.stdout, rows)
	}
	return checkText(c, list)
}

// metWord says a verdict in a word.
func metWord(v acoustics.Verdict, information string) string {
	switch v {
	case acoustics.Met:
		return "yes"
	case acoustics.NotMet:
		return "no"
	}
	return information
}

// checkText writes the criteria for a terminal, and what to do about those that
// are not met.
func checkText(c *call, list []acoustics.Criterion) error {
	rows := [][]string{{"met", "criterion", "figure", "limit", "source"}}
	var advice []string
	for _, x := range list {
		rows = append(rows, []string{metWord(x.Verdict, "–"), x.Title, measured(x.Figure, x.Unit), measured(x.Limit, x.Unit), x.Source})
		if x.Verdict == acoustics.NotMet {
			advice = append(advice, fmt.Sprintf("%s: %s", x.ID, x.Advice))
		}
	}
	fmt.Fprintln(c.stdout, "Calculated of the room without absorbers. A figure without a limit is for information.")
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
