package study

import (
	"fmt"

	"stillroom/app/project"
	"stillroom/resonators"
)

// Lengths of the file in SI.
const (
	mm = 1e-3
	um = 1e-6
	l  = 1e-3 // litre in m³
)

// Design returns the absorber of a valid project in SI. It panics where the
// block that Kind names is missing, which validation excludes.
func Design(a project.Absorber) resonators.Absorber {
	switch {
	case a.Kind == "neck" && a.Neck != nil:
		return neck(*a.Neck, a.Size)
	case a.Kind == "panel" && a.Panel != nil:
		p := a.Panel
		return resonators.Panel{Mass: p.MassKgM2, Thickness: p.ThicknessMM * mm, Youngs: p.YoungsGPa * 1e9,
			Poisson: p.Poisson, LossFactor: p.LossFactor, Cavity: p.CavityMM * mm, Edge: p.EdgePaSM,
			Size: a.Size, Fill: fill(p.Fill)}
	case a.Kind == "perforated" && a.Perforated != nil:
		p := a.Perforated
		return resonators.Perforated{Sheet: p.PanelMM * mm, Hole: p.HoleMM * mm, Pitch: p.PitchMM * mm,
			Cavity: p.CavityMM * mm, Partitioned: p.Partitioned, Fill: fill(p.Fill), Gauze: p.GauzePaSM}
	case a.Kind == "slotted" && a.Slotted != nil:
		p := a.Slotted
		return resonators.Slotted{Slat: p.SlatMM * mm, Slot: p.SlotMM * mm, Sheet: p.PanelMM * mm,
			Cavity: p.CavityMM * mm, Partitioned: p.Partitioned, Fill: fill(p.Fill)}
	case a.Kind == "microperforated" && a.Microperforated != nil:
		p := a.Microperforated
		return resonators.Microperforated{Sheet: p.PanelMM * mm, Hole: p.HoleMM * mm, Pitch: p.PitchMM * mm,
			Cavity: p.CavityMM * mm, Partitioned: p.Partitioned}
	case a.Kind == "porous" && a.Porous != nil:
		p := a.Porous
		return resonators.Porous{Thickness: p.ThicknessMM * mm, FlowResistivity: p.FlowPaSM2,
			Gap: p.GapMM * mm, JCA: fluid(p.Fluid)}
	}
	panic(fmt.Sprintf("study: absorber %q of kind %q has no block of that kind", a.ID, a.Kind))
}

func neck(n project.Neck, size [2]float64) resonators.Neck {
	d := resonators.Neck{Cavity: n.CavityL * l, MouthRadius: n.MouthDiameterMM * mm / 2, Length: n.LengthMM * mm,
		Mouths: n.Mouths, Gauze: n.GauzePaSM, Front: size}
	if n.Fill != nil {
		d.FillShare, d.FillFlow = n.Fill.Share, n.Fill.FlowPaSM2
	}
	return d
}

func fill(f *project.Fill) *resonators.Fill {
	if f == nil {
		return nil
	}
	return &resonators.Fill{Thickness: f.ThicknessMM * mm, FlowResistivity: f.FlowPaSM2, AtFace: f.AtFace, JCA: fluid(f.Fluid)}
}

func fluid(f *project.Fluid) *resonators.JCA {
	if f == nil {
		return nil
	}
	return &resonators.JCA{Porosity: f.Porosity, Tortuosity: f.Tortuosity,
		ViscousLength: f.ViscousUM * um, ThermalLength: f.ThermalUM * um}
}
