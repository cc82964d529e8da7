package verbs

import (
	"fmt"
	"math"
	"strings"

	"stillroom/app/study"
)

type modesJSON struct {
	Air           airJSON     `json:"air"`
	Room          roomJSON    `json:"room"`
	Modes         []modeJSON  `json:"modes"`
	AbsorberPoles []ownedPole `json:"absorber_poles"`
}

type airJSON struct {
	Speed   number `json:"speed_m_s"`
	Density number `json:"density_kg_m3"`
}

type roomJSON struct {
	Volume    number `json:"volume_m3"`
	Surface   number `json:"surface_m2"`
	Schroeder number `json:"schroeder_hz"`
}

type modeJSON struct {
	Order   [3]int     `json:"order"`
	Kind    string     `json:"kind"`
	F       number     `json:"f_hz"`
	T60     number     `json:"t60_s"`
	Width   number     `json:"width_hz"`
	Q       number     `json:"q"`
	Zeta    number     `json:"damping_ratio"`
	Damped  number     `json:"damped_hz"`
	Peak    number     `json:"peak_hz"`
	Level   number     `json:"level_db"`
	Limit   number     `json:"limit_s"`
	Problem bool       `json:"problem"`
	Treated []poleJSON `json:"treated"`
}

type poleJSON struct {
	F     number `json:"f_hz"`
	T60   number `json:"t60_s"`
	Level number `json:"level_db"`
}

type ownedPole struct {
	Absorber string `json:"absorber"`
	poleJSON
}

// orNone returns v, NaN where it does not exist.
func orNone(v float64, exists bool) float64 {
	if !exists {
		return math.NaN()
	}
	return v
}

func poleOf(p study.PoleRow, seat int) poleJSON {
	return poleJSON{number(p.Oscillator.Natural), number(p.Oscillator.T60()), number(p.LevelDB[seat])}
}

func modeOf(m study.ModeRow, seat int) modeJSON {
	o := m.Oscillator
	damped, oscillates := o.DampedHz()
	peak, exists := o.PeakHz()
	row := modeJSON{Order: m.Mode.Order, Kind: m.Mode.Kind().String(), F: number(o.Natural), T60: number(o.T60()),
		Width: number(o.HalfPowerWidth()), Q: number(o.Q()), Zeta: number(o.DampingRatio()),
		Damped: number(orNone(damped, oscillates)), Peak: number(orNone(peak, exists)),
		Level: number(m.LevelDB[seat]), Limit: number(m.LimitS), Problem: m.Problem, Treated: []poleJSON{}}
	for _, p := range m.Treated {
		row.Treated = append(row.Treated, poleOf(p, seat))
	}
	return row
}

func runModes(c *call) error {
	to := c.flags.Float64("to", 200, "")
	id := c.flags.String("seat", "", "")
	as := c.flags.String("as", "text", "")
	file, err := c.parseFile()
	if err != nil {
		return err
	}
	if err := oneOf("as", *as, "text", "csv", "json"); err != nil {
		return err
	}
	if err := frequency("to", *to); err != nil {
		return err
	}
	p, err := c.load(file)
	if err != nil {
		return err
	}
	seat, err := seatIndex(p, *id)
	if err != nil {
		return err
	}
	r, err := c.study(p, study.Options{ModesToHz: *to, Points: 2})
	if err != nil {
		return err
	}
	return c.answer(*as, modesOf(r, seat), modesCSV(r, seat), func() error { return modesText(c, r, seat) })
}

// modesOf returns the promised JSON of the mode schedule.
func modesOf(r *study.Result, seat int) modesJSON {
	out := modesJSON{
		Air:           airJSON{number(r.Air.SpeedOfSound), number(r.Air.Density)},
		Room:          roomJSON{number(r.VolumeM3), number(r.AreaM2), number(r.SchroederHz)},
		Modes:         []modeJSON{},
		AbsorberPoles: []ownedPole{},
	}
	for _, m := range r.Modes {
		out.Modes = append(out.Modes, modeOf(m, seat))
	}
	for _, p := range r.AbsorberPoles {
		out.AbsorberPoles = append(out.AbsorberPoles, ownedPole{r.Absorbers[p.Absorber].ID, poleOf(p, seat)})
	}
	return out
}

// modesCSV gives a row for each mode and each of the absorbers' own poles.
func modesCSV(r *study.Result, seat int) [][]string {
	rows := [][]string{{"row", "order", "kind", "f_hz", "t60_s", "width_hz", "q", "damping_ratio", "damped_hz", "peak_hz",
		"level_db", "limit_s", "problem", "treated_f_hz", "treated_t60_s", "treated_level_db"}}
	for _, m := range r.Modes {
		j := modeOf(m, seat)
		row := []string{"mode", orderText(m.Mode.Order), j.Kind}
		for _, v := range []number{j.F, j.T60, j.Width, j.Q, j.Zeta, j.Damped, j.Peak, j.Level, j.Limit} {
			row = append(row, cell(float64(v)))
		}
		row = append(row, fmt.Sprint(j.Problem))
		rows = append(rows, append(row, poleCells(j.Treated)...))
	}
	for _, p := range r.AbsorberPoles {
		row := []string{"absorber", r.Absorbers[p.Absorber].ID, r.Absorbers[p.Absorber].Kind, "", "", "", "", "", "", "", "", cell(p.LimitS), ""}
		rows = append(rows, append(row, poleCells([]poleJSON{poleOf(p, seat)})...))
	}
	return rows
}

func poleCells(p []poleJSON) []string {
	if len(p) == 0 {
		return []string{"", "", ""}
	}
	return []string{cell(float64(p[0].F)), cell(float64(p[0].T60)), cell(float64(p[0].Level))}
}

// orderText writes an order with spaces, which no spreadsheet takes for a number.
func orderText(o [3]int) string { return fmt.Sprintf("%d %d %d", o[0], o[1], o[2]) }

// modesText writes the schedule for a terminal.
func modesText(c *call, r *study.Result, seat int) error {
	p := r.Project
	if p.Title != "" {
		fmt.Fprintln(c.stdout, p.Title)
	}
	fmt.Fprintf(c.stdout, "Room %.3f × %.3f × %.3f m, %.2f m³, surface %.2f m². Sound %.2f m/s, air %.4f kg/m³. Schroeder frequency %.0f Hz.\n",
		p.Room.Length, p.Room.Width, p.Room.Height, r.VolumeM3, r.AreaM2, r.Air.SpeedOfSound, r.Air.Density, r.SchroederHz)
	fmt.Fprintf(c.stdout, "Calculated. Level: each mode's own peak at seat %s, dB re one loudspeaker in the free field at 1 m. A * marks a problem mode.\n\n", p.Seats[seat].ID)
	rows := [][]string{{"order", "kind", "f Hz", "T60 s", "limit s", "", "width Hz", "Q", "level dB", "treated f Hz", "T60 s", "level dB"}}
	for _, m := range r.Modes {
		mark := ""
		if m.Problem {
			mark = "*"
		}
		row := []string{orderText(m.Mode.Order), m.Mode.Kind().String(), shown(m.Mode.Hz, 2), shown(m.Oscillator.T60(), 2), shown(m.LimitS, 2), mark,
			shown(m.Oscillator.HalfPowerWidth(), 2), shown(m.Oscillator.Q(), 1), shown(m.LevelDB[seat], 1)}
		rows = append(rows, append(row, poleText(m.Treated, seat)...))
	}
	if err := writeText(c.stdout, rows); err != nil {
		return err
	}
	if len(r.AbsorberPoles) > 0 {
		fmt.Fprintln(c.stdout, "\nPoles that grew from the absorbers' own resonances:")
		rows := [][]string{{"absorber", "f Hz", "T60 s", "level dB"}}
		for _, q := range r.AbsorberPoles {
			rows = append(rows, append([]string{r.Absorbers[q.Absorber].ID}, poleText([]study.PoleRow{q}, seat)...))
		}
		if err := writeText(c.stdout, rows); err != nil {
			return err
		}
	}
	fmt.Fprintln(c.stdout)
	_, err := fmt.Fprintln(c.stdout, strings.Join(r.Cautions, "\n"))
	return err
}

func poleText(p []study.PoleRow, seat int) []string {
	if len(p) == 0 {
		return []string{"", "", ""}
	}
	return []string{shown(p[0].Oscillator.Natural, 2), shown(p[0].Oscillator.T60(), 2), shown(p[0].LevelDB[seat], 1)}
}
