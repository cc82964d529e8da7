package study

import (
	"math"

	"stillroom/acoustics"
)

// couples is the least share of a mode's greatest squared pressure that an
// absorber's units must see on average for the mode to be called theirs: a
// tenth, 10 dB down, is where a place stops being worth building in.
const couples = 0.1

// coupling returns the mean of û² over the units of one absorber, 0…1.
func coupling(box acoustics.Box, m acoustics.Mode, units []acoustics.Unit, owner int) float64 {
	var sum float64
	var n int
	for _, u := range units {
		if u.Owner == owner {
			mean := box.Mean(m, u.Patch)
			sum += mean * mean
			n++
		}
	}
	if n == 0 {
		return 0
	}
	return sum / float64(n)
}

// settle notes where each absorber resonates in its place: its first unit's own
// resonance with the room's air before it.
func (r *Result) settle(field *acoustics.Field, units []acoustics.Unit) {
	for i, u := range units {
		row := &r.Absorbers[u.Owner]
		if row.InRoomHz > 0 || row.Report.Oscillator == nil {
			continue
		}
		row.InRoomHz = row.Report.Oscillator.Natural
		if hz, ok := field.UnitResonance(i); ok {
			row.InRoomHz = hz
		}
	}
}

// assign finds for each absorber the mode it is tuned to, the nearest in
// frequency that lies in its band of action and that it couples with, and for
// each mode the absorbers that act on it.
func (r *Result) assign(units []acoustics.Unit) {
	for a := range r.Absorbers {
		row := &r.Absorbers[a]
		if row.Report.Oscillator == nil {
			continue
		}
		best := math.Inf(1)
		// The room's air moves the whole band of action with the resonance.
		moved := row.InRoomHz / row.Report.Oscillator.Natural
		for i := range r.Modes {
			m := &r.Modes[i]
			if m.Mode.Hz < row.Report.Band[0]*moved || m.Mode.Hz > row.Report.Band[1]*moved {
				// A mode within its own half-power width of a sharp absorber is met too.
				if math.Abs(m.Mode.Hz-row.InRoomHz) > m.Oscillator.HalfPowerWidth() {
					continue
				}
			}
			if coupling(r.Room.Box, m.Mode.Mode, units, a) < couples {
				continue
			}
			m.Absorbers = append(append([]int(nil), m.Absorbers...), a)
			if d := math.Abs(math.Log(m.Mode.Hz / row.InRoomHz)); d < best {
				best, row.Target = d, i
			}
		}
	}
}

// pair puts with each mode the absorber poles that belong with it: of the
// absorbers that act on it, those poles for which it is the nearest such mode.
func (r *Result) pair() {
	for _, p := range r.AbsorberPoles {
		best, at := math.Inf(1), -1
		for i, m := range r.Modes {
			for _, a := range m.Absorbers {
				if a != p.Absorber {
					continue
				}
				if d := math.Abs(math.Log(m.Mode.Hz / p.Oscillator.Natural)); d < best {
					best, at = d, i
				}
			}
		}
		if at >= 0 {
			r.Modes[at].Pair = append(r.Modes[at].Pair, p)
		}
	}
}
