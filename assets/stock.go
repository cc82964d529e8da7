package assets

import (
	"bytes"
	"cmp"
	_ "embed"
	"encoding/json"
	"fmt"
	"io"
	"slices"
	"sync"
)

// Entry is what every row of the stock has. Names are unique in their list.
type Entry struct {
	ID     string // of sheets, membranes and wools, unique in all; others have none
	Name   string
	System string // trade that holds it, "metric" or "us"; empty: both do
	Source string // of the figures, or "common practice"
}

func (e Entry) in(system string) bool { return system == "" || e.System == "" || e.System == system }

// Sheet is a sheet material as sold; Thickness is the true one.
type Sheet struct {
	Entry
	Group         string  // "plywood", "steel", …
	Thickness     float64 // m
	Density       float64 // kg/m³
	Youngs        float64 // Young's modulus, Pa
	Poisson       float64 // –
	LossFactor    float64 // –
	Width, Height float64 // of a whole sheet, m
}

// Mass returns the mass of a unit area, kg/m².
func (s Sheet) Mass() float64 { return s.Density * s.Thickness }

// Membrane is a sheet without stiffness.
type Membrane struct {
	Entry
	Mass      float64 // kg/m²
	Thickness float64 // m
	Width     float64 // of the roll, m
}

// Wool is a porous slab. Its flow resistivity is a guide only.
type Wool struct {
	Entry
	Density       float64   // kg/m³
	Flow          float64   // flow resistivity, Pa·s/m²
	Uncertainty   float64   // of Flow between makers, as a part of it (0.5: ±50 %)
	Thicknesses   []float64 // m, rising
	Width, Height float64   // of a slab, m
}

// Drill makes a round hole: a bit, or a hole saw.
type Drill struct {
	Entry
	Diameter float64 // m
}

// Tube is a pipe that makes a neck.
type Tube struct {
	Entry
	Outside, Wall float64 // m
}

// Inside returns the mouth's diameter, m.
func (t Tube) Inside() float64 { return t.Outside - 2*t.Wall }

// Board is what boxes are built of; Thickness is the true one.
type Board struct {
	Entry
	Thickness float64 // m
}

// Gauze is a thin cloth, mesh or felt that damps a neck.
type Gauze struct {
	Entry
	Flow float64 // specific flow resistance, Pa·s/m
}

// Slat is a strip for slotted panels.
type Slat struct {
	Entry
	Width, Thickness float64 // m
}

// Stock is what builders' merchants hold.
type Stock struct {
	Sheets    []Sheet
	Membranes []Membrane
	Wools     []Wool
	Drills    []Drill
	Tubes     []Tube
	Boards    []Board
	Gauzes    []Gauze
	Slats     []Slat
}

//go:embed stock.json
var stockJSON []byte

// stock reads the table once; a fault in it is ours, and a test reads it too.
var stock = sync.OnceValue(func() Stock {
	s, err := readStock(stockJSON)
	if err != nil {
		panic("assets: " + err.Error())
	}
	return s
})

// BuildingStock returns the built-in stock in the order of its table. The
// caller may change what it gets.
func BuildingStock() Stock { return stock().For("") }

// For returns a copy of what the trade of that system, "metric" or "us",
// holds; of all for "". Any other name leaves only what both hold.
func (s Stock) For(system string) Stock {
	kept := Stock{
		inSystem(s.Sheets, system), inSystem(s.Membranes, system), inSystem(s.Wools, system), inSystem(s.Drills, system),
		inSystem(s.Tubes, system), inSystem(s.Boards, system), inSystem(s.Gauzes, system), inSystem(s.Slats, system),
	}
	for i, w := range kept.Wools {
		kept.Wools[i].Thicknesses = slices.Clone(w.Thicknesses)
	}
	return kept
}

func inSystem[T interface{ in(string) bool }](list []T, system string) []T {
	return slices.DeleteFunc(slices.Clone(list), func(x T) bool { return !x.in(system) })
}

// stockFile is the table as written: units of the trade, in the names.
type stockFile struct {
	Sheets []struct {
		Entry
		Group     string
		Thickness float64   `json:"thickness_mm"`
		Density   float64   `json:"density_kg_m3"`
		Youngs    float64   `json:"youngs_gpa"`
		Poisson   float64   `json:"poisson"`
		Loss      float64   `json:"loss_factor"`
		Size      []float64 `json:"sheet_mm"`
	}
	Membranes []struct {
		Entry
		Mass      float64 `json:"mass_kg_m2"`
		Thickness float64 `json:"thickness_mm"`
		Width     float64 `json:"width_mm"`
	}
	Wools []struct {
		Entry
		Density     float64   `json:"density_kg_m3"`
		Flow        float64   `json:"flow_pa_s_m2"`
		Uncertainty float64   `json:"uncertainty_pct"`
		Thicknesses []float64 `json:"thicknesses_mm"`
		Size        []float64 `json:"slab_mm"`
	}
	Drills []struct {
		Entry
		Diameter float64 `json:"diameter_mm"`
	}
	Tubes []struct {
		Entry
		Outside float64 `json:"outside_mm"`
		Wall    float64 `json:"wall_mm"`
	}
	Boards []struct {
		Entry
		Thickness float64 `json:"thickness_mm"`
	}
	Gauzes []struct {
		Entry
		Flow float64 `json:"flow_pa_s_m"`
	}
	Slats []struct {
		Entry
		Width     float64 `json:"width_mm"`
		Thickness float64 `json:"thickness_mm"`
	}
}

// readStock reads and checks a table of stock.
func readStock(data []byte) (Stock, error) {
	var f stockFile
	dec := json.NewDecoder(bytes.NewReader(data))
	dec.DisallowUnknownFields()
	if err := dec.Decode(&f); err != nil {
		return Stock{}, fmt.Errorf("stock: %w", err)
	}
	if _, err := dec.Token(); err != io.EOF {
		return Stock{}, fmt.Errorf("stock: something follows the table")
	}
	var s Stock
	c := stockCheck{seen: map[string]bool{}}
	for i, r := range f.Sheets {
		c.row("sheets", i, r.Entry, true, false)
		c.must(r.Group != "", "the group must not be empty")
		x := Sheet{Entry: r.Entry, Group: r.Group,
			Thickness:  c.mm("thickness", r.Thickness, 0.1, 100),
			Density:    c.within("density", r.Density, 100, 8000, " kg/m³"),
			Youngs:     c.within("Young's modulus", r.Youngs, 0, 250, " GPa") * 1e9,
			Poisson:    c.within("Poisson's ratio", r.Poisson, 0, 0.5, ""),
			LossFactor: c.within("loss factor", r.Loss, 0, 1, "")}
		x.Width, x.Height = c.size(r.Size)
		s.Sheets = append(s.Sheets, x)
	}
	for i, r := range f.Membranes {
		c.row("membranes", i, r.Entry, true, true)
		s.Membranes = append(s.Membranes, Membrane{r.Entry, c.within("mass", r.Mass, 0.1, 50, " kg/m²"),
			c.mm("thickness", r.Thickness, 0.1, 100), c.mm("width", r.Width, 100, 10000)})
	}
	for i, r := range f.Wools {
		c.row("wools", i, r.Entry, true, false)
		c.must(len(r.Thicknesses) > 0, "there must be a thickness")
		x := Wool{Entry: r.Entry,
			Density:     c.within("density", r.Density, 5, 500, " kg/m³"),
			Flow:        c.within("flow resistivity", r.Flow, 100, 1e6, " Pa·s/m²"),
			Uncertainty: c.within("uncertainty", r.Uncertainty, 1, 100, " %") / 100}
		for j, t := range r.Thicknesses {
			c.must(j == 0 || t > r.Thicknesses[j-1], "the thicknesses must rise")
			x.Thicknesses = append(x.Thicknesses, c.mm("thickness", t, 0.1, 500))
		}
		x.Width, x.Height = c.size(r.Size)
		s.Wools = append(s.Wools, x)
	}
	for i, r := range f.Drills {
		c.row("drills", i, r.Entry, false, false)
		s.Drills = append(s.Drills, Drill{r.Entry, c.mm("diameter", r.Diameter, 0.1, 200)})
	}
	for i, r := range f.Tubes {
		c.row("tubes", i, r.Entry, false, false)
		x := Tube{r.Entry, c.mm("outside diameter", r.Outside, 5, 1000), c.mm("wall", r.Wall, 0.1, 50)}
		c.must(x.Inside() > 0, "a wall of %g mm leaves no mouth", r.Wall)
		s.Tubes = append(s.Tubes, x)
	}
	for i, r := range f.Boards {
		c.row("boards", i, r.Entry, false, false)
		s.Boards = append(s.Boards, Board{r.Entry, c.mm("thickness", r.Thickness, 0.1, 100)})
	}
	for i, r := range f.Gauzes {
		c.row("gauzes", i, r.Entry, false, true)
		s.Gauzes = append(s.Gauzes, Gauze{r.Entry, c.within("flow resistance", r.Flow, 0.1, 1e5, " Pa·s/m")})
	}
	for i, r := range f.Slats {
		c.row("slats", i, r.Entry, false, false)
		s.Slats = append(s.Slats, Slat{r.Entry, c.mm("width", r.Width, 1, 1000), c.mm("thickness", r.Thickness, 0.1, 100)})
	}
	if c.err != nil {
		return Stock{}, c.err
	}
	return s, nil
}

// stockCheck keeps the first fault found, with the row it is in.
type stockCheck struct {
	at   string
	seen map[string]bool
	err  error
}

func (c *stockCheck) must(ok bool, format string, args ...any) {
	if !ok && c.err == nil {
		c.err = fmt.Errorf("stock: %s: %s", c.at, fmt.Sprintf(format, args...))
	}
}

// row begins a row: whether its list has ids, and rows that belong to both.
func (c *stockCheck) row(list string, i int, e Entry, id, both bool) {
	name, key := list+" "+e.Name, "id "+e.ID
	c.at = fmt.Sprintf("%s[%d] %q", list, i, cmp.Or(e.ID, e.Name))
	c.must((e.ID != "") == id, "the id must be given for sheets, membranes and wools, and for nothing else")
	c.must(e.Name != "" && e.Source != "", "name and source must not be empty")
	c.must(e.System == "metric" || e.System == "us" || both && e.System == "", `the system must be "metric" or "us", is %q`, e.System)
	c.must(!c.seen[name], "the name %q is there twice", e.Name)
	c.must(!id || !c.seen[key], "the id is there twice")
	c.seen[name], c.seen[key] = true, true
}

// within returns v, checked.
func (c *stockCheck) within(what string, v, lo, hi float64, unit string) float64 {
	c.must(v >= lo && v <= hi, "%s must be between %g and %g%s, is %g", what, lo, hi, unit, v)
	return v
}

// mm returns a length of v mm in m, checked.
func (c *stockCheck) mm(what string, v, lo, hi float64) float64 {
	return c.within(what, v, lo, hi, " mm") / 1000
}

// size returns width and height of a whole piece in m, checked.
func (c *stockCheck) size(mm []float64) (w, h float64) {
	if c.must(len(mm) == 2, "the size must be two lengths, is %g", mm); len(mm) != 2 {
		return 0, 0
	}
	return c.mm("width", mm[0], 100, 10000), c.mm("height", mm[1], 100, 10000)
}
