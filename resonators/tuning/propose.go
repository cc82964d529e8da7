package tuning

import (
	"cmp"
	"context"
	"math"
	"slices"

	"stillroom/acoustics"
	"stillroom/resonators"
)

// meets is how near the resonance must come to where it is wanted.
const meets = 0.005

// mostUnits is how many units stand in a row at most.
const mostUnits = 6

// perPlace is how many candidates of one kind on one surface are kept, so that a
// list shows different answers rather than neighbours of one.
const perPlace = 2

// Propose returns absorbers that can be built and meet the mode, best first:
// those that bring both of the pair within the target before the rest, then by
// the longer decay of the pair. It is deterministic. The list is empty where
// nothing that fits the depth and the free surfaces can be tuned to the mode. The
// error is that of ctx.
func Propose(ctx context.Context, p Problem) ([]Candidate, error) {
	kinds := p.Kinds
	if len(kinds) == 0 {
		kinds = Kinds()
	}
	surfaces := p.Surfaces
	if len(surfaces) == 0 {
		all := acoustics.Surfaces()
		surfaces = all[:]
	}
	stock := CommonStock()
	if p.Stock != nil {
		stock = *p.Stock
	}
	var out []Candidate
	for _, s := range surfaces {
		for _, kind := range kinds {
			switch kind {
			case "neck":
				out = append(out, p.best(p.necks(ctx, s, stock))...)
			case "panel":
				out = append(out, p.best(p.panels(ctx, s, stock))...)
			default:
				out = append(out, p.best(p.wide(ctx, kind, s, stock))...)
			}
		}
	}
	return p.shortList(out, kinds, cmp.Or(p.Most, 12)), ctx.Err()
}

// shortList keeps the best, an equal share of each kind where there are enough,
// best first.
func (p Problem) shortList(all []Candidate, kinds []string, most int) []Candidate {
	slices.SortStableFunc(all, p.byWorth)
	var out, rest []Candidate
	taken := map[string]int{}
	for _, c := range all {
		k := c.Absorber.Kind()
		if taken[k] < max(1, most/len(kinds)) {
			taken[k]++
			out = append(out, c)
		} else {
			rest = append(rest, c)
		}
	}
	out = append(out, rest[:max(0, min(len(rest), most-len(out)))]...)
	slices.SortStableFunc(out, p.byWorth)
	return out
}

// best keeps the best few.
func (p Problem) best(c []Candidate) []Candidate {
	slices.SortStableFunc(c, p.byWorth)
	return c[:min(len(c), perPlace)]
}

// panelSizes are fronts of membrane absorbers, as cut from common sheet, m.
func panelSizes() [][2]float64 {
	return [][2]float64{{0.6, 0.6}, {0.6, 1.2}, {1.2, 0.6}, {1.2, 1.2}, {1.2, 2.4}, {2.4, 1.2}}
}

// strengthAt returns the mean of û² that the strongest free spot for a row of
// units has.
func (p Problem) strengthAt(s acoustics.Surface, size [2]float64, units int, depth float64) (resonators.Placement, float64, bool) {
	at, sum, ok := p.site(s, size, units, depth)
	return at, sum / float64(units), ok
}

// necks proposes boxes on one surface: for each tube, front and number of boxes
// the neck length that meets the mode.
func (p Problem) necks(ctx context.Context, s acoustics.Surface, stock Stock) []Candidate {
	var out []Candidate
	board := stock.Boards[len(stock.Boards)/2]
	inner := p.Depth - 2*board
	if inner < 0.05 {
		return nil
	}
	for _, side := range []float64{0.3, 0.4, 0.5, 0.6, 0.8} {
		for units := 1; units <= p.mostUnits() && ctx.Err() == nil; units++ {
			size := [2]float64{side, side}
			at, squared, ok := p.strengthAt(s, size, units, p.Depth)
			if !ok || squared < 1e-3 {
				break
			}
			gross := (side - 2*board) * (side - 2*board) * inner
			need := BoxVolume(p.needed(), squared, p.Mode.Norm, p.Box.Volume())
			enough := gross*float64(units) >= need
			for _, tube := range stock.Tubes {
				if c, ok := p.neck(at, tube, board, inner, gross); ok {
					out = append(out, c)
				}
			}
			if enough {
				break
			}
		}
	}
	return out
}

// neck tunes one box to the mode by the length of its neck and damps it by gauze.
// The goal's own tuning, a per cent or two lower for the lowest peak, is within
// what building leaves.
func (p Problem) neck(at resonators.Placement, tube Tube, board, inner, gross float64) (Candidate, bool) {
	radius := tube.Inside() / 2
	box := func(length float64) resonators.Neck {
		inside := math.Max(0, length-board)
		return resonators.Neck{
			Cavity:      gross - math.Pi/4*sq(tube.Outside)*inside,
			MouthRadius: radius, Length: length, Mouths: 1, Front: at.Size,
		}
	}
	// The neck's inner end stays a diameter clear of the back board.
	longest := inner + board - tube.Inside()
	c := Candidate{At: at, Depth: p.Depth, Build: Build{Outside: [3]float64{at.Size[0], at.Size[1], p.Depth}, Board: board, Tube: tube}}
	length, ok := p.solve(board, longest, p.Mode.Hz, at, func(x float64) resonators.Absorber { return box(x) })
	if !ok {
		return c, false
	}
	n := box(math.Round(length*1000) / 1000)
	c.Absorber = n
	c, ok = p.settle(c)
	if !ok {
		return c, false
	}
	if e, ok := resonators.EquivalentOf(n, p.Air, at.Size); ok {
		omega := 2 * math.Pi * e.Oscillator.Natural
		more := (2*c.WantedDamping*e.Mass*omega - e.Resistance) * math.Pi * sq(radius)
		if n.Gauze = math.Round(more); n.Gauze > 0 {
			c.Absorber = n
			c, ok = p.settle(c)
			if !ok {
				return c, false
			}
		}
	}
	return c, math.Abs(c.Oscillator.Natural/p.Mode.Hz-1) <= meets
}

// panels proposes membranes on one surface: for each sheet, front and number of
// units the cavity depth that meets the mode, with the fill that damps best.
func (p Problem) panels(ctx context.Context, s acoustics.Surface, stock Stock) []Candidate {
	var out []Candidate
	for _, size := range panelSizes() {
		built := make([]bool, len(stock.Panels)) // enough of this sheet
		for units := 1; units <= p.mostUnits() && ctx.Err() == nil; units++ {
			at, squared, ok := p.strengthAt(s, size, units, p.Depth)
			if !ok || squared < 1e-3 {
				break
			}
			for i, sheet := range stock.Panels {
				if built[i] {
					continue
				}
				out = append(out, p.panelFills(at, sheet, stock)...)
				need := PanelArea(p.needed(), squared, p.Mode.Norm, p.Box.Volume(), sheet.Mass, p.Mode.Hz, p.Air)
				built[i] = size[0]*size[1]*float64(units) >= need
			}
		}
	}
	return out
}

// panelFills tunes one panel with each fill, and without, and keeps the best.
func (p Problem) panelFills(at resonators.Placement, sheet Sheet, stock Stock) []Candidate {
	var out []Candidate
	for _, wool := range stock.fills() {
		least := 0.02
		if wool.Thickness > 0 {
			least = wool.Thickness + 0.01 // clear of the moving sheet
		}
		fill := wool.fill()
		if c, ok := p.panel(at, sheet, fill, least); ok {
			out = append(out, c)
		}
	}
	slices.SortStableFunc(out, p.byWorth)
	return out[:min(1, len(out))]
}

// panel tunes one membrane by the depth of its cavity.
func (p Problem) panel(at resonators.Placement, sheet Sheet, fill *resonators.Fill, least float64) (Candidate, bool) {
	front := func(cavity float64) resonators.Panel {
		return resonators.Panel{Mass: sheet.Mass, Thickness: sheet.Thickness, Youngs: sheet.Youngs, Poisson: sheet.Poisson,
			LossFactor: sheet.LossFactor, Cavity: cavity, Size: at.Size, Fill: fill}
	}
	c := Candidate{At: at, Build: Build{Sheet: sheet}}
	cavity, ok := p.solve(least, p.Depth-sheet.Thickness, p.Mode.Hz, at, func(x float64) resonators.Absorber { return front(x) })
	if !ok {
		return c, false
	}
	built := front(math.Round(cavity*1000) / 1000)
	c.Absorber, c.Depth = built, built.Cavity+sheet.Thickness
	c, ok = p.settle(c)
	return c, ok && math.Abs(c.Oscillator.Natural/p.Mode.Hz-1) <= meets
}

// solve finds the dimension between lo and hi at which the absorber in its place
// resonates at hz; its reactance there rises with the dimension. False where it
// does not reach.
func (p Problem) solve(lo, hi, hz float64, at resonators.Placement, make func(float64) resonators.Absorber) (float64, bool) {
	if !(lo < hi) || p.reactance(make(lo), at, hz) > 0 || p.reactance(make(hi), at, hz) < 0 {
		return 0, false
	}
	for hi-lo > 2e-4 {
		mid := (lo + hi) / 2
		if p.reactance(make(mid), at, hz) < 0 {
			lo = mid
		} else {
			hi = mid
		}
	}
	return (lo + hi) / 2, true
}
