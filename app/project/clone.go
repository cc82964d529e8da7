package project

import (
	"maps"
	"slices"
)

// Clone returns a copy that shares nothing with p, for an edit to change.
func (p Project) Clone() Project {
	for i := range p.Room.Surfaces {
		p.Room.Surfaces[i] = slices.Clone(p.Room.Surfaces[i])
	}
	p.Finishes = slices.Clone(p.Finishes)
	for i := range p.Finishes {
		p.Finishes[i].Absorption = maps.Clone(p.Finishes[i].Absorption)
	}
	p.Loudspeakers = slices.Clone(p.Loudspeakers)
	p.Seats = slices.Clone(p.Seats)
	p.Absorbers = slices.Clone(p.Absorbers)
	for i := range p.Absorbers {
		p.Absorbers[i] = p.Absorbers[i].Clone()
	}
	p.Limits.Points = slices.Clone(p.Limits.Points)
	p.KeepOut = slices.Clone(p.KeepOut)
	return p.WithStock(p.Stock)
}

// copied returns a pointer to a copy, nil for nil.
func copied[T any](v *T) *T {
	if v == nil {
		return nil
	}
	c := *v
	return &c
}

func (f *Fill) clone() *Fill {
	c := copied(f)
	if c != nil {
		c.Fluid = copied(c.Fluid)
	}
	return c
}

// Clone returns a copy that shares nothing with a.
func (a Absorber) Clone() Absorber {
	a.Neck, a.Panel, a.Perforated = copied(a.Neck), copied(a.Panel), copied(a.Perforated)
	a.Slotted, a.Microperforated, a.Porous = copied(a.Slotted), copied(a.Microperforated), copied(a.Porous)
	if a.Neck != nil {
		a.Neck.Fill = copied(a.Neck.Fill)
	}
	if a.Panel != nil {
		a.Panel.Fill = a.Panel.Fill.clone()
	}
	if a.Perforated != nil {
		a.Perforated.Fill = a.Perforated.Fill.clone()
	}
	if a.Slotted != nil {
		a.Slotted.Fill = a.Slotted.Fill.clone()
	}
	if a.Porous != nil {
		a.Porous.Fluid = copied(a.Porous.Fluid)
	}
	return a
}
