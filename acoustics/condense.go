package acoustics

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/floats"
	"gonum.org/v1/gonum/mat"
)

// A wide surface of many tiles moves in patterns. With orthonormal patterns as
// unknowns in place of the tiles nothing changes, since all tiles of an absorber
// have one impedance; but those patterns that no mode of the range has a part in are
// coupled to the room only through the air just before the surface, to second order,
// and stand alone. So a surface of hundreds of tiles costs what its few dozen smooth
// patterns cost.
const (
	// fewTiles is how many tiles of an absorber are still taken one by one.
	fewTiles = 6
	// patternsAbove is how far above the field's limit modes shape the patterns, as a
	// factor, and patternShare the relative amplitude below which a pattern counts as
	// having no part in them. Both are tested against all tiles taken one by one.
	patternsAbove = 1.0
	patternShare  = 5e-2
)

// rawPorts are the units as they are and what belongs to them, before they are
// condensed.
type rawPorts struct {
	units   []Unit
	weights [][]float64
	sums    []staticSums
}

// pattern is a unit made of several tiles: the volume velocities of tiles first …
// first+len(share)−1 are share times its own.
type pattern struct {
	first int
	share []float64
	loose bool
}

// condense puts patterns in place of the tiles of wide absorbers.
func (f *Field) condense() {
	f.raw = rawPorts{f.units, f.weights, f.sums}
	f.unity = make([]float64, len(f.spans))
	for p := range f.unity {
		f.unity[p] = 1
	}
	var patterns []pattern
	many := false
	for first := 0; first < len(f.units); {
		n := f.tilesFrom(first)
		list := []pattern(nil)
		if n > fewTiles {
			list = f.patterns(first, n)
		}
		if list == nil {
			for u := range n {
				patterns = append(patterns, pattern{first: first + u, share: []float64{1}})
			}
		} else {
			many = true
			patterns = append(patterns, list...)
		}
		first += n
	}
	if many {
		f.recast(patterns)
	}
	f.pairUnity()
}

// tilesFrom returns how many units from the first on are tiles alike of one absorber.
func (f *Field) tilesFrom(first int) int {
	n := 1
	a := f.units[first]
	for a.Tile && first+n < len(f.units) {
		b := f.units[first+n]
		if !b.Tile || b.Owner != a.Owner || b.Patch.Surface != a.Patch.Surface || b.Patch.Size != a.Patch.Size {
			break
		}
		n++
	}
	return n
}

// patterns returns the patterns of n tiles from the first on, those coupled to the
// modes before the loose ones; nil where the tiles do not fill a grid.
func (f *Field) patterns(first, n int) []pattern {
	i, j := f.units[first].Patch.Surface.InPlane()
	var (
		at     [2][]float64
		places = make([][2]int, n)
	)
	for k, axis := range [2]int{i, j} {
		for u := range n {
			at[k] = append(at[k], f.spans[first+u][axis].centre)
		}
		slices.Sort(at[k])
		at[k] = slices.CompactFunc(at[k], func(a, b float64) bool { return math.Abs(a-b) < 1e-9 })
		for u := range n {
			c := f.spans[first+u][axis].centre
			places[u][k] = slices.IndexFunc(at[k], func(a float64) bool { return math.Abs(a-c) < 1e-9 })
		}
	}
	if len(at[0])*len(at[1]) != n {
		return nil
	}
	qu, keptU := f.axisPatterns(i, at[0], f.units[first].Patch.Size[0])
	qv, keptV := f.axisPatterns(j, at[1], f.units[first].Patch.Size[1])
	var coupled, loose []pattern
	for a := range qu {
		for b := range qv {
			p := pattern{first: first, share: make([]float64, n), loose: a >= keptU || b >= keptV}
			for u, place := range places {
				p.share[u] = qu[a][place[0]] * qv[b][place[1]]
			}
			if p.loose {
				loose = append(loose, p)
			} else {
				coupled = append(coupled, p)
			}
		}
	}
	return append(coupled, loose...)
}

// axisPatterns returns an orthonormal set of patterns over the tiles along one axis,
// the strongest in the modes first, and how many have a part in them.
func (f *Field) axisPatterns(axis int, centres []float64, size float64) (q [][]float64, kept int) {
	var (
		n    = len(centres)
		l    = f.room.Box.Dimensions()[axis]
		most = int(math.Ceil(2 * l * patternsAbove * f.upTo / f.room.Air.SpeedOfSound))
		gram = mat.NewSymDense(n, nil)
	)
	for order := range most + 1 {
		row := make([]float64, n)
		for u, c := range centres {
			row[u] = span{c, size}.meanCos(float64(order) * math.Pi / l)
		}
		gram.SymRankOne(gram, 1, mat.NewVecDense(n, row))
	}
	var eigen mat.EigenSym
	if !eigen.Factorize(gram, true) {
		panic("acoustics: a Gram matrix has no eigenvectors")
	}
	var vectors mat.Dense
	eigen.VectorsTo(&vectors)
	values := eigen.Values(nil) // rising
	for k := n - 1; k >= 0; k-- {
		q = append(q, mat.Col(nil, k, &vectors))
		if values[k] > patternShare*patternShare*values[n-1] {
			kept++
		}
	}
	return q, kept
}

// recast turns the field's units into the patterns given.
func (f *Field) recast(patterns []pattern) {
	var (
		raw     = f.raw
		r       = len(raw.units)
		others  = len(f.spans) - r
		units   []Unit
		weights [][]float64
		unity   []float64
		kept    []pattern
	)
	for _, p := range patterns {
		u := raw.units[p.first]
		if p.loose {
			if u.Natural > 0 {
				f.loose = append(f.loose, p)
			}
			continue
		}
		w, ones := make([]float64, len(f.modes.damped)), 0.0
		for k, s := range p.share {
			floats.AddScaled(w, s, raw.weights[p.first+k])
			ones += s
		}
		units, weights, unity, kept = append(units, u), append(weights, w), append(unity, ones), append(kept, p)
	}
	for u := range units {
		f.alike = append(f.alike, u > 0 && kept[u].first == kept[u-1].first)
	}
	f.units = units
	f.weights = append(weights, raw.weights[r:]...)
	for range others {
		unity = append(unity, 1)
	}
	f.unity = unity
	f.recastSums(kept, r)
}

// recastSums turns the static sums into those of the patterns; r is how many raw
// units there are.
func (f *Field) recastSums(kept []pattern, r int) {
	raw := f.raw.sums
	f.sums = make([]staticSums, f.pairs())
	rows := make([][]staticSums, len(kept)) // of each pattern with every raw unit
	for p := range kept {
		rows[p] = f.mixedRow(kept[p], r)
	}
	others := len(f.spans) - r
	f.eachPair(func(p, q, at int) {
		switch {
		case p < len(kept):
			f.sums[at] = along(kept[q], rows[p])
		case q < len(kept):
			start := r*(r+1)/2 + (p-len(kept))*r
			f.sums[at] = along(kept[q], raw[start:start+r])
		default:
			// Seat and source: as they were, at the end of the list.
			f.sums[at] = raw[r*(r+1)/2+others*r+at-(len(kept)*(len(kept)+1)/2+others*len(kept))]
		}
	})
}

// rawSum returns the static sums of two raw units.
func (f *Field) rawSum(p, q int) staticSums {
	if p < q {
		p, q = q, p
	}
	return f.raw.sums[p*(p+1)/2+q]
}

// mixedRow returns the static sums of a pattern with every raw unit.
func (f *Field) mixedRow(p pattern, r int) []staticSums {
	row := make([]staticSums, r)
	for q := range row {
		for k, s := range p.share {
			v := f.rawSum(p.first+k, q)
			for j := range v {
				row[q][j] += s * v[j]
			}
		}
	}
	return row
}

// along returns a pattern's share of a row of sums over raw units.
func along(p pattern, row []staticSums) (sum staticSums) {
	for k, s := range p.share {
		for j, v := range row[p.first+k] {
			sum[j] += s * v
		}
	}
	return sum
}

// mixed returns the static sums of two patterns.
func (f *Field) mixed(p, q pattern) (sum staticSums) {
	for k, s := range p.share {
		for m, t := range q.share {
			v := f.rawSum(p.first+k, q.first+m)
			for j := range v {
				sum[j] += s * t * v[j]
			}
		}
	}
	return sum
}

// pairUnity fills in what of the uniform mode each pair has.
func (f *Field) pairUnity() {
	f.uniform = make([]float64, f.pairs())
	f.eachPair(func(p, q, at int) { f.uniform[at] = f.unity[p] * f.unity[q] })
}

// loosePoles returns the poles of the patterns that stand alone, up to a frequency
// in Hz: the zeros of Z + jωρ·S_1, by Newton's method.
func (f *Field) loosePoles(upTo float64) []AbsorberPole {
	var list []AbsorberPole
	for _, p := range f.loose {
		unit, load := f.raw.units[p.first], f.mixed(p, p)[0]
		hz, ok := unit.resonance(load, f.room.Air.Density)
		if !ok {
			continue
		}
		z := func(w complex128) complex128 {
			return unit.Impedance(w) + 1i*w*complex(f.room.Air.Density*load, 0)
		}
		root := complex(2*math.Pi*hz, 0)
		for range 30 {
			h := root * residueStep
			step := z(root) * 2 * h / (z(root+h) - z(root-h))
			root -= step
			if real(step)*real(step)+imag(step)*imag(step) < 1e-20*real(root)*real(root) {
				break
			}
		}
		natural := math.Hypot(real(root), imag(root)) / (2 * math.Pi)
		if real(root) <= 0 || imag(root) <= 0 || imag(root) > tallest || natural > upTo || math.Abs(natural/hz-1) > 0.5 {
			continue
		}
		q := Pole{Oscillator: Oscillator{Natural: natural, Decay: imag(root)}, Omega: root,
			Residues: make([]complex128, len(f.seats)), LevelDB: make([]float64, len(f.seats))}
		for e := range q.LevelDB {
			q.LevelDB[e] = math.NaN()
		}
		list = append(list, AbsorberPole{Pole: q, Owner: unit.Owner})
	}
	return list
}
