package acoustics

import "math"

// decibelsPerNeper of energy: 10·log10(e) dB.
const decibelsPerNeper = 10 / math.Ln10

// Attenuation returns the attenuation of a pure tone by the air, in dB/m.
//
//	α = 8.686·f²·{1.84e-11·(p_r/p_a)·(T/T0)^½ + (T/T0)^(−5/2)·
//	    [0.01275·e^(−2239.1/T)/(f_rO + f²/f_rO) + 0.1068·e^(−3352.0/T)/(f_rN + f²/f_rN)]}
//
// with f in Hz and the relaxation frequencies f_rO of oxygen and f_rN of
// nitrogen. The standard states ±10 % for −20…50 °C, below 200 kPa, and
// 0.0004…10 Hz/Pa of frequency over pressure; below about 40 Hz it is
// extrapolated, where it hardly matters. At 0 Hz it is 0.
//
// Source: ISO 9613-1:1993, eq. 3 to 5.
func (a Air) Attenuation(hz float64) float64 { return a.relaxation().attenuation(hz) }

// EnergyAttenuation returns the attenuation constant m of energy in 1/m:
// plane-wave intensity falls as exp(−m·x).
//
//	m = α/(10·log10 e) = α/4.3429, α in dB/m
func (a Air) EnergyAttenuation(hz float64) float64 { return a.Attenuation(hz) / decibelsPerNeper }

// relaxation holds what of ISO 9613-1 does not depend on frequency.
type relaxation struct {
	classical        float64 // s²/m: classical and rotational losses, over f²
	oxygen, nitrogen float64 // s/m: strengths of the two vibrational losses
	hzO, hzN         float64 // relaxation frequencies, Hz
}

// relaxation returns the constants for the state of the air, all zero where
// there is none.
func (a Air) relaxation() relaxation {
	if a.Atmosphere == (Atmosphere{}) {
		return relaxation{}
	}
	const (
		T0  = 293.15  // K, reference temperature
		T01 = 273.16  // K, triple point of water
		pr  = 101.325 // kPa, reference pressure
	)
	var (
		T  = a.Atmosphere.TemperatureC + zeroCelsius
		q  = a.Atmosphere.PressureKPa / pr
		th = T / T0
		// h is the molar concentration of water vapour in %.
		h = a.Atmosphere.RelativeHumidityPct * math.Pow(10, -6.8346*math.Pow(T01/T, 1.261)+4.6151) / q
	)
	return relaxation{
		classical: 1.84e-11 / q * math.Sqrt(th),
		oxygen:    math.Pow(th, -2.5) * 0.01275 * math.Exp(-2239.1/T),
		nitrogen:  math.Pow(th, -2.5) * 0.1068 * math.Exp(-3352.0/T),
		hzO:       q * (24 + 4.04e4*h*(0.02+h)/(0.391+h)),
		hzN:       q / math.Sqrt(th) * (9 + 280*h*math.Exp(-4.170*(math.Pow(th, -1.0/3)-1))),
	}
}

// attenuation returns α in dB/m at a frequency in Hz.
func (r relaxation) attenuation(hz float64) float64 {
	if r == (relaxation{}) {
		return 0
	}
	f2 := hz * hz
	return 8.686 * f2 * (r.classical +
		r.oxygen/(r.hzO+f2/r.hzO) +
		r.nitrogen/(r.hzN+f2/r.hzN))
}
