package sparse

import "slices"

// minimumDegree orders a graph by approximate minimum degree on the quotient
// graph (Amestoy, Davis and Duff, An approximate minimum degree ordering
// algorithm, SIAM J. Matrix Anal. Appl. 17, 1996). Degrees count weights, that
// is unknowns. Eliminated groups become elements; an element that a new one
// covers is absorbed. Of equal degrees the lowest number goes first, so that
// the order is the same on every run.
func minimumDegree(neighbours [][]int32, weights []int) []int32 {
	n := len(weights)
	q := &quotient{
		weights: weights, variables: make([][]int32, n), elements: make([][]int32, n), members: make([][]int32, n),
		eliminated: make([]bool, n), absorbed: make([]bool, n), mark: make([]int, n), outside: make([]int, n), stamp: make([]int, n),
		degree: make([]int, n),
	}
	total := 0
	for _, w := range weights {
		total += w
	}
	q.queue = newQueue(n, total+1)
	for i := range n {
		q.variables[i] = slices.Clone(neighbours[i])
		for _, j := range neighbours[i] {
			q.degree[i] += weights[j]
		}
		q.queue.insert(i, q.degree[i])
	}
	order := make([]int32, 0, n)
	for len(order) < n {
		p := q.queue.popSmallest()
		order = append(order, int32(p))
		q.eliminate(p)
	}
	return order
}

// quotient is the graph of what is left: variables, and the elements that
// elimination made.
type quotient struct {
	weights    []int
	variables  [][]int32 // by variable: neighbours that no element covers
	elements   [][]int32 // by variable: elements that it belongs to
	members    [][]int32 // by element: its variables that are left
	eliminated []bool
	absorbed   []bool
	degree     []int
	queue      *queue

	mark, stamp []int
	outside     []int // by element: weight of its members outside the new element
	clock       int
}

// eliminate makes variable p an element and updates the degrees around it.
func (q *quotient) eliminate(p int) {
	q.eliminated[p] = true
	q.clock++
	q.mark[p] = q.clock
	var boundary []int32
	gather := func(list []int32) {
		for _, v := range list {
			if !q.eliminated[v] && q.mark[v] != q.clock {
				q.mark[v] = q.clock
				boundary = append(boundary, v)
			}
		}
	}
	gather(q.variables[p])
	for _, e := range q.elements[p] {
		if !q.absorbed[e] {
			gather(q.members[e])
			q.absorbed[e] = true
			q.members[e] = nil
		}
	}
	q.variables[p], q.elements[p] = nil, nil
	slices.Sort(boundary)
	q.members[p] = boundary
	weight := 0
	for _, v := range boundary {
		weight += q.weights[v]
	}
	q.countOutside(boundary)
	for _, v := range boundary {
		q.update(int(v), p, weight)
	}
}

// countOutside works out, for each element next to the boundary, the weight of
// its members that are not in it.
func (q *quotient) countOutside(boundary []int32) {
	for _, v := range boundary {
		for _, e := range q.elements[v] {
			if q.absorbed[e] {
				continue
			}
			if q.stamp[e] != q.clock {
				q.stamp[e] = q.clock
				q.outside[e] = 0
				live := q.members[e][:0]
				for _, m := range q.members[e] {
					if !q.eliminated[m] {
						live = append(live, m)
						q.outside[e] += q.weights[m]
					}
				}
				q.members[e] = live
			}
			q.outside[e] -= q.weights[v]
		}
	}
}

// update joins variable v to the new element p and estimates its degree.
func (q *quotient) update(v, p, weight int) {
	elements := q.elements[v][:0]
	degree := weight - q.weights[v]
	for _, e := range q.elements[v] {
		if q.absorbed[e] {
			continue
		}
		if q.outside[e] == 0 { // covered by p
			q.absorbed[e] = true
			q.members[e] = nil
			continue
		}
		degree += q.outside[e]
		elements = append(elements, e)
	}
	q.elements[v] = append(elements, int32(p))
	variables := q.variables[v][:0]
	for _, u := range q.variables[v] {
		if !q.eliminated[u] && q.mark[u] != q.clock {
			variables = append(variables, u)
			degree += q.weights[u]
		}
	}
	q.variables[v] = variables
	q.queue.remove(v, q.degree[v])
	q.degree[v] = min(degree, q.degree[v]+weight)
	q.queue.insert(v, q.degree[v])
}

// queue holds variables by degree, in lists linked both ways.
type queue struct {
	head           []int32 // by degree
	next, previous []int32
	smallest       int
}

func newQueue(n, degrees int) *queue {
	q := &queue{head: make([]int32, degrees+1), next: make([]int32, n), previous: make([]int32, n)}
	for i := range q.head {
		q.head[i] = -1
	}
	return q
}

func (q *queue) bound(degree int) int { return min(degree, len(q.head)-1) }

func (q *queue) insert(v, degree int) {
	degree = q.bound(degree)
	q.next[v], q.previous[v] = q.head[degree], -1
	if h := q.head[degree]; h >= 0 {
		q.previous[h] = int32(v)
	}
	q.head[degree] = int32(v)
	q.smallest = min(q.smallest, degree)
}

func (q *queue) remove(v, degree int) {
	degree = q.bound(degree)
	if q.previous[v] >= 0 {
		q.next[q.previous[v]] = q.next[v]
	} else {
		q.head[degree] = q.next[v]
	}
	if q.next[v] >= 0 {
		q.previous[q.next[v]] = q.previous[v]
	}
}

func (q *queue) popSmallest() int {
	for q.head[q.smallest] < 0 {
		q.smallest++
	}
	v := int(q.head[q.smallest])
	q.remove(v, q.smallest)
	return v
}
