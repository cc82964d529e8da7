package acoustics

import (
	"context"
	"math"
	"math/cmplx"
	"runtime"
	"sync"
)

// Levels are levels in dB re the free field of one unit-gain source at 1 m,
// indexed [seat][frequency].
type Levels struct {
	Bare, Treated [][]float64
}

// Levels returns the levels at the seats, bare and treated, at frequencies in
// Hz up to the field's limit,
//
//	level = 20 log10|4π·P|, P_bare(r) = Σ_s g_s·exp(−jωτ_s)·Γ(r, s)
//	(Z + jωρ·G)·U = P_bare at the units, P(r) = P_bare(r) − jωρ·Σ_q G_rq·U_q
//
// with the units' impedances Z (Pa·s/m³), the responses G between them and
// their volume velocities U. It returns the error of ctx.
func (f *Field) Levels(ctx context.Context, hz []float64) (Levels, error) {
	var l Levels
	for range f.seats {
		l.Bare = append(l.Bare, make([]float64, len(hz)))
		l.Treated = append(l.Treated, make([]float64, len(hz)))
	}
	// Contiguous stretches would leave one worker all the high, dear
	// frequencies: deal them out in turn.
	workers := min(runtime.GOMAXPROCS(0), max(1, len(hz)/16))
	var group sync.WaitGroup
	for w := range workers {
		group.Go(func() {
			s := f.newScene()
			for i := w; i < len(hz) && ctx.Err() == nil; i += workers {
				s.at(complex(2*math.Pi*hz[i], 0))
				for r := range f.seats {
					l.Bare[r][i] = decibels(s.bare[r])
					l.Treated[r][i] = decibels(s.treated[r])
				}
			}
		})
	}
	group.Wait()
	return l, ctx.Err()
}

// decibels returns a pressure per unit source as a level.
func decibels(p complex128) float64 { return 20 * math.Log10(4*math.Pi*cmplx.Abs(p)) }

// scene is the whole room at one frequency: pressures at the seats with and
// without the units. One goroutine's own.
type scene struct {
	t             *transfer
	lu            *luMatrix
	velocity      []complex128 // of the units
	bare, treated []complex128 // at the seats
}

func (f *Field) newScene() *scene {
	r := len(f.units)
	return &scene{t: f.newTransfer(), lu: newLU(r), velocity: make([]complex128, r),
		bare: make([]complex128, len(f.seats)), treated: make([]complex128, len(f.seats))}
}

// at works out the scene at a complex angular frequency.
func (s *scene) at(omega complex128) {
	f := s.t.f
	s.t.at(omega, -1)
	r, n := len(f.units), len(f.sources)
	drive := make([]complex128, n)
	for q := range n {
		drive[q] = s.t.drive(q)
	}
	for e := range f.seats {
		s.bare[e] = 0
		for q, g := range drive {
			s.bare[e] += g * s.t.direct(e, q)
		}
		s.treated[e] = s.bare[e]
	}
	if r == 0 {
		return
	}
	jwr := 1i * omega * complex(f.room.Air.Density, 0)
	f.couple(s.lu, s.t, jwr)
	s.lu.factor()
	for p := range r {
		s.velocity[p] = 0
		for q, g := range drive {
			s.velocity[p] += g * s.t.toUnit(q, p)
		}
	}
	s.lu.solve(s.velocity)
	for e := range f.seats {
		var sum complex128
		for p, u := range s.velocity {
			sum += s.t.toUnit(n+e, p) * u
		}
		s.treated[e] -= jwr * sum
	}
}

// couple fills in the matrix Z + jωρ·G.
func (f *Field) couple(lu *luMatrix, t *transfer, jwr complex128) {
	r := lu.n
	var z complex128
	for p := range r {
		for q := range p + 1 {
			v := jwr * t.unitPair(p, q)
			lu.a[p*r+q], lu.a[q*r+p] = v, v
		}
		z = f.impedance(p, t.omega, z)
		lu.a[p*r+p] += z
	}
}

// impedance returns a unit's impedance; before is that of the unit before it.
func (f *Field) impedance(u int, omega, before complex128) complex128 {
	if f.alike != nil && f.alike[u] {
		return before
	}
	return f.units[u].Impedance(omega)
}
