// Package acoustics computes the sound field of a rectangular room at low
// frequencies: air, surfaces, modes and their damping, the level at a seat and
// the room with absorbers in it.
//
// Units are SI throughout: metres, hertz, kilograms, pascals, seconds. Only
// [Atmosphere] speaks in degrees Celsius, per cent and kilopascals, and says so
// in its field names.
//
// Axes: the origin lies in the floor corner that a listener who faces the
// front wall has ahead on the left. x runs along the length (front wall x = 0,
// back wall x = L), y along the width (left wall y = 0, right wall y = W), z up
// (floor 0, ceiling H).
//
// The time factor is exp(+jωt), so a decaying oscillation has a complex
// frequency with a positive imaginary part: exp(jωt) with ω = ω' + jδ decays
// as exp(−δt). The wave number is k = ω/c. A specific admittance is
// β = ρc·v/p with v into the boundary, so Re β > 0 absorbs. Levels are
// 20 log10 of pressure magnitudes.
//
// Validity: rigid-walled mode shapes with damping to first order in the wall
// admittances. That holds while the walls absorb little; light partitions both
// absorb and shift more than it says.
package acoustics
