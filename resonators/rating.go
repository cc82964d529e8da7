package resonators

import "math"

// OctaveValue is one octave band's practical coefficient.
type OctaveValue struct {
	Nominal string
	Alpha   float64
}

var octaveNames = [6]string{"125", "250", "500", "1000", "2000", "4000"}

// reference is the reference curve from 250 to 4000 Hz in hundredths.
var reference = [5]int{80, 100, 100, 100, 90}

// practicalHundredths returns an octave's practical coefficient in hundredths
// from its three third-octave values: their mean to two decimals, then to the
// nearest 0.05, no more than 1.00.
//
// Source: ISO 11654:1997, 4.1.
func practicalHundredths(thirds [3]float64) int {
	// The tiny part added lets a mean that is exactly half a hundredth in
	// decimals round up although it is just below in binary.
	h := int(math.Floor((thirds[0]+thirds[1]+thirds[2])/3*100 + 0.5 + 1e-9))
	return min((h+2)/5*5, 100)
}

// weightedHundredths returns α_w in hundredths and the shape indicators from
// the practical coefficients of 250 to 4000 Hz in hundredths: the reference
// curve is lowered in steps of 0.05 until the unfavourable deviations add up to
// no more than 0.10; α_w is its value at 500 Hz. A band that exceeds the shifted
// curve by 0.25 or more earns L (250 Hz), M (500, 1000 Hz) or H (2000, 4000
// Hz). In whole numbers, since the 0.10 is met exactly in some cases.
//
// Source: ISO 11654:1997, 4.2 and 4.3.
func weightedHundredths(alpha [5]int) (w int, shape string) {
	shift := 0
	for ; shift < 100; shift += 5 {
		sum := 0
		for i, r := range reference {
			sum += max(0, r-shift-alpha[i])
		}
		if sum <= 10 {
			break
		}
	}
	exceeds := func(i int) bool { return alpha[i]-max(0, reference[i]-shift) >= 25 }
	if exceeds(0) {
		shape += "L"
	}
	if exceeds(1) || exceeds(2) {
		shape += "M"
	}
	if exceeds(3) || exceeds(4) {
		shape += "H"
	}
	return 100 - shift, shape
}

// rate returns the practical coefficients 125…4000 Hz, α_w and its shape
// indicators from the diffuse third-octave values (20 Hz…5 kHz).
func rate(thirds []ThirdOctave) (practical []OctaveValue, alphaW float64, shape string) {
	const first100 = 7 // index of the 100 Hz band
	var h [6]int
	for o, name := range octaveNames {
		var v [3]float64
		for i := range v {
			v[i] = thirds[first100+3*o+i].Diffuse
		}
		h[o] = practicalHundredths(v)
		practical = append(practical, OctaveValue{Nominal: name, Alpha: float64(h[o]) / 100})
	}
	w, shape := weightedHundredths([5]int(h[1:]))
	return practical, float64(w) / 100, shape
}
