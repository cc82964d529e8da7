package project

import (
	"fmt"
	"iter"
	"math"
	"strconv"
	"strings"
	"unicode"
	"unicode/utf8"

	"stillroom/acoustics"
)

// Tolerances of the rules.
const (
	// shareTolerance is how far the shares of a surface may add up beside 1.
	shareTolerance = 1e-3
	// touchTolerance lets absorbers touch each other and the edges of their
	// surface in spite of rounding, m.
	touchTolerance = 1e-9
)

// Longest texts, in characters.
const (
	longestID   = 40
	longestLine = 200
	longestNote = 20_000
)

// Validate checks every rule of a project and returns all that is wrong, empty
// where nothing is. A Project without problems can be saved and read again.
func (p Project) Validate() Errors {
	c := newChecker(nil)
	c.project(p)
	return c.errs
}

// checker collects problems. Of what is already at fault it says no more, so
// that one slip gives one message.
type checker struct {
	errs Errors
	// at holds the paths at fault, above all paths that lie above one.
	at, above map[string]bool
}

// newChecker returns a checker to which some problems are known.
func newChecker(known Errors) *checker {
	c := &checker{at: map[string]bool{}, above: map[string]bool{}}
	for _, p := range known {
		c.record(p)
	}
	return c
}

// record takes a problem down.
func (c *checker) record(p Problem) {
	c.errs = append(c.errs, p)
	if p.Path == "" {
		return
	}
	c.at[p.Path] = true
	for parent := range parents(p.Path) {
		c.above[parent] = true
	}
}

func (c *checker) add(path, rule, value string) {
	if !c.underFault(path) {
		c.record(Problem{path, rule, value})
	}
}

// underFault reports whether a path or one above it is at fault.
func (c *checker) underFault(path string) bool {
	if c.at[path] {
		return true
	}
	for parent := range parents(path) {
		if c.at[parent] {
			return true
		}
	}
	return false
}

// fine reports whether nothing at the paths, above or below them is at fault, so
// that rules between several values can be judged.
func (c *checker) fine(paths ...string) bool {
	for _, path := range paths {
		if c.above[path] || c.underFault(path) {
			return false
		}
	}
	return true
}

// parents yields the paths above a path, the file as a whole left out.
func parents(path string) iter.Seq[string] {
	return func(yield func(string) bool) {
		for i := len(path) - 1; i > 0; i-- {
			if (path[i] == '.' || path[i] == '[') && !yield(path[:i]) {
				return
			}
		}
	}
}

func (c *checker) project(p Project) {
	c.line("title", p.Title)
	c.line("prepared_for", p.PreparedFor)
	c.line("prepared_by", p.PreparedBy)
	c.note("note", p.Note)
	c.fields("air", p.Air.fields())
	c.fields("room", p.Room.fields())
	c.surfaces(p)
	c.finishes(p.Finishes)
	c.loudspeakers(p)
	c.seats(p)
	c.absorbers(p)
	c.limits(p.Limits)
	c.extras(p)
}

// fields checks the range of each number among the fields.
func (c *checker) fields(path string, fields []field) {
	for _, f := range fields {
		at := join(path, f.key)
		switch to := f.to.(type) {
		case *float64:
			c.number(at, *to)
		case *int:
			c.number(at, float64(*to))
		case *[2]float64:
			if _, found := FieldRange(at + "[]"); found {
				c.number(item(at, 0), to[0])
				c.number(item(at, 1), to[1])
			}
		case **Fill:
			if *to != nil {
				c.fields(at, (*to).fields())
			}
		case **NeckFill:
			if *to != nil {
				c.fields(at, (*to).fields())
			}
		case **Fluid:
			if *to != nil {
				c.fluid(path, *to)
			}
		}
	}
}

// number checks a value against the range that belongs to its path.
func (c *checker) number(path string, v float64) {
	allowed, found := FieldRange(path)
	if !found {
		panic("project: no range for " + path)
	}
	if !allowed.Contains(v) {
		c.add(path, allowed.rule(), numberText(v))
	}
}

func (c *checker) fluid(path string, f *Fluid) {
	c.fields(path, f.fields())
	viscous, thermal := join(path, "viscous_um"), join(path, "thermal_um")
	if f.ThermalUM < f.ViscousUM && c.fine(viscous, thermal) {
		c.add(thermal, "must be at least viscous_um, "+numberText(f.ViscousUM), numberText(f.ThermalUM))
	}
}

// surfaces checks what each surface carries.
func (c *checker) surfaces(p Project) {
	for _, s := range acoustics.Surfaces() {
		list := p.Room.Surfaces[s]
		if len(list) == 0 {
			continue
		}
		path := join("room.surfaces", s.String())
		sum := 0.0
		for i, f := range list {
			at := item(path, i)
			c.number(join(at, "share"), f.Share)
			sum += f.Share
			if _, found := p.FinishByID(f.Finish); !found {
				c.add(join(at, "finish"), "must be the id of a finish of the file or of a built-in one", quoted(f.Finish))
			}
		}
		if math.Abs(sum-1) > shareTolerance*(1+1e-9) && c.fine(path) {
			c.add(path, "the shares must add to 1 within "+numberText(shareTolerance), numberText(math.Round(sum*1e6)/1e6))
		}
	}
}

func (c *checker) finishes(list []Finish) {
	ids := c.ids("finishes")
	for i, f := range list {
		path := item("finishes", i)
		ids(i, f.ID)
		c.line(join(path, "name"), f.Name)
		c.line(join(path, "source"), f.Source)
		at := join(path, "absorption")
		if len(f.Absorption) == 0 {
			c.add(at, "must give a coefficient for at least one band", "")
		}
		for _, name := range f.bandNames() {
			if _, known := bandHz(name); !known {
				c.add(join(at, name), "is not an octave or third-octave band from 20 to 20000 Hz by its nominal frequency", "")
				continue
			}
			c.number(join(at, name), f.Absorption[name])
		}
	}
}

func (c *checker) loudspeakers(p Project) {
	if len(p.Loudspeakers) == 0 {
		c.add("loudspeakers", "must list at least one loudspeaker", "")
	}
	ids := c.ids("loudspeakers")
	for i, l := range p.Loudspeakers {
		path := item("loudspeakers", i)
		ids(i, l.ID)
		c.inside(join(path, "at_m"), l.At, p.Room)
		c.fields(path, l.fields())
	}
}

func (c *checker) seats(p Project) {
	if len(p.Seats) == 0 {
		c.add("seats", "must list at least one seat", "")
	}
	ids := c.ids("seats")
	for i, s := range p.Seats {
		ids(i, s.ID)
		c.inside(join(item("seats", i), "at_m"), s.At, p.Room)
	}
}

// inside checks that a point lies within the room, not on its surfaces.
func (c *checker) inside(path string, at acoustics.Point, r Room) {
	for i, f := range r.fields() {
		far := *f.to.(*float64)
		if !finite(at[i]) {
			c.add(item(path, i), "must be a finite number", numberText(at[i]))
			continue
		}
		if (at[i] <= 0 || at[i] >= far) && c.fine(join("room", f.key)) {
			c.add(item(path, i), "must lie inside the room, between 0 and "+numberText(far), numberText(at[i]))
		}
	}
}

func (c *checker) limits(l Limits) {
	const path = "limits.decay"
	if l.Curve != "" {
		if !contains(Curves(), l.Curve) {
			c.add(path, curveRule(), quoted(l.Curve))
		}
		if len(l.Points) > 0 {
			c.add(path, "must be either the name of a curve or points of one's own", quoted(l.Curve))
		}
		return
	}
	if len(l.Points) == 0 {
		c.add(path, "must have at least one point", "")
	}
	for i, p := range l.Points {
		hz, seconds := item(item(path, i), 0), item(item(path, i), 1)
		c.number(hz, p.Hz)
		c.number(seconds, p.Seconds)
		if i == 0 {
			continue
		}
		last := l.Points[i-1].Hz
		if p.Hz <= last && c.fine(hz, item(item(path, i-1), 0)) {
			c.add(hz, "frequencies must rise: must be above "+numberText(last), numberText(p.Hz))
		}
	}
}

func curveRule() string {
	return `must be "` + strings.Join(Curves(), `" or "`) + `", or a list of [hz, seconds]`
}

// ids returns a check of the ids of one list.
func (c *checker) ids(list string) func(i int, id string) {
	first := map[string]int{}
	return func(i int, id string) {
		path := join(item(list, i), "id")
		if !validID(id) {
			c.add(path, "must be 1 to "+strconv.Itoa(longestID)+" of letters, digits, '.', '_' and '-'", quoted(id))
			return
		}
		if before, taken := first[id]; taken {
			c.add(path, fmt.Sprintf("must be unique in its list, is that of %s too", item(list, before)), quoted(id))
			return
		}
		first[id] = i
	}
}

func validID(id string) bool {
	if id == "" || len(id) > longestID {
		return false
	}
	for _, r := range id {
		if !idRune(r) {
			return false
		}
	}
	return true
}

// idRune reports whether a character may stand in an id: letters and digits
// are those of ASCII, which every keyboard and command line can write.
func idRune(r rune) bool {
	return r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' || r >= '0' && r <= '9' ||
		r == '.' || r == '_' || r == '-'
}

// line checks a text of one line.
func (c *checker) line(path, text string) {
	if strings.ContainsFunc(text, unicode.IsControl) {
		c.add(path, "must be one line without control characters", quoted(text))
	}
	c.text(path, text, longestLine)
}

// note checks a text that may have lines and tabs.
func (c *checker) note(path, text string) {
	if strings.ContainsFunc(text, func(r rune) bool { return unicode.IsControl(r) && !strings.ContainsRune("\n\r\t", r) }) {
		c.add(path, "must be text without control characters", quoted(text))
	}
	c.text(path, text, longestNote)
}

func (c *checker) text(path, text string, longest int) {
	if !utf8.ValidString(text) {
		c.add(path, "must be valid Unicode text", quoted(text))
	}
	if n := utf8.RuneCountInString(text); n > longest {
		c.add(path, fmt.Sprintf("must be at most %d characters long", longest), strconv.Itoa(n))
	}
}

func finite(v float64) bool { return !math.IsNaN(v) && !math.IsInf(v, 0) }
