package study

import "stillroom/acoustics"

// countBands counts the modes per third octave from 16 Hz to 250 Hz.
func countBands(room acoustics.Room) []BandRow {
	c := room.Air.SpeedOfSound
	modes := room.Box.Modes(c, 300)
	var rows []BandRow
	for _, b := range acoustics.ThirdOctaves(16, 250) {
		row := BandRow{Nominal: b.Nominal, CentreHz: b.Centre, LoHz: b.Lower, HiHz: b.Upper}
		for _, m := range modes {
			if m.Hz >= b.Lower && m.Hz < b.Upper {
				row.Count++
			}
		}
		_, lo := room.Box.CountBelow(c, b.Lower)
		_, hi := room.Box.CountBelow(c, b.Upper)
		row.Asymptote = hi - lo
		rows = append(rows, row)
	}
	return rows
}
