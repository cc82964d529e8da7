package window

import (
	"fmt"
	"strings"

	"fyne.io/fyne/v2"
	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/app/project"
	"stillroom/app/units"
	"stillroom/assets"
)

// part is something of the stock and what it makes of an absorber.
type part struct {
	row
	use func(*project.Absorber)
}

// stockOf returns the built-in stock of a system's trade.
func (s State) stockOf() assets.Stock {
	if s.US {
		return assets.BuildingStock().For("us")
	}
	return assets.BuildingStock().For("metric")
}

const ownStock = "the project's own"

// sheetParts lists what makes the sheet of a panel.
func (s State) sheetParts() []part {
	var list []part
	add := func(name, group, source string, mass, thickness, youngs, poisson, loss float64) {
		list = append(list, part{row{fmt.Sprint(len(list)), name, group, source}, func(a *project.Absorber) {
			p := a.Panel
			p.MassKgM2, p.ThicknessMM, p.YoungsGPa, p.Poisson, p.LossFactor = mass, thickness, youngs, poisson, loss
		}})
	}
	for _, x := range s.Project.Stock.Sheets {
		add(x.Name, ownStock, x.Source, x.MassKgM2, x.ThicknessMM, x.YoungsGPa, x.Poisson, x.LossFactor)
	}
	stock := s.stockOf()
	for _, x := range stock.Sheets {
		add(x.Name, units.Mass(x.Mass(), s.system()), x.Source, tidy(x.Mass()), tidy(1000*x.Thickness), tidy(x.Youngs/1e9), x.Poisson, x.LossFactor)
	}
	for _, x := range stock.Membranes {
		add(x.Name, "limp, "+units.Mass(x.Mass, s.system()), x.Source, tidy(x.Mass), tidy(1000*x.Thickness), 0, 0, 0)
	}
	return list
}

// boardParts lists what makes a perforated or slotted front, by its thickness.
func (s State) boardParts(set func(a *project.Absorber, mm float64)) []part {
	var list []part
	for _, x := range s.Project.Stock.Sheets {
		list = append(list, part{row{fmt.Sprint(len(list)), x.Name, ownStock, x.Source}, func(a *project.Absorber) { set(a, x.ThicknessMM) }})
	}
	for _, x := range s.stockOf().Sheets {
		list = append(list, part{row{fmt.Sprint(len(list)), x.Name, units.Small(x.Thickness, s.system()), x.Source},
			func(a *project.Absorber) { set(a, tidy(1000*x.Thickness)) }})
	}
	return list
}

// drillParts lists holes that can be drilled.
func (s State) drillParts(set func(a *project.Absorber, mm float64)) []part {
	var list []part
	for _, x := range s.stockOf().Drills {
		list = append(list, part{row{fmt.Sprint(len(list)), x.Name, "drill", x.Source}, func(a *project.Absorber) { set(a, tidy(1000*x.Diameter)) }})
	}
	return list
}

// slatParts lists strips for slatted fronts.
func (s State) slatParts() []part {
	var list []part
	for _, x := range s.stockOf().Slats {
		list = append(list, part{row{fmt.Sprint(len(list)), x.Name, "slat", x.Source},
			func(a *project.Absorber) {
				a.Slotted.SlatMM, a.Slotted.PanelMM = tidy(1000*x.Width), tidy(1000*x.Thickness)
			}})
	}
	return list
}

// tubeParts lists pipes for necks.
func (s State) tubeParts() []part {
	var list []part
	add := func(name, group, source string, inside float64) {
		list = append(list, part{row{fmt.Sprint(len(list)), name, group, source}, func(a *project.Absorber) { a.Neck.MouthDiameterMM = inside }})
	}
	for _, x := range s.Project.Stock.Tubes {
		add(x.Name, ownStock, x.Source, x.InsideMM)
	}
	for _, x := range s.stockOf().Tubes {
		add(x.Name, units.Small(x.Inside(), s.system())+" inside", x.Source, tidy(1000*x.Inside()))
	}
	return list
}

// gauzeParts lists cloths for necks and perforated fronts.
func (s State) gauzeParts(set func(a *project.Absorber, flow float64)) []part {
	var list []part
	for _, x := range s.stockOf().Gauzes {
		list = append(list, part{row{fmt.Sprint(len(list)), x.Name, fmt.Sprintf("%.0f Pa·s/m", x.Flow), x.Source}, func(a *project.Absorber) { set(a, x.Flow) }})
	}
	return list
}

// woolParts lists slabs for fills and porous layers, in each of their thicknesses.
func (s State) woolParts(set func(a *project.Absorber, mm, flow float64)) []part {
	var list []part
	for _, x := range s.Project.Stock.Wools {
		list = append(list, part{row{fmt.Sprint(len(list)), x.Name, ownStock, x.Source}, func(a *project.Absorber) { set(a, x.ThicknessMM, x.FlowPaSM2) }})
	}
	for _, x := range s.stockOf().Wools {
		for _, m := range x.Thicknesses {
			group := fmt.Sprintf("%s, %.0f Pa·s/m² ± %.0f %%", units.Small(m, s.system()), x.Flow, 100*x.Uncertainty)
			list = append(list, part{row{fmt.Sprint(len(list)), x.Name, group, x.Source}, func(a *project.Absorber) { set(a, tidy(1000*m), x.Flow) }})
		}
	}
	return list
}

// stockButtons adds what fills an absorber's fields from the stock.
func (d *details) stockButtons(i int, a project.Absorber) {
	var list []*widget.Button
	add := func(name, title string, parts func() []part) {
		list = append(list, widget.NewButton(name, func() { d.fromStock(i, title, parts()) }))
	}
	switch a.Kind {
	case "neck":
		add("Pipe…", "A pipe for the neck", func() []part { return d.state.tubeParts() })
		add("Gauze…", "A cloth over the mouth", func() []part {
			return d.state.gauzeParts(func(a *project.Absorber, flow float64) { a.Neck.GauzePaSM = flow })
		})
	case "panel":
		add("Sheet…", "A sheet for the panel", func() []part { return d.state.sheetParts() })
	case "perforated":
		add("Sheet…", "A sheet for the front", func() []part {
			return d.state.boardParts(func(a *project.Absorber, mm float64) { a.Perforated.PanelMM = mm })
		})
		add("Drill…", "A drill for the holes", func() []part {
			return d.state.drillParts(func(a *project.Absorber, mm float64) { a.Perforated.HoleMM = mm })
		})
		add("Gauze…", "A cloth behind the holes", func() []part {
			return d.state.gauzeParts(func(a *project.Absorber, flow float64) { a.Perforated.GauzePaSM = flow })
		})
	case "slotted":
		add("Slats…", "Slats for the front", func() []part { return d.state.slatParts() })
	case "microperforated":
		add("Sheet…", "A sheet for the front", func() []part {
			return d.state.boardParts(func(a *project.Absorber, mm float64) { a.Microperforated.PanelMM = mm })
		})
	case "porous":
		add("Slab…", "A slab for the layer", func() []part {
			return d.state.woolParts(func(a *project.Absorber, mm, flow float64) { a.Porous.ThicknessMM, a.Porous.FlowPaSM2 = mm, flow })
		})
	}
	if fillOf(a) != nil {
		add("Fill…", "A slab for the fill", func() []part {
			return d.state.woolParts(func(a *project.Absorber, mm, flow float64) {
				fillOf(*a).ThicknessMM, fillOf(*a).FlowPaSM2 = min(mm, cavityOf(*a)), flow
			})
		})
	}
	d.buttons(list...)
	if a.Panel != nil || a.Neck != nil || a.Porous != nil {
		d.buttons(widget.NewButton("Keep in the project's stock…", func() { d.keepInStock(i) }))
	}
}

// fromStock lets a part be picked and puts it into the absorber.
func (d *details) fromStock(i int, title string, parts []part) {
	rows := make([]row, len(parts))
	for k, x := range parts {
		rows[k] = x.row
	}
	d.pick(title, rows, "", func(id string) {
		for _, x := range parts {
			if x.id == id && i < len(d.state.Project.Absorbers) {
				p := d.state.Project.Clone()
				x.use(&p.Absorbers[i])
				if err := d.edit("take from stock", "", p, ""); err != nil {
					d.tell("It does not fit", err.Error())
				}
			}
		}
	})
}

// keepInStock makes a row of the project's own stock of what an absorber is made of.
func (d *details) keepInStock(i int) {
	d.askName("Keep in the project's stock", "What it is called, and where its figures are from", func(name, source string) {
		p := d.state.Project.Clone()
		s, a := p.Stock, p.Absorbers[i]
		switch {
		case a.Panel != nil:
			b := a.Panel
			s.Sheets = append(s.Sheets, project.StockSheet{Name: name, Source: source, MassKgM2: b.MassKgM2, ThicknessMM: b.ThicknessMM,
				YoungsGPa: b.YoungsGPa, Poisson: b.Poisson, LossFactor: b.LossFactor})
		case a.Neck != nil:
			// The wall of the pipe is not known here: common plastic pipe has about 3 mm.
			s.Tubes = append(s.Tubes, project.StockTube{Name: name, Source: source, InsideMM: a.Neck.MouthDiameterMM, OutsideMM: a.Neck.MouthDiameterMM + 6})
		case a.Porous != nil:
			s.Wools = append(s.Wools, project.StockWool{Name: name, Source: source, ThicknessMM: a.Porous.ThicknessMM, FlowPaSM2: a.Porous.FlowPaSM2})
		}
		if err := d.edit("keep in stock", "", p.WithStock(s), ""); err != nil {
			d.tell("It cannot be kept", err.Error())
		}
	})
}

// askName asks for a name and a source.
func (c *controller) askName(title, hint string, done func(name, source string)) {
	var hide func()
	var name, source *pathEntry
	say := widget.NewLabel(hint)
	finish := func() {
		if strings.TrimSpace(name.Text) == "" {
			say.SetText("It needs a name.")
			return
		}
		hide()
		done(strings.TrimSpace(name.Text), strings.TrimSpace(source.Text))
	}
	name = newPathEntry("", finish, func() { hide() })
	source = newPathEntry("", finish, func() { hide() })
	form := widget.NewForm(widget.NewFormItem("Name", name), widget.NewFormItem("Source", source))
	hide = c.askOpen(title, container.NewVBox(say, form), fyne.NewSize(460, 220), name, choice{"Keep", true, finish}, choice{"Cancel", false, nil})
}
