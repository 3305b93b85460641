// Package combine forms the combinations that a code of practice asks for.
// [Expand] turns the families of a model, and the combinations written in it
// by hand, into one list of factored cases with stable readable names.
//
// # How a code is written down
//
// A code is data, not program. One [code] value holds, each with its source,
//
//   - its expressions for every situation. An expression is the factor of the
//     permanent cases and a list of terms; a term picks one, at most one, or
//     any of its choices; a choice is an action with its factor;
//   - its partial factors γ and its ψ factors, where it has them;
//   - the actions that it never lets act together.
//
// The generator (arrange.go) knows nothing of any code: it walks through all
// arrangements that an expression allows, drops those with two alternates in
// them, and drops duplicates.
//
// # What counts as an arrangement
//
// A case is the smallest thing that acts: it is there as a whole or not at
// all, and takes one factor.
//
//   - Each permanent case is a source of its own (the single-source rule of EN
//     1990, table A1.2(B), note 3): where a code has an unfavourable and a
//     favourable factor, each permanent case takes either, in all mixtures. So
//     what comes from one source belongs in one case. The family option
//     rule one-source gives all permanent cases the same factor instead.
//   - Cases of one kind (imposed: one kind and category) are parts of one
//     action, as pattern loads are: any of them act, all with the same rank,
//     leading or accompanying (EN 1991-1-1, 3.3.1(2) and 6.2.1(1)). Cases that
//     exclude each other, as wind from left and from right, are declared so
//     with the statement alternate.
//   - A variable action may be absent from any arrangement, because it may
//     help elsewhere.
//   - Settlement is permanent, but may not come: it is there with its
//     unfavourable factor, or not at all.
//
// Nothing that could govern somewhere is left out, and nothing is left out
// for being governed by others in a particular model.
//
// # Names
//
// A combination is called after the cases that act beside the permanent ones:
// FAMILY.LEADING+OTHERS, the others in alphabetical order. A minus sign at the
// end says that the permanent cases take their favourable factor; −G2 that
// only G2 does. Where nothing else acts the name is FAMILY.G (FAMILY.D under
// ASCE 7), and the two expressions of 6.10a/b write a. or b. before the cases.
// So ULS.S+W has the snow leading and the wind beside it, ULS.W− is the wind
// with the least permanent load. A name depends on the cases in it alone: it
// stays when other cases or families come and go or statements change places.
//
// In the model language, where + and − are operators, and in a shell, the
// same combination is spelt with letters alone: ULS.S_W, ULS.W_low
// ([Spelling]). [Find] takes every spelling.
//
// # How to add a code of practice
//
//  1. Add its name to model.Code, and its situations to model.Situation if it
//     has new ones.
//  2. Write its tables in a file of its own, as en1990.go and asce7.go do,
//     with the source (standard, year, clause) beside each number, and list
//     its [code] in codes (code.go).
//  3. Write a test that states a handful of its combinations as the standard
//     prints them, with numbers from a worked example.
//
// What does not live here: solving and superposing (analysis/frame, analysis),
// and the reading of families from text (lang/resolve).
package combine
