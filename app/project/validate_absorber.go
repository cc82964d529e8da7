package project

import (
	"fmt"
	"math"
	"strings"

	"stillroom/acoustics"
)

func (c *checker) absorbers(p Project) {
	ids := c.ids("absorbers")
	for i, a := range p.Absorbers {
		path := item("absorbers", i)
		ids(i, a.ID)
		c.kind(path, a)
		c.fields(path, a.fields())
		if b := a.block(); b != nil {
			c.fields(join(path, a.Kind), b.fields())
		}
		c.build(path, a)
		c.onSurface(path, a, p.Room)
		for j, other := range p.Absorbers[:i] {
			c.apart(path, item("absorbers", j), a, other)
		}
	}
}

// kind checks that the absorber has the block of its kind and no other.
func (c *checker) kind(path string, a Absorber) {
	if !contains(Kinds(), a.Kind) {
		c.add(join(path, "kind"), "must be one of "+strings.Join(Kinds(), ", "), quoted(a.Kind))
		return
	}
	for _, b := range a.blocks() {
		switch {
		case b.kind == a.Kind && !b.set:
			c.add(join(path, b.kind), "is required for this kind", "")
		case b.kind != a.Kind && b.set:
			c.add(join(path, b.kind), "must not stand beside kind "+quoted(a.Kind), "")
		}
	}
}

// build checks that the parts of an absorber fit each other.
func (c *checker) build(path string, a Absorber) {
	at := func(key string) string { return join(join(path, a.Kind), key) }
	switch {
	case a.block() == nil:
	case a.Kind == "neck":
		c.mouths(path, a)
	case a.Kind == "panel":
		c.fill(at("fill"), at("cavity_mm"), a.Panel.Fill, a.Panel.CavityMM)
	case a.Kind == "perforated":
		c.holes(at("hole_mm"), at("pitch_mm"), a.Perforated.HoleMM, a.Perforated.PitchMM)
		c.fill(at("fill"), at("cavity_mm"), a.Perforated.Fill, a.Perforated.CavityMM)
	case a.Kind == "slotted":
		c.fill(at("fill"), at("cavity_mm"), a.Slotted.Fill, a.Slotted.CavityMM)
	case a.Kind == "microperforated":
		c.holes(at("hole_mm"), at("pitch_mm"), a.Microperforated.HoleMM, a.Microperforated.PitchMM)
	}
}

// fill checks that a fill finds room in its cavity.
func (c *checker) fill(path, cavity string, f *Fill, cavityMM float64) {
	if f == nil {
		return
	}
	thickness := join(path, "thickness_mm")
	if f.ThicknessMM > cavityMM && c.fine(thickness, cavity) {
		c.add(thickness, "must be no thicker than its cavity, "+numberText(cavityMM), numberText(f.ThicknessMM))
	}
}

// holes checks that something is left of the sheet between the holes.
func (c *checker) holes(hole, pitch string, holeMM, pitchMM float64) {
	if holeMM >= pitchMM && c.fine(hole, pitch) {
		c.add(hole, "must be smaller than the pitch, "+numberText(pitchMM), numberText(holeMM))
	}
}

// mouths checks that the mouths of a neck box find room in its front: each
// within the smaller side, and all together within half of the area, beyond
// which the end correction of a mouth in the box no longer means anything.
func (c *checker) mouths(path string, a Absorber) {
	size := join(path, "size_m")
	diameter := join(path, "neck.mouth_diameter_mm")
	if !c.fine(size, diameter, join(path, "neck.mouths")) {
		return
	}
	side := 1000 * min(a.Size[0], a.Size[1])
	if a.Neck.MouthDiameterMM > side+touchTolerance {
		c.add(diameter, "must fit into the box's front, "+numberText(side)+" across", numberText(a.Neck.MouthDiameterMM))
		return
	}
	radius := a.Neck.MouthDiameterMM / 2000
	open := float64(a.Neck.Mouths) * math.Pi * radius * radius
	if front := a.Size[0] * a.Size[1]; open > front/2 {
		c.add(diameter, fmt.Sprintf("the mouths must leave half of the box's front closed, they open %.0f %% of it", 100*open/front),
			numberText(a.Neck.MouthDiameterMM))
	}
}

// Extent returns the rectangle on its surface that all units of the absorber
// take up: the least and the greatest of the two coordinates, in metres.
func (a Absorber) Extent() (low, high [2]float64) {
	for i := range 2 {
		low[i] = a.Centre[i] - a.Size[i]/2
		high[i] = a.Centre[i] + a.Size[i]/2
	}
	high[0] = a.Centre[0] + (float64(a.Units)-0.5)*a.Size[0]
	return low, high
}

// onSurface checks that all units lie on the surface.
func (c *checker) onSurface(path string, a Absorber, r Room) {
	if a.Surface < acoustics.Front || a.Surface > acoustics.Ceiling {
		c.add(join(path, "surface"), "must be one of "+strings.Join(surfaceNames(), ", "), fmt.Sprint(int(a.Surface)))
		return
	}
	centre := join(path, "centre_m")
	for i, v := range a.Centre {
		if !finite(v) {
			c.add(item(centre, i), "must be a finite number", numberText(v))
		}
	}
	if !c.fine(centre, join(path, "size_m"), join(path, "units"), join(path, "surface"), "room") {
		return
	}
	low, high := a.Extent()
	axes := a.axes()
	for i, axis := range axes {
		f := r.fields()[axis]
		far := *f.to.(*float64)
		if low[i] < -touchTolerance || high[i] > far+touchTolerance {
			c.add(item(centre, i), fmt.Sprintf("all units must lie on the surface, between 0 and %s, they reach from %s to %s",
				numberText(far), short(low[i]), short(high[i])), numberText(a.Centre[i]))
		}
	}
}

// axes returns the room axes of the absorber's two coordinates.
func (a Absorber) axes() [2]int {
	first, second := a.Surface.InPlane()
	return [2]int{first, second}
}

// apart checks that two absorbers of one surface do not overlap.
func (c *checker) apart(path, otherPath string, a, other Absorber) {
	if Overlap(a, other) && c.fine(path, otherPath) {
		c.add(join(path, "centre_m"), "must not overlap "+otherPath+" ("+other.ID+") on the same surface",
			"["+numberText(a.Centre[0])+", "+numberText(a.Centre[1])+"]")
	}
}

// Overlap reports whether two absorbers take up a common part of one surface.
// Those that only touch do not.
func Overlap(a, b Absorber) bool {
	if a.Surface != b.Surface {
		return false
	}
	aLow, aHigh := a.Extent()
	bLow, bHigh := b.Extent()
	for i := range 2 {
		if aHigh[i] <= bLow[i]+touchTolerance || bHigh[i] <= aLow[i]+touchTolerance {
			return false
		}
	}
	return true
}

// short writes a length to the micrometre for a message.
func short(m float64) string { return numberText(math.Round(m*1e6) / 1e6) }
