package limit

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"runtime"
	"slices"
	"sync"
	"sync/atomic"

	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// Source is what a limit is checked on: results in basic states, of which each
// combination is a sum.
type Source interface {
	// Along returns the quantities along a member.
	Along(member int) *envelope.Member
	// Movement returns that of a node's freedom (0 to 5, global) in each state,
	// m or rad.
	Movement(node, freedom int) []float64
	// Reaction returns the force of a node's support (0 to 5, global) in each
	// state, N or Nm.
	Reaction(node, freedom int) []float64
}

// Verdict is what one limit comes to on one member or node in one combination.
type Verdict struct {
	Member int     // index into Model.Members, or −1
	Sum    int     // index into the sums it was checked in
	Value  float64 // SI; a size where the limit is on a size
	Bound  float64 // SI
	// Ratio is the share of the bound that is used up: above 1 exactly where
	// the limit is broken. It is +Inf where a bound is broken that leaves no
	// share, such as zero.
	Ratio float64
	At    float64 // m from the member's first end; NaN where the measure has no place
}

// Outcome is the answer to one limit.
type Outcome struct {
	Limit int // index into Model.Limits
	// Governs is the worst verdict, Next at most three that follow it: other
	// members where the limit has several, else other combinations. Governs.Sum
	// is −1 where there is no verdict; Problem then says why.
	Governs Verdict
	Next    []Verdict
	Holds   bool
	Problem string
}

// kept is how many verdicts are ranked: the governing one and the next three.
const kept = 4

// Check answers one limit in the given combinations. Members are searched by
// several goroutines; when the context ends the outcome is incomplete, and for
// the bin.
func Check(ctx context.Context, m *model.Model, index int, sums []envelope.Sum, from Source) Outcome {
	l := &m.Limits[index]
	c := &checker{m: m, limit: l, sums: sums, from: from}
	outcome := Outcome{Limit: index, Governs: Verdict{Member: -1, Sum: -1}}
	if outcome.Problem = c.unanswerable(); outcome.Problem != "" {
		return outcome
	}
	perTarget := 1
	if len(l.Targets) == 1 {
		perTarget = kept
	}
	all, problem := c.eachTarget(ctx, perTarget)
	if problem != "" {
		outcome.Problem = problem
		return outcome
	}
	slices.SortStableFunc(all, func(a, b Verdict) int { return cmp.Compare(b.Ratio, a.Ratio) })
	if len(all) == 0 {
		outcome.Problem = "There is no combination to check it in."
		return outcome
	}
	outcome.Governs = all[0]
	outcome.Next = all[1:min(kept, len(all))]
	outcome.Holds = all[0].Ratio <= 1
	return outcome
}

// eachTarget returns the verdicts on all targets in their order, or the problem
// of the first that has one.
func (c *checker) eachTarget(ctx context.Context, perTarget int) (all []Verdict, problem string) {
	targets := c.limit.Targets
	peaks := make([][]envelope.Peak, len(targets))
	problems := make([]string, len(targets))
	var group sync.WaitGroup
	var next atomic.Int64
	for range min(runtime.GOMAXPROCS(0), len(targets)) {
		group.Go(func() {
			for i := int(next.Add(1)) - 1; i < len(targets) && ctx.Err() == nil; i = int(next.Add(1)) - 1 {
				peaks[i], problems[i] = c.measure(targets[i], perTarget)
			}
		})
	}
	group.Wait()
	for i, target := range targets {
		if problems[i] != "" {
			return nil, problems[i]
		}
		for _, p := range peaks[i] {
			all = append(all, verdict(c.limit, target, p))
		}
	}
	return all, ""
}

// verdict sets a peak against its bound.
func verdict(l *model.Limit, target model.Target, p envelope.Peak) Verdict {
	return Verdict{Member: target.Member, Sum: p.Sum, Value: p.Value, Bound: target.Bound, At: p.At,
		Ratio: Ratio(p.Value, target.Bound, l.AtMost)}
}

// Ratio returns the share of a bound that a value uses up: 0 where it does not
// approach it, 1 on it, above 1 beyond it, +Inf where a bound is broken that has
// no share.
func Ratio(value, bound float64, atMost bool) float64 {
	if math.IsNaN(value) || math.IsNaN(bound) {
		return math.Inf(1)
	}
	holds := value <= bound
	if !atMost {
		holds = value >= bound
		if bound > 0 {
			if value <= 0 {
				return math.Inf(1)
			}
			return bound / value
		}
	}
	if bound == 0 || atMost && bound < 0 {
		if holds {
			return 0
		}
		return math.Inf(1)
	}
	return math.Max(value/bound, 0)
}

type checker struct {
	m     *model.Model
	limit *model.Limit
	sums  []envelope.Sum
	from  Source
}

// unanswerable says why linear results cannot answer the limit, or nothing.
func (c *checker) unanswerable() string {
	switch c.limit.Measure {
	case model.CriticalFactor:
		return "The buckling factor has not been worked out: it needs a stability analysis."
	case model.Frequency:
		return "The natural frequency has not been worked out: it needs a vibration analysis."
	}
	return ""
}

// onSize says that the limit is on the size of a signed quantity.
func (c *checker) onSize(target model.Target) bool { return c.limit.AtMost && target.Bound > 0 }

// measure returns the combinations that come closest to the bound of a target,
// or beyond it, the worst first.
func (c *checker) measure(target model.Target, count int) (peaks []envelope.Peak, problem string) {
	switch c.limit.Measure {
	case model.Movement:
		return c.nodal(c.from.Movement(c.limit.Node, c.limit.Freedom), target, count), ""
	case model.Reaction:
		return c.nodal(c.from.Reaction(c.limit.Node, c.limit.Freedom), target, count), ""
	case model.Drift:
		return c.drift(count), ""
	}
	along := c.from.Along(target.Member)
	switch c.limit.Measure {
	case model.Deflection:
		if !along.BentKnown {
			return nil, fmt.Sprintf("The deflection of %s is not known: a load acts across it, and it has no bending stiffness.", c.m.Members[target.Member].Name)
		}
		return c.sizes(func(sums []envelope.Sum, count int) []envelope.Peak {
			return envelope.Largest(sums, count, along.Path(element.BentV), along.Path(element.BentW))
		}, count), ""
	case model.ShearForce:
		return c.sizes(func(sums []envelope.Sum, count int) []envelope.Peak {
			return envelope.Largest(sums, count, along.Path(element.Vy), along.Path(element.Vz))
		}, count), ""
	case model.BendingMoment:
		return c.sizes(func(sums []envelope.Sum, count int) []envelope.Peak {
			return envelope.LargestOf(count,
				envelope.Largest(sums, count, along.Path(element.My), nil),
				envelope.Largest(sums, count, along.Path(element.Mz), nil))
		}, count), ""
	case model.AxialForce:
		if c.onSize(target) {
			return envelope.Largest(c.sums, count, along.Path(element.N), nil), ""
		}
		return envelope.LargestSigned(c.sums, count, along.Path(element.N), !c.limit.AtMost), ""
	}
	return c.stress(target, along, count)
}

func (c *checker) stress(target model.Target, along *envelope.Member, count int) ([]envelope.Peak, string) {
	member := &c.m.Members[target.Member]
	if member.Section < 0 {
		return nil, fmt.Sprintf("%s has no section, and so no stress.", member.Name)
	}
	section := &c.m.Sections[member.Section]
	stress, lacks := StressOf(section, along)
	switch {
	case lacks != "":
		return nil, fmt.Sprintf("The stress of %s is not known: section %s has no %s.", member.Name, section.Name, lacks)
	case c.onSize(target):
		return stress.Size(c.sums, count), ""
	case c.limit.AtMost:
		return stress.Tension(c.sums, count), ""
	}
	return stress.Compression(c.sums, count), ""
}

// sizes ranks a measure that is a size: the largest come first for "at most",
// the smallest for "at least".
func (c *checker) sizes(rank func(sums []envelope.Sum, count int) []envelope.Peak, count int) []envelope.Peak {
	if c.limit.AtMost {
		return rank(c.sums, count)
	}
	all := rank(c.sums, len(c.sums))
	slices.Reverse(all)
	return all[:min(count, len(all))]
}

// nodal ranks a value that is known in each basic state.
func (c *checker) nodal(states []float64, target model.Target, count int) []envelope.Peak {
	return c.ranked(count, func(sum envelope.Sum) float64 {
		value := summed(sum, states)
		if c.onSize(target) {
			return math.Abs(value)
		}
		return value
	})
}

// drift ranks the horizontal movement between two nodes.
func (c *checker) drift(count int) []envelope.Peak {
	between := func(freedom int) []float64 {
		upper := slices.Clone(c.from.Movement(c.limit.Node, freedom))
		for i, lower := range c.from.Movement(c.limit.OtherNode, freedom) {
			upper[i] -= lower
		}
		return upper
	}
	x, y := between(0), between(1)
	return c.ranked(count, func(sum envelope.Sum) float64 {
		return math.Hypot(summed(sum, x), summed(sum, y))
	})
}

// ranked returns the sums with the worst values, the worst first.
func (c *checker) ranked(count int, value func(envelope.Sum) float64) []envelope.Peak {
	peaks := make([]envelope.Peak, len(c.sums))
	for i, sum := range c.sums {
		peaks[i] = envelope.Peak{Value: value(sum), At: math.NaN(), Sum: i}
	}
	slices.SortStableFunc(peaks, func(a, b envelope.Peak) int {
		if c.limit.AtMost {
			return cmp.Compare(b.Value, a.Value)
		}
		return cmp.Compare(a.Value, b.Value)
	})
	return peaks[:min(count, len(peaks))]
}

func summed(sum envelope.Sum, states []float64) float64 {
	value := 0.0
	for _, t := range sum {
		value += t.Factor * states[t.State]
	}
	return value
}
