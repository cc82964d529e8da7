package study

import (
	"fmt"

	"stillroom/acoustics"
	"stillroom/app/project"
)

// linings returns what the six surfaces carry. The error names a finish that
// neither the file nor the built-in list has.
func linings(p project.Project) (acoustics.Walls, error) {
	var walls acoustics.Walls
	for _, s := range acoustics.Surfaces() {
		for _, share := range p.Lining(s) {
			f, ok := p.FinishByID(share.Finish)
			if !ok {
				return walls, fmt.Errorf("room.surfaces.%s: no finish is called %q", s, share.Finish)
			}
			walls[s] = append(walls[s], acoustics.FinishShare{Finish: f, Share: share.Share})
		}
	}
	return walls, nil
}
