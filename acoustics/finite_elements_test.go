package acoustics

import (
	"cmp"
	"encoding/json"
	"math"
	"os"
	"slices"
	"testing"
)

// finiteElements is testdata/finite_elements/patch.json: a room with one
// absorber patch solved by finite elements, as patch.py beside it explains.
type finiteElements struct {
	SpeedOfSound, Density       float64
	Size                        [3]float64
	Patch                       [2][2]float64 // from, to along y and z
	Resistance, Mass, Stiffness float64
	Source                      Point
	Seats                       []Point
	HighestHz                   float64 // of the poles
	Hz                          []float64
	Cases                       []struct {
		Name          string
		Alpha, Beta   [6]float64
		Bare, Treated finiteElementRoom
	}
}

type finiteElementRoom struct {
	Poles []struct {
		Hz    float64 // natural frequency
		Decay float64 // 1/s
	}
	Levels [][]float64 // [seat][frequency], dB
}

// finiteElementTolerances are how far the program may be from finite elements;
// frequency and decay relative, level in dB.
type finiteElementTolerances struct{ hz, decay, level float64 }

var (
	// Between rigid walls both solve the same equations: what is left is the
	// error of the mesh, 0.001 % in frequency and at a source or seat 0.02 dB by
	// its convergence. An air load 0.2 % off is already too much.
	rigidRoom = finiteElementTolerances{hz: 2e-5, decay: 5e-4, level: 0.03}
	// Absorbing walls also couple the modes with one another, which damping mode
	// by mode leaves out. In the bare room's poles that is of second order in the
	// admittance; between them it shows in the levels.
	absorbingBare = finiteElementTolerances{hz: 2e-5, decay: 5e-4, level: 0.06}
	// The treated room's waves are mixtures of bare modes, and what two modes of
	// one mixture lose at a wall together is of first order, however little it
	// absorbs: with this absorber, which moves a mode by 12 %, up to 2.6 % in
	// decay and thus some 0.3 dB near a peak.
	absorbingTreated = finiteElementTolerances{hz: 3e-5, decay: 0.03, level: 0.35}
)

// The room with one absorber patch, its poles and its levels, must be what finite
// elements make of it, which know neither modes nor static sums.
func TestFiniteElement(t *testing.T) {
	data, err := os.ReadFile("testdata/finite_elements/patch.json")
	if err != nil {
		t.Fatal(err)
	}
	var e finiteElements
	if err := json.Unmarshal(data, &e); err != nil {
		t.Fatal(err)
	}
	if len(e.Cases) != 2 {
		t.Fatalf("%d cases, want rigid and absorbing walls", len(e.Cases))
	}
	for _, c := range e.Cases {
		t.Run(c.Name, func(t *testing.T) {
			r := Room{Box: Box{e.Size[0], e.Size[1], e.Size[2]}, Air: Air{SpeedOfSound: e.SpeedOfSound, Density: e.Density}}
			for s, alpha := range c.Alpha {
				r.Walls[s] = flat(alpha)
				if b := r.Walls[s].Admittance(100); !near(b, c.Beta[s], 1e-12) {
					t.Fatalf("the %v wall has an admittance of %v, in finite elements %v", Surface(s), b, c.Beta[s])
				}
			}
			bare, treated := rigidRoom, rigidRoom
			if c.Name != "rigid" {
				bare, treated = absorbingBare, absorbingTreated
			}
			f := newTestField(t, r, []Source{{At: e.Source, Gain: 1}}, e.Seats, []Unit{e.unit()}, 1)
			var modes, poles []Oscillator
			for _, m := range r.Modes(e.HighestHz) {
				modes = append(modes, m.Oscillator())
			}
			found := polesOf(t, f, e.HighestHz)
			for _, p := range found.Modes {
				if p != nil {
					poles = append(poles, p.Oscillator)
				}
			}
			for _, p := range found.Absorbers {
				poles = append(poles, p.Oscillator)
			}
			levels := levelsOf(t, f, e.Hz)
			c.Bare.compare(t, "bare", modes, levels.Bare, e.Hz, bare)
			c.Treated.compare(t, "treated", poles, levels.Treated, e.Hz, treated)
		})
	}
}

// unit is the absorber: a piston of constant resistance on a spring.
func (e finiteElements) unit() Unit {
	var p Patch
	p.Surface = Back
	for axis, side := range e.Patch {
		p.Centre[axis], p.Size[axis] = (side[0]+side[1])/2, side[1]-side[0]
	}
	return Unit{
		Patch: p,
		Impedance: func(omega complex128) complex128 {
			jw := 1i * omega
			return complex(e.Resistance, 0) + jw*complex(e.Mass, 0) + complex(e.Stiffness, 0)/jw
		},
		Natural: math.Sqrt(e.Stiffness/e.Mass) / (2 * math.Pi),
	}
}

// compare holds poles and levels against those of finite elements.
func (e finiteElementRoom) compare(t *testing.T, what string, poles []Oscillator, levels [][]float64, hz []float64, within finiteElementTolerances) {
	t.Helper()
	slices.SortFunc(poles, func(a, b Oscillator) int { return cmp.Compare(a.Natural, b.Natural) })
	if len(poles) != len(e.Poles) {
		t.Fatalf("%s: %d poles, in finite elements %d", what, len(poles), len(e.Poles))
	}
	var most finiteElementTolerances
	for i, p := range poles {
		q := e.Poles[i]
		if !near(p.Natural, q.Hz, within.hz) {
			t.Errorf("%s: a pole at %.4f Hz, in finite elements at %.4f", what, p.Natural, q.Hz)
		}
		most.hz = math.Max(most.hz, math.Abs(p.Natural/q.Hz-1))
		if p.Decay == 0 && math.Abs(q.Decay) < 1e-6 {
			continue // no loss at all
		}
		if !near(p.Decay, q.Decay, within.decay) {
			t.Errorf("%s: at %.2f Hz a T60 of %.4f s, in finite elements %.4f", what, q.Hz, p.T60(), 3*math.Ln10/q.Decay)
		}
		most.decay = math.Max(most.decay, math.Abs(p.Decay/q.Decay-1))
	}
	for seat := range levels {
		for i, l := range levels[seat] {
			off := math.Abs(l - e.Levels[seat][i])
			if !(off <= within.level) {
				t.Errorf("%s: %.3f dB at seat %d at %g Hz, in finite elements %.3f", what, l, seat, hz[i], e.Levels[seat][i])
			}
			most.level = math.Max(most.level, off)
		}
	}
	t.Logf("%s: at most %.5f %% off in frequency, %.3f %% in decay, %.4f dB in level", what, 100*most.hz, 100*most.decay, most.level)
}
