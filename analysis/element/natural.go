package element

// Natural returns the six natural deformations of the element as rows over the
// twelve end movements, and its stiffness in them, 6 × 6 row-major, so that the
// stiffness is Bᵀ k B. A rigid movement has none. For beams and bars they are
//
//	elongation, twist, turn of end 1 and end 2 about z against the chord,
//	turn of end 1 and end 2 about y against the chord
//
// and for springs the six relative movements at mid-length. Forces worked out
// from them do not drown in the rounding of a large common movement.
func (e *Element) Natural() (deformations [6]Vector, stiffness [36]float64) {
	if e.kind == spring {
		deformations = springDeformation(e.length)
		for d, k := range e.springs {
			stiffness[7*d] = k
		}
		return deformations, stiffness
	}
	l := e.length
	deformations = [6]Vector{
		{0: -1, 6: 1},
		{3: -1, 9: 1},
		{5: 1, 1: 1 / l, 7: -1 / l},
		{11: 1, 1: 1 / l, 7: -1 / l},
		{4: 1, 2: -1 / l, 8: 1 / l},
		{10: 1, 2: -1 / l, 8: 1 / l},
	}
	// Each deformation alone is a movement of one freedom, the others held, so
	// its stiffness is an entry of K.
	freedoms := [6]int{6, 9, 5, 11, 4, 10}
	for i, fi := range freedoms {
		for j, fj := range freedoms {
			stiffness[6*i+j] = e.condensed[at(fi, fj)]
		}
	}
	return deformations, stiffness
}

// naturalForces returns Bᵀ k B d: the end forces for node movements alone.
func (e *Element) naturalForces(d Vector) Vector {
	b, k := e.Natural()
	var strain, force [6]float64
	for i := range 6 {
		for j := range 6 {
			// Like freedoms of both ends first: a common movement cancels exactly.
			strain[i] += b[i][j]*d[j] + b[i][j+6]*d[j+6]
		}
	}
	for i := range 6 {
		for j := range 6 {
			force[i] += k[6*i+j] * strain[j]
		}
	}
	var f Vector
	for i := range 6 {
		for j := range 12 {
			f[j] += b[i][j] * force[i]
		}
	}
	return f
}

// StrainEnergy returns the energy of deformation ½ dᵀ K d for node movements d,
// worked out from the natural deformations.
func (e *Element) StrainEnergy(d Vector) float64 {
	b, k := e.Natural()
	var strain [6]float64
	for i := range 6 {
		for j := range 6 {
			strain[i] += b[i][j]*d[j] + b[i][j+6]*d[j+6]
		}
	}
	var energy float64
	for i := range 6 {
		for j := range 6 {
			energy += strain[i] * k[6*i+j] * strain[j]
		}
	}
	return energy / 2
}
