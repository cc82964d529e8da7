package tuning

import "stillroom/resonators"

// Sheet is a sheet material as sold.
type Sheet struct {
	Name                                         string
	Mass, Thickness, Youngs, Poisson, LossFactor float64 // kg/m², m, Pa (0: limp), –, –
}

// Tube is a pipe that makes a neck.
type Tube struct {
	Outside, Wall float64 // m
}

// Inside returns the mouth's diameter, m.
func (t Tube) Inside() float64 { return t.Outside - 2*t.Wall }

// Wool is a porous slab; one of no thickness stands for none.
type Wool struct {
	Thickness, Flow float64 // m, Pa·s/m²
}

func (w Wool) fill() *resonators.Fill {
	if w.Thickness == 0 {
		return nil
	}
	return &resonators.Fill{Thickness: w.Thickness, FlowResistivity: w.Flow}
}

// Stock is what may be bought.
type Stock struct {
	Panels []Sheet   // for membranes
	Boards []float64 // thicknesses for boxes, m
	Tubes  []Tube
	Wools  []Wool
	Fronts []float64    // thicknesses of sheets to be drilled, m
	Drills []float64    // diameters, m
	Slats  [][2]float64 // widths and thicknesses, m
	Gaps   []float64    // between slats, m
	Micro  [][2]float64 // sheet and hole of micro-perforated sheets, m
}

// fills returns the slabs, and none before them.
func (s Stock) fills() []Wool { return append([]Wool{{}}, s.Wools...) }

// CommonStock returns what most builders' merchants hold, in short.
//
// Thicknesses: common practice. Densities and moduli: middle of the typical
// ranges (Beranek & Vér, Noise and Vibration Control Engineering; Hopkins,
// Sound Insulation, 2007; from memory). Pipe: plastic drain pipe, common practice.
// Slabs: mineral wool of about 40 kg/m³, whose flow resistivity varies by a
// third to a half between makers. Gaps of slats: 3 to 10 mm, common practice.
func CommonStock() Stock {
	return Stock{
		Panels: []Sheet{
			{"hardboard 3.2 mm", 3.2, 0.0032, 4e9, 0.3, 0.02},
			{"hardboard 4.8 mm", 4.8, 0.0048, 4e9, 0.3, 0.02},
			{"plywood 4 mm", 2.4, 0.004, 7e9, 0.3, 0.03},
			{"plywood 6 mm", 3.6, 0.006, 7e9, 0.3, 0.03},
			{"plywood 9 mm", 5.4, 0.009, 7e9, 0.3, 0.03},
			{"plywood 12 mm", 7.2, 0.012, 7e9, 0.3, 0.03},
			{"MDF 6 mm", 4.5, 0.006, 3e9, 0.3, 0.02},
			{"MDF 9 mm", 6.75, 0.009, 3e9, 0.3, 0.02},
			{"plasterboard 9.5 mm", 6.8, 0.0095, 2.6e9, 0.3, 0.03},
			{"plasterboard 12.5 mm", 9.0, 0.0125, 2.6e9, 0.3, 0.03},
			{"steel 1 mm", 7.8, 0.001, 210e9, 0.28, 0.005},
			{"loaded vinyl 5 kg/m²", 5, 0.0025, 0, 0, 0},
			{"loaded vinyl 10 kg/m²", 10, 0.005, 0, 0, 0},
		},
		Boards: []float64{0.012, 0.018, 0.022},
		Tubes: []Tube{
			{0.040, 0.003}, {0.050, 0.003}, {0.075, 0.003}, {0.090, 0.003},
			{0.110, 0.0032}, {0.125, 0.0032}, {0.160, 0.0032},
		},
		Wools:  []Wool{{0.025, 10000}, {0.05, 10000}, {0.075, 10000}, {0.1, 10000}},
		Fronts: []float64{0.006, 0.009, 0.012},
		Drills: []float64{0.004, 0.006, 0.008, 0.01},
		Slats:  [][2]float64{{0.04, 0.02}, {0.07, 0.02}, {0.095, 0.02}},
		Gaps:   []float64{0.003, 0.005, 0.01},
		Micro:  [][2]float64{{0.0005, 0.0005}, {0.001, 0.0005}, {0.001, 0.0008}},
	}
}
