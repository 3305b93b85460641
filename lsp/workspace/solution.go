package workspace

import (
	"context"
	"math"
	"sync"
	"time"

	"spanwright/analysis"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/resolve"
)

// Solution is a finished solve of one version of a model. It does not change.
type Solution struct {
	// Resolved is the version of the text that the solution belongs to.
	Resolved *resolve.Result
	// Results are the numbers, or say why there are none.
	Results *analysis.Results
	// Limits are the answers to the model's limits.
	Limits []analysis.Limit
	// Diagnostics are those of the solve and of the limits.
	Diagnostics []diagnostic.Diagnostic
	// Took is the time from the resolved model to all of this.
	Took time.Duration
	// Finished is when it was ready.
	Finished time.Time
	// Before is the effect of the version solved before this one, or nil.
	Before *Effect
	Effect Effect

	edits   int             // edits that the model had seen
	serials map[string]mark // the versions of the open documents that it was made of
	byName  func() names

	stiffness sync.Mutex
}

// mark is a version of a document.
type mark struct {
	opening uint64
	serial  int
}

// Effect is what a structure does, in two numbers that tell what an edit did.
type Effect struct {
	// Movement is the largest movement of any node over all results, m, at Node
	// in the result of the name Result.
	Movement float64
	Node     string
	Result   string
	// Ratio is the share of its bound that the worst limit uses, and Limit its
	// index, −1 without limits.
	Ratio float64
	Limit int
}

// names finds the things of a model by their names.
type names struct {
	nodes, members, cases map[string]int
}

// Numbers returns the results where there are numbers, else nil.
func (s *Solution) Numbers() *analysis.Results {
	if s == nil || s.Results == nil || !s.Results.Solved() {
		return nil
	}
	return s.Results
}

// Reason says why there are no numbers.
func (s *Solution) Reason() string {
	for _, d := range s.Diagnostics {
		if d.Severity == diagnostic.Error {
			return d.Summary
		}
	}
	if len(s.Resolved.Model.Nodes) == 0 {
		return "the model has no nodes."
	}
	return "the model has no load case."
}

// Node returns the index of a node of the solved model by its full name, or −1.
func (s *Solution) Node(name string) int { return index(s.byName().nodes, name) }

// Member returns the index of a member of the solved model, or −1.
func (s *Solution) Member(name string) int { return index(s.byName().members, name) }

// Case returns the index of a load case of the solved model, or −1.
func (s *Solution) Case(name string) int { return index(s.byName().cases, name) }

func index(by map[string]int, name string) int {
	if i, ok := by[name]; ok {
		return i
	}
	return -1
}

// Stiffness runs a question about stiffness, which the solver answers to one at
// a time. It returns false without asking where another question or the next
// solve is using it: nobody who answers an editor waits.
func (s *Solution) Stiffness(question func()) bool {
	if !s.stiffness.TryLock() {
		return false
	}
	defer s.stiffness.Unlock()
	question()
	return true
}

func namesOf(m *model.Model) names {
	n := names{make(map[string]int, len(m.Nodes)), make(map[string]int, len(m.Members)), make(map[string]int, len(m.Cases))}
	for i := range m.Nodes {
		n.nodes[m.Nodes[i].Name] = i
	}
	for i := range m.Members {
		n.members[m.Members[i].Name] = i
	}
	for i := range m.Cases {
		n.cases[m.Cases[i].Name] = i
	}
	return n
}

// solve works a version of a model out, with what is left of the work for an
// earlier one. The error is the context's.
func solve(ctx context.Context, resolved *resolve.Result, previous *Solution) (*Solution, error) {
	start := time.Now()
	var before *analysis.Results
	s := &Solution{Resolved: resolved, byName: sync.OnceValue(func() names { return namesOf(resolved.Model) })}
	if previous != nil {
		before = previous.Results
		previous.stiffness.Lock()
		defer previous.stiffness.Unlock()
		if previous.Numbers() != nil {
			effect := previous.Effect // a copy: a pointer into it would keep all solutions ever made
			s.Before = &effect
		} else {
			s.Before = previous.Before
		}
	}
	var err error
	if s.Results, err = analysis.Run(ctx, resolved.Model, before); err != nil {
		return nil, err
	}
	s.Diagnostics = append(s.Diagnostics, s.Results.Diagnostics()...)
	if s.Results.Solved() {
		if s.Limits, err = s.Results.Limits(ctx); err != nil {
			return nil, err
		}
		limits, err := s.Results.LimitDiagnostics(ctx)
		if err != nil {
			return nil, err
		}
		s.Diagnostics = append(s.Diagnostics, limits...)
		s.Effect = effect(s.Results, s.Limits)
	}
	s.Took = time.Since(start)
	s.Finished = time.Now()
	return s, nil
}

// effect finds the largest movement and the worst limit.
func effect(r *analysis.Results, limits []analysis.Limit) Effect {
	e := Effect{Limit: -1}
	m := r.Model()
	for i := range r.Len() {
		if r.At(i).Problem() != "" {
			continue
		}
		for n := range m.Nodes {
			u := r.At(i).Movement(n)
			if d := math.Sqrt(u[0]*u[0] + u[1]*u[1] + u[2]*u[2]); d > e.Movement {
				e.Movement, e.Node, e.Result = d, m.Nodes[n].Name, r.At(i).Name()
			}
		}
	}
	for i := range limits {
		if l := &limits[i]; l.Governs.Result >= 0 && (e.Limit < 0 || l.Governs.Ratio > e.Ratio) {
			e.Ratio, e.Limit = l.Governs.Ratio, i
		}
	}
	return e
}
