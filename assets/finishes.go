package assets

import (
	"cmp"
	_ "embed"
	"encoding/json"
	"fmt"
	"slices"
	"strconv"
	"sync"

	"stillroom/acoustics"
)

// Finish is an ordinary surface of the built-in list.
type Finish struct {
	acoustics.Finish
	Group string // "masonry", "boards", …
	// Caution is a plain sentence where the figures at low frequencies are
	// uncertain, else empty.
	Caution string
}

//go:embed finishes.json
var finishesJSON []byte

// table reads the list once; the file is part of the program, and a test reads
// it too, so a fault in it is ours.
var table = sync.OnceValue(func() []Finish {
	list, err := readFinishes(finishesJSON)
	if err != nil {
		panic("assets: " + err.Error())
	}
	return list
})

// Finishes returns the built-in finishes in the order of the list.
func Finishes() []Finish { return slices.Clone(table()) }

// FinishByID returns the built-in finish of that id.
func FinishByID(id string) (Finish, bool) {
	for _, f := range table() {
		if f.ID == id {
			return f, true
		}
	}
	return Finish{}, false
}

// readFinishes reads and checks a list of finishes.
func readFinishes(data []byte) ([]Finish, error) {
	var rows []struct {
		ID, Name, Group, Source, Caution string
		Absorption                       map[string]float64
	}
	if err := json.Unmarshal(data, &rows); err != nil {
		return nil, fmt.Errorf("finishes: %w", err)
	}
	var list []Finish
	seen := map[string]bool{}
	for i, r := range rows {
		f := Finish{Group: r.Group, Caution: r.Caution}
		f.ID, f.Name, f.Source = r.ID, r.Name, r.Source
		if r.ID == "" || r.Name == "" || r.Source == "" || r.Group == "" {
			return nil, fmt.Errorf("finishes[%d] %q: id, name, group and source must not be empty", i, r.ID)
		}
		if seen[r.ID] {
			return nil, fmt.Errorf("finishes[%d] %q: the id is there twice", i, r.ID)
		}
		seen[r.ID] = true
		for band, alpha := range r.Absorption {
			hz, err := strconv.ParseFloat(band, 64)
			if err != nil || hz < 20 || hz > 20000 {
				return nil, fmt.Errorf("finishes[%d] %q: %q is no band", i, r.ID, band)
			}
			if !(alpha >= 0 && alpha <= 1) {
				return nil, fmt.Errorf("finishes[%d] %q: absorption at %s Hz must be between 0 and 1, is %g", i, r.ID, band, alpha)
			}
			f.Absorption = append(f.Absorption, acoustics.BandAbsorption{Hz: hz, Alpha: alpha})
		}
		slices.SortFunc(f.Absorption, func(a, b acoustics.BandAbsorption) int { return cmp.Compare(a.Hz, b.Hz) })
		list = append(list, f)
	}
	return list, nil
}
