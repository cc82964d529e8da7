package acoustics

import (
	"math"
	"math/cmplx"
)

// literal is the room's response by slow, obvious sums, the twin of Field. With
// q² = k² + κ² for a κ of its own choosing,
//
//	Γ = Σ_n a_n·[1/(k_n²−k²+2jkδ_n/c) − 1/(k_n²+κ²) − q²/(k_n²+κ²)²]
//	    + S(κ²) − q²·S′(κ²),  S(κ²) = Σ_n a_n/(k_n²+κ²)
//
// a_n = û_p·û_q/(VΛ_n), where the first sum is over modes one by one and S is
// closed along the length by
//
//	Σ_n (ε_n/L)·cos(nπx/L)·cos(nπy/L)/((nπ/L)²+γ²) = cosh(γx)·cosh(γ(L−y))/(γ·sinh γL), x ≤ y
//
// and summed term by term along width and height.
type literal struct {
	room  Room
	modes []DampedMode
	// across is the number of orders summed along width and height.
	across int
	// known keeps S and S′ of pairs, which do not depend on frequency.
	known map[[2][3]span][2]float64
}

const literalKappa2 = 1.7 // 1/m²

func newLiteral(r Room, upTo float64, across int) *literal {
	return &literal{room: r, modes: r.Modes(upTo), across: across, known: map[[2][3]span][2]float64{}}
}

// gamma returns Γ between two ports at a complex angular frequency.
func (l *literal) gamma(a, b [3]span, omega complex128) complex128 {
	var (
		box = l.room.Box
		v   = box.Volume()
		c   = l.room.Air.SpeedOfSound
		k   = omega / complex(c, 0)
		q2  = k*k + literalKappa2
		sum complex128
	)
	add := func(m Mode, delta float64) {
		kn := 2 * math.Pi * m.Hz / c
		w := complex(meanOver(box, m, a)*meanOver(box, m, b)/(v*m.Norm), 0)
		still := complex(1/(kn*kn+literalKappa2), 0)
		sum += w * (1/(complex(kn*kn, 0)-k*k+2i*k*complex(delta/c, 0)) - still - q2*still*still)
	}
	u := box.UniformMode()
	add(u, ModalDamping(box, u, l.room.Walls, l.room.Air).Total())
	for _, m := range l.modes {
		add(m.Mode, m.Damping.Total())
	}
	still, ok := l.known[[2][3]span{a, b}]
	if !ok {
		const h = 1e-3
		still[0] = l.static(a, b, literalKappa2)
		still[1] = (l.static(a, b, literalKappa2+h) - l.static(a, b, literalKappa2-h)) / (2 * h)
		l.known[[2][3]span{a, b}] = still
	}
	return sum + complex(still[0], 0) - q2*complex(still[1], 0)
}

// static returns S(κ²). Both ports must be points along the length.
func (l *literal) static(a, b [3]span, kappa2 float64) float64 {
	var (
		d    = l.room.Box.Dimensions()
		x    = math.Min(a[0].centre, b[0].centre)
		y    = math.Max(a[0].centre, b[0].centre)
		wide = axisWeights(d[1], l.across, a[1], b[1])
		high = axisWeights(d[2], l.across, a[2], b[2])
		sum  float64
	)
	for i, wy := range wide {
		ky := float64(i) * math.Pi / d[1]
		for j, wz := range high {
			kz := float64(j) * math.Pi / d[2]
			g := math.Sqrt(ky*ky + kz*kz + kappa2)
			// cosh γx · cosh γ(L−y) / (γ sinh γL), without overflow
			sum += wy * wz * math.Exp(-g*(y-x)) * (1 + math.Exp(-2*g*x)) * (1 + math.Exp(-2*g*(d[0]-y))) /
				(2 * g * (1 - math.Exp(-2*g*d[0])))
		}
	}
	return sum
}

// axisWeights returns (ε_n/l)·û·û along one axis.
func axisWeights(l float64, n int, a, b span) []float64 {
	w := make([]float64, n)
	for i := range w {
		kappa := float64(i) * math.Pi / l
		w[i] = 2 / l * a.meanCos(kappa) * b.meanCos(kappa)
		if i == 0 {
			w[i] /= 2
		}
	}
	return w
}

// levels returns the bare and the treated level at the first seat.
func (l *literal) levels(sources []Source, seat Point, units []Unit, hz float64) (bare, treated float64) {
	var (
		omega = complex(2*math.Pi*hz, 0)
		jwr   = 1i * omega * complex(l.room.Air.Density, 0)
		n     = len(units)
		a     = make([][]complex128, n)
		p     complex128
	)
	for _, s := range sources {
		p += l.drive(s, hz) * l.gamma(seat.spans(), s.At.spans(), omega)
	}
	bare = decibels(p)
	for i, u := range units {
		a[i] = make([]complex128, n+1)
		for j, v := range units {
			a[i][j] = jwr * l.gamma(u.Patch.spans(l.room.Box), v.Patch.spans(l.room.Box), omega)
		}
		a[i][i] += u.Impedance(omega) + jwr*complex(u.Patch.mouthCorrection(), 0)
		for _, s := range sources {
			a[i][n] += l.drive(s, hz) * l.gamma(u.Patch.spans(l.room.Box), s.At.spans(), omega)
		}
	}
	for i, v := range gauss(a) {
		p -= jwr * v * l.gamma(seat.spans(), units[i].Patch.spans(l.room.Box), omega)
	}
	return bare, decibels(p)
}

func (l *literal) drive(s Source, hz float64) complex128 {
	return complex(s.Gain, 0) * cmplx.Exp(complex(0, -2*math.Pi*hz*s.Delay))
}

// gauss solves the system whose right side is the last column.
func gauss(a [][]complex128) []complex128 {
	n := len(a)
	for k := range n {
		for i := k + 1; i < n; i++ {
			f := a[i][k] / a[k][k]
			for j := k; j <= n; j++ {
				a[i][j] -= f * a[k][j]
			}
		}
	}
	x := make([]complex128, n)
	for i := n - 1; i >= 0; i-- {
		x[i] = a[i][n]
		for j := i + 1; j < n; j++ {
			x[i] -= a[i][j] * x[j]
		}
		x[i] /= a[i][i]
	}
	return x
}
