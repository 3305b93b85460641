package sparse

import "slices"

// tree is the elimination tree on groups, with the structure of each column.
type tree struct {
	order     []int32   // group by step
	structure [][]int32 // by step: later steps in the column, sorted
	parent    []int32   // by step, or −1
}

// eliminate finds the column structures of the factor in the given order: those
// of the matrix joined with those of the children.
func eliminate(neighbours [][]int32, order []int32) *tree {
	n := len(order)
	step := make([]int32, n)
	for k, g := range order {
		step[g] = int32(k)
	}
	t := &tree{order: order, structure: make([][]int32, n), parent: make([]int32, n)}
	children := make([][]int32, n)
	mark := make([]int32, n)
	for i := range mark {
		mark[i] = -1
	}
	for k, g := range order {
		mark[k] = int32(k)
		var column []int32
		add := func(j int32) {
			if j > int32(k) && mark[j] != int32(k) {
				mark[j] = int32(k)
				column = append(column, j)
			}
		}
		for _, u := range neighbours[g] {
			add(step[u])
		}
		for _, c := range children[k] {
			for _, j := range t.structure[c] {
				add(j)
			}
		}
		slices.Sort(column)
		t.structure[k], t.parent[k] = column, -1
		if len(column) > 0 {
			t.parent[k] = column[0]
			children[column[0]] = append(children[column[0]], int32(k))
		}
	}
	return t
}

// postorder renumbers the steps so that every subtree is a run of steps that
// ends with its root.
func (t *tree) postorder() {
	n := len(t.order)
	children := make([][]int32, n)
	var roots []int32
	for k := range n {
		if p := t.parent[k]; p >= 0 {
			children[p] = append(children[p], int32(k))
		} else {
			roots = append(roots, int32(k))
		}
	}
	renumbered := make([]int32, n)
	next := int32(0)
	type visit struct{ step, child int32 }
	var stack []visit
	for _, r := range roots {
		stack = append(stack, visit{r, 0})
		for len(stack) > 0 {
			top := &stack[len(stack)-1]
			if c := children[top.step]; int(top.child) < len(c) {
				top.child++
				stack = append(stack, visit{c[top.child-1], 0})
				continue
			}
			renumbered[top.step] = next
			next++
			stack = stack[:len(stack)-1]
		}
	}
	order, structure, parent := make([]int32, n), make([][]int32, n), make([]int32, n)
	for k := range n {
		to := renumbered[k]
		order[to] = t.order[k]
		column := t.structure[k]
		for i := range column {
			column[i] = renumbered[column[i]]
		}
		slices.Sort(column)
		structure[to] = column
		parent[to] = -1
		if t.parent[k] >= 0 {
			parent[to] = renumbered[t.parent[k]]
		}
	}
	t.order, t.structure, t.parent = order, structure, parent
}

// supernode is groups that are eliminated together, and those that are left in
// their columns.
type supernode struct{ own, left []int32 }

// supernodes joins columns whose structures nest, first without loss and then
// while the share of zeros stored stays small.
func (t *tree) supernodes(weights []int) []supernode {
	joined := t.nested()
	m := newMerger(t, joined, weights)
	m.relax()
	return m.result()
}

// nested returns, by step, the last step of the maximal supernode that holds it.
func (t *tree) nested() []int32 {
	n := len(t.order)
	children := make([]int32, n)
	for k := range n {
		if p := t.parent[k]; p >= 0 {
			children[p]++
		}
	}
	last := make([]int32, n)
	for k := n - 1; k >= 0; k-- {
		last[k] = int32(k)
		if k+1 < n && t.parent[k] == int32(k+1) && len(t.structure[k]) == len(t.structure[k+1])+1 {
			last[k] = last[k+1]
		}
	}
	return last
}
