package acoustics

import "math"

// CountBelow returns the number of modes below a frequency in Hz without the
// uniform one, c in m/s: counted one by one, and the asymptote
//
//	N = (4π/3)·V·(f/c)³ + (π/4)·S·(f/c)² + (ℓ/8)·(f/c)
//
// with the volume V, the area S of all surfaces and the length ℓ = 4(L+W+H) of
// all edges.
//
// Source: Maa, J. Acoust. Soc. Am. 10 (1939) 235; Bolt, ibid. 228; Kuttruff,
// Room Acoustics, eq. 3.20.
func (b Box) CountBelow(c, hz float64) (exact int, asymptote float64) {
	b.check(c)
	if !(hz > 0) {
		return 0, 0
	}
	if math.IsInf(hz, 1) {
		panic("acoustics: modes up to infinity")
	}
	q := hz / c
	asymptote = q * (b.edges()/8 + q*(math.Pi/4*b.SurfaceArea()+q*4*math.Pi/3*b.Volume()))

	squares := b.orderSquares(c, hz)
	for _, x := range squares[0] {
		// Along z the last order below hz falls as y's order rises.
		k := len(squares[2])
		for _, y := range squares[1] {
			for k > 0 && frequency(c, x, y, squares[2][k-1]) >= hz {
				k--
			}
			if k == 0 {
				break
			}
			exact += k
		}
	}
	return exact - 1, asymptote
}

// ModeDensity returns dN/df in 1/Hz, the derivative of the asymptote of
// [Box.CountBelow] at a frequency in Hz, c in m/s.
func (b Box) ModeDensity(c, hz float64) float64 {
	b.check(c)
	q := hz / c
	return (b.edges()/8 + q*(math.Pi/2*b.SurfaceArea()+q*4*math.Pi*b.Volume())) / c
}

// edges returns the length of all twelve edges in m.
func (b Box) edges() float64 { return 4 * (b.Length + b.Width + b.Height) }
