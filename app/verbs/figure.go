package verbs

import (
	"io"
	"path/filepath"
	"slices"
	"strings"

	"stillroom/app/figures"
	"stillroom/app/sheets"
	"stillroom/app/study"
)

func runFigure(c *call) error {
	lane := c.flags.String("lane", "", "")
	out := c.flags.String("out", "", "")
	file, err := c.parseFile()
	if err != nil {
		return err
	}
	names := []string{figures.PlanName, figures.SectionName}
	for _, l := range figures.Lanes() {
		names = append(names, string(l))
	}
	if err := oneOf("lane", *lane, names...); err != nil {
		return err
	}
	format := strings.ToLower(strings.TrimPrefix(filepath.Ext(*out), "."))
	if !slices.Contains(figures.Formats(), format) {
		return wrongf("--out must end in .png, .svg or .pdf, is %q", *out)
	}
	p, err := c.load(file)
	if err != nil {
		return err
	}
	r, err := c.study(p, study.Options{Points: 800, ModesToHz: 250})
	if err != nil {
		return err
	}
	return writeFile(*out, func(w io.Writer) error {
		return figures.Write(w, format, *lane, r, figures.DefaultView(r), figures.Print())
	})
}

func runSheets(c *call) error {
	out := c.flags.String("out", "", "")
	paper := c.flags.String("paper", "a4", "")
	system := c.flags.String("units", "metric", "")
	file, err := c.parseFile()
	if err != nil {
		return err
	}
	if strings.ToLower(filepath.Ext(*out)) != ".pdf" {
		return wrongf("--out must name a file that ends in .pdf, is %q", *out)
	}
	if err := oneOf("paper", *paper, "a4", "letter"); err != nil {
		return err
	}
	if err := oneOf("units", *system, "metric", "us"); err != nil {
		return err
	}
	p, err := c.load(file)
	if err != nil {
		return err
	}
	r, err := c.study(p, study.Options{Points: 600})
	if err != nil {
		return err
	}
	return writeFile(*out, func(w io.Writer) error {
		return sheets.Write(w, r, sheets.Options{Letter: *paper == "letter", US: *system == "us"})
	})
}
