package resonators

import "math"

// sample is what an integrand gives at one point: two values that are
// integrated together, and how far from resonance the point is, in half widths
// with sign.
type sample struct {
	value    [2]float64
	detuning float64
	// halfWaves is how many fit an empty cavity's depth; area and halfWidth are
	// those of the resonance that a heavy face has just above each of the cavity's
	// own modes. All are 0 where the cavity is filled, which damps its modes.
	halfWaves, area, halfWidth float64
}

// Nodes and weights of the 15-point Kronrod rule on −1…1 and of the 7-point
// Gauss rule in it (every second node). Source: Piessens et al., QUADPACK,
// 1983.
var (
	kronrodNodes = [8]float64{
		0.991455371120812639206854697526329, 0.949107912342758524526189684047851,
		0.864864423359769072789712788640926, 0.741531185599394439863864773280788,
		0.586087235467691130294144691693013, 0.405845151377397166906606412076961,
		0.207784955007898467600689403773245, 0,
	}
	kronrodWeights = [8]float64{
		0.022935322010529224963732008058970, 0.063092092629978553290700663189204,
		0.104790010322250183839876322541518, 0.140653259715525918745189590510238,
		0.169004726639267902826583426598550, 0.190350578064785409913256402421014,
		0.204432940075298892414161999234649, 0.209482141084727828012999174891714,
	}
	gaussWeights = [4]float64{
		0.129484966168869693270611432679082, 0.279705391489276667901467771423780,
		0.381830050505118944950369775488975, 0.417959183673469387755102040816327,
	}
)

// deepest is how often an interval is halved at most.
const deepest = 14

// integrator works out means over one interval.
type integrator struct {
	f         func(x float64) sample
	whole     float64 // the interval's length
	tolerance float64 // of the mean over all of it
}

// mean returns the means of the two values over lo…hi, each to about tol, from
// the given number of equal panels on. A panel is halved while its share of the
// disagreement of the two rules exceeds tol (the better rule is then right to
// much less), or while a resonance that could matter stands between two of its
// points, both of them far out on its flanks, so that a narrow peak is not
// stepped over.
func mean(lo, hi float64, panels int, tol float64, f func(x float64) sample) [2]float64 {
	var (
		in    = integrator{f: f, whole: hi - lo, tolerance: tol}
		width = (hi - lo) / float64(panels)
		left  = f(lo)
		sum   [2]float64
	)
	for i := range panels {
		a := lo + float64(i)*width
		right := f(a + width)
		p := in.panel(a, a+width, left, right, 0)
		sum[0] += p[0]
		sum[1] += p[1]
		left = right
	}
	return [2]float64{sum[0] / in.whole, sum[1] / in.whole}
}

// panel returns the integrals over lo…hi; left and right are the samples at
// its ends.
func (in integrator) panel(lo, hi float64, left, right sample, depth int) [2]float64 {
	var (
		kronrod, gauss [2]float64
		mid, half      = 0.5 * (lo + hi), 0.5 * (hi - lo)
		before, at     = left, lo
		centre         sample
		skipped        bool
	)
	for i := range 15 {
		j := min(i, 14-i)
		x := mid + kronrodNodes[j]*half
		if i < 7 {
			x = mid - kronrodNodes[j]*half
		}
		s := in.f(x)
		for v := range 2 {
			kronrod[v] += half * kronrodWeights[j] * s.value[v]
			if j%2 == 1 {
				gauss[v] += half * gaussWeights[j/2] * s.value[v]
			}
		}
		skipped = skipped || in.steppedOver(x-at, before, s)
		before, at = s, x
		if i == 7 {
			centre = s
		}
	}
	skipped = skipped || in.steppedOver(hi-at, before, right)
	differ := max(math.Abs(kronrod[0]-gauss[0]), math.Abs(kronrod[1]-gauss[1]))
	if depth == deepest || differ <= in.tolerance*in.whole && !skipped {
		return kronrod
	}
	a := in.panel(lo, mid, left, centre, depth+1)
	b := in.panel(mid, hi, centre, right, depth+1)
	return [2]float64{a[0] + b[0], a[1] + b[1]}
}

// steppedOver reports whether a resonance lies unseen between two points that
// are step apart and might add more than the tolerance: where the detuning comes
// up through zero, of half width about step/(b−a) and a peak of at most 2, so of
// an area of at most 2π·step/(b−a); or where the cavity passes one of its own
// modes, just above which a heavy face resonates however narrowly.
func (in integrator) steppedOver(step float64, a, b sample) bool {
	least := in.tolerance * in.whole
	if math.Floor(a.halfWaves) != math.Floor(b.halfWaves) && max(a.area, b.area) > least/4 && step > min(a.halfWidth, b.halfWidth) {
		return true
	}
	return a.detuning < -1 && b.detuning > 1 && 2*math.Pi*step > least*(b.detuning-a.detuning)
}
