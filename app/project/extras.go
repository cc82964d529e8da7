package project

import (
	"slices"

	"stillroom/acoustics"
)

// KeepOut is a rectangle of a surface that no proposal may stand on: a door, a
// window, a socket.
type KeepOut struct {
	Note         string
	Surface      acoustics.Surface
	Centre, Size [2]float64 // m
}

func (k *KeepOut) fields() []field {
	return []field{
		{key: "note", to: &k.Note},
		{key: "surface", to: &k.Surface, required: true},
		{key: "centre_m", to: &k.Centre, required: true},
		{key: "size_m", to: &k.Size, required: true},
	}
}

// Stock is what the user can have beside the built-in stock.
type Stock struct {
	Sheets []StockSheet
	Tubes  []StockTube
	Wools  []StockWool
}

func (s Stock) empty() bool { return len(s.Sheets)+len(s.Tubes)+len(s.Wools) == 0 }

// StockSheet is a sheet of the user's own; limp where YoungsGPa is 0.
type StockSheet struct {
	Name, Source                                          string
	MassKgM2, ThicknessMM, YoungsGPa, Poisson, LossFactor float64
}

func (s *StockSheet) fields() []field {
	return []field{
		{key: "name", to: &s.Name, required: true},
		{key: "source", to: &s.Source},
		{key: "mass_kg_m2", to: &s.MassKgM2, required: true},
		{key: "thickness_mm", to: &s.ThicknessMM, required: true},
		{key: "youngs_gpa", to: &s.YoungsGPa},
		{key: "poisson", to: &s.Poisson},
		{key: "loss_factor", to: &s.LossFactor},
	}
}

// StockTube is a pipe of the user's own.
type StockTube struct {
	Name, Source        string
	OutsideMM, InsideMM float64
}

func (t *StockTube) fields() []field {
	return []field{
		{key: "name", to: &t.Name, required: true},
		{key: "source", to: &t.Source},
		{key: "outside_mm", to: &t.OutsideMM, required: true},
		{key: "inside_mm", to: &t.InsideMM, required: true},
	}
}

// StockWool is a porous slab of the user's own.
type StockWool struct {
	Name, Source           string
	ThicknessMM, FlowPaSM2 float64
}

func (w *StockWool) fields() []field {
	return []field{
		{key: "name", to: &w.Name, required: true},
		{key: "source", to: &w.Source},
		{key: "thickness_mm", to: &w.ThicknessMM, required: true},
		{key: "flow_pa_s_m2", to: &w.FlowPaSM2, required: true},
	}
}

// extras reads what a file may have beside what every file has.
func (r *reader) extras(root *node, p *Project) {
	r.list("keep_out", root.get("keep_out"), func(path string, n *node) {
		var k KeepOut
		r.object(path, n, k.fields())
		p.KeepOut = append(p.KeepOut, k)
	})
	n := root.get("stock")
	if n == nil || !r.object("stock", n, nil, "sheets", "tubes", "wools") {
		return
	}
	r.list("stock.sheets", n.get("sheets"), func(path string, n *node) {
		s := StockSheet{Poisson: 0.3}
		r.object(path, n, s.fields())
		p.Stock.Sheets = append(p.Stock.Sheets, s)
	})
	r.list("stock.tubes", n.get("tubes"), func(path string, n *node) {
		var t StockTube
		r.object(path, n, t.fields())
		p.Stock.Tubes = append(p.Stock.Tubes, t)
	})
	r.list("stock.wools", n.get("wools"), func(path string, n *node) {
		var w StockWool
		r.object(path, n, w.fields())
		p.Stock.Wools = append(p.Stock.Wools, w)
	})
}

// writeExtras adds to a file what it has of them.
func (p Project) writeExtras(root *node) {
	if len(p.KeepOut) > 0 {
		root.add("keep_out", writeList(p.KeepOut, func(k KeepOut) *node { return write(k.fields()) }))
	}
	if p.Stock.empty() {
		return
	}
	n := &node{kind: objectNode}
	n.add("sheets", writeList(p.Stock.Sheets, func(s StockSheet) *node { return write(s.fields()) }))
	n.add("tubes", writeList(p.Stock.Tubes, func(t StockTube) *node { return write(t.fields()) }))
	n.add("wools", writeList(p.Stock.Wools, func(w StockWool) *node { return write(w.fields()) }))
	root.add("stock", n)
}

// extras checks them.
func (c *checker) extras(p Project) {
	for i, k := range p.KeepOut {
		path := item("keep_out", i)
		c.line(join(path, "note"), k.Note)
		c.fields(path, k.fields())
		// It lies on its surface as an absorber of one unit does.
		c.onSurface(path, Absorber{Surface: k.Surface, Centre: k.Centre, Size: k.Size, Units: 1}, p.Room)
	}
	for i, s := range p.Stock.Sheets {
		path := item("stock.sheets", i)
		c.named(path, s.Name, s.Source)
		c.fields(path, s.fields())
	}
	for i, t := range p.Stock.Tubes {
		path := item("stock.tubes", i)
		c.named(path, t.Name, t.Source)
		c.fields(path, t.fields())
		if inside := join(path, "inside_mm"); t.InsideMM >= t.OutsideMM && c.fine(inside, join(path, "outside_mm")) {
			c.add(inside, "must be smaller than outside_mm, "+numberText(t.OutsideMM), numberText(t.InsideMM))
		}
	}
	for i, w := range p.Stock.Wools {
		path := item("stock.wools", i)
		c.named(path, w.Name, w.Source)
		c.fields(path, w.fields())
	}
}

// named checks a row's name and source.
func (c *checker) named(path, name, source string) {
	if name == "" {
		c.add(join(path, "name"), "must not be empty", quoted(name))
	}
	c.line(join(path, "name"), name)
	c.line(join(path, "source"), source)
}

// AddKeepOut returns the project with one more area to be kept free.
func (p Project) AddKeepOut(k KeepOut) Project {
	p.KeepOut = append(slices.Clone(p.KeepOut), k)
	return p
}

// WithoutKeepOut returns the project without area i.
func (p Project) WithoutKeepOut(i int) Project {
	p.KeepOut = slices.Delete(slices.Clone(p.KeepOut), i, i+1)
	return p
}

// AddFinish returns the project with one more finish of its own.
func (p Project) AddFinish(f Finish) Project {
	p.Finishes = append(slices.Clone(p.Finishes), f)
	return p
}

// WithStock returns the project with its own stock replaced.
func (p Project) WithStock(s Stock) Project {
	p.Stock = Stock{slices.Clone(s.Sheets), slices.Clone(s.Tubes), slices.Clone(s.Wools)}
	return p
}
