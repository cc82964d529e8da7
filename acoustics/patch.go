package acoustics

import "math"

// Patch is a rectangle on a surface, or a box's round mouths at its centre.
type Patch struct {
	Surface Surface
	Centre  [2]float64 // along the surface's in-plane axes, m
	Size    [2]float64 // m; for mouths ignored
	// MouthRadius > 0 makes the patch Mouths round mouths of that radius
	// (m) which act as one opening at Centre.
	MouthRadius float64
	Mouths      int
}

// Area returns the area through which the patch moves air, in m².
func (p Patch) Area() float64 {
	if p.MouthRadius > 0 {
		return float64(p.Mouths) * math.Pi * p.MouthRadius * p.MouthRadius
	}
	return p.Size[0] * p.Size[1]
}

// sides returns the sides of the rectangle over which the patch's means are
// taken, in m: for mouths the square of their whole area.
func (p Patch) sides() [2]float64 {
	if p.MouthRadius > 0 {
		side := math.Sqrt(p.Area())
		return [2]float64{side, side}
	}
	return p.Size
}

// spans returns the patch's extent along the three axes.
func (p Patch) spans(b Box) [3]span {
	var (
		s     [3]span
		sides = p.sides()
		i, j  = p.Surface.InPlane()
	)
	s[i] = span{p.Centre[0], sides[0]}
	s[j] = span{p.Centre[1], sides[1]}
	if p.Surface.Far() {
		n := p.Surface.Normal()
		s[n] = span{centre: b.Dimensions()[n]}
	}
	return s
}

// Mean returns û, the mean of ψ of a mode over a patch, −1…1: a cosine at the
// patch's centre times a sine over its argument for each direction. Round mouths
// count as a square of their whole area.
func (b Box) Mean(m Mode, p Patch) float64 { return meanOver(b, m, p.spans(b)) }

// meanOver returns the mean of ψ of a mode over a port of the given extent.
func meanOver(b Box, m Mode, port [3]span) float64 {
	v := 1.0
	for axis, s := range port {
		if n := m.Order[axis]; n != 0 {
			v *= s.meanCos(float64(n) * math.Pi / b.Dimensions()[axis])
		}
	}
	return v
}

// mouthCorrection returns what turns the static self term of the square of equal
// area into that of round mouths, in 1/m: the difference of the two in a rigid
// half-space, 0 for a rectangle. Further off than its own size a mouth and its
// square are alike.
func (p Patch) mouthCorrection() float64 {
	if p.MouthRadius <= 0 {
		return 0
	}
	s := p.sides()
	return 8/(3*math.Pi*math.Pi*p.MouthRadius)/float64(p.Mouths) - rectangleSelfTerm(s[0], s[1])
}

// rectangleSelfTerm returns the mean over a rectangle w × h in a rigid plane of
// the mean of 1/(2πR) over the same rectangle, in 1/m,
//
//	I/(2πA²), I = ⅔(w³ + h³ − (w²+h²)^{3/2}) + 2wh·(w·asinh(h/w) + h·asinh(w/h))
//
// which times A is the rectangle's end correction as a piston: 0.4732·w for a
// square.
func rectangleSelfTerm(w, h float64) float64 {
	var (
		d = math.Hypot(w, h)
		i = 2./3*(w*w*w+h*h*h-d*d*d) + 2*w*h*(w*math.Asinh(h/w)+h*math.Asinh(w/h))
	)
	return i / (2 * math.Pi * w * w * h * h)
}

// Unit is one absorber unit as the room knows it: a place and an admittance.
type Unit struct {
	Patch Patch
	// Impedance returns the acoustic impedance Z = p/U in Pa·s/m³ at the
	// complex angular frequency omega (rad/s), without the outer air mass of
	// round mouths, which the room supplies. It must be analytic near the real
	// axis and safe for concurrent use.
	Impedance func(omega complex128) complex128
	// Natural is the frequency in Hz near which Z has its own resonance, by the
	// absorber's own reckoning; 0 where it has none (broadband).
	Natural float64
	// Owner is the index of the absorber the unit belongs to.
	Owner int
	// Tile says that the unit is one of several alike that a wide absorber is cut
	// into: those of one owner have one size and one impedance.
	Tile bool
}
