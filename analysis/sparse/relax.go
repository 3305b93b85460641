package sparse

import "slices"

// merger joins supernodes with their parents while few zeros come of it.
type merger struct {
	tree    *tree
	weights []int
	nodes   []mergeNode
}

// mergeNode is a supernode on its way.
type mergeNode struct {
	steps    []int32 // eliminated here
	left     []int32 // steps left in its columns
	pivots   int     // unknowns eliminated
	rows     int     // unknowns left
	zeros    int     // stored for nothing
	parent   int32
	children []int32
	gone     bool
}

func newMerger(t *tree, last []int32, weights []int) *merger {
	m := &merger{tree: t, weights: weights}
	number := make([]int32, len(last))
	for k := 0; k < len(last); k = int(last[k]) + 1 {
		node := mergeNode{parent: -1, left: t.structure[last[k]]}
		for j := k; j <= int(last[k]); j++ {
			number[j] = int32(len(m.nodes))
			node.steps = append(node.steps, int32(j))
			node.pivots += weights[t.order[j]]
		}
		for _, j := range node.left {
			node.rows += weights[t.order[j]]
		}
		m.nodes = append(m.nodes, node)
	}
	for i := range m.nodes {
		if left := m.nodes[i].left; len(left) > 0 {
			p := number[left[0]]
			m.nodes[i].parent = p
			m.nodes[p].children = append(m.nodes[p].children, int32(i))
		}
	}
	return m
}

// allowedZeros returns the share of zeros that a supernode of so many pivots may
// store: small fronts waste little, and every front has its fixed costs.
func allowedZeros(pivots int) float64 {
	switch {
	case pivots <= 24:
		return 0.5
	case pivots <= 96:
		return 0.15
	case pivots <= 288:
		return 0.08
	}
	return 0.03
}

// relax merges each supernode into its parent where the share of zeros allows,
// parents in the order of elimination, the child with the most rows first.
func (m *merger) relax() {
	for p := range m.nodes {
		for m.mergeOne(int32(p)) {
		}
	}
}

// mergeOne merges the best child of p into it, and reports whether there was
// one.
func (m *merger) mergeOne(p int32) bool {
	parent := &m.nodes[p]
	best, bestShare, bestZeros := int32(-1), 2.0, 0
	for _, c := range parent.children {
		child := &m.nodes[c]
		pivots := child.pivots + parent.pivots
		// The child's columns grow to all rows of the parent.
		zeros := child.zeros + parent.zeros + child.pivots*(parent.pivots+parent.rows-child.rows)
		stored := pivots*(pivots+1)/2 + pivots*parent.rows
		share := float64(zeros) / float64(max(stored, 1))
		if (zeros == child.zeros+parent.zeros || share <= allowedZeros(pivots)) && share < bestShare {
			best, bestShare, bestZeros = c, share, zeros
		}
	}
	if best < 0 {
		return false
	}
	child := &m.nodes[best]
	parent.steps = append(append([]int32(nil), child.steps...), parent.steps...)
	parent.pivots += child.pivots
	parent.zeros = bestZeros
	child.gone = true
	kept := parent.children[:0]
	for _, c := range parent.children {
		if c != best {
			kept = append(kept, c)
		}
	}
	parent.children = append(kept, child.children...)
	slices.Sort(parent.children)
	return true
}

// result returns the supernodes in an order in which children come right before
// their parents, groups in place of steps.
func (m *merger) result() []supernode {
	var list []supernode
	var visit func(i int32)
	visit = func(i int32) {
		node := &m.nodes[i]
		for _, c := range node.children {
			visit(c)
		}
		sn := supernode{}
		steps := slices.Clone(node.steps)
		slices.Sort(steps)
		for _, k := range steps {
			sn.own = append(sn.own, m.tree.order[k])
		}
		for _, k := range node.left {
			sn.left = append(sn.left, m.tree.order[k])
		}
		list = append(list, sn)
	}
	for i := range m.nodes {
		if m.nodes[i].parent < 0 && !m.nodes[i].gone {
			visit(int32(i))
		}
	}
	return list
}
