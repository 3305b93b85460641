package analysis

import (
	"spanwright/analysis/combine"
	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// Result is what one load case or combination does to the structure. It is a
// view on [Results]: cheap to make and to pass on; combinations are superposed
// when asked.
type Result struct {
	results *Results
	index   int
}

func (r Result) subject() *subject { return &r.results.subjects[r.index] }

// Index is the result's number in its [Results].
func (r Result) Index() int { return r.index }

// Name is that of the case or combination.
func (r Result) Name() string { return r.subject().name }

// Problem says why there are no numbers for this case or combination although
// the structure could be solved, or is empty.
func (r Result) Problem() string { return r.subject().problem }

// IsCase says that the result is that of a load case.
func (r Result) IsCase() bool { return r.subject().combination < 0 }

// Combination returns the combination that the result is of, or nil for a case.
func (r Result) Combination() *combine.Combination {
	if r.IsCase() {
		return nil
	}
	return &r.results.set.All[r.subject().combination]
}

// Factors returns the load cases with their factors. The caller does not change
// them.
func (r Result) Factors() []model.Factor { return r.subject().factors }

// Movement returns that of a node: ux, uy, uz, rx, ry, rz, global, m and rad.
func (r Result) Movement(node int) [6]float64 {
	return summed(r.subject().sum, func(state int) [6]float64 { return r.results.states[state].Movement(node) })
}

// Reaction returns what the supports of a node do to it: Fx, Fy, Fz, Mx, My, Mz,
// global, N and Nm. It is zero where there is no support.
func (r Result) Reaction(node int) [6]float64 {
	return summed(r.subject().sum, func(state int) [6]float64 { return r.results.states[state].Reaction(node) })
}

// Equilibrium is the audit of loads against reactions.
type Equilibrium struct {
	// Applied and Reacted are the resultants about the origin of the loads and of
	// the reactions: Fx … Mz, global, N and Nm.
	Applied, Reacted [6]float64
	// Residual is what is left of both, relative to their size.
	Residual float64
}

// Equilibrium returns the audit of this result. The residual of a combination
// is the worst of the states that it is made of.
func (r Result) Equilibrium() Equilibrium {
	var e Equilibrium
	sum := r.subject().sum
	e.Applied = summed(sum, func(state int) [6]float64 {
		applied, _ := r.results.states[state].Resultants()
		return applied
	})
	e.Reacted = summed(sum, func(state int) [6]float64 {
		_, reacted := r.results.states[state].Resultants()
		return reacted
	})
	for _, t := range sum {
		e.Residual = max(e.Residual, r.results.states[t.State].Residual())
	}
	return e
}

// Member returns the result along a member.
func (r Result) Member(member int) Member {
	return Member{result: r, member: member, along: r.results.coursesOf(member)}
}

// sums is the result as the one sum to search.
func (r Result) sums() []envelope.Sum { return []envelope.Sum{r.subject().sum} }
