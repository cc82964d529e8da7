package resonators

import "stillroom/acoustics"

// Absorber is what every kind answers. All values are plain and immutable.
type Absorber interface {
	// Kind is the name used in project files.
	Kind() string
	// Specific returns the normal-incidence specific impedance z of the face
	// (for a neck box Z·w·h/ρc over its front, with its outer end correction).
	Specific(omega complex128, air acoustics.Air) complex128
	// InRoom returns the acoustic impedance Z = p/U of a unit or tile of the
	// given area (m², ignored by necks) as acoustics.Unit wants it.
	InRoom(omega complex128, area float64, air acoustics.Air) complex128
	// Validate returns nil, or all *ValueError of the absorber joined.
	Validate() error
}

// layered is an absorber that is a thin front over a cavity of layers.
type layered interface {
	Absorber
	// front returns the impedance of what stands before the cavity, p/v in
	// Pa·s/m, the same at every angle of incidence.
	front(omega complex128, air acoustics.Air) complex128
	// cavity returns the layers behind the front.
	cavity() cavity
	// extended reports whether sound may travel sideways inside the cavity;
	// where it may not the face is locally reacting.
	extended() bool
}

var (
	_ layered = Panel{}
	_ layered = Perforated{}
	_ layered = Slotted{}
	_ layered = Microperforated{}
	_ layered = Porous{}
)

// faceSpecific returns the specific impedance of a layered absorber at normal
// incidence,
//
//	z = (Z_front + Z_cavity)/ρc
//
// Without loss of passivity on the real axis: a resistance that the model of
// a porous layer makes negative there counts as none.
func faceSpecific(a layered, omega complex128, air acoustics.Air) complex128 {
	onAxis := imag(omega) == 0
	z := a.front(omega, air) + 1/a.cavity().at(omega, air).admittance(0, onAxis)
	if onAxis {
		z = passive(z)
	}
	return z / complex(air.Density*air.SpeedOfSound, 0)
}

// faceInRoom returns the acoustic impedance of an area (m²) of the face.
func faceInRoom(a layered, omega complex128, area float64, air acoustics.Air) complex128 {
	if area <= 0 {
		panic("resonators: InRoom wants an area above zero")
	}
	return faceSpecific(a, omega, air) * complex(air.Density*air.SpeedOfSound/area, 0)
}

// passive returns z with a negative resistance set to zero.
func passive(z complex128) complex128 {
	if real(z) < 0 {
		return complex(0, imag(z))
	}
	return z
}

// fitted returns a with the dimensions that a kind takes from its unit's size
// filled in where they are not set, and with nothing shared with the caller.
func fitted(a Absorber, size [2]float64) Absorber { return detailsOf(a).sized(size) }
