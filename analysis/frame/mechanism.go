package frame

import (
	"context"
	"math"
	"slices"
	"sort"
)

// Whether a structure can move without resistance is judged by what a movement
// costs: the strain energy of its shape, from natural deformations, relative to
// zᵀ diag(K) z. A small pivot alone misjudges both ways.
const (
	// free is the relative energy below which a shape is a mechanism.
	free = 1e-18
	// Soft is the relative energy below which a structure is nearly one, and
	// deserves a warning.
	Soft = 1e-14
	// suspicious is the pivot below which the shape that belongs to it is looked
	// at although it passed.
	suspicious = 1e-4
)

// MechanismError says that a structure can move without resistance. It has no
// results.
type MechanismError struct {
	// Shapes are independent movements that nothing resists: by node ux … rz,
	// global, the largest part 1 (turns times a typical length). At most a few
	// are worked out.
	Shapes [][][6]float64
	// Moves are the freedoms that move, those of all shapes, the nodes in the
	// order of the model.
	Moves []NodeFreedom
	// Remedy is the smallest set of restraints found that stops all shapes.
	Remedy []NodeFreedom
	// Load says which load sets it moving, where it would stand still otherwise,
	// or is empty.
	Load string
	// Slack names the one-way parts that do not act in it, or is empty.
	Slack string

	structure *Structure
}

// NodeFreedom is one freedom of one node.
type NodeFreedom struct {
	Node    int // index into Model.Nodes
	Freedom int // 0 to 5: ux … rz
}

// suspects returns the unknowns whose movements are to be looked at.
func (s *Structure) suspects(noted []int) []int {
	list := slices.Clone(noted)
	if pivot, at := s.factor.Smallest(); len(list) == 0 && pivot < suspicious {
		list = append(list, at)
	}
	const most = 24 // shapes worth telling apart
	if len(list) > most {
		list = list[:most]
	}
	return list
}

// judge finds out whether the suspects belong to mechanisms. It returns a
// *MechanismError if so; otherwise the structure is sound, and soft is set where
// it is nearly one.
func (s *Structure) judge(ctx context.Context, noted []int) error {
	suspects := s.suspects(noted)
	if len(suspects) == 0 {
		return nil
	}
	shapes, err := s.softShapes(ctx, suspects, noted)
	if err != nil {
		return err
	}
	energies, shapes := s.principal(shapes)
	var loose [][]float64
	s.softest = 1
	for i, e := range energies {
		if e < free {
			loose = append(loose, shapes[i])
		} else {
			s.softest = min(s.softest, e)
		}
	}
	if len(loose) > 0 {
		return s.explain(loose)
	}
	if len(noted) > 0 {
		return s.refactor(ctx)
	}
	return nil
}

// softShapes returns, for each suspect, the shape that it belongs to. The factor
// is that of K with a spring at each noted unknown, and a free movement z obeys
// (K + springs) z = spring forces: a force at the unknown alone gives it, but for
// rounding, which one step of refinement takes out. Where nothing was noted, the
// factor is that of K, and three steps of inverse iteration from the unknown
// find the softest movement.
func (s *Structure) softShapes(ctx context.Context, suspects, noted []int) ([][]float64, error) {
	n := s.unknowns
	weights := s.weights()
	block := make([]float64, n*len(suspects))
	for k, j := range suspects {
		block[k*n+j] = 1
	}
	if err := s.factor.Solve(ctx, block, len(suspects)); err != nil {
		return nil, err
	}
	steps := 3
	if len(noted) > 0 {
		steps = 1
	}
	for range steps {
		var err error
		if len(noted) > 0 {
			err = s.sharpen(ctx, block, suspects, noted)
		} else {
			normalise(block, weights)
			for i := range block {
				block[i] *= weights[i]
			}
			err = s.factor.Solve(ctx, block, 1)
		}
		if err != nil {
			return nil, err
		}
	}
	shapes := make([][]float64, len(suspects))
	for k := range suspects {
		shapes[k] = block[k*n : (k+1)*n]
		normalise(shapes[k], weights)
	}
	return shapes, nil
}

// sharpen does one step of refinement of (K + springs) z = e.
func (s *Structure) sharpen(ctx context.Context, block []float64, suspects, noted []int) error {
	n := s.unknowns
	residuals := make([]float64, len(block))
	size := make([]float64, n)
	for k, j := range suspects {
		z, r := block[k*n:(k+1)*n], residuals[k*n:(k+1)*n]
		right := make([]float64, n)
		right[j] = 1
		s.matrix.Residual(right, z, r, size)
		for _, i := range noted {
			r[i] -= s.factor.Spring(i) * z[i]
		}
	}
	if err := s.factor.Solve(ctx, residuals, len(suspects)); err != nil {
		return err
	}
	for i := range block {
		block[i] += residuals[i]
	}
	return nil
}

// weights returns the diagonal of K, with the mean in place of zeros, so that a
// movement without any stiffness counts too.
func (s *Structure) weights() []float64 {
	w := s.matrix.Diagonal()
	sum, count := 0.0, 0
	for _, v := range w {
		if v > 0 {
			sum += v
			count++
		}
	}
	mean := 1.0
	if count > 0 {
		mean = sum / float64(count)
	}
	for i, v := range w {
		if !(v > 0) {
			w[i] = mean
		}
	}
	return w
}

// normalise makes zᵀ W z one.
func normalise(z, weights []float64) {
	if sum := weighted(z, weights); sum > 0 {
		factor := 1 / math.Sqrt(sum)
		for i := range z {
			z[i] *= factor
		}
	}
}

// principal turns shapes into ones that are independent in energy, by the
// Rayleigh–Ritz procedure in the norm of diag(K), and returns their relative
// energies. Shapes that add nothing are dropped.
func (s *Structure) principal(shapes [][]float64) ([]float64, [][]float64) {
	diagonal := s.weights()
	var basis [][]float64
	for _, z := range shapes {
		z = slices.Clone(z)
		for range 2 {
			for _, q := range basis {
				part := 0.0
				for i := range z {
					part += z[i] * q[i] * diagonal[i]
				}
				for i := range z {
					z[i] -= part * q[i]
				}
			}
		}
		left := 0.0
		for i := range z {
			left += z[i] * z[i] * diagonal[i]
		}
		if left < 1e-12 {
			continue
		}
		normalise(z, diagonal)
		basis = append(basis, z)
	}
	k := s.energyMatrix(basis)
	values, vectors := eigen(k, len(basis))
	turned := make([][]float64, len(basis))
	for n := range basis {
		turned[n] = make([]float64, s.unknowns)
		for m := range basis {
			for i := range turned[n] {
				turned[n][i] += vectors[m*len(basis)+n] * basis[m][i]
			}
		}
		// The energy of the very shape that is shown.
		values[n] = s.energy(turned[n]) / weighted(turned[n], diagonal)
	}
	return values, turned
}

func weighted(z, diagonal []float64) (sum float64) {
	for i, v := range z {
		sum += v * v * diagonal[i]
	}
	return sum
}

// energyMatrix returns zᵢᵀ K zⱼ from natural deformations.
func (s *Structure) energyMatrix(shapes [][]float64) []float64 {
	n := len(shapes)
	k := make([]float64, n*n)
	single := make([]float64, n)
	for i := range shapes {
		single[i] = s.energy(shapes[i])
		k[i*n+i] = single[i]
	}
	sum := make([]float64, s.unknowns)
	for i := range shapes {
		for j := range i {
			for u := range sum {
				sum[u] = shapes[i][u] + shapes[j][u]
			}
			v := (s.energy(sum) - single[i] - single[j]) / 2
			k[i*n+j], k[j*n+i] = v, v
		}
	}
	return k
}

// energy returns zᵀ K z from natural deformations.
func (s *Structure) energy(z []float64) float64 {
	moved := s.movedBodies(z)
	sum := 0.0
	for i := range s.segments {
		g := &s.segments[i]
		sum += 2 * g.element.StrainEnergy(g.ends(moved[g.bodies[0]], moved[g.bodies[1]]))
	}
	for i := range s.holds {
		if h := &s.holds[i]; h.stiffness > 0 && !s.status.lifts(i) {
			give := dot6(&h.row, &moved[h.body])
			sum += h.stiffness * give * give
		}
	}
	return sum
}

// movedBodies returns the movements of the bodies for unknowns.
func (s *Structure) movedBodies(x []float64) []vector6 {
	moved := make([]vector6, len(s.bodies))
	for b := range s.bodies {
		for i := range s.bodies[b].basis {
			for k := range 6 {
				moved[b][k] += s.bodies[b].basis[i][k] * x[s.start[b]+i]
			}
		}
	}
	return moved
}

// explain says which nodes move and what would stop them.
func (s *Structure) explain(loose [][]float64) error {
	e := &MechanismError{structure: s}
	var rows [][]float64 // by shape: parts by node and freedom, turns times the typical length
	for _, z := range loose {
		moved := s.movedBodies(z)
		row := make([]float64, 6*len(s.model.Nodes))
		for node := range s.model.Nodes {
			v := carried(moved[s.bodyOf[node]], s.arms[node])
			v = s.scaled(v, 1)
			copy(row[6*node:], v[:])
		}
		rows = append(rows, row)
	}
	rows = separate(rows)
	moves := map[NodeFreedom]bool{}
	for _, row := range rows {
		shape := make([][6]float64, len(s.model.Nodes))
		largest := 0.0
		for _, v := range row {
			largest = max(largest, math.Abs(v))
		}
		for i, v := range row {
			shape[i/6][i%6] = v / largest
			if math.Abs(v) > 1e-6*largest {
				moves[NodeFreedom{i / 6, i % 6}] = true
			}
		}
		for node := range shape {
			shape[node] = s.scaled(shape[node], -1)
		}
		e.Shapes = append(e.Shapes, shape)
	}
	for m := range moves {
		e.Moves = append(e.Moves, m)
	}
	sortFreedoms(e.Moves)
	e.Remedy = s.remedy(rows)
	return e
}

func sortFreedoms(list []NodeFreedom) {
	sort.Slice(list, func(i, j int) bool {
		if list[i].Node != list[j].Node {
			return list[i].Node < list[j].Node
		}
		return list[i].Freedom < list[j].Freedom
	})
}

// separate brings shapes into a form in which each has a part that the others
// lack (Gauss–Jordan elimination with the largest pivot), so that movements that
// have nothing to do with each other come apart.
func separate(rows [][]float64) [][]float64 {
	used := map[int]bool{}
	for k := range rows {
		at, best := 0, 0.0
		for i, v := range rows[k] {
			if !used[i] && math.Abs(v) > best*(1+1e-9) {
				at, best = i, math.Abs(v)
			}
		}
		if best == 0 {
			continue
		}
		used[at] = true
		for o := range rows {
			if o == k {
				continue
			}
			factor := rows[o][at] / rows[k][at]
			largest := 0.0
			for _, v := range rows[o] {
				largest = max(largest, math.Abs(v))
			}
			for i := range rows[o] {
				rows[o][i] -= factor * rows[k][i]
				if math.Abs(rows[o][i]) < 1e-9*largest {
					rows[o][i] = 0
				}
			}
		}
	}
	return rows
}

// remedy picks one restraint for each shape: a large part of it, a movement
// rather than a turn, at a node with a support rather than one without.
func (s *Structure) remedy(rows [][]float64) []NodeFreedom {
	supported := map[int]bool{}
	for i := range s.model.Supports {
		supported[s.model.Supports[i].Node] = true
	}
	work := make([][]float64, len(rows))
	for i := range rows {
		work[i] = slices.Clone(rows[i])
	}
	var list []NodeFreedom
	for k := range work {
		largest := 0.0
		for _, v := range work[k] {
			largest = max(largest, math.Abs(v))
		}
		if largest == 0 {
			continue
		}
		at, best := 0, 0.0
		for i, v := range work[k] {
			worth := math.Abs(v)
			if i%6 >= 3 {
				worth /= 4
			}
			if supported[i/6] {
				worth *= 3
			}
			if math.Abs(v) > 0.2*largest && worth > best*(1+1e-6) {
				at, best = i, worth
			}
		}
		list = append(list, NodeFreedom{at / 6, at % 6})
		for o := k + 1; o < len(work); o++ {
			factor := work[o][at] / work[k][at]
			for i := range work[o] {
				work[o][i] -= factor * work[k][i]
			}
		}
	}
	sortFreedoms(list)
	return list
}
