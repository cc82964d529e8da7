package resonators

import (
	"math"
	"testing"

	"stillroom/acoustics"
)

// A zero of the reactance a hair from a mode of the cavity: the slope there is
// that of the crossing, rising, however near the mode is. By differences that
// are a thousandth of the distance to the mode.
func TestOscillatorBesideAModeOfItsCavity(t *testing.T) {
	stiffAir, err := acoustics.NewAir(acoustics.Atmosphere{TemperatureC: 0.71875, RelativeHumidityPct: 1, PressureKPa: 60})
	if err != nil {
		t.Fatal(err)
	}
	slotAir, err := acoustics.NewAir(acoustics.Atmosphere{TemperatureC: 0.00390625, RelativeHumidityPct: 43.5, PressureKPa: 93.46513071913796})
	if err != nil {
		t.Fatal(err)
	}
	for _, c := range []struct {
		absorber Absorber
		air      acoustics.Air
	}{
		{Panel{Mass: 0.36787944117144233, Thickness: 0.1, Youngs: 6.764234302410967e10, Poisson: 0.5, LossFactor: 1,
			Cavity: 1.000030518043791, Size: [2]float64{1.6487212707001282, 1.1331484530668263}}, stiffAir},
		{Slotted{Slat: 0.6065306597126334, Slot: 0.00020346836901064417, Sheet: 0.049787068367863944, Cavity: 1.0000009536747712}, slotAir},
	} {
		e, ok := EquivalentOf(c.absorber, c.air, unitSize)
		if !ok {
			continue
		}
		hz := e.Oscillator.Natural
		spacing := c.air.SpeedOfSound / 2 / c.absorber.(layered).cavity().depth()
		away := math.Abs(hz/spacing-math.Round(hz/spacing)) * spacing / 1000
		x := func(hz float64) float64 { return imag(c.absorber.Specific(omegaOf(hz), c.air)) }
		slope := (x(hz+away) - x(hz-away)) / (2 * away * 2 * math.Pi)
		want := slope / 2 * c.air.Density * c.air.SpeedOfSound
		if e.Oscillator.Decay < 0 || math.Abs(e.Mass/want-1) > 1e-3 {
			t.Errorf("%s at %g Hz, %g Hz from a mode: decay %g, mass %g, want %g", c.absorber.Kind(), hz, 1000*away, e.Oscillator.Decay, e.Mass, want)
		}
	}
}
