// Package sparse solves large sparse symmetric systems whose unknowns come in
// small groups: the freedoms of nodes. It knows nothing of structures.
//
// The work has three phases. [Analyse] orders the graph of the groups, weighted
// with their freedoms, by approximate minimum degree and finds the elimination
// tree, supernodes and all positions (the symbolic phase). [Factor.Factorize]
// is a multifrontal Cholesky factorisation, each supernode a dense front whose
// panel stays in the factor and whose update goes to its parent; it allocates
// nothing when it is run again. [Factor.Solve] substitutes forward and back for
// any number of right-hand sides at once.
//
// The matrix is scaled to a unit diagonal before it is factorised, so that a
// pivot is the share of a freedom's own stiffness that the others leave it.
//
// What does not live here: assembly of elements, supports, and the judgement
// whether a small pivot is a mechanism (analysis/frame).
package sparse
