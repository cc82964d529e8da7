package acoustics

import "math"

// span is the extent of a port along one axis: an interval, or a point where
// the width is 0.
type span struct{ centre, width float64 } // m

// meanCos returns the mean of cos(κx) over the span,
//
//	cos(κc)·sin(κw/2)/(κw/2)
//
// with the wave number κ in 1/m along the axis.
func (s span) meanCos(kappa float64) float64 {
	v := math.Cos(kappa * s.centre)
	if h := kappa * s.width / 2; h != 0 {
		v *= math.Sin(h) / h
	}
	return v
}

const (
	// gaussReach is where a Gaussian has fallen to nothing: exp(−x²/4t) is
	// below 1e-16 beyond x = gaussReach·√t.
	gaussReach = 12.2
	// seriesFrom is the √t/l beyond which the cosine series of the heat kernel
	// takes fewer terms than its images.
	seriesFrom = 0.25
)

// heatKernel returns the mean over two spans of the heat kernel between rigid
// ends at 0 and l, in 1/m:
//
//	K(x, y; t) = (1/l)·[1 + 2·Σ_{n≥1} cos(nπx/l)·cos(nπy/l)·exp(−(nπ/l)²·t)]
//	           = Σ_m g(x − y − 2ml) + g(x + y − 2ml), g(d) = exp(−d²/4t)/√(4πt)
//
// with t in m². The images serve for short times, the series for long ones.
func heatKernel(l, t float64, a, b span) float64 {
	if math.Sqrt(t) > seriesFrom*l {
		return heatSeries(l, t, a, b)
	}
	return heatImages(l, t, a.centre-b.centre, a.width, b.width) +
		heatImages(l, t, a.centre+b.centre, a.width, b.width)
}

// heatSeries sums the heat kernel by its cosine series.
func heatSeries(l, t float64, a, b span) float64 {
	sum := 0.5
	for n := 1; ; n++ {
		kappa := float64(n) * math.Pi / l
		x := kappa * kappa * t
		if x > 38 {
			return 2 * sum / l
		}
		sum += a.meanCos(kappa) * b.meanCos(kappa) * math.Exp(-x)
	}
}

// heatImages sums the Gaussians of one family of images, 2l apart, that lie
// within reach; d is the distance of the nearest pair's centres.
func heatImages(l, t, d, wa, wb float64) float64 {
	var (
		root  = math.Sqrt(t)
		reach = gaussReach*root + (wa+wb)/2
		first = math.Ceil((-reach - d) / (2 * l))
		last  = math.Floor((reach - d) / (2 * l))
		sum   float64
	)
	for m := first; m <= last; m++ {
		sum += meanGaussian(d+2*l*m, root, wa, wb)
	}
	return sum
}

// meanGaussian returns the mean of g(x−y) over two intervals whose centres are
// d apart, root being √t. With both widths 0 it is the Gaussian itself, with one
// its integral over the width, else the second difference of its second
// integral.
func meanGaussian(d, root, wa, wb float64) float64 {
	if wa < wb {
		wa, wb = wb, wa
	}
	switch {
	case wa == 0:
		x := d / (2 * root)
		return math.Exp(-x*x) / (2 * math.SqrtPi * root)
	case wb == 0:
		s := 1 / (2 * root)
		return (math.Erf((d+wa/2)*s) - math.Erf((d-wa/2)*s)) / (2 * wa)
	}
	var (
		p = (wa + wb) / 2
		m = (wa - wb) / 2
	)
	return (secondIntegral(d+p, root) - secondIntegral(d+m, root) -
		secondIntegral(d-m, root) + secondIntegral(d-p, root)) / (wa * wb)
}

// secondIntegral returns F with F″ = g, in m:
//
//	F(x) = √(t/π)·exp(−x²/4t) + (x/2)·erf(x/2√t)
//
// where root is √t.
func secondIntegral(x, root float64) float64 {
	s := x / (2 * root)
	return root/math.SqrtPi*math.Exp(-s*s) + x/2*math.Erf(s)
}
