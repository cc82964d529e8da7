package acoustics

import (
	"context"
	"errors"
	"math"
	"sort"
)

// Source is a monopole of constant volume acceleration.
type Source struct {
	At    Point
	Gain  float64 // amplitude factor, negative where inverted
	Delay float64 // s
}

const (
	// modesAbove is how far above a frequency modes are summed one by one, and
	// listAbove how far the list of modes reaches, both as a factor. Beyond the
	// first, a mode enters through the static sums, whose series leaves
	// (k/k_n)^6 of each; a test doubles both.
	modesAbove = 2.5
	listAbove  = 3.0
	// leastReach is the least frequency up to which modes are summed one by
	// one, as a factor of the lowest mode's.
	leastReach = 4.0
)

// Field is the sound field of a room with loudspeakers, seats and absorber
// units in place: modes, their weights at each port, and the complete static
// sums between ports, worked out once and used at every frequency. It is
// immutable and safe for concurrent use.
//
// The room's response between two ports, a point or a patch each, is
//
//	Γ_pq(k) = Σ_n û_p·û_q/(VΛ_n·(k_n² − k² + 2jkδ_n/c))
//
// over all modes without end, the uniform one included. With κ² = k² − 2jkδ̄/c,
// δ̄ the mean decay constant of the modes beyond those summed one by one,
//
//	Γ = Γ_uniform + S_1 + κ²S_2 + κ⁴S_3
//	    + Σ_{0<n≤N} (û_p·û_q/VΛ)·[1/(k_n²−k²+2jkδ_n/c) − 1/k_n² − κ²/k_n⁴ − κ⁴/k_n⁶]
//
// which is the same sum, but settled after few modes.
type Field struct {
	room    Room
	sources []Source
	seats   []Point
	units   []Unit
	upTo    float64
	factor  float64 // modesAbove, or more in the test that doubles it

	modes modeTable
	// Ports run: units, sources, seats.
	spans   [][3]span
	weights [][]float64 // [port][mode]
	sums    []staticSums
	unity   []float64 // [port]: of the uniform mode, 1 but for patterns
	uniform []float64 // [pair]: product of both
	raw     rawPorts  // before the tiles of wide absorbers were condensed
	loose   []pattern // of them those that stand alone
	alike   []bool    // [unit]: has the impedance of the one before it; nil: none has
	statics *statics
	long    [][]float64 // [port]: weights in the static sums' long half
}

// modeTable holds the modes in arrays, rising in frequency.
type modeTable struct {
	damped  []DampedMode
	k2      []float64 // k_n², 1/m²
	inverse []float64 // 1/k_n², m²
	loss    []float64 // δ_n/c, 1/m
	share   []float64 // 1/(VΛ_n), 1/m³
	tail    []float64 // mean of δ/c over the modes from n on, weighted as they enter S_2
	uniform float64   // δ_0/c of the uniform mode, 1/m
	orders  [3]int    // highest on each axis
}

// NewField places loudspeakers, seats and units in a room and works out the
// static sums. upTo is the highest frequency in Hz that will be asked for. It
// returns the error of ctx, or says that upTo is no frequency.
func NewField(ctx context.Context, r Room, sources []Source, seats []Point, units []Unit, upTo float64) (*Field, error) {
	return newField(ctx, r, sources, seats, units, upTo, 1, nil)
}

// Rearranged returns the field of the same room with other loudspeakers, seats
// or units in it. What does not depend on what has moved is taken over; the
// result is that of NewField.
func (f *Field) Rearranged(ctx context.Context, sources []Source, seats []Point, units []Unit) (*Field, error) {
	return newField(ctx, f.room, sources, seats, units, f.upTo, f.factor, f)
}

func newField(ctx context.Context, r Room, sources []Source, seats []Point, units []Unit, upTo, factor float64, former *Field) (*Field, error) {
	if !(upTo > 0) || math.IsInf(upTo, 1) {
		return nil, errors.New("acoustics: the highest frequency of a field must be above 0 Hz")
	}
	f := &Field{room: r, upTo: upTo, factor: factor,
		sources: append([]Source(nil), sources...),
		seats:   append([]Point(nil), seats...),
		units:   append([]Unit(nil), units...),
	}
	if former != nil {
		f.modes = former.modes
	} else {
		f.modes = newModeTable(r, factor*listAbove*math.Max(upTo, leastReach*r.lowestHz()/listAbove))
	}
	f.place()
	if err := f.weigh(ctx, former); err != nil {
		return nil, err
	}
	if err := f.sumStatics(ctx, former); err != nil {
		return nil, err
	}
	f.condense()
	return f, nil
}

// lowestHz returns the frequency of the lowest mode.
func (r Room) lowestHz() float64 {
	d := r.Box.Dimensions()
	return r.Air.SpeedOfSound / (2 * math.Max(d[0], math.Max(d[1], d[2])))
}

func newModeTable(r Room, upTo float64) modeTable {
	var (
		c      = r.Air.SpeedOfSound
		v      = r.Box.Volume()
		damped = r.Modes(upTo)
		n      = len(damped)
		t      = modeTable{damped: damped, k2: make([]float64, n), inverse: make([]float64, n),
			loss: make([]float64, n), share: make([]float64, n), tail: make([]float64, n+1)}
	)
	for i, m := range damped {
		for axis, order := range m.Order {
			t.orders[axis] = max(t.orders[axis], order)
		}
		k := 2 * math.Pi * m.Hz / c
		t.k2[i], t.inverse[i] = k*k, 1/(k*k)
		t.loss[i] = m.Damping.Total() / c
		t.share[i] = 1 / (v * m.Norm)
	}
	var sum, weight float64
	for i := n - 1; i >= 0; i-- {
		w := t.inverse[i] * t.inverse[i]
		sum += w * t.loss[i]
		weight += w
		t.tail[i] = sum / weight
	}
	if n > 0 {
		t.tail[n] = t.loss[n-1]
	}
	t.uniform = ModalDamping(r.Box, r.Box.UniformMode(), r.Walls, r.Air).Total() / c
	return t
}

// place lists the ports' extents: units, sources, seats.
func (f *Field) place() {
	for _, u := range f.units {
		f.spans = append(f.spans, u.Patch.spans(f.room.Box))
	}
	for _, s := range f.sources {
		f.spans = append(f.spans, s.At.spans())
	}
	for _, p := range f.seats {
		f.spans = append(f.spans, p.spans())
	}
}

// spans returns the point as a port without extent.
func (p Point) spans() [3]span { return [3]span{{centre: p[0]}, {centre: p[1]}, {centre: p[2]}} }

// weigh works out û of every port for every mode.
func (f *Field) weigh(ctx context.Context, former *Field) error {
	known := map[[3]span]int{}
	if former != nil {
		for i, s := range former.spans {
			known[s] = i
		}
	}
	f.weights = make([][]float64, len(f.spans))
	for p, s := range f.spans {
		if i, ok := known[s]; ok {
			f.weights[p] = former.rawWeights(i)
			continue
		}
		if err := ctx.Err(); err != nil {
			return err
		}
		f.weights[p] = f.portWeights(s)
	}
	return nil
}

// rawWeights returns û of the port of that index among the spans.
func (f *Field) rawWeights(port int) []float64 { return f.raw.weights[port] }

// portWeights returns û of one port for every mode, by a table of each axis.
func (f *Field) portWeights(port [3]span) []float64 {
	w := make([]float64, len(f.modes.damped))
	along := f.room.Box.axisMeans(port, f.modes.orders)
	for i := range f.modes.damped {
		n := &f.modes.damped[i].Order
		w[i] = along[0][n[0]] * along[1][n[1]] * along[2][n[2]]
	}
	return w
}

// axisMeans returns, for each axis, the mean of cos(nπx/l) over a port's extent for
// the orders n from 0 to the highest given.
func (b Box) axisMeans(port [3]span, highest [3]int) (along [3][]float64) {
	for axis, l := range b.Dimensions() {
		t := make([]float64, highest[axis]+1)
		t[0] = 1
		for n := 1; n < len(t); n++ {
			t[n] = port[axis].meanCos(float64(n) * math.Pi / l)
		}
		along[axis] = t
	}
	return along
}

// sumStatics works out the static sums of all pairs that are ever asked for:
// not those of two sources or two seats.
func (f *Field) sumStatics(ctx context.Context, former *Field) error {
	var past *statics
	known := map[[2][3]span]staticSums{}
	if former != nil {
		past = former.statics
		eachPairOf(len(former.raw.units), len(former.sources), len(former.seats), func(p, q, at int) {
			known[[2][3]span{former.spans[p], former.spans[q]}] = former.raw.sums[at]
		})
	}
	f.statics = newStatics(f.room.Box, f.spans, past)
	f.long = make([][]float64, len(f.spans))
	for p, s := range f.spans {
		f.long[p] = f.statics.weights(s)
	}
	f.sums = make([]staticSums, f.pairs())
	var err error
	f.eachPair(func(p, q, at int) {
		if at%64 == 0 && err == nil {
			err = ctx.Err()
		}
		if err != nil {
			return
		}
		if s, ok := known[[2][3]span{f.spans[p], f.spans[q]}]; ok {
			f.sums[at] = s
			return
		}
		s := f.statics.pair(f.spans[p], f.spans[q], f.long[p], f.long[q])
		if p == q {
			s[0] += f.units[p].Patch.mouthCorrection()
		}
		f.sums[at] = s
	})
	return err
}

// pairs returns how many pairs eachPair visits.
func (f *Field) pairs() int {
	r, s, e := len(f.units), len(f.sources), len(f.seats)
	return r*(r+1)/2 + (s+e)*r + s*e
}

// eachPair visits the pairs of ports in the order of sums: unit with each unit
// up to itself, then each source and seat with each unit, then each seat with
// each source.
func (f *Field) eachPair(visit func(p, q, at int)) {
	eachPairOf(len(f.units), len(f.sources), len(f.seats), visit)
}

// eachPairOf visits the pairs of r units, s sources and e seats.
func eachPairOf(r, s, e int, visit func(p, q, at int)) {
	at := 0
	for p := range r + s + e {
		last := min(p+1, r)
		if p >= r {
			last = r
		}
		for q := range last {
			visit(p, q, at)
			at++
		}
	}
	for p := range e {
		for q := range s {
			visit(r+s+p, r+q, at)
			at++
		}
	}
}

// reach returns how many modes are summed one by one at a frequency.
func (f *Field) reach(hz float64) int {
	limit := f.factor * math.Max(modesAbove*hz, leastReach*f.room.lowestHz())
	return sort.Search(len(f.modes.damped), func(i int) bool { return f.modes.damped[i].Hz > limit })
}

// ModeLevel returns the level in dB of a bare mode's own peak at a seat,
//
//	20 log10(4π·|Σ_s g_s·exp(−jω_n·τ_s)·ψ(s)|·|ψ(r)|·c²/(2VΛ·ω_n·δ_n))
//
// and NaN where the mode is nothing there: at a node, or with sources that
// cancel in it.
func (f *Field) ModeLevel(m DampedMode, seat int) float64 {
	var (
		b      = f.room.Box
		c      = f.room.Air.SpeedOfSound
		omega  = 2 * math.Pi * m.Hz
		re, im float64
		whole  float64
	)
	for _, s := range f.sources {
		g := s.Gain * b.Value(m.Mode, s.At)
		sin, cos := math.Sincos(-omega * s.Delay)
		re += g * cos
		im += g * sin
		whole += math.Abs(s.Gain)
	}
	a := math.Hypot(re, im) * math.Abs(b.Value(m.Mode, f.seats[seat]))
	if a <= nothing*whole {
		return math.NaN()
	}
	return 20 * math.Log10(4*math.Pi*a*c*c/(2*b.Volume()*m.Norm*omega*m.Damping.Total()))
}

// nothing is the share of its greatest possible value below which a level is
// rounding, not sound: 180 dB down.
const nothing = 1e-9
