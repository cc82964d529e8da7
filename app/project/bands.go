package project

import (
	"slices"
	"strconv"

	"stillroom/acoustics"
	"stillroom/assets"
)

// nominalBands lists the nominal mid-band frequencies of IEC 61260-1 third
// octaves, 20 Hz to 20 kHz; those of the octaves are among them.
var nominalBands = []string{
	"20", "25", "31.5", "40", "50", "63", "80", "100", "125", "160",
	"200", "250", "315", "400", "500", "630", "800", "1000", "1250", "1600",
	"2000", "2500", "3150", "4000", "5000", "6300", "8000", "10000", "12500", "16000",
	"20000",
}

// BandNames lists the bands that a finish's absorption may be given for, by
// their names in the file, in rising frequency.
func BandNames() []string { return slices.Clone(nominalBands) }

// bandHz returns the nominal frequency that a band name says, and whether it is
// the name of a band.
func bandHz(name string) (float64, bool) {
	hz, err := strconv.ParseFloat(name, 64)
	return hz, err == nil && slices.Contains(nominalBands, name)
}

// bandNames lists the bands of a finish in rising frequency, what is no band
// last.
func (f Finish) bandNames() []string {
	var names []string
	for name := range f.Absorption {
		names = append(names, name)
	}
	slices.SortFunc(names, func(a, b string) int {
		i, j := slices.Index(nominalBands, a), slices.Index(nominalBands, b)
		switch {
		case i >= 0 && j >= 0:
			return i - j
		case i >= 0:
			return -1
		case j >= 0:
			return 1
		case a < b:
			return -1
		default:
			return 1
		}
	})
	return names
}

// Acoustic returns the finish as the physics wants it, rising in frequency.
func (f Finish) Acoustic() acoustics.Finish {
	out := acoustics.Finish{ID: f.ID, Name: f.Name, Source: f.Source}
	for _, name := range f.bandNames() {
		if hz, known := bandHz(name); known {
			out.Absorption = append(out.Absorption, acoustics.BandAbsorption{Hz: hz, Alpha: f.Absorption[name]})
		}
	}
	return out
}

// FinishByID returns the finish of that id: the file's own before the built-in
// ones.
func (p Project) FinishByID(id string) (acoustics.Finish, bool) {
	for _, f := range p.Finishes {
		if f.ID == id {
			return f.Acoustic(), true
		}
	}
	if f, found := assets.FinishByID(id); found {
		return f.Finish, true
	}
	return acoustics.Finish{}, false
}

// DefaultFinish returns the id of the finish that a surface with no entry has:
// the first of the file's own, else FallbackFinish.
func (p Project) DefaultFinish() string {
	if len(p.Finishes) > 0 {
		return p.Finishes[0].ID
	}
	return FallbackFinish
}

// Lining returns what a surface carries, the default finish where the file
// has no entry.
func (p Project) Lining(s acoustics.Surface) []FinishShare {
	if own := p.Room.Surfaces[s]; len(own) > 0 {
		return slices.Clone(own)
	}
	return []FinishShare{{Finish: p.DefaultFinish(), Share: 1}}
}
