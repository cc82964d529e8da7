package figures

import (
	"fmt"
	"math"
	"slices"

	"stillroom/app/study"
	"stillroom/app/units"
)

// mapTones is how many tones of 3 dB a map of levels has.
const mapTones = 10

// levelMap returns the map of this sheet, nil where there is none.
func (p *sheetPen) levelMap() *study.LevelMap {
	if p.up == 1 {
		return p.r.Plan
	}
	return p.r.Section
}

// loudness tints the sheet by the level over it, in tones of 3 dB.
func (p *sheetPen) loudness(m *study.LevelMap) {
	var (
		d   = p.dims()
		top = highestLevel(m)
		ink = p.s.Slate
	)
	if len(p.r.Absorbers) > 0 {
		ink = p.s.Ochre
	}
	for j := range m.Rows {
		for i := range m.Columns {
			tone := mapTones - int((top-m.Treated[j*m.Columns+i])/3)
			if tone <= 0 {
				continue
			}
			x0, y0 := p.at.To(d[0]*float64(i)/float64(m.Columns), d[p.up]*float64(j)/float64(m.Rows))
			x1, y1 := p.at.To(d[0]*float64(i+1)/float64(m.Columns), d[p.up]*float64(j+1)/float64(m.Rows))
			p.fill(x0-0.2*px, y0-0.2*px, x1+0.2*px, y1+0.2*px, mix(p.s.Paper, ink, 0.06*float64(tone)))
		}
	}
}

// highestLevel returns the top of the tones, a multiple of 3 dB. The fiftieth
// of the cells that lie nearest to loudspeakers, where the level has no bound, do
// not count.
func highestLevel(m *study.LevelMap) float64 {
	levels := slices.Clone(m.Treated)
	slices.Sort(levels)
	return 3 * math.Ceil(levels[len(levels)-1-len(levels)/50]/3)
}

// mapTitle says what a map shows, in as many words as there is room for.
func (p *sheetPen) mapTitle(title string, m *study.LevelMap) string {
	where, short := "above the floor", "up"
	if m.Up == 2 {
		where, short = "from the left wall", "from left"
	}
	hz, at, top := units.Hertz(m.Hz), units.Length(m.At, p.v.system()), units.Decibels(highestLevel(m))
	long := fmt.Sprintf("%s: level at %s, %s %s; 3 dB a tone, darkest %s", title, hz, at, where, top)
	if p.measure(long, p.s.Text) < p.width()-20*px {
		return long
	}
	return fmt.Sprintf("%s, %s %s; 3 dB a tone to %s", hz, at, short, top)
}
