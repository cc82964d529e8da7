package project

import (
	"math"
	"strconv"
	"strings"

	"stillroom/acoustics"
)

// reader turns a tree into a Project and lists what does not fit. A value that
// cannot be read leaves the default in its place, so that reading goes on and
// all problems of a file are found at once.
type reader struct{ problems Errors }

func (r *reader) add(path, rule string, n *node) {
	p := Problem{Path: path, Rule: rule}
	if n != nil {
		p.Value = n.describe()
	}
	r.problems = append(r.problems, p)
}

// object reads the fields of an object and names every key of it that is
// neither among them nor among the further keys, which the caller reads.
func (r *reader) object(path string, n *node, fields []field, further ...string) bool {
	if n.kind != objectNode {
		r.add(path, "must be an object", n)
		return false
	}
	known := further
	for _, f := range fields {
		if fluid, is := f.to.(**Fluid); is {
			known = append(known, r.fluid(path, n, fluid)...)
			continue
		}
		known = append(known, f.key)
		at := join(path, f.key)
		switch v := n.get(f.key); {
		case v != nil:
			r.value(at, v, f.to)
		case f.required:
			r.add(at, "is required", nil)
		}
	}
	r.unknown(path, n, known)
	return true
}

// unknown names the keys of an object that are not known.
func (r *reader) unknown(path string, n *node, known []string) {
	for _, m := range n.members {
		if contains(known, m.key) {
			continue
		}
		rule := "is not a key of this object"
		if near := nearest(m.key, known); near != "" {
			rule += "; the nearest is " + near
		}
		r.problems = append(r.problems, Problem{Path: join(path, m.key), Rule: rule})
	}
}

// value reads one value into its place.
func (r *reader) value(path string, n *node, to any) {
	switch to := to.(type) {
	case *float64:
		r.number(path, n, to)
	case *int:
		r.whole(path, n, to)
	case *bool:
		if n.kind != flagNode {
			r.add(path, "must be true or false", n)
			return
		}
		*to = n.flag
	case *string:
		if n.kind != textNode {
			r.add(path, "must be text", n)
			return
		}
		*to = n.text
	case *acoustics.Surface:
		r.surface(path, n, to)
	case *acoustics.Point:
		r.numbers(path, n, to[:])
	case *[2]float64:
		r.numbers(path, n, to[:])
	case *fillSide:
		if n.kind != textNode || (n.text != "wall" && n.text != "face") {
			r.add(path, `must be "wall" or "face"`, n)
			return
		}
		*to = n.text == "face"
	case **Fill:
		fill := DefaultFill()
		r.object(path, n, fill.fields())
		*to = &fill
	case **NeckFill:
		fill := DefaultNeckFill()
		r.object(path, n, fill.fields())
		*to = &fill
	default:
		panic("project: reading a field of a type unknown")
	}
}

// number reads a finite number.
func (r *reader) number(path string, n *node, to *float64) bool {
	if n.kind != numberNode {
		r.add(path, "must be a number", n)
		return false
	}
	v, err := strconv.ParseFloat(n.text, 64)
	if err != nil || math.IsInf(v, 0) {
		r.add(path, "must be a finite number", n)
		return false
	}
	*to = v
	return true
}

// whole reads a whole number; 2.0 and 2e0 are whole.
func (r *reader) whole(path string, n *node, to *int) {
	var v float64
	if !r.number(path, n, &v) {
		return
	}
	if v != math.Trunc(v) {
		r.add(path, "must be a whole number", n)
		return
	}
	if allowed, found := FieldRange(path); found && !allowed.Contains(v) {
		r.add(path, allowed.rule(), n) // before the conversion can overflow
		return
	}
	*to = int(v)
}

// numbers reads a list of just so many numbers.
func (r *reader) numbers(path string, n *node, to []float64) {
	if n.kind != listNode || len(n.items) != len(to) {
		r.add(path, "must be a list of "+strconv.Itoa(len(to))+" numbers", n)
		return
	}
	for i, v := range n.items {
		r.number(item(path, i), v, &to[i])
	}
}

func (r *reader) surface(path string, n *node, to *acoustics.Surface) {
	if n.kind == textNode {
		if s, found := acoustics.SurfaceNamed(n.text); found {
			*to = s
			return
		}
	}
	r.add(path, "must be one of "+strings.Join(surfaceNames(), ", "), n)
}

// fluid reads the four keys that belong together, where they are given, and
// returns them.
func (r *reader) fluid(path string, n *node, to **Fluid) (keys []string) {
	var f Fluid
	given := 0
	for _, field := range f.fields() {
		keys = append(keys, field.key)
		if v := n.get(field.key); v != nil {
			given++
			r.value(join(path, field.key), v, field.to)
		}
	}
	if given == 0 {
		return keys
	}
	for _, key := range keys {
		if n.get(key) == nil {
			r.add(join(path, key), "is required where any of "+strings.Join(keys, ", ")+" is given", nil)
		}
	}
	*to = &f
	return keys
}

// list reads each item of a list.
func (r *reader) list(path string, n *node, one func(path string, n *node)) {
	if n == nil {
		return
	}
	if n.kind != listNode {
		r.add(path, "must be a list", n)
		return
	}
	for i, v := range n.items {
		one(item(path, i), v)
	}
}

func surfaceNames() []string {
	var names []string
	for _, s := range acoustics.Surfaces() {
		names = append(names, s.String())
	}
	return names
}

func contains(list []string, s string) bool {
	for _, v := range list {
		if v == s {
			return true
		}
	}
	return false
}

// nearest returns the known key that a mistyped one most probably means, or ""
// where none is near: another case, the beginning of a key, or a third of its
// letters changed at most.
func nearest(key string, known []string) string {
	best, least := "", math.MaxInt
	for _, k := range known {
		d := distance(strings.ToLower(key), k)
		if len(key) >= 3 && strings.HasPrefix(k, strings.ToLower(key)) {
			d = min(d, 1)
		}
		if d < least {
			best, least = k, d
		}
	}
	if least > max(1, min(len(key), len(best))/3) {
		return ""
	}
	return best
}

// distance returns the least number of letters to change, drop or insert to
// turn a into b.
func distance(a, b string) int {
	s, t := []rune(a), []rune(b)
	if len(s) > 2*len(t)+8 {
		return len(s) // far, whatever it says
	}
	row := make([]int, len(t)+1)
	for j := range row {
		row[j] = j
	}
	for i := range s {
		diagonal := row[0]
		row[0] = i + 1
		for j := range t {
			cost := diagonal
			if s[i] != t[j] {
				cost++
			}
			diagonal = row[j+1]
			row[j+1] = min(cost, row[j]+1, row[j+1]+1)
		}
	}
	return row[len(t)]
}
