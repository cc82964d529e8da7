package tuning

import (
	"context"
	"math"
	"slices"

	"stillroom/acoustics"
	"stillroom/resonators"
)

// wideSizes are fronts of perforated, slotted, micro-perforated and porous
// absorbers, as cut from common sheet, m.
func wideSizes() [][2]float64 {
	return [][2]float64{{0.6, 0.6}, {0.6, 1.2}, {1.2, 0.6}, {1.2, 1.2}, {1.2, 2.4}, {2.4, 1.2}}
}

// mostWide is how many of them stand in a row at most.
const mostWide = 3

// wide proposes absorbers of one of the tiled kinds on one surface: for each front
// and number of units what the stock can be tuned to the mode with.
func (p Problem) wide(ctx context.Context, kind string, s acoustics.Surface, stock Stock) []Candidate {
	var out []Candidate
	for _, size := range wideSizes() {
		for units := 1; units <= min(mostWide, p.mostUnits()) && ctx.Err() == nil; units++ {
			at, squared, ok := p.strengthAt(s, size, units, p.Depth)
			if !ok || squared < 1e-3 {
				break
			}
			var found []Candidate
			switch kind {
			case "perforated":
				found = p.perforated(at, stock)
			case "slotted":
				found = p.slotted(at, stock)
			case "microperforated":
				found = p.microperforated(at, stock)
			case "porous":
				found = p.porous(at, stock)
			}
			slices.SortStableFunc(found, p.byWorth)
			out = append(out, found[:min(1, len(found))]...)
			if len(found) == 0 || found[0].Meets {
				break
			}
		}
	}
	return out
}

// tuned settles an absorber whose dimension x between lo and hi tunes it to the
// mode, the dimension rounded to a step.
func (p Problem) tuned(at resonators.Placement, lo, hi, step float64, depth float64, front func(x float64) resonators.Absorber) (Candidate, bool) {
	c := Candidate{At: at, Depth: depth}
	x, ok := p.solve(lo, hi, p.Mode.Hz, at, front)
	if !ok {
		return c, false
	}
	c.Absorber = front(math.Round(x/step) * step)
	if c.Absorber.Validate() != nil {
		return c, false
	}
	c, ok = p.settle(c)
	return c, ok && math.Abs(c.Oscillator.Natural/p.Mode.Hz-1) <= meets
}

// Greatest pitch of holes that still counts as a perforated panel, m.
const (
	widestPitch      = 0.15
	widestMicroPitch = 0.02
)

// perforated tunes a sheet with drilled holes over the whole depth by the pitch, and
// damps it by gauze.
func (p Problem) perforated(at resonators.Placement, stock Stock) []Candidate {
	var out []Candidate
	for _, sheet := range stock.Fronts {
		for _, hole := range stock.Drills {
			cavity := math.Floor((p.Depth-sheet)*1000) / 1000
			if cavity < 0.02 {
				continue
			}
			gauze := 0.0
			front := func(pitch float64) resonators.Absorber {
				return resonators.Perforated{Sheet: sheet, Hole: hole, Pitch: pitch, Cavity: cavity, Gauze: gauze}
			}
			depth := cavity + sheet
			c, ok := p.tuned(at, 1.5*hole, widestPitch, 1e-3, depth, front)
			if !ok {
				continue
			}
			if e, ok := resonators.EquivalentOf(c.Absorber, p.Air, at.Size); ok {
				more := 2*c.WantedDamping*e.Mass*2*math.Pi*e.Oscillator.Natural - e.Resistance
				gauze = math.Round(more * c.Absorber.(resonators.Perforated).OpenShare())
			}
			if gauze > 0 {
				if d, ok := p.tuned(at, 1.5*hole, widestPitch, 1e-3, depth, front); ok {
					c = d
				}
			}
			out = append(out, c)
		}
	}
	return out
}

// slotted tunes a slatted front by the depth of its cavity, with a slab at the wall.
func (p Problem) slotted(at resonators.Placement, stock Stock) []Candidate {
	var out []Candidate
	for _, slat := range stock.Slats {
		for _, gap := range stock.Gaps {
			for _, wool := range stock.fills() {
				front := func(cavity float64) resonators.Absorber {
					return resonators.Slotted{Slat: slat[0], Slot: gap, Sheet: slat[1], Cavity: cavity, Fill: wool.fill()}
				}
				least := 0.02
				if wool.Thickness > 0 {
					least = wool.Thickness + 0.01
				}
				if c, ok := p.tuned(at, least, p.Depth-slat[1], 1e-3, p.Depth, front); ok {
					c.Depth = c.Absorber.(resonators.Slotted).Cavity + slat[1]
					out = append(out, c)
				}
			}
		}
	}
	return out
}

// microperforated tunes a micro-perforated sheet over the whole depth by its pitch.
func (p Problem) microperforated(at resonators.Placement, stock Stock) []Candidate {
	var out []Candidate
	for _, m := range stock.Micro {
		cavity := math.Floor((p.Depth-m[0])*1000) / 1000
		if cavity < 0.02 {
			continue
		}
		front := func(pitch float64) resonators.Absorber {
			return resonators.Microperforated{Sheet: m[0], Hole: m[1], Pitch: pitch, Cavity: cavity}
		}
		if c, ok := p.tuned(at, 2*m[1], widestMicroPitch, 1e-4, cavity+m[0], front); ok {
			out = append(out, c)
		}
	}
	return out
}

// porous lays slabs on the surface, or with the depth that is left behind them. It is
// no oscillator: it adds to the mode's decay, to first order,
//
//	δ = (ρc²/(2VΛ))·Re(1/Z)·û² of all units
func (p Problem) porous(at resonators.Placement, stock Stock) []Candidate {
	var out []Candidate
	for _, wool := range stock.Wools {
		gap := math.Floor((p.Depth-wool.Thickness)*1000) / 1000
		for _, g := range []float64{0, gap} {
			if g < 0 || g == 0 && gap < 0 {
				continue
			}
			a := resonators.Porous{Thickness: wool.Thickness, FlowResistivity: wool.Flow, Gap: g}
			c := Candidate{Absorber: a, At: at, Depth: wool.Thickness + g}
			squared := squaredStrength(p.Box, p.Mode.Mode, at)
			c.Strength = math.Sqrt(squared / float64(at.Units))
			area := at.Size[0] * at.Size[1]
			z := a.InRoom(complex(2*math.Pi*p.Mode.Hz, 0), area, p.Air)
			o := p.Mode.Oscillator()
			o.Decay += p.Air.Density * sq(p.Air.SpeedOfSound) / (2 * p.Box.Volume() * p.Mode.Norm) * real(1/z) * squared
			c.Pair = [2]acoustics.Oscillator{o, o}
			c.Meets = o.T60() <= p.target()
			out = append(out, c)
			if g == gap {
				break
			}
		}
	}
	return out
}
