package figures

import (
	"fmt"
	"math"

	"stillroom/app/project"
	"stillroom/app/study"
	"stillroom/app/units"
)

// build is what the section of an absorber shows, in millimetres: what lies in
// layers from the wall to the room, what opens the front, and what is measured.
type build struct {
	width    float64 // of one unit, along the first coordinate of its surface
	layers   []layer // from the wall to the room
	openings *openings
	stretch  float64 // how many times its depth of its width is shown at the most
	least    float64 // width that must be seen for its pattern to be understood
	gauze    bool
	cells    bool    // partitions stand in the cavity
	box      bool    // a box: tubes stand behind the openings
	neck     float64 // their length, mm
	left     []dim   // each on a line of its own, the outermost first
	right    []dim   // one chain
	notes    []string
	assumed  []string // notes of what is not in the data, said where there is room
}

// layer is what lies at one depth.
type layer struct {
	of    stuff
	thick float64 // mm
}

type stuff int

const (
	airLayer stuff = iota
	woolLayer
	boardLayer // solid all over
	sheetLayer
)

// openings are holes or slots that repeat across the front.
type openings struct {
	across float64 // of one, mm
	pitch  float64 // mm
	slots  bool    // seen end-on: nothing of the front is seen beyond them
	count  int     // across the width, 0: as many as fit
	middle bool    // one lies in the middle of a stretch, else two lie about it
	size   dim     // label of one
	step   dim     // label of the pitch, or of the slat between two slots; no value: none
}

// dim is a dimension: from and to are depths in mm from the wall, where it is
// one of depth.
type dim struct {
	from, to    float64
	name, value string
}

// named returns the value with the name before it.
func (d dim) named() string {
	if d.name == "" {
		return d.value
	}
	return d.name + " " + d.value
}

// neckName names the dimension that the tube's inner end bounds.
const neckName = "Neck"

// builds is the one place that knows the kinds.
func builds(a project.Absorber, sys units.System) (build, bool) {
	var b build
	switch {
	case a.Neck != nil:
		b = neckBuild(a, *a.Neck, sys)
	case a.Panel != nil:
		b = panelBuild(*a.Panel, sys)
	case a.Perforated != nil:
		b = perforatedBuild(*a.Perforated, sys)
	case a.Slotted != nil:
		b = slottedBuild(*a.Slotted, sys)
	case a.Microperforated != nil:
		b = microperforatedBuild(*a.Microperforated, sys)
	case a.Porous != nil:
		b = porousBuild(*a.Porous, sys)
	default:
		return b, false
	}
	b.width = a.Size[0] * 1000
	if b.stretch == 0 {
		b.stretch = 2.2
	}
	// One layer alone is the whole depth and measured once.
	if !(len(b.layers) == 1 && len(b.right) == 1) {
		total := dim{to: b.depth(), name: "Depth", value: small(study.Depth(a)*1000, sys)}
		b.left = append([]dim{total}, b.left...)
	}
	sound := b.depth() > 0 && !math.IsInf(b.depth(), 0) && b.width > 0 && !math.IsInf(b.width, 0)
	if o := b.openings; o != nil {
		sound = sound && o.across > 0 && o.pitch > 0 && !math.IsInf(o.pitch, 0)
	}
	return b, sound
}

// depth returns the sum of the layers, mm.
func (b build) depth() float64 {
	var d float64
	for _, l := range b.layers {
		d += l.thick
	}
	return d
}

// add lays what is thicker than nothing on what lies already, measures it on the
// right where it has a name, and returns where it begins and ends.
func (b *build) add(of stuff, thick float64, name string, sys units.System) (from, to float64) {
	from = b.depth()
	if !(thick > 0) {
		return from, from
	}
	b.layers = append(b.layers, layer{of, thick})
	to = from + thick
	if name != "" {
		b.right = append(b.right, dim{from, to, name, small(thick, sys)})
	}
	return from, to
}

// cavity lays the cavity with its fill, at the wall or at the face, and measures it.
func (b *build) cavity(thick float64, f *project.Fill, sys units.System) {
	switch {
	case f == nil:
		b.add(airLayer, thick, "", sys)
	case f.AtFace:
		b.add(airLayer, thick-f.ThicknessMM, "", sys)
		b.add(woolLayer, min(f.ThicknessMM, thick), "Fill", sys)
	default:
		b.add(woolLayer, min(f.ThicknessMM, thick), "Fill", sys)
		b.add(airLayer, thick-f.ThicknessMM, "", sys)
	}
	b.left = append(b.left, dim{0, thick, "Cavity", small(thick, sys)})
}

// neckBuild is a box on the wall, its boards of the thickness that [study.Depth] takes
// them to have; the sides are drawn as lines. The mouths are taken to be spread evenly
// over the front.
func neckBuild(a project.Absorber, n project.Neck, sys units.System) build {
	const board = study.BoxBoard * 1000
	var (
		b     build
		inner = study.BoxInside(a) * 1000
	)
	b.add(boardLayer, board, "", sys)
	if n.Fill != nil {
		b.add(woolLayer, inner*n.Fill.Share, "Fill", sys)
		b.add(airLayer, inner*(1-n.Fill.Share), "", sys)
	} else {
		b.add(airLayer, inner, "", sys)
	}
	b.add(sheetLayer, board, "Board", sys)
	b.left = []dim{{board, board + inner, "Cavity", small(inner, sys)}, {b.depth() - n.LengthMM, b.depth(), neckName, small(n.LengthMM, sys)}}
	width := a.Size[0] * 1000
	row := math.Round(math.Sqrt(float64(n.Mouths) * a.Size[0] / a.Size[1]))
	row = min(row, float64(n.Mouths), math.Floor(width/(1.1*n.MouthDiameterMM)))
	count := int(max(row, 1))
	value := "Ø " + small(n.MouthDiameterMM, sys)
	if n.Mouths > 1 {
		value = fmt.Sprintf("%d × %s", n.Mouths, value)
	}
	name := "Mouth"
	if n.Mouths > 1 {
		name = "Mouths"
	}
	b.openings = &openings{across: n.MouthDiameterMM, pitch: width / float64(count), count: count, middle: true,
		size: dim{name: name, value: value}}
	b.assumed = []string{"Boards taken as " + small(board, sys)}
	b.least = 1.8 * n.MouthDiameterMM
	b.box, b.neck = true, n.LengthMM
	b.gauze = n.GauzePaSM > 0
	if n.LengthMM > b.depth() {
		b.notes = append(b.notes, "Neck is longer than the box")
	}
	return b
}

func panelBuild(p project.Panel, sys units.System) build {
	var b build
	b.cavity(p.CavityMM, p.Fill, sys)
	b.add(sheetLayer, p.ThicknessMM, "Sheet", sys)
	return b
}

func perforatedBuild(p project.Perforated, sys units.System) build {
	var b build
	b.cavity(p.CavityMM, p.Fill, sys)
	b.add(sheetLayer, p.PanelMM, "Sheet", sys)
	b.holes(p.HoleMM, p.PitchMM, sys)
	b.gauze, b.cells = p.GauzePaSM > 0, p.Partitioned
	return b
}

func microperforatedBuild(p project.Microperforated, sys units.System) build {
	var b build
	b.cavity(p.CavityMM, nil, sys)
	b.add(sheetLayer, p.PanelMM, "Sheet", sys)
	b.holes(p.HoleMM, p.PitchMM, sys)
	b.cells = p.Partitioned
	return b
}

// holes opens the front with round holes.
func (b *build) holes(hole, pitch float64, sys units.System) {
	b.openings = &openings{across: hole, pitch: pitch,
		size: dim{name: "Hole", value: "Ø " + small(hole, sys)}, step: dim{name: "Pitch", value: small(pitch, sys)}}
	b.least = 2.4 * pitch
}

func slottedBuild(p project.Slotted, sys units.System) build {
	var b build
	b.cavity(p.CavityMM, p.Fill, sys)
	b.add(sheetLayer, p.PanelMM, "Thick", sys)
	b.openings = &openings{across: p.SlotMM, pitch: p.SlatMM + p.SlotMM, slots: true, middle: true,
		size: dim{name: "Gap", value: small(p.SlotMM, sys)}, step: dim{name: "Slat", value: small(p.SlatMM, sys)}}
	b.least = 2.4 * (p.SlatMM + p.SlotMM)
	b.cells = p.Partitioned
	return b
}

func porousBuild(p project.Porous, sys units.System) build {
	var b build
	b.add(airLayer, p.GapMM, "Gap", sys)
	b.add(woolLayer, p.ThicknessMM, "Layer", sys)
	return b
}

// small writes a length in mm.
func small(mm float64, sys units.System) string { return units.Small(mm/1000, sys) }
