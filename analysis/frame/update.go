package frame

import (
	"context"
	"math"

	"gonum.org/v1/gonum/mat"

	"spanwright/analysis/sparse"
)

// The bounds of what the old factor is used for.
const (
	// mostRank is the rank of a change above which a new factor costs less.
	mostRank = 48
	// mostGrowth is the condition of the small system above which the change
	// matters too much: the structure may have become a mechanism, and finding
	// that out takes a factor of its own.
	mostGrowth = 1e6
	// leastLeft is what the softest movement must keep of its relative energy, at
	// the worst, for it to need no new look.
	leastLeft = 10 * Soft
	// mostOfUpdate is the componentwise backward error, after refinement, above
	// which a solution with the old factor is thrown away.
	mostOfUpdate = 1e-12
)

// update is what the stiffness of a structure has more than that of base, whose
// factor serves it: K = K₀ + V C Vᵀ. The columns of V are the natural
// deformations of the segments that changed, six for each at the most and three
// in a plane. Then, by the formula of Sherman, Morrison and Woodbury (Golub and
// Van Loan, Matrix Computations, 4th ed., section 2.1.4),
//
//	K⁻¹ b = y − W (I + C G)⁻¹ C Vᵀ y,  y = K₀⁻¹ b,  W = K₀⁻¹ V,  G = Vᵀ W
//
// with the columns of V scaled so that G has a unit diagonal.
type update struct {
	base    *Structure
	columns []column
	change  *mat.Dense // C
	moved   []float64  // W, columns of n numbers
	small   mat.LU     // of I + C G
}

// column is one column of V: few of its entries are not zero.
type column struct {
	at     []int
	values []float64
}

func (c *column) times(x []float64) (sum float64) {
	for i, u := range c.at {
		sum += c.values[i] * x[u]
	}
	return sum
}

// term is a set of deformations with the stiffness that they gained.
type term struct {
	columns   []column
	stiffness []float64 // square, row-major
}

// updateFrom takes the factor of base over, with the changes since then beside
// it, and reports whether they are few and small enough. The error is the
// context's.
func (s *Structure) updateFrom(ctx context.Context, base *Structure) (bool, error) {
	terms, ok := s.changesFrom(base)
	if !ok {
		return false, nil
	}
	u := &update{base: base}
	u.gather(terms)
	rank := len(u.columns)
	if rank == 0 || 2*rank > s.unknowns {
		return false, nil
	}
	if err := u.solve(ctx, s.unknowns); err != nil {
		return false, err
	}
	growth := u.small.Cond()
	if !(growth <= mostGrowth) || base.softest < leastLeft*growth {
		return false, nil
	}
	s.symbolic, s.factor, s.update, s.softest = base.symbolic, base.factor, u, base.softest
	s.matrix = sparse.NewMatrix(s.symbolic)
	s.assemble()
	s.path = Path{Kind: Updated, Rank: rank}
	return true, ctx.Err()
}

// changesFrom lists what the stiffness has gained and lost since base, and
// reports whether it is little.
func (s *Structure) changesFrom(base *Structure) ([]term, bool) {
	terms, ok := s.holdChanges(base)
	if !ok {
		return nil, false
	}
	gained, lost := changedSegments(s.segments, base.segments)
	if 6*max(len(gained), len(lost)) > mostRank {
		return nil, false
	}
	for i := range max(len(gained), len(lost)) {
		if i < len(gained) && i < len(lost) && sameGeometry(gained[i], lost[i]) && gained[i].element.Length() == lost[i].element.Length() {
			terms = append(terms, s.difference(gained[i], lost[i]))
			continue
		}
		if i < len(lost) {
			terms = append(terms, s.termOf(lost[i], -1))
		}
		if i < len(gained) {
			if !joins(base.segments, gained[i].bodies) {
				return nil, false // a connection that the old matrix has no room for
			}
			terms = append(terms, s.termOf(gained[i], 1))
		}
	}
	return terms, true
}

// holdChanges lists the elastic supports whose stiffness changed, and reports
// whether nothing else about the supports did.
func (s *Structure) holdChanges(base *Structure) (terms []term, ok bool) {
	if len(s.holds) != len(base.holds) {
		return nil, false
	}
	for i := range s.holds {
		a, b := &s.holds[i], &base.holds[i]
		if a.body != b.body || a.row != b.row {
			return nil, false
		}
		acting := func(s *Structure, h *hold) float64 {
			if s.status.lifts(i) {
				return 0
			}
			return h.stiffness
		}
		if gain := acting(s, a) - acting(base, b); gain != 0 {
			var c column
			for k := range s.bodies[a.body].basis {
				c.add(s.start[a.body]+k, dot6(&a.row, &s.bodies[a.body].basis[k]))
			}
			terms = append(terms, term{[]column{c}, []float64{gain}})
		}
	}
	return terms, true
}

// changedSegments returns the segments that are only in one of two lists, pairs
// that stand for each other side by side where the lists are of one length.
func changedSegments(now, before []segment) (gained, lost []*segment) {
	if len(now) == len(before) {
		for i := range now {
			if !sameSegment(&now[i], &before[i]) {
				gained, lost = append(gained, &now[i]), append(lost, &before[i])
			}
		}
		return gained, lost
	}
	first, last := 0, 0
	shorter := min(len(now), len(before))
	for first < shorter && sameSegment(&now[first], &before[first]) {
		first++
	}
	for last < shorter-first && sameSegment(&now[len(now)-1-last], &before[len(before)-1-last]) {
		last++
	}
	for i := first; i < len(now)-last; i++ {
		gained = append(gained, &now[i])
	}
	for i := first; i < len(before)-last; i++ {
		lost = append(lost, &before[i])
	}
	return gained, lost
}

// joins reports whether some segment joins two bodies.
func joins(segments []segment, bodies [2]int) bool {
	if bodies[0] == bodies[1] {
		return true
	}
	for i := range segments {
		if b := segments[i].bodies; b == bodies || b == [2]int{bodies[1], bodies[0]} {
			return true
		}
	}
	return false
}

// termOf is the stiffness of a segment times a factor.
func (s *Structure) termOf(g *segment, factor float64) term {
	_, k := g.element.Natural()
	t := term{columns: s.deformations(g), stiffness: k[:]}
	for i := range t.stiffness {
		t.stiffness[i] *= factor
	}
	return t
}

// difference is that of two segments of the same geometry. Springs and members
// deform in different ways, so they do not pair.
func (s *Structure) difference(now, before *segment) term {
	deformation, k := now.element.Natural()
	other, old := before.element.Natural()
	if deformation != other {
		a, b := s.termOf(now, 1), s.termOf(before, -1)
		return joined([]term{a, b})
	}
	t := term{columns: s.deformations(now), stiffness: k[:]}
	for i := range t.stiffness {
		t.stiffness[i] -= old[i]
	}
	return t
}

// deformations are the natural deformations of a segment over the unknowns.
func (s *Structure) deformations(g *segment) []column {
	rows, _ := g.element.Natural()
	columns := make([]column, len(rows))
	for end := range 2 {
		body := g.bodies[end]
		for k, leg := range s.legs(g, end) {
			for r := range rows {
				half := vector6(rows[r][6*end : 6*end+6])
				columns[r].add(s.start[body]+k, dot6(&half, &leg))
			}
		}
	}
	return columns
}

// add adds to an entry of a column.
func (c *column) add(at int, value float64) {
	for i, u := range c.at {
		if u == at {
			c.values[i] += value
			return
		}
	}
	if value != 0 {
		c.at, c.values = append(c.at, at), append(c.values, value)
	}
}

// joined makes one term of several.
func joined(terms []term) term {
	n := 0
	for i := range terms {
		n += len(terms[i].columns)
	}
	all := term{stiffness: make([]float64, n*n)}
	for i := range terms {
		first, width := len(all.columns), len(terms[i].columns)
		all.columns = append(all.columns, terms[i].columns...)
		for r := range width {
			copy(all.stiffness[(first+r)*n+first:], terms[i].stiffness[r*width:(r+1)*width])
		}
	}
	return all
}

// gather makes V and C of the terms, without deformations that the unknowns
// cannot make or whose stiffness stayed.
func (u *update) gather(terms []term) {
	all := joined(terms)
	n := len(all.columns)
	var kept []int
	for i := range all.columns {
		changed := false
		for j := range n {
			changed = changed || all.stiffness[i*n+j] != 0 || all.stiffness[j*n+i] != 0
		}
		if changed && all.columns[i].size() > 0 {
			kept = append(kept, i)
			u.columns = append(u.columns, all.columns[i])
		}
	}
	if len(kept) == 0 {
		return
	}
	u.change = mat.NewDense(len(kept), len(kept), nil)
	for a, i := range kept {
		for b, j := range kept {
			u.change.Set(a, b, all.stiffness[i*n+j])
		}
	}
}

func (c *column) size() (largest float64) {
	for _, v := range c.values {
		largest = max(largest, math.Abs(v))
	}
	return largest
}

// solve finds W and the factor of the small system.
func (u *update) solve(ctx context.Context, n int) error {
	rank := len(u.columns)
	u.moved = make([]float64, n*rank)
	for k := range u.columns {
		for i, at := range u.columns[k].at {
			u.moved[k*n+at] = u.columns[k].values[i]
		}
	}
	if err := u.base.factor.Solve(ctx, u.moved, rank); err != nil {
		return err
	}
	for k := range u.columns {
		w := u.moved[k*n : (k+1)*n]
		scale := 1 / math.Sqrt(u.columns[k].times(w))
		for i := range w {
			w[i] *= scale
		}
		for i := range u.columns[k].values {
			u.columns[k].values[i] *= scale
		}
		for j := range rank {
			u.change.Set(k, j, u.change.At(k, j)/scale)
			u.change.Set(j, k, u.change.At(j, k)/scale)
		}
	}
	flexibility := mat.NewDense(rank, rank, nil)
	for i := range rank {
		for j := range rank {
			flexibility.Set(i, j, u.columns[i].times(u.moved[j*n:(j+1)*n]))
		}
	}
	var system mat.Dense
	system.Mul(u.change, flexibility)
	for i := range rank {
		system.Set(i, i, system.At(i, i)+1)
	}
	u.small.Factorize(&system)
	return nil
}

// correct turns solutions with the old factor into solutions.
func (u *update) correct(x []float64, count int) {
	n, rank := len(x)/count, len(u.columns)
	stretched := mat.NewDense(rank, count, nil)
	for c := range count {
		for k := range u.columns {
			stretched.Set(k, c, u.columns[k].times(x[c*n:(c+1)*n]))
		}
	}
	var forces, shares mat.Dense
	forces.Mul(u.change, stretched)
	// The condition was judged when the update was made: no error is news here.
	_ = u.small.SolveTo(&shares, false, &forces)
	for c := range count {
		for k := range rank {
			share := shares.At(k, c)
			if share == 0 {
				continue
			}
			column := x[c*n : (c+1)*n]
			for i, w := range u.moved[k*n : (k+1)*n] {
				column[i] -= share * w
			}
		}
	}
}
