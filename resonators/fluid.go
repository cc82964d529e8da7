package resonators

import (
	"math"
	"math/cmplx"

	"stillroom/acoustics"
)

// Fill is a porous layer in a cavity.
type Fill struct {
	Thickness       float64 // m
	FlowResistivity float64 // Pa·s/m²
	AtFace          bool    // touching the panel rather than the wall
	JCA             *JCA    // nil: Miki
}

// JCA are the further parameters of a Johnson-Champoux-Allard fluid.
type JCA struct {
	Porosity, Tortuosity, ViscousLength, ThermalLength float64 // –, –, m, m
}

func (f *Fill) clone() *Fill {
	if f == nil {
		return nil
	}
	c := *f
	c.JCA = f.JCA.clone()
	return &c
}

func (j *JCA) clone() *JCA {
	if j == nil {
		return nil
	}
	c := *j
	return &c
}

// touches reports whether the fill lies against the front of a cavity of the
// given depth (m).
func (f *Fill) touches(depth float64) bool {
	return f != nil && (f.AtFace || f.Thickness >= depth)
}

// medium is a fluid that carries sound through a layer.
type medium struct {
	zc complex128 // characteristic impedance, Pa·s/m
	k  complex128 // wave number, 1/m
}

// density returns the effective density ρ = Z_c·k/ω in kg/m³.
func (m medium) density(omega complex128) complex128 { return m.zc * m.k / omega }

// bulkModulus returns K = Z_c·ω/k in Pa.
func (m medium) bulkModulus(omega complex128) complex128 { return m.zc * omega / m.k }

// plainAir returns air without losses: Z_c = ρc, k = ω/c.
func plainAir(omega complex128, air acoustics.Air) medium {
	return medium{
		zc: complex(air.Density*air.SpeedOfSound, 0),
		k:  omega / complex(air.SpeedOfSound, 0),
	}
}

// porousFluid returns the equivalent fluid of a porous layer: that of Johnson,
// Champoux and Allard where its parameters are given, else Miki's.
func porousFluid(omega complex128, flow float64, j *JCA, air acoustics.Air) medium {
	if j != nil {
		return jcaFluid(omega, flow, *j, air)
	}
	return mikiFluid(omega, flow, air)
}

// Miki's model is meant for mikiLow < f/σ < mikiHigh; below mikiActive a
// layer over a rigid wall has a negative resistance (f in Hz, σ in Pa·s/m²).
const (
	mikiLow    = 0.01
	mikiHigh   = 1.0
	mikiActive = 0.0007
)

// mikiFluid returns Miki's equivalent fluid of a fibrous layer,
//
//	Z_c = ρc·[1 + 5.50·X^−0.632 − j·8.43·X^−0.632]
//	k   = (ω/c)·[1 + 7.81·X^−0.618 − j·11.41·X^−0.618],  X = 1000·f/σ
//
// with the flow resistivity σ in Pa·s/m² and f in Hz.
//
// Valid for 0.01 < f/σ < 1. Below about f/σ = 0.0007 the layer is not passive.
//
// Source: Miki, J. Acoust. Soc. Jpn (E) 11 (1990) 19, eqs 28 to 31.
func mikiFluid(omega complex128, flow float64, air acoustics.Air) medium {
	x := omega * complex(1000/(2*math.Pi*flow), 0)
	var xz, xk complex128
	if imag(x) == 0 && real(x) > 0 {
		l := math.Log(real(x))
		xz, xk = complex(math.Exp(-0.632*l), 0), complex(math.Exp(-0.618*l), 0)
	} else {
		l := cmplx.Log(x)
		xz, xk = cmplx.Exp(-0.632*l), cmplx.Exp(-0.618*l)
	}
	a := plainAir(omega, air)
	return medium{
		zc: a.zc * (1 + complex(5.50, -8.43)*xz),
		k:  a.k * (1 + complex(7.81, -11.41)*xk),
	}
}

// jcaFluid returns the equivalent fluid of Johnson, Champoux and Allard,
//
//	ρ_e = (τρ/φ)·{1 + (σφ/(jωρτ))·√[1 + 4jτ²ηρω/(σ²Λ²φ²)]}
//	K_e = (γP0/φ)/{γ − (γ−1)·[1 − j·(8η/(Λ'²·Pr·ρω))·√(1 + jΛ'²·Pr·ρω/(16η))]^−1}
//	Z_c = √(ρ_e·K_e),  k = ω·√(ρ_e/K_e)
//
// with porosity φ, tortuosity τ, viscous and thermal lengths Λ and Λ' (m),
// flow resistivity σ (Pa·s/m²), viscosity η (Pa·s), Prandtl number Pr, ratio of
// specific heats γ and static pressure P0 (Pa); velocities are those outside
// the pores.
//
// Limits: K_e·φ → P0 (isothermal) for ω → 0 and γP0 (adiabatic) for ω → ∞.
//
// Source: Allard & Atalla, Propagation of Sound in Porous Media, 2nd ed. 2009,
// chapter 5.
func jcaFluid(omega complex128, flow float64, j JCA, air acoustics.Air) medium {
	var (
		phi, tau = j.Porosity, j.Tortuosity
		rho, eta = air.Density, air.Viscosity
		gamma    = air.HeatRatio
		jw       = complex(0, 1) * omega
	)
	g := cmplx.Sqrt(1 + jw*complex(4*tau*tau*eta*rho/sq(flow*j.ViscousLength*phi), 0))
	density := complex(tau*rho/phi, 0) * (1 + complex(flow*phi/(rho*tau), 0)*g/jw)

	t := sq(j.ThermalLength) * air.Prandtl * rho / eta // s
	h := 1 + 8*cmplx.Sqrt(1+jw*complex(t/16, 0))/(jw*complex(t, 0))
	bulk := complex(gamma*air.Pressure/phi, 0) / (complex(gamma, 0) - complex(gamma-1, 0)/h)

	return medium{zc: cmplx.Sqrt(density * bulk), k: omega * cmplx.Sqrt(density/bulk)}
}

func sq(x float64) float64 { return x * x }
