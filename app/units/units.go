// Package units writes figures for people and reads what they type: metric, or
// US with feet, inches and sixteenths. Everything else of the program is SI.
package units

import (
	"fmt"
	"math"
	"strconv"
	"strings"
	"unicode"
)

// System is a system of units.
type System int

// The two systems.
const (
	Metric System = iota
	US
)

const (
	// Inch and Foot in metres, exact (international yard and pound agreement, 1959).
	Inch = 0.0254
	Foot = 12 * Inch
	// PoundPerSquareFoot in kg/m².
	PoundPerSquareFoot = 0.45359237 / (Foot * Foot)
	// CubicFoot in m³.
	CubicFoot = Foot * Foot * Foot
)

// Length writes a length in metres: "5.20 m", or feet, inches and sixteenths.
func Length(m float64, s System) string {
	if s == US {
		return feetInches(m)
	}
	return decimal(m, 2) + " m"
}

// How far the short form of a small length may be off before it is written with more
// decimals: a sixteenth may make a tenth of a sheet's nominal thickness.
const (
	fineMetric = 0.005
	fineInches = 0.1
)

// Small writes a small length in metres: "50 mm" or inches with sixteenths; a thin sheet
// or a fine hole, which that would round away, with more decimals.
func Small(m float64, s System) string {
	text, share, unit, places, suffix := trimmed(m*1000, 1)+" mm", fineMetric, 0.001, 2, " mm"
	if s == US {
		text, share, unit, places, suffix = inches(m), fineInches, Inch, 3, "″"
	}
	if back, err := ParseLength(text, s, true); err == nil && math.Abs(back-m) <= share*math.Abs(m) {
		return text
	}
	return trimmed(m/unit, places) + suffix
}

// Area writes an area in m².
func Area(m2 float64, s System) string {
	if s == US {
		return decimal(m2/(Foot*Foot), 1) + " ft²"
	}
	return decimal(m2, 2) + " m²"
}

// Volume writes a volume in m³.
func Volume(m3 float64, s System) string {
	if s == US {
		return decimal(m3/CubicFoot, 0) + " ft³"
	}
	return decimal(m3, 1) + " m³"
}

// Litres writes a volume in m³ of a box.
func Litres(m3 float64, s System) string {
	if s == US {
		return decimal(m3/CubicFoot, 2) + " ft³"
	}
	return decimal(m3*1000, 1) + " L"
}

// Mass writes a mass per area in kg/m².
func Mass(kg float64, s System) string {
	if s == US {
		return decimal(kg/PoundPerSquareFoot, 2) + " lb/ft²"
	}
	return trimmed(kg, 2) + " kg/m²"
}

// Speed returns a speed of sound as text: metres or feet a second.
func Speed(ms float64, s System) string {
	if s == US {
		return decimal(ms/Foot, 1) + " ft/s"
	}
	return decimal(ms, 1) + " m/s"
}

// Temperature writes a temperature in °C.
func Temperature(c float64, s System) string {
	if s == US {
		return trimmed(c*9/5+32, 1) + " °F"
	}
	return trimmed(c, 1) + " °C"
}

// Hertz writes a frequency.
func Hertz(hz float64) string { return decimal(hz, 1) + " Hz" }

// Seconds writes a time.
func Seconds(t float64) string { return decimal(t, 2) + " s" }

// Decibels writes a level with a proper minus, a dash where there is none.
func Decibels(db float64) string {
	if math.IsNaN(db) || math.IsInf(db, 0) {
		return "–"
	}
	return decimal(db, 1) + " dB"
}

// decimal writes v with fixed decimals and a proper minus.
func decimal(v float64, places int) string {
	s := strconv.FormatFloat(v, 'f', places, 64)
	if strings.Trim(s, "-0.") == "" {
		s = strings.TrimPrefix(s, "-")
	}
	return strings.Replace(s, "-", "−", 1)
}

// trimmed writes v with at most the given decimals.
func trimmed(v float64, places int) string {
	s := decimal(v, places)
	if strings.Contains(s, ".") {
		s = strings.TrimRight(strings.TrimRight(s, "0"), ".")
	}
	return s
}

// feetInches writes 17′ 0 11/16″.
func feetInches(m float64) string {
	sign, n := sixteenths(m)
	feet, rest := n/(12*16), n%(12*16)
	text := inchText(rest)
	if rest > 0 && rest < 16 {
		text = "0 " + text
	}
	return fmt.Sprintf("%s%d′ %s″", sign, feet, text)
}

// inches writes 4 3/16″.
func inches(m float64) string {
	sign, n := sixteenths(m)
	return sign + inchText(n) + "″"
}

func sixteenths(m float64) (sign string, n int) {
	if m < 0 {
		sign, m = "−", -m
	}
	return sign, int(math.Round(m / Inch * 16))
}

// inchText writes sixteenths of an inch as inches and a reduced fraction.
func inchText(n int) string {
	whole, part, over := n/16, n%16, 16
	if part == 0 {
		return strconv.Itoa(whole)
	}
	for part%2 == 0 {
		part, over = part/2, over/2
	}
	if whole == 0 {
		return fmt.Sprintf("%d/%d", part, over)
	}
	return fmt.Sprintf("%d %d/%d", whole, part, over)
}

// ParseLength reads a length in metres. Without a unit it is in metres, or in
// the US system in feet where small is false and inches where it is true (and
// in millimetres in the metric system where small is true). "5.2", "5,2 m",
// "5200 mm", "17' 3/4\"", "17 ft 3/4 in", "6 1/2\"" are understood.
func ParseLength(text string, s System, small bool) (float64, error) {
	fields, err := lengthTokens(text)
	if err != nil {
		return 0, err
	}
	bare := 1.0
	switch {
	case s == US && small:
		bare = Inch
	case s == US:
		bare = Foot
	case small:
		bare = 0.001
	}
	var sum, pending float64
	var open, any bool
	negative := false
	for _, t := range fields {
		switch {
		case t == "-" || t == "−":
			negative = true
		case t[0] >= '0' && t[0] <= '9' || t[0] == '.':
			v, err := number(t)
			if err != nil {
				return 0, notLength(text)
			}
			pending += v
			open, any = true, true
		default:
			unit, ok := lengthUnit(t)
			if !ok || !open {
				return 0, notLength(text)
			}
			sum += pending * unit
			pending, open = 0, false
			bare = next(unit, bare)
		}
	}
	if !any {
		return 0, notLength(text)
	}
	if open {
		sum += pending * bare
	}
	if negative {
		sum = -sum
	}
	if math.IsInf(sum, 0) || math.IsNaN(sum) {
		return 0, notLength(text)
	}
	return sum, nil
}

// next is what a bare number means after a unit: inches after feet.
func next(unit, bare float64) float64 {
	if unit == Foot {
		return Inch
	}
	return bare
}

func notLength(text string) error {
	return fmt.Errorf("%q is no length: write 5.2 m, 5200 mm or 17' 3/4\"", strings.TrimSpace(text))
}

// lengthTokens splits a text into numbers, fractions and units.
func lengthTokens(text string) ([]string, error) {
	text = strings.ReplaceAll(text, ",", ".")
	var out []string
	kind := func(r rune) int {
		switch {
		case r >= '0' && r <= '9' || r == '.' || r == '/':
			return 1
		case unicode.IsLetter(r):
			return 2
		}
		return 3
	}
	last := 0
	for _, r := range text {
		if unicode.IsSpace(r) {
			last = 0
			continue
		}
		if k := kind(r); k == last && k != 3 {
			out[len(out)-1] += string(r)
		} else {
			out = append(out, string(r))
			last = k
		}
	}
	if len(out) == 0 {
		return nil, notLength(text)
	}
	return out, nil
}

func lengthUnit(t string) (float64, bool) {
	switch strings.ToLower(t) {
	case "m":
		return 1, true
	case "cm":
		return 0.01, true
	case "mm":
		return 0.001, true
	case "ft", "'", "′":
		return Foot, true
	case "in", "\"", "″":
		return Inch, true
	}
	return 0, false
}

// number reads a decimal or a fraction.
func number(t string) (float64, error) {
	if top, under, found := strings.Cut(t, "/"); found {
		a, err := strconv.ParseFloat(top, 64)
		if err != nil {
			return 0, err
		}
		b, err := strconv.ParseFloat(under, 64)
		if err != nil || b == 0 {
			return 0, fmt.Errorf("%q is no fraction", t)
		}
		return a / b, nil
	}
	return strconv.ParseFloat(t, 64)
}

// ParseNumber reads a number as people type it, with a point or a comma, and the
// given unit behind it or none. Another unit is an error: it would mean another
// number.
func ParseNumber(text, unit string) (float64, error) {
	t := strings.TrimSpace(strings.ReplaceAll(strings.ReplaceAll(text, ",", "."), "−", "-"))
	bare := t
	if unit != "" && len(t) > len(unit) && strings.EqualFold(t[len(t)-len(unit):], unit) {
		bare = strings.TrimSpace(t[:len(t)-len(unit)])
	}
	v, err := strconv.ParseFloat(bare, 64)
	switch {
	case err == nil && !math.IsInf(v, 0) && !math.IsNaN(v):
		return v, nil
	case unit != "":
		return 0, fmt.Errorf("%q is no number in %s", strings.TrimSpace(text), unit)
	}
	return 0, fmt.Errorf("%q is no number", strings.TrimSpace(text))
}
