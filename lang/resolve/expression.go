package resolve

import (
	"math"

	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// maxSteps bounds the operations of one statement, far above any formula.
const maxSteps = 100_000

// value works an expression out. A mistake in it is reported once and gives
// bad, with which nothing else complains.
func (e *evaluation) value(x *syntax.Expression) value {
	if x == nil || x.Root == nil || x.Problem != nil {
		return bad
	}
	v := e.node(x.Root)
	if !v.isBad() && !v.finite() {
		e.fail("not-finite", x.Span, "Correct %s: it comes to a number too large to compute with.", e.calls(x.Root, "this formula"))
		return bad
	}
	return v
}

func (e *evaluation) node(n syntax.Node) value {
	if e.steps++; e.steps > maxSteps {
		if e.steps == maxSteps+1 {
			e.fail("too-long", n.Place(), "Split this formula with let: it has more than %d operations.", maxSteps)
		}
		return bad
	}
	switch n := n.(type) {
	case *syntax.NumberNode:
		if math.IsInf(n.Value, 0) {
			e.fail("not-finite", n.Span, "Write a smaller number: %s is too large to compute with.", e.text(n.Span))
			return bad
		}
		v := plain(n.Value)
		v.bare, v.zero = true, n.Value == 0
		return v
	case *syntax.NameNode:
		return e.name(n)
	case *syntax.UnaryNode:
		v := e.node(n.X)
		if !n.Minus || v.isBad() {
			return v
		}
		return v.each(quantity.Quantity.Negated)
	case *syntax.GroupNode:
		return e.node(n.X)
	case *syntax.VectorNode:
		return e.vectorNode(n)
	case *syntax.CallNode:
		return e.call(n)
	case *syntax.BinaryNode:
		return e.chain(n)
	}
	return bad
}

// chain works out a binary operation. Long sums lean to the left, a node deep
// for every term; they are folded here, not by recursion.
func (e *evaluation) chain(n *syntax.BinaryNode) value {
	spine := []*syntax.BinaryNode{n}
	for {
		left, ok := spine[len(spine)-1].X.(*syntax.BinaryNode)
		if !ok {
			break
		}
		spine = append(spine, left)
	}
	v := e.node(spine[len(spine)-1].X)
	for i := len(spine) - 1; i >= 0; i-- {
		v = e.binary(spine[i], v)
	}
	return v
}

func (e *evaluation) binary(n *syntax.BinaryNode, x value) value {
	if name, ok := n.Y.(*syntax.NameNode); ok && n.Op == syntax.Joined {
		if unit, isUnit := e.unitOf(name); isUnit {
			return e.withUnit(x, unit)
		}
	}
	y := e.node(n.Y)
	if x.isBad() || y.isBad() {
		return bad
	}
	switch n.Op {
	case syntax.Add, syntax.Subtract:
		return e.sum(n, x, y)
	case syntax.Multiply, syntax.Joined:
		return e.product(n, x, y)
	case syntax.Divide:
		return e.quotient(n, x, y)
	}
	return e.power(n, x, y)
}

// withUnit gives a number its unit.
func (e *evaluation) withUnit(x value, u quantity.Unit) value {
	if x.isBad() {
		return bad
	}
	one := quantity.Of(1, u)
	v := x.each(func(q quantity.Quantity) quantity.Quantity { return q.Times(one) })
	v.bare, v.zero = false, false
	return v
}

// unitOf looks a name up in the table of units and notes that the file uses it.
func (e *evaluation) unitOf(n *syntax.NameNode) (quantity.Unit, bool) {
	u, ok := quantity.Lookup(syntax.NormalUnit(n.Text))
	if ok {
		e.out.units |= unitBit(u.Symbol)
	}
	return u, ok
}

func (e *evaluation) sum(n *syntax.BinaryNode, x, y value) value {
	if x.isVector() != y.isVector() && !x.zero && !y.zero {
		e.fail("dimension-mismatch", n.Span, "Add a position to a position and a number to a number: %s is %s, %s is %s.",
			e.calls(n.X, "the left side"), x.words(), e.calls(n.Y, "the right side"), y.words())
		return bad
	}
	if x.isVector() && y.isVector() && x.count != y.count {
		e.fail("wrong-vector", n.Span, "Write both vectors with the same number of parts: %s has %d, %s has %d.",
			e.calls(n.X, "the left one"), x.count, e.calls(n.Y, "the right one"), y.count)
		return bad
	}
	if x.zero {
		return signed(n.Op, y)
	}
	if y.zero {
		return x
	}
	r := value{count: x.count, bare: x.bare && y.bare}
	for i := range x.count {
		p, q := x.parts[i], signedQuantity(n.Op, y.parts[i])
		// A written 0 inside a vector fits every dimension.
		if p.Value == 0 && p.Dimension == quantity.None && x.isVector() {
			p.Dimension = q.Dimension
		}
		if q.Value == 0 && q.Dimension == quantity.None && x.isVector() {
			q.Dimension = p.Dimension
		}
		part, err := p.Plus(q)
		if err != nil {
			return e.mismatch(n, x, y)
		}
		r.parts[i] = part
	}
	return r
}

func signed(op syntax.Operator, v value) value {
	if op == syntax.Subtract {
		return v.each(quantity.Quantity.Negated)
	}
	return v
}

func signedQuantity(op syntax.Operator, q quantity.Quantity) quantity.Quantity {
	if op == syntax.Subtract {
		return q.Negated()
	}
	return q
}

// mismatch says that two values cannot be added, and which unit is missing
// where one of them is a mere number.
func (e *evaluation) mismatch(n *syntax.BinaryNode, x, y value) value {
	left, right := e.calls(n.X, "the left side"), e.calls(n.Y, "the right side")
	missing := func(what syntax.Node, text, other string, v value) value {
		unit := e.likelyUnit(v.q().Dimension)
		f := e.fail("missing-unit", what.Place(), "Write %s with its unit: it is only a number, but %s is %s.", text, other, v.words())
		if unit != "" {
			f.fix("Write "+text+" "+unit, source.At(what.Place().End), " "+unit)
		}
		return bad
	}
	switch {
	case x.bare && !x.isVector():
		return missing(n.X, left, right, y)
	case y.bare && !y.isVector():
		return missing(n.Y, right, left, x)
	}
	word := "Add"
	if n.Op == syntax.Subtract {
		word = "Subtract"
	}
	e.fail("dimension-mismatch", n.Span, "%s only what is alike: %s is %s, %s is %s.", word, left, x.words(), right, y.words())
	return bad
}

func (e *evaluation) product(n *syntax.BinaryNode, x, y value) value {
	if x.isVector() && y.isVector() {
		e.fail("vector-operation", n.Span, "Multiply a vector by a number only: %s and %s are both vectors.", e.calls(n.X, "the left side"), e.calls(n.Y, "the right side"))
		return bad
	}
	if y.isVector() {
		x, y = y, x
	}
	k := y.q()
	r := x.each(func(q quantity.Quantity) quantity.Quantity { return q.Times(k) })
	r.bare, r.zero = x.bare && y.bare, false
	return e.sane(n, r)
}

func (e *evaluation) quotient(n *syntax.BinaryNode, x, y value) value {
	switch {
	case y.isVector():
		e.fail("vector-operation", n.Y.Place(), "Divide by a number only: %s is a vector.", e.calls(n.Y, "the divisor"))
		return bad
	case y.number() == 0:
		e.fail("division-by-zero", n.Y.Place(), "Change the divisor: %s is zero.", e.calls(n.Y, "it"))
		return bad
	}
	k := y.q()
	r := x.each(func(q quantity.Quantity) quantity.Quantity { return q.Over(k) })
	r.bare, r.zero = x.bare && y.bare, false
	return e.sane(n, r)
}

// sane refuses values that no formula has.
func (e *evaluation) sane(n *syntax.BinaryNode, v value) value {
	for i := range v.count {
		if !v.parts[i].Dimension.Sane() {
			e.fail("wrong-dimension", n.Span, "Check the units of %s: its dimension has a power beyond any formula.", e.calls(n, "this"))
			return bad
		}
	}
	if !v.finite() {
		e.fail("not-finite", n.Span, "Correct %s: it comes to a number too large to compute with.", e.calls(n, "this formula"))
		return bad
	}
	return v
}

func (e *evaluation) power(n *syntax.BinaryNode, x, y value) value {
	switch {
	case x.isVector():
		e.fail("vector-operation", n.Span, "Raise a number to a power, not a vector: %s is a vector.", e.calls(n.X, "the base"))
		return bad
	case y.isVector() || y.q().Dimension != quantity.None:
		e.fail("wrong-dimension", n.Y.Place(), "Write a plain number as the exponent: %s is %s.", e.calls(n.Y, "it"), y.words())
		return bad
	}
	exponent := y.number()
	q := quantity.Quantity{Value: math.Pow(x.number(), exponent)}
	if d := x.q().Dimension; d != quantity.None {
		dimension, ok := quantity.None, false
		if whole := math.Round(exponent); whole == exponent && math.Abs(whole) <= 100 {
			dimension, ok = d.Power(int(whole))
		} else if twice := math.Round(2 * exponent); twice == 2*exponent && math.Abs(twice) <= 100 {
			if dimension, ok = d.Root(); ok {
				dimension, ok = dimension.Power(int(twice))
			}
		}
		if !ok {
			e.fail("wrong-dimension", n.Span, "Use a whole exponent here: %s is %s, and its power %s has no meaning.", e.calls(n.X, "the base"), x.words(), e.calls(n.Y, "this"))
			return bad
		}
		q.Dimension = dimension
	}
	if math.IsNaN(q.Value) || math.IsInf(q.Value, 0) {
		e.fail("not-finite", n.Span, "Correct %s: it has no finite value.", e.calls(n, "this power"))
		return bad
	}
	r := scalar(q)
	r.bare = x.bare && y.bare
	return r
}

func (e *evaluation) vectorNode(n *syntax.VectorNode) value {
	if len(n.Parts) > 3 {
		e.fail("wrong-vector", n.Span, "Write two parts (x, z) in a plane model, three (x, y, z) in space: this vector has %d.", len(n.Parts))
		return bad
	}
	r := value{count: uint8(len(n.Parts)), bare: true}
	whole := true
	first := -1 // the first part that is no written 0
	for i, part := range n.Parts {
		v := e.node(part)
		if v.isBad() {
			whole = false
			continue
		}
		if v.isVector() {
			e.fail("vector-operation", part.Place(), "Write a number here: %s is a vector inside a vector.", e.calls(part, "this"))
			whole = false
			continue
		}
		r.parts[i] = v.q()
		r.bare = r.bare && v.bare
		if v.zero {
			continue
		}
		if first < 0 {
			first = i
			continue
		}
		if whole && v.q().Dimension != r.parts[first].Dimension {
			whole = false
			a := value{count: 1, parts: [3]quantity.Quantity{r.parts[first]}}
			switch {
			case v.bare:
				e.missingUnit(part, r.parts[first].Dimension, a.words())
			case r.parts[first].Dimension == quantity.None:
				e.missingUnit(n.Parts[first], v.q().Dimension, v.words())
			default:
				e.fail("dimension-mismatch", part.Place(), "Make the parts of the vector alike: %s is %s, %s is %s.", e.calls(n.Parts[first], "one part"), a.words(), e.calls(part, "this one"), v.words())
			}
		}
	}
	if !whole {
		return bad
	}
	for i := range r.count { // written zeros take the dimension of the others
		if first >= 0 && r.parts[i].Value == 0 && r.parts[i].Dimension == quantity.None {
			r.parts[i].Dimension = r.parts[first].Dimension
		}
	}
	return r
}
