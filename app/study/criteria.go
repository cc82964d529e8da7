package study

import (
	"context"
	"slices"

	"stillroom/acoustics"
	"stillroom/app/project"
)

// judge gathers the criteria: the room's own, the modes' decay, and, where there
// are two loudspeakers, the pair's with the first seat.
func (r *Result) judge(room []acoustics.Criterion) {
	problems := 0
	for _, m := range r.Modes {
		if m.Problem {
			problems++
		}
	}
	source := "the project's own limits"
	if l, ok := acoustics.Limit(r.Project.Limits.Curve); ok {
		source = l.Source
	}
	decay := acoustics.Criterion{ID: "modal-decay", Title: "Modes that ring over their limit and sound at a seat", Source: source,
		Figure: float64(problems), Limit: 0, Unit: "modes", Verdict: acoustics.Met,
		Advice: "Tune an absorber to each of them, worst first."}
	if problems > 0 {
		decay.Verdict = acoustics.NotMet
	}
	r.Criteria = append(slices.Clone(room), decay)
	if len(r.Project.Absorbers) > 0 && r.Stage == StageTreated {
		r.Criteria = append(r.Criteria, r.treatedDecay(decay))
	}
	if l := r.Project.Loudspeakers; len(l) == 2 {
		r.Criteria = append(r.Criteria, r.Room.StereoCriteria(l[0].At, l[1].At, r.Project.Seats[0].At)...)
	}
}

// treatedDecay is the criterion of the modes' decay after treatment.
func (r *Result) treatedDecay(bare acoustics.Criterion) acoustics.Criterion {
	open, _ := r.problems()
	c := bare
	c.ID, c.Title = "modal-decay-treated", "Those of them that are over their limit when treated"
	c.Figure, c.Verdict = float64(len(open)), acoustics.Met
	if len(open) > 0 {
		c.Verdict = acoustics.NotMet
	}
	return c
}

// Criteria computes only the criteria of a project.
func Criteria(p project.Project) ([]acoustics.Criterion, error) {
	r, err := Run(context.Background(), p, Options{Points: 2}, nil, nil)
	if err != nil {
		return nil, err
	}
	return r.Criteria, nil
}

// reverberation returns the times by octaves.
func reverberation(r acoustics.Room) []ReverberationRow {
	var rows []ReverberationRow
	schroeder := r.SchroederHz()
	for k := -3; k <= 2; k++ {
		b := acoustics.Octave(k)
		rows = append(rows, ReverberationRow{Nominal: b.Nominal, Hz: b.Centre, Sabine: r.SabineTime(b.Centre), Eyring: r.EyringTime(b.Centre),
			ArauPuchades: r.ArauPuchadesTime(b.Centre), Meant: b.Lower >= schroeder})
	}
	return rows
}
