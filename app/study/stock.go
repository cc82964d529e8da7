package study

import (
	"math"
	"slices"

	"stillroom/app/project"
	"stillroom/assets"
	"stillroom/resonators/tuning"
)

// What of the stock is tried: sheets that a resonance can be built of, and slabs of
// an ordinary density.
const (
	lightestSheet, heaviestSheet = 2.0, 12.0 // kg/m²
	thickestSheet                = 0.013     // m
	thickestFront                = 0.0195    // m, that is drilled
	ordinaryFlow                 = 10_000.0  // Pa·s/m²
)

// TunerStock returns what the tuner builds from: of the built-in stock what the
// trade of a system ("metric", "us") holds, and all of the project's own.
func TunerStock(p project.Project, system string) tuning.Stock {
	s := assets.BuildingStock().For(system)
	var t tuning.Stock
	panels(&t, s)
	for _, x := range s.Boards {
		if x.Thickness < 0.023 {
			t.Boards = append(t.Boards, x.Thickness)
		}
	}
	for _, x := range s.Tubes {
		t.Tubes = append(t.Tubes, tuning.Tube{Outside: x.Outside, Wall: x.Wall})
	}
	t.Wools = slabs(s)
	for _, x := range s.Slats {
		t.Slats = append(t.Slats, [2]float64{x.Width, x.Thickness})
	}
	fronts(&t, s)
	common := tuning.CommonStock()
	t.Gaps, t.Micro = common.Gaps, common.Micro
	own(&t, p.Stock)
	return t
}

// panels adds the sheets and membranes that vibrate.
func panels(t *tuning.Stock, s assets.Stock) {
	for _, x := range s.Sheets {
		if m := x.Mass(); m >= lightestSheet && m <= heaviestSheet && x.Thickness <= thickestSheet && x.Group != "glass" && x.Group != "acrylic" {
			t.Panels = append(t.Panels, tuning.Sheet{Name: x.Name, Mass: m, Thickness: x.Thickness, Youngs: x.Youngs, Poisson: x.Poisson, LossFactor: x.LossFactor})
		}
	}
	for _, x := range s.Membranes {
		t.Panels = append(t.Panels, tuning.Sheet{Name: x.Name, Mass: x.Mass, Thickness: x.Thickness})
	}
}

// fronts adds what is drilled, and the drills.
func fronts(t *tuning.Stock, s assets.Stock) {
	for _, x := range s.Sheets {
		if x.Group == "plywood" && x.Thickness >= 0.0055 && x.Thickness <= thickestFront {
			t.Fronts = append(t.Fronts, x.Thickness)
		}
	}
	for _, wanted := range []float64{0.004, 0.006, 0.008, 0.01} {
		best, off := 0.0, math.Inf(1)
		for _, x := range s.Drills {
			if d := math.Abs(x.Diameter - wanted); d < off {
				best, off = x.Diameter, d
			}
		}
		if best > 0 && !slices.Contains(t.Drills, best) {
			t.Drills = append(t.Drills, best)
		}
	}
}

// slabs returns those of the wool whose flow resistivity is nearest to an ordinary
// one.
func slabs(s assets.Stock) []tuning.Wool {
	var list []tuning.Wool
	best := math.Inf(1)
	for _, x := range s.Wools {
		if off := math.Abs(math.Log(x.Flow / ordinaryFlow)); off < best {
			best, list = off, nil
			for _, thickness := range x.Thicknesses {
				list = append(list, tuning.Wool{Thickness: thickness, Flow: x.Flow})
			}
		}
	}
	return list
}

// own adds the project's own stock.
func own(t *tuning.Stock, s project.Stock) {
	for _, x := range s.Sheets {
		t.Panels = append(t.Panels, tuning.Sheet{Name: x.Name, Mass: x.MassKgM2, Thickness: x.ThicknessMM * mm, Youngs: x.YoungsGPa * 1e9, Poisson: x.Poisson, LossFactor: x.LossFactor})
	}
	for _, x := range s.Tubes {
		t.Tubes = append(t.Tubes, tuning.Tube{Outside: x.OutsideMM * mm, Wall: (x.OutsideMM - x.InsideMM) / 2 * mm})
	}
	for _, x := range s.Wools {
		t.Wools = append(t.Wools, tuning.Wool{Thickness: x.ThicknessMM * mm, Flow: x.FlowPaSM2})
	}
}
