package acoustics

import (
	"errors"
	"fmt"
	"math"
)

// Atmosphere is the state of the air as people give it.
type Atmosphere struct {
	TemperatureC        float64 // −20…50 °C
	RelativeHumidityPct float64 // 0…100 %
	PressureKPa         float64 // 60…110 kPa
}

// Air holds the properties of moist air that acoustics needs.
//
// An Air put together by hand, without an Atmosphere, is air that does not
// attenuate: useful where a computation is held against a lossless one.
type Air struct {
	Atmosphere   Atmosphere
	SpeedOfSound float64 // c, m/s (Cramer 1993)
	Density      float64 // ρ, kg/m³ (CIPM-2007)
	Viscosity    float64 // η, Pa·s (Sutherland)
	Prandtl      float64 // 0.71
	HeatRatio    float64 // γ = 1.40
	Pressure     float64 // static, Pa
}

// Limits of what NewAir takes. They hold the climates in which rooms are used
// and measured, from an unheated shell in winter to a mountain town.
const (
	minTemperatureC, maxTemperatureC = -20, 50
	minHumidityPct, maxHumidityPct   = 0, 100
	minPressureKPa, maxPressureKPa   = 60, 110
)

const (
	zeroCelsius = 273.15 // K
	// moleFractionCO2 is that of present outdoor air, the reference value of
	// CIPM-2007. (Cramer's own standard air has 0.000314.)
	moleFractionCO2 = 0.0004
	prandtlAir      = 0.71
	heatRatioAir    = 1.40
)

// RangeError says which quantity lies outside its allowed range.
type RangeError struct {
	Quantity string  // "temperature"
	Value    float64 // as given
	Min, Max float64 // allowed, both ends included
	Unit     string  // "°C"
}

// Error says what is wrong and what is allowed.
func (e *RangeError) Error() string {
	return fmt.Sprintf("%s must be between %g and %g %s, is %g", e.Quantity, e.Min, e.Max, e.Unit, e.Value)
}

// NewAir returns the properties of air in the state a.
//
// A quantity outside its range gives a *RangeError; where there are several,
// all of them are joined, and errors.As finds the first.
func NewAir(a Atmosphere) (Air, error) {
	err := errors.Join(
		inRange("temperature", a.TemperatureC, minTemperatureC, maxTemperatureC, "°C"),
		inRange("relative humidity", a.RelativeHumidityPct, minHumidityPct, maxHumidityPct, "%"),
		inRange("static pressure", a.PressureKPa, minPressureKPa, maxPressureKPa, "kPa"),
	)
	if err != nil {
		return Air{}, err
	}
	var (
		t  = a.TemperatureC
		p  = 1000 * a.PressureKPa
		xw = waterMoleFraction(t, p, a.RelativeHumidityPct/100)
	)
	return Air{
		Atmosphere:   a,
		SpeedOfSound: speedOfSound(t, p, xw, moleFractionCO2),
		Density:      density(t, p, xw, moleFractionCO2),
		Viscosity:    viscosity(t + zeroCelsius),
		Prandtl:      prandtlAir,
		HeatRatio:    heatRatioAir,
		Pressure:     p,
	}, nil
}

// inRange returns a *RangeError, or a nil error; a NaN is outside every range.
func inRange(quantity string, v, lo, hi float64, unit string) error {
	if v >= lo && v <= hi {
		return nil
	}
	return &RangeError{Quantity: quantity, Value: v, Min: lo, Max: hi, Unit: unit}
}

// Extrapolated reports whether the speed of sound comes from outside the range
// for which Cramer gives his fit: 0…30 °C, 75…102 kPa, and a mole fraction of
// water of at most 0.06.
func (a Air) Extrapolated() bool {
	var (
		t = a.Atmosphere.TemperatureC
		p = 1000 * a.Atmosphere.PressureKPa
	)
	return t < 0 || t > 30 || p < 75e3 || p > 102e3 ||
		waterMoleFraction(t, p, a.Atmosphere.RelativeHumidityPct/100) > 0.06
}

// waterMoleFraction returns the mole fraction of water vapour in moist air,
//
//	x_w = h·f·p_sv/p
//	f = 1.00062 + 3.14e-8·p + 5.6e-7·t²
//	p_sv = exp(A·T² + B·T + C + D/T)
//
// with t in °C, T in K, p in Pa and the relative humidity h as a fraction; f is
// the enhancement factor, p_sv the saturation vapour pressure over water in Pa.
//
// Source: Picard, Davis, Gläser, Fujii, Metrologia 45 (2008) 149, CIPM-2007,
// appendix A1.
func waterMoleFraction(t, p, h float64) float64 {
	var (
		T   = t + zeroCelsius
		psv = math.Exp(1.2378847e-5*T*T - 1.9121316e-2*T + 33.93711047 - 6343.1645/T)
		f   = 1.00062 + 3.14e-8*p + 5.6e-7*t*t
	)
	return h * f * psv / p
}

// speedOfSound returns the speed of sound in m/s at zero frequency,
//
//	c = a0 + a1·t + a2·t² + (a3 + a4·t + a5·t²)·x_w + (a6 + a7·t + a8·t²)·p
//	  + (a9 + a10·t + a11·t²)·x_c + a12·x_w² + a13·p² + a14·x_c² + a15·x_w·p·x_c
//
// with t in °C, p in Pa, mole fractions x_w of water and x_c of carbon dioxide.
//
// Valid for 0…30 °C, 75…102 kPa, x_w ≤ 0.06, x_c ≤ 0.01, there within 300 ppm
// as stated; extrapolated elsewhere.
//
// Source: Cramer, J. Acoust. Soc. Am. 93 (1993) 2510, eq. 15 and table III.
func speedOfSound(t, p, xw, xc float64) float64 {
	return 331.5024 + t*(0.603055-0.000528*t) +
		(51.471935+t*(0.1495874-0.000782*t))*xw +
		(-1.82e-7+t*(3.73e-8-2.93e-10*t))*p +
		(-85.20931+t*(-0.228525+5.91e-5*t))*xc -
		2.835149*xw*xw - 2.15e-13*p*p + 29.179762*xc*xc + 0.000486*xw*p*xc
}

// density returns the density of moist air in kg/m³,
//
//	ρ = p·M_a/(Z·R·T)·[1 − x_v·(1 − M_v/M_a)]
//	M_a = 28.96546e-3 + 12.011e-3·(x_c − 0.0004) kg/mol
//
// with p in Pa, t in °C, mole fractions x_v of water and x_c of carbon dioxide
// and Z from [compressibility].
//
// Source: Picard et al., Metrologia 45 (2008) 149, CIPM-2007, eq. 1 and 2.
func density(t, p, xv, xc float64) float64 {
	const (
		R  = 8.314472    // J/(mol·K), as the publication has it
		Mv = 18.01528e-3 // kg/mol, water
	)
	var (
		T  = t + zeroCelsius
		Ma = (28.96546 + 12.011*(xc-0.0004)) * 1e-3
	)
	return p * Ma / (compressibility(t, p, xv) * R * T) * (1 - xv*(1-Mv/Ma))
}

// compressibility returns the compressibility factor of moist air,
//
//	Z = 1 − (p/T)·[a0 + a1·t + a2·t² + (b0 + b1·t)·x_v + (c0 + c1·t)·x_v²]
//	  + (p/T)²·(d + e·x_v²)
//
// with p in Pa, t in °C, T in K and the mole fraction x_v of water.
//
// Source: Picard et al., Metrologia 45 (2008) 149, CIPM-2007, appendix A1.
func compressibility(t, p, xv float64) float64 {
	var (
		q = p / (t + zeroCelsius)
		a = 1.58123e-6 + t*(-2.9331e-8+1.1043e-10*t)
		b = 5.707e-6 - 2.051e-8*t
		c = 1.9898e-4 - 2.376e-6*t
	)
	const d, e = 1.83e-11, -0.765e-8
	return 1 - q*(a+b*xv+c*xv*xv) + q*q*(d+e*xv*xv)
}

// viscosity returns the dynamic viscosity of air in Pa·s by Sutherland's law,
//
//	η = 1.458e-6·T^(3/2)/(T + 110.4)
//
// with T in K.
//
// Source: U.S. Standard Atmosphere, 1976, eq. 51.
func viscosity(T float64) float64 { return 1.458e-6 * T * math.Sqrt(T) / (T + 110.4) }
