package compare

import (
	"cmp"
	"context"
	"math"
	"slices"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// Topic is a kind of effect.
type Topic string

// The topics.
const (
	Reactions Topic = "reactions"
	Forces    Topic = "member forces"
	Stresses  Topic = "stresses"
	Movements Topic = "movements"
)

// Effect is a result that differs.
type Effect struct {
	Topic  Topic
	Family string // or "all combinations", "all cases"
	// What is the quantity with what it is of: "My of r2", "Fx at A". Place is
	// where along a member it stands now.
	What, Place string
	// Extreme says which side of the band it is: "most", "least", or "largest".
	Extreme       string
	Before, After float64 // SI
	// In is the combination that governs now, InBefore that before.
	In, InBefore string
	Unit         quantity.Unit
	// Weight is the difference over the largest value of its kind.
	Weight float64
}

// Percent is the change in percent of the size before; NaN where that is
// nothing.
func (e *Effect) Percent() float64 {
	if e.Before == 0 {
		return math.NaN()
	}
	return 100 * (e.After - e.Before) / math.Abs(e.Before)
}

// Fate is what became of a limit.
type Fate string

// The fates.
const (
	Broken      Fate = "newly broken"
	Mended      Fate = "mended"
	StillHolds  Fate = "holds"
	StillBroken Fate = "still broken"
	NewLimit    Fate = "new"
	GoneLimit   Fate = "gone"
)

// LimitChange is a limit whose answer differs.
type LimitChange struct {
	Text string // what it says now, without its key word
	Fate Fate
	// Value, Bound and Ratio are those of the governing place; NaN where a side
	// has none.
	ValueBefore, ValueAfter float64
	BoundBefore, BoundAfter float64
	RatioBefore, RatioAfter float64
	In, Where               string
	Unit                    quantity.Unit
}

// effects finds the differences of two solved models.
type effects struct {
	old, now Side
	options  Options
	renamed  map[Kind]map[string]string
	list     []Effect
	limits   []LimitChange
}

func (e *effects) find(ctx context.Context) error {
	for _, pair := range e.envelopes() {
		if err := analysis.Prepare(ctx, pair.old); err != nil {
			return err
		}
		if err := analysis.Prepare(ctx, pair.now); err != nil {
			return err
		}
		e.reactions(pair)
		e.movements(pair)
		e.forces(pair)
	}
	slices.SortStableFunc(e.list, func(a, b Effect) int {
		return cmp.Or(cmp.Compare(b.Weight, a.Weight), cmp.Compare(a.What, b.What))
	})
	return e.findLimits(ctx)
}

// pair is a family in both models.
type pair struct {
	name     string
	old, now *analysis.Envelope
}

// envelopes pairs the families of equal name; models without families are
// compared over all combinations, or all cases.
func (e *effects) envelopes() []pair {
	var pairs []pair
	before := map[string]*analysis.Envelope{}
	for i := range e.old.Model.Families {
		name := e.old.Model.Families[i].Name
		if now, ok := e.renamed[Family][name]; ok {
			name = now
		}
		before[name] = e.old.Results.Envelope(i)
	}
	for i := range e.now.Model.Families {
		name := e.now.Model.Families[i].Name
		if old := before[name]; old != nil && !old.Empty() && !e.now.Results.Envelope(i).Empty() {
			pairs = append(pairs, pair{name, old, e.now.Results.Envelope(i)})
		}
	}
	if len(pairs) > 0 {
		return pairs
	}
	name := "all combinations"
	if len(e.now.Model.Combinations) == 0 || len(e.old.Model.Combinations) == 0 {
		name = "all cases"
	}
	return []pair{{name, everything(e.old, name), everything(e.now, name)}}
}

func everything(s Side, name string) *analysis.Envelope {
	from, to := 0, len(s.Model.Cases)
	if name == "all combinations" {
		from, to = to, s.Results.Len()
	}
	var all []analysis.Result
	for i := from; i < to; i++ {
		all = append(all, s.Results.At(i))
	}
	return s.Results.EnvelopeOf(name, all)
}

// compared is one quantity before and after, on its way to be an effect.
type compared struct {
	what, place, extreme string
	before, after        analysis.Governed
	unit                 quantity.Unit
	scale                int // those of one scale are weighed against each other
}

// add weighs quantities of one topic and keeps those that differ enough.
func (e *effects) add(topic Topic, p pair, list []compared) {
	if p.old.Empty() || p.now.Empty() {
		return
	}
	largest := map[int]float64{}
	for _, c := range list {
		largest[c.scale] = max(largest[c.scale], math.Abs(c.before.Value), math.Abs(c.after.Value))
	}
	for _, c := range list {
		difference := math.Abs(c.after.Value - c.before.Value)
		if largest[c.scale] == 0 || difference <= e.options.Noise*largest[c.scale] {
			continue
		}
		weight := difference / largest[c.scale]
		if weight < e.options.Threshold {
			continue
		}
		e.list = append(e.list, Effect{Topic: topic, Family: p.name, What: c.what, Place: c.place, Extreme: c.extreme,
			Before: c.before.Value, After: c.after.Value, Unit: c.unit, Weight: weight,
			In: nameOf(e.now.Results, c.after), InBefore: nameOf(e.old.Results, c.before)})
	}
}

func nameOf(r *analysis.Results, g analysis.Governed) string {
	if g.Result < 0 || g.Result >= r.Len() {
		return ""
	}
	return r.At(g.Result).Name()
}

// follow pairs the things of both models by name.
func follow[T any](e *effects, kind Kind, old, now []T, name func(*T) string) map[int]int {
	index := make(map[string]int, len(now))
	for i := range now {
		index[name(&now[i])] = i
	}
	pairs := map[int]int{} // new index → old index
	for i := range old {
		n := name(&old[i])
		if other, ok := e.renamed[kind][n]; ok {
			n = other
		}
		if k, ok := index[n]; ok {
			pairs[k] = i
		}
	}
	return pairs
}

func (e *effects) nodes() map[int]int {
	return follow(e, Node, e.old.Model.Nodes, e.now.Model.Nodes, func(n *model.Node) string { return n.Name })
}

func (e *effects) reactions(p pair) {
	d := e.now.Model.Display
	var list []compared
	nodes := e.nodes()
	for _, n := range analysis.SupportedNodes(e.now.Model) {
		before, ok := nodes[n]
		if !ok {
			continue
		}
		was, is := p.old.Reaction(before), p.now.Reaction(n)
		for f := range is {
			unit, scale := d.Force, 0
			if f > 2 {
				unit, scale = d.Moment, 1
			}
			what := analysis.ForceNames[f] + " at " + e.now.Model.Nodes[n].Name
			list = append(list, compared{what, "", "most", was[f].Most, is[f].Most, unit, scale}, compared{what, "", "least", was[f].Least, is[f].Least, unit, scale})
		}
	}
	e.add(Reactions, p, merged(list))
}

// merged leaves out the second of two extremes that are one and the same.
func merged(list []compared) []compared {
	var kept []compared
	for i := 0; i+1 < len(list); i += 2 {
		most, least := list[i], list[i+1]
		if most.before == least.before && most.after == least.after {
			most.extreme = ""
			kept = append(kept, most)
			continue
		}
		kept = append(kept, most, least)
	}
	return kept
}

func (e *effects) movements(p pair) {
	d := e.now.Model.Display
	var list []compared
	for n, before := range ordered(e.nodes()) {
		was, is := p.old.Movement(before), p.now.Movement(n)
		for f := range is {
			unit, scale := d.Movement, 0
			if f > 2 {
				unit, scale = d.Angle, 1
			}
			list = append(list, compared{analysis.MovementNames[f] + " at " + e.now.Model.Nodes[n].Name, "", "largest", was[f].Largest(), is[f].Largest(), unit, scale})
		}
	}
	e.add(Movements, p, list)
}

// ordered walks through pairs by the new index.
func ordered(pairs map[int]int) func(func(int, int) bool) {
	keys := make([]int, 0, len(pairs))
	for k := range pairs {
		keys = append(keys, k)
	}
	slices.Sort(keys)
	return func(yield func(int, int) bool) {
		for _, k := range keys {
			if !yield(k, pairs[k]) {
				return
			}
		}
	}
}

func (e *effects) forces(p pair) {
	d := e.now.Model.Display
	var forces, stresses []compared
	members := follow(e, MemberKind, e.old.Model.Members, e.now.Model.Members, func(m *model.Member) string { return m.Name })
	for m, before := range ordered(members) {
		name := e.now.Model.Members[m].Name
		add := func(list *[]compared, q analysis.Quantity, unit quantity.Unit, scale int) {
			was, ok := p.old.Along(before, q)
			is, known := p.now.Along(m, q)
			if !ok || !known {
				return
			}
			g := is.Largest()
			*list = append(*list, compared{q.String() + " of " + name, analysis.PlaceWords(e.now.Model, m, g.At), "largest", was.Largest(), g, unit, scale})
		}
		for _, q := range []analysis.Quantity{analysis.N, analysis.Vy, analysis.Vz} {
			add(&forces, q, d.Force, 0)
		}
		for _, q := range []analysis.Quantity{analysis.T, analysis.My, analysis.Mz} {
			add(&forces, q, d.Moment, 1)
		}
		add(&stresses, analysis.NormalStress, d.Stress, 0)
		var sag []compared
		add(&sag, analysis.Deflection, d.Movement, 0)
		for i := range sag {
			sag[i].what = "deflection of " + name
			sag[i].scale = 2
		}
		forces = append(forces, sag...)
	}
	e.add(Forces, p, forces)
	e.add(Stresses, p, stresses)
}

// findLimits pairs the limits that measure the same.
func (e *effects) findLimits(ctx context.Context) error {
	before, err := e.old.Results.Limits(ctx)
	if err != nil {
		return err
	}
	after, err := e.now.Results.Limits(ctx)
	if err != nil {
		return err
	}
	left := map[string][]int{}
	for i := range before {
		name := e.measuredNow(&before[i])
		left[name] = append(left[name], i)
	}
	for i := range after {
		l := &e.now.Model.Limits[after[i].Index]
		name := measured(l.Text)
		var was *analysis.Limit
		if list := left[name]; len(list) > 0 {
			was = &before[list[0]]
			left[name] = list[1:]
		}
		if c, told := e.limit(l, was, &after[i]); told {
			e.limits = append(e.limits, c)
		}
	}
	for i := range before {
		l := &e.old.Model.Limits[before[i].Index]
		if slices.Contains(left[e.measuredNow(&before[i])], i) {
			c, _ := e.limit(l, &before[i], nil)
			e.limits = append(e.limits, c)
		}
	}
	rank := map[Fate]int{Broken: 0, StillBroken: 1, NewLimit: 2, Mended: 3, GoneLimit: 4, StillHolds: 5}
	slices.SortStableFunc(e.limits, func(a, b LimitChange) int {
		return cmp.Or(rank[a.Fate]-rank[b.Fate], cmp.Compare(b.RatioAfter, a.RatioAfter))
	})
	return nil
}

// measuredNow is what an old limit measures, with names as they are now.
func (e *effects) measuredNow(l *analysis.Limit) string {
	return followText(e.renamed, measured(e.old.Model.Limits[l.Index].Text))
}

// limit compares two answers, of which one may be missing, and reports whether
// there is anything to tell.
func (e *effects) limit(l *model.Limit, was, is *analysis.Limit) (c LimitChange, told bool) {
	nan := math.NaN()
	c = LimitChange{Text: measured(l.Text), ValueBefore: nan, ValueAfter: nan, BoundBefore: nan, BoundAfter: nan, RatioBefore: nan, RatioAfter: nan,
		Unit: analysis.MeasureUnit(e.now.Model.Display, l)}
	if was != nil && was.Governs.Result >= 0 {
		c.ValueBefore, c.BoundBefore, c.RatioBefore = was.Governs.Value, was.Governs.Bound, was.Governs.Ratio
	}
	if is != nil && is.Governs.Result >= 0 {
		g := is.Governs
		c.ValueAfter, c.BoundAfter, c.RatioAfter = g.Value, g.Bound, g.Ratio
		c.In = e.now.Results.At(g.Result).Name()
		if g.Member >= 0 && !math.IsNaN(g.At) {
			c.Where = analysis.PlaceWords(e.now.Model, g.Member, g.At)
			if len(l.Targets) > 1 {
				c.Where = e.now.Model.Members[g.Member].Name + " at " + c.Where
			}
		}
	}
	switch {
	case was == nil:
		c.Fate = NewLimit
		if !is.Holds && is.Governs.Result >= 0 {
			c.Fate = Broken
		}
	case is == nil:
		c.Fate = GoneLimit
	case was.Holds && !is.Holds:
		c.Fate = Broken
	case !was.Holds && is.Holds:
		c.Fate = Mended
	case is.Holds:
		c.Fate = StillHolds
	default:
		c.Fate = StillBroken
	}
	differs := math.Abs(c.RatioAfter-c.RatioBefore) > e.options.Threshold || c.Fate != StillHolds && c.Fate != StillBroken ||
		math.Abs(c.BoundAfter-c.BoundBefore) > e.options.Noise*math.Abs(c.BoundBefore)
	return c, differs
}
