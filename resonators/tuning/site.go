package tuning

import (
	"math"

	"stillroom/acoustics"
	"stillroom/resonators"
)

// squaredStrength returns the sum of û² over the units of a placement, û the
// mean of the mode's shape over a unit.
func squaredStrength(b acoustics.Box, m acoustics.Mode, at resonators.Placement) float64 {
	var sum float64
	for i := range at.Units {
		c := at.Centre
		c[0] += float64(i) * at.Size[0]
		sum += sq(b.Mean(m, acoustics.Patch{Surface: at.Surface, Centre: c, Size: at.Size}))
	}
	return sum
}

// block is a box in the room, from its lower to its upper corner, m.
type block struct{ lo, hi acoustics.Point }

// blockOf returns the space that a rectangle of a surface takes with its depth.
func blockOf(b acoustics.Box, s acoustics.Surface, centre, size [2]float64, depth float64) block {
	var k block
	i, j := s.InPlane()
	k.lo[i], k.hi[i] = centre[0]-size[0]/2, centre[0]+size[0]/2
	k.lo[j], k.hi[j] = centre[1]-size[1]/2, centre[1]+size[1]/2
	n := s.Normal()
	if s.Far() {
		end := b.Dimensions()[n]
		k.lo[n], k.hi[n] = end-depth, end
	} else {
		k.hi[n] = depth
	}
	return k
}

// clearance is what two things may overlap by and still count as touching, m.
const clearance = 1e-6

func (k block) overlaps(o block) bool {
	for i := range 3 {
		if k.hi[i] <= o.lo[i]+clearance || o.hi[i] <= k.lo[i]+clearance {
			return false
		}
	}
	return true
}

// flush is the depth given to what is flush with its surface, m, so that it
// still keeps others off.
const flush = 1e-3

// siteStep is the grid on which spots are tried, beside the edges of the
// surface and of what stands there, m.
const siteStep = 0.1

// site returns where a row of units is coupled most strongly to the mode:
// wholly on the surface, clear of all that is taken. Of spots equally strong it
// is the lowest in the first coordinate, then in the second. False where there
// is no room.
func (p Problem) site(s acoustics.Surface, size [2]float64, units int, depth float64) (resonators.Placement, float64, bool) {
	i, j := s.InPlane()
	d := p.Box.Dimensions()
	if depth > d[s.Normal()] {
		return resonators.Placement{}, 0, false
	}
	row := [2]float64{size[0] * float64(units), size[1]}
	taken := p.taken()
	best := -1.0
	var where resonators.Placement
	for _, u := range p.starts(d[i], row[0], i, taken) {
		for _, v := range p.starts(d[j], row[1], j, taken) {
			at := resonators.Placement{
				Surface: s,
				Centre:  [2]float64{u + size[0]/2, v + size[1]/2},
				Size:    size,
				Units:   units,
			}
			strength := squaredStrength(p.Box, p.Mode.Mode, at)
			if strength <= best*(1+1e-9) {
				continue
			}
			k := blockOf(p.Box, s, [2]float64{u + row[0]/2, v + row[1]/2}, row, depth)
			if isFree(k, taken) {
				best, where = strength, at
			}
		}
	}
	return where, best, best > 0
}

func isFree(k block, taken []block) bool {
	for _, t := range taken {
		if k.overlaps(t) {
			return false
		}
	}
	return true
}

// taken returns the space that is occupied.
func (p Problem) taken() []block {
	var out []block
	for _, o := range p.Occupied {
		out = append(out, blockOf(p.Box, o.Surface, o.Centre, o.Size, math.Max(o.Depth, flush)))
	}
	return out
}

// starts returns where a row of the given length may begin along an axis.
func (p Problem) starts(length, row float64, axis int, taken []block) []float64 {
	last := length - row
	if last < -clearance {
		return nil
	}
	last = math.Max(last, 0)
	var out []float64
	for k := 0; float64(k)*siteStep < last-clearance; k++ {
		out = append(out, float64(k)*siteStep)
	}
	out = append(out, last)
	for _, t := range taken {
		for _, x := range [2]float64{t.hi[axis], t.lo[axis] - row} {
			if x >= 0 && x <= last {
				out = append(out, x)
			}
		}
	}
	return out
}
