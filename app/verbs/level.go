package verbs

import "stillroom/app/study"

type levelJSON struct {
	Seat    string   `json:"seat"`
	F       []number `json:"f_hz"`
	Bare    []number `json:"bare_db"`
	Treated []number `json:"treated_db"`
}

func runLevel(c *call) error {
	from := c.flags.Float64("from", 16, "")
	to := c.flags.Float64("to", 250, "")
	points := c.flags.Int("points", 200, "")
	id := c.flags.String("seat", "", "")
	as := c.flags.String("as", "csv", "")
	file, err := c.parseFile()
	if err != nil {
		return err
	}
	if err := c.checkLevel(*from, *to, *points, as); err != nil {
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
	r, err := study.Level(p, study.Options{FromHz: *from, ToHz: *to, Points: *points})
	if err != nil {
		return err
	}
	if *as == "json" {
		return writeJSON(c.stdout, levelJSON{p.Seats[seat].ID, numbers(r.Hz), numbers(r.Bare[seat]), numbers(r.Treated[seat])})
	}
	rows := [][]string{{"f_hz", "bare_db", "treated_db"}}
	for i, hz := range r.Hz {
		rows = append(rows, []string{cell(hz), cell(r.Bare[seat][i]), cell(r.Treated[seat][i])})
	}
	return writeCSV(c.stdout, rows)
}

// checkLevel checks the options of level.
func (c *call) checkLevel(from, to float64, points int, as *string) error {
	if err := oneOf("as", *as, "csv", "json"); err != nil {
		return err
	}
	if err := frequency("from", from); err != nil {
		return err
	}
	if err := frequency("to", to); err != nil {
		return err
	}
	if from >= to {
		return wrongf("--from must be below --to, is %g against %g", from, to)
	}
	if points < 2 || points > 100_000 {
		return wrongf("--points must be between 2 and 100000, is %d", points)
	}
	return nil
}
