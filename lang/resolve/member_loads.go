package resolve

import (
	"math"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// onMember works out the load on one member, by its unit.
func (l *loading) onMember(w *fragment, r *memberResult, load model.Load) (model.Load, bool) {
	name := w.name.name
	q := l.amount.q()
	amount := l.calls(l.tree.Amount.Root, "this")
	switch {
	case l.amount.bare && l.amount.number() != 0, l.amount.bare && l.until.bare:
		want, what := quantity.ForcePerLength, "a line load on "+name
		if l.tree.At != nil {
			want, what = quantity.Force, "a point load on "+name
		}
		l.missingUnit(l.tree.Amount.Root, want, what)
		return load, false
	}
	if l.amount.zero && !l.until.isBad() {
		q.Dimension = l.until.q().Dimension
	}
	switch q.Dimension {
	case quantity.Force:
		switch {
		case l.pretension:
			return l.whole(w, r, load, model.Pretension, q.Value)
		case l.tree.At != nil:
			return l.point(w, r, load, model.PointForce)
		case l.about:
			return l.line(w, r, load, model.LineMoment)
		}
		f := l.fail("load-needs-place", l.tree.Amount.Span, "Write %s at 2 m: …, or %s/m for a line load: %s is a force, which acts on a member at a point.", name, amount, amount)
		f.fix("Make it a line load", source.At(l.tree.Amount.Span.End), "/m")
		f.fix("Put it at the middle", source.At(l.lastWho().Span().End), " at length/2")
		return load, false
	case quantity.Moment:
		if l.tree.At == nil {
			l.fail("load-needs-place", l.tree.Amount.Span, "Write %s at 2 m: …, or %s/m for a moment spread along it: a moment acts on a member at a point.", name, amount).
				fix("Put it at the middle", source.At(l.lastWho().Span().End), " at length/2")
			return load, false
		}
		return l.point(w, r, load, model.PointMoment)
	case quantity.ForcePerLength:
		if l.tree.At != nil {
			l.fail("place-of-line-load", l.tree.At.Span, "Write from … to …, or a force such as 3 kN: %s is a force per length and does not act at one point.", amount)
			return load, false
		}
		return l.line(w, r, load, model.LineForce)
	case quantity.Stress:
		l.fail("load-needs-width", l.tree.Amount.Span, "Multiply %s by the width that %s carries, such as %s * 5 m: it is a force per area.", amount, name, amount).
			fix("Multiply by a width of 1 m", source.At(l.tree.Amount.Span.End), " * 1 m")
		return load, false
	case quantity.Temperature:
		if l.across != 0 {
			return l.faces(w, r, load, q.Value)
		}
		return l.whole(w, r, load, model.Warming, q.Value)
	case quantity.TemperaturePerLength:
		if l.across == 0 {
			l.fail("load-needs-direction", l.tree.Amount.Span, "Say across which axis the temperature changes: write across z or across y behind it.").
				fix("Add across z", source.At(l.tree.Amount.Span.End), " across z")
			return load, false
		}
		return l.gradient(w, r, load, q.Value)
	case quantity.Length:
		if l.hasWay {
			l.fail("does-not-fit", l.waySpan, "Leave the direction out, or put the settlement on a node: on the member %s, %s is a lack of fit along it.", name, amount)
			return load, false
		}
		return l.whole(w, r, load, model.LackOfFit, q.Value)
	}
	l.fail("wrong-dimension", l.tree.Amount.Span, "Write a force per length on %s, such as 3 kN/m, or another load: %s is %s.", name, amount, l.amount.words())
	return load, false
}

// whole is a load that acts along the whole member, without a place and a
// direction.
func (l *loading) whole(w *fragment, r *memberResult, load model.Load, kind model.LoadKind, amount float64) (model.Load, bool) {
	switch {
	case l.tree.At != nil, l.tree.From != nil:
		x := l.tree.At
		if x == nil {
			x = l.tree.From
		}
		l.fail("does-not-fit", x.Span, "Leave the place out: this acts along all of %s.", w.name.name)
		return load, false
	case l.tree.To != nil:
		l.fail("does-not-fit", l.tree.To.Span, "Write one amount: this is the same along all of %s.", w.name.name)
		return load, false
	case l.hasWay:
		l.fail("does-not-fit", l.waySpan, "Leave the direction out: this acts along %s.", w.name.name)
		return load, false
	case l.projected != "", l.pretension && kind != model.Pretension, l.across != 0 && kind != model.Gradient:
		l.fail("does-not-fit", l.tree.Amount.Span, "Leave out what stands behind %s: it says nothing about %s.", l.calls(l.tree.Amount.Root, "the amount"), l.amount.words())
		return load, false
	}
	load.Kind, load.Amount, load.Axes = kind, amount, model.Local
	l.zeroAmount()
	l.plausibleWhole(kind, amount, r)
	return load, true
}

// faces is a difference of temperature between the faces of the section, whose
// depth is known only when the model is put together: Amount holds the
// difference and From marks it so until then.
func (l *loading) faces(w *fragment, r *memberResult, load model.Load, difference float64) (model.Load, bool) {
	load, ok := l.gradient(w, r, load, difference)
	load.From = facesMark
	return load, ok
}

// facesMark marks a gradient that is still to be divided by the section's depth
// or width.
const facesMark = -1

func (l *loading) gradient(w *fragment, r *memberResult, load model.Load, amount float64) (model.Load, bool) {
	if r.kind == model.Bar {
		l.fail("bends-a-bar", l.tree.Amount.Span, "Make %s a beam, or leave this out: a bar does not bend, and a difference between its faces does nothing.", w.name.name)
		return load, false
	}
	if l.session.header.plane {
		axis := model.AxesAlong(minus(r.last, r.first), r.roll)[l.across]
		if math.Abs(axis[1]) > 1e-9 {
			l.fail("not-in-plane", l.tree.Amount.Span, "Write across %s: the other axis points out of the plane.", [...]string{"", "z", "y"}[l.across])
			return load, false
		}
	}
	load.Axis = l.across
	return l.whole(w, r, load, model.Gradient, amount)
}

// point is a point load or moment at a place along the member.
func (l *loading) point(w *fragment, r *memberResult, load model.Load, kind model.LoadKind) (model.Load, bool) {
	if l.tree.To != nil {
		l.fail("does-not-fit", l.tree.To.Span, "Write one amount: a load at a point does not change along %s.", w.name.name)
		return load, false
	}
	if !l.directed(w, r, kind) {
		return load, false
	}
	at, ok := l.position(l.tree.At, w, r)
	if !ok {
		return load, false
	}
	load.Kind, load.From, load.To = kind, at, at
	load.Start = times(l.amount.number(), l.way)
	load.End = load.Start
	if l.projected != "" {
		l.fail("does-not-fit", l.tree.Amount.Span, "Leave out on %s: it is for line loads, and %s is %s.", l.projected, l.calls(l.tree.Amount.Root, "this"), l.amount.words())
		return load, false
	}
	l.zeroAmount()
	l.plausibleLoad(kind, l.amount.number())
	return load, true
}

// directed checks the direction of a load on a member.
func (l *loading) directed(w *fragment, r *memberResult, kind model.LoadKind) bool {
	turning := kind == model.PointMoment || kind == model.LineMoment
	if !l.needsWay(turning) {
		return false
	}
	if turning && r.kind == model.Bar {
		l.fail("bends-a-bar", l.tree.Amount.Span, "Make %s a beam, or put the moment on a node: a bar takes no moment.", w.name.name)
		return false
	}
	way := l.way
	if l.axes == model.Local {
		axes := r.axes()
		way = [3]float64{}
		for i := range 3 {
			way = plus(way, times(l.way[i], axes[i]))
		}
	}
	return l.stays(way, turning)
}

// line is a load spread along the member or a piece of it.
func (l *loading) line(w *fragment, r *memberResult, load model.Load, kind model.LoadKind) (model.Load, bool) {
	if !l.directed(w, r, kind) {
		return load, false
	}
	load.Kind, load.From, load.To = kind, 0, r.length
	if l.tree.From != nil {
		from, ok := l.position(l.tree.From, w, r)
		if !ok {
			return load, false
		}
		to, ok := l.position(l.tree.Until, w, r)
		if !ok {
			return load, false
		}
		if to <= from {
			l.fail("load-runs-backward", l.tree.Until.Span, "Write a place behind %s: positions run from the first node of %s to the last.", l.calls(l.tree.From.Root, "the first"), w.name.name)
			return load, false
		}
		load.From, load.To = from, to
	}
	first, last := l.amount.number(), l.amount.number()
	if !l.until.isBad() {
		last = l.until.number()
	}
	k, ok := l.projection(w, r, kind)
	if !ok {
		return load, false
	}
	load.Projected = l.projected != ""
	load.Start, load.End = times(k*first, l.way), times(k*last, l.way)
	l.zeroAmount()
	l.plausibleLoad(kind, max(math.Abs(first), math.Abs(last)))
	return load, true
}

// projection returns the length of the member's projection square to the load,
// per length of the member; 1 for a load that is not given so.
func (l *loading) projection(w *fragment, r *memberResult, kind model.LoadKind) (float64, bool) {
	if l.projected == "" {
		return 1, true
	}
	if kind != model.LineForce {
		l.fail("does-not-fit", l.waySpan, "Leave out on %s: it is for line loads, not for moments.", l.projected)
		return 0, false
	}
	if l.axes == model.Local || l.projected == "plan" && !l.vertical || l.projected == "elevation" && math.Abs(l.way[2]) > 1e-9 {
		want := "a vertical load: down or up"
		if l.projected == "elevation" {
			want = "a horizontal load, such as along x"
		}
		l.fail("wrong-direction", l.waySpan, "Write on %s with %s.", l.projected, want)
		return 0, false
	}
	x := times(1/r.length, minus(r.last, r.first))
	across := model.Cross(x, l.way)
	k := math.Sqrt(model.Dot(across, across))
	if k < 1e-9 {
		l.warn("no-effect", l.waySpan, "Leave out on %s, or delete this line: %s runs along the load, so its projection is nothing.", l.projected, w.name.name)
		return 0, true
	}
	return k, true
}

// position works out a place along the member, from its first node.
func (l *loading) position(x *syntax.Expression, w *fragment, r *memberResult) (float64, bool) {
	length := scalar(quantity.Quantity{Value: r.length, Dimension: quantity.Length})
	l.special = map[string]value{"length": length}
	at, ok := l.scalar(x, quantity.Length, "a place along "+w.name.name)
	l.special = nil
	if !ok {
		return 0, false
	}
	slack := 1e-9 * r.length
	switch {
	case at < -slack:
		l.fail("load-beyond-end", x.Span, "Write a place between 0 m and %s: %s lies before the first node of %s.", showLength(r.length), l.calls(x.Root, "this"), w.name.name)
		return 0, false
	case at > r.length+slack:
		l.fail("load-beyond-end", x.Span, "Write a place between 0 m and %s: %s lies beyond the end of %s.", showLength(r.length), l.calls(x.Root, "this"), w.name.name).
			fix("Write length", x.Span, "length").relate(w, "%s is %s long", w.name.name, showLength(r.length))
		return 0, false
	}
	return min(max(at, 0), r.length), true
}

// lastWho returns the last name before the colon.
func (l *loading) lastWho() *syntax.Name { return l.tree.Who[len(l.tree.Who)-1] }
