package acoustics

import (
	"cmp"
	"fmt"
	"math"
	"slices"
)

// Kind says how many axes a mode runs along.
type Kind int

// Kinds of mode. Uniform is the (0,0,0) mode, which no table lists.
const (
	Uniform Kind = iota
	Axial
	Tangential
	Oblique
)

// String returns "uniform", "axial", "tangential" or "oblique".
func (k Kind) String() string {
	switch k {
	case Uniform:
		return "uniform"
	case Axial:
		return "axial"
	case Tangential:
		return "tangential"
	case Oblique:
		return "oblique"
	}
	return fmt.Sprintf("kind %d", int(k))
}

// Mode is one mode of the rigid room,
//
//	ψ = cos(n_x πx/L)·cos(n_y πy/W)·cos(n_z πz/H)
type Mode struct {
	Order [3]int
	Hz    float64 // natural frequency
	Norm  float64 // Λ = ⟨ψ²⟩
}

// Kind returns the kind of the mode.
func (m Mode) Kind() Kind {
	var k Kind
	for _, n := range m.Order {
		if n != 0 {
			k++
		}
	}
	return k
}

// String returns the order, "(1,0,0)".
func (m Mode) String() string {
	return fmt.Sprintf("(%d,%d,%d)", m.Order[0], m.Order[1], m.Order[2])
}

// Modes returns the modes of the rigid room up to and including a frequency in
// Hz, c being the speed of sound in m/s,
//
//	f = (c/2)·√((n_x/L)² + (n_y/W)² + (n_z/H)²)
//
// without the uniform one, rising in frequency and, where two are equal, in
// order number from the length on. Rooms that are each other's with their
// axes exchanged have the same frequencies to the last bit.
//
// Source: Kuttruff, Room Acoustics, ch. 3.
func (b Box) Modes(c, upTo float64) []Mode {
	b.check(c)
	if !(upTo > 0) {
		return nil
	}
	if math.IsInf(upTo, 1) {
		panic("acoustics: modes up to infinity")
	}
	var (
		squares = b.orderSquares(c, upTo)
		_, size = b.CountBelow(c, upTo)
		modes   = make([]Mode, 0, int(1.05*size)+16)
	)
	for i, x := range squares[0] {
		for j, y := range squares[1] {
			for k, z := range squares[2] {
				hz := frequency(c, x, y, z)
				if hz > upTo {
					break
				}
				modes = append(modes, Mode{Order: [3]int{i, j, k}, Hz: hz, Norm: norm(i) * norm(j) * norm(k)})
			}
		}
	}
	modes = modes[1:] // the uniform one came first
	slices.SortFunc(modes, byFrequency)
	return modes
}

// byFrequency sorts modes by frequency, then by order number.
func byFrequency(a, b Mode) int {
	switch {
	case a.Hz < b.Hz:
		return -1
	case a.Hz > b.Hz:
		return 1
	}
	for i, n := range a.Order {
		if d := cmp.Compare(n, b.Order[i]); d != 0 {
			return d
		}
	}
	return 0
}

// orderSquares lists, for each axis, (n/l)² in 1/m² for every order whose axial
// mode lies up to the frequency, and one more.
func (b Box) orderSquares(c, upTo float64) (squares [3][]float64) {
	for axis, l := range b.Dimensions() {
		n := int(2*upTo*l/c) + 2
		squares[axis] = make([]float64, n)
		for i := range squares[axis] {
			q := float64(i) / l
			squares[axis][i] = q * q
		}
	}
	return squares
}

// frequency returns (c/2)·√(x+y+z), adding from the smallest up so that the
// result does not depend on which axis is which.
func frequency(c, x, y, z float64) float64 {
	if x > y {
		x, y = y, x
	}
	if y > z {
		y, z = z, y
	}
	if x > y {
		x, y = y, x
	}
	return c / 2 * math.Sqrt(x+y+z)
}

// norm returns the mean of cos² over an axis: 1 for order 0, else ½.
func norm(order int) float64 {
	if order == 0 {
		return 1
	}
	return 0.5
}

// UniformMode returns the mode (0,0,0): at 0 Hz, of the same pressure all over
// the room. No table lists it, but it belongs in every sum.
func (b Box) UniformMode() Mode { return Mode{Norm: 1} }

// Value returns ψ of a mode at a point in the room, −1…1.
func (b Box) Value(m Mode, p Point) float64 {
	v := 1.0
	for axis, l := range b.Dimensions() {
		if n := m.Order[axis]; n != 0 {
			v *= math.Cos(float64(n) * math.Pi * p[axis] / l)
		}
	}
	return v
}

// WallIntegral returns ∫ψ² dS of a mode over a surface, in m²: the surface's
// area, halved for each of its two axes along which the mode runs.
func (b Box) WallIntegral(m Mode, s Surface) float64 {
	i, j := s.InPlane()
	return b.Area(s) * norm(m.Order[i]) * norm(m.Order[j])
}

// check panics where a box or speed of sound is none.
func (b Box) check(c float64) {
	for _, l := range b.Dimensions() {
		if !(l > 0) || math.IsInf(l, 1) {
			panic(fmt.Sprintf("acoustics: no room of %g × %g × %g m", b.Length, b.Width, b.Height))
		}
	}
	if !(c > 0) || math.IsInf(c, 1) {
		panic(fmt.Sprintf("acoustics: no speed of sound of %g m/s", c))
	}
}
