package study

import (
	"sort"

	"stillroom/acoustics"
	"stillroom/app/project"
)

// limitCurve returns the curve that a valid project's limits name or hold.
func limitCurve(l project.Limits) acoustics.LimitCurve {
	if named, ok := acoustics.Limit(l.Curve); ok {
		return named.Curve
	}
	c := make(acoustics.LimitCurve, len(l.Points))
	for i, p := range l.Points {
		c[i] = acoustics.LimitPoint{Hz: p.Hz, Seconds: p.Seconds}
	}
	return c
}

// rate marks the problem modes and ranks them, the worst first.
func (r *Result) rate(limit acoustics.LimitCurve) {
	modes := make([]acoustics.DampedMode, len(r.Modes))
	levels := make([][]float64, len(r.Modes))
	for i, m := range r.Modes {
		modes[i], levels[i] = m.Mode, m.LevelDB
	}
	ratings := acoustics.RateModes(modes, levels, limit)
	var problems []int
	for i, rating := range ratings {
		r.Modes[i].Problem = rating.Problem
		if rating.Problem {
			problems = append(problems, i)
		}
	}
	sort.SliceStable(problems, func(a, b int) bool {
		return ratings[problems[a]].Severity > ratings[problems[b]].Severity
	})
	for rank, i := range problems {
		r.Modes[i].Rank = rank + 1
	}
}
