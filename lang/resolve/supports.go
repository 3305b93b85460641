package resolve

import (
	"slices"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// freedoms are the movements of a node, in the order of the model.
var freedoms = []string{"ux", "uy", "uz", "rx", "ry", "rz"}

// inPlane tells the freedoms that a plane model has.
var inPlane = [6]bool{0: true, 2: true, 4: true}

// supportResult is what a support statement comes to.
type supportResult struct {
	node     *symbol
	freedoms [6]model.Restraint
	axes     [3][3]float64
	turned   bool
	upOnly   bool
	words    string
}

func (e *evaluation) support(tree *syntax.SupportStatement) {
	w := e.needNode(tree.Node, false)
	r := &supportResult{axes: identity}
	ok := w != nil
	var turns []*syntax.TurnedItem
	for _, item := range tree.Items {
		switch {
		case item.UpOnly:
			r.upOnly = true
		case item.Turned != nil:
			turns = append(turns, item.Turned)
		case item.Spring != nil:
			ok = e.springSupport(item.Spring, r) && ok
		case item.Word != nil:
			ok = e.restrain(item, r) && ok
		}
	}
	if len(turns) > 0 {
		turn, fine := e.turns(turns)
		ok = ok && fine
		r.turned = turn != identity
		r.axes = transposed(turn)
	}
	if e.place != nil {
		place := e.ownPlace()
		if place == nil {
			return
		}
		// Rows of axes are the support's directions in the part.
		for i := range 3 {
			r.axes[i] = place.turned(r.axes[i])
		}
		r.turned = r.axes != identity
	}
	if !ok {
		return
	}
	held := false
	for _, f := range r.freedoms {
		held = held || f.Kind != model.Free
	}
	switch {
	case !held:
		e.fail("holds-nothing", e.nameSpan(), "Say what the support holds: write support %s pinned, fixed, or holds ux uz.", tree.Node.Text)
		return
	case r.upOnly && r.freedoms[2].Kind == model.Free:
		e.fail("up-only-holds-nothing", e.nameSpan(), "Let the support hold uz: up only speaks of it, and it is free here.")
		return
	}
	r.node = w.name
	start := tree.Node.Span().End
	r.words = squeezed(e.statement.Text[min(start, len(e.statement.Text)):])
	e.out.result = r
}

// transposed returns the transpose of a rotation: its columns as rows.
func transposed(a [3][3]float64) [3][3]float64 {
	for i := range 3 {
		for j := range i {
			a[i][j], a[j][i] = a[j][i], a[i][j]
		}
	}
	return a
}

// restrain works out fixed, pinned and holds.
func (e *evaluation) restrain(item *syntax.SupportItem, r *supportResult) bool {
	hold := func(i int) {
		if !e.session.header.plane || inPlane[i] {
			r.freedoms[i] = model.Restraint{Kind: model.Held}
		}
	}
	switch item.Word.Text {
	case "fixed":
		for i := range 6 {
			hold(i)
		}
	case "pinned":
		for i := range 3 {
			hold(i)
		}
	case "holds":
		for _, n := range item.Whom {
			i := slices.Index(freedoms, n.Text)
			if i < 0 {
				e.unknownFreedom(n)
				return false
			}
			if e.session.header.plane && !inPlane[i] {
				e.fail("not-in-plane", n.Span(), "Delete %s: a plane model has ux, uz and ry only.", n.Text)
				return false
			}
			if r.freedoms[i].Kind == model.Elastic {
				e.fail("contradiction", n.Span(), "Keep one of holds %s and spring %s.", n.Text, n.Text)
				return false
			}
			hold(i)
		}
	}
	return true
}

// unknownFreedom says that a word is no freedom, and what was probably meant.
func (e *evaluation) unknownFreedom(n *syntax.Name) {
	near := nearest(n.Text, freedoms)
	if len(near) == 0 {
		e.fail("unknown-freedom", n.Span(), "Write ux, uy, uz, rx, ry or rz: %s is no movement of a node.", n.Text)
		return
	}
	e.fail("unknown-freedom", n.Span(), "Write %s: %s is no movement of a node.", either(near), n.Text).fix("Write "+near[0], n.Span(), near[0])
}

func (e *evaluation) springSupport(item *syntax.SpringItem, r *supportResult) bool {
	i := slices.Index(freedoms, item.Freedom.Text)
	if i < 0 {
		e.unknownFreedom(item.Freedom)
		return false
	}
	dimension, what := quantity.ForcePerLength, "a stiffness in force per length, such as 12 kN/mm,"
	if i >= 3 {
		dimension, what = quantity.Moment, "a stiffness in moment per angle, such as 5 MNm/rad,"
	}
	k, ok := e.scalar(item.Rate, dimension, what)
	if !ok || !e.positive(k, item.Rate, "The stiffness of a spring") {
		return false
	}
	if e.session.header.plane && !inPlane[i] {
		e.fail("not-in-plane", item.Freedom.Span(), "Delete the spring %s: a plane model has ux, uz and ry only.", item.Freedom.Text)
		return false
	}
	if r.freedoms[i].Kind == model.Held {
		// "fixed, spring ry …" softens one of the freedoms held by the word before.
		for _, t := range e.statement.Tree.(*syntax.SupportStatement).Items {
			if t.Word != nil && t.Word.Text == "holds" && slices.ContainsFunc(t.Whom, func(n *syntax.Name) bool { return n.Text == item.Freedom.Text }) {
				e.fail("contradiction", item.Freedom.Span(), "Keep one of holds %s and spring %s.", item.Freedom.Text, item.Freedom.Text)
				return false
			}
		}
	}
	if r.freedoms[i].Kind == model.Elastic {
		e.fail("given-twice", item.Freedom.Span(), "Keep one spring %s: another one stands before.", item.Freedom.Text)
		return false
	}
	r.freedoms[i] = model.Restraint{Kind: model.Elastic, Stiffness: k}
	return true
}

// massResult is what a mass statement comes to.
type massResult struct {
	node    *symbol
	mass    float64
	inertia [3]float64
}

func (e *evaluation) mass(tree *syntax.MassStatement) {
	w := e.needNode(tree.Node, false)
	r := &massResult{}
	m, ok := e.scalar(tree.Value, quantity.Mass, "a mass")
	if ok && m < 0 {
		e.fail("not-positive", tree.Value.Span, "Write a mass above zero.")
		ok = false
	}
	r.mass = m
	for _, item := range tree.Inertia {
		i := -1
		if len(item.Axis.Text) == 1 {
			i = int(item.Axis.Text[0]) - 'x'
		}
		if i < 0 || i > 2 {
			e.fail("unknown-axis", item.Axis.Span(), "Write x, y or z: %s is no axis.", item.Axis.Text)
			ok = false
			continue
		}
		v, fine := e.scalar(item.Value, quantity.MassInertia, "a moment of inertia of mass, such as 12 kg*m2,")
		if fine && v < 0 {
			e.fail("not-positive", item.Value.Span, "Write a moment of inertia above zero.")
			fine = false
		}
		ok = ok && fine
		r.inertia[i] = v
	}
	if !ok || w == nil {
		return
	}
	if r.mass == 0 && r.inertia == [3]float64{} {
		e.warn("no-effect", tree.Value.Span, "Give %s a mass, or delete this line: it adds nothing.", tree.Node.Text)
	}
	r.node = w.name
	e.out.result = r
}
