// Package feature answers what an editor asks about a model: one file for each
// feature, named as the file in lsp that speaks the protocol for it.
//
// Functions take a snapshot and a place, and return plain results: spans, paths,
// text. They do not change anything and wait for nothing; numbers are those of
// the last solve, and what is shown says which version of the text they belong
// to.
//
// What does not live here: types of the protocol and positions in its terms
// (lsp), keeping models solved (lsp/workspace).
package feature
