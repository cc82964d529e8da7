package resonators

import "stillroom/acoustics"

// testAir is air of 20 °C as textbook examples take it.
var testAir = acoustics.Air{
	SpeedOfSound: 343.2, Density: 1.2041, Viscosity: 1.813e-5,
	Prandtl: 0.71, HeatRatio: 1.4, Pressure: 101325,
}

var unitSize = [2]float64{0.6, 0.5}

// specimen is one absorber of ordinary dimensions.
type specimen struct {
	name     string
	absorber Absorber
}

// specimens returns each kind, plain and with all its parts.
func specimens() []specimen {
	wool := &Fill{Thickness: 0.05, FlowResistivity: 10000}
	full := &Fill{Thickness: 0.1, FlowResistivity: 8000, AtFace: true}
	foam := &JCA{Porosity: 0.97, Tortuosity: 1.2, ViscousLength: 100e-6, ThermalLength: 200e-6}
	return []specimen{
		{"neck", Neck{Cavity: 0.05, MouthRadius: 0.05, Length: 0.018, Mouths: 1, Front: unitSize}},
		{"neck filled", Neck{Cavity: 0.08, MouthRadius: 0.04, Length: 0.12, Mouths: 3, Gauze: 40,
			Front: unitSize, FillShare: 0.5, FillFlow: 6000}},
		{"panel limp", Panel{Mass: 5, Cavity: 0.1}},
		{"panel", Panel{Mass: 4.8, Thickness: 0.006, Youngs: 5e9, Poisson: 0.3, LossFactor: 0.03,
			Cavity: 0.1, Size: [2]float64{1.2, 0.6}, Fill: wool}},
		{"perforated", Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 0.1}},
		{"perforated filled", Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 0.1, Fill: wool, Gauze: 20}},
		{"perforated boxes", Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 0.1, Fill: full, Partitioned: true}},
		{"slotted", Slotted{Slat: 0.04, Slot: 0.005, Sheet: 0.018, Cavity: 0.1, Fill: wool}},
		{"microperforated", Microperforated{Sheet: 0.0003, Hole: 0.0003, Pitch: 0.0026, Cavity: 0.1}},
		{"porous", Porous{Thickness: 0.05, FlowResistivity: 10000, Gap: 0.05}},
		{"porous foam", Porous{Thickness: 0.05, FlowResistivity: 12000, JCA: foam}},
		{"deep", Perforated{Sheet: 0.006, Hole: 0.005, Pitch: 0.025, Cavity: 1}},
	}
}
