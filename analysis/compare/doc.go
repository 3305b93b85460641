// Package compare says what changed from one model to another, by meaning, and
// what that did to the structure.
//
//	c, err := compare.Of(ctx, compare.Side{old, oldResults}, compare.Side{new, newResults}, compare.Options{})
//
// # How it works
//
// Every thing of a model is described by attributes (describe.go): what it is,
// with the names of what it refers to. Things of equal name whose attributes
// differ have changed; things that only one model has were added or removed,
// unless one of each has equal attributes: then it was renamed, and what refers
// to it is compared under the new name. Order, units, spacing and the way in
// which a value is worked out are no attributes, so they never show.
//
// Effects (effects.go) are differences of results: reactions, governing forces,
// movements, limits, mass. What differs less than solver noise does not differ.
//
// What does not live here: reading files and revisions, and writing tables (cmd).
package compare
