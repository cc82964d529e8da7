package project

import (
	"reflect"
	"testing"

	"stillroom/acoustics"

	"pgregory.net/rapid"
)

func parsed(t *testing.T, data string) Project {
	t.Helper()
	p, err := Parse([]byte(data))
	if err != nil {
		t.Fatal(err)
	}
	return p
}

// A wall that is moved leaves a project that is valid, and the former one whole.
func TestWithDimension(t *testing.T) {
	p := parsed(t, whole)
	before := p.Clone()
	q := p.WithDimension(0, 4, false)
	if q.Room.Length != 4 || q.Seats[0].At[0] != 3 {
		t.Errorf("the far wall moved: length %v, seat %v", q.Room.Length, q.Seats[0].At)
	}
	q = p.WithDimension(0, 7, true)
	if q.Room.Length != 7 || q.Seats[0].At[0] != 4 || q.Loudspeakers[0].At[0] != 2 {
		t.Errorf("the near wall moved: length %v, seat %v, loudspeaker %v", q.Room.Length, q.Seats[0].At, q.Loudspeakers[0].At)
	}
	// On the left wall the first coordinate runs along the length.
	if q.Absorbers[1].Centre[0] != p.Absorbers[1].Centre[0]+1 || q.Absorbers[0].Centre != p.Absorbers[0].Centre {
		t.Errorf("absorbers: %v and %v", q.Absorbers[1].Centre, q.Absorbers[0].Centre)
	}
	if !reflect.DeepEqual(p, before) {
		t.Error("an edit changed the former value")
	}
	q = p.WithDimension(0, 2.5, false)
	if at := q.Seats[0].At[0]; at >= 2.5 || at <= 0 {
		t.Errorf("the seat is left outside at %v", at)
	}
}

func TestEditsLeaveTheFormerValue(t *testing.T) {
	p := parsed(t, whole)
	before := p.Clone()
	a := p.Absorbers[0]
	a.Centre[0] = 1
	for name, q := range map[string]Project{
		"move absorber":      p.WithAbsorber(0, a),
		"move loudspeaker":   p.WithLoudspeaker(0, Loudspeaker{ID: "L", At: acoustics.Point{2, 2, 2}}),
		"move seat":          p.WithSeat(0, Seat{ID: "s", At: acoustics.Point{2, 2, 2}}),
		"add absorber":       p.AddAbsorber(a),
		"add loudspeaker":    p.AddLoudspeaker(Loudspeaker{ID: "R"}),
		"add seat":           p.AddSeat(Seat{ID: "t"}),
		"delete absorber":    p.WithoutAbsorber(0),
		"delete loudspeaker": p.WithoutLoudspeaker(0),
		"delete seat":        p.WithoutSeat(0),
		"line a surface":     p.WithLining(acoustics.Left, []FinishShare{{"own", 1}}),
	} {
		if !reflect.DeepEqual(p, before) {
			t.Fatalf("%s changed the former value", name)
		}
		if reflect.DeepEqual(p, q) {
			t.Errorf("%s changed nothing", name)
		}
	}
}

func TestFreshIDsAreFree(t *testing.T) {
	p := parsed(t, whole)
	for range 30 {
		id := p.FreshAbsorberID()
		for _, a := range p.Absorbers {
			if a.ID == id {
				t.Fatalf("%q is taken", id)
			}
		}
		a := p.Absorbers[0]
		a.ID = id
		p = p.AddAbsorber(a)
	}
}

// Any sequence of edits, undos and redos is that of a plain list of states.
func TestHistoryIsAList(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		p := New()
		h := NewHistory(p, true)
		states, at, saved := []Project{p}, 0, 0
		for i := range rapid.IntRange(1, 40).Draw(t, "steps") {
			switch rapid.IntRange(0, 3).Draw(t, "what") {
			case 0, 1:
				q := h.Current()
				q.Room.Length = 1 + float64(i) + 0.5
				h.Do("edit", q, "")
				states = append(states[:at+1:at+1], q)
				at++
				if saved >= at {
					saved = -1
				}
			case 2:
				if h.Undo() != (at > 0) {
					t.Fatal("undo")
				}
				at = max(0, at-1)
			case 3:
				if h.Redo() != (at+1 < len(states)) {
					t.Fatal("redo")
				}
				at = min(len(states)-1, at+1)
			}
			if rapid.IntRange(0, 5).Draw(t, "save") == 0 {
				h.Saved()
				saved = at
			}
			if !reflect.DeepEqual(h.Current(), states[at]) || h.Dirty() != (saved != at) {
				t.Fatalf("at %d of %d: dirty %v, want %v", at, len(states), h.Dirty(), saved != at)
			}
		}
	})
}

// A drag is one step; one that comes back to where it began is none; one after a
// save does not hide what was saved.
func TestHistoryMergesDrags(t *testing.T) {
	p := New()
	h := NewHistory(p, true)
	moved := func(x float64) Project { q := p; q.Room.Length = x; return q }
	for _, x := range []float64{5.1, 5.2, 5.3} {
		h.Do("move wall", moved(x), "drag")
	}
	h.Rest()
	h.Do("move wall", moved(5.4), "drag")
	h.Rest()
	if h.Undo(); h.Current().Room.Length != 5.3 {
		t.Errorf("the second drag's undo leads to %v", h.Current().Room.Length)
	}
	if h.Undo(); h.Current().Room.Length != 5 || h.Dirty() {
		t.Errorf("the first drag's undo leads to %v, dirty %v", h.Current().Room.Length, h.Dirty())
	}
	if h.Redoable() != "move wall" {
		t.Errorf("redo is %q", h.Redoable())
	}
	h.Do("move wall", moved(6), "drag")
	h.Do("move wall", moved(5), "drag")
	h.Rest()
	if h.Undoable() != "" || h.Dirty() {
		t.Errorf("a drag that came back is a step: %q, dirty %v", h.Undoable(), h.Dirty())
	}
	h.Do("nudge", moved(5.01), "nudge")
	h.Saved()
	h.Do("nudge", moved(5.02), "nudge")
	if h.Undo(); h.Current().Room.Length != 5.01 || h.Dirty() {
		t.Errorf("what was saved is lost: %v, dirty %v", h.Current().Room.Length, h.Dirty())
	}
}
