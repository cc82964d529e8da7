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
