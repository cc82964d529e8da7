package study

import (
	"context"

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
	kit := newKit(p, shell.room.Air, nil, false)
	field, err := fieldStage(ctx, p, o, shell, kit, nil)
	if err != nil {
		return Levels{}, err
	}
	return Levels{Hz: field.hz, Bare: field.levels.Bare, Treated: field.levels.Treated}, nil
}

// Absorbers computes only the absorbers of a project on their own.
func Absorbers(p project.Project) ([]AbsorberRow, error) {
	air, err := airOf(p)
	if err != nil {
		return nil, err
	}
	return newKit(p, air, nil, true).rows, nil
}
