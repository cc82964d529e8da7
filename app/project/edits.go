package project

import (
	"math"
	"slices"

	"stillroom/acoustics"
)

// clear is how far things keep from the walls when they are moved, m.
const clear = 0.01

// Dimension returns the room's dimension along an axis (0 length, 1 width, 2 height), m.
func (r Room) Dimension(axis int) float64 { return [3]float64{r.Length, r.Width, r.Height}[axis] }

func (r Room) withDimension(axis int, m float64) Room {
	switch axis {
	case 0:
		r.Length = m
	case 1:
		r.Width = m
	default:
		r.Height = m
	}
	return r
}

// WithDimension returns the project with one dimension changed by moving the
// far wall, or the near one where near is true: then everything keeps its
// distance to the far wall. What would lie outside is moved in.
func (p Project) WithDimension(axis int, m float64, near bool) Project {
	shift := 0.0
	if near {
		shift = m - p.Room.Dimension(axis)
	}
	p.Room = p.Room.withDimension(axis, m)
	p.Loudspeakers = slices.Clone(p.Loudspeakers)
	for i := range p.Loudspeakers {
		p.Loudspeakers[i].At[axis] += shift
		p.Loudspeakers[i].At = p.Room.Inside(p.Loudspeakers[i].At)
	}
	p.Seats = slices.Clone(p.Seats)
	for i := range p.Seats {
		p.Seats[i].At[axis] += shift
		p.Seats[i].At = p.Room.Inside(p.Seats[i].At)
	}
	p.Absorbers = slices.Clone(p.Absorbers)
	for i, a := range p.Absorbers {
		axes := a.axes()
		for k, x := range axes {
			if x == axis {
				a.Centre[k] += shift
			}
		}
		p.Absorbers[i] = p.Room.Onto(a)
	}
	p.KeepOut = slices.Clone(p.KeepOut)
	for i, k := range p.KeepOut {
		a := Absorber{Surface: k.Surface, Centre: k.Centre, Size: k.Size, Units: 1}
		for n, x := range a.axes() {
			if x == axis {
				a.Centre[n] += shift
			}
			a.Size[n] = math.Min(a.Size[n], p.Room.Dimension(x))
		}
		a = p.Room.Onto(a)
		p.KeepOut[i].Centre, p.KeepOut[i].Size = a.Centre, a.Size
	}
	return p
}

// tidy takes the dust of binary arithmetic off a length.
func tidy(m float64) float64 { return math.Round(m*1e6) / 1e6 }

// Inside returns a point moved into the room where it lay outside.
func (r Room) Inside(at acoustics.Point) acoustics.Point {
	for i := range at {
		at[i] = tidy(math.Max(clear, math.Min(r.Dimension(i)-clear, at[i])))
	}
	return at
}

// Onto returns an absorber moved wholly onto its surface, as far as it fits.
func (r Room) Onto(a Absorber) Absorber {
	axes := a.axes()
	for k, axis := range axes {
		lo, hi := a.Extent()
		if over := hi[k] - r.Dimension(axis); over > 0 {
			a.Centre[k] -= over
			lo[k] -= over
		}
		if lo[k] < 0 {
			a.Centre[k] -= lo[k]
		}
		a.Centre[k] = tidy(a.Centre[k])
	}
	return a
}

// WithLoudspeaker returns the project with loudspeaker i put in place of the one
// there.
func (p Project) WithLoudspeaker(i int, l Loudspeaker) Project {
	p.Loudspeakers = slices.Clone(p.Loudspeakers)
	p.Loudspeakers[i] = l
	return p
}

// WithSeat returns the project with seat i replaced.
func (p Project) WithSeat(i int, s Seat) Project {
	p.Seats = slices.Clone(p.Seats)
	p.Seats[i] = s
	return p
}

// WithAbsorber returns the project with absorber i replaced.
func (p Project) WithAbsorber(i int, a Absorber) Project {
	p.Absorbers = slices.Clone(p.Absorbers)
	p.Absorbers[i] = a
	return p
}

// AddLoudspeaker returns the project with one more loudspeaker.
func (p Project) AddLoudspeaker(l Loudspeaker) Project {
	p.Loudspeakers = append(slices.Clone(p.Loudspeakers), l)
	return p
}

// AddSeat returns the project with one more seat.
func (p Project) AddSeat(s Seat) Project {
	p.Seats = append(slices.Clone(p.Seats), s)
	return p
}

// AddAbsorber returns the project with one more absorber.
func (p Project) AddAbsorber(a Absorber) Project {
	p.Absorbers = append(slices.Clone(p.Absorbers), a)
	return p
}

// WithoutLoudspeaker returns the project without loudspeaker i.
func (p Project) WithoutLoudspeaker(i int) Project {
	p.Loudspeakers = slices.Delete(slices.Clone(p.Loudspeakers), i, i+1)
	return p
}

// WithoutSeat returns the project without seat i.
func (p Project) WithoutSeat(i int) Project {
	p.Seats = slices.Delete(slices.Clone(p.Seats), i, i+1)
	return p
}

// WithoutAbsorber returns the project without absorber i.
func (p Project) WithoutAbsorber(i int) Project {
	p.Absorbers = slices.Delete(slices.Clone(p.Absorbers), i, i+1)
	return p
}

// WithLining returns the project with what one surface carries replaced.
func (p Project) WithLining(s acoustics.Surface, shares []FinishShare) Project {
	p.Room.Surfaces[s] = slices.Clone(shares)
	return p
}
