package resonators

import "stillroom/acoustics"

// registry lists one of each kind of absorber. A new kind is a file of its own and a
// line here.
func registry() []details {
	return []details{
		Neck{},
		Panel{},
		Perforated{},
		Slotted{},
		Microperforated{},
		Porous{},
	}
}

// Kinds returns one of each kind of absorber, without dimensions.
func Kinds() []Absorber {
	var list []Absorber
	for _, d := range registry() {
		list = append(list, d)
	}
	return list
}

// details is what each kind answers of itself beside its impedance.
type details interface {
	Absorber
	// dimensions lists what the resonance may depend on.
	dimensions() []dimension
	// refilled returns the absorber, changed from what it was in one dimension, with a
	// cavity that was full still full.
	refilled(was Absorber) Absorber
	// sized returns the absorber with what it takes from its unit's size (m) filled in,
	// and with nothing shared.
	sized(size [2]float64) Absorber
	// warnings says in plain sentences where the model is outside its range.
	warnings(air acoustics.Air, o *acoustics.Oscillator) []string
	// whole returns the piece that a unit is to the room, and false where it is to be
	// cut into tiles.
	whole(unit acoustics.Patch) (acoustics.Patch, bool)
}

// detailsOf returns the details of an absorber; one from elsewhere has none.
func detailsOf(a Absorber) details {
	if d, ok := a.(details); ok {
		return d
	}
	return foreign{a}
}

// foreign is an absorber of none of the kinds, known by its impedance alone.
type foreign struct{ Absorber }

func (f foreign) dimensions() []dimension                                { return nil }
func (f foreign) refilled(Absorber) Absorber                             { return f.Absorber }
func (f foreign) sized([2]float64) Absorber                              { return f.Absorber }
func (f foreign) warnings(acoustics.Air, *acoustics.Oscillator) []string { return nil }
func (f foreign) whole(at acoustics.Patch) (acoustics.Patch, bool)       { return at, false }
