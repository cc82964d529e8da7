package resonators

import (
	"fmt"
	"math"

	"stillroom/acoustics"
)

// warnings returns what is to be said of the absorber, as plain sentences.
func warnings(a Absorber, air acoustics.Air, size [2]float64, o *acoustics.Oscillator) []string {
	var w []string
	if o == nil {
		w = append(w, "Broadband: there is no resonance to tune.")
	} else if _, peaks := o.PeakHz(); !peaks {
		w = append(w, fmt.Sprintf("Damped so heavily (ζ = %.2f) that there is no resonance peak.", o.DampingRatio()))
	}
	w = append(w, detailsOf(a).warnings(air, o)...)
	if l, ok := a.(layered); ok {
		w = append(w, depthWarning(l, air, size, o)...)
	}
	return w
}

// crowded is the √ε above which the interaction of neighbouring holes is
// outside its formula's fit.
const crowded = 0.6

func crowding(what string, eps float64) []string {
	if math.Sqrt(eps) <= crowded {
		return nil
	}
	return []string{fmt.Sprintf(
		"The %s are too near each other for the end-correction formula (open share %.0f %%, over %.0f %%).",
		what, 100*eps, 100*sq(crowded))}
}

func fillWarnings(f *Fill, o *acoustics.Oscillator) []string {
	if f == nil || f.JCA != nil {
		return nil
	}
	return mikiWarnings("The fill", f.FlowResistivity, o)
}

// mikiWarnings says where Miki's model is outside its range: at the resonance,
// or for a broadband absorber anywhere in the printed bands.
func mikiWarnings(what string, flow float64, o *acoustics.Oscillator) []string {
	low, high, active := mikiLow*flow, mikiHigh*flow, mikiActive*flow
	if o != nil {
		switch {
		case o.Natural < active:
			return []string{fmt.Sprintf("%s is not passive in Miki's model below %.0f Hz, which includes the resonance: its resistance counts as none there.", what, active)}
		case o.Natural < low:
			return []string{fmt.Sprintf("%s is outside the range of Miki's model at resonance: it is meant for frequencies above %.0f Hz with this flow resistivity.", what, low)}
		case o.Natural > high:
			return []string{fmt.Sprintf("%s is outside the range of Miki's model at resonance: it is meant for frequencies below %.0f Hz with this flow resistivity.", what, high)}
		}
		return nil
	}
	const firstHz, lastHz = 20, 5000
	var w []string
	if low > firstHz {
		w = append(w, fmt.Sprintf("%s is outside the range of Miki's model below %.0f Hz.", what, low))
	}
	if active > firstHz {
		w = append(w, fmt.Sprintf("%s is not passive in Miki's model below %.0f Hz: its resistance counts as none there.", what, active))
	}
	if high < lastHz {
		w = append(w, fmt.Sprintf("%s is outside the range of Miki's model above %.0f Hz.", what, high))
	}
	return w
}

// depthWarning says where the cavity is not small beside the wave.
func depthWarning(l layered, air acoustics.Air, size [2]float64, o *acoustics.Oscillator) []string {
	if o == nil {
		return nil
	}
	var w []string
	wave := air.SpeedOfSound / o.Natural
	if d := l.cavity().depth(); d > wave/4 {
		w = append(w, fmt.Sprintf("The cavity is deeper than a quarter of the wave at resonance (%.0f mm): air in it acts as mass there.", 1000*wave/4))
	}
	if _, isPanel := l.(Panel); isPanel && max(size[0], size[1]) > wave/2 {
		w = append(w, "The sheet is longer than half a wave at resonance: it will not move as one.")
	}
	return w
}
