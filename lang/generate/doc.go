// Package generate writes models of any size as text, for benchmarks and load
// tests. The structures are invented.
//
// What lives here: text, and how many members it has. What does not: models
// that people read; those are in testdata/models.
package generate
