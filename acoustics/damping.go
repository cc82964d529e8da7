package acoustics

import (
	"runtime"
	"slices"
	"sync"
)

// Damping lists what takes a mode's energy; all decay constants in 1/s.
type Damping struct {
	Wall [6]float64
	Air  float64
}

// Total returns δ.
func (d Damping) Total() float64 {
	t := d.Air
	for _, w := range d.Wall {
		t += w
	}
	return t
}

// DampedMode is a mode of the bare room.
type DampedMode struct {
	Mode
	Damping Damping
}

// Oscillator returns the mode as an oscillator.
func (m DampedMode) Oscillator() Oscillator {
	return Oscillator{Natural: m.Hz, Decay: m.Damping.Total()}
}

// Room is the bare room: shape, air and walls.
type Room struct {
	Box   Box
	Air   Air
	Walls Walls
}

// ModalDamping returns the decay constants of a mode to first order in the
// admittances of the walls,
//
//	δ_w = (c/2VΛ)·Re β_w(f)·∫ψ² dS, δ_air = m(f)·c/2
//
// with the speed of sound c, the volume V, the mode's mean square Λ, the wall's
// specific admittance β_w and the air's energy attenuation m, all at the mode's
// own frequency. The integral over the wall makes the factor 2 after Λ where the
// mode runs across it and 1 where it runs along it.
//
// Holds while the walls absorb little.
//
// Source: Morse & Bolt, Rev. Mod. Phys. 16 (1944) 69; Kuttruff, Room Acoustics.
func ModalDamping(b Box, m Mode, w Walls, a Air) Damping {
	var beta [6]float64
	for s, l := range w {
		beta[s] = l.Admittance(m.Hz)
	}
	return modalDamping(b, m, beta, a.SpeedOfSound, a.EnergyAttenuation(m.Hz))
}

// modalDamping is ModalDamping with admittances and attenuation at hand.
func modalDamping(b Box, m Mode, beta [6]float64, c, attenuation float64) Damping {
	d := Damping{Air: attenuation * c / 2}
	perVolume := c / (2 * b.Volume() * m.Norm)
	for s, v := range beta {
		d.Wall[s] = perVolume * v * b.WallIntegral(m, Surface(s))
	}
	return d
}

// Modes returns the modes of the bare room up to and including a frequency in
// Hz, in the order of [Box.Modes], each with its damping.
func (r Room) Modes(upTo float64) []DampedMode {
	var (
		modes  = r.Box.Modes(r.Air.SpeedOfSound, upTo)
		damped = make([]DampedMode, len(modes))
		air    = r.Air.relaxation()
		walls  = r.Walls.distinct()
		group  sync.WaitGroup
	)
	workers := max(1, min(runtime.GOMAXPROCS(0), len(modes)/256))
	for w := range workers {
		group.Go(func() {
			for i := w; i < len(modes); i += workers {
				m := modes[i]
				damped[i] = DampedMode{
					Mode:    m,
					Damping: modalDamping(r.Box, m, walls.admittances(m.Hz), r.Air.SpeedOfSound, air.attenuation(m.Hz)/decibelsPerNeper),
				}
			}
		})
	}
	group.Wait()
	return damped
}

// distinctWalls are walls with each finish that occurs on them kept once.
type distinctWalls struct {
	finishes []Finish
	shares   [][6]float64 // [finish][surface]
}

func (w Walls) distinct() distinctWalls {
	var d distinctWalls
	for s, lining := range w {
		for _, f := range lining {
			d.add(s, f)
		}
	}
	return d
}

// add adds a finish's share of a surface.
func (d *distinctWalls) add(s int, f FinishShare) {
	at := slices.IndexFunc(d.finishes, func(g Finish) bool { return slices.Equal(g.Absorption, f.Finish.Absorption) })
	if at < 0 {
		at = len(d.finishes)
		d.finishes = append(d.finishes, f.Finish)
		d.shares = append(d.shares, [6]float64{})
	}
	d.shares[at][s] += f.Share
}

// admittances returns those of the six surfaces at a frequency in Hz.
func (d distinctWalls) admittances(hz float64) [6]float64 {
	var beta [6]float64
	for i, f := range d.finishes {
		b := f.Admittance(hz)
		for s, share := range d.shares[i] {
			beta[s] += share * b
		}
	}
	return beta
}
