package resolve

import (
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// nodeResult is where a node stands: in the axes of its part, and globally. The
// two are the same outside of parts.
type nodeResult struct{ local, global [3]float64 }

func (r *nodeResult) same(other any) bool {
	o, ok := other.(*nodeResult)
	return ok && *o == *r
}

func (e *evaluation) nodeStatement(tree *syntax.NodeStatement) {
	p, ok := e.vector(tree.Position, quantity.Length, "a position")
	if !ok {
		return
	}
	r := &nodeResult{p, p}
	if e.place != nil {
		place := e.ownPlace()
		if place == nil {
			return
		}
		r.global = place.global(p)
	}
	e.out.result = r
}

// seen returns a node's position as the statement sees it: in the axes of its
// own part.
func (e *evaluation) seen(w *fragment, r *nodeResult) value {
	if w.place == e.place {
		return positionValue(r.local, e.session.header.plane)
	}
	if e.place == nil {
		return positionValue(r.global, e.session.header.plane)
	}
	place := e.ownPlace()
	if place == nil {
		return bad
	}
	return positionValue(place.local(r.global), e.session.header.plane)
}
