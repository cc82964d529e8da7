package resonators

import (
	"errors"
	"fmt"
	"math"
)

// ValueError says which dimension of an absorber is impossible, and what is
// allowed.
type ValueError struct {
	Kind    string  // kind of absorber
	Field   string  // "Cavity", "Fill.Thickness"
	Value   float64 // SI
	Unit    string  // of Value, "" for a ratio
	Allowed string  // "above 0"
}

// Error returns the field, the rule and the value.
func (e *ValueError) Error() string {
	unit := ""
	if e.Unit != "" {
		unit = " " + e.Unit
	}
	return fmt.Sprintf("%s: %s must be %s, is %g%s", e.Kind, e.Field, e.Allowed, e.Value, unit)
}

// checker gathers the errors of one absorber in the order of its fields.
type checker struct {
	kind string
	errs []error
}

func (c *checker) need(ok bool, field string, value float64, unit, allowed string) {
	if !ok {
		c.errs = append(c.errs, &ValueError{c.kind, field, value, unit, allowed})
	}
}

// positive also refuses NaN and infinity.
func (c *checker) positive(field string, value float64, unit string) {
	c.need(value > 0 && !math.IsInf(value, 0), field, value, unit, "above 0")
}

func (c *checker) notNegative(field string, value float64, unit string) {
	c.need(value >= 0 && !math.IsInf(value, 0), field, value, unit, "0 or more")
}

func (c *checker) result() error { return errors.Join(c.errs...) }

const (
	metres   = "m"
	flowUnit = "Pa·s/m²"
	rayls    = "Pa·s/m"
)

func (c *checker) fill(f *Fill, depth float64) {
	if f == nil {
		return
	}
	c.positive("Fill.Thickness", f.Thickness, metres)
	c.need(!(f.Thickness > depth), "Fill.Thickness", f.Thickness, metres,
		fmt.Sprintf("no more than the cavity's %g m", depth))
	c.positive("Fill.FlowResistivity", f.FlowResistivity, flowUnit)
	c.jca("Fill.JCA.", f.JCA)
}

func (c *checker) jca(prefix string, j *JCA) {
	if j == nil {
		return
	}
	c.need(j.Porosity > 0 && j.Porosity <= 1, prefix+"Porosity", j.Porosity, "", "above 0 and at most 1")
	c.need(j.Tortuosity >= 1 && !math.IsInf(j.Tortuosity, 0), prefix+"Tortuosity", j.Tortuosity, "", "1 or more")
	c.positive(prefix+"ViscousLength", j.ViscousLength, metres)
	c.positive(prefix+"ThermalLength", j.ThermalLength, metres)
}

func (c *checker) hole(hole, pitch float64) {
	c.positive("Hole", hole, metres)
	c.positive("Pitch", pitch, metres)
	c.need(!(hole >= pitch), "Hole", hole, metres, fmt.Sprintf("smaller than the pitch of %g m", pitch))
}

// Validate returns nil, or all *ValueError of the box joined.
func (n Neck) Validate() error {
	c := checker{kind: n.Kind()}
	c.positive("Cavity", n.Cavity, "m³")
	c.positive("MouthRadius", n.MouthRadius, metres)
	c.notNegative("Length", n.Length, metres)
	c.need(n.Mouths >= 1, "Mouths", float64(n.Mouths), "", "1 or more")
	c.notNegative("Gauze", n.Gauze, rayls)
	c.positive("Front[0]", n.Front[0], metres)
	c.positive("Front[1]", n.Front[1], metres)
	area := n.Front[0] * n.Front[1]
	c.need(!(n.mouthArea() >= area), "MouthRadius", n.MouthRadius, metres,
		fmt.Sprintf("so small that the mouths fit the front of %g m²", area))
	c.need(n.FillShare >= 0 && n.FillShare <= 1, "FillShare", n.FillShare, "", "between 0 and 1")
	if n.FillShare > 0 {
		c.positive("FillFlow", n.FillFlow, flowUnit)
	}
	return c.result()
}

// Validate returns nil, or all *ValueError of the panel joined.
func (p Panel) Validate() error {
	c := checker{kind: p.Kind()}
	c.positive("Mass", p.Mass, "kg/m²")
	c.notNegative("Youngs", p.Youngs, "Pa")
	if p.Youngs > 0 {
		c.positive("Thickness", p.Thickness, metres)
		c.positive("Size[0]", p.Size[0], metres)
		c.positive("Size[1]", p.Size[1], metres)
	}
	c.need(p.Poisson >= 0 && p.Poisson <= 0.5, "Poisson", p.Poisson, "", "between 0 and 0.5")
	c.notNegative("LossFactor", p.LossFactor, "")
	c.positive("Cavity", p.Cavity, metres)
	c.notNegative("Edge", p.Edge, rayls)
	c.fill(p.Fill, p.Cavity)
	return c.result()
}

// Validate returns nil, or all *ValueError of the panel joined.
func (p Perforated) Validate() error {
	c := checker{kind: p.Kind()}
	c.positive("Sheet", p.Sheet, metres)
	c.hole(p.Hole, p.Pitch)
	c.positive("Cavity", p.Cavity, metres)
	c.notNegative("Gauze", p.Gauze, rayls)
	c.fill(p.Fill, p.Cavity)
	return c.result()
}

// Validate returns nil, or all *ValueError of the slats joined.
func (s Slotted) Validate() error {
	c := checker{kind: s.Kind()}
	c.positive("Slat", s.Slat, metres)
	c.positive("Slot", s.Slot, metres)
	c.positive("Sheet", s.Sheet, metres)
	c.positive("Cavity", s.Cavity, metres)
	c.fill(s.Fill, s.Cavity)
	return c.result()
}

// Validate returns nil, or all *ValueError of the panel joined.
func (m Microperforated) Validate() error {
	c := checker{kind: m.Kind()}
	c.positive("Sheet", m.Sheet, metres)
	c.hole(m.Hole, m.Pitch)
	c.positive("Cavity", m.Cavity, metres)
	return c.result()
}

// Validate returns nil, or all *ValueError of the layer joined.
func (p Porous) Validate() error {
	c := checker{kind: p.Kind()}
	c.positive("Thickness", p.Thickness, metres)
	c.positive("FlowResistivity", p.FlowResistivity, flowUnit)
	c.notNegative("Gap", p.Gap, metres)
	c.jca("JCA.", p.JCA)
	return c.result()
}
