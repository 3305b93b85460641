package sparse

import (
	"slices"
)

// Symbolic is what the pattern alone decides: order, tree, supernodes and
// positions. It does not change, and serves any number of matrices and factors.
type Symbolic struct {
	pattern Pattern
	n       int   // unknowns
	start   []int // by group: its first unknown; one more entry at the end

	fronts []front
	// place of a group's pivots: the front that eliminates it, and the first row
	// of its unknowns there.
	frontOf []int32
	rowIn   []int32
	factor  int // numbers in all panels
	largest int // rows of the largest front
	updates int // numbers in all updates that are alive at once

	blocks  [][]int32 // by group: the groups of higher number that it shares a block with, sorted
	offsets [][]int   // by group: where the values of its diagonal block are, then those of blocks
	values  int       // numbers in all blocks
}

// front is a supernode: groups eliminated together in one dense matrix.
type front struct {
	groups   []int32 // eliminated here, then those that are left
	own      int     // how many of groups are eliminated here
	rows     []int32 // the unknowns of groups
	pivots   int     // the first of rows that are eliminated here
	panel    int     // offset of the rows × pivots panel, row-major, in the factor
	update   int     // offset of the update matrix in the stack, once made
	work     int     // and while it is being made
	entries  []entry // blocks of the matrix that go into the panel
	parent   int32   // or −1
	children []int32
	scatter  []int32 // rows of the parent that the rows left here go to
}

// Analyse does the symbolic phase. The error wraps ErrPattern.
func Analyse(p Pattern) (*Symbolic, error) {
	neighbours, err := p.adjacency()
	if err != nil {
		return nil, err
	}
	s := &Symbolic{pattern: p, start: make([]int, len(p.Weights)+1)}
	for i, w := range p.Weights {
		s.start[i+1] = s.start[i] + w
	}
	s.n = s.start[len(p.Weights)]
	order := minimumDegree(neighbours, p.Weights)
	t := eliminate(neighbours, order)
	t.postorder()
	s.makeFronts(t.supernodes(p.Weights))
	s.layOutBlocks(neighbours)
	return s, nil
}

// Unknowns returns the order of the matrix.
func (s *Symbolic) Unknowns() int { return s.n }

// Fits reports whether the symbolic phase of another pattern would come to the
// same: the same weights and edges in the same order.
func (s *Symbolic) Fits(p Pattern) bool {
	return slices.Equal(s.pattern.Weights, p.Weights) && slices.Equal(s.pattern.Edges, p.Edges)
}

// Numbers returns how many numbers the factor holds.
func (s *Symbolic) Numbers() int { return s.factor }

// makeFronts lays out the fronts in the order of elimination.
func (s *Symbolic) makeFronts(supernodes []supernode) {
	groups := len(s.pattern.Weights)
	s.fronts = make([]front, len(supernodes))
	s.frontOf, s.rowIn = make([]int32, groups), make([]int32, groups)
	for i, sn := range supernodes {
		f := &s.fronts[i]
		f.own = len(sn.own)
		f.groups = append(append([]int32(nil), sn.own...), sn.left...)
		for k, g := range f.groups {
			if k < f.own {
				s.frontOf[g], s.rowIn[g] = int32(i), int32(len(f.rows))
			}
			for u := s.start[g]; u < s.start[g+1]; u++ {
				f.rows = append(f.rows, int32(u))
			}
			if k == f.own-1 {
				f.pivots = len(f.rows)
			}
		}
		f.panel = s.factor
		s.factor += len(f.rows) * f.pivots
		s.largest = max(s.largest, len(f.rows))
	}
	s.linkFronts()
	s.stackUpdates()
}

// linkFronts finds each front's parent, the one that eliminates its first group
// that is left, and where its rows go there.
func (s *Symbolic) linkFronts() {
	row := make([]int32, s.n)
	for i := range s.fronts {
		f := &s.fronts[i]
		f.parent = -1
		if f.own == len(f.groups) {
			continue
		}
		f.parent = s.frontOf[f.groups[f.own]]
		s.fronts[f.parent].children = append(s.fronts[f.parent].children, int32(i))
	}
	for i := range s.fronts {
		p := &s.fronts[i]
		if len(p.children) == 0 {
			continue
		}
		for k, u := range p.rows {
			row[u] = int32(k)
		}
		for _, c := range p.children {
			f := &s.fronts[c]
			f.scatter = make([]int32, 0, len(f.rows)-f.pivots)
			for _, u := range f.rows[f.pivots:] {
				f.scatter = append(f.scatter, row[u])
			}
		}
	}
}

// stackUpdates gives each update matrix its place on a stack: children stand
// right before their parent in the order, so theirs are on top when it takes
// them off.
func (s *Symbolic) stackUpdates() {
	top := 0
	for i := range s.fronts {
		f := &s.fronts[i]
		below := top
		for _, c := range f.children {
			below = min(below, s.fronts[c].update)
		}
		left := len(f.rows) - f.pivots
		// The parent's update is made beside its children's and then moved down.
		f.update, f.work = below, top
		s.updates = max(s.updates, top+left*left)
		top = below + left*left
	}
}
