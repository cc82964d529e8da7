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
	switch v := a.(type) {
	case Neck:
		w = append(w, neckWarnings(v, air, o)...)
	case Panel:
		w = append(w, panelWarnings(v, air)...)
		w = append(w, fillWarnings(v.Fill, o)...)
	case Perforated:
		w = append(w, crowding("holes", v.OpenShare())...)
		w = append(w, fillWarnings(v.Fill, o)...)
	case Slotted:
		w = append(w, fillWarnings(v.Fill, o)...)
	case Microperforated:
		w = append(w, microWarnings(v)...)
	case Porous:
		if v.JCA == nil {
			w = append(w, mikiWarnings("The porous layer", v.FlowResistivity, o)...)
		}
	}
	if l, ok := a.(layered); ok {
		w = append(w, depthWarning(l, air, size, o)...)
	}
	return w
}

// widestMouth is the a/R_c up to which the inner end correction holds.
const widestMouth = 0.4

// lumpedShare is the share of a wave that a part may span and still be taken as
// lumped: a twelfth, at which tan(kl) exceeds kl by a tenth.
const lumpedShare = 1.0 / 12

func neckWarnings(n Neck, air acoustics.Air, o *acoustics.Oscillator) []string {
	var w []string
	if ratio := n.MouthRadius / n.wallRadius(); ratio > widestMouth {
		w = append(w, fmt.Sprintf(
			"The mouths are wide for the box's front (radius ratio %.2f, over %.1f): the inner end correction is uncertain.",
			ratio, widestMouth))
	}
	if o != nil {
		wave := air.SpeedOfSound / o.Natural
		if n.Length > lumpedShare*wave {
			w = append(w, "The neck is longer than a twelfth of the wave at resonance: taking its air as one plug overstates the frequency.")
		}
		if d := n.Cavity / (n.Front[0] * n.Front[1]); max(d, n.Front[0], n.Front[1]) > wave/4 {
			w = append(w, "The box is larger than a quarter of the wave at resonance: taking its air as one spring is uncertain.")
		}
	}
	if n.FillShare > 0 {
		w = append(w, mikiWarnings("The fill", n.FillFlow, o)...)
	}
	return w
}

// plateClear is how far the sheet's own resonance should stay above that of its
// mass on the air spring.
const plateClear = 1.5

func panelWarnings(p Panel, air acoustics.Air) []string {
	if p.Youngs == 0 {
		return []string{"The sheet is taken as limp: its bending stiffness is not counted."}
	}
	plate, spring := p.PlateHz(), p.AirSpringHz(air)
	switch {
	case plate >= plateClear*spring:
		return []string{fmt.Sprintf(
			"The sheet's own stiffness, not the air behind it, sets the resonance: the plate alone is at %.1f Hz, the mass on the air at %.1f Hz. The edge's fixing decides.",
			plate, spring)}
	case plate > spring:
		return []string{fmt.Sprintf(
			"The sheet's own plate resonance at %.1f Hz is less than 1.5 times the air-spring resonance at %.1f Hz: the edge's fixing shifts the tuning.",
			plate, spring)}
	}
	return nil
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

// microOpen is the open share above which micro-perforations, which are taken
// not to interact, would share more than a quarter of their end correction.
const microOpen = 0.03

func microWarnings(m Microperforated) []string {
	var w []string
	if m.Hole >= 1e-3 {
		w = append(w, "The model of a micro-perforated panel is meant for holes below 1 mm.")
	}
	if eps := m.OpenShare(); eps > microOpen {
		w = append(w, fmt.Sprintf("With %.1f %% open the holes influence each other, which is not counted: the true tuning is higher.", 100*eps))
	}
	return w
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
