package verbs

import (
	"fmt"
	"math"

	"stillroom/app/study"
)

type absorbersJSON struct {
	Absorbers []absorberJSON `json:"absorbers"`
}

type absorberJSON struct {
	ID           string          `json:"id"`
	Kind         string          `json:"kind"`
	F0           number          `json:"f0_hz"`
	Q            number          `json:"q"`
	Zeta         number          `json:"damping_ratio"`
	Damped       number          `json:"damped_hz"`
	Peak         number          `json:"peak_hz"`
	Band         *[2]number      `json:"band_hz"`
	ThirdOctaves []thirdJSON     `json:"third_octaves"`
	AlphaW       number          `json:"alpha_w"`
	Shape        string          `json:"alpha_w_shape"`
	Impedance    []impedanceJSON `json:"impedance"`
}

type thirdJSON struct {
	Nominal string `json:"nominal"`
	Normal  number `json:"normal"`
	Diffuse number `json:"diffuse"`
}

type impedanceJSON struct {
	F    number `json:"f_hz"`
	Real number `json:"real"`
	Imag number `json:"imag"`
}

func absorberOf(a study.AbsorberRow) absorberJSON {
	nan := number(math.NaN())
	out := absorberJSON{ID: a.ID, Kind: a.Kind, F0: nan, Q: nan, Zeta: nan, Damped: nan, Peak: nan,
		ThirdOctaves: []thirdJSON{}, AlphaW: number(a.Report.AlphaW), Shape: a.Report.AlphaWShape, Impedance: []impedanceJSON{}}
	if o := a.Report.Oscillator; o != nil {
		out.F0, out.Q, out.Zeta = number(o.Natural), number(o.Q()), number(o.DampingRatio())
		out.Damped = number(orNone(o.DampedHz()))
		out.Peak = number(orNone(o.PeakHz()))
		out.Band = &[2]number{number(a.Report.Band[0]), number(a.Report.Band[1])}
	}
	for _, b := range a.Report.ThirdOctaves {
		out.ThirdOctaves = append(out.ThirdOctaves, thirdJSON{b.Nominal, number(b.Normal), number(b.Diffuse)})
	}
	for _, z := range a.Report.Impedance {
		out.Impedance = append(out.Impedance, impedanceJSON{number(z.Hz), number(real(z.Z)), number(imag(z.Z))})
	}
	return out
}

func runAbsorbers(c *call) error {
	field := c.flags.String("field", "90", "")
	p, as, err := c.loadAs()
	if err != nil {
		return err
	}
	if err := oneOf("field", *field, "90", "78"); err != nil {
		return err
	}
	deg := map[string]float64{"90": 90, "78": 78}[*field]
	rows, err := study.Absorbers(p, deg)
	if err != nil {
		return err
	}
	out := absorbersJSON{[]absorberJSON{}}
	for _, a := range rows {
		out.Absorbers = append(out.Absorbers, absorberOf(a))
	}
	return c.answer(as, out, absorbersCSV(rows), func() error { return absorbersText(c, rows) })
}

// absorbersCSV gives a row for each absorber with its diffuse coefficients.
func absorbersCSV(rows []study.AbsorberRow) [][]string {
	head := []string{"id", "kind", "f0_hz", "q", "damping_ratio", "damped_hz", "peak_hz", "band_lo_hz", "band_hi_hz", "alpha_w", "alpha_w_shape"}
	var out [][]string
	for i, a := range rows {
		j := absorberOf(a)
		row := []string{j.ID, j.Kind}
		for _, v := range []number{j.F0, j.Q, j.Zeta, j.Damped, j.Peak} {
			row = append(row, cell(float64(v)))
		}
		if j.Band != nil {
			row = append(row, cell(float64(j.Band[0])), cell(float64(j.Band[1])))
		} else {
			row = append(row, "", "")
		}
		row = append(row, cell(float64(j.AlphaW)), j.Shape)
		for _, t := range j.ThirdOctaves {
			if i == 0 {
				head = append(head, "normal_"+t.Nominal, "diffuse_"+t.Nominal)
			}
			row = append(row, cell(float64(t.Normal)), cell(float64(t.Diffuse)))
		}
		out = append(out, row)
	}
	return append([][]string{head}, out...)
}

// absorbersText writes the absorbers for a terminal.
func absorbersText(c *call, rows []study.AbsorberRow) error {
	if len(rows) == 0 {
		_, err := fmt.Fprintln(c.stdout, "The project has no absorbers.")
		return err
	}
	fmt.Fprint(c.stdout, "Calculated, not measured.\n\n")
	table := [][]string{{"id", "kind", "f0 Hz", "Q", "ζ", "peak Hz", "band Hz", "αw"}}
	for _, a := range rows {
		j := absorberOf(a)
		band, peak := "broadband", "–"
		if j.Band != nil {
			band = shown(float64(j.Band[0]), 1) + " to " + shown(float64(j.Band[1]), 1)
			peak = shown(float64(j.Peak), 1)
			if math.IsNaN(float64(j.Peak)) {
				peak = "no peak"
			}
		}
		w := shown(float64(j.AlphaW), 2)
		if j.Shape != "" {
			w += "(" + j.Shape + ")"
		}
		table = append(table, []string{j.ID, j.Kind, shown(float64(j.F0), 1), shown(float64(j.Q), 1), shown(float64(j.Zeta), 3), peak, band, w})
	}
	if err := writeText(c.stdout, table); err != nil {
		return err
	}
	fmt.Fprint(c.stdout, "\nDiffuse absorption coefficient by third octave\n")
	bands := [][]string{{"Hz"}}
	for _, a := range rows {
		bands[0] = append(bands[0], a.ID)
	}
	for i, b := range rows[0].Report.ThirdOctaves {
		row := []string{b.Nominal}
		for _, a := range rows {
			row = append(row, shown(a.Report.ThirdOctaves[i].Diffuse, 2))
		}
		bands = append(bands, row)
	}
	if err := writeText(c.stdout, bands); err != nil {
		return err
	}
	for _, a := range rows {
		for _, line := range oscillatorText(a) {
			fmt.Fprintf(c.stdout, "%s: %s\n", a.ID, line)
		}
	}
	for _, a := range rows {
		for _, w := range a.Report.Warnings {
			fmt.Fprintf(c.stdout, "%s: %s\n", a.ID, w)
		}
	}
	return nil
}

// oscillatorText says what mass, spring and loss an absorber is, and how near one
// unit comes to what it could take in.
func oscillatorText(a study.AbsorberRow) []string {
	if a.Report.Oscillator == nil {
		return nil
	}
	mass, spring, loss := a.Equivalent()
	lines := []string{fmt.Sprintf("mass %s, spring %s, loss %s", mass, spring, loss)}
	if s := a.Section; s != nil {
		lines = append(lines, fmt.Sprintf("one unit alone in a wall takes in %.2f m² of a plane wave at %.1f Hz, %.0f %% of the ceiling λ²/2π", s.Area, s.Hz, 100*s.Area/s.Ceiling))
	}
	return lines
}
