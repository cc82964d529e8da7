package study

import (
	"context"
	"math"

	"stillroom/app/project"
)

// Level computes only the level curves of a project: the first stages of [Run].
func Level(p project.Project, o Options) (Levels, error) {
	o = o.withDefaults()
	o.ModesToHz = o.ToHz
	ctx := context.Background()
	if err := tooLarge(p, o.ToHz, mostModesLevels); err != nil {
		return Levels{}, err
	}
	shell, err := shellStage(p, o, nil)
	if err != nil {
		return Levels{}, err
	}
	kit := newKit(p, shell.room.Air, 90, nil, false)
	field, err := fieldStage(ctx, p, o, shell, kit, nil)
	if err != nil {
		return Levels{}, err
	}
	return levelsOf(field), nil
}

// levelsOf gathers a field's levels and their spread over the seats.
func levelsOf(f *fieldPart) Levels {
	l := Levels{Hz: f.hz, Bare: f.levels.Bare, Treated: f.levels.Treated}
	for i := range f.hz {
		lowest, highest, power := math.Inf(1), math.Inf(-1), 0.0
		for _, seat := range l.Treated {
			power += math.Pow(10, seat[i]/10) / float64(len(l.Treated))
			lowest, highest = math.Min(lowest, seat[i]), math.Max(highest, seat[i])
		}
		l.Mean = append(l.Mean, 10*math.Log10(power))
		l.Lowest, l.Highest = append(l.Lowest, lowest), append(l.Highest, highest)
	}
	return l
}

// Absorbers computes only the absorbers of a project on their own, in a diffuse
// field up to an angle of incidence in degrees.
func Absorbers(p project.Project, fieldDeg float64) ([]AbsorberRow, error) {
	air, err := airOf(p)
	if err != nil {
		return nil, err
	}
	return newKit(p, air, fieldDeg, nil, true).rows, nil
}
