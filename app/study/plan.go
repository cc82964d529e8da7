package study

import (
	"context"
	"math"
	"slices"

	"stillroom/app/project"
)

// PlanRequest asks for absorbers that bring several modes under their limits.
type PlanRequest struct {
	Modes []int // indices in Result.Modes; none: all problem modes
	// Each is what every mode's search is asked; its Mode is not used.
	Each TuneRequest
	// Absorbers is how many absorbers there may be in all; 0: 8.
	Absorbers int
}

// Plan is a set of absorbers for several modes.
type Plan struct {
	Steps []PlanStep
	// After is the room with all of them; the result itself where there is none.
	After *Result
	// Open are the modes of those asked for that are still over their limit, indices in
	// After.Modes.
	Open []int
}

// PlanStep is one absorber of a plan and the mode that it was tuned to.
type PlanStep struct {
	Mode     int // index in Result.Modes
	Proposal Proposal
}

// Project returns the project with the plan's absorbers in it.
func (p Plan) Project() project.Project { return p.After.Project }

// perMode is how many absorbers one mode is given at most, and worthWhile by how much
// one must shorten its decay, as a factor, to be built.
const (
	perMode    = 2
	worthWhile = 0.85
)

// PlanProgress is told of each absorber that a plan takes up, and of the mode that is
// looked at next, −1 at the end.
type PlanProgress func(next int, soFar Plan)

// PlanFor returns absorbers and places that bring the modes asked for under their
// limits, the worst first, each tuned in the room as the former ones leave it; or the
// best there is, with what stays open. It is deterministic. The error is that of ctx;
// the plan is then what there was of it.
func PlanFor(ctx context.Context, r *Result, q PlanRequest, progress PlanProgress) (Plan, error) {
	if progress == nil {
		progress = func(int, Plan) {}
	}
	most := q.Absorbers
	if most == 0 {
		most = 8
	}
	wanted := q.Modes
	if len(wanted) == 0 {
		wanted, _ = r.problems()
	}
	var (
		plan  = Plan{After: r}
		tries = map[int]int{}
	)
	for len(plan.Steps) < most {
		next := plan.After.worstOf(wanted, tries)
		if next < 0 {
			break
		}
		progress(next, plan)
		each := q.Each
		each.Mode = next
		found, err := Tune(ctx, plan.After, each, nil)
		if err != nil {
			return plan.finished(wanted), err
		}
		tries[next]++
		if len(found) == 0 || found[0].Longest() > worthWhile*plan.After.Modes[next].Now() {
			tries[next] = perMode // nothing helps it here
			continue
		}
		p := plan.After.Project.AddAbsorber(found[0].Absorber)
		after, err := Run(ctx, p, r.Options, plan.After, nil)
		if err != nil {
			return plan.finished(wanted), err
		}
		plan.Steps = append(slices.Clone(plan.Steps), PlanStep{next, found[0]})
		plan.After = after
	}
	plan = plan.finished(wanted)
	progress(-1, plan)
	return plan, nil
}

// finished notes what stays open.
func (p Plan) finished(wanted []int) Plan {
	p.Open = nil
	for _, i := range wanted {
		if p.After.overLimit(i) {
			p.Open = append(p.Open, i)
		}
	}
	return p
}

// overLimit reports whether a mode rings over its limit as it stands.
func (r *Result) overLimit(i int) bool {
	if over, known := r.Modes[i].stillOver(r.Stage); known {
		return over
	}
	return r.Modes[i].Oscillator.T60() > r.Modes[i].LimitS
}

// worstOf returns that of some modes which is furthest over its limit and may still
// be given an absorber, −1 for none: by rank where it is a problem, else by how far.
func (r *Result) worstOf(wanted []int, tries map[int]int) int {
	worst, at := math.Inf(1), -1
	for _, i := range wanted {
		if tries[i] >= perMode || !r.overLimit(i) {
			continue
		}
		rank := float64(r.Modes[i].Rank)
		if rank == 0 {
			rank = 1e6 - r.Modes[i].Now()/r.Modes[i].LimitS
		}
		if rank < worst {
			worst, at = rank, i
		}
	}
	return at
}
