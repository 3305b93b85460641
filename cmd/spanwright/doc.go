// Command spanwright is the language server, formatter and command line for
// .span files, plain-text models of frames and trusses.
//
// One file per command; what they share is in terminal.go (what people see),
// project.go (files and models) and outcome.go (exit status). Nothing that a
// command computes lives here: it asks lang, fmt, analysis and lsp.
package main
