// Package resonators computes absorbers: from layers to a surface impedance,
// each kind that a joiner can build, the absorber as a damped oscillator, its
// absorption coefficients and their ratings, and the units it is to the room.
//
// Units are SI. Time factor exp(+jωt), so a decaying oscillation has a
// complex angular frequency ω with a positive imaginary part. A specific
// impedance is z = p/(ρc·v) with v into the face, so Re z ≥ 0 absorbs; an
// acoustic impedance is Z = p/U in Pa·s/m³. Impedances are analytic in ω
// near the positive real axis.
//
// Validity: sheets and frames that do not leak, rigid walls behind, linear
// losses (small amplitudes), porous layers as equivalent fluids in a rigid
// frame. What a kind leaves out is said where the kind is computed, and what
// matters for the values at hand is said in [Report.Warnings].
//
// Every figure is calculated; none is measured.
package resonators
