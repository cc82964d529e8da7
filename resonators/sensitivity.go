package resonators

import (
	"math"

	"stillroom/acoustics"
)

// Sensitivity is how far the resonance moves with one dimension.
type Sensitivity struct {
	// Dimension is the field's name ("Cavity", "Fill.Thickness", "Size[0]"; a neck box's "Volume").
	Dimension string
	Value     float64 // SI
	Step      float64 // SI: what one step is
	F0PerStep float64 // Hz, the derivative times Step
	QPerStep  float64 // the derivative times Step
}

// F0Derivative returns ∂f0 for the dimension, Hz per SI unit.
func (s Sensitivity) F0Derivative() float64 { return s.F0PerStep / s.Step }

// Tolerance returns how far the dimension may be off while f0 moves by no
// more than hz, in SI; +Inf where f0 does not depend on it.
func (s Sensitivity) Tolerance(hz float64) float64 {
	return math.Abs(hz / s.F0Derivative())
}

// dimension is one number of an absorber that a builder or a maker decides.
type dimension struct {
	name  string
	step  float64 // SI
	value float64 // SI
	with  func(float64) Absorber
}

// Steps in which people speak of the dimensions, SI.
const (
	millimetre = 1e-3
	tenthMM    = 1e-4
	litre      = 1e-3
	massStep   = 0.1  // kg/m²
	youngsStep = 1e8  // Pa
	flowStep   = 1000 // Pa·s/m²
	edgeStep   = 10   // Pa·s/m
	ratioStep  = 0.01
)

// dimensions lists what an absorber's resonance may depend on.
func dimensions(a Absorber) []dimension {
	switch v := a.(type) {
	case Neck:
		return neckDimensions(v)
	case Panel:
		return panelDimensions(v)
	case Perforated:
		d := []dimension{
			{"Sheet", millimetre, v.Sheet, func(x float64) Absorber { v := v; v.Sheet = x; return v }},
			{"Hole", tenthMM, v.Hole, func(x float64) Absorber { v := v; v.Hole = x; return v }},
			{"Pitch", millimetre, v.Pitch, func(x float64) Absorber { v := v; v.Pitch = x; return v }},
			{"Cavity", millimetre, v.Cavity, func(x float64) Absorber { v := v; v.Cavity = x; return v }},
			{"Gauze", edgeStep, v.Gauze, func(x float64) Absorber { v := v; v.Gauze = x; return v }},
		}
		return append(d, fillDimensions(v.Fill, v.Cavity, func(f *Fill) Absorber { v := v; v.Fill = f; return v })...)
	case Slotted:
		d := []dimension{
			{"Slat", millimetre, v.Slat, func(x float64) Absorber { v := v; v.Slat = x; return v }},
			{"Slot", tenthMM, v.Slot, func(x float64) Absorber { v := v; v.Slot = x; return v }},
			{"Sheet", millimetre, v.Sheet, func(x float64) Absorber { v := v; v.Sheet = x; return v }},
			{"Cavity", millimetre, v.Cavity, func(x float64) Absorber { v := v; v.Cavity = x; return v }},
		}
		return append(d, fillDimensions(v.Fill, v.Cavity, func(f *Fill) Absorber { v := v; v.Fill = f; return v })...)
	case Microperforated:
		return []dimension{
			{"Sheet", tenthMM, v.Sheet, func(x float64) Absorber { v := v; v.Sheet = x; return v }},
			{"Hole", tenthMM, v.Hole, func(x float64) Absorber { v := v; v.Hole = x; return v }},
			{"Pitch", tenthMM, v.Pitch, func(x float64) Absorber { v := v; v.Pitch = x; return v }},
			{"Cavity", millimetre, v.Cavity, func(x float64) Absorber { v := v; v.Cavity = x; return v }},
		}
	}
	return nil
}

func neckDimensions(n Neck) []dimension {
	d := []dimension{
		{"Volume", litre, n.Cavity, func(x float64) Absorber { n := n; n.Cavity = x; return n }},
		{"MouthRadius", millimetre, n.MouthRadius, func(x float64) Absorber { n := n; n.MouthRadius = x; return n }},
		{"Length", millimetre, n.Length, func(x float64) Absorber { n := n; n.Length = x; return n }},
		{"Gauze", edgeStep, n.Gauze, func(x float64) Absorber { n := n; n.Gauze = x; return n }},
	}
	if n.FillShare > 0 {
		d = append(d,
			dimension{"FillShare", ratioStep, n.FillShare, func(x float64) Absorber { n := n; n.FillShare = x; return n }},
			dimension{"FillFlow", flowStep, n.FillFlow, func(x float64) Absorber { n := n; n.FillFlow = x; return n }})
	}
	return d
}

func panelDimensions(p Panel) []dimension {
	d := []dimension{
		{"Mass", massStep, p.Mass, func(x float64) Absorber { p := p; p.Mass = x; return p }},
		{"Cavity", millimetre, p.Cavity, func(x float64) Absorber { p := p; p.Cavity = x; return p }},
		{"Edge", edgeStep, p.Edge, func(x float64) Absorber { p := p; p.Edge = x; return p }},
	}
	if p.Youngs > 0 {
		d = append(d,
			dimension{"Thickness", tenthMM, p.Thickness, func(x float64) Absorber { p := p; p.Thickness = x; return p }},
			dimension{"Youngs", youngsStep, p.Youngs, func(x float64) Absorber { p := p; p.Youngs = x; return p }},
			dimension{"LossFactor", ratioStep, p.LossFactor, func(x float64) Absorber { p := p; p.LossFactor = x; return p }},
			dimension{"Size[0]", millimetre, p.Size[0], func(x float64) Absorber { p := p; p.Size[0] = x; return p }},
			dimension{"Size[1]", millimetre, p.Size[1], func(x float64) Absorber { p := p; p.Size[1] = x; return p }})
	}
	return append(d, fillDimensions(p.Fill, p.Cavity, func(f *Fill) Absorber { p := p; p.Fill = f; return p })...)
}

// fillDimensions lists those of a fill in a cavity of the given depth (m). A
// fill that takes up the whole depth has no thickness of its own.
func fillDimensions(f *Fill, depth float64, with func(*Fill) Absorber) []dimension {
	if f == nil {
		return nil
	}
	changed := func(change func(*Fill, float64)) func(float64) Absorber {
		return func(x float64) Absorber {
			c := f.clone()
			change(c, x)
			return with(c)
		}
	}
	d := []dimension{{"Fill.FlowResistivity", flowStep, f.FlowResistivity,
		changed(func(c *Fill, x float64) { c.FlowResistivity = x })}}
	if f.Thickness < depth {
		d = append(d, dimension{"Fill.Thickness", millimetre, f.Thickness,
			changed(func(c *Fill, x float64) { c.Thickness = x })})
	}
	return d
}

// Sensitivities returns the derivatives of f0 and Q with each dimension of the
// absorber, the others held; none where it is broadband. size is that of one
// unit, m. Where a fill takes up the whole cavity both grow together.
func Sensitivities(a Absorber, air acoustics.Air, size [2]float64) []Sensitivity {
	a = fitted(a, size)
	if _, ok := resonance(a, air); !ok {
		return nil
	}
	var out []Sensitivity
	for _, d := range dimensions(a) {
		// A central difference; from zero, where a part is absent, one-sided.
		h := 1e-3 * max(d.value, d.step)
		lo, hi := d.value-h, d.value+h
		if lo < 0 {
			lo = d.value
		}
		below, okLo := EquivalentOf(followFill(d.with(lo), a), air, size)
		above, okHi := EquivalentOf(followFill(d.with(hi), a), air, size)
		if !okLo || !okHi {
			continue
		}
		out = append(out, Sensitivity{
			Dimension: d.name,
			Value:     d.value,
			Step:      d.step,
			F0PerStep: (above.Oscillator.Natural - below.Oscillator.Natural) / (hi - lo) * d.step,
			QPerStep:  (above.Oscillator.Q() - below.Oscillator.Q()) / (hi - lo) * d.step,
		})
	}
	return out
}

// followFill keeps a cavity that was full full when its depth has changed.
func followFill(changed, was Absorber) Absorber {
	full := func(f *Fill, before, now float64) *Fill {
		if f == nil || f.Thickness < before || before == now {
			return f
		}
		c := f.clone()
		c.Thickness = now
		return c
	}
	switch v := changed.(type) {
	case Panel:
		v.Fill = full(v.Fill, was.(Panel).Cavity, v.Cavity)
		return v
	case Perforated:
		v.Fill = full(v.Fill, was.(Perforated).Cavity, v.Cavity)
		return v
	case Slotted:
		v.Fill = full(v.Fill, was.(Slotted).Cavity, v.Cavity)
		return v
	}
	return changed
}
