package resonators

import (
	"math"
	"testing"

	"stillroom/acoustics"

	"pgregory.net/rapid"
)

// Absorbers of any dimensions that a project file may hold (its ranges, in SI),
// in any air that it may hold.

// logBetween draws a value between lo and hi, each factor as likely as another.
func logBetween(t *rapid.T, name string, lo, hi float64) float64 {
	v := math.Exp(rapid.Float64Range(math.Log(lo), math.Log(hi)).Draw(t, name))
	return min(max(v, lo), hi)
}

// orNone draws 0 half of the time, else a value between lo and hi.
func orNone(t *rapid.T, name string, lo, hi float64) float64 {
	if rapid.Bool().Draw(t, name+" none") {
		return 0
	}
	return logBetween(t, name, lo, hi)
}

func anyAir(t *rapid.T) acoustics.Air {
	air, err := acoustics.NewAir(acoustics.Atmosphere{
		TemperatureC:        rapid.Float64Range(-20, 50).Draw(t, "temperature"),
		RelativeHumidityPct: rapid.Float64Range(0, 100).Draw(t, "humidity"),
		PressureKPa:         rapid.Float64Range(60, 110).Draw(t, "pressure"),
	})
	if err != nil {
		t.Fatal(err)
	}
	return air
}

func anyFlow(t *rapid.T) float64  { return logBetween(t, "flow resistivity", 100, 1e6) }
func anyDepth(t *rapid.T) float64 { return logBetween(t, "depth", 1e-3, 2) }
func anySheet(t *rapid.T) float64 { return logBetween(t, "sheet", 1e-4, 0.1) }

// anyJCA draws nil half of the time.
func anyJCA(t *rapid.T) *JCA {
	if rapid.Bool().Draw(t, "Miki") {
		return nil
	}
	return &JCA{
		Porosity:      rapid.Float64Range(0.01, 1).Draw(t, "porosity"),
		Tortuosity:    rapid.Float64Range(1, 10).Draw(t, "tortuosity"),
		ViscousLength: logBetween(t, "viscous length", 1e-6, 1e-2),
		ThermalLength: logBetween(t, "thermal length", 1e-6, 1e-2),
	}
}

// anyFill draws none, a fill of part of the depth on either side, or of all.
func anyFill(t *rapid.T, depth float64) *Fill {
	if rapid.Bool().Draw(t, "empty") {
		return nil
	}
	f := &Fill{
		Thickness:       min(depth, anyDepth(t)),
		FlowResistivity: anyFlow(t),
		AtFace:          rapid.Bool().Draw(t, "at the face"),
		JCA:             anyJCA(t),
	}
	if rapid.Bool().Draw(t, "full") {
		f.Thickness = depth
	}
	return f
}

// anyHoles draws a diameter and a pitch wider than it.
func anyHoles(t *rapid.T) (hole, pitch float64) {
	hole = logBetween(t, "hole", 5e-5, 0.1)
	return hole, hole * logBetween(t, "pitch over hole", 1.0001, 20)
}

func anyNeck(t *rapid.T) Absorber {
	n := Neck{
		Cavity: logBetween(t, "cavity", 5e-5, 5),
		Length: orNone(t, "length", 1e-3, 2),
		Mouths: rapid.IntRange(1, 100).Draw(t, "mouths"),
		Gauze:  orNone(t, "gauze", 1, 1e6),
		Front:  [2]float64{logBetween(t, "width", 0.01, 100), logBetween(t, "height", 0.01, 100)},
	}
	widest := 0.99 * math.Sqrt(n.Front[0]*n.Front[1]/(math.Pi*float64(n.Mouths)))
	n.MouthRadius = min(widest, logBetween(t, "mouth radius", 2.5e-3, 0.5))
	if rapid.Bool().Draw(t, "filled") {
		n.FillShare, n.FillFlow = rapid.Float64Range(0, 1).Draw(t, "filled share"), anyFlow(t)
	}
	return n
}

func anyPanel(t *rapid.T) Absorber {
	p := Panel{
		Mass: logBetween(t, "mass", 0.1, 200), Thickness: anySheet(t), Youngs: orNone(t, "Young's modulus", 1e6, 1e12),
		Poisson: rapid.Float64Range(0, 0.5).Draw(t, "Poisson"), LossFactor: rapid.Float64Range(0, 2).Draw(t, "loss factor"),
		Cavity: anyDepth(t), Edge: orNone(t, "edge", 1, 1e6),
		Size: [2]float64{logBetween(t, "width", 0.01, 100), logBetween(t, "height", 0.01, 100)},
	}
	p.Fill = anyFill(t, p.Cavity)
	return p
}

func anyPerforated(t *rapid.T) Absorber {
	p := Perforated{Sheet: anySheet(t), Cavity: anyDepth(t), Gauze: orNone(t, "gauze", 1, 1e6),
		Partitioned: rapid.Bool().Draw(t, "partitioned")}
	p.Hole, p.Pitch = anyHoles(t)
	p.Fill = anyFill(t, p.Cavity)
	return p
}

func anySlotted(t *rapid.T) Absorber {
	s := Slotted{Slat: logBetween(t, "slat", 1e-3, 1), Slot: logBetween(t, "slot", 5e-5, 0.1), Sheet: anySheet(t),
		Cavity: anyDepth(t), Partitioned: rapid.Bool().Draw(t, "partitioned")}
	s.Fill = anyFill(t, s.Cavity)
	return s
}

func anyMicroperforated(t *rapid.T) Absorber {
	m := Microperforated{Sheet: anySheet(t), Cavity: anyDepth(t), Partitioned: rapid.Bool().Draw(t, "partitioned")}
	m.Hole, m.Pitch = anyHoles(t)
	return m
}

func anyPorous(t *rapid.T) Absorber {
	return Porous{Thickness: anyDepth(t), FlowResistivity: anyFlow(t), Gap: orNone(t, "gap", 1e-3, 2), JCA: anyJCA(t)}
}

var anyKind = []struct {
	name string
	draw func(*rapid.T) Absorber
}{
	{"neck", anyNeck}, {"panel", anyPanel}, {"perforated", anyPerforated},
	{"slotted", anySlotted}, {"microperforated", anyMicroperforated}, {"porous", anyPorous},
}

// overOne is what a coefficient may pass 1 by: the weights of the quadrature
// and of the band's mean add up to 1 only to within some roundings of 1e-16.
const overOne = 1e-13

// coefficient fails where v is not between 0 and 1.
func coefficient(t *rapid.T, what string, a Absorber, v float64) {
	t.Helper()
	if !(v >= 0 && v <= 1+overOne) {
		t.Fatalf("%s: α = %v of %#v", what, v, a)
	}
}

// Nothing that stands before a rigid wall gives out more than it takes.
func TestAnyDimensionsArePassive(t *testing.T) {
	for _, kind := range anyKind {
		t.Run(kind.name, func(t *testing.T) {
			rapid.Check(t, func(t *rapid.T) {
				var (
					a   = kind.draw(t)
					air = anyAir(t)
					hz  = logBetween(t, "hz", 16, 20000)
				)
				if err := a.Validate(); err != nil {
					t.Fatal(err)
				}
				for name, z := range map[string]complex128{
					"specific": a.Specific(omegaOf(hz), air), "in the room": a.InRoom(omegaOf(hz), 0.05, air),
				} {
					if !(real(z) >= 0) || math.IsNaN(imag(z)) {
						t.Fatalf("%s at %g Hz: %v of %#v", name, hz, z, a)
					}
				}
				coefficient(t, "normal", a, NormalAbsorption(a, hz, air))
				coefficient(t, "diffuse", a, DiffuseAbsorption(a, hz, FullField, air))
				coefficient(t, "to 78°", a, DiffuseAbsorption(a, hz, FieldIncidence, air))
				coefficient(t, "to any angle", a, DiffuseAbsorption(a, hz, rapid.Float64Range(0.05, FullField).Draw(t, "limit"), air))
			})
		})
	}
}

// The table and the rating of any absorber are coefficients too, and its
// oscillator, where it has one, is no source.
func TestAnyDimensionsAreReported(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		kind := anyKind[rapid.IntRange(0, len(anyKind)-1).Draw(t, "kind")]
		a, air := kind.draw(t), anyAir(t)
		r := Analyse(a, air, unitSize)
		for _, b := range r.ThirdOctaves {
			coefficient(t, b.Nominal+" Hz, normal", a, b.Normal)
			coefficient(t, b.Nominal+" Hz, diffuse", a, b.Diffuse)
		}
		for _, o := range r.Practical {
			coefficient(t, o.Nominal+" Hz, practical", a, o.Alpha)
		}
		coefficient(t, "weighted", a, r.AlphaW)
		if o := r.Oscillator; o != nil && !(o.Decay >= 0 && r.Mass > 0 && r.Stiffness > 0 && r.Resistance >= 0) {
			t.Fatalf("oscillator %+v, mass %g, stiffness %g, resistance %g of %#v", *o, r.Mass, r.Stiffness, r.Resistance, a)
		}
	})
}
