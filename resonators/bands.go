package resonators

import (
	"math"
	"runtime"
	"sync"

	"stillroom/acoustics"
)

// ThirdOctave holds the band means of the absorption coefficients.
type ThirdOctave struct {
	Nominal         string  // "31.5"
	Hz              float64 // exact centre
	Normal, Diffuse float64
}

// thirdNames are the nominal third-octave frequencies from 20 Hz to 5 kHz.
var thirdNames = [25]string{
	"20", "25", "31.5", "40", "50", "63", "80", "100", "125", "160", "200", "250", "315",
	"400", "500", "630", "800", "1000", "1250", "1600", "2000", "2500", "3150", "4000", "5000",
}

// firstThird is the band number of 20 Hz: its exact centre is 1000·10^(−17/10).
const firstThird = -17

// bandTolerance is what a band's mean may be off by, well inside the 0.002
// that is promised.
const bandTolerance = 4e-4

// thirdOctaves returns the means over log f of the bands from 20 Hz to 5 kHz,
// base-ten centres 1000·10^(k/10), edges at 10^(±1/20).
//
// Source of the bands: IEC 61260-1:2014.
func thirdOctaves(a Absorber, air acoustics.Air, limit float64) []ThirdOctave {
	bands := make([]ThirdOctave, len(thirdNames))
	var group sync.WaitGroup
	workers := min(runtime.GOMAXPROCS(0), len(bands))
	for w := range workers {
		group.Go(func() {
			for i := w; i < len(bands); i += workers {
				k := float64(firstThird + i)
				m := bandMean(a, air, limit, 1000*math.Pow(10, (k-0.5)/10), 1000*math.Pow(10, (k+0.5)/10))
				bands[i] = ThirdOctave{Nominal: thirdNames[i], Hz: 1000 * math.Pow(10, k/10), Normal: m[0], Diffuse: m[1]}
			}
		})
	}
	group.Wait()
	return bands
}

// bandMean returns the means over log f of the normal and the diffuse
// coefficient between two frequencies.
func bandMean(a Absorber, air acoustics.Air, limit, lo, hi float64) [2]float64 {
	var (
		l, isLayered = a.(layered)
		local        = !isLayered || !l.extended()
		from, to     = math.Log(lo), math.Log(hi)
		panels       = 1
	)
	if isLayered {
		// One panel for each half wave that the cavity gains over the band.
		panels += int(2 * (hi - lo) * l.cavity().depth() / air.SpeedOfSound)
	}
	m := mean(from, to, panels, bandTolerance, func(x float64) sample {
		hz := math.Exp(x)
		z := a.Specific(complex(2*math.Pi*hz, 0), air)
		s := sample{detuning: imag(z) / (1 + real(z))}
		if isLayered && l.cavity().empty() {
			kd := 2 * math.Pi * hz * l.cavity().depth() / air.SpeedOfSound
			face := l.front(complex(2*math.Pi*hz, 0), air) / complex(air.Density*air.SpeedOfSound, 0)
			s.halfWaves = kd / math.Pi
			s.area, s.halfWidth = modeResonance(face, kd)
		}
		s.value[0] = normalOf(z)
		if local {
			s.value[1] = localDiffuse(z, limit)
		}
		return s
	})
	switch {
	case !local && l.cavity().empty() && l.cavity().depth() > 0:
		m[1] = newOpenBand(l, air, limit, lo, hi, 1).mean()
	case !local:
		// Resonances of the single angles have averaged out already.
		m[1] = mean(from, to, panels, bandTolerance, func(x float64) sample {
			omega := complex(2*math.Pi*math.Exp(x), 0)
			return sample{value: [2]float64{extendedDiffuse(l, omega, limit, bandTolerance, air)}}
		})[0]
	}
	return m
}

// modeResonance returns the area under the absorption curve and the half width,
// both over ln f, of the resonance that a face of specific impedance z = r + jX
// has just above a mode of an empty cavity, where the wave number times the depth
// is kd: there the cavity's −cot runs through −X within (1+r)/(X²+1) of kd, and
// the peak is 4r/(1+r)².
func modeResonance(face complex128, kd float64) (area, halfWidth float64) {
	r, x := real(face), imag(face)
	halfWidth = (1 + r) / ((1 + x*x) * kd)
	return math.Pi * 4 * r / sq(1+r) * halfWidth, halfWidth
}
