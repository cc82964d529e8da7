// Package tuning finds absorbers for one mode of a room: how strongly an
// absorber at a spot is coupled to the mode, what damping serves it best, how
// much box or panel is needed for a decay that is asked for, and buildable
// boxes and panels with the spot they go to.
//
// The mode and the absorber are two coupled oscillators,
//
//	(ω_n² − ω² + 2jδ_nω)·(ω_a² − ω² + 2jδ_aω) = μ·ω²·ω_a²
//
// with the coupling ratio μ (Fahy & Schofield, J. Sound Vib. 72 (1980) 365).
// What follows from that is a starting point: the other modes, and an absorber
// strong enough to reach them, are the treated room's affair.
package tuning
