package study

import (
	"fmt"
	"math"
)

// Equivalent writes the mass, spring and loss that an absorber with a resonance is:
// per face area, and acoustic for a box with necks.
func (a AbsorberRow) Equivalent() (mass, spring, loss string) {
	r := a.Report
	if a.Kind == "neck" {
		return figure(r.Mass) + " kg/m⁴", figure(r.Stiffness/1e3) + " kPa/m³", figure(r.Resistance) + " Pa·s/m³"
	}
	return figure(r.Mass) + " kg/m²", figure(r.Stiffness/1e6) + " MN/m³", figure(r.Resistance) + " Pa·s/m"
}

// figure writes three figures that count.
func figure(v float64) string {
	if v == 0 || math.IsInf(v, 0) || math.IsNaN(v) {
		return fmt.Sprint(v)
	}
	places := max(0, 2-int(math.Floor(math.Log10(math.Abs(v)))))
	return fmt.Sprintf("%.*f", places, v)
}

// BestArea returns the greatest equivalent absorption area of all units together,
// α·S with the diffuse coefficient, m², and the third octave that has it.
func (a AbsorberRow) BestArea() (area float64, nominal string) {
	for _, b := range a.Report.ThirdOctaves {
		if v := b.Diffuse * a.AreaM2; v > area {
			area, nominal = v, b.Nominal
		}
	}
	return area, nominal
}
