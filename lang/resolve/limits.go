package resolve

import (
	"slices"
	"strings"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// limitResult is what a limit statement comes to. The members that it is for
// and the bound of each are found when the model is put together.
type limitResult struct {
	measure     model.Measure
	node, other *symbol
	freedom     int
	of          *symbol // a member, group or section
	all         bool
	bound       float64 // where it is the same for all
	varies      bool    // the bound speaks of length or yield
	usesYield   bool
	atMost      bool
	under       []*symbol
	byHand      []string // families that no line declares, if they are any
	generated   []string // names of combinations that a code asks for
}

// measure describes a measure of the language.
type measure struct {
	word      string // "deflection", "reaction"
	second    string // "factor" of "critical factor"
	measure   model.Measure
	dimension quantity.Dimension
	members   bool
	example   string
}

var measures = []measure{
	{"deflection", "", model.Deflection, quantity.Length, true, "limit deflection of r1 <= length/250 under SLS"},
	{"drift", "", model.Drift, quantity.Length, false, "limit drift of B over A <= 14 mm under SLS"},
	{"stress", "", model.Stress, quantity.Stress, true, "limit stress of all <= yield under ULS"},
	{"axial", "", model.AxialForce, quantity.Force, true, "limit axial of t1 <= 90 kN under ULS"},
	{"shear", "", model.ShearForce, quantity.Force, true, "limit shear of r1 <= 120 kN under ULS"},
	{"moment", "", model.BendingMoment, quantity.Moment, true, "limit moment of r1 <= 80 kNm under ULS"},
	{"reaction", "", model.Reaction, quantity.Force, false, "limit reaction Fz at A >= 0 kN under ULS"},
	{"critical", "factor", model.CriticalFactor, quantity.None, false, "limit critical factor >= 10 under ULS"},
	{"frequency", "", model.Frequency, quantity.Frequency, false, "limit frequency >= 5 Hz"},
}

// reactions are the words for the freedoms of a reaction.
var reactions = []string{"Fx", "Fy", "Fz", "Mx", "My", "Mz"}

func measureWords() []string {
	list := slices.Clone(freedoms)
	for _, m := range measures {
		list = append(list, strings.TrimSpace(m.word+" "+m.second))
	}
	return list
}

func (e *evaluation) limit(tree *syntax.LimitStatement) {
	if len(tree.Words) == 0 {
		return
	}
	first := tree.Words[0]
	if i := slices.Index(freedoms, first.Text); i >= 0 && len(tree.Words) == 1 {
		dimension := quantity.Length
		if i >= 3 {
			dimension = quantity.None
		}
		e.limitAt(tree, measure{word: first.Text, measure: model.Movement, dimension: dimension, example: "limit " + first.Text + " at C <= 20 mm under SLS"}, i)
		return
	}
	i := slices.IndexFunc(measures, func(m measure) bool { return m.word == first.Text })
	if i < 0 {
		f := e.fail("unknown-measure", first.Span(), "Write one of %s: %s is nothing that can be limited.", strings.Join(measureWords(), ", "), first.Text)
		if near := nearest(first.Text, measureWords()); len(near) > 0 {
			f.Summary = "Did you mean " + either(near) + "? " + first.Text + " is nothing that can be limited."
			f.fix("Write "+near[0], first.Span(), near[0])
		}
		return
	}
	m := measures[i]
	freedom := -1
	switch {
	case m.measure == model.Reaction:
		if len(tree.Words) < 2 {
			e.fail("incomplete-limit", first.Span(), "Say which reaction: write %s.", m.example)
			return
		}
		freedom = slices.Index(reactions, tree.Words[1].Text)
		if freedom < 0 {
			e.fail("unknown-freedom", tree.Words[1].Span(), "Write Fx, Fy, Fz, Mx, My or Mz: %s is no reaction.", tree.Words[1].Text)
			return
		}
		if freedom >= 3 {
			m.dimension = quantity.Moment
		}
	case m.second != "" && (len(tree.Words) < 2 || tree.Words[1].Text != m.second):
		e.fail("incomplete-limit", first.Span(), "Write %s.", m.example)
		return
	case m.second == "" && len(tree.Words) > 1:
		e.fail("does-not-fit", tree.Words[1].Span(), "Write %s: %s does not fit here.", m.example, tree.Words[1].Text)
		return
	}
	e.limitAt(tree, m, freedom)
}

// limitAt works out the rest of a limit whose measure is known.
func (e *evaluation) limitAt(tree *syntax.LimitStatement, m measure, freedom int) {
	r := &limitResult{measure: m.measure, freedom: max(freedom, 0), atMost: strings.HasPrefix(tree.Sense, "<") || tree.Sense == "≤"}
	ok := true
	if freedom >= 0 && e.session.header.plane && !inPlane[freedom] {
		word := tree.Words[len(tree.Words)-1]
		e.fail("not-in-plane", word.Span(), "Choose a movement in the plane: %s is always zero in a plane model.", word.Text)
		ok = false
	}
	switch {
	case m.members:
		ok = e.limitMembers(tree, m, r) && ok
	case m.measure == model.Drift:
		if tree.Of == nil || tree.Over == nil {
			e.fail("incomplete-limit", tree.Words[0].Span(), "Say of which node over which other: write %s.", m.example)
			return
		}
		a, b := e.needNode(tree.Of, false), e.needNode(tree.Over, false)
		if a == nil || b == nil {
			ok = false
		} else {
			r.node, r.other = a.name, b.name
		}
	case freedom >= 0:
		if tree.At == nil {
			e.fail("incomplete-limit", tree.Words[0].Span(), "Say at which node: write %s.", m.example)
			return
		}
		if w := e.needNode(tree.At, false); w != nil {
			r.node = w.name
		} else {
			ok = false
		}
	}
	ok = e.misplaced(tree, m, freedom) && ok
	ok = e.bound(tree, m, r) && ok
	ok = e.under(tree, m, r) && ok
	if ok {
		e.out.result = r
	}
}

// misplaced refuses "of", "at" and "over" where the measure has none.
func (e *evaluation) misplaced(tree *syntax.LimitStatement, m measure, freedom int) bool {
	for _, p := range []struct {
		name *syntax.Name
		word string
		fits bool
	}{
		{tree.Of, "of", m.members || m.measure == model.Drift},
		{tree.At, "at", freedom >= 0},
		{tree.Over, "over", m.measure == model.Drift},
	} {
		if p.name != nil && !p.fits {
			e.fail("does-not-fit", p.name.Span(), "Leave out \"%s %s\": write %s.", p.word, p.name.Text, m.example)
			return false
		}
	}
	return true
}

// limitMembers finds what the limit is for: a member, a group, the members of a
// section, or all.
func (e *evaluation) limitMembers(tree *syntax.LimitStatement, m measure, r *limitResult) bool {
	if tree.Of == nil {
		e.fail("incomplete-limit", tree.Words[0].Span(), "Say of which member: write %s.", m.example)
		return false
	}
	if tree.Of.Text == "all" {
		r.all = true
		return true
	}
	if w := e.find(Structure, tree.Of.Text, tree.Of.Span(), false); w != nil && (w.kind.Member() || w.kind == GroupName) {
		if w.kind == LinkName || w.kind == SpringName {
			e.fail("wrong-kind-of-name", tree.Of.Span(), "Name a beam, bar, group or section here: %s is a %s.", tree.Of.Text, w.kind)
			return false
		}
		r.of = w.name
		return true
	}
	if w := e.find(Sections, tree.Of.Text, tree.Of.Span(), false); w != nil {
		r.of = w.name
		return true
	}
	if w := e.find(Structure, tree.Of.Text, tree.Of.Span(), false); w != nil {
		e.fail("wrong-kind-of-name", tree.Of.Span(), "Name a member, group or section here, or all: %s is a %s.", tree.Of.Text, w.kind).relate(w, "%s is declared here", tree.Of.Text)
		return false
	}
	e.unknown(Structure, "member, group or section", tree.Of.Text, tree.Of.Span())
	return false
}

// bound works out the right-hand side.
func (e *evaluation) bound(tree *syntax.LimitStatement, m measure, r *limitResult) bool {
	if m.members && tree.Bound.Root != nil {
		eachName(tree.Bound.Root, func(n *syntax.NameNode) {
			r.varies = r.varies || n.Text == "length" || n.Text == "yield"
			r.usesYield = r.usesYield || n.Text == "yield"
		})
		e.special = sample(1, 1)
	}
	v := e.value(tree.Bound)
	e.special = nil
	if v.isBad() {
		return false
	}
	if m.measure == model.Movement && m.dimension == quantity.None {
		if v.bare && v.number() != 0 {
			e.fail("missing-unit", tree.Bound.Span, "Write %s mrad, or deg or rad: a rotation needs its unit.", e.calls(tree.Bound.Root, "5"))
			return false
		}
	}
	bound, ok := e.want(v, tree.Bound, m.dimension, "the bound of this limit, "+m.dimension.Words()+",")
	r.bound = bound
	return ok
}

// sample gives length and yield a value each.
func sample(length, yield float64) map[string]value {
	return map[string]value{
		"length": scalar(quantity.Quantity{Value: length, Dimension: quantity.Length}),
		"yield":  scalar(quantity.Quantity{Value: yield, Dimension: quantity.Stress}),
	}
}

// actionWanted is what a limit is checked in.
const actionWanted = "case, combination or family"

// under finds the cases, combinations and families of a limit.
func (e *evaluation) under(tree *syntax.LimitStatement, m measure, r *limitResult) bool {
	if m.measure == model.Frequency {
		if len(tree.Under) > 0 {
			e.fail("does-not-fit", tree.Under[0].Span(), "Leave out \"under\": a frequency knows no load.")
			return false
		}
		return true
	}
	if len(tree.Under) == 0 {
		e.fail("missing-under", tree.Bound.Span, "Say in which loads the limit holds: add under and a case, combination or family.")
		return false
	}
	ok := true
	for _, n := range tree.Under {
		w := e.find(Actions, n.Text, n.Span(), false)
		if w == nil {
			if e.generated(n) {
				r.generated = append(r.generated, n.Text)
				continue
			}
			// Names such as ULS.a make a family that no line declares; whether there
			// are any shows when the model is put together.
			e.unknown(Actions, actionWanted, n.Text, n.Span())
			r.byHand = append(r.byHand, n.Text)
			continue
		}
		r.under = append(r.under, w.name)
	}
	return ok
}

// generated reports whether a name is one of a family by a code, whose
// combinations have names that only the analysis knows.
func (e *evaluation) generated(n *syntax.Name) bool {
	head, _, dotted := strings.Cut(n.Text, ".")
	if !dotted {
		return false
	}
	w := e.find(Actions, head, source.Span{Start: n.Span().Start, End: n.Span().Start + len(head)}, true)
	if w == nil || w.kind != FamilyName {
		return false
	}
	r, ok := w.result().(*familyResult)
	return ok && r.code != model.Written
}
