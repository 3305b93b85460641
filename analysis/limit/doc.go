// Package limit checks acceptance criteria: which combination governs, where
// along the member, with what margin, and which come next. It also knows how
// elastic stresses follow from section forces ([StressOf]).
//
// # What is compared with the bound
//
// "At most" a positive bound limits a size: a movement of −25 mm breaks
// "uz at B <= 20 mm", a column in compression breaks "axial of c1 <= 500 kN".
// "At least", and "at most" a bound of zero or below, limit the signed value:
// "reaction Fz at A >= 0 kN" is about uplift. Deflection, drift, shear and
// moment are sizes always.
//
// What does not live here: solving, the search along members
// (analysis/envelope), and the words of diagnostics (analysis).
package limit
