// Package model is the structure itself: the resolved, typed model that
// lang/resolve makes from the text and that analysis sees.
//
// All values are SI (m, N, kg, rad, K, Pa and products of them). Things refer
// to each other by their index in the model's slices; −1 means none. Every
// thing knows its [Origin], the place in the text that it came from, so that
// whatever an analysis has to say about it can be shown there. A Model does
// not change once it is made: an edit makes a new one.
//
// Axes and signs are those of the language: right-handed, z up; a plane model
// lies in x–z with freedoms ux, uz, ry. Member axes: x from first node to
// last; z in the vertical plane through the member, upward; y = z × x; a
// vertical member takes y along global y; roll turns y and z about x.
//
// What does not live here: syntax, names that could not be resolved, the
// finding of mistakes, and anything that is computed from stiffness.
package model
