// Package frame solves plane and space frames by the direct stiffness method:
// numbering, assembly, supports, one-way members, the linear solve, mechanisms,
// and the stiffness of the structure at a node.
//
// # How movements are described
//
// A body is a node, or several nodes that rigid links join. A body moves as a
// rigid one: by ux, uy, uz, rx, ry, rz of its first node, of which a plane model
// has ux, uz and ry. Everything that is rigid is a change of coordinates and
// never a large number: links and offsets are arms from the body's reference
// point to a member's end; what the supports hold is taken out of a body's
// movements, which leaves
//
//	q = q₀ + B x
//
// with q₀ the prescribed movement, B a basis of the movements that are left and
// x the free coordinates, the unknowns of the solve. B holds unit vectors where
// supports stand square to the axes, so that a usual model is solved in the
// usual freedoms. Turns of a node that nothing resists (every member is hinged
// there) are taken out in the same way: they are inactive, not a fault.
//
// # Files, in the order of the work
//
// body.go, basis.go, segment.go make the structure; span.go turns loads into
// loads on elements; assemble.go, solve.go, state.go solve it; oneway.go finds
// which one-way parts act; mechanism.go explains what has no answer; curves.go
// recovers what happens along members; stiffness.go answers what was asked for;
// trust.go says how good it is; reuse.go keeps what an edit leaves.
//
// What does not live here: the equations of one member (analysis/element), the
// sparse factorisation (analysis/sparse), combinations of load cases (package
// analysis), text.
package frame
