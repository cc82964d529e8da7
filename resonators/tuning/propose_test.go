package tuning

import (
	"context"
	"errors"
	"math"
	"reflect"
	"testing"

	"stillroom/acoustics"
	"stillroom/resonators"
)

func propose(t *testing.T, p Problem) []Candidate {
	t.Helper()
	c, err := Propose(context.Background(), p)
	if err != nil {
		t.Fatal(err)
	}
	return c
}

// A search that is stopped says so.
func TestProposeStops(t *testing.T) {
	ctx, stop := context.WithCancel(context.Background())
	stop()
	if _, err := Propose(ctx, problem(t)); !errors.Is(err, context.Canceled) {
		t.Errorf("stopped, it returns %v", err)
	}
}

func problem(t *testing.T) Problem {
	t.Helper()
	air, err := acoustics.NewAir(acoustics.Atmosphere{TemperatureC: 20, RelativeHumidityPct: 50, PressureKPa: 101.325})
	if err != nil {
		t.Fatal(err)
	}
	wall := acoustics.Lining{{Finish: acoustics.Finish{Absorption: []acoustics.BandAbsorption{{Hz: 125, Alpha: 0.05}}}, Share: 1}}
	room := acoustics.Room{Box: acoustics.Box{Length: 5.3, Width: 3.86, Height: 2.58}, Air: air,
		Walls: acoustics.Walls{wall, wall, wall, wall, wall, wall}}
	return Problem{Mode: room.Modes(50)[1], Box: room.Box, Air: air, Depth: 0.3}
}

// What is proposed can be built where it is put and meets the mode.
func TestProposalsCanBeBuilt(t *testing.T) {
	p := problem(t)
	p.Occupied = []Occupied{{Surface: acoustics.Left, Centre: [2]float64{0.5, 1}, Size: [2]float64{1, 2}, Depth: 0.1}}
	kinds := map[string]int{}
	for i, c := range propose(t, p) {
		kinds[c.Absorber.Kind()]++
		if err := c.Absorber.Validate(); err != nil {
			t.Errorf("%d: %v", i, err)
		}
		if c.Absorber.Kind() != "porous" && math.Abs(c.Oscillator.Natural/p.Mode.Hz-1) > meets {
			t.Errorf("%d: resonates at %.2f Hz, the mode is at %.2f", i, c.Oscillator.Natural, p.Mode.Hz)
		}
		if c.Depth > p.Depth+1e-9 {
			t.Errorf("%d: stands out %.3f m", i, c.Depth)
		}
		a, b := c.At.Surface.InPlane()
		d := p.Box.Dimensions()
		lo := [2]float64{c.At.Centre[0] - c.At.Size[0]/2, c.At.Centre[1] - c.At.Size[1]/2}
		hi := [2]float64{lo[0] + c.At.Size[0]*float64(c.At.Units), lo[1] + c.At.Size[1]}
		if lo[0] < -1e-6 || lo[1] < -1e-6 || hi[0] > d[a]+1e-6 || hi[1] > d[b]+1e-6 {
			t.Errorf("%d: %+v is not on its surface", i, c.At)
		}
		if c.At.Surface == acoustics.Left && lo[0] < 1-1e-6 && lo[1] < 2-1e-6 {
			t.Errorf("%d: %+v lies on what is there", i, c.At)
		}
		for _, tol := range Tolerances(resonators.Sensitivities(c.Absorber, p.Air, c.At.Size), c.Pair[0].HalfPowerWidth()) {
			if !math.IsInf(tol.Allowed, 1) && math.Abs(tol.Allowed*tol.F0Derivative()) > c.Pair[0].HalfPowerWidth()/2*1.001 {
				t.Errorf("%d: %s may be off by %v", i, tol.Dimension, tol.Allowed)
			}
		}
	}
	if kinds["neck"] == 0 || kinds["panel"] == 0 {
		t.Errorf("proposed are %v, want boxes and panels", kinds)
	}
}

func TestProposeIsDeterministic(t *testing.T) {
	p := problem(t)
	p.Kinds, p.Surfaces = []string{"neck"}, []acoustics.Surface{acoustics.Right}
	a, b := propose(t, p), propose(t, p)
	if !reflect.DeepEqual(a, b) || len(a) == 0 {
		t.Errorf("%d and %d candidates that differ", len(a), len(b))
	}
	for _, c := range a {
		if _, neck := c.Absorber.(resonators.Neck); !neck || c.At.Surface != acoustics.Right {
			t.Errorf("%s on %v was not asked for", c.Absorber.Kind(), c.At.Surface)
		}
	}
	p.Depth = 0.03
	if got := propose(t, p); len(got) != 0 {
		t.Errorf("%d boxes 3 cm deep", len(got))
	}
}

// The strongest spot of (1,0,0) on an end wall is anywhere; of (0,1,0) on the
// front wall an edge at the left or right.
func TestSiteIsWhereTheModeIsStrong(t *testing.T) {
	p := problem(t)
	for _, m := range p.Box.Modes(p.Air.SpeedOfSound, 50) {
		if m.Order != [3]int{0, 1, 0} {
			continue
		}
		p.Mode.Mode = m
		at, _, ok := p.site(acoustics.Front, [2]float64{0.4, 0.4}, 1, 0.3)
		if !ok || math.Min(at.Centre[0]-0.2, p.Box.Width-at.Centre[0]-0.2) > 1e-9 {
			t.Errorf("the spot is %+v, not at an edge", at)
		}
	}
}
