package analysis

import (
	"context"
	"errors"
	"time"

	"golang.org/x/sync/errgroup"

	"spanwright/analysis/combine"
	"spanwright/analysis/frame"
	"spanwright/lang/model"
)

// Timings say where the time of a run went.
type Timings struct {
	// Prepare is the time for the structure and its factor, Solve that for load
	// cases and for combinations that cannot be superposed, Total all of it.
	Prepare, Solve, Total time.Duration
}

// Run answers a model. previous are the results of an earlier version of it, or
// nil; what an edit leaves of the work is taken over from them, and the numbers
// are the same as without. previous must not serve two runs at the same time.
//
// A model that has no answer gives results without numbers that say why. The
// error is the context's.
func Run(ctx context.Context, m *model.Model, previous *Results) (*Results, error) {
	start := time.Now()
	r := &Results{model: m}
	var problems []error
	r.set, problems = combine.Expand(m)
	r.diagnostics = familyDiagnostics(m, problems)
	if err := r.solve(ctx, previous); err != nil {
		if ctx.Err() != nil {
			return nil, ctx.Err()
		}
		r.states, r.subjects = nil, nil
		r.refuse(err)
	}
	r.envelopes = r.familyEnvelopes()
	r.sortDiagnostics()
	r.timings.Total = time.Since(start)
	return r, nil
}

// solve fills states and subjects. The error is the reason why there are none.
func (r *Results) solve(ctx context.Context, previous *Results) error {
	start := time.Now()
	var old *frame.Solver
	if previous != nil {
		old = previous.solver
	}
	solver, err := frame.Prepare(ctx, r.model, old)
	r.timings.Prepare = time.Since(start)
	if err != nil {
		return err
	}
	r.solver = solver
	start = time.Now()
	defer func() { r.timings.Solve = time.Since(start) }()
	// The condition takes about as long as the cases, and both only read the
	// factor; one-way parts make factors of their own.
	var condition float64
	var beside errgroup.Group
	beside.Go(func() (err error) {
		condition, err = r.condition(ctx, previous)
		return err
	})
	if solver.OneWay() {
		if err := beside.Wait(); err != nil {
			return err
		}
	}
	cases, reasons, err := solver.Cases(ctx)
	if failed := beside.Wait(); failed != nil || err != nil {
		return errors.Join(err, failed)
	}
	r.audit(condition)
	if solver.OneWay() {
		return r.solveEach(ctx, cases, reasons)
	}
	for _, s := range cases {
		r.states = append(r.states, s)
	}
	r.subjects = superposedSubjects(r.model, r.set)
	r.auditStates(cases)
	return nil
}

// solveEach solves the combinations, each on its own as one-way parts demand.
// One without an answer is left out with a diagnostic.
func (r *Results) solveEach(ctx context.Context, cases []*frame.State, reasons []error) error {
	problems := make([]string, len(reasons)+len(r.set.All))
	var solved []*frame.State
	take := func(i int, s *frame.State, reason error) {
		if reason != nil {
			problems[i] = sentence(reason.Error())
			r.diagnostics = append(r.diagnostics, r.unsolved(i, reason))
			return
		}
		solved = append(solved, s)
		r.states = append(r.states, s)
	}
	for i, s := range cases {
		take(i, s, reasons[i])
	}
	for i := range r.set.All {
		s, err := r.solver.Combination(ctx, r.set.All[i].Factors)
		if ctx.Err() != nil {
			return ctx.Err()
		}
		take(len(cases)+i, s, err)
	}
	r.subjects = ownSubjects(r.model, r.set, problems)
	r.auditStates(solved)
	if len(solved) == 0 && len(problems) > 0 {
		// Nothing has an answer: the reason of the first is that of the model.
		return r.firstReason(reasons)
	}
	return nil
}

// firstReason returns the first of the reasons, or one for having none.
func (r *Results) firstReason(reasons []error) error {
	if err := errors.Join(reasons...); err == nil {
		return errors.New("none of the combinations has an answer")
	}
	for _, err := range reasons {
		if err != nil {
			return err
		}
	}
	return nil
}

// Timings says where the time went.
func (r *Results) Timings() Timings { return r.timings }

// Way says in words how much of the previous results served again: "loads only:
// factor kept". It is empty where there are no numbers.
func (r *Results) Way() string {
	if r.solver == nil {
		return ""
	}
	return r.solver.Path().String()
}

// Freedoms returns the number of unknowns of the solve; 0 without numbers.
func (r *Results) Freedoms() int {
	if r.solver == nil {
		return 0
	}
	return r.solver.Structure().Freedoms()
}

// OneWay says that one-way parts had to be found, so that each combination was
// solved on its own.
func (r *Results) OneWay() bool { return r.solver != nil && r.solver.OneWay() }

// Solver returns what solved the model, for questions about stiffness, or nil
// where there are no numbers. It is for one goroutine at a time.
func (r *Results) Solver() *frame.Solver { return r.solver }
