package window

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"
	"gonum.org/v1/plot/vg/draw"

	"stillroom/acoustics"
	"stillroom/app/figures"
	"stillroom/app/project"
	"stillroom/app/sheets"
	"stillroom/app/study"
	"stillroom/app/units"
)

// absorberForm edits one absorber and shows what it is calculated to do.
func (d *details) absorberForm(i int) {
	path := fmt.Sprintf("absorbers[%d]", i)
	at := func(p *project.Project) *project.Absorber { return &p.Absorbers[i] }
	a := d.state.Project.Absorbers[i]
	d.heading("Absorber")
	d.text("Id", path+".id", func(p *project.Project) *string { return &at(p).ID })
	var kinds []string
	for _, k := range project.Kinds() {
		kinds = append(kinds, sheets.KindWords(k))
	}
	d.choice("Kind", kinds, func(p project.Project) int { return slices.Index(project.Kinds(), at(&p).Kind) },
		func(p *project.Project, k int) { p.Absorbers[i] = at(p).OfKind(project.Kinds()[k]) })
	var surfaces []string
	for _, s := range acoustics.Surfaces() {
		surfaces = append(surfaces, s.String())
	}
	d.choice("On the", surfaces, func(p project.Project) int { return int(at(&p).Surface) },
		func(p *project.Project, s int) {
			at(p).Surface = acoustics.Surface(s)
			*at(p) = p.Room.Onto(*at(p))
		})
	first, second := a.Surface.InPlane()
	from := [3]string{"from front", "from left", "from floor"}
	d.number("Centre "+from[first], path+".centre_m[0]", lengthM, func(p *project.Project) *float64 { return &at(p).Centre[0] })
	d.number("Centre "+from[second], path+".centre_m[1]", lengthM, func(p *project.Project) *float64 { return &at(p).Centre[1] })
	d.number("Front along", path+".size_m[0]", lengthM, func(p *project.Project) *float64 { return &at(p).Size[0] })
	d.number("Front across", path+".size_m[1]", lengthM, func(p *project.Project) *float64 { return &at(p).Size[1] })
	d.whole("Units in a row", path+".units", func(p *project.Project) *int { return &at(p).Units })
	d.heading("Dimensions")
	d.sectionDrawing(i)
	d.kindFields(path, a.Kind, at)
	d.stockButtons(i, a)
	d.heading("Calculated")
	d.absorberFigures(i)
	d.buttons(widget.NewButton("Keep its curve", func() { d.actions.Keep(i) }), widget.NewButton("Drop kept curves", func() { d.actions.Keep(-1) }))
	d.buttons(widget.NewButton("Duplicate", func() {
		p := d.state.Project
		c := p.Absorbers[i].Clone()
		c.ID = p.FreshAbsorberID()
		if q, ok := placed(p, c); ok {
			d.actions.Edit("duplicate absorber", q, "", true)
			d.actions.Select(Selection{d.state.Selection.Mode, len(p.Absorbers), -1, -1, -1})
		}
	}), widget.NewButton("Remove", func() {
		d.actions.Edit("remove absorber", d.state.Project.WithoutAbsorber(i), "", true)
	}))
}

// fillOf returns the fill of a wide kind's cavity.
func fillOf(a project.Absorber) *project.Fill {
	switch {
	case a.Panel != nil:
		return a.Panel.Fill
	case a.Perforated != nil:
		return a.Perforated.Fill
	case a.Slotted != nil:
		return a.Slotted.Fill
	}
	return nil
}

func setFill(a *project.Absorber, f *project.Fill) {
	switch {
	case a.Panel != nil:
		a.Panel.Fill = f
	case a.Perforated != nil:
		a.Perforated.Fill = f
	case a.Slotted != nil:
		a.Slotted.Fill = f
	}
}

func cavityOf(a project.Absorber) float64 {
	switch {
	case a.Panel != nil:
		return a.Panel.CavityMM
	case a.Perforated != nil:
		return a.Perforated.CavityMM
	case a.Slotted != nil:
		return a.Slotted.CavityMM
	}
	return 0
}

// kindFields adds the fields of one kind's block.
func (d *details) kindFields(path, kind string, at func(*project.Project) *project.Absorber) {
	path += "." + kind
	num := func(name, key string, q quantity, of func(*project.Absorber) *float64) {
		d.number(name, path+"."+key, q, func(p *project.Project) *float64 { return of(at(p)) })
	}
	gauze, flow := inUnit("Pa·s/m", 10), inUnit("Pa·s/m²", 500)
	switch kind {
	case "neck":
		num("Air in the box", "cavity_l", inUnit("L", 1), func(a *project.Absorber) *float64 { return &a.Neck.CavityL })
		num("Mouth, inside diameter", "mouth_diameter_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Neck.MouthDiameterMM })
		num("Neck length", "length_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Neck.LengthMM })
		d.whole("Necks", path+".mouths", func(p *project.Project) *int { return &at(p).Neck.Mouths })
		num("Gauze", "gauze_pa_s_m", gauze, func(a *project.Absorber) *float64 { return &a.Neck.GauzePaSM })
		d.check("Partly filled", func(p project.Project) bool { return at(&p).Neck != nil && at(&p).Neck.Fill != nil }, func(p *project.Project, on bool) {
			at(p).Neck.Fill = nil
			if on {
				f := project.DefaultNeckFill()
				at(p).Neck.Fill = &f
			}
		})
		if p := d.state.Project; at(&p).Neck.Fill != nil {
			num("Share filled", "fill.share", shareOfArea, func(a *project.Absorber) *float64 { return &a.Neck.Fill.Share })
			num("Flow resistivity", "fill.flow_pa_s_m2", flow, func(a *project.Absorber) *float64 { return &a.Neck.Fill.FlowPaSM2 })
		}
	case "panel":
		num("Sheet's mass", "mass_kg_m2", massKgM2, func(a *project.Absorber) *float64 { return &a.Panel.MassKgM2 })
		num("Thickness", "thickness_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Panel.ThicknessMM })
		num("Young's modulus", "youngs_gpa", inUnit("GPa", 0.5), func(a *project.Absorber) *float64 { return &a.Panel.YoungsGPa })
		num("Poisson's ratio", "poisson", number, func(a *project.Absorber) *float64 { return &a.Panel.Poisson })
		num("Loss factor", "loss_factor", quantity{step: 0.005}, func(a *project.Absorber) *float64 { return &a.Panel.LossFactor })
		num("Cavity", "cavity_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Panel.CavityMM })
		num("Edge loss", "edge_pa_s_m", gauze, func(a *project.Absorber) *float64 { return &a.Panel.EdgePaSM })
	case "perforated":
		num("Sheet", "panel_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Perforated.PanelMM })
		num("Holes, diameter", "hole_mm", quantity{kind: millimetres, step: 0.5}, func(a *project.Absorber) *float64 { return &a.Perforated.HoleMM })
		num("Square pitch", "pitch_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Perforated.PitchMM })
		num("Cavity", "cavity_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Perforated.CavityMM })
		num("Gauze", "gauze_pa_s_m", gauze, func(a *project.Absorber) *float64 { return &a.Perforated.GauzePaSM })
		d.check("Cavity partitioned", func(p project.Project) bool { return at(&p).Perforated != nil && at(&p).Perforated.Partitioned },
			func(p *project.Project, on bool) { at(p).Perforated.Partitioned = on })
	case "slotted":
		num("Slats", "slat_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Slotted.SlatMM })
		num("Gaps", "slot_mm", quantity{kind: millimetres, step: 0.5}, func(a *project.Absorber) *float64 { return &a.Slotted.SlotMM })
		num("Thickness", "panel_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Slotted.PanelMM })
		num("Cavity", "cavity_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Slotted.CavityMM })
		d.check("Cavity partitioned", func(p project.Project) bool { return at(&p).Slotted != nil && at(&p).Slotted.Partitioned },
			func(p *project.Project, on bool) { at(p).Slotted.Partitioned = on })
	case "microperforated":
		num("Sheet", "panel_mm", quantity{kind: millimetres, step: 0.1}, func(a *project.Absorber) *float64 { return &a.Microperforated.PanelMM })
		num("Holes, diameter", "hole_mm", quantity{kind: millimetres, step: 0.05}, func(a *project.Absorber) *float64 { return &a.Microperforated.HoleMM })
		num("Square pitch", "pitch_mm", quantity{kind: millimetres, step: 0.1}, func(a *project.Absorber) *float64 { return &a.Microperforated.PitchMM })
		num("Cavity", "cavity_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Microperforated.CavityMM })
		d.check("Cavity partitioned", func(p project.Project) bool {
			return at(&p).Microperforated != nil && at(&p).Microperforated.Partitioned
		},
			func(p *project.Project, on bool) { at(p).Microperforated.Partitioned = on })
	case "porous":
		num("Thickness", "thickness_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Porous.ThicknessMM })
		num("Flow resistivity", "flow_pa_s_m2", flow, func(a *project.Absorber) *float64 { return &a.Porous.FlowPaSM2 })
		num("Gap behind", "gap_mm", lengthMM, func(a *project.Absorber) *float64 { return &a.Porous.GapMM })
		d.fluidFields(path, func(a *project.Absorber) **project.Fluid { return &a.Porous.Fluid }, at)
	}
	if kind == "panel" || kind == "perforated" || kind == "slotted" {
		d.fillFields(path, at)
	}
}

// fillFields adds the fill of a cavity.
func (d *details) fillFields(path string, at func(*project.Project) *project.Absorber) {
	d.check("Fill in the cavity", func(p project.Project) bool { return fillOf(*at(&p)) != nil }, func(p *project.Project, on bool) {
		setFill(at(p), nil)
		if on {
			f := project.DefaultFill()
			f.ThicknessMM = math.Min(f.ThicknessMM, cavityOf(*at(p)))
			setFill(at(p), &f)
		}
	})
	if p := d.state.Project; fillOf(*at(&p)) == nil {
		return
	}
	d.number("Fill", path+".fill.thickness_mm", lengthMM, func(p *project.Project) *float64 { return &fillOf(*at(p)).ThicknessMM })
	d.number("Flow resistivity", path+".fill.flow_pa_s_m2", inUnit("Pa·s/m²", 500), func(p *project.Project) *float64 { return &fillOf(*at(p)).FlowPaSM2 })
	d.check("Fill touches the face", func(p project.Project) bool { f := fillOf(*at(&p)); return f != nil && f.AtFace },
		func(p *project.Project, on bool) { fillOf(*at(p)).AtFace = on })
	d.fluidFields(path+".fill", func(a *project.Absorber) **project.Fluid { return &fillOf(*a).Fluid }, at)
}

// fluidFields adds the four further parameters of a porous fluid, by which it is
// calculated after Johnson, Champoux and Allard and not after Miki.
func (d *details) fluidFields(path string, of func(*project.Absorber) **project.Fluid, at func(*project.Project) *project.Absorber) {
	d.check("By Johnson, Champoux and Allard", func(p project.Project) bool { return *of(at(&p)) != nil }, func(p *project.Project, on bool) {
		*of(at(p)) = nil
		if on {
			f := project.DefaultFluid()
			*of(at(p)) = &f
		}
	})
	if p := d.state.Project; *of(at(&p)) == nil {
		return
	}
	num := func(name, key string, q quantity, value func(*project.Fluid) *float64) {
		d.number(name, path+"."+key, q, func(p *project.Project) *float64 { return value(*of(at(p))) })
	}
	num("Porosity", "porosity", number, func(f *project.Fluid) *float64 { return &f.Porosity })
	num("Tortuosity", "tortuosity", number, func(f *project.Fluid) *float64 { return &f.Tortuosity })
	num("Viscous length", "viscous_um", inUnit("µm", 5), func(f *project.Fluid) *float64 { return &f.ViscousUM })
	num("Thermal length", "thermal_um", inUnit("µm", 5), func(f *project.Fluid) *float64 { return &f.ThermalUM })
}

// absorberFigures shows what the absorber is calculated to do.
func (d *details) absorberFigures(i int) {
	row := func(name string, value func(a study.AbsorberRow) string) {
		d.fact(name, func() string {
			if r := d.state.Result; r != nil && i < len(r.Absorbers) {
				return value(r.Absorbers[i])
			}
			return ""
		})
	}
	osc := func(name string, value func(a study.AbsorberRow, o acoustics.Oscillator) string) {
		row(name, func(a study.AbsorberRow) string {
			if a.Report.Oscillator == nil {
				return "–"
			}
			return value(a, *a.Report.Oscillator)
		})
	}
	osc("Resonance alone", func(_ study.AbsorberRow, o acoustics.Oscillator) string { return units.Hertz(o.Natural) })
	osc("In its place", func(a study.AbsorberRow, _ acoustics.Oscillator) string { return units.Hertz(a.InRoomHz) })
	osc("Q, ζ", func(_ study.AbsorberRow, o acoustics.Oscillator) string {
		return fmt.Sprintf("%.1f, %.3f", o.Q(), o.DampingRatio())
	})
	osc("Acts from, to", func(a study.AbsorberRow, _ acoustics.Oscillator) string {
		return fmt.Sprintf("%.0f to %.0f Hz", a.Report.Band[0], a.Report.Band[1])
	})
	for k, name := range []string{"Mass", "Spring", "Loss"} {
		osc(name, func(a study.AbsorberRow, _ acoustics.Oscillator) string {
			m, s, l := a.Equivalent()
			return [3]string{m, s, l}[k]
		})
	}
	row("αw, ISO 11654", func(a study.AbsorberRow) string {
		text := fmt.Sprintf("%.2f", a.Report.AlphaW)
		if a.Report.AlphaWShape != "" {
			text += "(" + a.Report.AlphaWShape + ")"
		}
		return text
	})
	row("Absorbs at most", func(a study.AbsorberRow) string {
		area, band := a.BestArea()
		return fmt.Sprintf("%s, %s Hz band", units.Area(area, d.state.system()), band)
	})
	d.note(func() string {
		r := d.state.Result
		if r == nil || i >= len(r.Absorbers) {
			return ""
		}
		return absorberWords(r.Absorbers[i], d.state)
	})
}

// absorberWords says of an absorber what needs a sentence.
func absorberWords(a study.AbsorberRow, s State) string {
	var t []string
	if o := a.Report.Oscillator; o != nil {
		t = append(t, peakWords(*o))
	} else {
		t = append(t, "Broadband: there is no oscillator.")
	}
	if c := a.Section; c != nil {
		t = append(t, fmt.Sprintf("One unit alone in a wall takes in %s of a plane wave at resonance, %.0f %% of the ceiling λ²/2π. In a diffuse field it is worth at most λ²/π, %s, in any place.",
			units.Area(c.Area, s.system()), 100*c.Area/c.Ceiling, units.Area(c.Diffuse, s.system())))
	}
	var practical []string
	for _, p := range a.Report.Practical {
		practical = append(practical, fmt.Sprintf("%s Hz %.2f", p.Nominal, p.Alpha))
	}
	t = append(t, "Practical coefficients: "+strings.Join(practical, ", ")+".")
	for _, x := range a.Sensitivities {
		words, steps := sheets.Step(x, s.system())
		t = append(t, fmt.Sprintf("%s: %s Hz, Q %s", words, signed(x.F0PerStep*steps, 2), signed(x.QPerStep*steps, 2)))
	}
	return strings.Join(append(t, a.Report.Warnings...), "\n")
}

// sectionHeight is the height of the section drawing in the details.
const sectionHeight = 170

// sectionDrawing shows the section through the absorber, which follows the figures.
func (d *details) sectionDrawing(i int) {
	p := newPicture(d.easel)
	d.form.Add(container.New(tallLayout{sectionHeight}, p))
	d.updates = append(d.updates, func() {
		if i >= len(d.state.Project.Absorbers) {
			return
		}
		a, us, style := d.state.Project.Absorbers[i], d.state.US, look{d.state.Dark}.style()
		style.Laid = true
		p.show(style.Paper, func(c draw.Canvas) { figures.DrawAbsorber(c, a, us, style) })
	})
}

// tallLayout gives its object the whole width and a height of its own.
type tallLayout struct{ height float32 }

func (l tallLayout) MinSize([]fyne.CanvasObject) fyne.Size { return fyne.NewSize(180, l.height) }

func (l tallLayout) Layout(o []fyne.CanvasObject, size fyne.Size) {
	for _, x := range o {
		x.Resize(size)
	}
}
