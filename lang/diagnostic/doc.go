// Package diagnostic describes what spanwright has to say about a model's
// text: one [Diagnostic] for one mistake, and the register of all their names
// with the explanation, an example and the mend of each ([Explain]).
//
// What does not live here: finding mistakes (lang/syntax, lang/resolve,
// analysis do) and showing them (cmd and lsp do).
package diagnostic
