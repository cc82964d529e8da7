package acoustics

import (
	"math"
	"strconv"
)

// Band is a fractional-octave band of the base-ten system.
//
// Source: IEC 61260-1:2014, 5.2 to 5.5.
type Band struct {
	Nominal              string  // "31.5", "63", "1000"
	Centre, Lower, Upper float64 // exact, Hz
}

// ThirdOctave returns the third-octave band number k: centre 1000·10^{k/10},
// edges a factor 10^{±1/20} away. Band 0 is that of 1000 Hz.
func ThirdOctave(k int) Band {
	c := 1000 * math.Pow(10, float64(k)/10)
	edge := math.Pow(10, 1.0/20)
	return Band{Nominal: nominal(k), Centre: c, Lower: c / edge, Upper: c * edge}
}

// Octave returns the octave band number k: centre 1000·10^{3k/10}, edges a
// factor 10^{±3/20} away. Band 0 is that of 1000 Hz.
func Octave(k int) Band {
	c := 1000 * math.Pow(10, 3*float64(k)/10)
	edge := math.Pow(10, 3.0/20)
	return Band{Nominal: nominal(3 * k), Centre: c, Lower: c / edge, Upper: c * edge}
}

// ThirdOctaves returns the third-octave bands whose centres lie between those
// nearest to the two nominal frequencies in Hz, both included.
func ThirdOctaves(from, to float64) []Band {
	lo := int(math.Round(10 * math.Log10(from/1000)))
	hi := int(math.Round(10 * math.Log10(to/1000)))
	var bands []Band
	for k := lo; k <= hi; k++ {
		bands = append(bands, ThirdOctave(k))
	}
	return bands
}

// nominal returns the rounded name of third-octave band k (IEC 61260-1, annex
// E; the R10 series of ISO 3).
func nominal(k int) string {
	series := [10]float64{1, 1.25, 1.6, 2, 2.5, 3.15, 4, 5, 6.3, 8}
	decade := int(math.Floor(float64(k) / 10))
	v := series[k-10*decade] * math.Pow(10, float64(decade+3))
	return strconv.FormatFloat(math.Round(v*1e4)/1e4, 'f', -1, 64)
}
