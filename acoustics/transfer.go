package acoustics

import (
	"math"
	"math/cmplx"

	"gonum.org/v1/gonum/floats"
)

// transfer is the field at one complex frequency: the responses between ports,
// and room to work in. One goroutine's own.
type transfer struct {
	f      *Field
	omega  complex128
	re, im []float64 // dynamic factors of the modes, over VΛ
	tr, ti []float64 // times a port's weights
	n      int
	kappa2 complex128
	base   complex128   // the uniform mode, common to all pairs
	gamma  []complex128 // in the order of Field.sums
}

func (f *Field) newTransfer() *transfer {
	n := len(f.modes.damped)
	return &transfer{f: f, re: make([]float64, n), im: make([]float64, n),
		tr: make([]float64, n), ti: make([]float64, n), gamma: make([]complex128, f.pairs())}
}

// at evaluates the responses at the complex angular frequency omega, leaving
// out the own term of mode except (−1: none), whose static parts stay.
func (t *transfer) at(omega complex128, except int) {
	var (
		f = t.f
		m = &f.modes
		c = complex(f.room.Air.SpeedOfSound, 0)
		k = omega / c
	)
	t.omega = omega
	t.n = f.reach(cmplx.Abs(omega) / (2 * math.Pi))
	t.kappa2 = k*k - 2i*k*complex(m.tail[t.n], 0)
	t.base = 1 / (complex(f.room.Box.Volume(), 0) * (-k*k + 2i*k*complex(m.uniform, 0)))
	if imag(omega) == 0 {
		t.realFactors(real(k))
	} else {
		t.factors(k)
	}
	if except >= 0 && except < t.n {
		h := t.staticPart(except)
		t.re[except], t.im[except] = real(h), imag(h)
	}
	t.sum()
}

// staticPart returns what stands of a mode's factor without its own term.
func (t *transfer) staticPart(i int) complex128 {
	inv := complex(t.f.modes.inverse[i], 0)
	x := t.kappa2 * inv
	return -inv * (1 + x + x*x) * complex(t.f.modes.share[i], 0)
}

// factors fills in the modes' dynamic factors at the complex wave number k.
func (t *transfer) factors(k complex128) {
	m := &t.f.modes
	kk := k * k
	for i := range t.n {
		h := complex(m.share[i], 0)/(complex(m.k2[i], 0)-kk+2i*k*complex(m.loss[i], 0)) + t.staticPart(i)
		t.re[i], t.im[i] = real(h), imag(h)
	}
}

// realFactors is factors on the real axis, without complex division.
func (t *transfer) realFactors(k float64) {
	var (
		m      = &t.f.modes
		kk     = k * k
		kr, ki = real(t.kappa2), imag(t.kappa2)
		qr, qi = kr*kr - ki*ki, 2 * kr * ki // κ⁴
	)
	for i := range t.n {
		var (
			d    = m.k2[i] - kk
			e    = 2 * k * m.loss[i]
			over = 1 / (d*d + e*e)
			inv  = m.inverse[i]
			inv2 = inv * inv
			inv3 = inv2 * inv
		)
		t.re[i] = m.share[i] * (d*over - inv - kr*inv2 - qr*inv3)
		t.im[i] = m.share[i] * (-e*over - ki*inv2 - qi*inv3)
	}
}

// sum adds up the responses of all pairs.
func (t *transfer) sum() {
	f, n := t.f, t.n
	last := -1
	f.eachPair(func(p, q, at int) {
		if p != last {
			floats.MulTo(t.tr[:n], t.re[:n], f.weights[p][:n])
			floats.MulTo(t.ti[:n], t.im[:n], f.weights[p][:n])
			last = p
		}
		w := f.weights[q][:n]
		t.gamma[at] = t.base + f.sums[at].at(t.kappa2) +
			complex(floats.Dot(t.tr[:n], w), floats.Dot(t.ti[:n], w))
	})
}

// unitPair returns Γ between two units.
func (t *transfer) unitPair(p, q int) complex128 {
	if p < q {
		p, q = q, p
	}
	return t.gamma[p*(p+1)/2+q]
}

// toUnit returns Γ between port x (0… over sources, then seats) and a unit.
func (t *transfer) toUnit(x, unit int) complex128 {
	r := len(t.f.units)
	return t.gamma[r*(r+1)/2+x*r+unit]
}

// direct returns Γ between a seat and a source.
func (t *transfer) direct(seat, source int) complex128 {
	r, s, e := len(t.f.units), len(t.f.sources), len(t.f.seats)
	return t.gamma[r*(r+1)/2+(s+e)*r+seat*s+source]
}

// drive returns each source's complex amplitude at the transfer's frequency,
// its delay by the real part so that a delay alone changes no level.
func (t *transfer) drive(source int) complex128 {
	s := t.f.sources[source]
	sin, cos := math.Sincos(-real(t.omega) * s.Delay)
	return complex(s.Gain*cos, s.Gain*sin)
}
