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
	for _, d := range detailsOf(a).dimensions() {
		// A central difference; from zero, where a part is absent, one-sided.
		h := 1e-3 * max(d.value, d.step)
		lo, hi := d.value-h, d.value+h
		if lo < 0 {
			lo = d.value
		}
		below, okLo := EquivalentOf(detailsOf(d.with(lo)).refilled(a), air, size)
		above, okHi := EquivalentOf(detailsOf(d.with(hi)).refilled(a), air, size)
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

// keptFull keeps a fill that took up the whole of a cavity as thick as the cavity has
// become.
func keptFull(f *Fill, before, now float64) *Fill {
	if f == nil || f.Thickness < before || before == now {
		return f
	}
	c := f.clone()
	c.Thickness = now
	return c
}
