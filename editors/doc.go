// Package editors has no code: the folders beside it hold set-ups for editors,
// and the tests keep their word lists in step with the language.
//
// What lives here: grammars, start-up snippets, the VS Code extension, and the
// scripts that drive real editors against the built program (test, tests/).
// What does not: anything that an editor can ask the language server for.
package editors
