package acoustics

import (
	"math"

	"gonum.org/v1/gonum/integrate/quad"
)

// staticSums holds S_1, S_2 and S_3 of a pair of ports,
//
//	S_j = Σ_{n≠0} û_p·û_q/(VΛ_n·k_n^{2j})
//
// in 1/m, m and m³, each over all modes without end: the room's response to a
// slow source and its first two derivatives with respect to k².
type staticSums [3]float64

// at returns S_1 + κ²·S_2 + κ⁴·S_3.
func (s staticSums) at(kappa2 complex128) complex128 {
	return complex(s[0], 0) + kappa2*(complex(s[1], 0)+kappa2*complex(s[2], 0))
}

const (
	// splitShare sets Ewald's splitting time: √τ over the cube root of the
	// volume. The answer does not depend on it, only the work does.
	splitShare = 0.2
	// splitReach is where exp(−k²τ) ends the modal half: e^-32 is 1e-14.
	splitReach = 32.0
	// ladderFoot is the least √t of the quadrature's ladder of panels in m,
	// well under the size of any patch or distance that occurs.
	ladderFoot = 0.00025
	// ladderPoints is the order of the Gauss-Legendre rule on each panel.
	ladderPoints = 8
)

// ladder is the quadrature over time of the short half of Ewald's splitting,
// ∫₀^τ f(t) dt, on panels in √t that double in width.
type ladder struct {
	tau     float64   // m²
	times   []float64 // m²
	weights []float64 // m²
}

// newLadder returns the quadrature for a box.
func newLadder(b Box) ladder {
	var (
		top    = splitShare * math.Cbrt(b.Volume())
		panels = max(1, int(math.Ceil(math.Log2(top/ladderFoot)))+1)
		l      = ladder{tau: top * top}
		x      = make([]float64, ladderPoints)
		w      = make([]float64, ladderPoints)
	)
	for i := panels - 1; i >= 0; i-- {
		lo, hi := top*math.Exp2(-float64(i+1)), top*math.Exp2(-float64(i))
		if i == panels-1 {
			lo = 0
		}
		quad.Legendre{}.FixedLocations(x, w, lo, hi)
		for j, u := range x {
			l.times = append(l.times, u*u)
			l.weights = append(l.weights, 2*u*w[j])
		}
	}
	return l
}

// highest returns the wave number beyond which no mode adds to the long half.
func (l ladder) highest() float64 { return math.Sqrt(splitReach / l.tau) }

// axisTable holds the heat kernels of one axis between all pairs of the spans
// that occur on it, at each time of a ladder.
type axisTable struct {
	index   map[span]int
	spans   []span
	kernels map[[2]int][]float64
}

// newAxisTable returns the table of one axis of length l for the spans of all
// ports; what a former table already holds is taken from it.
func newAxisTable(l float64, lad ladder, spans []span, former *axisTable) *axisTable {
	t := &axisTable{index: map[span]int{}, kernels: map[[2]int][]float64{}}
	for _, s := range spans {
		if _, ok := t.index[s]; !ok {
			t.index[s] = len(t.spans)
			t.spans = append(t.spans, s)
		}
	}
	for i, a := range t.spans {
		for j, b := range t.spans[:i+1] {
			if k := former.lookup(a, b); k != nil {
				t.kernels[[2]int{i, j}] = k
				continue
			}
			k := make([]float64, len(lad.times))
			for n, time := range lad.times {
				k[n] = heatKernel(l, time, a, b)
			}
			t.kernels[[2]int{i, j}] = k
		}
	}
	return t
}

// lookup returns the kernels of a pair of spans, nil where there are none.
func (t *axisTable) lookup(a, b span) []float64 {
	if t == nil {
		return nil
	}
	i, ok := t.index[a]
	j, also := t.index[b]
	if !ok || !also {
		return nil
	}
	return t.kernels[[2]int{max(i, j), min(i, j)}]
}

// statics works out the static sums of pairs of ports in one box.
type statics struct {
	box    Box
	ladder ladder
	tables [3]*axisTable
	modes  []Mode // those that still count in the long half
	orders [3]int // highest of them on each axis
	// long[j][n] is the factor of mode n in the long half of S_{j+1}, over VΛ.
	long [3][]float64
}

// newStatics prepares the sums for ports with the given spans; what the tables
// of a former one of the same box hold is taken over.
func newStatics(b Box, spans [][3]span, former *statics) *statics {
	s := &statics{box: b}
	if former != nil && former.box == b {
		s.ladder, s.modes, s.orders, s.long = former.ladder, former.modes, former.orders, former.long
	} else {
		former = nil
		s.ladder = newLadder(b)
		s.prepareLong()
	}
	for axis, l := range b.Dimensions() {
		var old *axisTable
		if former != nil {
			old = former.tables[axis]
		}
		along := make([]span, len(spans))
		for i, p := range spans {
			along[i] = p[axis]
		}
		s.tables[axis] = newAxisTable(l, s.ladder, along, old)
	}
	return s
}

// prepareLong fills in the factors of the long half,
//
//	(1/(j−1)!)·∫_τ^∞ t^{j−1}·exp(−k²t) dt
func (s *statics) prepareLong() {
	const unit = 2 * math.Pi // speed 2π makes a mode's frequency its wave number
	var (
		tau = s.ladder.tau
		v   = s.box.Volume()
	)
	s.modes = s.box.Modes(unit, s.ladder.highest())
	for j := range s.long {
		s.long[j] = make([]float64, len(s.modes))
	}
	for n, m := range s.modes {
		for axis, order := range m.Order {
			s.orders[axis] = max(s.orders[axis], order)
		}
		k2 := m.Hz * m.Hz
		e := math.Exp(-k2*tau) / (v * m.Norm)
		s.long[0][n] = e / k2
		s.long[1][n] = e * (tau + 1/k2) / k2
		s.long[2][n] = e * (tau*tau/2 + (tau+1/k2)/k2) / k2
	}
}

// weights returns û of a port for the modes of the long half.
func (s *statics) weights(port [3]span) []float64 {
	w := make([]float64, len(s.modes))
	along := s.box.axisMeans(port, s.orders)
	for n := range s.modes {
		o := &s.modes[n].Order
		w[n] = along[0][o[0]] * along[1][o[1]] * along[2][o[2]]
	}
	return w
}

// pair returns the static sums of two ports whose weights are given beside.
func (s *statics) pair(a, b [3]span, wa, wb []float64) staticSums {
	var (
		sums       staticSums
		kx, ky, kz = s.tables[0].lookup(a[0], b[0]), s.tables[1].lookup(a[1], b[1]), s.tables[2].lookup(a[2], b[2])
		tau, v     = s.ladder.tau, s.box.Volume()
	)
	for i, t := range s.ladder.times {
		f := s.ladder.weights[i] * kx[i] * ky[i] * kz[i]
		sums[0] += f
		sums[1] += f * t
		sums[2] += f * t * t / 2
	}
	// The uniform mode is no part of the sums.
	sums[0] -= tau / v
	sums[1] -= tau * tau / (2 * v)
	sums[2] -= tau * tau * tau / (6 * v)
	for n := range s.modes {
		w := wa[n] * wb[n]
		sums[0] += w * s.long[0][n]
		sums[1] += w * s.long[1][n]
		sums[2] += w * s.long[2][n]
	}
	return sums
}
