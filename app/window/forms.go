package window

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"fyne.io/fyne/v2/container"
	"fyne.io/fyne/v2/widget"

	"stillroom/acoustics"
	"stillroom/app/project"
	"stillroom/app/units"
	"stillroom/assets"
)

// tidy takes the dust of binary arithmetic off a figure.
func tidy(v float64) float64 { return math.Round(v*1e6) / 1e6 }

func (d *details) roomForm() {
	d.heading("Project")
	d.text("Title", "title", func(p *project.Project) *string { return &p.Title })
	d.text("Prepared for", "prepared_for", func(p *project.Project) *string { return &p.PreparedFor })
	d.text("Prepared by", "prepared_by", func(p *project.Project) *string { return &p.PreparedBy })
	d.heading("Room, inside")
	for axis, name := range []string{"Length", "Width", "Height"} {
		d.dimension(name, axis)
	}
	d.fact("Volume", func() string {
		r := d.state.Project.Room
		return units.Volume(r.Length*r.Width*r.Height, d.state.system())
	})
	d.fact("Schroeder frequency", func() string {
		if d.state.Result == nil {
			return ""
		}
		return fmt.Sprintf("%.0f Hz", d.state.Result.SchroederHz)
	})
	d.heading("Reverberation, estimated")
	d.note(func() string {
		if d.state.Result == nil {
			return ""
		}
		t := []string{"Octave: Sabine, Eyring, Arau-Puchades"}
		for _, row := range d.state.Result.Reverberation {
			t = append(t, fmt.Sprintf("%s Hz: %.2f, %.2f, %.2f s", row.Nominal, row.Sabine, row.Eyring, row.ArauPuchades))
		}
		return strings.Join(append(t, "For a diffuse field, without absorbers: not meant below the Schroeder frequency."), "\n")
	})
	d.heading("Limit of a mode's decay")
	names := []string{"heard in music", "heard in artificial signals"}
	if len(d.state.Project.Limits.Points) > 0 {
		names = append(names, "the file's own")
	}
	d.choice("Limit", names, func(p project.Project) int {
		if i := slices.Index(project.Curves(), p.Limits.Curve); i >= 0 {
			return i
		}
		return 2
	}, func(p *project.Project, i int) {
		if i < 2 {
			p.Limits = project.Limits{Curve: project.Curves()[i]}
		}
	})
	d.note(func() string {
		if n, ok := acoustics.Limit(d.state.Project.Limits.Curve); ok {
			return n.Source
		}
		return ""
	})
	d.heading("Add")
	d.buttons(widget.NewButton("Loudspeaker", d.addLoudspeaker), widget.NewButton("Seat", d.addSeat))
	d.buttons(widget.NewButton("Absorber", d.addAbsorber))
}

// dimension edits one dimension of the room; everything is kept inside.
func (d *details) dimension(name string, axis int) {
	path := "room." + strings.ToLower(name) + "_m"
	var f *field
	set := func(v float64, key string) error {
		if r, ok := project.FieldRange(path); ok && !r.Contains(v) {
			return fmt.Errorf("must be between %s and %s", lengthM.write(r.Min, d.state.system()), lengthM.write(r.Max, d.state.system()))
		}
		return d.edit("change "+strings.ToLower(name), path, d.state.Project.WithDimension(axis, v, false), key)
	}
	f = newField(name, func(text string) error {
		v, err := lengthM.read(text, d.state.system())
		if err != nil {
			return err
		}
		return set(v, "")
	}, func(by int) {
		if err := set(tidy(d.state.Project.Room.Dimension(axis)+float64(by)*lengthM.step), "step-"+path); err != nil {
			f.complain(err.Error())
		}
	})
	d.add(f, func() string { return lengthM.write(d.state.Project.Room.Dimension(axis), d.state.system()) })
}

func (d *details) airForm() {
	d.heading("Air")
	d.number("Temperature", "air.temperature_c", inUnit("°C", 1), func(p *project.Project) *float64 { return &p.Air.TemperatureC })
	d.number("Relative humidity", "air.relative_humidity_pct", perCent, func(p *project.Project) *float64 { return &p.Air.RelativeHumidityPct })
	d.number("Static pressure", "air.pressure_kpa", inUnit("kPa", 0.5), func(p *project.Project) *float64 { return &p.Air.PressureKPa })
	d.fact("Speed of sound", func() string {
		if d.state.Result == nil {
			return ""
		}
		return units.Speed(d.state.Result.Air.SpeedOfSound, d.state.system())
	})
	d.fact("Density", func() string {
		if d.state.Result == nil {
			return ""
		}
		return fmt.Sprintf("%.4f kg/m³", d.state.Result.Air.Density)
	})
	d.note(func() string {
		if d.state.Result != nil && d.state.Result.Air.Extrapolated() {
			return "The speed of sound is extrapolated: its formula is published for 0 to 30 °C."
		}
		return ""
	})
}

// surfaceForm edits what one surface carries.
func (d *details) surfaceForm(s acoustics.Surface) {
	d.heading("Finishes of the " + s.String())
	for i, share := range d.state.Project.Lining(s) {
		finish, _ := d.state.Project.FinishByID(share.Finish)
		b := widget.NewButton(finish.Name, func() {
			d.chooseFinish(d.state.Project.Lining(s)[i].Finish, func(id string) {
				d.relined(s, func(l []project.FinishShare) []project.FinishShare { l[i].Finish = id; return l })
			})
		})
		b.Alignment = widget.ButtonAlignLeading
		d.updates = append(d.updates, func() {
			if l := d.state.Project.Lining(s); i < len(l) {
				if f, ok := d.state.Project.FinishByID(l[i].Finish); ok && f.Name != b.Text {
					b.SetText(f.Name)
				}
			}
		})
		d.form.Add(b)
		if i == 0 && len(d.state.Project.Lining(s)) == 1 {
			continue
		}
		d.shareField(s, i)
	}
	d.buttons(widget.NewButton("Add a finish", func() {
		d.relined(s, func(l []project.FinishShare) []project.FinishShare {
			l[0].Share /= 2
			return append(l, project.FinishShare{Finish: "door-solid", Share: l[0].Share})
		})
	}), widget.NewButton("Remove the last", func() {
		d.relined(s, func(l []project.FinishShare) []project.FinishShare {
			if len(l) < 2 {
				return l
			}
			l[0].Share = tidy(l[0].Share + l[len(l)-1].Share)
			return l[:len(l)-1]
		})
	}))
	d.note(func() string {
		var t []string
		for _, share := range d.state.Project.Lining(s) {
			f, _ := d.state.Project.FinishByID(share.Finish)
			text := f.Name + ": " + f.Source + "."
			if built, ok := assets.FinishByID(share.Finish); ok && built.Caution != "" {
				text += " " + built.Caution
			}
			t = append(t, text)
		}
		return strings.Join(t, "\n") + "\nPublished coefficients below 125 Hz are scarce and uncertain; the lowest band's value is held."
	})
	d.keepOutFields(s)
}

// keepOutFields edits the areas of a surface that proposals leave free.
func (d *details) keepOutFields(s acoustics.Surface) {
	d.heading("Areas to keep free")
	first, second := s.InPlane()
	from := [3]string{"from front", "from left", "from floor"}
	for i, k := range d.state.Project.KeepOut {
		if k.Surface != s {
			continue
		}
		path := fmt.Sprintf("keep_out[%d]", i)
		d.text("What", path+".note", func(p *project.Project) *string { return &p.KeepOut[i].Note })
		d.number("Centre "+from[first], path+".centre_m[0]", lengthM, func(p *project.Project) *float64 { return &p.KeepOut[i].Centre[0] })
		d.number("Centre "+from[second], path+".centre_m[1]", lengthM, func(p *project.Project) *float64 { return &p.KeepOut[i].Centre[1] })
		d.number("Along", path+".size_m[0]", lengthM, func(p *project.Project) *float64 { return &p.KeepOut[i].Size[0] })
		d.number("Across", path+".size_m[1]", lengthM, func(p *project.Project) *float64 { return &p.KeepOut[i].Size[1] })
		d.buttons(widget.NewButton("Remove this area", func() {
			d.actions.Edit("remove area", d.state.Project.WithoutKeepOut(i), "", true)
		}))
	}
	d.buttons(widget.NewButton("Add an area", func() {
		p := d.state.Project
		w, h := p.Room.Dimension(first), p.Room.Dimension(second)
		k := project.KeepOut{Note: "door", Surface: s, Size: [2]float64{math.Min(0.9, w), math.Min(2, h)}}
		k.Centre = [2]float64{tidy(w / 2), tidy(k.Size[1] / 2)}
		d.actions.Edit("add area", p.AddKeepOut(k), "", true)
	}))
}

// shareField edits one finish's share of a surface; the others make up the rest
// in proportion.
func (d *details) shareField(s acoustics.Surface, i int) {
	f := newField("share of the area", func(text string) error {
		v, err := shareOfArea.read(text, d.state.system())
		if err != nil {
			return err
		}
		if !(v > 0 && v < 1) {
			return fmt.Errorf("must be above 0 %% and below 100 %%")
		}
		d.relined(s, func(l []project.FinishShare) []project.FinishShare {
			rest := 1 - l[i].Share
			for k := range l {
				if k != i {
					l[k].Share = l[k].Share / rest * (1 - v)
				}
			}
			l[i].Share = v
			return l
		})
		return nil
	}, nil)
	d.add(f, func() string {
		if l := d.state.Project.Lining(s); i < len(l) {
			return shareOfArea.write(l[i].Share, d.state.system())
		}
		return ""
	})
}

func (d *details) relined(s acoustics.Surface, change func([]project.FinishShare) []project.FinishShare) {
	p := d.state.Project.WithLining(s, change(d.state.Project.Lining(s)))
	if len(p.Validate()) == 0 {
		d.actions.Edit("change finishes", p, "", true)
	}
}

// place adds the three coordinates of a point.
func (d *details) place(path string, at func(*project.Project) *acoustics.Point) {
	for i, name := range []string{"From front wall", "From left wall", "From floor"} {
		d.number(name, fmt.Sprintf("%s.at_m[%d]", path, i), lengthM, func(p *project.Project) *float64 { return &at(p)[i] })
	}
}

func (d *details) loudspeakerForm(i int) {
	path := fmt.Sprintf("loudspeakers[%d]", i)
	at := func(p *project.Project) *project.Loudspeaker { return &p.Loudspeakers[i] }
	d.heading("Loudspeaker")
	d.text("Id", path+".id", func(p *project.Project) *string { return &at(p).ID })
	d.place(path, func(p *project.Project) *acoustics.Point { return &at(p).At })
	d.number("Gain", path+".gain_db", inUnit("dB", 0.5), func(p *project.Project) *float64 { return &at(p).GainDB })
	d.number("Delay", path+".delay_ms", inUnit("ms", 0.1), func(p *project.Project) *float64 { return &at(p).DelayMS })
	d.check("Polarity inverted", func(p project.Project) bool { return at(&p).Inverted }, func(p *project.Project, on bool) { at(p).Inverted = on })
	remove := widget.NewButton("Remove", func() {
		if len(d.state.Project.Loudspeakers) > 1 {
			d.actions.Edit("remove loudspeaker", d.state.Project.WithoutLoudspeaker(i), "", true)
		}
	})
	d.buttons(widget.NewButton("Add another", d.addLoudspeaker), remove)
}

func (d *details) addLoudspeaker() {
	p := d.state.Project
	l := project.Loudspeaker{ID: p.FreshLoudspeakerID(), At: p.Room.Inside(acoustics.Point{0.3, 0.3, 0.3})}
	d.actions.Edit("add loudspeaker", p.AddLoudspeaker(l), "", true)
	d.actions.Select(Selection{d.state.Selection.Mode, -1, len(p.Loudspeakers), -1, -1})
}

func (d *details) seatForm(i int) {
	path := fmt.Sprintf("seats[%d]", i)
	at := func(p *project.Project) *project.Seat { return &p.Seats[i] }
	d.heading("Seat")
	d.text("Id", path+".id", func(p *project.Project) *string { return &at(p).ID })
	d.place(path, func(p *project.Project) *acoustics.Point { return &at(p).At })
	d.buttons(widget.NewButton("Show levels here", func() { d.actions.Ears(i) }))
	d.buttons(widget.NewButton("Add another", d.addSeat), widget.NewButton("Remove", func() {
		if len(d.state.Project.Seats) > 1 {
			d.actions.Edit("remove seat", d.state.Project.WithoutSeat(i), "", true)
		}
	}))
}

func (d *details) addSeat() {
	p := d.state.Project
	s := project.Seat{ID: p.FreshSeatID(), At: p.Room.Inside(acoustics.Point{p.Room.Length * 0.7, p.Room.Width / 2, 1.2})}
	d.actions.Edit("add seat", p.AddSeat(s), "", true)
	d.actions.Select(Selection{d.state.Selection.Mode, -1, -1, len(p.Seats), -1})
}

// addAbsorber stands a porous panel on the first free stretch of wall.
func (d *details) addAbsorber() {
	p := d.state.Project
	a := project.Absorber{ID: p.FreshAbsorberID(), Size: [2]float64{0.6, 0.6}, Units: 1}.OfKind("porous")
	if q, ok := placed(p, a); ok {
		d.actions.Edit("add absorber", q, "", true)
		d.actions.Select(Selection{d.state.Selection.Mode, len(p.Absorbers), -1, -1, -1})
	}
}

// placed adds an absorber where it first fits: back, left, right, front,
// ceiling, floor, on a grid of a tenth of a metre.
func placed(p project.Project, a project.Absorber) (project.Project, bool) {
	for _, s := range []acoustics.Surface{acoustics.Back, acoustics.Left, acoustics.Right, acoustics.Front, acoustics.Ceiling, acoustics.Floor} {
		i, j := s.InPlane()
		a.Surface = s
		for v := a.Size[1] / 2; v+a.Size[1]/2 <= p.Room.Dimension(j)+1e-9; v += 0.1 {
			for u := a.Size[0] / 2; u-a.Size[0]/2+a.Size[0]*float64(a.Units) <= p.Room.Dimension(i)+1e-9; u += 0.1 {
				a.Centre = [2]float64{tidy(u), tidy(v)}
				if q := p.AddAbsorber(a); len(q.Validate()) == 0 {
					return q, true
				}
			}
		}
	}
	return p, false
}

func peakWords(o acoustics.Oscillator) string {
	damped, oscillates := o.DampedHz()
	peak, exists := o.PeakHz()
	switch {
	case exists:
		return fmt.Sprintf("Damped %.1f Hz, greatest forced motion at %.1f Hz.", damped, peak)
	case oscillates:
		return fmt.Sprintf("Damped %.1f Hz. No resonance peak: ζ is not below 1/√2.", damped)
	}
	return "Overdamped: it does not oscillate, and there is no resonance peak."
}

func signed(v float64, places int) string {
	s := fmt.Sprintf("%+.*f", places, v)
	return strings.Replace(s, "-", "−", 1)
}

// modeForm shows all figures of the selected mode.
func (d *details) modeForm() {
	mode := func(f func(i int) string) func() string {
		return func() string {
			i := d.state.Selection.Mode
			if d.state.Result == nil || i < 0 || i >= len(d.state.Result.Modes) {
				return ""
			}
			return f(i)
		}
	}
	row := func(name string, f func(i int) string) { d.fact(name, mode(f)) }
	d.heading("Mode")
	row("Order, kind", func(i int) string {
		m := d.state.Result.Modes[i].Mode
		return m.String() + " " + m.Kind().String()
	})
	row("Frequency", func(i int) string { return fmt.Sprintf("%.2f Hz", d.state.Result.Modes[i].Mode.Hz) })
	row("Wavelength", func(i int) string { return units.Length(d.state.Result.Modes[i].Wavelength, d.state.system()) })
	row("T60, limit", func(i int) string {
		m := d.state.Result.Modes[i]
		return fmt.Sprintf("%.2f s, %.2f s", m.Oscillator.T60(), m.LimitS)
	})
	row("Half-power width", func(i int) string { return fmt.Sprintf("%.2f Hz", d.state.Result.Modes[i].Oscillator.HalfPowerWidth()) })
	row("Q, ζ", func(i int) string {
		o := d.state.Result.Modes[i].Oscillator
		return fmt.Sprintf("%.1f, %.4f", o.Q(), o.DampingRatio())
	})
	row("Level at the seat", func(i int) string { return units.Decibels(d.state.Result.Modes[i].LevelDB[d.state.ears()]) })
	row("Problem", func(i int) string {
		if m := d.state.Result.Modes[i]; m.Problem {
			return fmt.Sprintf("yes, no. %d", m.Rank)
		}
		return "no"
	})
	d.note(mode(func(i int) string {
		m := d.state.Result.Modes[i]
		t := []string{peakWords(m.Oscillator), "Pressure is greatest " + m.Strongest + "."}
		for _, p := range m.Poles() {
			whose := "the mode's"
			if p.Absorber >= 0 {
				whose = d.state.Result.Absorbers[p.Absorber].ID + "'s"
			}
			t = append(t, fmt.Sprintf("Treated, %s: %.1f Hz, %.2f s, %s", whose, p.Oscillator.Natural, p.Oscillator.T60(), units.Decibels(p.LevelDB[d.state.ears()])))
		}
		return strings.Join(t, "\n")
	}))
	d.heading("Where its damping comes from")
	for _, s := range acoustics.Surfaces() {
		row(s.String(), func(i int) string { return share(d.state.Result.Modes[i].Mode.Damping, int(s)) })
	}
	row("air", func(i int) string { return share(d.state.Result.Modes[i].Mode.Damping, -1) })
	tune := widget.NewButton("Tune an absorber to this mode", func() { d.actions.Tune(d.state.Selection.Mode) })
	tune.Importance = widget.HighImportance
	d.form.Add(container.NewPadded(tune))
}

// share is a wall's part of a mode's damping, the air's for −1.
func share(g acoustics.Damping, wall int) string {
	v := g.Air
	if wall >= 0 {
		v = g.Wall[wall]
	}
	return fmt.Sprintf("%.0f %%, δ %.2f 1/s", 100*v/g.Total(), v)
}
