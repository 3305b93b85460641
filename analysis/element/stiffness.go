package element

// ShearParameter returns Φ = 12 EI/(GAv L²), the share of shear deformation in
// a span's bending, and 0 where gav is 0: Przemieniecki, Theory of Matrix
// Structural Analysis (1968), eq. 5.114 ff.
func ShearParameter(ei, gav, length float64) float64 {
	if gav == 0 {
		return 0
	}
	return 12 * ei / (gav * length * length)
}

// beamStiffness returns the stiffness of a prismatic member with both ends fast
// to the nodes: Przemieniecki (1968), eq. 5.116, in our order and axes.
func beamStiffness(length float64, p Properties) Matrix {
	var k Matrix
	axial(&k, 0, p.EA/length)
	axial(&k, 3, p.GIt/length)
	// About z: uy and rz turn the same way; about y: uz and −ry do.
	bending(&k, 1, 5, +1, length, p.EIz, ShearParameter(p.EIz, p.GAy, length))
	bending(&k, 2, 4, -1, length, p.EIy, ShearParameter(p.EIy, p.GAz, length))
	return k
}

// axial adds the stiffness of one straining: freedom d against d+6.
func axial(k *Matrix, d int, stiffness float64) {
	k[at(d, d)] += stiffness
	k[at(d+6, d+6)] += stiffness
	k[at(d, d+6)] -= stiffness
	k[at(d+6, d)] -= stiffness
}

// bending adds the stiffness of bending in one plane, with w the freedom across
// the member and r its rotation; turn is +1 where a positive rotation tilts the
// member toward positive w, else −1.
func bending(k *Matrix, w, r int, turn, length, ei, phi float64) {
	c := ei / (1 + phi)
	forceForMove := 12 * c / (length * length * length)
	forceForTurn := 6 * c / (length * length)
	near := (4 + phi) * c / length
	far := (2 - phi) * c / length
	entries := [4][4]float64{
		{forceForMove, turn * forceForTurn, -forceForMove, turn * forceForTurn},
		{turn * forceForTurn, near, -turn * forceForTurn, far},
		{-forceForMove, -turn * forceForTurn, forceForMove, -turn * forceForTurn},
		{turn * forceForTurn, far, -turn * forceForTurn, near},
	}
	freedoms := [4]int{w, r, w + 6, r + 6}
	for i, fi := range freedoms {
		for j, fj := range freedoms {
			k[at(fi, fj)] += entries[i][j]
		}
	}
}
