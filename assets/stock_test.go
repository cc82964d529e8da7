package assets

import (
	"bytes"
	"math"
	"strconv"
	"strings"
	"testing"
)

// Lengths in the table are rounded to 0.1 mm, metal's and drills' to 0.01 mm.
const (
	tenth     = 0.05e-3 + 1e-9  // m
	hundredth = 0.005e-3 + 1e-9 // m
)

// trade reads a trade size such as "1-1/2 in" in m; what follows is dropped.
func trade(t *testing.T, size string) float64 {
	t.Helper()
	size, _, ok := strings.Cut(size, " in")
	if !ok {
		t.Fatalf("%q is no size in inches", size)
	}
	var inches float64
	for part := range strings.SplitSeq(size, "-") {
		above, below, isFraction := strings.Cut(part, "/")
		if !isFraction {
			below = "1"
		}
		n, err := strconv.ParseFloat(above, 64)
		d, err2 := strconv.ParseFloat(below, 64)
		if err != nil || err2 != nil {
			t.Fatalf("%q is no size", size)
		}
		inches += n / d
	}
	return inches * 0.0254
}

// counts returns how many rows each list has.
func counts(s Stock) [8]int {
	return [8]int{len(s.Sheets), len(s.Membranes), len(s.Wools), len(s.Drills), len(s.Tubes), len(s.Boards), len(s.Gauzes), len(s.Slats)}
}

func entries(s Stock) (all []Entry) {
	all = append(all, listed(s.Sheets, func(x Sheet) Entry { return x.Entry })...)
	all = append(all, listed(s.Membranes, func(x Membrane) Entry { return x.Entry })...)
	all = append(all, listed(s.Wools, func(x Wool) Entry { return x.Entry })...)
	all = append(all, listed(s.Drills, func(x Drill) Entry { return x.Entry })...)
	all = append(all, listed(s.Tubes, func(x Tube) Entry { return x.Entry })...)
	all = append(all, listed(s.Boards, func(x Board) Entry { return x.Entry })...)
	all = append(all, listed(s.Gauzes, func(x Gauze) Entry { return x.Entry })...)
	return append(all, listed(s.Slats, func(x Slat) Entry { return x.Entry })...)
}

func listed[T any](list []T, entry func(T) Entry) (all []Entry) {
	for _, x := range list {
		all = append(all, entry(x))
	}
	return all
}

// Both trades hold every list and every kind of sheet; together they are all.
func TestStockIsComplete(t *testing.T) {
	all, metric, us := BuildingStock(), BuildingStock().For("metric"), BuildingStock().For("us")
	least := [8]int{30, 4, 6, 20, 5, 3, 5, 5}
	for i, n := range counts(all) {
		m, u, both := counts(metric)[i], counts(us)[i], counts(all.For("neither"))[i]
		if min(m, u) < least[i] || m+u-both != n {
			t.Errorf("list %d: %d metric, %d US, %d of both, %d in all", i, m, u, both, n)
		}
	}
	for _, s := range []Stock{metric, us} {
		groups := map[string]bool{}
		for _, x := range s.Sheets {
			groups[x.Group] = true
		}
		for _, g := range []string{"plywood", "MDF", "hardboard", "chipboard", "OSB", "plasterboard", "steel", "aluminium", "glass", "acrylic"} {
			if !groups[g] {
				t.Errorf("%s: no %s", s.Sheets[0].System, g)
			}
		}
	}
}

func TestStockIsSourcedAndSane(t *testing.T) {
	s := BuildingStock()
	checkStock(t, s)
	for _, x := range s.Sheets {
		if x.Youngs < 1e9 || x.Poisson < 0.2 || x.LossFactor <= 0 || x.Thickness > 0.03 || x.Mass() < 1 || x.Mass() > 30 {
			t.Errorf("%+v, %.3g kg/m²", x, x.Mass())
		}
	}
	for _, x := range s.Membranes { // none is lighter than soft plastic or heavier than filled
		if rho := x.Mass / x.Thickness; rho < 800 || rho > 2500 {
			t.Errorf("%s: density %.4g kg/m³", x.ID, rho)
		}
	}
	for _, x := range s.Wools {
		if x.Flow < 3e3 || x.Flow > 1e5 || x.Uncertainty < 0.3 || x.Uncertainty > 0.5 {
			t.Errorf("%+v", x)
		}
	}
}

// checkStock fails where a stock breaks the rules of the table.
func checkStock(t *testing.T, s Stock) {
	t.Helper()
	seen := map[string]bool{"": true}
	for _, e := range entries(s) {
		if e.Name == "" || e.Source == "" || e.ID != "" && seen[e.ID] || e.System != "" && e.System != "metric" && e.System != "us" {
			t.Errorf("%+v is let through", e)
		}
		seen[e.ID] = true
	}
	for _, list := range [][]Entry{
		listed(s.Drills, func(x Drill) Entry { return x.Entry }), listed(s.Tubes, func(x Tube) Entry { return x.Entry }),
		listed(s.Sheets, func(x Sheet) Entry { return x.Entry }), listed(s.Wools, func(x Wool) Entry { return x.Entry }),
	} {
		names := map[string]bool{}
		for _, e := range list {
			if names[e.Name] {
				t.Errorf("the name %q is there twice", e.Name)
			}
			names[e.Name] = true
		}
	}
	ok := func(what string, v, lo, hi float64) {
		if !(v >= lo*(1-1e-12) && v <= hi*(1+1e-12)) {
			t.Errorf("%s = %g is let through", what, v)
		}
	}
	for _, x := range s.Sheets {
		ok("thickness", x.Thickness, 1e-4, 0.1)
		ok("density", x.Density, 100, 8000)
		ok("E", x.Youngs, 0, 250e9)
		ok("Poisson's ratio", x.Poisson, 0, 0.5)
		ok("loss", x.LossFactor, 0, 1)
		ok("size", min(x.Width, x.Height), 0.1, 10)
	}
	for _, x := range s.Membranes {
		ok("mass", x.Mass, 0.1, 50)
		ok("thickness", x.Thickness, 1e-4, 0.1)
		ok("width", x.Width, 0.1, 10)
	}
	for _, x := range s.Wools {
		ok("flow", x.Flow, 100, 1e6)
		ok("uncertainty", x.Uncertainty, 0.01, 1)
		ok("thicknesses", float64(len(x.Thicknesses)), 1, math.Inf(1))
		for _, d := range x.Thicknesses {
			ok("thickness", d, 1e-4, 0.5)
		}
	}
	for _, x := range s.Drills {
		ok("diameter", x.Diameter, 1e-4, 0.2)
	}
	for _, x := range s.Tubes {
		ok("mouth", x.Inside(), 1e-9, x.Outside)
	}
	for _, x := range s.Boards {
		ok("thickness", x.Thickness, 1e-4, 0.1)
	}
	for _, x := range s.Gauzes {
		ok("flow", x.Flow, 0.1, 1e5)
	}
	for _, x := range s.Slats {
		ok("width", x.Width, 1e-3, 1)
		ok("thickness", x.Thickness, 1e-4, 0.1)
	}
}

// Masses of a unit area: the range of plasterboard, and common practice.
func TestSheetMass(t *testing.T) {
	want := map[string][2]float64{
		"plasterboard-12-5": {8.5, 10}, "ply-6": {3.5, 3.7}, "ply-9": {5.3, 5.5}, "mdf-18": {13.4, 13.6},
		"steel-1": {7.7, 7.9}, "glass-4": {9.9, 10.1}, "plasterboard-us-1-2in": {7.8, 9},
	}
	for _, x := range BuildingStock().Sheets {
		if w, ok := want[x.ID]; ok && !(x.Mass() >= w[0] && x.Mass() <= w[1]) {
			t.Errorf("%s: %.4g kg/m², want %g to %g", x.ID, x.Mass(), w[0], w[1])
		}
		delete(want, x.ID)
	}
	if len(want) > 0 {
		t.Errorf("no sheets %v", want)
	}
}

// US plywood is 1/32 in thinner than its name (common practice), other boards,
// bits and light metal are as named; pipe has its own sizes.
func TestTradeSizes(t *testing.T) {
	check := func(name string, got, want, tolerance float64) {
		t.Helper()
		if math.Abs(got-want) > tolerance {
			t.Errorf("%s: %.2f mm, want %.2f", name, got*1e3, want*1e3)
		}
	}
	s, thinner := BuildingStock().For("us"), 0.0254/32
	for _, x := range s.Sheets {
		size := x.Name[strings.IndexAny(x.Name, "0123456789"):]
		switch x.Group {
		case "plywood":
			check(x.Name, x.Thickness, trade(t, size)-thinner, tenth)
		case "MDF", "hardboard", "chipboard", "OSB", "plasterboard":
			check(x.Name, x.Thickness, trade(t, size), tenth)
		case "aluminium":
			check(x.Name, x.Thickness, trade(t, size), hundredth)
		}
	}
	for _, x := range s.Boards {
		check(x.Name, x.Thickness, trade(t, x.Name)-thinner, tenth)
	}
	for _, x := range s.Drills {
		check(x.Name, x.Diameter, trade(t, x.Name), hundredth)
	}
	outside := []float64{1.900, 2.375, 3.500, 4.500, 6.625} // in; ASTM D1785, from memory
	for i, x := range s.Tubes {
		check(x.Name, x.Outside, outside[i]*0.0254, hundredth)
	}
	for i, x := range BuildingStock().For("metric").Drills[:25] {
		check(x.Name, x.Diameter, float64(i+2)*0.5e-3, 1e-12)
	}
}

// Glass wool of 7 µm fibre against Bies & Hansen (1980, from memory), rounded.
func TestGlassWoolFlow(t *testing.T) {
	n := 0
	for _, x := range BuildingStock().Wools {
		if !strings.HasPrefix(x.ID, "glass") {
			continue
		}
		n++
		if want := 3.18e-9 * math.Pow(x.Density, 1.53) / (7e-6 * 7e-6); math.Abs(x.Flow/want-1) > 0.015 {
			t.Errorf("%s: %g Pa·s/m², want %.0f", x.ID, x.Flow, want)
		}
	}
	if n < 6 {
		t.Errorf("%d glass wools", n)
	}
}

// What a caller does to its stock is not seen by the next.
func TestStockIsCopied(t *testing.T) {
	a := BuildingStock()
	a.Sheets[0].Thickness, a.Wools[0].Thicknesses[0] = 1, 1
	b := BuildingStock()
	b.For("us").Wools[0].Thicknesses[0] = 1
	if c := BuildingStock(); b.Sheets[0].Thickness == 1 || b.Wools[0].Thicknesses[0] == 1 || c.For("us").Wools[0].Thicknesses[0] == 1 {
		t.Error("a change comes through")
	}
}

func TestReadStockRefuses(t *testing.T) {
	for _, row := range []struct{ old, new, want string }{
		{`"id": "ply-6"`, `"id": "ply-4"`, `sheets[1] "ply-4": the id is there twice`},
		{`"id": "vinyl-5"`, `"id": "ply-4"`, `membranes[0] "ply-4": the id is there twice`},
		{`"id": "ply-6"`, `"id": ""`, `sheets[1] "plywood 6 mm": the id must be given`},
		{`"name": "1.5 mm"`, `"name": "1 mm"`, `drills[1] "1 mm": the name "1 mm" is there twice`},
		{`"name": "muslin"`, `"name": ""`, `name and source must not be empty`},
		{`"source": "common practice"`, `"source": ""`, `membranes[0] "vinyl-5": name and source must not be empty`},
		{`"group": "steel"`, `"group": ""`, `"steel-0-5": the group must not be empty`},
		{`"system": "us"`, `"system": "UK"`, `"ply-us-1-4in": the system must be "metric" or "us", is "UK"`},
		{`"name": "1 mm", "system": "metric"`, `"name": "1 mm"`, `drills[0] "1 mm": the system must be`},
		{`"thickness_mm": 4,`, `"thickness_mm": 0.05,`, `sheets[0] "ply-4": thickness must be between 0.1 and 100 mm, is 0.05`},
		{`"density_kg_m3": 600`, `"density_kg_m3": 8001`, `density must be between 100 and 8000 kg/m³, is 8001`},
		{`"youngs_gpa": 7`, `"youngs_gpa": 251`, `Young's modulus must be between 0 and 250 GPa`},
		{`"poisson": 0.3`, `"poisson": 0.6`, `Poisson's ratio must be between 0 and 0.5, is 0.6`},
		{`"loss_factor": 0.03`, `"loss_factor": -0.1`, `loss factor must be between 0 and 1, is -0.1`},
		{`"sheet_mm": [2440, 1220]`, `"sheet_mm": [2440]`, `the size must be two lengths, is [2440]`},
		{`"flow_pa_s_m2": 4500`, `"flow_pa_s_m2": 99`, `wools[0] "glass-16": flow resistivity must be between 100 and 1e+06`},
		{`[50, 75, 100]`, `[50, 50, 100]`, `"glass-16": the thicknesses must rise`},
		{`[50, 75, 100]`, `[]`, `"glass-16": there must be a thickness`},
		{`"wall_mm": 3,`, `"wall_mm": 20,`, `tubes[0] "plastic drain pipe 40 mm": a wall of 20 mm leaves no mouth`},
		{`"flow_pa_s_m": 9,`, `"flow_pa_s_m": 0,`, `gauzes[0] "wire mesh 40 wires/cm": flow resistance`},
		{`"flow_pa_s_m": 9,`, `"flow": 9,`, `unknown field "flow"`},
		{`"flow_pa_s_m": 9,`, `"flow_pa_s_m": 1e999,`, `stock: json: cannot unmarshal`},
		{"\n}\n", "\n}{}", `something follows the table`},
		{"\n}\n", "\n", `unexpected EOF`},
	} {
		data := bytes.Replace(stockJSON, []byte(row.old), []byte(row.new), 1)
		s, err := readStock(data)
		if err == nil || !strings.Contains(err.Error(), row.want) || counts(s) != [8]int{} {
			t.Errorf("%s for %s: %v, want %s", row.new, row.old, err, row.want)
		}
	}
}

// Whatever is read as a table, nothing panics, and what is read without error
// keeps the table's rules.
func FuzzStock(f *testing.F) {
	f.Add(stockJSON)
	f.Add([]byte(`{"gauzes":[{"name":"g","source":"s","flow_pa_s_m":1}],"slats":null}`))
	f.Add([]byte(`{"sheets":[{"id":"a","name":"A","group":"g","system":"us","source":"s","thickness_mm":1e-1,"density_kg_m3":100,"sheet_mm":[100,1e4]}]}`))
	f.Add([]byte(`{"wools":[null],"tubes":[{"outside_mm":1e999}]}`))
	f.Fuzz(func(t *testing.T, data []byte) {
		if s, err := readStock(data); err == nil {
			checkStock(t, s)
		}
	})
}
