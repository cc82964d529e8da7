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

// The frequencies at which a map of the level is drawn, Hz: those of the lanes.
const lowestMapHz, highestMapHz = 5.0, 250.0

func runFigure(c *call) error {
	lane := c.flags.String("lane", "", "")
	out := c.flags.String("out", "", "")
	hz := c.flags.Float64("hz", 0, "")
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
	drawn := *lane == figures.PlanName || *lane == figures.SectionName
	switch set := c.isSet("hz"); {
	case set && !drawn:
		return wrongf("--hz belongs to the plan and the section")
	case set && !(*hz >= lowestMapHz && *hz <= highestMapHz):
		return wrongf("--hz must be between %g and %g Hz, is %g", lowestMapHz, highestMapHz, *hz)
	}
	p, err := c.load(file)
	if err != nil {
		return err
	}
	r, err := c.study(p, study.Options{Points: 800, ModesToHz: 250, Ringing: *lane == string(figures.RingingLane), MapHz: *hz, MapCells: 60})
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
	r, err := c.study(p, study.Options{Points: 600, Ringing: true})
	if err != nil {
		return err
	}
	return writeFile(*out, func(w io.Writer) error {
		return sheets.Write(w, r, sheets.Options{Letter: *paper == "letter", US: *system == "us"})
	})
}
