package window

import (
	"context"
	"sync"
	"time"

	"stillroom/app/project"
	"stillroom/app/study"
)

// runner studies projects in the background. The latest edit wins: a run that an
// edit has overtaken is let come as far as the levels, so that the window
// follows a drag, and then gives way. Where whole runs are quick, they are let
// come to their end and only complete results are shown. Its own goroutine takes
// up the next project at once; only results go through do to the UI goroutine.
type runner struct {
	do func(func())
	// show is given each result, complete or not; nil with an error. busy is told
	// when work begins or ends. Both are called on the UI goroutine.
	show func(*study.Result, error)
	busy func(bool)

	mutex   sync.Mutex
	next    *request
	fresh   bool // forget the former result first
	running bool
	levels  bool // the run has come as far as the levels
	cancel  context.CancelFunc

	// former is the furthest result there is, whose stages the next run takes up.
	// The worker's own.
	former *study.Result
	// least is the shortest complete run since one was not quick, 0 for none: what it
	// takes while nothing else is at work.
	least time.Duration
}

// request is a project to be studied and how far.
type request struct {
	project project.Project
	options study.Options
}

// quick is how long a run may take and still let a drag follow whole.
const quick = 50 * time.Millisecond

// submit asks for a project to be studied.
func (r *runner) submit(p project.Project, o study.Options) {
	r.mutex.Lock()
	defer r.mutex.Unlock()
	r.next = &request{p, o}
	if r.running {
		if r.levels {
			r.cancel()
		}
		return
	}
	r.running = true
	r.busy(true)
	go r.work()
}

// restart forgets the former result: another document begins.
func (r *runner) restart() {
	r.mutex.Lock()
	defer r.mutex.Unlock()
	r.fresh = true
}

// stop ends what is running and forgets what waits.
func (r *runner) stop() {
	r.mutex.Lock()
	defer r.mutex.Unlock()
	r.next = nil
	if r.running {
		r.cancel()
	}
}

// work studies what is submitted until nothing waits.
func (r *runner) work() {
	for {
		r.mutex.Lock()
		if r.next == nil {
			r.running = false
			r.mutex.Unlock()
			r.do(func() { r.rested() })
			return
		}
		next := *r.next
		r.next, r.levels = nil, false
		if r.fresh {
			r.former, r.fresh, r.least = nil, false, 0
		}
		ctx, cancel := context.WithCancel(context.Background())
		r.cancel = cancel
		r.mutex.Unlock()
		r.former = r.run(ctx, next, r.former)
		cancel()
	}
}

// run studies one project and returns the furthest result it has.
func (r *runner) run(ctx context.Context, q request, former *study.Result) *study.Result {
	start := time.Now()
	cold := former == nil
	r.mutex.Lock()
	whole := !cold && r.least > 0 && r.least < quick
	r.mutex.Unlock()
	var (
		finished bool
		shown    study.Stage
	)
	// partly shows what there is of a run that goes on, nothing that is older than what
	// has been shown.
	partly := func(partial *study.Result) {
		r.mutex.Lock()
		defer r.mutex.Unlock()
		if finished || partial.Stage < shown {
			return
		}
		shown = partial.Stage
		r.do(func() { r.show(partial, nil) })
		r.levels = true
		if r.next != nil {
			r.cancel()
		}
	}
	result, err := study.Run(ctx, q.project, q.options, former, func(partial *study.Result) {
		former = partial
		if !whole {
			partly(partial)
			return
		}
		// Taken to be quick: only if it is not, its parts are shown, and those of the
		// next ones at once.
		whole = false
		time.AfterFunc(quick-time.Since(start), func() {
			r.mutex.Lock()
			if !finished {
				r.least = 0
			}
			r.mutex.Unlock()
			partly(partial)
		})
	})
	r.mutex.Lock()
	finished = true
	r.mutex.Unlock()
	switch {
	case err == nil:
		took := time.Since(start)
		if cold {
			took /= 4 // about what the parts are worth that later runs take over
		}
		r.mutex.Lock()
		if r.least == 0 || took < r.least {
			r.least = took
		}
		r.mutex.Unlock()
		r.do(func() { r.show(result, nil) })
		return result
	case ctx.Err() == nil:
		r.do(func() { r.show(nil, err) })
	}
	return former
}

// rested tells that work has ended, unless more has come meanwhile.
func (r *runner) rested() {
	r.mutex.Lock()
	running := r.running
	r.mutex.Unlock()
	if !running {
		r.busy(false)
	}
}
