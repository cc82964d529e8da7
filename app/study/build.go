package study

import (
	"fmt"
	"math"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/resonators"
	"stillroom/resonators/tuning"
)

// buildable turns a candidate into the file's terms, its dimensions rounded to
// what can be built: litres to a hundredth, millimetres to a tenth.
func buildable(c tuning.Candidate) project.Absorber {
	a := project.Absorber{Surface: c.At.Surface, Centre: c.At.Centre, Size: c.At.Size, Units: c.At.Units}
	for i := range 2 {
		a.Centre[i], a.Size[i] = round(a.Centre[i], 1e4), round(a.Size[i], 1e4)
	}
	switch d := c.Absorber.(type) {
	case resonators.Neck:
		a.Kind = "neck"
		a.Neck = &project.Neck{CavityL: round(d.Cavity/l, 100), MouthDiameterMM: round(2*d.MouthRadius/mm, 10),
			LengthMM: round(d.Length/mm, 10), Mouths: d.Mouths, GauzePaSM: round(d.Gauze, 10)}
		if d.FillShare > 0 {
			a.Neck.Fill = &project.NeckFill{Share: round(d.FillShare, 1000), FlowPaSM2: d.FillFlow}
		}
	case resonators.Panel:
		a.Kind = "panel"
		a.Panel = &project.Panel{MassKgM2: round(d.Mass, 1000), ThicknessMM: round(d.Thickness/mm, 100),
			YoungsGPa: round(d.Youngs/1e9, 1000), Poisson: d.Poisson, LossFactor: d.LossFactor,
			CavityMM: round(d.Cavity/mm, 10), EdgePaSM: round(d.Edge, 10)}
		a.Panel.Fill = fillOf(d.Fill)
	case resonators.Perforated:
		a.Kind = "perforated"
		a.Perforated = &project.Perforated{PanelMM: round(d.Sheet/mm, 100), HoleMM: round(d.Hole/mm, 100), PitchMM: round(d.Pitch/mm, 10),
			CavityMM: round(d.Cavity/mm, 10), Partitioned: d.Partitioned, Fill: fillOf(d.Fill), GauzePaSM: round(d.Gauze, 10)}
	case resonators.Slotted:
		a.Kind = "slotted"
		a.Slotted = &project.Slotted{SlatMM: round(d.Slat/mm, 10), SlotMM: round(d.Slot/mm, 10), PanelMM: round(d.Sheet/mm, 10),
			CavityMM: round(d.Cavity/mm, 10), Partitioned: d.Partitioned, Fill: fillOf(d.Fill)}
	case resonators.Microperforated:
		a.Kind = "microperforated"
		a.Microperforated = &project.Microperforated{PanelMM: round(d.Sheet/mm, 100), HoleMM: round(d.Hole/mm, 100),
			PitchMM: round(d.Pitch/mm, 100), CavityMM: round(d.Cavity/mm, 10), Partitioned: d.Partitioned}
	case resonators.Porous:
		a.Kind = "porous"
		a.Porous = &project.Porous{ThicknessMM: round(d.Thickness/mm, 10), FlowPaSM2: d.FlowResistivity, GapMM: round(d.Gap/mm, 10)}
	default:
		panic(fmt.Sprintf("study: the tuner proposed a %s", d.Kind()))
	}
	return a
}

// fillOf turns a fill into the file's terms.
func fillOf(f *resonators.Fill) *project.Fill {
	if f == nil {
		return nil
	}
	return &project.Fill{ThicknessMM: round(f.Thickness/mm, 10), FlowPaSM2: f.FlowResistivity, AtFace: f.AtFace}
}

// round rounds v to 1/steps.
func round(v, steps float64) float64 { return math.Round(v*steps) / steps }

// spot says where a placement is: its surface, and whether in a corner, at an
// edge or free on it.
func spot(b acoustics.Box, at resonators.Placement) string {
	const near = 0.05 // m
	i, j := at.Surface.InPlane()
	d := b.Dimensions()
	ends := [2]float64{d[i], d[j]}
	length := [2]float64{at.Size[0] * float64(at.Units), at.Size[1]}
	meets := 0
	for k := range 2 {
		lo := at.Centre[k] - at.Size[k]/2
		if lo < near || ends[k]-(lo+length[k]) < near {
			meets++
		}
	}
	return [3]string{"free on the ", "at an edge of the ", "in a corner of the "}[meets] + surfaceWords(at.Surface)
}

// surfaceWords names a surface as one speaks of it.
func surfaceWords(s acoustics.Surface) string {
	switch s {
	case acoustics.Floor, acoustics.Ceiling:
		return s.String()
	default:
		return s.String() + " wall"
	}
}

// BoxBoard is the thickness of board that boxes and frames are taken to be built of,
// m. Common practice.
const BoxBoard = 0.018

// BoxInside returns how deep the air in a neck box is, m: its volume over what the
// sides, of [BoxBoard], leave of the front; over the whole front where that is too
// small for sides.
func BoxInside(a project.Absorber) float64 {
	w, h := a.Size[0]-2*BoxBoard, a.Size[1]-2*BoxBoard
	if min(w, h) < 2*BoxBoard {
		w, h = a.Size[0], a.Size[1]
	}
	return a.Neck.CavityL * l / (w * h)
}

// Depth returns how far an absorber stands out from its surface, in metres: its
// cavity and sheet; for a neck box the air in it with front and back boards.
func Depth(a project.Absorber) float64 {
	switch {
	case a.Neck != nil:
		return BoxInside(a) + 2*BoxBoard
	case a.Panel != nil:
		return (a.Panel.CavityMM + a.Panel.ThicknessMM) * mm
	case a.Perforated != nil:
		return (a.Perforated.CavityMM + a.Perforated.PanelMM) * mm
	case a.Slotted != nil:
		return (a.Slotted.CavityMM + a.Slotted.PanelMM) * mm
	case a.Microperforated != nil:
		return (a.Microperforated.CavityMM + a.Microperforated.PanelMM) * mm
	case a.Porous != nil:
		return (a.Porous.ThicknessMM + a.Porous.GapMM) * mm
	}
	return 0
}

// Volume returns what an absorber takes of the room, all units together, m³.
func Volume(a project.Absorber) float64 {
	return a.Size[0] * a.Size[1] * float64(a.Units) * Depth(a)
}

// Cut is a part that is cut from sheet, or a length of pipe.
type Cut struct {
	Part      string
	Count     int     // for all units
	W, H      float64 // m; of a pipe its inside diameter and its length
	Thickness float64 // m; 0 for a pipe
}

// CutList returns the parts of all units of an absorber: for a box its six boards and
// its necks, for a front over a cavity the front and the frame's four sides, for a
// porous layer its slabs.
func CutList(a project.Absorber) []Cut {
	var (
		w, h  = a.Size[0], a.Size[1]
		n     = a.Units
		depth = Depth(a)
	)
	frame := func(thickness float64) []Cut {
		deep := depth - thickness
		return []Cut{{"front", n, w, h, thickness}, {"frame, long side", 2 * n, math.Max(w, h), deep, BoxBoard},
			{"frame, short side", 2 * n, math.Min(w, h) - 2*BoxBoard, deep, BoxBoard}}
	}
	fill := func(list []Cut, f *project.Fill) []Cut {
		if f == nil {
			return list
		}
		return append(list, Cut{"fill", n, w - 2*BoxBoard, h - 2*BoxBoard, f.ThicknessMM * mm})
	}
	switch {
	case a.Neck != nil:
		inside := BoxInside(a)
		return []Cut{{"front and back", 2 * n, w, h, BoxBoard}, {"sides, long", 2 * n, math.Max(w, h), inside, BoxBoard},
			{"sides, short", 2 * n, math.Min(w, h) - 2*BoxBoard, inside, BoxBoard},
			{"neck, pipe", n * a.Neck.Mouths, a.Neck.MouthDiameterMM * mm, a.Neck.LengthMM * mm, 0}}
	case a.Panel != nil:
		return fill(frame(a.Panel.ThicknessMM*mm), a.Panel.Fill)
	case a.Perforated != nil:
		return fill(frame(a.Perforated.PanelMM*mm), a.Perforated.Fill)
	case a.Slotted != nil:
		s := a.Slotted
		slats := max(1, int(h/((s.SlatMM+s.SlotMM)*mm)))
		list := append([]Cut{{"slats", n * slats, w, s.SlatMM * mm, s.PanelMM * mm}}, frame(s.PanelMM * mm)[1:]...)
		return fill(list, s.Fill)
	case a.Microperforated != nil:
		return frame(a.Microperforated.PanelMM * mm)
	case a.Porous != nil:
		return []Cut{{"slab", n, w, h, a.Porous.ThicknessMM * mm}}
	}
	return nil
}

// SheetArea returns the area of all that is cut from sheet, m².
func SheetArea(a project.Absorber) float64 {
	var sum float64
	for _, c := range CutList(a) {
		if c.Thickness > 0 && c.Part != "fill" && c.Part != "slab" {
			sum += float64(c.Count) * c.W * c.H
		}
	}
	return sum
}
