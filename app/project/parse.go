package project

import (
	"errors"
	"fmt"
	"io"
	"math"
	"os"
	"strconv"

	"stillroom/acoustics"
)

// Parse reads a project file. It is strict: keys are compared by exact case,
// and unknown and repeated keys, wrong types, values out of range and broken
// text are errors. The error is an Errors that lists all of them, and the
// Project is then the zero value.
func Parse(data []byte) (Project, error) {
	root, problems := readTree(data)
	if root == nil {
		return Project{}, problems
	}
	if err := upgrade(root, Version, upgrades); err != nil {
		return Project{}, err
	}
	r := reader{problems: problems}
	p := r.project(root)
	c := newChecker(r.problems)
	c.project(p)
	if err := c.errs.Err(); err != nil {
		return Project{}, err
	}
	return p, nil
}

// Read reads a project from r to its end. See Parse for the errors.
func Read(r io.Reader) (Project, error) {
	data, err := io.ReadAll(r)
	if err != nil {
		return Project{}, fmt.Errorf("reading a project: %w", err)
	}
	return Parse(data)
}

// Load reads the project file at path. What is wrong with the file's content
// is an Errors, wrapped with the path.
func Load(path string) (Project, error) {
	data, err := os.ReadFile(path)
	if err != nil {
		return Project{}, fmt.Errorf("opening a project: %w", err)
	}
	p, err := Parse(data)
	var all Errors
	switch {
	case err == nil:
		return p, nil
	case errors.As(err, &all) && len(all) > 1:
		return Project{}, fmt.Errorf("%s:\n%w", path, err)
	default:
		return Project{}, fmt.Errorf("%s: %w", path, err)
	}
}

// upgrades bring a file from one version to the next: upgrades[0] from 1 to 2.
var upgrades []func(root *node)

// upgrade brings a tree of an older version up to date, and refuses what no
// program of this version can understand.
func upgrade(root *node, to int, steps []func(*node)) error {
	if root.kind != objectNode {
		return Errors{{Rule: "the file must hold an object", Value: root.describe()}}
	}
	v := root.get("stillroom")
	if v == nil {
		problem := Problem{Path: "stillroom", Rule: "is required: it holds the version number and marks the file as a project"}
		for _, m := range root.members {
			if nearest(m.key, []string{"stillroom"}) != "" {
				problem.Rule += "; " + m.key + " is not the same key"
			}
		}
		return Errors{problem}
	}
	version, err := strconv.ParseFloat(v.text, 64)
	if v.kind != numberNode || err != nil || version < 1 || version != math.Trunc(version) {
		return Errors{{"stillroom", "must be a version number, 1 or above", v.describe()}}
	}
	if version > float64(to) {
		return Errors{{"stillroom", fmt.Sprintf("the file was written by a newer version of this program, which reads up to %d", to), v.describe()}}
	}
	for _, step := range steps[int(version)-1:] {
		step(root)
	}
	*v = *newNumber(float64(to))
	return nil
}

// project reads the whole document.
func (r *reader) project(root *node) Project {
	p := Project{Air: DefaultAir(), Limits: DefaultLimits()}
	version := Version
	r.object("", root, []field{
		{key: "stillroom", to: &version},
		{key: "title", to: &p.Title},
		{key: "prepared_for", to: &p.PreparedFor},
		{key: "prepared_by", to: &p.PreparedBy},
		{key: "note", to: &p.Note},
	}, "air", "room", "finishes", "loudspeakers", "seats", "absorbers", "limits", "keep_out", "stock")
	if n := root.get("air"); n != nil {
		r.object("air", n, p.Air.fields())
	}
	if n := root.get("room"); n != nil {
		r.room(n, &p.Room)
	} else {
		r.add("room", "is required", nil)
	}
	r.list("finishes", root.get("finishes"), func(path string, n *node) {
		p.Finishes = append(p.Finishes, r.finish(path, n))
	})
	for _, key := range []string{"loudspeakers", "seats"} {
		if root.get(key) == nil {
			r.add(key, "is required", nil)
		}
	}
	r.list("loudspeakers", root.get("loudspeakers"), func(path string, n *node) {
		var l Loudspeaker
		r.object(path, n, l.fields())
		p.Loudspeakers = append(p.Loudspeakers, l)
	})
	r.list("seats", root.get("seats"), func(path string, n *node) {
		var s Seat
		r.object(path, n, s.fields())
		p.Seats = append(p.Seats, s)
	})
	r.list("absorbers", root.get("absorbers"), func(path string, n *node) {
		p.Absorbers = append(p.Absorbers, r.absorber(path, n))
	})
	if n := root.get("limits"); n != nil {
		r.limits(n, &p.Limits)
	}
	r.extras(root, &p)
	nameUnnamed(&p, root)
	return p
}

func (r *reader) room(n *node, room *Room) {
	if !r.object("room", n, room.fields(), "surfaces") {
		return
	}
	const path = "room.surfaces"
	surfaces := n.get("surfaces")
	if surfaces == nil {
		return
	}
	if !r.object(path, surfaces, nil, surfaceNames()...) {
		return
	}
	for _, s := range acoustics.Surfaces() {
		r.list(join(path, s.String()), surfaces.get(s.String()), func(path string, n *node) {
			share := FinishShare{Share: 1}
			r.object(path, n, share.fields())
			room.Surfaces[s] = append(room.Surfaces[s], share)
		})
	}
}

func (r *reader) finish(path string, n *node) Finish {
	f := Finish{Absorption: map[string]float64{}}
	if !r.object(path, n, f.fields(), "absorption") {
		return f
	}
	at, rows := join(path, "absorption"), n.get("absorption")
	switch {
	case rows == nil:
		r.add(at, "is required", nil)
	case rows.kind != objectNode:
		r.add(at, "must be an object of band and coefficient", rows)
	default:
		for _, m := range rows.members {
			v := 0.0
			r.number(join(at, m.key), m.value, &v)
			f.Absorption[m.key] = v
		}
	}
	return f
}

func (r *reader) absorber(path string, n *node) Absorber {
	a := Absorber{Units: 1}
	if !r.object(path, n, a.fields(), Kinds()...) {
		return a
	}
	if n.get("kind") == nil {
		return a
	}
	for _, kind := range Kinds() {
		block := n.get(kind)
		if kind != a.Kind {
			if block != nil && contains(Kinds(), a.Kind) {
				r.add(join(path, kind), "must not stand beside kind "+strconv.Quote(a.Kind), block)
			}
			continue
		}
		a = a.withDefaultBlock(kind)
		if block != nil {
			r.object(join(path, kind), block, a.block().fields())
		}
	}
	return a
}

func (r *reader) limits(n *node, l *Limits) {
	if !r.object("limits", n, nil, "decay") {
		return
	}
	const path = "limits.decay"
	decay := n.get("decay")
	switch {
	case decay == nil:
	case decay.kind == textNode:
		*l = Limits{Curve: decay.text}
		if decay.text == "" {
			r.add(path, curveRule(), decay)
		}
	case decay.kind == listNode:
		*l = Limits{}
		r.list(path, decay, func(path string, n *node) {
			var pair [2]float64
			r.numbers(path, n, pair[:])
			l.Points = append(l.Points, LimitPoint{pair[0], pair[1]})
		})
		if len(decay.items) == 0 {
			r.add(path, "must have at least one point", decay)
		}
	default:
		r.add(path, "must be the name of a curve or a list of [hz, seconds]", decay)
	}
}

// nameUnnamed gives an id to each entry that the file leaves without one.
func nameUnnamed(p *Project, root *node) {
	name(root.get("loudspeakers"), "S", len(p.Loudspeakers), func(i int) *string { return &p.Loudspeakers[i].ID })
	name(root.get("seats"), "seat", len(p.Seats), func(i int) *string { return &p.Seats[i].ID })
	name(root.get("absorbers"), "A", len(p.Absorbers), func(i int) *string { return &p.Absorbers[i].ID })
}

func name(list *node, prefix string, count int, id func(i int) *string) {
	next := freshIDs(prefix, count, func(i int) string { return *id(i) })
	for i := range count {
		if n := list.items[i]; n.kind == objectNode && n.get("id") == nil {
			*id(i) = next()
		}
	}
}
