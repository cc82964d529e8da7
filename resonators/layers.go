package resonators

import (
	"math"
	"math/cmplx"

	"stillroom/acoustics"
)

// layer is one layer of a cavity. A layer without flow resistivity is air.
type layer struct {
	thickness float64 // m
	flow      float64 // Pa·s/m²
	jca       *JCA
}

// cavity is up to two layers before a rigid wall, from the room inwards.
type cavity struct {
	layers [2]layer
	n      int
}

func (c *cavity) add(l layer) {
	if l.thickness > 0 {
		c.layers[c.n] = l
		c.n++
	}
}

// filledCavity returns a cavity of the given depth (m) with an optional fill.
func filledCavity(depth float64, f *Fill) cavity {
	var c cavity
	if f == nil {
		c.add(layer{thickness: depth})
		return c
	}
	fill := layer{thickness: f.Thickness, flow: f.FlowResistivity, jca: f.JCA}
	gap := layer{thickness: depth - f.Thickness}
	if f.AtFace {
		c.add(fill)
		c.add(gap)
	} else {
		c.add(gap)
		c.add(fill)
	}
	return c
}

// depth returns the thickness of all layers, m.
func (c cavity) depth() float64 {
	var d float64
	for _, l := range c.layers[:c.n] {
		d += l.thickness
	}
	return d
}

// empty reports whether nothing but air is in the cavity.
func (c cavity) empty() bool {
	for _, l := range c.layers[:c.n] {
		if l.flow > 0 {
			return false
		}
	}
	return true
}

// slab is a layer at one frequency.
type slab struct {
	medium
	thickness float64 // m
}

// slabs are the layers of a cavity at one frequency, from the room inwards.
type slabs struct {
	layer [2]slab
	n     int
}

// at works out the fluids of the layers at one angular frequency.
func (c cavity) at(omega complex128, air acoustics.Air) slabs {
	s := slabs{n: c.n}
	for i, l := range c.layers[:c.n] {
		m := plainAir(omega, air)
		if l.flow > 0 {
			m = porousFluid(omega, l.flow, l.jca, air)
		}
		s.layer[i] = slab{medium: m, thickness: l.thickness}
	}
	return s
}

// admittance returns v/p in m/(Pa·s) at the room side of the layers before
// their rigid wall. Each layer carries the admittance Y_b behind it forward,
//
//	Y = (Y_b + j·tan(k_z d)/Z_z)/(1 + j·Y_b·Z_z·tan(k_z d))
//	k_z = √(k² − k_t²),  Z_z = Z_c·k/k_z
//
// which is the product of the layers' transfer matrices applied to v = 0.
// lateral is k_t², the square of the wave number along the layers in 1/m²,
// which all layers share (Snell's law): (ω sin θ/c)² at the angle θ, 0 at
// normal incidence. With clamp a layer whose model yields a negative
// resistance has none.
//
// Source: Allard & Atalla 2009, sections 2.6 and 11.3.
func (s slabs) admittance(lateral float64, clamp bool) complex128 {
	var y complex128
	for i := s.n - 1; i >= 0; i-- {
		l := &s.layer[i]
		if k, z := real(l.k), real(l.zc); y == 0 && imag(l.k) == 0 && imag(l.zc) == 0 && k*k > lateral {
			// Air before the wall on the real axis: Y is a plain reactance.
			kz := math.Sqrt(k*k - lateral)
			y = complex(0, math.Tan(kz*l.thickness)*kz/(k*z))
			continue
		}
		zc, kz := l.zc, l.k
		if lateral != 0 {
			kz = cmplx.Sqrt(l.k*l.k - complex(lateral, 0))
			if kz == 0 {
				kz = l.k * 1e-8 // grazing incidence: the limit
			}
			zc = l.zc * l.k / kz
		}
		jt := complex(0, 1) * tan(kz*complex(l.thickness, 0))
		y = (y + jt/zc) / (1 + y*zc*jt)
		if clamp && real(y) < 0 {
			// Y' = 1/(j·Im(1/Y)): the reactance stays as it is.
			y = 1 / complex(0, imag(1/y))
		}
	}
	return y
}

// tan returns the tangent, without overflow far from the real axis.
func tan(z complex128) complex128 {
	x, y := real(z), imag(z)
	switch {
	case y == 0:
		return complex(math.Tan(x), 0)
	case y > 20:
		return 1i // to within exp(−40)
	case y < -20:
		return -1i
	}
	// (tan x + j tanh y)/(1 − j tan x tanh y), free of cancellation.
	t, h := math.Tan(x), math.Tanh(y)
	return complex(t, h) / complex(1, -t*h)
}
