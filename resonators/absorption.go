package resonators

import (
	"math"

	"stillroom/acoustics"
)

// FullField is the greatest angle of incidence of the diffuse field (rad) that
// theory asks for; FieldIncidence the 78° of building practice.
const (
	FullField      = math.Pi / 2
	FieldIncidence = 78 * math.Pi / 180
)

// angleTolerance is what the mean over angles may be off by.
const angleTolerance = 2e-5

// NormalAbsorption returns the absorption coefficient at normal incidence,
//
//	α = 1 − |(z−1)/(z+1)|² = 4·Re z/|z+1|²
//
// at the frequency hz.
func NormalAbsorption(a Absorber, hz float64, air acoustics.Air) float64 {
	return normalOf(a.Specific(complex(2*math.Pi*hz, 0), air))
}

func normalOf(z complex128) float64 {
	return 4 * real(z) / (sq(real(z)+1) + sq(imag(z)))
}

// DiffuseAbsorption returns the absorption coefficient of an infinite face in a
// diffuse field up to the angle limit (rad; [FullField] or less),
//
//	α = ∫₀^limit α(θ)·sin 2θ dθ / sin² limit
//	α(θ) = 1 − |(z·cos θ − 1)/(z·cos θ + 1)|²
//
// at the frequency hz, right to 1e-4. Necks, panels and partitioned cavities
// react locally: z is that of normal incidence at every angle. In an open
// cavity and a porous layer the wave runs on sideways and z depends on θ.
//
// Source: Paris, Phil. Mag. 5 (1928) 489; London, JASA 22 (1950) 263.
func DiffuseAbsorption(a Absorber, hz, limit float64, air acoustics.Air) float64 {
	omega := complex(2*math.Pi*hz, 0)
	if l, ok := a.(layered); ok && l.extended() {
		return extendedDiffuse(l, omega, limit, angleTolerance, air)
	}
	return localDiffuse(a.Specific(omega, air), limit)
}

// localDiffuse returns Paris's integral in closed form for a locally reacting
// face; with u = cos θ, A = |z|², R = Re z,
//
//	α = 8R/(1−u0²)·∫_u0^1 u²/(Au² + 2Ru + 1) du
//
// Source: London, JASA 22 (1950) 263, there for u0 = 0.
func localDiffuse(z complex128, limit float64) float64 {
	var (
		r, x = real(z), math.Abs(imag(z))
		a    = r*r + x*x
		u0   = math.Cos(limit)
	)
	if limit >= FullField {
		u0 = 0
	}
	if r <= 0 {
		return 0
	}
	if math.IsInf(a, 0) {
		return 0
	}
	if a < 1e-3 { // the closed form loses its digits where the integrand is plain
		m := mean(u0, 1, 1, angleTolerance, func(u float64) sample {
			return sample{value: [2]float64{u * u / (a*u*u + 2*r*u + 1)}}
		})
		return 8 * r / (1 + u0) * m[0]
	}
	q1, q0 := a+2*r+1, a*u0*u0+2*r*u0+1
	// J = ∫ du/(Au²+2Ru+1) = [atan((Au+R)/X)]/X
	den := x*x + (a+r)*(a*u0+r)
	j := a * (1 - u0) / den
	if t := x * j; t > 1e-6 {
		j = math.Atan(t) / x
	}
	i := ((1 - u0) - r/a*math.Log(q1/q0) - (1-2*r*r/a)*j) / a
	return 8 * r * i / (1 - u0*u0)
}

// extendedDiffuse returns Paris's integral where the cavity's wave runs on
// sideways, to about the tolerance tol.
func extendedDiffuse(l layered, omega complex128, limit, tol float64, air acoustics.Air) float64 {
	var (
		front  = l.front(omega, air)
		layers = l.cavity().at(omega, air)
		k      = real(omega) / air.SpeedOfSound
		over   = 1 / (air.Density * air.SpeedOfSound)
		u0     = math.Cos(limit)
	)
	if limit >= FullField {
		u0 = 0
	}
	panels := 1 + int(k*l.cavity().depth()/math.Pi)
	m := mean(u0, 1, panels, tol, func(u float64) sample {
		z := (front + 1/layers.admittance(k*k*(1-u*u), true)) * complex(over*u, 0)
		r, x := max(real(z), 0), imag(z)
		s := sample{
			value:    [2]float64{8 * r * u / (sq(r+1) + x*x)},
			detuning: x / (1 + r),
		}
		if l.cavity().empty() {
			s.halfWaves = k * u * l.cavity().depth() / math.Pi
			// Over u, and with the integrand's 2u, in place of ln f.
			s.area, s.halfWidth = modeResonance(front*complex(over*u, 0), k*l.cavity().depth())
			s.area *= 2 * u
		}
		return s
	})
	return m[0] / (1 + u0)
}
