package acoustics

import "math"

// BandAbsorption is the random-incidence coefficient at one band centre.
type BandAbsorption struct {
	Hz    float64 // exact or nominal band centre
	Alpha float64 // 0…1 (values above 1 of a data sheet are taken as they are, clamped on conversion)
}

// Finish is an ordinary surface. One without any absorption is rigid.
type Finish struct {
	ID, Name, Source string
	Absorption       []BandAbsorption // rising in Hz
}

// Coefficient returns the random-incidence absorption coefficient at a
// frequency in Hz: linear in log f between the bands given, the first and the
// last held outside them, so 0 Hz has the first.
func (f Finish) Coefficient(hz float64) float64 {
	a := f.Absorption
	n := len(a)
	switch {
	case n == 0:
		return 0
	case hz <= a[0].Hz:
		return a[0].Alpha
	case hz >= a[n-1].Hz:
		return a[n-1].Alpha
	}
	i := 1
	for a[i].Hz < hz {
		i++
	}
	lo, hi := a[i-1], a[i]
	t := math.Log(hz/lo.Hz) / math.Log(hi.Hz/lo.Hz)
	return lo.Alpha + t*(hi.Alpha-lo.Alpha)
}

// Admittance returns the real specific admittance β at a frequency in Hz, by
// [AdmittanceFromDiffuse].
func (f Finish) Admittance(hz float64) float64 { return AdmittanceFromDiffuse(f.Coefficient(hz)) }

// FinishShare is a finish on a share of a surface's area.
type FinishShare struct {
	Finish Finish
	Share  float64
}

// Lining is what one surface carries; shares add to 1. An empty lining is rigid.
type Lining []FinishShare

// Admittance returns the real specific admittance of the surface as a whole at
// a frequency in Hz: each finish's coefficient is converted, then the
// admittances are averaged by share.
func (l Lining) Admittance(hz float64) float64 {
	var b float64
	for _, f := range l {
		b += f.Share * f.Finish.Admittance(hz)
	}
	return b
}

// Coefficient returns the random-incidence coefficient of the surface as a
// whole at a frequency in Hz, averaged by share.
func (l Lining) Coefficient(hz float64) float64 {
	var a float64
	for _, f := range l {
		a += f.Share * f.Finish.Coefficient(hz)
	}
	return a
}

// Walls are the linings of the six surfaces, indexed by Surface.
type Walls [6]Lining
