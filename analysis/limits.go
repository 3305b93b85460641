package analysis

import (
	"context"
	"fmt"
	"sync"

	"spanwright/analysis/envelope"
	"spanwright/analysis/limit"
	"spanwright/lang/model"
)

// Limit is the answer to one limit of the model.
type Limit struct {
	Index int // into Model.Limits
	// Governs is the worst verdict; Governs.Result is −1 where there is none, and
	// Problem says why. Next are at most three that follow it: other members where
	// the limit has several, else other results.
	Governs Verdict
	Next    []Verdict
	Holds   bool
	// Problem says why the limit was not checked, or not fully. Then it counts
	// neither as held nor as broken.
	Problem string
	// Unknown are the combinations that the limit names and that do not exist.
	Unknown []string
}

// Verdict is what a limit comes to on one member or node in one result.
type Verdict struct {
	Member int     // index into Model.Members, or −1
	Result int     // number in Results, or −1
	Value  float64 // SI; a size where the limit is on a size, as limit.Check says
	Bound  float64 // SI
	// Ratio is the share of the bound that is used up: above 1 exactly where the
	// limit is broken, and +Inf where a bound is broken that leaves no share, such
	// as zero.
	Ratio float64
	At    float64 // m from the member's first end; NaN where the measure has no place
}

// limitsOnce keeps the limits once somebody asked for them.
type limitsOnce struct {
	mutex sync.Mutex
	done  bool
	list  []Limit
}

// Limits checks all limits of the model, in their order, with all processors.
// The first call does the work; one whose context ends leaves it undone and
// returns the context's error. A model without numbers has no answers.
func (r *Results) Limits(ctx context.Context) ([]Limit, error) {
	r.limits.mutex.Lock()
	defer r.limits.mutex.Unlock()
	if r.limits.done || !r.Solved() {
		return r.limits.list, nil
	}
	list := make([]Limit, len(r.model.Limits))
	for i := range list {
		list[i] = r.checkLimit(ctx, i)
		if err := ctx.Err(); err != nil {
			return nil, err
		}
	}
	r.limits.list, r.limits.done = list, true
	return list, nil
}

// checkLimit answers limit i.
func (r *Results) checkLimit(ctx context.Context, i int) Limit {
	subjects, unknown := r.under(&r.model.Limits[i].Under)
	var sums []envelope.Sum
	var numbers []int
	for _, s := range subjects {
		if r.subjects[s].problem == "" {
			sums = append(sums, r.subjects[s].sum)
			numbers = append(numbers, s)
		}
	}
	outcome := limit.Check(ctx, r.model, i, sums, limitSource{r})
	number := func(v limit.Verdict) Verdict {
		numbered := Verdict{v.Member, -1, v.Value, v.Bound, v.Ratio, v.At}
		if v.Sum >= 0 {
			numbered.Result = numbers[v.Sum]
		}
		return numbered
	}
	l := Limit{Index: i, Governs: number(outcome.Governs), Holds: outcome.Holds, Problem: outcome.Problem, Unknown: unknown}
	for _, v := range outcome.Next {
		l.Next = append(l.Next, number(v))
	}
	if l.Problem == "" && len(numbers) < len(subjects) {
		l.Problem = fmt.Sprintf("%s has no result, so the limit is not fully checked.", r.firstProblem(subjects))
		l.Holds = false
	}
	return l
}

// firstProblem names the first of these results that has no numbers.
func (r *Results) firstProblem(subjects []int) string {
	for _, s := range subjects {
		if r.subjects[s].problem != "" {
			return r.subjects[s].name
		}
	}
	return ""
}

// under returns the numbers of the results that a limit is checked in, each
// once, and the names that nothing answers to.
func (r *Results) under(u *model.Under) (subjects []int, unknown []string) {
	seen := map[int]bool{}
	add := func(s int) {
		if !seen[s] {
			seen[s] = true
			subjects = append(subjects, s)
		}
	}
	for _, c := range u.Cases {
		add(c)
	}
	for i, c := range r.set.All {
		for _, written := range u.Combinations {
			if c.Written == written {
				add(r.Combination(i).index)
			}
		}
	}
	for _, f := range u.Families {
		for _, c := range r.set.Families[f] {
			add(r.Combination(c).index)
		}
	}
	for _, name := range u.Generated {
		if c, ok := r.set.Find(name); ok {
			add(r.Combination(c).index)
		} else {
			unknown = append(unknown, name)
		}
	}
	return subjects, unknown
}

// limitSource lets limits ask for what they need.
type limitSource struct{ r *Results }

// Along recovers anew: a limit over all members passes each once, and would
// only push out of the cache what a reader looks at.
func (s limitSource) Along(member int) *envelope.Member { return s.r.recover(member) }

func (s limitSource) Movement(node, freedom int) []float64 {
	return s.each(func(state state) float64 { return state.Movement(node)[freedom] })
}

func (s limitSource) Reaction(node, freedom int) []float64 {
	return s.each(func(state state) float64 { return state.Reaction(node)[freedom] })
}

func (s limitSource) each(of func(state) float64) []float64 {
	values := make([]float64, len(s.r.states))
	for i, state := range s.r.states {
		values[i] = of(state)
	}
	return values
}
