package window

import "time"

// throttle lets the last of many calls through at a steady pace, so that a
// pointer that reports a thousand times a second asks for no more work than a
// screen can show. It belongs to the UI goroutine.
type throttle struct {
	do    func(func())
	pace  time.Duration
	last  time.Time
	held  func()
	armed bool
}

// call runs f now or, within the pace of the last run, a little later; a later
// call takes its place.
func (t *throttle) call(f func()) {
	wait := t.pace - time.Since(t.last)
	if wait <= 0 && !t.armed {
		t.last = time.Now()
		f()
		return
	}
	t.held = f
	if !t.armed {
		t.armed = true
		time.AfterFunc(max(wait, 0), func() { t.do(t.flush) })
	}
}

// flush runs what is held at once.
func (t *throttle) flush() {
	t.armed = false
	if f := t.held; f != nil {
		t.held = nil
		t.last = time.Now()
		f()
	}
}
