package project

import "strings"

// Range is the allowed range of a number, both ends included, in the unit of
// its key.
type Range struct{ Min, Max float64 }

// Contains reports whether v is in the range; NaN is in none.
func (r Range) Contains(v float64) bool { return v >= r.Min && v <= r.Max }

// rule says the range as a message does.
func (r Range) rule() string {
	return "must be between " + numberText(r.Min) + " and " + numberText(r.Max)
}

// Ranges that several keys share.
var (
	roomRange     = Range{0.5, 100}       // m
	sizeRange     = Range{0.01, 100}      // m
	shareRange    = Range{0, 1}           // of a surface
	depthRange    = Range{1, 2000}        // mm, cavities and thicknesses of fill
	sheetRange    = Range{0.1, 100}       // mm
	holeRange     = Range{0.05, 100}      // mm
	pitchRange    = Range{0.1, 1000}      // mm
	flowRange     = Range{100, 1_000_000} // Pa·s/m²
	gauzeRange    = Range{0, 1_000_000}   // Pa·s/m
	porosityRange = Range{0.01, 1}
	tortuosRange  = Range{1, 10}
	poreRange     = Range{1, 10_000} // µm
)

// ranges lists the allowed range of every number of the file, by its path
// with empty brackets for any index and a star for any key of a map.
var ranges = buildRanges()

func buildRanges() map[string]Range {
	r := map[string]Range{
		"air.temperature_c":         {-20, 50},
		"air.relative_humidity_pct": {0, 100},
		"air.pressure_kpa":          {60, 110},

		"room.length_m": roomRange,
		"room.width_m":  roomRange,
		"room.height_m": roomRange,

		"room.surfaces.*[].share": shareRange,
		"finishes[].absorption.*": {0, 1.5}, // laboratory values of small samples pass 1

		"loudspeakers[].gain_db":  {-60, 20},
		"loudspeakers[].delay_ms": {0, 500},

		"absorbers[].size_m[]": sizeRange,
		"absorbers[].units":    {1, 200},

		"absorbers[].neck.cavity_l":          {0.05, 5000},
		"absorbers[].neck.mouth_diameter_mm": {5, 1000},
		"absorbers[].neck.length_mm":         {0, 2000},
		"absorbers[].neck.mouths":            {1, 100},
		"absorbers[].neck.gauze_pa_s_m":      gauzeRange,
		"absorbers[].neck.fill.share":        shareRange,
		"absorbers[].neck.fill.flow_pa_s_m2": flowRange,

		"absorbers[].panel.mass_kg_m2":   {0.1, 200},
		"absorbers[].panel.thickness_mm": sheetRange,
		"absorbers[].panel.youngs_gpa":   {0, 1000}, // 0: limp
		"absorbers[].panel.poisson":      {0, 0.5},
		"absorbers[].panel.loss_factor":  {0, 2},
		"absorbers[].panel.cavity_mm":    depthRange,
		"absorbers[].panel.edge_pa_s_m":  gauzeRange,

		"absorbers[].perforated.panel_mm":     sheetRange,
		"absorbers[].perforated.hole_mm":      holeRange,
		"absorbers[].perforated.pitch_mm":     pitchRange,
		"absorbers[].perforated.cavity_mm":    depthRange,
		"absorbers[].perforated.gauze_pa_s_m": gauzeRange,

		"absorbers[].slotted.slat_mm":   {1, 1000},
		"absorbers[].slotted.slot_mm":   holeRange,
		"absorbers[].slotted.panel_mm":  sheetRange,
		"absorbers[].slotted.cavity_mm": depthRange,

		"absorbers[].microperforated.panel_mm":  sheetRange,
		"absorbers[].microperforated.hole_mm":   holeRange,
		"absorbers[].microperforated.pitch_mm":  pitchRange,
		"absorbers[].microperforated.cavity_mm": depthRange,

		"absorbers[].porous.thickness_mm": depthRange,
		"absorbers[].porous.flow_pa_s_m2": flowRange,
		"absorbers[].porous.gap_mm":       {0, 2000},

		"keep_out[].size_m[]": sizeRange,

		"stock.sheets[].mass_kg_m2":   {0.1, 200},
		"stock.sheets[].thickness_mm": sheetRange,
		"stock.sheets[].youngs_gpa":   {0, 1000}, // 0: limp
		"stock.sheets[].poisson":      {0, 0.5},
		"stock.sheets[].loss_factor":  {0, 2},
		"stock.tubes[].outside_mm":    {5, 1000},
		"stock.tubes[].inside_mm":     {5, 1000},
		"stock.wools[].thickness_mm":  depthRange,
		"stock.wools[].flow_pa_s_m2":  flowRange,

		"limits.decay[][0]": {1, 20_000},
		"limits.decay[][1]": {0.01, 100},
	}
	for _, kind := range []string{"panel", "perforated", "slotted"} {
		r["absorbers[]."+kind+".fill.thickness_mm"] = depthRange
		r["absorbers[]."+kind+".fill.flow_pa_s_m2"] = flowRange
		addFluid(r, "absorbers[]."+kind+".fill.")
	}
	addFluid(r, "absorbers[].porous.")
	return r
}

func addFluid(r map[string]Range, at string) {
	r[at+"porosity"] = porosityRange
	r[at+"tortuosity"] = tortuosRange
	r[at+"viscous_um"] = poreRange
	r[at+"thermal_um"] = poreRange
}

// FieldRange returns the allowed range of the number at a path, such as
// "absorbers[1].panel.cavity_mm" or "absorbers[].panel.cavity_mm", in the unit
// of the key. Positions have none here: they depend on the room.
func FieldRange(path string) (Range, bool) {
	r, found := ranges[pattern(path)]
	return r, found
}

// pattern turns a path into the form that ranges lists.
func pattern(path string) string {
	if rest, found := strings.CutPrefix(path, "room.surfaces."); found {
		if _, after, cut := strings.Cut(rest, "["); cut {
			path = "room.surfaces.*[" + after
		}
	}
	if before, _, found := strings.Cut(path, ".absorption."); found {
		path = before + ".absorption.*"
	}
	limits := strings.HasPrefix(path, "limits.decay[")
	var b strings.Builder
	depth := 0
	for _, r := range path {
		switch {
		case r == '[':
			depth++
		case r >= '0' && r <= '9' && strings.HasSuffix(b.String(), "[") && !(limits && depth == 2):
			continue
		}
		b.WriteRune(r)
	}
	return b.String()
}
