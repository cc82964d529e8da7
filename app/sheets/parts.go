package sheets

import (
	"fmt"
	"strings"

	"gonum.org/v1/plot/vg/draw"

	"stillroom/acoustics"
	"stillroom/app/figures"
	"stillroom/app/project"
	"stillroom/app/study"
	"stillroom/app/units"
	"stillroom/assets"
)

func fixed(v float64, places int) string { return fmt.Sprintf("%.*f", places, v) }

// modeSchedule is the first sheet.
func (s *writer) modeSchedule() {
	s.sheet = "Mode schedule"
	s.page()
	r := s.r
	s.heading("Mode schedule")
	s.paragraph(fmt.Sprintf("Room %s × %s × %s, %s. Speed of sound %s at %s, %.0f %% humidity. Schroeder frequency %.0f Hz. Level: each mode's own peak at seat %s, dB re one loudspeaker of unit gain in the free field at 1 m. Limits: %s.",
		units.Length(r.Project.Room.Length, s.sys), units.Length(r.Project.Room.Width, s.sys), units.Length(r.Project.Room.Height, s.sys),
		units.Volume(r.VolumeM3, s.sys), units.Speed(r.Air.SpeedOfSound, s.sys), units.Temperature(r.Project.Air.TemperatureC, s.sys), r.Project.Air.RelativeHumidityPct,
		r.SchroederHz, r.Project.Seats[0].ID, limitSource(r.Project.Limits)), textSize)
	columns := []column{{"No.", 0, true}, {"Mode", 0, false}, {"Hz", 0, true}, {"Kind", 0, false}, {"λ", 0, true}, {"T60 s", 0, true},
		{"Limit s", 0, true}, {"Width Hz", 0, true}, {"Level dB", 0, true}, {"Treated Hz, s", 0, false}, {"Pressure is greatest", 1, false}, {"Absorber", 0, false}}
	var rows [][]string
	for _, m := range r.Modes {
		problem := ""
		if m.Problem {
			problem = fmt.Sprint(m.Rank)
		}
		rows = append(rows, []string{problem, orderText(m.Mode.Order), fixed(m.Mode.Hz, 1), m.Mode.Kind().String(), units.Length(m.Wavelength, s.sys),
			fixed(m.Oscillator.T60(), 2), fixed(m.LimitS, 2), fixed(m.Oscillator.HalfPowerWidth(), 1),
			strings.TrimSuffix(units.Decibels(m.LevelDB[0]), " dB"), poles(m), m.Strongest, s.ids(m.Absorbers)})
	}
	s.table(columns, rows)
	s.paragraph("λ: wavelength. Width: at half power. No.: rank as a problem, 1 the worst; a problem is a mode whose decay is over the limit and whose own peak at a seat is within 10 dB of the strongest there. Treated: the oscillations that the mode and the absorbers tuned to it have together.", textSize)
}

func orderText(o [3]int) string { return fmt.Sprintf("%d %d %d", o[0], o[1], o[2]) }

func poles(m study.ModeRow) string {
	var t []string
	for _, p := range m.Poles() {
		t = append(t, fmt.Sprintf("%.1f, %.2f", p.Oscillator.Natural, p.Oscillator.T60()))
	}
	return strings.Join(capped(t), "\n")
}

func (s *writer) ids(absorbers []int) string {
	var t []string
	for _, a := range absorbers {
		t = append(t, s.r.Absorbers[a].ID)
	}
	return strings.Join(capped(t), ", ")
}

// capped keeps a cell within a row: the first few of a long list and how many
// more there are.
func capped(t []string) []string {
	const most = 6
	if len(t) <= most {
		return t
	}
	return append(t[:most-1:most-1], fmt.Sprintf("%d more", len(t)-most+1))
}

func limitSource(l project.Limits) string {
	if n, ok := acoustics.Limit(l.Curve); ok {
		return n.Title + ", " + n.Source
	}
	return "the project's own"
}

// planAndSection is the sheet of drawings and positions.
func (s *writer) planAndSection() {
	s.sheet = "Plan and section"
	s.page()
	v := figures.DefaultView(s.r)
	v.US = s.o.US
	height := (s.bottom() - s.y) * 0.36
	for _, paint := range []func(draw.Canvas, *study.Result, figures.View, figures.Style){figures.DrawPlan, figures.DrawSection} {
		c, end := on(s.doc, margin, s.y, s.w-2*margin, height)
		paint(c, s.r, v, figures.Print())
		end()
		s.y += height + 4
	}
	s.heading("Positions, measured from the front wall, the left wall and the floor")
	var rows [][]string
	at := func(p acoustics.Point) []string {
		return []string{units.Length(p[0], s.sys), units.Length(p[1], s.sys), units.Length(p[2], s.sys)}
	}
	for _, l := range s.r.Project.Loudspeakers {
		set := fmt.Sprintf("gain %.1f dB, delay %.2f ms", l.GainDB, l.DelayMS)
		if l.Inverted {
			set += ", inverted"
		}
		rows = append(rows, append(append([]string{l.ID, "loudspeaker"}, at(l.At)...), set))
	}
	for _, q := range s.r.Project.Seats {
		rows = append(rows, append(append([]string{q.ID, "seat"}, at(q.At)...), ""))
	}
	for _, a := range s.r.Project.Absorbers {
		c := s.r.Room.Box.OnSurface(a.Surface, a.Centre[0], a.Centre[1])
		rows = append(rows, append(append([]string{a.ID, "absorber, centre of the first unit"}, at(c)...), "on the "+a.Surface.String()))
	}
	s.table([]column{{"Id", 0, false}, {"What", 0, false}, {"From front", 0, true}, {"From left", 0, true}, {"From floor", 0, true}, {"", 1, false}}, rows)
}

// lanes is the sheet of before and after.
func (s *writer) lanes() {
	s.sheet = "Before and after"
	s.page()
	v := figures.DefaultView(s.r)
	for _, l := range []figures.Lane{figures.ModesLane, figures.DensityLane, figures.LevelLane, figures.DecayLane} {
		s.heading(l.Title())
		height := (s.bottom()-margin)/4 - 30
		c, end := on(s.doc, margin, s.y, s.w-2*margin, height)
		figures.DrawLane(c, l, s.r, v, figures.Print())
		end()
		s.y += height
	}
}

// decayInTime is the sheet of what rings how long at each seat.
func (s *writer) decayInTime() {
	g := s.r.Ringing
	if g == nil {
		return
	}
	s.sheet = "Decay in time"
	s.page()
	v := figures.DefaultView(s.r)
	s.heading(fmt.Sprintf("Ringing at seat %s, s after the sound stops", s.r.Project.Seats[0].ID))
	height := (s.bottom() - margin) * 0.3
	c, end := on(s.doc, margin, s.y, s.w-2*margin, height)
	figures.DrawLane(c, figures.RingingLane, s.r, v, figures.Print())
	end()
	s.y += height + 6
	s.heading("Energy decay by third octaves, seconds")
	columns := []column{{"Band Hz", 0, true}, {"Seat", 0, false}, {"Early, bare", 0, true}, {"T20, bare", 0, true}, {"Early, treated", 0, true}, {"T20, treated", 0, true}, {"", 1, false}}
	var rows [][]string
	for _, b := range g.Bands {
		for i, seat := range s.r.Project.Seats {
			if b.Bare[i].T20 == 0 {
				continue
			}
			row := []string{b.Nominal, seat.ID, fixed(b.Bare[i].Early, 2), fixed(b.Bare[i].T20, 2), "", "", ""}
			if len(s.r.Absorbers) > 0 && b.Treated[i].T20 > 0 {
				row[4], row[5] = fixed(b.Treated[i].Early, 2), fixed(b.Treated[i].T20, 2)
			}
			rows = append(rows, row)
		}
	}
	s.table(columns, rows)
	s.paragraph("Calculated from the room's oscillations by Schroeder's backward integration; early from 0 to −10 dB, T20 from −5 to −25 dB. Oscillations that last less than 0.02 s are left out. Where two poles beat or a slow one hides under fast ones, early and T20 differ, and neither is the T60 of one mode.", textSize)
}

// absorberList is the sheet the joiner builds from.
func (s *writer) absorberList() {
	s.sheet = "Absorbers"
	s.page()
	s.heading("Absorbers")
	if len(s.r.Absorbers) == 0 {
		s.paragraph("The project has no absorbers.", textSize)
		return
	}
	columns := []column{{"Id", 0, false}, {"Kind", 0, false}, {"Units", 0, true}, {"Front of one", 0, false}, {"Dimensions", 1, false}, {"Resonance", 0, false}, {"For mode", 0, false}}
	var rows [][]string
	for i, a := range s.r.Project.Absorbers {
		row := s.r.Absorbers[i]
		resonance := "broadband"
		if o := row.Report.Oscillator; o != nil {
			resonance = fmt.Sprintf("%.1f Hz, Q %.1f\nacts %.0f to %.0f Hz", o.Natural, o.Q(), row.Report.Band[0], row.Report.Band[1])
		}
		target := ""
		if row.Target >= 0 {
			m := s.r.Modes[row.Target].Mode
			target = fmt.Sprintf("%s, %.1f Hz", orderText(m.Order), m.Hz)
		}
		rows = append(rows, []string{a.ID, KindWords(a.Kind), fmt.Sprint(a.Units),
			units.Small(a.Size[0], s.sys) + " × " + units.Small(a.Size[1], s.sys), strings.Join(Dimensions(a, s.sys), "; "), resonance, target})
	}
	s.table(columns, rows)
	s.paragraph(fmt.Sprintf("Resonance and Q are calculated for the absorber alone; in its place the room adds its own air. Seal every cavity: a leak turns a tuned absorber into a badly tuned one. Common practice: cavity depth to ± %s, holes to ± %s; panel mass varies by 5 to 10 %%, flow resistivity by 30 to 50 %%, which moves a resonance by several per cent.",
		units.Small(0.003, s.sys), drill(s.sys)), textSize)
}

// build is the sheets that each absorber is built from: section, parts, tolerances.
func (s *writer) build() {
	if len(s.r.Absorbers) == 0 {
		return
	}
	s.sheet = "Build sheets"
	s.page()
	const sectionHeight = 165.0
	for i, a := range s.r.Project.Absorbers {
		if s.y+sectionHeight+150 > s.bottom() {
			s.page()
		}
		s.heading(fmt.Sprintf("%s, %s, %d to build, each %s × %s", a.ID, KindWords(a.Kind), a.Units, units.Small(a.Size[0], s.sys), units.Small(a.Size[1], s.sys)))
		c, end := on(s.doc, margin, s.y, s.w-2*margin, sectionHeight)
		figures.DrawAbsorber(c, a, s.o.US, figures.Print())
		end()
		s.y += sectionHeight + 2
		s.paragraph("Section through one unit, the room below. "+upperFirst(strings.Join(Dimensions(a, s.sys), "; "))+".", textSize)
		s.parts(a)
		s.tolerances(i)
	}
	s.paragraph("Parts are for boxes and frames of board of "+units.Small(study.BoxBoard, s.sys)+", outside sizes, without the saw's kerf. Calculated figures: have a first one measured before more are built.", textSize)
}

// upperFirst begins a text with a capital.
func upperFirst(t string) string {
	if t == "" {
		return t
	}
	return strings.ToUpper(t[:1]) + t[1:]
}

// parts is the cut list of an absorber.
func (s *writer) parts(a project.Absorber) {
	var rows [][]string
	for _, c := range study.CutList(a) {
		size := units.Small(c.W, s.sys) + " × " + units.Small(c.H, s.sys)
		thick := units.Small(c.Thickness, s.sys)
		if c.Thickness == 0 {
			size, thick = units.Small(c.W, s.sys)+" inside, "+units.Small(c.H, s.sys)+" long", ""
		}
		rows = append(rows, []string{c.Part, fmt.Sprint(c.Count), size, thick})
	}
	s.table([]column{{"Part", 0, false}, {"Count", 0, true}, {"Size", 1, false}, {"Thick", 0, true}}, rows)
}

// tolerances lists what each dimension of an absorber does to its resonance, and how far
// it may be off.
func (s *writer) tolerances(absorber int) {
	var rows [][]string
	allowed := s.r.Tolerances(absorber)
	for k, d := range s.r.Absorbers[absorber].Sensitivities {
		words, steps := Step(d, s.sys)
		off := ""
		if k < len(allowed) {
			off = Allowed(allowed[k], s.sys)
		}
		rows = append(rows, []string{words, signed(d.F0PerStep*steps) + " Hz", signed(d.QPerStep * steps), off})
	}
	if len(rows) > 0 {
		s.table([]column{{"Step", 1, false}, {"Resonance", 0, true}, {"Q", 0, true}, {"May be off by", 0, true}}, rows)
	}
}

// criteria is the sheet of the published figures of merit.
func (s *writer) criteria() {
	s.sheet = "Criteria"
	s.page()
	s.heading("Criteria, of the room without absorbers where nothing else is said")
	var rows [][]string
	for _, c := range s.r.Criteria {
		rows = append(rows, []string{c.Verdict.String(), c.Title, Measured(c.Figure, c.Unit, s.sys), Measured(c.Limit, c.Unit, s.sys), c.WhatToDo(), c.Source})
	}
	s.table([]column{{"Met", 0, false}, {"Criterion", 32, false}, {"Figure", 0, true}, {"Limit", 0, true}, {"What to do", 26, false}, {"Source", 26, false}}, rows)
	s.paragraph("A figure without a limit is for information. Criteria guide a design; a room that meets them all still wants listening and measuring.", textSize)
	s.heading("Reverberation time by octaves, seconds")
	rows = nil
	for _, r := range s.r.Reverberation {
		meant := "yes"
		if !r.Meant {
			meant = "no: below the Schroeder frequency or across it"
		}
		rows = append(rows, []string{r.Nominal, fixed(r.Sabine, 2), fixed(r.Eyring, 2), fixed(r.ArauPuchades, 2), meant})
	}
	s.table([]column{{"Octave Hz", 0, true}, {"Sabine", 0, true}, {"Eyring", 0, true}, {"Arau-Puchades", 0, true}, {"Meant there", 1, false}}, rows)
	s.paragraph("Estimates for a diffuse field, with the air's absorption and without the absorbers of this set. Sabine for weakly absorbing rooms, Eyring for even and Arau-Puchades for uneven absorption.", textSize)
}

// cautions is the last sheet.
func (s *writer) cautions() {
	s.sheet = "Cautions"
	s.page()
	s.heading("Cautions")
	for i, c := range assets.Cautions() {
		s.paragraph(fmt.Sprintf("%d. %s. %s", i+1, c.Topic, c.Text), 9)
	}
	s.heading("Limits of the models in this project")
	for _, c := range s.r.Cautions {
		s.paragraph("– "+c, 9)
	}
}

// drill is what a drilled hole keeps to.
func drill(sys units.System) string {
	if sys == units.US {
		return "1/128 in"
	}
	return "0.2 mm"
}

// signed writes a change, plain 0.00 where it rounds to nothing.
func signed(v float64) string {
	text := fmt.Sprintf("%+.2f", v)
	if text == "+0.00" || text == "-0.00" {
		return "0.00"
	}
	return strings.Replace(text, "-", "−", 1)
}
