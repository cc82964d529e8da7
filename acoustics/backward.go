package acoustics

import (
	"math"
	"math/cmplx"
)

// EnergyDecay is the energy of a band still to come, by Schroeder's backward
// integration, in closed form: of h_b = Σ a_i·e^{s_i·t},
//
//	E(t) = ∫_t^∞ h_b² dτ = Σ_i Σ_j a_i·a_j·e^{(s_i+s_j)·t}/−(s_i+s_j)
//
// The band's filter acts on each partial by its response at the partial's
// frequency, without a transient of its own, so that a decay shorter than the
// filter's is seen as it is.
//
// Source: Schroeder, J. Acoust. Soc. Am. 37 (1965) 409.
type EnergyDecay struct {
	rate, amplitude []complex128 // s_i, a_i of the partials; their twins are the conjugates
	// Of each pair of partials, the second up to the first: −1/(s_i + s_j) and
	// −1/(s_i + s_j*).
	with, across []complex128
	whole        float64 // E(0)
}

// bandOrder is the order of the band filter: that of a Butterworth band-pass of
// three pole pairs, common practice for third octaves.
const bandOrder = 3

// faint is the response of the filter below which a partial is left out of a
// band: 80 dB down.
const faint = 1e-4

// response returns the band filter's magnitude at a frequency in Hz,
//
//	1/√(1 + ((f/f_m − f_m/f)·f_m/(f_2 − f_1))^{2n})
//
// 3 dB down at the edges.
func (b Band) response(hz float64) float64 {
	x := (hz/b.Centre - b.Centre/hz) * b.Centre / (b.Upper - b.Lower)
	return 1 / math.Sqrt(1+math.Pow(x*x, bandOrder))
}

// Backward returns the energy decay of the partials in a band; false where
// nothing of them is in it.
func (p Partials) Backward(b Band) (EnergyDecay, bool) {
	var d EnergyDecay
	for _, q := range p {
		if g := b.response(real(q.Omega) / (2 * math.Pi)); g > faint {
			d.rate = append(d.rate, 1i*q.Omega)
			d.amplitude = append(d.amplitude, 1i*q.Residue*complex(g, 0))
		}
	}
	for i, s := range d.rate {
		for _, r := range d.rate[:i+1] {
			d.with = append(d.with, -1/(s+r))
			d.across = append(d.across, -1/(s+cmplx.Conj(r)))
		}
	}
	d.whole = d.energy(0)
	return d, d.whole > 0
}

// energy returns E(t) by the partials and their conjugate twins.
func (d EnergyDecay) energy(t float64) float64 {
	var (
		n   = len(d.rate)
		v   = make([]complex128, n)
		sum float64
	)
	for i := range v {
		v[i] = d.amplitude[i] * cmplx.Exp(d.rate[i]*complex(t, 0))
	}
	at := 0
	for i := range v {
		for j := range i + 1 {
			// Partial and twin of both: twice the real parts, and again for the pair
			// the other way round.
			e := 2 * (real(v[i]*v[j]*d.with[at]) + real(v[i]*cmplx.Conj(v[j])*d.across[at]))
			if j < i {
				e *= 2
			}
			sum += e
			at++
		}
	}
	return sum
}

// LevelDB returns the energy still to come at a time in s, dB re the whole.
func (d EnergyDecay) LevelDB(t float64) float64 { return 10 * math.Log10(d.energy(t)/d.whole) }

// when returns the time in s at which the decay has come down to a level in dB.
// E falls for ever, so that there is one such time.
func (d EnergyDecay) when(level float64) float64 {
	hi := 0.01
	for d.LevelDB(hi) > level && hi < 1e4 {
		hi *= 2
	}
	lo := 0.0
	for range 40 {
		mid := (lo + hi) / 2
		if d.LevelDB(mid) > level {
			lo = mid
		} else {
			hi = mid
		}
	}
	return hi
}

// Time returns the reverberation time in s that a straight line by least squares
// through the decay between two levels in dB, 0 ≥ from > to, has: 60 dB over its
// slope. From 0 to −10 dB it is the early decay time, from −5 to −25 dB T20.
//
// Source: ISO 3382-2:2008, 3.3 and annex C; ISO 3382-1:2009 for the early decay
// time.
func (d EnergyDecay) Time(from, to float64) float64 {
	const points = 40
	var (
		t0, t1           = d.when(from), d.when(to)
		st, sl, stt, stl float64
	)
	if from == 0 {
		t0 = 0
	}
	for i := range points {
		t := t0 + (t1-t0)*float64(i)/(points-1)
		l := d.LevelDB(t)
		st, sl, stt, stl = st+t, sl+l, stt+t*t, stl+t*l
	}
	slope := (points*stl - st*sl) / (points*stt - st*st)
	return -60 / slope
}
