package resolve

import (
	"math"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// identity leaves vectors as they are.
var identity = [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}

// placeResult is where a part stands: a point p of the part stands at
// turn·p + at, outer places included.
type placeResult struct {
	turn [3][3]float64
	at   [3]float64
}

func (r *placeResult) same(other any) bool {
	o, ok := other.(*placeResult)
	return ok && *o == *r
}

// turned returns a direction of the part in global axes.
func (r *placeResult) turned(v [3]float64) [3]float64 {
	return [3]float64{model.Dot(r.turn[0], v), model.Dot(r.turn[1], v), model.Dot(r.turn[2], v)}
}

// global returns a point of the part in global axes.
func (r *placeResult) global(p [3]float64) [3]float64 { return plus(r.turned(p), r.at) }

// local returns a global point in the axes of the part.
func (r *placeResult) local(g [3]float64) [3]float64 {
	d := minus(g, r.at)
	var p [3]float64
	for i := range 3 {
		p[i] = r.turn[0][i]*d[0] + r.turn[1][i]*d[1] + r.turn[2][i]*d[2]
	}
	return p
}

// turnAbout returns the rotation by an angle about a global axis, by the
// right-hand rule. Quarter turns are exact.
func turnAbout(axis int, angle float64) [3][3]float64 {
	s, c := math.Sincos(angle)
	if quarter := angle / (math.Pi / 2); math.Abs(quarter-math.Round(quarter)) < 1e-12 {
		s, c = math.Round(s), math.Round(c)
	}
	j, k := (axis+1)%3, (axis+2)%3
	r := identity
	r[j][j], r[j][k] = c, -s
	r[k][j], r[k][k] = s, c
	return r
}

// product returns the rotation b followed by a.
func product(a, b [3][3]float64) [3][3]float64 {
	var r [3][3]float64
	for i := range 3 {
		for j := range 3 {
			for k := range 3 {
				r[i][j] += a[i][k] * b[k][j]
			}
		}
	}
	return r
}

// turns works out the rotations of a support or place, one after the other about
// the global axes. ok is false where one of them is wrong.
func (e *evaluation) turns(items []*syntax.TurnedItem) (turn [3][3]float64, ok bool) {
	turn, ok = identity, true
	for _, t := range items {
		angle, fine := e.angle(t.Angle)
		axis := 1
		switch {
		case t.Axis == nil && !e.session.header.plane:
			e.fail("missing-axis", t.Angle.Span, "Say about which axis it turns: write turned %s about z, or x or y.", e.calls(t.Angle.Root, "30 deg"))
			fine = false
		case t.Axis == nil:
		case t.Axis.Text == "x", t.Axis.Text == "y", t.Axis.Text == "z":
			axis = int(t.Axis.Text[0] - 'x')
			if e.session.header.plane && axis != 1 {
				e.fail("not-in-plane", t.Axis.Span(), "Turn about y only: a plane model lies in x–z.")
				fine = false
			}
		default:
			e.fail("unknown-axis", t.Axis.Span(), "Write x, y or z: %s is no axis.", t.Axis.Text)
			fine = false
		}
		ok = ok && fine
		if fine {
			turn = product(turnAbout(axis, angle), turn)
		}
	}
	return turn, ok
}

// part checks the opening line of a part.
func (e *evaluation) part(tree *syntax.PartStatement) {
	seen := map[string]bool{}
	for _, p := range tree.Parameters {
		e.checkDeclared(p, ParameterName)
		if seen[p.Text] {
			e.fail("duplicate-name", p.Span(), "Rename this parameter: the part has another one called %s.", p.Text)
		}
		seen[p.Text] = true
	}
}

func (e *evaluation) placeStatement(tree *syntax.PlaceStatement) {
	part := e.find(Parts, tree.Part.Text, tree.Part.Span(), true)
	switch {
	case part == nil:
		e.unknown(Parts, "part", tree.Part.Text, tree.Part.Span())
		return
	case e.expansion == placesItself:
		e.fail("part-in-itself", tree.Part.Span(), "Place another part here: %s would hold itself without end.", tree.Part.Text).relate(part, "the part")
		return
	case e.expansion == overBudget:
		e.fail("too-much-placed", tree.Part.Span(), "Place fewer parts: all placed parts together come to more than %d lines.", maxPlaced)
		return
	}
	if opening, ok := part.statement.Tree.(*syntax.PartStatement); ok && len(opening.Parameters) != len(tree.Values) && !part.statement.Broken() {
		var names []string
		for _, p := range opening.Parameters {
			names = append(names, p.Text)
		}
		form := tree.Part.Text
		if len(names) > 0 {
			form += "("
			for i, n := range names {
				if i > 0 {
					form += ", "
				}
				form += n
			}
			form += ")"
		}
		e.fail("wrong-arguments", tree.Part.Span(), "Write %s with a value for each: %s and %s stand here.", form, countWords(len(tree.Values), "value"), countWords(len(opening.Parameters), "parameter")).
			relate(part, "the part")
	}
	r := &placeResult{turn: identity}
	ok := true
	if tree.At != nil {
		r.at, ok = e.vector(tree.At, quantity.Length, "a position")
	}
	turn, fine := e.turns(tree.Turned)
	if !ok || !fine {
		return
	}
	r.turn = turn
	if e.fragment.place != nil {
		outer := e.ownPlace()
		if outer == nil {
			return
		}
		r.at = outer.global(r.at)
		r.turn = product(outer.turn, r.turn)
	}
	e.out.result = r
}

// countWords returns "no values", "1 value", "2 values".
func countWords(n int, what string) string {
	switch n {
	case 0:
		return "no " + what + "s"
	case 1:
		return "1 " + what
	}
	return itoa(n) + " " + what + "s"
}

// parameterValue works out the value that a place gives to a parameter.
func (e *evaluation) parameterValue() {
	tree, ok := e.statement.Tree.(*syntax.PlaceStatement)
	if !ok || e.parameter >= len(tree.Values) {
		return // a part that nothing places, or a value that is missing, as reported there
	}
	if v := e.value(tree.Values[e.parameter]); !v.isBad() {
		v.bare, v.zero = false, false
		e.out.result = &letResult{v}
	}
}
