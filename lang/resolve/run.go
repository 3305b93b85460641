package resolve

import (
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// run evaluates the fragment.
func (e *evaluation) run() {
	if e.parameter >= 0 {
		e.parameterValue()
		return
	}
	e.checkName()
	e.allowed()
	if e.statement.Broken() {
		e.mention()
		return
	}
	switch tree := e.statement.Tree.(type) {
	case *syntax.ModelStatement:
		e.model(tree)
	case *syntax.ShowStatement:
		e.show(tree)
	case *syntax.LetStatement:
		e.let(tree)
	case *syntax.MaterialStatement:
		e.material(tree)
	case *syntax.SectionStatement:
		e.section(tree)
	case *syntax.NodeStatement:
		e.nodeStatement(tree)
	case *syntax.MemberStatement:
		e.member(tree)
	case *syntax.SupportStatement:
		e.support(tree)
	case *syntax.MassStatement:
		e.mass(tree)
	case *syntax.GroupStatement:
		e.group(tree)
	case *syntax.CaseStatement:
		e.caseStatement(tree)
	case *syntax.SelfWeightLine:
		e.selfWeight(tree)
	case *syntax.LoadLine:
		e.load(tree)
	case *syntax.AlternateStatement:
		e.alternate(tree)
	case *syntax.CombinationStatement:
		e.combination(tree)
	case *syntax.FamilyStatement:
		e.family(tree)
	case *syntax.LimitStatement:
		e.limit(tree)
	case *syntax.UseStatement:
		e.use(tree)
	case *syntax.PartStatement:
		e.part(tree)
	case *syntax.PlaceStatement:
		e.placeStatement(tree)
	}
}

// allowed refuses statements that have no meaning inside a part.
func (e *evaluation) allowed() {
	if e.place == nil {
		return
	}
	switch e.statement.Kind {
	case syntax.ModelKind, syntax.ShowKind, syntax.UseKind, syntax.PartKind, syntax.AlternateKind, syntax.CombinationKind, syntax.FamilyKind:
		word := e.statement.Kind.Word()
		e.fail("not-in-part", e.nameSpan(), "Move this %s out of the part: it speaks of the whole model.", word)
	}
}

// letResult is what a let or a parameter comes to.
type letResult struct{ value value }

func (r *letResult) same(other any) bool {
	o, ok := other.(*letResult)
	return ok && *o == *r
}

func (e *evaluation) let(tree *syntax.LetStatement) {
	v := e.value(tree.Value)
	if v.isBad() {
		return
	}
	// What has a name was meant as it is: a mere number stays one.
	v.bare, v.zero = false, false
	e.out.result = &letResult{v}
}

// modelResult is what the model line holds beside the header.
type modelResult struct{ gravity float64 }

func (e *evaluation) model(tree *syntax.ModelStatement) {
	r := &modelResult{gravity: standardGravity}
	e.out.result = r
	for _, o := range tree.Options {
		if o.Value == nil {
			continue
		}
		g, ok := e.scalar(o.Value, quantity.Acceleration, "the acceleration of gravity, such as 9.81 m/s2,")
		if !ok {
			continue
		}
		switch {
		case g <= 0:
			e.fail("not-positive", o.Value.Span, "Write gravity as a positive acceleration: it always acts down.")
		case g < 1 || g > 30:
			e.warn("implausible-value", o.Value.Span, "Check gravity: %s is far from 9.81 m/s2.", e.calls(o.Value.Root, "this"))
			r.gravity = g
		default:
			r.gravity = g
		}
	}
}

// standardGravity is in m/s2 (3rd CGPM, 1901).
const standardGravity = 9.80665

// readHeader takes over what the model line says, before anything is evaluated.
func (s *Session) readHeader() {
	before := s.header
	s.header = header{plane: true, gravity: standardGravity}
	if f := s.firstModel(); f != nil {
		s.header.found = true
		if tree, ok := f.statement.Tree.(*syntax.ModelStatement); ok {
			s.header.title = tree.Title.Value()
			s.header.plane = tree.Space == nil || tree.Space.Text != "space"
			for _, o := range tree.Options {
				switch {
				case len(o.Words) == 2 && o.Words[0].Text == "second":
					s.header.secondOrder = true
				case len(o.Words) == 2 && o.Words[0].Text == "shear":
					s.header.shearFlexible = true
				}
			}
		}
	}
	if before.plane != s.header.plane || before.found != s.header.found {
		s.markEverything()
	}
}

// firstModel returns the model line that counts, or nil.
func (s *Session) firstModel() *fragment {
	for _, f := range s.main.fragments {
		if f.statement.Kind == syntax.ModelKind {
			return f
		}
	}
	return nil
}

// markEverything has all statements evaluated again.
func (s *Session) markEverything() {
	var walk func([]*fragment)
	walk = func(list []*fragment) {
		for _, f := range list {
			f.must = true
			s.mark(f)
			if f.inner != nil {
				walk(f.inner.parameters)
				walk(f.inner.fragments)
			}
		}
	}
	for _, sh := range s.order {
		walk(sh.fragments)
	}
	for _, in := range s.shadows {
		walk(in.parameters)
		walk(in.fragments)
	}
}

// showResult is the units that results are shown in.
type showResult struct{ units []quantity.Unit }

func (e *evaluation) show(tree *syntax.ShowStatement) {
	r := &showResult{}
	seen := map[quantity.Dimension]int{}
	for _, x := range tree.Units {
		before := e.out.units
		v := e.value(x)
		e.out.units = before // a unit only shown does not count as used
		if v.isBad() {
			continue
		}
		text := e.calls(x.Root, "this")
		d := v.q().Dimension
		angle := v.q().Angle && d == quantity.None
		if v.isVector() || v.bare || d == quantity.None && !angle {
			e.fail("not-a-unit", x.Span, "Write a unit here, such as kN or mm: %s is none.", text)
			continue
		}
		u := quantity.Unit{Symbol: text, Factor: v.number(), Dimension: d, Angle: angle}
		if known, ok := quantity.Lookup(syntax.NormalUnit(text)); ok {
			u = known
		}
		switch d {
		case quantity.None, quantity.Length, quantity.Force, quantity.Moment, quantity.Stress, quantity.Mass:
		default:
			e.warn("not-a-unit", x.Span, "Delete %s: results are shown in units of length, force, moment, stress, angle and mass, and others are made from those.", text)
			continue
		}
		key := d
		most := 1
		if d == quantity.Length {
			most = 2
		}
		if seen[key]++; seen[key] > most {
			e.warn("shown-twice", x.Span, "Delete %s: a unit for %s stands before it already.", text, d.Words())
			continue
		}
		r.units = append(r.units, u)
	}
	e.out.result = r
}

// ownPlace notes that the statement follows from where its part is placed, and
// returns the place; nil outside of parts, or where the place is not known.
func (e *evaluation) ownPlace() *placeResult {
	if e.place == nil {
		return nil
	}
	if e.place.name != nil && !e.silent {
		e.depend(e.place.name, true)
	}
	e.session.settle(e.place)
	r, _ := e.place.result().(*placeResult)
	return r
}
