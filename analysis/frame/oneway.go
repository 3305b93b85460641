package frame

import (
	"cmp"
	"context"
	"errors"
	"fmt"
	"math"
	"slices"

	"spanwright/lang/model"
)

// One-way parts are found by active sets: all act at first; what carries the
// wrong way is taken out, what would carry the right way is put back, until
// nothing changes. Where that leaves a mechanism, parts that stop it are put back
// (see standing). If a set comes back that was there before, the search starts
// anew and changes only the worst part at a time, and then only the first one in
// the order of the model, as in K. G. Murty, Note on a Bard-type scheme for
// solving the complementarity problem, Opsearch 11 (1974). If that goes in circles
// too, there is no answer and it is said so.

// OneWayError says that no consistent set of one-way parts was found.
type OneWayError struct {
	// Members and Supports are the parts that kept changing.
	Members, Supports []int
	structure         *Structure
}

// Error names the parts.
func (e *OneWayError) Error() string {
	var names []string
	for _, i := range e.Members {
		names = append(names, e.structure.model.Members[i].Name)
	}
	for _, i := range e.Supports {
		names = append(names, "the support of "+e.structure.nodeName(e.structure.model.Supports[i].Node))
	}
	return fmt.Sprintf("no consistent state of the one-way parts was found: %s kept changing between acting and not acting", listed(names))
}

// oneWay keeps the variants of a structure by which parts act, so that the many
// combinations that agree share a factor.
type oneWay struct {
	all      *Structure
	variants map[string]variant
}

type variant struct {
	structure *Structure
	err       error
}

// mostVariants bounds the variants kept at a time.
const mostVariants = 64

func newOneWay(s *Structure) *oneWay { return &oneWay{all: s, variants: map[string]variant{}} }

// hasOneWay reports whether some parts act one way only.
func (s *Structure) hasOneWay() bool {
	for i := range s.model.Members {
		if s.model.Members[i].Sense != model.BothWays {
			return true
		}
	}
	for i := range s.holds {
		if s.holds[i].oneWay {
			return true
		}
	}
	return false
}

// structure returns the variant in which the given parts do not act.
func (o *oneWay) structure(ctx context.Context, st status) (*Structure, error) {
	key := st.key()
	if v, ok := o.variants[key]; ok {
		return v.structure, v.err
	}
	s, err := newIn(o.all.model, st)
	if err == nil {
		err = s.reuse(ctx, o.all)
	}
	if ctx.Err() != nil {
		return nil, ctx.Err()
	}
	var mechanism *MechanismError
	if errors.As(err, &mechanism) {
		mechanism.Slack = o.slackInWords(st)
	}
	if len(o.variants) >= mostVariants {
		clear(o.variants)
	}
	o.variants[key] = variant{s, err}
	return s, err
}

// slackInWords names the parts that do not act.
func (o *oneWay) slackInWords(st status) string {
	var members, supports []string
	for i, slack := range st.slack {
		if slack {
			members = append(members, o.all.model.Members[i].Name)
		}
	}
	for i, lifted := range st.lifted {
		if lifted {
			supports = append(supports, o.all.nodeName(o.all.holds[i].node))
		}
	}
	text := ""
	if len(members) > 0 {
		text = listed(members) + verb(members, " is slack", " are slack")
	}
	if len(supports) > 0 {
		if text != "" {
			text += " and "
		}
		text += "the " + map[bool]string{true: "support", false: "supports"}[len(supports) == 1] + " at " + listed(supports) + verb(supports, " lifts off", " lift off")
	}
	return text
}

// choice picks the changes that are made out of those that are called for, the
// worst first.
type choice func(changes []change) []change

func all(changes []change) []change   { return changes }
func worst(changes []change) []change { return changes[:1] }
func first(changes []change) []change {
	return []change{slices.MinFunc(changes, func(a, b change) int {
		return cmp.Or(cmp.Compare(a.member, b.member), cmp.Compare(a.hold, b.hold))
	})}
}

// solve finds the state of a loading with its consistent set of parts.
func (o *oneWay) solve(ctx context.Context, l loading) (*State, error) {
	var circling *OneWayError
	for _, choose := range []choice{all, worst, first} {
		state, err := o.search(ctx, l, choose)
		if !errors.As(err, &circling) {
			return state, err
		}
	}
	return nil, circling
}

// search changes the set of acting parts until it is consistent.
func (o *oneWay) search(ctx context.Context, l loading, choose choice) (*State, error) {
	st := status{slack: make([]bool, len(o.all.model.Members)), lifted: make([]bool, len(o.all.holds))}
	seen := map[string]bool{}
	for {
		s, err := o.standing(ctx, st, &l)
		if err != nil {
			return nil, err
		}
		if err := s.checkInactive(&l, "the load"); err != nil {
			return nil, err
		}
		states, err := s.solveAll(ctx, []loading{l})
		if err != nil {
			return nil, err
		}
		changes := s.inconsistent(states[0])
		if len(changes) == 0 {
			return states[0], nil
		}
		key := s.status.key()
		if seen[key] || len(seen) > o.steps() {
			return nil, s.circling(changes)
		}
		seen[key] = true
		st = s.status.changed(choose(changes))
	}
}

// steps bounds the changes of the set of acting parts for one load.
func (o *oneWay) steps() int {
	parts := 0
	for i := range o.all.model.Members {
		if o.all.model.Members[i].Sense != model.BothWays {
			parts++
		}
	}
	for i := range o.all.holds {
		if o.all.holds[i].oneWay {
			parts++
		}
	}
	return 50 + 4*parts
}

func (s *Structure) circling(changes []change) error {
	e := &OneWayError{structure: s}
	for _, c := range changes {
		if c.hold >= 0 {
			e.Supports = append(e.Supports, s.holds[c.hold].support)
		} else {
			e.Members = append(e.Members, c.member)
		}
	}
	return e
}

// change is a part that is to change between acting and not.
type change struct {
	member, hold int     // one of them −1
	worth        float64 // by how much it is wrong, as a force
}

// changed returns the status with the parts changed.
func (st status) changed(changes []change) status {
	next := status{slack: append([]bool(nil), st.slack...), lifted: append([]bool(nil), st.lifted...)}
	for _, c := range changes {
		if c.hold >= 0 {
			next.lifted[c.hold] = !next.lifted[c.hold]
		} else {
			next.slack[c.member] = !next.slack[c.member]
		}
	}
	return next
}

// wrong is the share of the largest force about by which a part must be wrong
// to count.
const wrong = 1e-9

// inconsistent returns the parts that act the wrong way, or do not act although
// they would have to, the worst first.
func (s *Structure) inconsistent(st *State) []change {
	var list []change
	largest := 0.0
	for i := range s.model.Members {
		b := &s.model.Members[i]
		if b.Kind == model.Link {
			continue
		}
		n := s.axialWanted(st, i)
		largest = max(largest, math.Abs(n))
		switch b.Sense {
		case model.TensionOnly:
			n = -n
		case model.BothWays:
			continue
		}
		// n > 0 is the way in which the part does not act.
		if slack := s.status.slackens(i); slack != (n > 0) && n != 0 {
			list = append(list, change{i, -1, math.Abs(n)})
		}
	}
	for i := range s.holds {
		h := &s.holds[i]
		if !h.oneWay {
			largest = max(largest, math.Abs(st.holds[i]))
			continue
		}
		push := s.pushWanted(st, i)
		largest = max(largest, math.Abs(push))
		if lifted := s.status.lifts(i); lifted != (push < 0) && push != 0 {
			list = append(list, change{-1, i, math.Abs(push)})
		}
	}
	kept := list[:0]
	for _, c := range list {
		if c.worth > wrong*largest {
			kept = append(kept, c)
		}
	}
	for i := 1; i < len(kept); i++ { // few, and in a fixed order for equal worth
		for j := i; j > 0 && kept[j].worth > kept[j-1].worth; j-- {
			kept[j], kept[j-1] = kept[j-1], kept[j]
		}
	}
	return kept
}

// axialWanted returns the axial force at the middle of a member that acts, or
// the one that it would take for its elongation if it acted.
func (s *Structure) axialWanted(st *State, member int) float64 {
	first, last := s.first[member], s.first[member+1]-1
	if last < first {
		return 0
	}
	if !s.status.slackens(member) {
		f := st.endForces(first)
		g := st.endForces(last)
		return (-f[0] + g[6]) / 2
	}
	d := st.movedEnds(first)
	e := st.movedEnds(last)
	strain := 0.0
	for _, l := range st.loading.spans[member] {
		strain += l.Strain
	}
	b := &s.model.Members[member]
	if b.Kind == model.Spring {
		return b.Stiffness[0] * (e[6] - d[0])
	}
	return s.propertiesOf(b).EA * ((e[6]-d[0])/b.Length - strain)
}

// pushWanted returns the reaction of a one-way hold that acts, or, for one that
// has lifted off, the one that would press it back: a measure of how far its
// node has sunk below it.
func (s *Structure) pushWanted(st *State, hold int) float64 {
	if !s.status.lifts(hold) {
		return st.holds[hold]
	}
	h := &s.holds[hold]
	sunk := -dot6(&h.row, &st.bodies[h.body])
	if st.loading.amounts != nil {
		sunk += st.loading.amounts[hold]
	}
	k := h.stiffness
	if k == 0 {
		k = s.typicalStiffness()
	}
	return k * sunk
}

// typicalStiffness turns a movement into a force of the order that the
// structure would oppose to it.
func (s *Structure) typicalStiffness() float64 {
	largest := 0.0
	for i := range s.segments {
		k := s.segments[i].element.Stiffness()
		for _, f := range [...]int{0, 1, 2} {
			largest = max(largest, k[13*f])
		}
	}
	return largest
}

// Acting returns the one-way members that are slack and the supports that have
// lifted off in a state.
func (st *State) Acting() (slack, lifted []int) {
	s := st.structure
	for i := range s.model.Members {
		if s.status.slackens(i) {
			slack = append(slack, i)
		}
	}
	for i := range s.holds {
		if s.status.lifts(i) {
			lifted = append(lifted, s.holds[i].support)
		}
	}
	return slack, lifted
}
