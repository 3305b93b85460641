package analysis

import (
	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
)

// state is one solved set of loads: a load case, or a combination where one-way
// parts forbid superposing.
type state interface {
	// Movement returns that of a node, global, m and rad.
	Movement(node int) [6]float64
	// Reaction returns what the supports of a node do to it, global, N and Nm.
	Reaction(node int) [6]float64
	// Pieces returns the curves along a whole physical member, and whether the
	// departure from its chord is known.
	Pieces(member int) (pieces []element.Piece, bentKnown bool)
	// Ends returns what the nodes do to the member's first and last end, in
	// member axes.
	Ends(member int) [2][6]float64
	// Resultants returns those of loads and reactions about the origin.
	Resultants() (applied, reacted [6]float64)
	// Residual is what is left of both, relative to their size.
	Residual() float64
}

// summed adds six numbers of each state as a sum says.
func summed(sum envelope.Sum, of func(state int) [6]float64) (total [6]float64) {
	for _, t := range sum {
		values := of(t.State)
		for i := range total {
			total[i] += t.Factor * values[i]
		}
	}
	return total
}
