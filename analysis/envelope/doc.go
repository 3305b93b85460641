// Package envelope finds the largest and smallest values of a quantity along a
// member over many combinations, exactly and without forming each combination.
//
// A quantity along a member is a [Path]: on each piece between two breaks a
// polynomial for each basic state (a load case, as a rule). A combination is a
// [Sum] of states with factors, so its course is the same sum of polynomials.
// Besides its coefficients each polynomial is kept in Bernstein form: a
// polynomial never leaves the range of its Bernstein coefficients, and it takes
// the first and the last of them at the piece's ends (G. Farin, Curves and
// Surfaces for CAGD, 5th ed., 2002, chapter 5). So most combinations are known
// not to govern after a handful of multiplications, and only what is left is
// searched for stationary places, by the roots of the derivative.
//
// Values that differ by less than rounding does (a part in 1e12) count as equal;
// of equal ones the first combination governs, and in it the place nearest the
// first end. So a name does not change where only rounding did.
//
// What does not live here: what the paths mean (analysis, analysis/limit).
package envelope
