package analysis

import (
	"sync"

	"spanwright/analysis/combine"
	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
	"spanwright/analysis/frame"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
)

// Results are the answers to one model. They do not change once [Run] has
// returned them, and any number of goroutines may read them. What takes time
// and may never be asked for is worked out when it is, and kept: the envelopes
// along members, and the limits.
type Results struct {
	model  *model.Model
	solver *frame.Solver // nil without numbers

	states   []state
	set      *combine.Set
	subjects []subject // cases, then combinations

	diagnostics []diagnostic.Diagnostic
	mechanism   *frame.MechanismError
	trust       Trust
	timings     Timings

	envelopes []*Envelope // by family
	along     alongCache
	limits    limitsOnce
}

// subject is one load case or combination.
type subject struct {
	name        string
	combination int // index into set.All, or −1
	sum         envelope.Sum
	factors     []model.Factor
	problem     string // why there is no result, or ""
}

// Model returns the model that the results belong to.
func (r *Results) Model() *model.Model { return r.model }

// Solved says that there are numbers. Where there are none, [Results.Diagnostics]
// say why.
func (r *Results) Solved() bool { return len(r.subjects) > 0 }

// Combinations returns all combinations of the model, written and generated.
// They are there for a model without numbers too.
func (r *Results) Combinations() *combine.Set { return r.set }

// Len returns the number of results: the load cases, then the combinations.
func (r *Results) Len() int { return len(r.subjects) }

// At returns result number i.
func (r *Results) At(i int) Result { return Result{r, i} }

// Case returns the result of load case i.
func (r *Results) Case(i int) Result { return Result{r, i} }

// Combination returns the result of combination i of [Results.Combinations].
func (r *Results) Combination(i int) Result { return Result{r, len(r.model.Cases) + i} }

// Find returns the result of a name: that of a case or of a combination, in any
// spelling that [combine.Set.Find] takes.
func (r *Results) Find(name string) (Result, bool) {
	if !r.Solved() {
		return Result{}, false
	}
	for i := range r.model.Cases {
		if r.model.Cases[i].Name == name {
			return r.Case(i), true
		}
	}
	if i, ok := r.set.Find(name); ok {
		return r.Combination(i), true
	}
	return Result{}, false
}

// alongBudget bounds the polynomials that are kept between questions.
const alongBudget = 1 << 18

// alongCache keeps the curves along the members that were asked about last.
type alongCache struct {
	mutex sync.Mutex
	held  map[int]*envelope.Member
	size  int
}

// coursesOf returns the curves along a member in every basic state.
func (r *Results) coursesOf(member int) *envelope.Member {
	c := &r.along
	c.mutex.Lock()
	m := c.held[member]
	c.mutex.Unlock()
	if m != nil {
		return m
	}
	m = r.recover(member)
	size := len(r.states) * len(m.Breaks())
	c.mutex.Lock()
	defer c.mutex.Unlock()
	if c.held == nil || c.size+size > alongBudget {
		c.held, c.size = map[int]*envelope.Member{}, 0
	}
	if c.held[member] == nil {
		c.held[member] = m
		c.size += size
	}
	return m
}

// recover works out the curves along a member in every basic state.
func (r *Results) recover(member int) *envelope.Member {
	known := true
	pieces := make([][]element.Piece, len(r.states))
	for s, state := range r.states {
		var bent bool
		pieces[s], bent = state.Pieces(member)
		known = known && bent
	}
	return envelope.NewMember(pieces, known)
}
