package resolve

import (
	"math"
	"slices"
	"strconv"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

func itoa(n int) string { return strconv.Itoa(n) }

// memberResult is what a member statement comes to.
type memberResult struct {
	kind        model.MemberKind
	nodes       []*fragment
	section     *symbol // nil for links and springs
	roll        float64
	sense       model.Sense
	ends        *[2]model.End // nil: rigid at both ends, without offsets
	stiffness   *[6]float64   // of a spring
	first, last [3]float64    // ends of the flexible part
	length      float64       // of the flexible part
}

func (r *memberResult) same(any) bool { return false }

// axes returns the member's axes as rows in global coordinates.
func (r *memberResult) axes() [3][3]float64 {
	return model.AxesAlong(minus(r.last, r.first), r.roll)
}

// forces are the section forces of a member, in the order of model.End.Joint.
var forces = []string{"N", "Vy", "Vz", "T", "My", "Mz"}

func (e *evaluation) member(tree *syntax.MemberStatement) {
	r := &memberResult{kind: model.MemberKind(e.kind - BeamName)}
	ok := true
	if tree.Section != nil {
		if w := e.need(tree.Section, Sections, "section", false, func(k Kind) bool { return k == SectionName }); w != nil {
			r.section = w.name
		} else {
			ok = false
		}
	}
	positions := make([][3]float64, 0, len(tree.Path))
	for i, n := range tree.Path {
		w := e.needNode(n, true)
		if w == nil {
			ok = false
			continue
		}
		if i > 0 && slices.Contains(r.nodes, w) {
			e.fail("same-node-twice", n.Span(), "End %s at another node: it comes to %s twice.", tree.Name.Text, n.Text)
			ok = false
		}
		r.nodes = append(r.nodes, w)
		p, isNode := w.result().(*nodeResult)
		if !isNode {
			ok = false
			continue
		}
		positions = append(positions, p.global)
	}
	ok = e.options(tree, r) && ok
	if !ok || len(positions) != len(tree.Path) {
		return
	}
	r.first, r.last = positions[0], positions[len(positions)-1]
	if r.ends != nil {
		r.first, r.last = plus(r.first, r.ends[0].Offset), plus(r.last, r.ends[1].Offset)
	}
	r.length = distance(r.first, r.last)
	if !e.straight(tree, r, positions) {
		return
	}
	if e.place != nil && r.kind != model.Link {
		e.carryRoll(r)
	}
	e.out.result = r
}

// straight checks that a member has a length and that its nodes lie on a line,
// in order.
func (e *evaluation) straight(tree *syntax.MemberStatement, r *memberResult, positions [][3]float64) bool {
	size := 1.0
	for _, p := range positions {
		size = max(size, math.Abs(p[0]), math.Abs(p[1]), math.Abs(p[2]))
	}
	if r.length <= tiny*size {
		e.fail("zero-length", e.nameSpan(), "Move an end of %s: its ends stand at one place, so it has no length.", tree.Name.Text).
			relate(r.nodes[0], "its first node").relate(r.nodes[len(r.nodes)-1], "its last node")
		return false
	}
	if len(positions) == 2 {
		return true
	}
	whole := minus(positions[len(positions)-1], positions[0])
	length2 := model.Dot(whole, whole)
	if length2 == 0 {
		e.fail("not-straight", e.nameSpan(), "Write a beam for each piece of %s: its first and last node stand at one place.", tree.Name.Text)
		return false
	}
	before := 0.0
	for i := 1; i < len(positions)-1; i++ {
		d := minus(positions[i], positions[0])
		along := model.Dot(d, whole) / length2
		off := distance(d, times(along, whole))
		if off > 1e-6*math.Sqrt(length2) {
			e.fail("not-straight", tree.Path[i].Span(), "Move %s onto the line, or write a beam for each piece: it stands %s beside the line from %s to %s.",
				tree.Path[i].Text, e.shown(off), tree.Path[0].Text, tree.Path[len(tree.Path)-1].Text).relate(r.nodes[i], "the node")
			return false
		}
		if along <= before || along >= 1 {
			e.fail("not-straight", tree.Path[i].Span(), "Write the nodes of %s in the order in which they stand: %s is out of turn.", tree.Name.Text, tree.Path[i].Text)
			return false
		}
		before = along
	}
	return true
}

// shown writes a length for people.
func (e *evaluation) shown(length float64) string { return showLength(length) }

// showLength writes a length in m, or in mm where it is small.
func showLength(length float64) string {
	unit := "m"
	if math.Abs(length) < 0.1 {
		unit = "mm"
	}
	u, _ := quantity.Lookup(unit)
	return quantity.Write(length, u, 3)
}

// carryRoll turns a member's section with its part: a placed part is a rigid
// body, and so the axes of its members turn as it does. Where the part is turned
// about z, and the member is not vertical, nothing changes.
func (e *evaluation) carryRoll(r *memberResult) {
	place := e.ownPlace()
	if place == nil || place.turn == identity {
		return
	}
	direction := minus(r.last, r.first)
	if model.Dot(direction, direction) == 0 {
		return
	}
	inPart := [3]float64{
		place.turn[0][0]*direction[0] + place.turn[1][0]*direction[1] + place.turn[2][0]*direction[2],
		place.turn[0][1]*direction[0] + place.turn[1][1]*direction[1] + place.turn[2][1]*direction[2],
		place.turn[0][2]*direction[0] + place.turn[1][2]*direction[1] + place.turn[2][2]*direction[2],
	}
	y := place.turned(model.AxesAlong(inPart, r.roll)[1])
	plain := model.AxesAlong(direction, 0)
	roll := math.Atan2(model.Dot(y, plain[2]), model.Dot(y, plain[1]))
	if math.Abs(roll) < 1e-12 {
		roll = 0
	}
	r.roll = roll
}

// options works out the options of a member. It returns false where one of them
// is wrong.
func (e *evaluation) options(tree *syntax.MemberStatement, r *memberResult) bool {
	ok := true
	seen := map[string]bool{}
	for _, o := range tree.Options {
		switch {
		case o.Way != "":
			ok = e.springStiffness(o, r, seen) && ok
		case o.Word == nil:
		case o.Word.Text == "hinge", o.Word.Text == "release", o.Word.Text == "joint":
			ok = e.joint(tree, o, r) && ok
		case o.Word.Text == "roll":
			ok = e.rollOption(tree, o, r, seen) && ok
		case o.Word.Text == "offset":
			ok = e.offset(tree, o, r, seen) && ok
		case o.Only:
			if r.sense != model.BothWays {
				e.fail("contradiction", o.Word.Span(), "Keep one of tension only and compression only: %s cannot be both.", tree.Name.Text)
				ok = false
			}
			r.sense = model.TensionOnly
			if o.Word.Text == "compression" {
				r.sense = model.CompressionOnly
			}
		}
	}
	if r.ends != nil {
		free := func(end int, force int) bool { return r.ends[end].Joint[force].Kind == model.Released }
		switch {
		case r.kind == model.Beam && free(0, 3) && free(1, 3):
			e.fail("spins-freely", e.nameSpan(), "Keep the torsion T of %s at one end: released at both, it turns about its own axis.", tree.Name.Text)
			ok = false
		case free(0, 0) && free(1, 0):
			e.fail("slides-freely", e.nameSpan(), "Keep the axial force N of %s at one end: released at both, it slides along itself.", tree.Name.Text)
			ok = false
		case free(0, 1) && free(1, 1), free(0, 2) && free(1, 2):
			e.fail("slides-freely", e.nameSpan(), "Keep the shear force of %s at one end: released at both, it slides across itself.", tree.Name.Text)
			ok = false
		}
	}
	return ok
}

// end returns which end of the member a node is, and complains where it is
// none.
func (e *evaluation) end(tree *syntax.MemberStatement, n *syntax.Name) (int, bool) {
	switch n.Text {
	case tree.Path[0].Text:
		e.find(Structure, n.Text, n.Span(), false)
		return 0, true
	case tree.Path[len(tree.Path)-1].Text:
		e.find(Structure, n.Text, n.Span(), false)
		return 1, true
	}
	first, last := tree.Path[0].Text, tree.Path[len(tree.Path)-1].Text
	if w := e.find(Structure, n.Text, n.Span(), false); w == nil {
		e.unknown(Structure, "node", n.Text, n.Span())
		return 0, false
	}
	e.fail("not-an-end", n.Span(), "Write %s or %s here: %s is no end of %s.", first, last, n.Text, tree.Name.Text)
	return 0, false
}

func (r *memberResult) end(i int) *model.End {
	if r.ends == nil {
		r.ends = new([2]model.End)
	}
	return &r.ends[i]
}

// joint works out a hinge, release or semi-rigid joint.
func (e *evaluation) joint(tree *syntax.MemberStatement, o *syntax.MemberOption, r *memberResult) bool {
	if o.At == nil {
		return false
	}
	end, ok := e.end(tree, o.At)
	if !ok {
		return false
	}
	if r.kind == model.Bar {
		e.warn("no-effect", o.Word.Span(), "Delete this %s: a bar has hinges at both ends anyway.", o.Word.Text)
		return true
	}
	set := func(force int, j model.Joint) {
		r.end(end).Joint[force] = j
	}
	if o.Word.Text == "hinge" {
		set(4, model.Joint{Kind: model.Released})
		if !e.session.header.plane {
			set(5, model.Joint{Kind: model.Released})
		}
		return true
	}
	j := model.Joint{Kind: model.Released}
	for _, w := range o.Whom {
		force := slices.Index(forces, w.Text)
		if force < 0 {
			e.fail("unknown-force", w.Span(), "Write N, Vy, Vz, T, My or Mz: %s is no force of a member.", w.Text)
			return false
		}
		if e.session.header.plane && (force == 1 || force == 3 || force == 5) {
			e.warn("no-effect", w.Span(), "Delete %s: a plane model has N, Vz and My only.", w.Text)
			continue
		}
		if o.Word.Text == "joint" {
			dimension, what := quantity.ForcePerLength, "a stiffness in force per length"
			if force >= 3 {
				dimension, what = quantity.Moment, "a stiffness in moment per angle, such as 12 MNm/rad,"
			}
			k, fine := e.scalar(o.Value, dimension, what)
			if !fine || !e.positive(k, o.Value, "The stiffness of a joint") {
				return false
			}
			j = model.Joint{Kind: model.SemiRigid, Stiffness: k}
		}
		set(force, j)
	}
	return true
}

// positive checks that a value is above zero.
func (e *evaluation) positive(v float64, x *syntax.Expression, what string) bool {
	if v > 0 {
		return true
	}
	e.fail("not-positive", x.Span, "Write a value above zero: %s comes to %s here.", lowerFirst(what), quantity.Number(v, 3))
	return false
}

func lowerFirst(s string) string {
	if s == "" {
		return s
	}
	c := s[0]
	if 'A' <= c && c <= 'Z' {
		c += 'a' - 'A'
	}
	return string(c) + s[1:]
}

func (e *evaluation) rollOption(tree *syntax.MemberStatement, o *syntax.MemberOption, r *memberResult, seen map[string]bool) bool {
	if o.Value == nil {
		return false
	}
	if seen["roll"] {
		e.fail("given-twice", o.Word.Span(), "Keep one roll: %s has another one before.", tree.Name.Text)
		return false
	}
	seen["roll"] = true
	angle, ok := e.angle(o.Value)
	if !ok {
		return false
	}
	quarters := angle / (math.Pi / 2)
	if e.session.header.plane && math.Abs(quarters-math.Round(quarters)) > 1e-9 {
		e.fail("not-in-plane", o.Value.Span, "Roll by a whole quarter turn, or make the model one in space: %s would move out of its plane.", tree.Name.Text)
		return false
	}
	r.roll = angle
	return true
}

func (e *evaluation) offset(tree *syntax.MemberStatement, o *syntax.MemberOption, r *memberResult, seen map[string]bool) bool {
	node := o.At
	if node == nil && len(o.Whom) == 1 {
		node = o.Whom[0]
	}
	if node == nil || o.Value == nil {
		e.fail("incomplete-option", o.Word.Span(), "Say at which node and how far the member's end is off it: write offset %s (0, 0, -0.2) m.", tree.Path[0].Text)
		return false
	}
	end, ok := e.end(tree, node)
	if !ok {
		return false
	}
	if seen["offset"+node.Text] {
		e.fail("given-twice", o.Word.Span(), "Keep one offset at %s: %s has another one before.", node.Text, tree.Name.Text)
		return false
	}
	seen["offset"+node.Text] = true
	v, ok := e.vector(o.Value, quantity.Length, "an offset")
	if !ok {
		return false
	}
	if e.place != nil {
		place := e.ownPlace()
		if place == nil {
			return false
		}
		v = place.turned(v)
	}
	r.end(end).Offset = v
	return true
}

// springStiffness works out one stiffness of a spring.
func (e *evaluation) springStiffness(o *syntax.MemberOption, r *memberResult, seen map[string]bool) bool {
	index, dimension, what := 0, quantity.ForcePerLength, "a stiffness in force per length, such as 12 kN/mm,"
	axis := "x"
	if o.Axis != nil {
		axis = o.Axis.Text
	}
	index = int(axis[0] - 'x')
	if o.Way == "about" {
		index += 3
		dimension, what = quantity.Moment, "a stiffness in moment per angle, such as 5 MNm/rad,"
	}
	if index < 0 || index > 5 || len(axis) != 1 {
		e.fail("unknown-axis", o.Axis.Span(), "Write x, y or z: %s is no axis.", axis)
		return false
	}
	key := o.Way + axis
	if seen[key] {
		e.fail("given-twice", o.Rate.Span, "Keep one stiffness %s %s: another one stands before.", o.Way, axis)
		return false
	}
	seen[key] = true
	k, ok := e.scalar(o.Rate, dimension, what)
	if !ok || !e.positive(k, o.Rate, "The stiffness of a spring") {
		return false
	}
	if e.session.header.plane && (index == 1 || index == 3 || index == 5) {
		e.warn("no-effect", o.Rate.Span, "Delete the stiffness %s %s: a plane model has none.", o.Way, axis)
		return true
	}
	if r.stiffness == nil {
		r.stiffness = new([6]float64)
	}
	r.stiffness[index] = k
	return true
}

// groupResult is the members of a group, in the order written.
type groupResult struct{ members []*fragment }

func (r *groupResult) same(other any) bool {
	o, ok := other.(*groupResult)
	return ok && slices.Equal(o.members, r.members)
}

func (e *evaluation) group(tree *syntax.GroupStatement) {
	r := &groupResult{}
	seen := map[*fragment]bool{}
	for _, n := range tree.Members {
		w := e.need(n, Structure, "member or group", true, func(k Kind) bool { return k.Member() || k == GroupName })
		if w == nil {
			continue
		}
		list := []*fragment{w}
		if g, ok := w.result().(*groupResult); ok {
			list = g.members
		}
		for _, m := range list {
			if m.kind.Member() && !seen[m] {
				seen[m] = true
				r.members = append(r.members, m)
			}
		}
	}
	e.out.result = r
}
