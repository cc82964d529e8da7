package study

import (
	"context"
	"math"

	"stillroom/acoustics"
)

// LevelMap is the level over a plane of the room at one frequency, all
// loudspeakers sounding.
type LevelMap struct {
	Hz float64
	// Up is the axis that runs up the map, 1 for a plan and 2 for a long section; At
	// is where the plane cuts the third axis, m.
	Up int
	At float64
	// Columns run along the length, rows up; the levels stand at the cells' middles,
	// dB, indexed [row·Columns + column].
	Columns, Rows int
	Bare, Treated []float64
}

// Level returns the treated level in dB of the cell that holds a place, m along the
// length and up the map, of a room of the given size there.
func (m *LevelMap) Level(x, y, width, height float64) float64 {
	i := max(0, min(m.Columns-1, int(x/width*float64(m.Columns))))
	j := max(0, min(m.Rows-1, int(y/height*float64(m.Rows))))
	return m.Treated[j*m.Columns+i]
}

// mapStage works out the maps that are asked for, of the plan and of the long
// section.
func (r *Result) mapStage(ctx context.Context, o Options, f *fieldPart) error {
	if o.MapHz == 0 {
		return nil
	}
	box := f.shell.room.Box
	seat := f.seats[min(o.MapSeat, len(f.seats)-1)]
	plan, points := newLevelMap(box, o.MapHz, 1, seat, o.MapCells)
	section, more := newLevelMap(box, o.MapHz, 2, seat, o.MapCells)
	field, err := f.field.Rearranged(ctx, f.sources, append(points, more...), f.kit.units)
	if err != nil {
		return err
	}
	levels, err := field.Levels(ctx, []float64{o.MapHz})
	if err != nil {
		return err
	}
	for i := range levels.Bare {
		m := plan
		if i >= len(points) {
			m = section
		}
		m.Bare, m.Treated = append(m.Bare, levels.Bare[i][0]), append(m.Treated, levels.Treated[i][0])
	}
	r.Plan, r.Section = plan, section
	return nil
}

// newLevelMap lays out a map of the plan (up = 1) or the long section (up = 2)
// through a seat, without its levels, and returns the middles of its cells.
func newLevelMap(b acoustics.Box, hz float64, up int, seat acoustics.Point, most int) (*LevelMap, []acoustics.Point) {
	d := b.Dimensions()
	cells := float64(most) / math.Max(d[0], d[up])
	m := &LevelMap{Hz: hz, Up: up, At: seat[3-up],
		Columns: max(4, int(math.Round(cells*d[0]))), Rows: max(4, int(math.Round(cells*d[up])))}
	points := make([]acoustics.Point, 0, m.Columns*m.Rows)
	for j := range m.Rows {
		for i := range m.Columns {
			p := acoustics.Point{0: d[0] * (float64(i) + 0.5) / float64(m.Columns)}
			p[up], p[3-up] = d[up]*(float64(j)+0.5)/float64(m.Rows), seat[3-up]
			points = append(points, p)
		}
	}
	return m, points
}
