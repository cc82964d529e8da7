package resonators

import (
	"math"
	"slices"

	"gonum.org/v1/gonum/integrate/quad"

	"stillroom/acoustics"
)

// openBand works out the diffuse coefficient's mean over a band of a front over an
// empty open cavity. With u = cos θ and the phase φ = kDu,
//
//	α(θ) = 4ru/((ru + 1)² + (xu − cot φ)²), front = r + jx over ρc
//
// oscillates along the frequency and along the angle, but not where φ is held: there
// fu is constant, and so nearly is xu of a front that is a mass. So the mean
//
//	(1/ln(f2/f1))·∫∫ α·2u du d(ln f)/(1 − u0²) = … ∫ dφ/φ ∫ α·2u du
//
// is taken over u inside, where few points do, and over φ outside, each period by
// itself, with the resonance in it made smooth by t = cot φ = x + a·tan ψ.
type openBand struct {
	depth    float64 // m
	k1, k2   float64 // wave numbers at the band's edges, 1/m
	u0       float64 // least cosine of incidence
	front    chebyshev
	x, w     []float64 // points over u
	psi, psw []float64 // over the angle ψ, and over φ away from resonances
	phi, phw []float64
}

// How many points each integral has. Doubling all of them is a test.
const (
	pointsOverU   = 5
	pointsOverPsi = 30
	pointsOverPhi = 12
	termsOfFront  = 12
)

func newOpenBand(l layered, air acoustics.Air, limit, lo, hi float64, finer int) *openBand {
	b := &openBand{depth: l.cavity().depth(), k1: 2 * math.Pi * lo / air.SpeedOfSound, k2: 2 * math.Pi * hi / air.SpeedOfSound}
	if limit < FullField {
		b.u0 = math.Cos(limit)
	}
	over := complex(1/(air.Density*air.SpeedOfSound), 0)
	b.front = newChebyshev(math.Log(b.k1), math.Log(b.k2), termsOfFront*finer, func(lnk float64) complex128 {
		z := l.front(complex(math.Exp(lnk)*air.SpeedOfSound, 0), air) * over
		return complex(max(real(z), 0), imag(z))
	})
	rule := func(n int) (x, w []float64) {
		x, w = make([]float64, n), make([]float64, n)
		quad.Legendre{}.FixedLocations(x, w, 0, 1)
		return x, w
	}
	b.x, b.w = rule(pointsOverU * finer)
	b.psi, b.psw = rule(pointsOverPsi * finer)
	b.phi, b.phw = rule(pointsOverPhi * finer)
	return b
}

// mean returns the mean over the band and over all angles.
func (b *openBand) mean() float64 {
	var (
		d      = b.depth
		from   = b.k1 * d * b.u0
		to     = b.k2 * d
		breaks = []float64{from, to, b.k1 * d, b.k2 * d * b.u0}
		sum    float64
	)
	for n := math.Floor(from/math.Pi) + 1; n*math.Pi < to; n++ {
		breaks = append(breaks, n*math.Pi)
	}
	slices.Sort(breaks)
	for i := 1; i < len(breaks); i++ {
		if p, q := max(breaks[i-1], from), min(breaks[i], to); q > p {
			sum += b.period(p, q)
		}
	}
	return sum / (math.Log(b.k2/b.k1) * (1 - b.u0*b.u0))
}

// period returns the integral between two phases of one period.
func (b *openBand) period(p, q float64) float64 {
	base := math.Pi * math.Floor((p+q)/2/math.Pi)
	// Where the front's reactance meets the cavity's: x there, and the half width a.
	x, a := b.at((p + q) / 2)
	for range 3 {
		r := min(q, max(p, base+math.Pi/2-math.Atan(x)))
		x, a = b.at(r)
	}
	// The resonance's own zone in t = cot φ; beyond it the integrand is smooth in φ.
	reach := max(6*a, math.Abs(x)/2)
	phase := func(t float64) float64 { return min(q, max(p, base+math.Pi/2-math.Atan(t))) }
	first, last := phase(x+reach), phase(x-reach)
	return b.plain(p, first) + b.resonant(base, first, last, x, a) + b.plain(last, q)
}

// at returns xu and ru + 1 in the middle of the angles at a phase.
func (b *openBand) at(phi float64) (x, a float64) {
	ua, ub := b.cosines(phi)
	u := (ua + ub) / 2
	z := b.front.at(math.Log(phi / (b.depth * u)))
	return imag(z) * u, real(z)*u + 1
}

// cosines returns between which cosines a phase lies in the band.
func (b *openBand) cosines(phi float64) (lo, hi float64) {
	return max(b.u0, phi/(b.k2*b.depth)), min(1, phi/(b.k1*b.depth))
}

// plain integrates over the phase as it is.
func (b *openBand) plain(p, q float64) float64 {
	if !(q > p) {
		return 0
	}
	var sum float64
	for i, s := range b.phi {
		phi := p + s*(q-p)
		sum += b.phw[i] * (q - p) * b.overAngles(phi, 1/math.Tan(phi))
	}
	return sum
}

// resonant integrates over the phase by t = cot φ = x + a·tan ψ.
func (b *openBand) resonant(base, p, q, x, a float64) float64 {
	if !(q > p) {
		return 0
	}
	var (
		hi  = math.Atan((1/math.Tan(p-base) - x) / a)
		lo  = math.Atan((1/math.Tan(q-base) - x) / a)
		sum float64
	)
	for i, s := range b.psi {
		tan := math.Tan(lo + s*(hi-lo))
		t := x + a*tan
		phi := base + math.Pi/2 - math.Atan(t)
		sum += b.psw[i] * (hi - lo) * a * (1 + tan*tan) / (1 + t*t) * b.overAngles(phi, t)
	}
	return sum
}

// overAngles returns ∫ α·2u du at a phase whose cotangent is t, over the phase.
func (b *openBand) overAngles(phi, t float64) float64 {
	lo, hi := b.cosines(phi)
	if !(hi > lo) {
		return 0
	}
	var sum float64
	for i, s := range b.x {
		u := lo + s*(hi-lo)
		z := b.front.at(math.Log(phi / (b.depth * u)))
		r, x := real(z)*u, imag(z)*u-t
		sum += b.w[i] * (hi - lo) * 2 * u * 4 * r / (sq(r+1) + x*x)
	}
	return sum / phi
}

// chebyshev is a smooth complex function on an interval, by its Chebyshev series.
type chebyshev struct {
	middle, half float64
	c            []complex128
}

func newChebyshev(lo, hi float64, terms int, f func(float64) complex128) chebyshev {
	s := chebyshev{middle: (lo + hi) / 2, half: (hi - lo) / 2, c: make([]complex128, terms)}
	for i := range terms {
		angle := math.Pi * (float64(i) + 0.5) / float64(terms)
		v := f(s.middle + s.half*math.Cos(angle))
		for j := range terms {
			s.c[j] += v * complex(2/float64(terms)*math.Cos(float64(j)*angle), 0)
		}
	}
	s.c[0] /= 2
	return s
}

// at returns the function, by Clenshaw's recurrence.
func (s chebyshev) at(x float64) complex128 {
	z := complex((x-s.middle)/s.half, 0)
	var b1, b2 complex128
	for j := len(s.c) - 1; j > 0; j-- {
		b1, b2 = s.c[j]+2*z*b1-b2, b1
	}
	return s.c[0] + z*b1 - b2
}
