package project

import (
	"bytes"
	"slices"

	"stillroom/acoustics"
)

// Marshal returns the project as a file: two spaces of indent, keys in fixed
// order, all defaults written out, numbers as short as they can be read back
// exactly, and a newline at the end. It panics on a number that is not finite;
// Validate finds those.
func (p Project) Marshal() []byte {
	root := &node{kind: objectNode}
	root.add("stillroom", newNumber(Version))
	root.add("title", newText(p.Title))
	root.add("prepared_for", newText(p.PreparedFor))
	root.add("prepared_by", newText(p.PreparedBy))
	root.add("note", newText(p.Note))
	root.add("air", write(p.Air.fields()))
	root.add("room", p.Room.node())
	root.add("finishes", writeList(p.Finishes, Finish.node))
	root.add("loudspeakers", writeList(p.Loudspeakers, func(l Loudspeaker) *node { return write(l.fields()) }))
	root.add("seats", writeList(p.Seats, func(s Seat) *node { return write(s.fields()) }))
	root.add("absorbers", writeList(p.Absorbers, Absorber.node))
	root.add("limits", p.Limits.node())
	p.writeExtras(root)
	var b bytes.Buffer
	root.print(&b, "")
	b.WriteByte('\n')
	return b.Bytes()
}

func (r Room) node() *node {
	n := write(r.fields())
	surfaces := &node{kind: objectNode}
	for _, s := range acoustics.Surfaces() {
		surfaces.add(s.String(), writeList(r.Surfaces[s], func(f FinishShare) *node {
			n := write(f.fields())
			n.inline = true
			return n
		}))
	}
	n.add("surfaces", surfaces)
	return n
}

func (f Finish) node() *node {
	n := write(f.fields())
	rows := &node{kind: objectNode, inline: true}
	for _, name := range f.bandNames() {
		rows.add(name, newNumber(f.Absorption[name]))
	}
	n.add("absorption", rows)
	return n
}

func (a Absorber) node() *node {
	n := write(a.fields())
	if b := a.block(); b != nil {
		n.add(a.Kind, write(b.fields()))
	}
	return n
}

// MarshalJSON returns the absorber as it stands in a file.
func (a Absorber) MarshalJSON() ([]byte, error) {
	var b bytes.Buffer
	a.node().print(&b, "")
	return b.Bytes(), nil
}

func (l Limits) node() *node {
	n := &node{kind: objectNode}
	if l.Curve != "" {
		n.add("decay", newText(l.Curve))
		return n
	}
	n.add("decay", writeList(l.Points, func(p LimitPoint) *node { return newNumbers(p.Hz, p.Seconds) }))
	return n
}

// write turns fields into an object.
func write(fields []field) *node {
	n := &node{kind: objectNode}
	for _, f := range fields {
		switch to := f.to.(type) {
		case *float64:
			n.add(f.key, newNumber(*to))
		case *int:
			n.add(f.key, newNumber(float64(*to)))
		case *bool:
			n.add(f.key, &node{kind: flagNode, flag: *to})
		case *string:
			n.add(f.key, newText(*to))
		case *acoustics.Surface:
			n.add(f.key, newText(to.String()))
		case *acoustics.Point:
			n.add(f.key, newNumbers(to[:]...))
		case *[2]float64:
			n.add(f.key, newNumbers(to[:]...))
		case *fillSide:
			n.add(f.key, newText(to.String()))
		case **Fill:
			if *to != nil {
				n.add(f.key, write((*to).fields()))
			}
		case **NeckFill:
			if *to != nil {
				n.add(f.key, write((*to).fields()))
			}
		case **Fluid:
			if *to != nil {
				n.members = slices.Concat(n.members, write((*to).fields()).members)
			}
		default:
			panic("project: writing a field of a type unknown")
		}
	}
	return n
}

func writeList[T any](list []T, one func(T) *node) *node {
	n := &node{kind: listNode}
	for _, v := range list {
		n.items = append(n.items, one(v))
	}
	return n
}
