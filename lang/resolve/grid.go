package resolve

import "math"

// geometry is the session's index of where nodes and members are: a grid of
// cubic cells, each with what passes through it. Only what an edit moves is
// taken out, put in and compared with its neighbours again.
type geometry struct {
	cell  float64 // m, a power of two near the mean length of members; 0: nothing in it yet
	cells map[cellKey][]*body
	moved map[*fragment]bool // evaluated since the last look
	pairs map[pairKey]*pair
	near  map[*fragment][]*pair
}

type cellKey struct{ x, y, z int64 }

// body is a node or one straight piece of a member in the grid.
type body struct {
	fragment *fragment
	a, b     [3]float64 // the same for a node
	from, to *fragment  // the nodes at the ends of a piece
	first    int        // of a piece: the number of its first node on the member's path
	point    bool
}

type pairKey struct{ first, second *fragment }

// pair is two things that touch although nothing joins them.
type pair struct {
	pairKey
	kind  pairKind
	at    [3]float64
	piece int // of the (first) member, where it is touched or crossed
	other int // of the second member
}

type pairKind uint8

const (
	sameplace  pairKind = iota // two nodes
	nodeTouch                  // a node (second) on a member (first)
	crossing                   // two members
	sameMember                 // two members between the same nodes
)

// crowd is the number of bodies in a cell from which on they are not compared:
// nothing but a slip in a unit puts so many so near each other.
const crowd = 160

// farthest bounds the coordinates that are looked at, m.
const farthest = 1e8

// change notes that a fragment has been evaluated.
func (g *geometry) change(f *fragment) {
	if f.kind != NodeName && !f.kind.Member() {
		return
	}
	if g.moved == nil {
		g.moved = map[*fragment]bool{}
	}
	g.moved[f] = true
}

// remove takes a fragment out.
func (g *geometry) remove(f *fragment) {
	delete(g.moved, f)
	if f.bodies != nil {
		g.takeOut(f)
	}
}

func (g *geometry) takeOut(f *fragment) {
	for _, b := range f.bodies {
		g.eachCell(b, func(key cellKey) {
			list := g.cells[key]
			for i, x := range list {
				if x == b {
					list[i] = list[len(list)-1]
					list[len(list)-1] = nil
					list = list[:len(list)-1]
					break
				}
			}
			if len(list) == 0 {
				delete(g.cells, key)
			} else {
				g.cells[key] = list
			}
			if len(list) == crowd {
				g.compareCell(list)
			}
		})
	}
	f.bodies = nil
	for _, p := range g.near[f] {
		delete(g.pairs, p.pairKey)
		other := p.first
		if other == f {
			other = p.second
		}
		list := g.near[other]
		for i, q := range list {
			if q == p {
				list[i] = list[len(list)-1]
				g.near[other] = list[:len(list)-1]
				break
			}
		}
	}
	delete(g.near, f)
}

// compareCell compares all bodies of a cell that is no longer crowded.
func (g *geometry) compareCell(list []*body) {
	for i, a := range list {
		for _, b := range list[:i] {
			g.compare(a, b)
		}
	}
}

// putIn adds a fragment's bodies and compares them with their neighbours.
func (g *geometry) putIn(f *fragment, bodies []*body) {
	f.bodies = bodies
	for _, b := range bodies {
		g.eachCell(b, func(key cellKey) {
			list := append(g.cells[key], b)
			g.cells[key] = list
			if len(list) == crowd+1 {
				g.forgetCell(list)
			}
			if len(list) > crowd {
				return
			}
			for _, other := range list[:len(list)-1] {
				g.compare(b, other)
			}
		})
	}
}

// forgetCell drops what was found between bodies of a cell that has become
// crowded, so that what is found does not hang on the order in which they came.
func (g *geometry) forgetCell(list []*body) {
	in := map[*fragment]bool{}
	for _, b := range list {
		in[b.fragment] = true
	}
	for _, b := range list {
		for _, p := range append([]*pair(nil), g.near[b.fragment]...) {
			if in[p.first] && in[p.second] {
				g.drop(p)
			}
		}
	}
}

func (g *geometry) drop(p *pair) {
	delete(g.pairs, p.pairKey)
	for _, f := range []*fragment{p.first, p.second} {
		list := g.near[f]
		for i, q := range list {
			if q == p {
				list[i] = list[len(list)-1]
				g.near[f] = list[:len(list)-1]
				break
			}
		}
	}
}

// eachCell calls visit for the cells that a body may pass through. A long piece
// is halved until it fits into a few cells, so that the work grows with its
// length only.
func (g *geometry) eachCell(b *body, visit func(cellKey)) {
	var last cellKey
	seen := 0
	var walk func(p, q [3]float64, depth int)
	walk = func(p, q [3]float64, depth int) {
		lo, hi := g.keyOf(p, q, -touch), g.keyOf(p, q, touch)
		if depth > 0 && (hi.x-lo.x > 1 || hi.y-lo.y > 1 || hi.z-lo.z > 1) {
			middle := times(0.5, plus(p, q))
			walk(p, middle, depth-1)
			walk(middle, q, depth-1)
			return
		}
		for x := lo.x; x <= hi.x; x++ {
			for y := lo.y; y <= hi.y; y++ {
				for z := lo.z; z <= hi.z; z++ {
					key := cellKey{x, y, z}
					if seen > 0 && key == last {
						continue
					}
					last = key
					seen++
					visit(key)
				}
			}
		}
	}
	walk(b.a, b.b, 24)
}

// keyOf returns the lower (margin below zero) or upper cell of a box.
func (g *geometry) keyOf(p, q [3]float64, margin float64) cellKey {
	pick := math.Min
	if margin > 0 {
		pick = math.Max
	}
	at := func(i int) int64 { return int64(math.Floor((pick(p[i], q[i]) + margin) / g.cell)) }
	return cellKey{at(0), at(1), at(2)}
}

// touch is the distance (m) within which things touch: less than anybody
// means to leave between them.
const touch = 0.5e-3

// compare looks at two bodies and notes what there is between them.
func (g *geometry) compare(a, b *body) {
	if a.fragment == b.fragment {
		return
	}
	p := pair{}
	switch {
	case a.point && b.point:
		if distance(a.a, b.a) > touch*1e-2 {
			return
		}
		p.kind, p.at = sameplace, a.a
	case a.point != b.point:
		if a.point {
			a, b = b, a
		}
		if !touches(a, b) {
			return
		}
		p.kind, p.at, p.piece = nodeTouch, b.a, a.first
		p.pairKey = pairKey{a.fragment, b.fragment}
		g.note(p)
		return
	default:
		at, ok := cross(a, b)
		if !ok {
			return
		}
		p.kind, p.at, p.piece, p.other = crossing, at, a.first, b.first
	}
	p.pairKey = pairKey{a.fragment, b.fragment}
	g.note(p)
}

// note keeps a pair, once however many cells the two share.
func (g *geometry) note(p pair) {
	if g.pairs[p.pairKey] != nil || g.pairs[pairKey{p.second, p.first}] != nil {
		return
	}
	kept := &p
	g.pairs[p.pairKey] = kept
	g.near[p.first] = append(g.near[p.first], kept)
	g.near[p.second] = append(g.near[p.second], kept)
}

// touches reports whether a node lies on the inner part of a member's piece
// without being one of its nodes.
func touches(piece, node *body) bool {
	if node.fragment == piece.from || node.fragment == piece.to {
		return false
	}
	d := minus(piece.b, piece.a)
	length := distance(piece.a, piece.b)
	if length == 0 {
		return false
	}
	near := min(touch, length/100)
	along := (dot(minus(node.a, piece.a), d)) / length
	if along <= near || along >= length-near {
		return false
	}
	foot := plus(piece.a, times(along/length, d))
	return distance(foot, node.a) <= near
}

func dot(a, b [3]float64) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

// cross reports whether two pieces of members meet at a point inside both.
// Pieces that share a node, or run alongside each other, do not cross.
func cross(p, q *body) ([3]float64, bool) {
	if p.from == q.from || p.from == q.to || p.to == q.from || p.to == q.to {
		return [3]float64{}, false
	}
	u, v, w := minus(p.b, p.a), minus(q.b, q.a), minus(p.a, q.a)
	a, b, c, d, e := dot(u, u), dot(u, v), dot(v, v), dot(u, w), dot(v, w)
	det := a*c - b*b
	if det <= 1e-9*a*c {
		return [3]float64{}, false
	}
	s, t := (b*e-c*d)/det, (a*e-b*d)/det
	lengthP, lengthQ := math.Sqrt(a), math.Sqrt(c)
	nearP, nearQ := min(touch, lengthP/100)/lengthP, min(touch, lengthQ/100)/lengthQ
	if s <= nearP || s >= 1-nearP || t <= nearQ || t >= 1-nearQ {
		return [3]float64{}, false
	}
	onP, onQ := plus(p.a, times(s, u)), plus(q.a, times(t, v))
	if distance(onP, onQ) > min(touch, lengthP/100, lengthQ/100) {
		return [3]float64{}, false
	}
	return onP, true
}
