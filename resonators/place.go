package resonators

import (
	"math"

	"stillroom/acoustics"
)

// Placement is where an absorber's units are: the centre of the first, the
// size of one, and how many stand beside it in the direction of the rising first
// coordinate, touching.
type Placement struct {
	Surface acoustics.Surface
	Centre  [2]float64 // m
	Size    [2]float64 // m
	Units   int
}

// tileSide is the greatest side of a tile, m: a sixth of the wave at 250 Hz,
// the upper end of the range in which rooms are treated mode by mode.
const tileSide = 343.0 / 250 / 6

// PlaceUnits returns the absorber's units as the room knows them. A neck box is
// one unit, its mouths as one opening at its centre; a panel is one unit whole,
// since its sheet moves as one; every other wide kind is cut into equal tiles.
func PlaceUnits(a Absorber, air acoustics.Air, at Placement, owner int) []acoustics.Unit {
	return PlaceCoarse(a, air, at, owner, 1)
}

// PlaceCoarse returns the units with tiles coarser by a factor on each side: for a
// preview while something moves.
func PlaceCoarse(a Absorber, air acoustics.Air, at Placement, owner int, coarser float64) []acoustics.Unit {
	if at.Units < 1 {
		panic("resonators: a placement has one unit or more")
	}
	a = fitted(a, at.Size)
	natural, _ := resonance(a, air)
	_, isOne := detailsOf(a).whole(acoustics.Patch{})
	var units []acoustics.Unit
	for i := range at.Units {
		centre := [2]float64{at.Centre[0] + float64(i)*at.Size[0], at.Centre[1]}
		for _, p := range patches(a, acoustics.Patch{Surface: at.Surface, Centre: centre, Size: at.Size}, coarser) {
			area := p.Size[0] * p.Size[1]
			units = append(units, acoustics.Unit{
				Patch: p,
				Impedance: func(omega complex128) complex128 {
					return a.InRoom(omega, area, air)
				},
				Natural: natural,
				Owner:   owner,
				Tile:    !isOne,
			})
		}
	}
	return units
}

// UnitAlone returns the first piece of an absorber's first unit as the room knows
// it, its own resonance not looked for (Natural is 0).
func UnitAlone(a Absorber, air acoustics.Air, at Placement) acoustics.Unit {
	a = fitted(a, at.Size)
	p := patches(a, acoustics.Patch{Surface: at.Surface, Centre: at.Centre, Size: at.Size}, 1)[0]
	area := p.Size[0] * p.Size[1]
	return acoustics.Unit{Patch: p, Impedance: func(omega complex128) complex128 { return a.InRoom(omega, area, air) }}
}

// patches returns the pieces of one unit.
func patches(a Absorber, whole acoustics.Patch, coarser float64) []acoustics.Patch {
	one, isOne := detailsOf(a).whole(whole)
	if isOne {
		return []acoustics.Patch{one}
	}
	nu, nv := tiles(whole.Size[0]/coarser), tiles(whole.Size[1]/coarser)
	side := [2]float64{whole.Size[0] / float64(nu), whole.Size[1] / float64(nv)}
	var out []acoustics.Patch
	for i := range nu {
		for j := range nv {
			p := whole
			p.Size = side
			p.Centre[0] += (float64(i) - float64(nu-1)/2) * side[0]
			p.Centre[1] += (float64(j) - float64(nv-1)/2) * side[1]
			out = append(out, p)
		}
	}
	return out
}

// tiles returns how many tiles a side (m) is cut into.
func tiles(side float64) int { return max(1, int(math.Ceil(side/tileSide))) }

// AsWhole returns all units of an absorber as the room would know them as one piston:
// for reckoning where it resonates in its place.
func AsWhole(a Absorber, air acoustics.Air, at Placement) acoustics.Unit {
	if _, isOne := detailsOf(a).whole(acoustics.Patch{}); isOne {
		return UnitAlone(a, air, at)
	}
	row := [2]float64{at.Size[0] * float64(at.Units), at.Size[1]}
	area := row[0] * row[1]
	return acoustics.Unit{
		Patch: acoustics.Patch{Surface: at.Surface,
			Centre: [2]float64{at.Centre[0] + float64(at.Units-1)/2*at.Size[0], at.Centre[1]}, Size: row},
		Impedance: func(omega complex128) complex128 { return a.InRoom(omega, area, air) },
	}
}
