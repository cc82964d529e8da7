package acoustics

import "testing"

func TestQuick(t *testing.T) {
	b := Box{4.7, 4.1, 3.1}
	for _, m := range b.Modes(340, 126) {
		t.Log(m, m.Hz, m.Kind())
	}
	for _, f := range []float64{100, 150, 200, 300, 500} {
		n, a := b.CountBelow(340, f)
		t.Log(f, n, a)
	}
	for _, a := range []float64{1e-12, 1e-6, .01, .3, .8, .80001, .95, .9512, .9512223816} {
		z := AdmittanceFromDiffuse(a)
		t.Log(a, z, DiffuseFromImpedance(1/z)-a)
	}
	for _, z := range []complex128{0.01, .2, .5, 1, 2, 20, 1 + 1i, 2 - 1i, .5 - 3i, 5 + 10i} {
		t.Log(z, DiffuseFromComplexImpedance(z))
	}
	a, err := NewAir(Atmosphere{20, 50, 101.325})
	t.Log(a, err, a.Attenuation(1000)*1000)
	_, err = NewAir(Atmosphere{80, -50, 101.325})
	t.Log(err)
}

func BenchmarkRoomModes(b *testing.B) {
	air, _ := NewAir(Atmosphere{20, 50, 101.325})
	l := Lining{{Finish{Absorption: []BandAbsorption{{63, .02}, {125, .05}, {250, .1}, {500, .1}, {1000, .2}}}, .7}, {Finish{Absorption: []BandAbsorption{{125, .3}, {250, .1}, {500, .7}}}, .3}}
	r := Room{Box{5.2, 3.9, 2.6}, air, Walls{l, l, l, l, l, l}}
	for b.Loop() {
		r.Modes(800)
	}
}
