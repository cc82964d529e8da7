package sheets

import (
	"fmt"
	"math"
	"strings"

	"stillroom/app/project"
	"stillroom/app/units"
	"stillroom/resonators"
	"stillroom/resonators/tuning"
)

// KindWords names a kind of absorber as a joiner would.
func KindWords(kind string) string {
	switch kind {
	case "neck":
		return "box with a neck"
	case "panel":
		return "panel on a cavity"
	case "perforated":
		return "perforated panel"
	case "slotted":
		return "slatted front"
	case "microperforated":
		return "micro-perforated panel"
	default:
		return "porous layer"
	}
}

// Dimensions lists every dimension of an absorber in words with its unit.
func Dimensions(a project.Absorber, s units.System) []string {
	mm := func(words string, v float64) string { return words + " " + units.Small(v/1000, s) }
	var out []string
	add := func(t ...string) { out = append(out, t...) }
	fill := func(f *project.Fill) {
		if f != nil {
			at := "against the wall"
			if f.AtFace {
				at = "at the face"
			}
			add(mm("fill", f.ThicknessMM)+" "+at, flow(f.FlowPaSM2))
		}
	}
	switch {
	case a.Neck != nil:
		add("air in the box "+units.Litres(a.Neck.CavityL/1000, s), mm("mouth inside diameter", a.Neck.MouthDiameterMM), mm("neck length", a.Neck.LengthMM))
		if a.Neck.Mouths > 1 {
			add(fmt.Sprintf("%d necks", a.Neck.Mouths))
		}
		if a.Neck.GauzePaSM > 0 {
			add(fmt.Sprintf("gauze %.0f Pa·s/m over the mouth", a.Neck.GauzePaSM))
		}
		if f := a.Neck.Fill; f != nil {
			add(fmt.Sprintf("%.0f %% of the box filled", 100*f.Share), flow(f.FlowPaSM2))
		}
	case a.Panel != nil:
		add("sheet "+units.Mass(a.Panel.MassKgM2, s), mm("thick", a.Panel.ThicknessMM), mm("cavity", a.Panel.CavityMM))
		fill(a.Panel.Fill)
	case a.Perforated != nil:
		p := a.Perforated
		add(mm("sheet", p.PanelMM), mm("holes", p.HoleMM), mm("square pitch", p.PitchMM), mm("cavity", p.CavityMM)+partition(p.Partitioned))
		fill(p.Fill)
		if p.GauzePaSM > 0 {
			add(fmt.Sprintf("gauze %.0f Pa·s/m", p.GauzePaSM))
		}
	case a.Slotted != nil:
		p := a.Slotted
		add(mm("slats", p.SlatMM), mm("gaps", p.SlotMM), mm("thick", p.PanelMM), mm("cavity", p.CavityMM)+partition(p.Partitioned))
		fill(p.Fill)
	case a.Microperforated != nil:
		p := a.Microperforated
		add(mm("sheet", p.PanelMM), mm("holes", p.HoleMM), mm("square pitch", p.PitchMM), mm("cavity", p.CavityMM)+partition(p.Partitioned))
	case a.Porous != nil:
		add(mm("layer", a.Porous.ThicknessMM), flow(a.Porous.FlowPaSM2))
		if a.Porous.GapMM > 0 {
			add(mm("gap behind", a.Porous.GapMM))
		}
	}
	return out
}

func flow(v float64) string { return fmt.Sprintf("flow resistivity %.0f Pa·s/m²", v) }

func partition(p bool) string {
	if p {
		return ", partitioned"
	}
	return ""
}

// Step says what a step of a dimension is in the units of a system, and how many
// of the sensitivity's own steps it is.
func Step(d resonators.Sensitivity, s units.System) (words string, steps float64) {
	text, size := "", d.Step
	switch d.Quantity() {
	case resonators.Length:
		text = units.Small(d.Step, s)
		if s == units.US {
			// The nearest common division of the inch.
			text, size = "1/16 in", units.Inch/16
			if d.Step < 0.0005 {
				text, size = "1/64 in", units.Inch/64
			}
		}
	case resonators.Volume:
		text = units.Litres(d.Step, s)
		if s == units.US {
			text, size = "0.1 ft³", 0.1*units.CubicFoot
		}
	case resonators.AreaMass:
		text = units.Mass(d.Step, s)
		if s == units.US {
			text, size = "0.02 lb/ft²", 0.02*units.PoundPerSquareFoot
		}
	}
	return d.Words(text), size / d.Step
}

// Allowed says how far a dimension may be off, in the units of a system.
func Allowed(t tuning.Tolerance, s units.System) string {
	if math.IsInf(t.Allowed, 0) || t.Value > 0 && t.Allowed > t.Value/2 {
		return "any"
	}
	metric := s == units.Metric
	switch t.Quantity() {
	case resonators.Length:
		if metric {
			return fmt.Sprintf("± %.1f mm", 1000*t.Allowed)
		}
		return fmt.Sprintf("± %.3f in", t.Allowed/units.Inch)
	case resonators.Volume:
		if metric {
			return fmt.Sprintf("± %.1f L", 1000*t.Allowed)
		}
		return fmt.Sprintf("± %.2f ft³", t.Allowed/units.CubicFoot)
	case resonators.AreaMass:
		if metric {
			return fmt.Sprintf("± %.2f kg/m²", t.Allowed)
		}
		return fmt.Sprintf("± %.3f lb/ft²", t.Allowed/units.PoundPerSquareFoot)
	}
	if t.Value > 0 {
		return fmt.Sprintf("± %.0f %%", 100*t.Allowed/t.Value)
	}
	return fmt.Sprintf("± %.3g", t.Allowed)
}

// Measured writes a criterion's figure in the units of a system: lengths, areas
// and volumes in theirs, whole numbers of things without decimals, a dash for
// none.
func Measured(v float64, unit string, s units.System) string {
	switch {
	case math.IsNaN(v) || math.IsInf(v, 0):
		return "–"
	case unit == "m":
		return units.Length(v, s)
	case unit == "m²":
		return units.Area(v, s)
	case unit == "m³":
		return units.Volume(v, s)
	case unit == "bands" || unit == "pairs" || unit == "modes":
		return fmt.Sprintf("%.0f", v)
	case unit == "dB":
		return units.Decibels(v)
	case unit == "Hz" && math.Abs(v) < 50:
		return fmt.Sprintf("%.1f Hz", v)
	case unit == "Hz" || unit == "°":
		return strings.Replace(fmt.Sprintf("%.0f %s", v, unit), " °", "°", 1)
	case unit == "":
		return fmt.Sprintf("%.2f", v)
	}
	return fmt.Sprintf("%.2f %s", v, unit)
}
