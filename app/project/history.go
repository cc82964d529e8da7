package project

import "reflect"

// History is the line of a document's states. It is a value's owner, not safe
// for concurrent use; the Projects in it are never changed.
type History struct {
	steps []step
	at    int // index of the current step
	saved int // index of the step that is on disk; −1 where none is
}

// step is one state and the name of the edit that led to it.
type step struct {
	project Project
	label   string
	key     string // merges with the next edit of the same key, "" for none
}

// mostSteps is how many states are kept.
const mostSteps = 500

// NewHistory begins with a project; onDisk says whether it is saved as it is.
func NewHistory(p Project, onDisk bool) *History {
	h := &History{steps: []step{{project: p}}, saved: -1}
	if onDisk {
		h.saved = 0
	}
	return h
}

// Current returns the project as it stands.
func (h *History) Current() Project { return h.steps[h.at].project }

// Do puts an edited project in place. An edit with the non-empty key of the one
// before it takes that one's place, so that a drag is one step; [History.Rest]
// ends such a run.
func (h *History) Do(label string, p Project, key string) {
	if reflect.DeepEqual(p, h.Current()) {
		return
	}
	last := &h.steps[h.at]
	if key != "" && last.key == key && h.at > 0 && h.saved != h.at {
		last.project = p
		h.steps = h.steps[:h.at+1]
		return
	}
	h.steps = append(h.steps[:h.at+1:h.at+1], step{p, label, key})
	h.at++
	if h.saved >= h.at {
		h.saved = -1
	}
	if len(h.steps) > mostSteps {
		drop := len(h.steps) - mostSteps
		h.steps = append([]step(nil), h.steps[drop:]...)
		h.at -= drop
		h.saved = max(-1, h.saved-drop)
	}
}

// Rest ends a run of merged edits. A run that came back to where it began is no
// step at all.
func (h *History) Rest() {
	last := &h.steps[h.at]
	if last.key != "" && h.at > 0 && reflect.DeepEqual(last.project, h.steps[h.at-1].project) {
		h.steps = h.steps[:h.at]
		h.at--
		return
	}
	last.key = ""
}

// Undo goes one step back and reports whether there was one.
func (h *History) Undo() bool {
	h.Rest()
	if h.at == 0 {
		return false
	}
	h.at--
	return true
}

// Redo goes one step forward and reports whether there was one.
func (h *History) Redo() bool {
	if h.at+1 >= len(h.steps) {
		return false
	}
	h.at++
	return true
}

// Undoable returns the name of the edit that Undo takes back, "" where none.
func (h *History) Undoable() string {
	if h.at == 0 {
		return ""
	}
	return h.steps[h.at].label
}

// Redoable returns the name of the edit that Redo does again, "" where none.
func (h *History) Redoable() string {
	if h.at+1 >= len(h.steps) {
		return ""
	}
	return h.steps[h.at+1].label
}

// Saved marks the current state as the one on disk.
func (h *History) Saved() {
	h.Rest()
	h.saved = h.at
}

// Dirty reports whether the current state differs from the one on disk.
func (h *History) Dirty() bool { return h.saved != h.at }
