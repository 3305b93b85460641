package sparse

import (
	"errors"
	"slices"
)

// Pattern is the graph of a symmetric matrix in groups.
type Pattern struct {
	// Weights are the numbers of unknowns of the groups, 0 to any. The unknowns
	// are numbered group by group.
	Weights []int
	// Edges are the pairs of groups that share a block. Repeats do no harm.
	Edges [][2]int
	// Coordinates are where the groups lie, for orderings that cut space; nil
	// where unknown.
	Coordinates [][3]float64
}

// ErrPattern says that an edge names a group that is not there, or that a weight
// is negative.
var ErrPattern = errors.New("sparse: edge or weight out of range")

// adjacency returns the neighbours of each group, sorted, each once.
func (p *Pattern) adjacency() ([][]int32, error) {
	n := len(p.Weights)
	count := make([]int32, n)
	for _, w := range p.Weights {
		if w < 0 {
			return nil, ErrPattern
		}
	}
	for _, e := range p.Edges {
		if e[0] < 0 || e[1] < 0 || e[0] >= n || e[1] >= n {
			return nil, ErrPattern
		}
		if e[0] != e[1] {
			count[e[0]]++
			count[e[1]]++
		}
	}
	lists := make([][]int32, n)
	total := 0
	for _, c := range count {
		total += int(c)
	}
	pool := make([]int32, total)
	for i, c := range count {
		lists[i], pool = pool[:0:c], pool[c:]
	}
	for _, e := range p.Edges {
		if a, b := e[0], e[1]; a != b {
			lists[a] = append(lists[a], int32(b))
			lists[b] = append(lists[b], int32(a))
		}
	}
	for i := range lists {
		slices.Sort(lists[i])
		lists[i] = slices.Compact(lists[i])
	}
	return lists, nil
}
