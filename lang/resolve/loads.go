package resolve

import (
	"math"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// loadResult is what a load line comes to: one load for each thing it names.
type loadResult struct {
	loads []loadItem
	// group is what self-weight is limited to, or nil.
	group *symbol
	// atNode is the place of the settlement's amount, for the check that the node
	// is held.
	amount source.Span
}

// loadItem is a load with the node or member that it acts on.
type loadItem struct {
	target *symbol // nil for self-weight
	load   model.Load
}

func (e *evaluation) selfWeight(tree *syntax.SelfWeightLine) {
	r := &loadResult{}
	load := model.Load{Kind: model.SelfWeight, Node: -1, Member: -1, Amount: 1}
	if tree.Factor != nil {
		k, ok := e.scalar(tree.Factor, quantity.None, "a plain number as the factor of self-weight")
		if !ok {
			return
		}
		if k == 0 {
			e.warn("no-effect", tree.Factor.Span, "Give self-weight a factor, or delete this line: zero times it is nothing.")
		}
		load.Amount = k
	}
	if tree.Group != nil {
		w := e.need(tree.Group, Structure, "group or member", false, func(k Kind) bool { return k == GroupName || k.Member() })
		if w == nil {
			return
		}
		r.group = w.name
	}
	if !e.inGoodCase() {
		return
	}
	r.loads = []loadItem{{load: load}}
	e.out.result = r
}

// inGoodCase notes the case that the line stands in and reports whether it can
// take loads.
func (e *evaluation) inGoodCase() bool { return e.owner != nil }

func (e *evaluation) load(tree *syntax.LoadLine) {
	r := &loadResult{}
	if tree.Amount != nil {
		r.amount = tree.Amount.Span
	}
	var targets []*fragment
	ok := true
	for _, n := range tree.Who {
		w := e.need(n, Structure, "node or member", true, func(k Kind) bool { return k.Member() || k == NodeName || k == GroupName })
		switch {
		case w == nil:
			ok = false
		case w.kind == GroupName:
			if g, isGroup := w.result().(*groupResult); isGroup {
				targets = append(targets, g.members...)
			}
		default:
			targets = append(targets, w)
		}
	}
	l := &loading{evaluation: e, tree: tree}
	if !l.read() {
		return
	}
	for _, w := range targets {
		before := len(e.out.findings)
		if load, fine := l.on(w); fine {
			r.loads = append(r.loads, loadItem{w.name, load})
		}
		if len(e.out.findings) > before {
			break // one mistake, one message, however many things the line names
		}
	}
	if !ok && len(r.loads) == 0 {
		return
	}
	if e.inGoodCase() {
		e.out.result = r
	}
}

// loading is the work on one load line.
type loading struct {
	*evaluation
	tree       *syntax.LoadLine
	amount     value
	until      value      // the second amount of a linear change; count 0 where there is none
	way        [3]float64 // unit vector
	axes       model.Axes
	hasWay     bool
	about      bool
	across     int // 1: y, 2: z, 0: none
	pretension bool
	projected  string // plan, elevation or ""
	waySpan    source.Span
	vertical   bool // down or up, or along the global z
}

// read works out what does not depend on what is loaded: amounts and direction.
// It returns false where something is wrong.
func (l *loading) read() bool {
	l.amount = l.value(l.tree.Amount)
	ok := !l.amount.isBad()
	if l.tree.To != nil {
		l.until = l.value(l.tree.To)
		ok = ok && !l.until.isBad()
	}
	for _, m := range l.tree.How {
		ok = l.modifier(m) && ok
	}
	if !ok {
		return false
	}
	if l.amount.isVector() || l.until.isVector() {
		l.fail("wrong-dimension", l.tree.Amount.Span, "Write the amount as one number and its direction behind it, such as 3 kN along (1, 0, 1).")
		return false
	}
	if l.tree.To != nil && l.until.q().Dimension != l.amount.q().Dimension && !l.until.zero && !l.amount.zero {
		l.fail("dimension-mismatch", l.tree.To.Span, "Make both ends of the load alike: %s is %s, %s is %s.",
			l.calls(l.tree.Amount.Root, "the first"), l.amount.words(), l.calls(l.tree.To.Root, "the second"), l.until.words())
		return false
	}
	return true
}

func (l *loading) setWay(v [3]float64, axes model.Axes, about bool, span source.Span) bool {
	if l.hasWay {
		l.fail("given-twice", span, "Keep one direction: another one stands before.")
		return false
	}
	l.way, l.axes, l.about, l.hasWay, l.waySpan = v, axes, about, true, span
	return true
}

// modifier works out one word on how the load acts.
func (l *loading) modifier(m *syntax.LoadModifier) bool {
	word := func(text string) source.Span {
		return source.Span{Start: m.Pos.Offset, End: m.Pos.Offset + len(text)}
	}
	switch {
	case m.Down:
		l.vertical = true
		return l.setWay([3]float64{0, 0, -1}, model.Global, false, word("down"))
	case m.Up:
		l.vertical = true
		return l.setWay([3]float64{0, 0, 1}, model.Global, false, word("up"))
	case m.Along != nil:
		return l.directionOf(m.Along, false, word("along"))
	case m.About != nil:
		return l.directionOf(m.About, true, word("about"))
	case m.On != nil:
		if m.On.Text != "plan" && m.On.Text != "elevation" {
			l.fail("does-not-fit", m.On.Span(), "Write on plan or on elevation: %s is neither.", m.On.Text)
			return false
		}
		l.projected = m.On.Text
	case m.Across != nil:
		switch m.Across.Text {
		case "y":
			l.across = 1
		case "z":
			l.across = 2
		default:
			l.fail("unknown-axis", m.Across.Span(), "Write across y or across z: %s is neither.", m.Across.Text)
			return false
		}
	case m.Word != nil:
		if m.Word.Text != "pretension" {
			return l.unknownModifier(m.Word)
		}
		l.pretension = true
	}
	return true
}

// modifierWords are the words that may stand behind a load's amount.
var modifierWords = []string{"down", "up", "along", "about", "across", "on", "pretension"}

func (l *loading) unknownModifier(n *syntax.Name) bool {
	near := nearest(n.Text, modifierWords)
	if len(near) > 0 {
		l.fail("unknown-direction", n.Span(), "Did you mean %s? %s says nothing about a load.", either(near), n.Text).fix("Write "+near[0], n.Span(), near[0])
		return false
	}
	l.fail("unknown-direction", n.Span(), "Write how the load acts: down, up, along x, about y, on plan or pretension. %s is none of them.", n.Text)
	return false
}

// directionOf works out a direction: an axis or a vector.
func (l *loading) directionOf(d *syntax.Direction, about bool, word source.Span) bool {
	span := source.Span{Start: word.Start, End: max(word.End, d.Pos.Offset)}
	axes := model.Global
	if d.Local {
		axes = model.Local
	}
	var v [3]float64
	if d.Vector != nil {
		span.End = d.Vector.Span.End
		vector, ok := l.vector(d.Vector, quantity.None, "a direction")
		if !ok {
			return false
		}
		size := math.Sqrt(model.Dot(vector, vector))
		if size == 0 {
			l.fail("zero-direction", d.Vector.Span, "Give the direction a length: all its parts are zero.")
			return false
		}
		v = times(1/size, vector)
	} else {
		span.End = len(l.statement.Text)
		if i := axisEnd(l.statement.Text, d.Pos.Offset, d.Axis); i > 0 {
			span.End = i
		}
		v[d.Axis[0]-'x'] = 1
		if d.Minus {
			v = times(-1, v)
		}
	}
	if axes == model.Global && l.place != nil {
		place := l.ownPlace()
		if place == nil {
			return false
		}
		v = place.turned(v)
	}
	if axes == model.Global {
		l.vertical = !about && math.Hypot(v[0], v[1]) < 1e-9
	}
	return l.setWay(v, axes, about, span)
}

// axisEnd returns the offset behind the axis letter of a direction.
func axisEnd(text string, from int, axis string) int {
	for i := from; i < len(text); i++ {
		if text[i] == axis[0] && (i == 0 || text[i-1] == ' ' || text[i-1] == '-' || text[i-1] == '\t' || text[i-1] >= 0x80) {
			return i + 1
		}
	}
	return 0
}

// on works out the load on one node or member.
func (l *loading) on(w *fragment) (model.Load, bool) {
	load := model.Load{Node: -1, Member: -1, Axes: l.axes}
	if w.kind == NodeName {
		return l.onNode(w, load)
	}
	r, ok := w.result().(*memberResult)
	if !ok {
		return load, false
	}
	if r.kind == model.Link || r.kind == model.Spring {
		l.fail("load-on-link", l.who(w), "Load the nodes of %s instead: a %s takes no load of its own.", w.name.name, r.kind)
		return load, false
	}
	return l.onMember(w, r, load)
}

// who returns the place of a target in the line: where it is named, or all of
// the targets for a group.
func (l *loading) who(w *fragment) source.Span {
	for _, n := range l.tree.Who {
		if w.name != nil && n.Text == w.name.name {
			return n.Span()
		}
	}
	return l.tree.Who[0].Span()
}

func (l *loading) onNode(w *fragment, load model.Load) (model.Load, bool) {
	if l.tree.At != nil || l.tree.From != nil {
		x := l.tree.At
		if x == nil {
			x = l.tree.From
		}
		l.fail("does-not-fit", x.Span, "Leave the place out: %s is a node, and the load acts right there.", w.name.name)
		return load, false
	}
	if l.tree.To != nil {
		l.fail("does-not-fit", l.tree.To.Span, "Write one amount: a load on a node does not change along it.")
		return load, false
	}
	if l.projected != "" || l.pretension || l.across != 0 {
		l.fail("does-not-fit", l.tree.Amount.Span, "Write a force or moment with its direction: on plan, on elevation, across and pretension are for members, and %s is a node.", w.name.name)
		return load, false
	}
	q := l.amount.q()
	switch {
	case l.amount.bare && !q.Angle:
		l.missingUnit(l.tree.Amount.Root, quantity.Force, "a force on the node "+w.name.name)
		return load, false
	case q.Dimension == quantity.Force:
		load.Kind = model.NodeForce
	case q.Dimension == quantity.Moment:
		load.Kind = model.NodeMoment
	case q.Dimension == quantity.Length:
		load.Kind = model.NodeMove
	case q.Dimension == quantity.None && q.Angle:
		load.Kind = model.NodeTurn
	case q.Dimension == quantity.ForcePerLength:
		l.fail("line-load-on-node", l.tree.Amount.Span, "Write a force such as 3 kN, or put the load on a member: %s is a node, and %s is a force per length.", w.name.name, l.calls(l.tree.Amount.Root, "this"))
		return load, false
	default:
		l.fail("wrong-dimension", l.tree.Amount.Span, "Write a force, a moment or a settlement on the node %s: %s is %s.", w.name.name, l.calls(l.tree.Amount.Root, "this"), l.amount.words())
		return load, false
	}
	turning := load.Kind == model.NodeMoment || load.Kind == model.NodeTurn
	if !l.needsWay(turning) {
		return load, false
	}
	if l.axes == model.Local {
		l.fail("does-not-fit", l.waySpan, "Write a global direction: the node %s has no axes of its own.", w.name.name)
		return load, false
	}
	if !l.stays(l.way, turning) {
		return load, false
	}
	load.Start = times(q.Value, l.way)
	load.End = load.Start
	l.zeroAmount()
	l.plausibleLoad(load.Kind, q.Value)
	return load, true
}

// needsWay checks that there is a direction, and one of the right sort.
func (l *loading) needsWay(turning bool) bool {
	amount := l.calls(l.tree.Amount.Root, "this")
	end := source.At(l.tree.Amount.Span.End)
	if l.tree.To != nil {
		end = source.At(l.tree.To.Span.End)
	}
	switch {
	case !l.hasWay && turning:
		l.fail("load-needs-direction", l.tree.Amount.Span, "Say about which axis %s turns: write about y behind it.", amount).fix("Add about y", end, " about y")
	case !l.hasWay:
		l.fail("load-needs-direction", l.tree.Amount.Span, "Say which way %s acts: write down, up or along x behind it.", amount).
			fix("Add down", end, " down").fix("Add along x", end, " along x")
	case turning && !l.about:
		l.fail("wrong-direction", l.waySpan, "Write about y, or another axis: %s is %s, which acts about an axis.", amount, l.amount.words())
	case !turning && l.about:
		l.fail("wrong-direction", l.waySpan, "Write down, up or along x: %s is %s, which acts along a line.", amount, l.amount.words())
	default:
		return true
	}
	return false
}

// stays checks that a global direction lies in the plane of a plane model.
func (l *loading) stays(way [3]float64, turning bool) bool {
	if !l.session.header.plane {
		return true
	}
	switch {
	case turning && math.Hypot(way[0], way[2]) > 1e-9:
		l.fail("not-in-plane", l.waySpan, "Write about y: a plane model turns about y only.")
	case !turning && math.Abs(way[1]) > 1e-9:
		l.fail("not-in-plane", l.waySpan, "Write a direction in the plane, such as down or along x: this one points out of it.")
	default:
		return true
	}
	return false
}

// zeroAmount says that a load does nothing.
func (l *loading) zeroAmount() {
	if l.amount.number() == 0 && (l.until.isBad() || l.until.number() == 0) {
		l.warn("no-effect", l.tree.Amount.Span, "Give the load an amount, or delete this line: %s does nothing.", l.calls(l.tree.Amount.Root, "zero"))
	}
}
