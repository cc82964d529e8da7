package resonators

import "testing"

// costly returns absorbers whose tables take the most points: open cavities of
// several waves, with sharp modes or with two lossy layers.
func costly() []specimen {
	foam := &JCA{Porosity: 0.97, Tortuosity: 1.2, ViscousLength: 100e-6, ThermalLength: 200e-6}
	wool := &Fill{Thickness: 0.1, FlowResistivity: 10000, AtFace: true}
	return []specimen{
		{"panel deep", Panel{Mass: 10, Thickness: 0.018, Youngs: 5e9, Poisson: 0.3, LossFactor: 0.02, Cavity: 1, Size: unitSize}},
		{"perforated deep filled", Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 0.5, Fill: wool}},
		{"slotted deep", Slotted{Slat: 0.09, Slot: 0.003, Sheet: 0.018, Cavity: 0.4}},
		{"microperforated deep", Microperforated{Sheet: 0.001, Hole: 0.0005, Pitch: 0.005, Cavity: 0.5}},
		{"porous foam deep", Porous{Thickness: 0.1, FlowResistivity: 12000, Gap: 0.4, JCA: foam}},
	}
}

// BenchmarkThirdOctaves is the table of both coefficients from 20 Hz to 5 kHz
// with its rating: what a changed dimension costs while it is dragged. Meant to
// stay below 5 ms for absorbers of ordinary dimensions.
func BenchmarkThirdOctaves(b *testing.B) {
	for _, c := range append(specimens(), costly()...) {
		a := fitted(c.absorber, unitSize)
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				rate(thirdOctaves(a, testAir, FullField))
			}
		})
	}
}
