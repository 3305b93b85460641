package analysis

import (
	"context"
	"math"
	"runtime"
	"sync/atomic"

	"golang.org/x/sync/errgroup"

	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// Governed is a value with its place and the result that it comes from.
type Governed struct {
	Value  float64 // SI
	At     float64 // m from the member's first end; of no meaning at nodes
	Result int     // number in Results
}

// Band is the largest and the smallest value over a set of results. Where the
// quantity is a size, Least is zero.
type Band struct{ Most, Least Governed }

// Largest returns the side of the band with the larger size.
func (b Band) Largest() Governed {
	if math.Abs(b.Least.Value) > math.Abs(b.Most.Value) {
		return b.Least
	}
	return b.Most
}

// Envelope is the extremes of everything over a set of results: a family's, as
// a rule. Those along a member are worked out when they are first asked for, or
// all at once by [Envelope.Prepare]; they are exact. Of results with equal values
// the first governs.
type Envelope struct {
	results  *Results
	name     string
	subjects []int
	sums     []envelope.Sum
	members  []atomic.Pointer[memberBands]
}

// memberBands are the bands along one member.
type memberBands struct {
	bands [quantities]Band
	known [quantities]bool
}

// Envelope returns that of a family of the model. A family without combinations
// has an empty one.
func (r *Results) Envelope(family int) *Envelope { return r.envelopes[family] }

// EnvelopeOf makes an envelope over any results. Those without numbers are left
// out.
func (r *Results) EnvelopeOf(name string, results []Result) *Envelope {
	e := &Envelope{results: r, name: name, members: make([]atomic.Pointer[memberBands], len(r.model.Members))}
	for _, result := range results {
		if result.Problem() == "" {
			e.subjects = append(e.subjects, result.index)
			e.sums = append(e.sums, result.subject().sum)
		}
	}
	return e
}

// familyEnvelopes makes the envelopes of all families, none of them filled.
func (r *Results) familyEnvelopes() []*Envelope {
	list := make([]*Envelope, len(r.model.Families))
	for f := range r.model.Families {
		var members []Result
		if r.Solved() {
			for _, c := range r.set.Families[f] {
				members = append(members, r.Combination(c))
			}
		}
		list[f] = r.EnvelopeOf(r.model.Families[f].Name, members)
	}
	return list
}

// Name is that of the family.
func (e *Envelope) Name() string { return e.name }

// Results returns the results that the envelope is over.
func (e *Envelope) Results() []Result {
	list := make([]Result, len(e.subjects))
	for i, s := range e.subjects {
		list[i] = e.results.At(s)
	}
	return list
}

// Empty says that there is nothing to take extremes of.
func (e *Envelope) Empty() bool { return len(e.sums) == 0 }

// Along returns the band of a quantity along a member, and false where it cannot
// be known or the envelope is empty.
func (e *Envelope) Along(member int, q Quantity) (Band, bool) {
	if e.Empty() {
		return Band{}, false
	}
	b := e.bandsOf(member)
	return b.bands[q], b.known[q]
}

func (e *Envelope) bandsOf(member int) *memberBands {
	if b := e.members[member].Load(); b != nil {
		return b
	}
	b := e.work(member, e.results.coursesOf(member))
	e.members[member].Store(b) // whoever comes second stores the same
	return b
}

func (e *Envelope) work(member int, along *envelope.Member) *memberBands {
	b := &memberBands{}
	for q := range quantities {
		band, known := bandOf(e.results.model, member, along, q, e.sums)
		if known {
			band.Most.Result = e.subjects[band.Most.Result]
			band.Least.Result = e.subjects[band.Least.Result]
		}
		b.bands[q], b.known[q] = band, known
	}
	return b
}

// Prepare works out the bands along all members, with all processors, in one
// pass over the members for all these envelopes of one Results. The error is
// that of the context.
func Prepare(ctx context.Context, envelopes ...*Envelope) error {
	if len(envelopes) == 0 {
		return nil
	}
	r := envelopes[0].results
	return eachMember(ctx, r.model, func(member int) {
		missing := false
		for _, e := range envelopes {
			missing = missing || !e.Empty() && e.members[member].Load() == nil
		}
		if !missing {
			return
		}
		along := r.recover(member)
		for _, e := range envelopes {
			if !e.Empty() && e.members[member].Load() == nil {
				e.members[member].Store(e.work(member, along))
			}
		}
	})
}

// eachMember calls do for every member, from several goroutines.
func eachMember(ctx context.Context, m *model.Model, do func(member int)) error {
	const share = 64 // members between two looks at the context
	group, ctx := errgroup.WithContext(ctx)
	var next atomic.Int64
	for range runtime.GOMAXPROCS(0) {
		group.Go(func() error {
			for {
				if err := ctx.Err(); err != nil {
					return err
				}
				from := int(next.Add(share)) - share
				if from >= len(m.Members) {
					return nil
				}
				for member := from; member < min(from+share, len(m.Members)); member++ {
					do(member)
				}
			}
		})
	}
	return group.Wait()
}

// Movement returns the bands of a node's movements: ux … rz, m and rad. The
// envelope must not be empty.
func (e *Envelope) Movement(node int) [6]Band {
	return e.nodal(func(state state) [6]float64 { return state.Movement(node) })
}

// Reaction returns the bands of what a node's supports do to it: Fx … Mz, N and
// Nm. The envelope must not be empty.
func (e *Envelope) Reaction(node int) [6]Band {
	return e.nodal(func(state state) [6]float64 { return state.Reaction(node) })
}

func (e *Envelope) nodal(of func(state) [6]float64) (bands [6]Band) {
	values := make([][6]float64, len(e.results.states))
	for s, state := range e.results.states {
		values[s] = of(state)
	}
	for k, sum := range e.sums {
		total := summed(sum, func(state int) [6]float64 { return values[state] })
		for i, value := range total {
			b := &bands[i]
			if k == 0 || envelope.Above(value, b.Most.Value) {
				b.Most = Governed{Value: value, Result: e.subjects[k]}
			}
			if k == 0 || envelope.Above(-value, -b.Least.Value) {
				b.Least = Governed{Value: value, Result: e.subjects[k]}
			}
		}
	}
	return bands
}
