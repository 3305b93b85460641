package element

import "math"

// loosePivot is the pivot, relative to the member's own stiffness, below which
// the joints are taken to let the member move freely. Rounding leaves some
// 1e-16; the softest joint that anybody means lies far above.
const loosePivot = 1e-13

// condense eliminates the movements of the member's ends at joints that are not
// rigid (static condensation). With R the rigid and S the other joints, k the
// joint stiffnesses, K the stiffness of the fast member, d the movements of the
// nodes, e those of the member's ends and f0 the held-end forces:
//
//	e_R = d_R
//	f_S = k (d_S − e_S) = K_SR e_R + K_SS e_S + f0_S
//	e_S = (K_SS + k)⁻¹ (k d_S − K_SR d_R − f0_S)
//
// so e = inner d − flexibility f0. A freedom without any stiffness of its own
// (bending out of a plane model) needs no elimination: no force can arise there.
func (e *Element) condense() error {
	var soft []int
	for i, k := range e.joints {
		if k < 0 || math.IsNaN(k) {
			return ErrProperties
		}
		if !math.IsInf(k, 1) && e.full[at(i, i)] > 0 {
			soft = append(soft, i)
		}
		e.inner[at(i, i)] = 1
	}
	e.condensed = e.full
	if len(soft) == 0 {
		return nil
	}
	e.jointed = true
	inverse, loose := e.invertSoft(soft)
	if loose >= 0 {
		return &LooseError{Freedom: loose % 6}
	}
	isSoft := map[int]bool{}
	for _, i := range soft {
		isSoft[i] = true
		e.inner[at(i, i)] = 0
	}
	for a, i := range soft {
		for b, j := range soft {
			e.flexibility[at(i, j)] = inverse[a][b]
			e.inner[at(i, j)] = inverse[a][b] * e.joints[j]
			for r := range 12 {
				if !isSoft[r] {
					e.inner[at(i, r)] -= inverse[a][b] * e.full[at(j, r)]
				}
			}
		}
	}
	e.condensed = e.throughJoints()
	return nil
}

// throughJoints returns the stiffness that the nodes see, made exactly
// symmetric, with exact zeros for released forces.
func (e *Element) throughJoints() Matrix {
	var k Matrix
	for i := range 12 {
		for j := range 12 {
			var sum float64
			for m := range 12 {
				sum += e.full[at(i, m)] * e.inner[at(m, j)]
			}
			k[at(i, j)] = sum
		}
	}
	for i := range 12 {
		for j := range i {
			mean := (k[at(i, j)] + k[at(j, i)]) / 2
			if e.joints[i] == 0 || e.joints[j] == 0 {
				mean = 0
			}
			k[at(i, j)], k[at(j, i)] = mean, mean
		}
		if e.joints[i] == 0 {
			k[at(i, i)] = 0
		}
	}
	e.clearRemains(&k)
	return k
}

// clearRemains puts exact zeros where the joints leave a movement without any
// resistance and condensation left only rounding: the twist of a member whose
// other end lets it spin. Such remains would pass for a stiffness.
func (e *Element) clearRemains(k *Matrix) {
	for i := range 12 {
		if k[at(i, i)] >= loosePivot*e.full[at(i, i)] {
			continue
		}
		for j := range 12 {
			k[at(i, j)], k[at(j, i)] = 0, 0
		}
	}
}

// invertSoft returns the inverse of K_SS + k by Gauss–Jordan elimination on the
// matrix scaled to a unit diagonal of K, in the order of S (the matrix is
// positive semidefinite, so no other pivoting is needed), and −1; or the
// freedom at which the member turned out to be loose.
func (e *Element) invertSoft(soft []int) (inverse [][]float64, loose int) {
	n := len(soft)
	scale := make([]float64, n)
	work := make([][]float64, n)
	for a, i := range soft {
		scale[a] = 1 / math.Sqrt(e.full[at(i, i)]+e.joints[i])
		work[a] = make([]float64, 2*n)
	}
	for a, i := range soft {
		for b, j := range soft {
			work[a][b] = e.full[at(i, j)] * scale[a] * scale[b]
		}
		work[a][a] = 1
		work[a][n+a] = 1
	}
	for p := range n {
		pivot := work[p][p]
		if pivot < loosePivot {
			return nil, soft[p]
		}
		for c := range work[p] {
			work[p][c] /= pivot
		}
		for r := range n {
			if factor := work[r][p]; r != p && factor != 0 {
				for c := range work[r] {
					work[r][c] -= factor * work[p][c]
				}
			}
		}
	}
	inverse = make([][]float64, n)
	for a := range n {
		inverse[a] = make([]float64, n)
		for b := range n {
			inverse[a][b] = work[a][n+b] * scale[a] * scale[b]
		}
	}
	return inverse, -1
}

// memberEnds returns the movements of the member's own ends for node movements
// d and the held-end forces of the fast member.
func (e *Element) memberEnds(d, fast Vector) Vector {
	if !e.jointed {
		return d
	}
	var ends Vector
	for i := range 12 {
		for j := range 12 {
			ends[i] += e.inner[at(i, j)]*d[j] - e.flexibility[at(i, j)]*fast[j]
		}
	}
	return ends
}

// releaseFixedEnd turns the held-end forces of the fast member into those of
// the member with its joints, the nodes held.
func (e *Element) releaseFixedEnd(fast Vector) Vector {
	if !e.jointed {
		return fast
	}
	held := fast
	ends := e.memberEnds(Vector{}, fast)
	for i := range 12 {
		for j := range 12 {
			held[i] += e.full[at(i, j)] * ends[j]
		}
	}
	for i, k := range e.joints {
		if e.full[at(i, i)] > 0 && !math.IsInf(k, 1) {
			held[i] = -k * ends[i]
		}
	}
	return held
}
