package resolve

import (
	"slices"
	"strings"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// caseKinds are the natures of actions, in the order of model.CaseKind.
var caseKinds = []string{"permanent", "imposed", "snow", "wind", "thermal", "settlement", "accidental", "earthquake"}

// caseResult is the opening line of a case. Inside a part it adds loads to the
// model's case of that name.
type caseResult struct {
	kind     model.CaseKind
	category byte
	title    string
	outer    *symbol // for a case inside a part: the model's case
}

func (r *caseResult) same(other any) bool {
	o, ok := other.(*caseResult)
	return ok && *o == *r
}

func (e *evaluation) caseStatement(tree *syntax.CaseStatement) {
	r := &caseResult{title: tree.Title.Value()}
	kind := slices.Index(caseKinds, tree.Kind.Text)
	if kind < 0 {
		f := e.fail("unknown-case-kind", tree.Kind.Span(), "Write %s: %s is no kind of case.", either(caseKinds), tree.Kind.Text)
		if near := nearest(tree.Kind.Text, caseKinds); len(near) > 0 {
			f.Summary = "Write " + either(near) + ": " + tree.Kind.Text + " is no kind of case."
			f.fix("Write "+near[0], tree.Kind.Span(), near[0])
		}
		return
	}
	r.kind = model.CaseKind(kind)
	if tree.Category != nil {
		c := tree.Category.Text
		if r.kind != model.Imposed || len(c) != 1 || c[0] < 'A' || c[0] > 'H' {
			e.fail("unknown-category", tree.Category.Span(), "Write imposed with a category A to H of EN 1991-1-1, or no category: %s does not fit behind %s.", c, tree.Kind.Text)
			return
		}
		r.category = c[0]
	}
	if e.place != nil {
		w := e.session.findSimple(e.fragment, e, e.scope.outer, Actions, tree.Name.Text, tree.Name.Span(), false)
		if w == nil {
			e.unknown(Actions, "case", tree.Name.Text, tree.Name.Span())
			return
		}
		r.outer = w.name
	}
	e.out.result = r
}

// alternateResult is cases that never act together.
type alternateResult struct{ cases []*symbol }

func isCase(k Kind) bool { return k == CaseName }

func (e *evaluation) alternate(tree *syntax.AlternateStatement) {
	r := &alternateResult{}
	for _, n := range tree.Cases {
		w := e.need(n, Actions, "case", false, isCase)
		switch {
		case w == nil:
		case slices.Contains(r.cases, w.name):
			e.warn("no-effect", n.Span(), "Delete the second %s: it stands here twice.", n.Text)
		default:
			r.cases = append(r.cases, w.name)
		}
	}
	if len(tree.Cases) == 1 {
		e.warn("no-effect", e.nameSpan(), "Name two cases or more, or delete this line: one case alone is no choice.")
	}
	if len(r.cases) > 0 {
		e.out.result = r
	}
}

// combinationResult is a sum of factored cases, in the order written.
type combinationResult struct {
	cases   []*symbol
	factors []float64
	family  *symbol // of a name such as ULS.a, or nil
}

func (e *evaluation) combination(tree *syntax.CombinationStatement) {
	if tree.Sum.Problem != nil || tree.Sum.Root == nil {
		return
	}
	r := &combinationResult{}
	ok := e.addCases(tree.Sum.Root, 1, r, 0)
	if family, _, dotted := strings.Cut(tree.Name.Text, "."); dotted {
		span := source.Span{Start: tree.Name.Span().Start, End: tree.Name.Span().Start + len(family)}
		if w := e.find(Actions, family, span, false); w != nil {
			if w.kind != FamilyName {
				e.fail("wrong-kind-of-name", span, "Put a family before the dot: %s is a %s.", family, w.kind).relate(w, "%s is declared here", family)
				ok = false
			}
			r.family = w.name
		}
		// A name before the dot that nothing declares makes a family by hand.
	}
	if ok {
		e.out.result = r
	}
}

// addCases adds the cases in a sum of products, each times a factor. Only one
// operand of a product may be a case.
func (e *evaluation) addCases(n syntax.Node, factor float64, r *combinationResult, depth int) bool {
	ok := true
	for {
		b, isBinary := n.(*syntax.BinaryNode)
		if !isBinary || b.Op != syntax.Add && b.Op != syntax.Subtract {
			break
		}
		sign := factor
		if b.Op == syntax.Subtract {
			sign = -factor
		}
		// The terms come last to first; they are put in order below.
		ok = e.addCases(b.Y, sign, r, depth+1) && ok
		n = b.X
		if g, isGroup := b.X.(*syntax.GroupNode); isGroup {
			n = g.X
		}
	}
	switch x := n.(type) {
	case *syntax.GroupNode:
		return e.addCases(x.X, factor, r, depth+1) && ok
	case *syntax.UnaryNode:
		if x.Minus {
			factor = -factor
		}
		return e.addCases(x.X, factor, r, depth+1) && ok
	case *syntax.BinaryNode:
		return e.factored(x, factor, r, depth) && ok
	case *syntax.NameNode:
		return e.addCase(x, factor, r) && ok
	}
	e.fail("not-a-sum-of-cases", n.Place(), "Write a sum of cases with factors, such as 1.35 G + 1.5 S: %s has no case in it.", e.calls(n, "this term"))
	return false
}

// factored adds the cases of a product or quotient.
func (e *evaluation) factored(b *syntax.BinaryNode, factor float64, r *combinationResult, depth int) bool {
	left, right := e.holdsCase(b.X), e.holdsCase(b.Y)
	switch {
	case left && right:
		e.fail("not-a-sum-of-cases", b.Span, "Add cases, do not multiply them: %s has two in one product.", e.calls(b, "this term"))
		return false
	case b.Op == syntax.Power || b.Op == syntax.Divide && right:
		e.fail("not-a-sum-of-cases", b.Span, "Write a number times a case, such as 1.35 G: %s is no such thing.", e.calls(b, "this term"))
		return false
	}
	number, with := b.X, b.Y
	if left {
		number, with = b.Y, b.X
	}
	v := e.node(number)
	if v.isBad() {
		return false
	}
	k, ok := e.want(v, &syntax.Expression{Root: number, Span: number.Place()}, quantity.None, "a plain number as the factor")
	if !ok {
		return false
	}
	if b.Op == syntax.Divide {
		if k == 0 {
			e.fail("division-by-zero", number.Place(), "Change the divisor: it is zero.")
			return false
		}
		k = 1 / k
	}
	return e.addCases(with, factor*k, r, depth+1)
}

// holdsCase reports whether an expression speaks of a case rather than a
// number: it holds a name that stands for a case, or for nothing at all.
func (e *evaluation) holdsCase(n syntax.Node) bool {
	found := false
	eachName(n, func(name *syntax.NameNode) {
		if name.Text == "pi" || syntax.UnitSymbol(name.Text) {
			return
		}
		for _, space := range []Space{Actions, Structure} {
			e.depend(e.session.symbols.get(symbolKey{e.scope, space, name.Text}), false)
		}
		isCase := e.session.find(e.fragment, nil, Actions, name.Text, name.Span, false) != nil
		isValue := e.session.find(e.fragment, nil, Structure, name.Text, name.Span, false) != nil
		found = found || isCase || !isValue
	})
	return found
}

func (e *evaluation) addCase(n *syntax.NameNode, factor float64, r *combinationResult) bool {
	w := e.need(nameOf(n), Actions, "case", false, isCase)
	if w == nil {
		return false
	}
	if i := slices.Index(r.cases, w.name); i >= 0 {
		e.warn("case-twice", n.Span, "Name %s once: it stands in this sum twice, and the factors are added.", n.Text)
		r.factors[i] += factor
		return true
	}
	r.cases = append(r.cases, w.name)
	r.factors = append(r.factors, factor)
	return true
}

// nameOf returns a name in an expression as one of a statement.
func nameOf(n *syntax.NameNode) *syntax.Name {
	m := &syntax.Name{Text: n.Text}
	m.Pos.Offset = n.Span.Start
	return m
}

// familyResult is a family of combinations by a code.
type familyResult struct {
	code      model.Code
	situation model.Situation
	rule      string
	overrides []overrideResult
}

// overrideResult is a factor that replaces the code's.
type overrideResult struct {
	model.Override
	of *symbol // the case, or nil
}

// codeOfPractice is a code with the sets of combinations that it knows.
type codeOfPractice struct {
	name       string
	code       model.Code
	situations map[string]model.Situation
}

var codes = []codeOfPractice{
	{"EN1990", model.EN1990, map[string]model.Situation{
		"strength": model.Strength, "characteristic": model.Characteristic,
		"frequent": model.Frequent, "quasi-permanent": model.QuasiPermanent}},
	{"ASCE7", model.ASCE7, map[string]model.Situation{"strength": model.Strength, "allowable": model.Allowable}},
}

func codeNamed(name string) (codeOfPractice, bool) {
	for _, c := range codes {
		if strings.EqualFold(c.name, name) {
			return c, true
		}
	}
	return codeOfPractice{}, false
}

var situationOrder = []string{"strength", "characteristic", "frequent", "quasi-permanent", "allowable"}

func (e *evaluation) family(tree *syntax.FamilyStatement) {
	code, ok := codeNamed(tree.Code.Text)
	if !ok {
		e.fail("unknown-code", tree.Code.Span(), "Write EN1990 or ASCE7: %s is no code known here.", tree.Code.Text)
		return
	}
	situation, ok := code.situations[tree.Situation.Text]
	if !ok {
		var fit []string
		for _, s := range situationOrder {
			if _, has := code.situations[s]; has {
				fit = append(fit, s)
			}
		}
		f := e.fail("unknown-situation", tree.Situation.Span(), "Write %s: %s has no combinations called %s.", either(fit), code.name, tree.Situation.Text)
		if near := nearest(tree.Situation.Text, fit); len(near) > 0 {
			f.fix("Write "+near[0], tree.Situation.Span(), near[0])
		}
		return
	}
	r := &familyResult{code: code.code, situation: situation}
	for _, o := range tree.Options {
		if o.Rule != nil {
			// Which rules the code has is for analysis to know and to say.
			if r.rule != "" {
				r.rule += ", "
			}
			r.rule += squeezed(o.Rule.Text)
			continue
		}
		if v, fine := e.override(o, code.code); fine {
			r.overrides = append(r.overrides, v)
		}
	}
	e.out.result = r
}

// symbols of factors that a family may replace.
var factorSymbols = []string{"gamma", "psi0", "psi1", "psi2", "xi"}

func (e *evaluation) override(o *syntax.FamilyOption, code model.Code) (overrideResult, bool) {
	r := overrideResult{Override: model.Override{Symbol: o.Word.Text, Case: -1}}
	if !slices.Contains(factorSymbols, o.Word.Text) {
		f := e.fail("unknown-factor", o.Word.Span(), "Write %s: %s is no factor of a code.", either(factorSymbols), o.Word.Text)
		if near := nearest(o.Word.Text, factorSymbols); len(near) > 0 {
			f.fix("Write "+near[0], o.Word.Span(), near[0])
		}
		return r, false
	}
	if code != model.EN1990 && o.Word.Text != "gamma" {
		e.fail("unknown-factor", o.Word.Span(), "Delete %s: it is a factor of EN 1990, not of this code.", o.Word.Text)
		return r, false
	}
	if len(o.Whom) == 0 && o.Word.Text != "xi" {
		e.fail("incomplete-option", o.Word.Span(), "Say whose factor it is: write %s snow 0.7, with a kind of case or the name of one.", o.Word.Text)
		return r, false
	}
	if len(o.Whom) > 0 && !e.overrideOf(o, &r) {
		return r, false
	}
	v, ok := e.scalar(o.Value, quantity.None, "a plain number")
	if !ok {
		return r, false
	}
	if v < 0 {
		e.fail("not-positive", o.Value.Span, "Write a factor of zero or more.")
		return r, false
	}
	r.Unfavourable, r.Favourable = v, v
	if o.Or != nil {
		if o.Word.Text != "gamma" {
			e.fail("does-not-fit", o.Or.Span, "Give %s one value: only gamma has two, unfavourable or favourable.", o.Word.Text)
			return r, false
		}
		if r.Favourable, ok = e.scalar(o.Or, quantity.None, "a plain number"); !ok {
			return r, false
		}
		if r.Favourable < 0 {
			e.fail("not-positive", o.Or.Span, "Write a factor of zero or more.")
			return r, false
		}
	} else if o.Word.Text == "gamma" && r.Kind != model.Permanent {
		r.Favourable = 0 // a variable action that helps is left out
	}
	return r, true
}

// overrideOf works out whose factor is replaced: a case, or a kind of cases.
func (e *evaluation) overrideOf(o *syntax.FamilyOption, r *overrideResult) bool {
	who := o.Whom[0]
	if kind := slices.Index(caseKinds, who.Text); kind >= 0 {
		r.Kind = model.CaseKind(kind)
		if len(o.Whom) > 1 {
			c := o.Whom[1].Text
			if r.Kind != model.Imposed || len(c) != 1 || c[0] < 'A' || c[0] > 'H' {
				e.fail("unknown-category", o.Whom[1].Span(), "Write imposed with a category A to H, or no category: %s does not fit behind %s.", c, who.Text)
				return false
			}
			r.Category = c[0]
		}
		return true
	}
	w := e.need(who, Actions, "case", true, isCase)
	if w == nil {
		return false
	}
	r.of = w.name
	if c, ok := w.result().(*caseResult); ok {
		r.Kind, r.Category = c.kind, c.category
	}
	return true
}
