package compare

import (
	"context"

	"spanwright/analysis"
	"spanwright/lang/model"
)

// Side is one of the two models. Results may be nil or without numbers: then
// there are no effects to speak of.
type Side struct {
	Model   *model.Model
	Results *analysis.Results
}

// solved returns the side's numbers, or nil.
func (s *Side) solved() *analysis.Results {
	if s.Results == nil || !s.Results.Solved() {
		return nil
	}
	return s.Results
}

// Options say what is worth telling.
type Options struct {
	// Threshold is the share of the largest value of its kind below which a
	// difference is not told; 0 stands for 0.01. Noise hides what is smaller
	// still whatever the threshold; 0 stands for 1e-6.
	Threshold, Noise float64
}

func (o *Options) fill() {
	if o.Threshold == 0 {
		o.Threshold = 0.01
	}
	if o.Noise == 0 {
		o.Noise = 1e-6
	}
}

// Comparison is what changed, and what that did.
type Comparison struct {
	Changes []Change
	// Effects are differences of results, the weightiest first.
	Effects []Effect
	// Limits are those of either model whose answer differs, or that one model
	// alone has.
	Limits []LimitChange
	// Mass is that of all members and masses, kg.
	MassBefore, MassAfter float64
	// Unsolved says which sides have no numbers: then Effects and Limits are
	// empty.
	OldUnsolved, NewUnsolved bool
}

// Empty reports that the two models mean the same.
func (c *Comparison) Empty() bool { return len(c.Changes) == 0 }

// NewlyBroken counts the limits that hold no more.
func (c *Comparison) NewlyBroken() int { return c.count(Broken) }

// Mended counts the limits that hold again.
func (c *Comparison) Mended() int { return c.count(Mended) }

func (c *Comparison) count(f Fate) int {
	n := 0
	for _, l := range c.Limits {
		if l.Fate == f {
			n++
		}
	}
	return n
}

// Of compares two models. The error is that of the context.
func Of(ctx context.Context, old, now Side, options Options) (*Comparison, error) {
	options.fill()
	m := match(old.Model, now.Model)
	c := &Comparison{Changes: m.changes, MassBefore: mass(old.Model), MassAfter: mass(now.Model),
		OldUnsolved: old.solved() == nil, NewUnsolved: now.solved() == nil}
	if c.OldUnsolved || c.NewUnsolved {
		return c, nil
	}
	e := effects{old: old, now: now, options: options, renamed: m.renamed}
	if err := e.find(ctx); err != nil {
		return nil, err
	}
	c.Effects, c.Limits = e.list, e.limits
	return c, nil
}

// mass is that of all members and masses of a model, kg.
func mass(m *model.Model) float64 {
	total := 0.0
	for i := range m.Members {
		if s := m.Members[i].Section; s >= 0 {
			total += m.Sections[s].Mass * m.Members[i].Length
		}
	}
	for i := range m.Masses {
		total += m.Masses[i].Mass
	}
	return total
}
