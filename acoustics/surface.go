package acoustics

import "fmt"

// Surface names one of the six faces of the room.
type Surface int

// The six surfaces, in the order in which every array indexed by Surface runs.
const (
	Front   Surface = iota // x = 0
	Back                   // x = L
	Left                   // y = 0
	Right                  // y = W
	Floor                  // z = 0
	Ceiling                // z = H
)

var surfaceNames = [6]string{"front", "back", "left", "right", "floor", "ceiling"}

// Surfaces returns the six surfaces in order.
func Surfaces() [6]Surface { return [6]Surface{Front, Back, Left, Right, Floor, Ceiling} }

// String returns the lower-case name used in project files.
func (s Surface) String() string {
	if s < Front || s > Ceiling {
		return fmt.Sprintf("surface %d", int(s))
	}
	return surfaceNames[s]
}

// SurfaceNamed returns the surface of that lower-case name.
func SurfaceNamed(name string) (Surface, bool) {
	for i, n := range surfaceNames {
		if n == name {
			return Surface(i), true
		}
	}
	return 0, false
}

// Normal returns the axis (0 x, 1 y, 2 z) the surface stands across.
func (s Surface) Normal() int { return int(s) / 2 }

// Far reports whether the surface lies at the far end of its normal axis
// (back, right, ceiling).
func (s Surface) Far() bool { return s%2 == 1 }

// InPlane returns the two axes that run along the surface, in the order in
// which positions on it are given: front and back (y, z), left and right
// (x, z), floor and ceiling (x, y).
func (s Surface) InPlane() (first, second int) {
	switch s.Normal() {
	case 0:
		return 1, 2
	case 1:
		return 0, 2
	default:
		return 0, 1
	}
}

// Point is a position in the room in metres, (x, y, z).
type Point [3]float64

// Box is the rectangular room: inside length, width and height in metres.
type Box struct{ Length, Width, Height float64 }

// Dimensions returns the three dimensions in axis order, in metres.
func (b Box) Dimensions() [3]float64 { return [3]float64{b.Length, b.Width, b.Height} }

// Volume returns the volume in m³.
func (b Box) Volume() float64 { return b.Length * b.Width * b.Height }

// Area returns the area of one surface in m².
func (b Box) Area(s Surface) float64 {
	d := b.Dimensions()
	i, j := s.InPlane()
	return d[i] * d[j]
}

// SurfaceArea returns the area of all six surfaces in m².
func (b Box) SurfaceArea() float64 {
	return 2 * (b.Length*b.Width + b.Length*b.Height + b.Width*b.Height)
}

// OnSurface returns the room point at (u, v) on a surface, in metres along
// the surface's two in-plane axes.
func (b Box) OnSurface(s Surface, u, v float64) Point {
	var p Point
	i, j := s.InPlane()
	p[i], p[j] = u, v
	if s.Far() {
		p[s.Normal()] = b.Dimensions()[s.Normal()]
	}
	return p
}
