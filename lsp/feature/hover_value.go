package feature

import (
	"math"
	"strings"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// value writes a number of the text in other units. It reports whether there is
// one with a unit at the place.
func (h *hover) value() bool {
	amount, span := h.amount()
	if amount == nil {
		return false
	}
	q, ok := measured(amount)
	if !ok || q.Dimension == quantity.None && !q.Angle {
		return false
	}
	h.span = span.Shift(h.unit.Start)
	written := strings.Join(strings.Fields(h.tree.File.Slice(h.span)), " ")
	h.page.add("**" + written + "** · " + q.Words())
	if others := inUnits(q, written); len(others) > 0 {
		h.page.add("= " + strings.Join(others, " = "))
	}
	return true
}

// amount returns the number at the place together with its unit, as far as that
// goes: of 0.35 kN/m2 * bay it is 0.35 kN/m2, of (0, 3.2) m it is 3.2 m.
func (h *hover) amount() (found syntax.Node, span source.Span) {
	inside := h.offset - h.unit.Start
	h.unit.Statement.Expressions(func(x *syntax.Expression) {
		if found != nil || x.Root == nil || x.Problem != nil || !x.Span.Contains(inside) {
			return
		}
		way := wayTo(x.Root, inside)
		for i := len(way) - 1; i >= 0 && found == nil; i-- {
			if n := onlyNumber(way[i]); n != nil {
				toNumber := wayTo(x.Root, n.Span.Start)
				found, span = withUnit(n, toNumber[:len(toNumber)-1])
			}
		}
	})
	return found, span
}

// wayTo returns the nodes that hold a place, outermost first. Where two meet it
// takes the second.
func wayTo(n syntax.Node, inside int) []syntax.Node {
	var way []syntax.Node
	for n != nil {
		way = append(way, n)
		var next syntax.Node
		for _, c := range below(n) {
			if c != nil && c.Place().Contains(inside) {
				next = c
			}
		}
		n = next
	}
	return way
}

func below(n syntax.Node) []syntax.Node {
	switch n := n.(type) {
	case *syntax.UnaryNode:
		return []syntax.Node{n.X}
	case *syntax.BinaryNode:
		return []syntax.Node{n.X, n.Y}
	case *syntax.GroupNode:
		return []syntax.Node{n.X}
	case *syntax.VectorNode:
		return n.Parts
	case *syntax.CallNode:
		return n.Arguments
	}
	return nil
}

// onlyNumber returns the number of an expression of one number and units, or
// nil. Exponents do not count.
func onlyNumber(n syntax.Node) *syntax.NumberNode {
	switch n := n.(type) {
	case *syntax.NumberNode:
		return n
	case *syntax.BinaryNode:
		x := onlyNumber(n.X)
		if x != nil && n.Op != syntax.Add && n.Op != syntax.Subtract && onlyUnits(n.Y) {
			return x
		}
	}
	return nil
}

// onlyUnits reports whether an expression is made of units alone.
func onlyUnits(n syntax.Node) bool {
	switch n := n.(type) {
	case *syntax.NameNode:
		return syntax.UnitSymbol(n.Text)
	case *syntax.GroupNode:
		return onlyUnits(n.X)
	case *syntax.BinaryNode:
		if n.Op == syntax.Power {
			_, number := n.Y.(*syntax.NumberNode)
			return number && onlyUnits(n.X)
		}
		return n.Op != syntax.Add && n.Op != syntax.Subtract && onlyUnits(n.X) && onlyUnits(n.Y)
	}
	return false
}

// withUnit returns a number with the units that the expressions around it
// multiply it by, the innermost expression last.
func withUnit(n *syntax.NumberNode, around []syntax.Node) (amount syntax.Node, span source.Span) {
	amount, span = n, n.Span
	apart := false // a bracket stands between: the unit is not right behind
	for i := len(around) - 1; i >= 0; i-- {
		switch outer := around[i].(type) {
		case *syntax.VectorNode, *syntax.GroupNode:
			apart = true
		case *syntax.BinaryNode:
			number := outer.X.Place().Start <= n.Span.Start && n.Span.End <= outer.X.Place().End
			if !number || outer.Op == syntax.Add || outer.Op == syntax.Subtract || outer.Op == syntax.Power || !onlyUnits(outer.Y) {
				return amount, span
			}
			amount = &syntax.BinaryNode{Op: outer.Op, X: amount, Y: outer.Y, Span: outer.Span}
			if !apart {
				span = outer.Span
			}
		default:
			return amount, span
		}
	}
	return amount, span
}

// measured returns what a number with units comes to. Whoever points at a number
// does not wait for the values of the whole model to be worked out.
func measured(n syntax.Node) (quantity.Quantity, bool) {
	switch n := n.(type) {
	case *syntax.NumberNode:
		return quantity.Plain(n.Value), !math.IsInf(n.Value, 0)
	case *syntax.NameNode:
		u, ok := quantity.Lookup(syntax.NormalUnit(n.Text))
		return quantity.Quantity{Value: u.Factor, Dimension: u.Dimension, Angle: u.Angle}, ok
	case *syntax.GroupNode:
		return measured(n.X)
	case *syntax.BinaryNode:
		x, ok := measured(n.X)
		if !ok {
			return x, false
		}
		if n.Op == syntax.Power {
			return raised(x, n.Y)
		}
		y, ok := measured(n.Y)
		switch {
		case !ok:
			return x, false
		case n.Op == syntax.Divide:
			return x.Over(y), y.Value != 0
		case n.Op == syntax.Multiply || n.Op == syntax.Joined:
			return x.Times(y), true
		}
	}
	return quantity.Quantity{}, false
}

// raised returns a unit to a whole power: m^2.
func raised(x quantity.Quantity, exponent syntax.Node) (quantity.Quantity, bool) {
	n, ok := exponent.(*syntax.NumberNode)
	if !ok || n.Value != math.Trunc(n.Value) || math.Abs(n.Value) > 12 {
		return x, false
	}
	dimension, ok := x.Dimension.Power(int(n.Value))
	return quantity.Quantity{Value: math.Pow(x.Value, n.Value), Dimension: dimension}, ok
}

// compounds are usual units that have no symbol of their own.
var compounds = []string{"kN/m", "N/mm", "kN/mm", "kN/m2", "N/mm2", "kN/m3", "kg/m", "kg/m2", "kg/m3", "t/m3", "lb/ft", "lb/ft3", "m/s2", "ft/s2", "K/m"}

// inUnits writes a quantity in all units that give a number that people can
// read, but not as it is written already.
func inUnits(q quantity.Quantity, written string) []string {
	units := quantity.ByDimension(q.Dimension)
	if q.Angle && q.Dimension == quantity.None {
		units = quantity.Angles()
	}
	for _, c := range compounds {
		over, under, _ := strings.Cut(c, "/")
		u, first := quantity.Lookup(over)
		v, second := quantity.Lookup(under)
		if w := u.Over(v); first && second && w.Dimension == q.Dimension {
			units = append(units, w)
		}
	}
	var list []string
	for _, u := range units {
		n := math.Abs(q.Value / u.Factor)
		text := quantity.Write(q.Value, u, 5)
		if n < 1e-2 || n >= 1e7 || strings.ReplaceAll(text, "−", "-") == written {
			continue
		}
		list = append(list, text)
	}
	return list
}

// unitMeaning says what a unit is.
func (h *hover) unitMeaning(symbol string) {
	u, ok := quantity.Lookup(syntax.NormalUnit(symbol))
	if !ok {
		return
	}
	text := "**" + u.Symbol + "**"
	if u.Name != "" {
		text += " · " + u.Name
	}
	h.page.add(text + ", a unit of " + kindOf(u))
	one := quantity.Quantity{Value: u.Factor, Dimension: u.Dimension, Angle: u.Angle}
	if others := inUnits(one, "1 "+u.Symbol); len(others) > 0 {
		h.page.add("1 " + u.Symbol + " = " + strings.Join(others, " = "))
	}
}

// kindOf says what a unit measures, without an article.
func kindOf(u quantity.Unit) string {
	one := quantity.Quantity{Value: 1, Dimension: u.Dimension, Angle: u.Angle}
	words := one.Words()
	for _, article := range []string{"a ", "an "} {
		if rest, ok := strings.CutPrefix(words, article); ok {
			return rest
		}
	}
	return words
}

// let writes the value of a named value.
func (h *hover) let(d *resolve.Definition) {
	i := indexOf(h.model.Lets, fullName(d), func(l *model.Let) string { return l.Name })
	if i < 0 || len(h.model.Lets[i].Values) == 0 {
		h.page.add("**" + d.Name + "** · a value that cannot be worked out: its expression has an error.")
		return
	}
	l := &h.model.Lets[i]
	value := showAll(h.model.Display, l.Values)
	h.page.add("**" + l.Name + "** = " + value)
	if len(l.Values) == 1 {
		q := l.Values[0]
		text := q.Words()
		if others := inUnits(q, value); len(others) > 0 && (q.Dimension != quantity.None || q.Angle) {
			text += " = " + strings.Join(others, " = ")
		}
		h.page.add(text)
	}
}
