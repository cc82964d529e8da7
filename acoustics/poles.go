package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"runtime"
	"sync"
)

// Pole is one damped oscillation of the treated room.
type Pole struct {
	Oscillator           // natural frequency |ω|/2π and decay Im ω
	LevelDB    []float64 // per seat: 20 log10(4π·|residue|/Im ω); NaN for nothing
	// Omega is the complex angular frequency, 1/s, and Residues the residue there
	// of the pressure at each seat per unit source, 0 for nothing.
	Omega    complex128
	Residues []complex128
}

// Poles are those of the treated room below the limit asked for, T60 ≥ 0.02 s.
type Poles struct {
	// Modes[i] is the pole that the bare mode i became by continuation from
	// weak coupling, nil where it is no longer listed; in the order of
	// Room.Modes(upTo).
	Modes []*Pole
	// Absorbers are those that grew from units' own resonances.
	Absorbers []AbsorberPole
	// Counted is the number of poles the argument principle finds inside the
	// contour, Found those that were followed there; equal when none is lost.
	// The contour is the rectangle of Re ω/2π from about half the lowest mode's
	// frequency to about the limit asked for, Im ω from just below 0 to about that
	// of T60 = 0.02 s: where between its edges and the poles there is room.
	Counted, Found int
}

// AbsorberPole is a pole that grew from the resonance of a unit.
type AbsorberPole struct {
	Pole
	Owner int
}

const (
	// shortestT60 is the decay in s below which a pole is not listed.
	shortestT60 = 0.02
	// untouched is the greatest |û| at the units of a mode that none touches.
	untouched = 1e-9
	// followAbove is how far above the limit modes and units are followed, since
	// their poles may come down into it.
	followAbove = 1.15
	// unitsAbove is the same for units, which the room's air tunes down.
	unitsAbove = 1.4
)

// path is one oscillation followed from weak coupling to the room as it is.
type path struct {
	mode  int // index in the field's modes, −1 for a unit's
	unit  int // index of the unit, −1 for a mode's
	root  complex128
	found bool
	// last is how far the path was followed, where it was lost.
	last complex128
}

// Poles returns the complex frequencies at which the treated room rings by
// itself, up to a frequency in Hz that is within the field's limit: the zeros of
//
//	det(Z(ω) + jωρ·G(ω)),
//
// with the modes that no unit touches as they are. Each is followed from weak
// coupling: at s = 0 the units stand alone, each with the air mass that the room
// puts before it, and everything else between units and room is scaled by s from
// 0 to 1. What the argument principle counts beyond that is looked for by
// Newton's method with the known zeros divided out. progress, where not nil, is
// told how many of how many paths are done. It returns the error of ctx.
func (f *Field) Poles(ctx context.Context, upTo float64, progress func(done, total int)) (Poles, error) {
	distants, err := f.newDistants(ctx, 0, 1.3*upTo)
	if err != nil {
		return Poles{}, err
	}
	paths := f.starts(upTo)
	if err := f.followAll(ctx, paths, distants, progress); err != nil {
		return Poles{}, err
	}
	dropTwins(paths)
	edge := f.contour(upTo, paths)
	counted, err := f.count(ctx, edge, distants)
	if err != nil {
		return Poles{}, err
	}
	if inside(paths, edge) < counted {
		if paths, err = f.recover(ctx, paths, edge, counted, distants); err != nil {
			return Poles{}, err
		}
	}
	poles, err := f.listed(ctx, paths, upTo, edge, counted, distants)
	poles.Absorbers = append(poles.Absorbers, f.loosePoles(upTo)...)
	sortPoles(poles.Absorbers)
	return poles, err
}

// PolesNear follows only the modes between two frequencies in Hz, and those units of one
// owner that resonate about there; where order is no uniform one, of the modes only that
// one. It goes without counting what they come to: for a search that tries
// many absorbers and has the room counted at its end. A pole that it does not find is
// nil or missing. Modes[i] belongs to the i-th of those modes that are followed.
func (f *Field) PolesNear(ctx context.Context, low, high float64, owner int, order [3]int) (Poles, error) {
	distants, err := f.newDistants(ctx, 0.75*low, 1.15*high)
	if err != nil {
		return Poles{}, err
	}
	var paths []path
	for i, m := range f.modes.damped {
		if m.Hz >= low && m.Hz <= high && (order == [3]int{} || m.Order == order) {
			paths = append(paths, path{mode: i, unit: -1})
		}
	}
	for u, unit := range f.units {
		if unit.Owner == owner && unit.Natural >= low/unitsAbove && unit.Natural <= unitsAbove*high {
			paths = append(paths, path{mode: -1, unit: u})
		}
	}
	if err := f.followAll(ctx, paths, distants, nil); err != nil {
		return Poles{}, err
	}
	dropTwins(paths)
	return f.listed(ctx, paths, high, rectangle{}, 0, distants)
}

// ModesNear returns the bare modes between two frequencies in Hz, in the order in which
// PolesNear lists what became of them.
func (f *Field) ModesNear(low, high float64) []DampedMode {
	var list []DampedMode
	for _, m := range f.modes.damped {
		if m.Hz >= low && m.Hz <= high {
			list = append(list, m)
		}
	}
	return list
}

// starts lists the modes and units that are followed.
func (f *Field) starts(upTo float64) []path {
	var paths []path
	for i, m := range f.modes.damped {
		if m.Hz > followAbove*upTo {
			break
		}
		paths = append(paths, path{mode: i, unit: -1})
	}
	for u, unit := range f.units {
		if unit.Natural > 0 && unit.Natural <= unitsAbove*upTo {
			paths = append(paths, path{mode: -1, unit: u})
		}
	}
	return paths
}

// followAll follows every path, each worker with room of its own.
func (f *Field) followAll(ctx context.Context, paths []path, distants []distant, progress func(done, total int)) error {
	var (
		group sync.WaitGroup
		next  = make(chan int)
		mutex sync.Mutex
		done  int
	)
	for range runtime.GOMAXPROCS(0) {
		group.Go(func() {
			w := f.newFollower(distants)
			for i := range next {
				w.follow(ctx, &paths[i])
				if progress != nil {
					mutex.Lock()
					done++
					progress(done, len(paths))
					mutex.Unlock()
				}
			}
		})
	}
	for i := range paths {
		if ctx.Err() != nil {
			break
		}
		next <- i
	}
	close(next)
	group.Wait()
	return ctx.Err()
}

// bareRoot returns the complex frequency of a bare mode.
func (f *Field) bareRoot(i int) complex128 {
	m := &f.modes
	c := f.room.Air.SpeedOfSound
	d := m.loss[i] * c
	w2 := m.k2[i]*c*c - d*d
	if w2 <= 0 {
		return complex(0, d)
	}
	return complex(math.Sqrt(w2), d)
}

// touched reports whether some unit moves with a mode.
func (f *Field) touched(i int) bool {
	for u := range f.units {
		if math.Abs(f.weights[u][i]) > untouched {
			return true
		}
	}
	return false
}

// sameRoot is how near two roots are, relative, that count as one.
const sameRoot = 1e-7

// dropTwins takes back those paths that ended on the root of another.
func dropTwins(paths []path) {
	for i := range paths {
		for j := range i {
			a, b := &paths[i], &paths[j]
			if a.found && b.found && cmplx.Abs(a.root-b.root) < sameRoot*cmplx.Abs(a.root) {
				a.found = false
			}
		}
	}
}

// listed turns paths into poles with their levels.
func (f *Field) listed(ctx context.Context, paths []path, upTo float64, edge rectangle, counted int, distants []distant) (Poles, error) {
	p := Poles{Counted: counted, Found: inside(paths, edge)}
	shown := make([]*Pole, len(paths))
	var group sync.WaitGroup
	workers := runtime.GOMAXPROCS(0)
	for w := range workers {
		group.Go(func() {
			r := f.newFollower(distants)
			r.t.unitsOnly = false
			for i := w; i < len(paths) && ctx.Err() == nil; i += workers {
				a := paths[i]
				if a.found && imag(a.root) <= tallest && imag(a.root) > 0 {
					residues := r.residues(&a)
					shown[i] = &Pole{
						Oscillator: Oscillator{Natural: cmplx.Abs(a.root) / (2 * math.Pi), Decay: imag(a.root)},
						LevelDB:    residueLevels(residues, a.root),
						Omega:      a.root,
						Residues:   r.delayed(&a, residues),
					}
				}
			}
		})
	}
	group.Wait()
	for i, a := range paths {
		switch {
		case a.mode >= 0 && f.modes.damped[a.mode].Hz <= upTo:
			p.Modes = append(p.Modes, shown[i])
		case a.mode < 0 && shown[i] != nil && shown[i].Natural <= upTo:
			p.Absorbers = append(p.Absorbers, AbsorberPole{Pole: *shown[i], Owner: f.units[a.unit].Owner})
		}
	}
	sortPoles(p.Absorbers)
	return p, ctx.Err()
}

// sortPoles puts absorbers' poles in order of frequency.
func sortPoles(p []AbsorberPole) {
	for i := range p {
		for j := i; j > 0 && p[j].Natural < p[j-1].Natural; j-- {
			p[j], p[j-1] = p[j-1], p[j]
		}
	}
}
