package window

import (
	"fmt"
	"math"
	"strconv"
	"strings"

	"stillroom/app/project"
	"stillroom/app/units"
)

// quantity says how a number of the file is written in a field and read back.
type quantity struct {
	unit  string  // suffix, "" for none
	step  float64 // of the up and down keys, in the file's unit
	kind  quantityKind
	share bool // shown as per cent
}

type quantityKind int

const (
	plain quantityKind = iota
	metres
	millimetres
	areaMass
)

var (
	lengthM     = quantity{kind: metres, step: 0.01}
	lengthMM    = quantity{kind: millimetres, step: 1}
	massKgM2    = quantity{kind: areaMass, unit: "kg/m²", step: 0.1}
	perCent     = quantity{unit: "%", step: 1}
	shareOfArea = quantity{unit: "%", step: 0.05, share: true}
	number      = quantity{step: 0.01}
	count       = quantity{step: 1}
)

func inUnit(unit string, step float64) quantity { return quantity{unit: unit, step: step} }

// write puts a number of the file into words.
func (q quantity) write(v float64, s units.System) string {
	switch {
	case q.kind == metres && s == units.US:
		return units.Length(v, s)
	case q.kind == metres:
		return shortest(v) + " m"
	case q.kind == millimetres && s == units.US:
		return units.Small(v/1000, s)
	case q.kind == millimetres:
		return shortest(v) + " mm"
	case q.kind == areaMass && s == units.US:
		return shortest(math.Round(v/units.PoundPerSquareFoot*1e4)/1e4) + " lb/ft²"
	case q.share:
		return shortest(math.Round(v*1e6)/1e4) + " %"
	case q.unit == "":
		return shortest(v)
	}
	return shortest(v) + " " + q.unit
}

func shortest(v float64) string {
	return strings.Replace(strconv.FormatFloat(v, 'f', -1, 64), "-", "−", 1)
}

// read turns what was typed into a number of the file.
func (q quantity) read(text string, s units.System) (float64, error) {
	switch q.kind {
	case metres:
		return units.ParseLength(text, s, false)
	case millimetres:
		m, err := units.ParseLength(text, s, true)
		return math.Round(m*1e9) / 1e6, err
	}
	if q.kind == areaMass {
		return readAreaMass(text, s)
	}
	v, err := units.ParseNumber(text, q.unit)
	if q.share {
		v /= 100
	}
	return v, err
}

// readAreaMass reads a mass per area in either unit, a bare number in the
// system's own.
func readAreaMass(text string, s units.System) (float64, error) {
	lower := strings.ToLower(text)
	if strings.Contains(lower, "lb") || s == units.US && !strings.Contains(lower, "kg") {
		v, err := units.ParseNumber(text, "lb/ft²")
		return math.Round(v*units.PoundPerSquareFoot*1e6) / 1e6, err
	}
	return units.ParseNumber(text, "kg/m²")
}

// fault turns the problems of an edited project into one line for the field of
// the given path: its own first.
func fault(errs project.Errors, path string) error {
	if len(errs) == 0 {
		return nil
	}
	if own := errs.At(path); len(own) > 0 {
		return fmt.Errorf("%s", own[0].Rule)
	}
	return fmt.Errorf("%s: %s", errs[0].Path, errs[0].Rule)
}
