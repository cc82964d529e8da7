// Package resonators computes absorbers: from layers to a surface impedance,
// each kind that a joiner can build, the absorber as a damped oscillator, its
// absorption coefficients and their ratings, and the units it is to the room.
//
// Units are SI. Time factor exp(+jωt). A specific impedance is z = p/(ρc·v)
// with v into the face, so Re z ≥ 0 absorbs; an acoustic impedance is
// Z = p/U in Pa·s/m³.
package resonators
