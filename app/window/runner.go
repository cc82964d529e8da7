package window

import (
	"context"
	"sync/atomic"

	"stillroom/app/project"
	"stillroom/app/study"
)

// runner studies projects in the background. The latest edit wins: a run that an
// edit has overtaken is let come as far as the levels, so that the window
// follows a drag, and then gives way. All its methods belong to the UI
// goroutine; do puts a function there.
type runner struct {
	do      func(func())
	options study.Options
	// show is given each result, complete or not; nil with an error.
	show func(*study.Result, error)
	// idle is told when the runner begins or ends work.
	busy func(bool)

	running bool
	next    *project.Project
	former  *study.Result
	waiting atomic.Bool // an edit waits: seen from the worker
	cancel  context.CancelFunc
	levels  bool // the run has come as far as the levels
}

// submit asks for a project to be studied.
func (r *runner) submit(p project.Project) {
	r.next = &p
	r.waiting.Store(true)
	if r.running {
		if r.levels {
			r.cancel()
		}
		return
	}
	r.start()
}

// stop ends what is running and forgets what waits.
func (r *runner) stop() {
	r.next = nil
	if r.running {
		r.cancel()
	}
}

func (r *runner) start() {
	p := *r.next
	r.next = nil
	r.waiting.Store(false)
	r.running, r.levels = true, false
	ctx, cancel := context.WithCancel(context.Background())
	r.cancel = cancel
	former, options := r.former, r.options
	r.busy(true)
	go func() {
		result, err := study.Run(ctx, p, options, former, func(partial *study.Result) {
			r.do(func() {
				r.levels, r.former = true, partial
				r.show(partial, nil)
			})
			if r.waiting.Load() {
				cancel()
			}
		})
		r.do(func() { r.finished(result, err, ctx.Err() != nil) })
		cancel()
	}()
}

func (r *runner) finished(result *study.Result, err error, overtaken bool) {
	r.running = false
	switch {
	case err == nil:
		r.former = result
		r.show(result, nil)
	case !overtaken:
		r.show(nil, err)
	}
	if r.next != nil {
		r.start()
		return
	}
	r.busy(false)
}
