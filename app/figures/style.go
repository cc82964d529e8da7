package figures

import (
	"image/color"
	"math"

	"gonum.org/v1/plot/vg"

	"stillroom/app/study"
)

func rgb(hex uint32) color.NRGBA {
	return color.NRGBA{uint8(hex >> 16), uint8(hex >> 8), uint8(hex), 255}
}

// px is one window unit, 1/96 inch.
const px = vg.Inch / 96

// Paper is the light style.
func Paper() Style {
	return Style{Paper: rgb(0xFBFAF6), Ink: rgb(0x23272C), Faint: rgb(0xD8D5CB), Slate: rgb(0x3B5468), Ochre: rgb(0xB06F14),
		Warning: rgb(0x9C2F22), Select: rgb(0x23272C), Text: 11 * px, Hair: 1 * px}
}

// Night is the dark style.
func Night() Style {
	return Style{Paper: rgb(0x16191D), Ink: rgb(0xE7E4DB), Faint: rgb(0x363C43), Slate: rgb(0x8DB0C9), Ochre: rgb(0xE3A54C),
		Warning: rgb(0xEE8A75), Select: rgb(0xE7E4DB), Text: 11 * px, Hair: 1 * px}
}

// Print is the style on white paper, which holds without colour too.
func Print() Style {
	return Style{Paper: rgb(0xFFFFFF), Ink: rgb(0x101010), Faint: rgb(0xCCCCCC), Slate: rgb(0x2F4456), Ochre: rgb(0xA5650D),
		Warning: rgb(0x8A1F14), Select: rgb(0x101010), Text: 7.5, Hair: 0.5}
}

// mix returns a colour share of the way from a to b, opaque, so that paper and
// screen need no transparency.
func mix(a, b color.Color, share float64) color.Color {
	share = math.Max(0, math.Min(1, share))
	ar, ag, ab, _ := a.RGBA()
	br, bg, bb, _ := b.RGBA()
	m := func(x, y uint32) uint8 { return uint8((float64(x)*(1-share) + float64(y)*share) / 257) }
	return color.NRGBA{m(ar, br), m(ag, bg), m(ab, bb), 255}
}

// Lanes returns the lanes in their order.
func Lanes() []Lane {
	return []Lane{ModesLane, DensityLane, LevelLane, DecayLane, RingingLane, AbsorptionLane}
}

// LaneNamed returns the lane of that name.
func LaneNamed(name string) (Lane, bool) {
	for _, l := range Lanes() {
		if string(l) == name {
			return l, true
		}
	}
	return "", false
}

// Title returns the lane's heading, with its unit.
func (l Lane) Title() string {
	switch l {
	case ModesLane:
		return "Modes"
	case DensityLane:
		return "Density, modes per third octave"
	case LevelLane:
		return "Level at the seat, dB re free field at 1 m"
	case DecayLane:
		return "Decay, T60 in s"
	case RingingLane:
		return "Ringing at the seat, s after the sound stops"
	default:
		return "Absorption coefficient, diffuse field"
	}
}

// DefaultView returns the whole ruler with nothing selected.
func DefaultView(r *study.Result) View {
	return View{FromHz: r.Options.FromHz, ToHz: r.Options.ToHz, Mode: -1, Absorber: -1, Loudspeaker: -1, SelectedSeat: -1, Surface: -1, Ruler: true}
}

// LaneFrame returns the margins of every lane.
func LaneFrame() Frame { return Frame{Left: 40 * px, Right: 12 * px, Top: 8 * px, Bottom: 6 * px} }

// RulerHeight is the room that the frequency scale takes under a lane.
func RulerHeight() vg.Length { return 16 * px }

// X returns where a frequency lies across a lane of the given width.
func (v View) X(hz float64, width vg.Length) vg.Length {
	f := LaneFrame()
	return f.Left + (width-f.Left-f.Right)*vg.Length(math.Log(hz/v.FromHz)/math.Log(v.ToHz/v.FromHz))
}

// HzAt returns the frequency at a place across a lane of the given width.
func (v View) HzAt(x, width vg.Length) float64 {
	f := LaneFrame()
	return v.FromHz * math.Pow(v.ToHz/v.FromHz, float64((x-f.Left)/(width-f.Left-f.Right)))
}
