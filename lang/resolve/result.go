package resolve

import (
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Result is one version of a model, resolved. It does not change.
type Result struct {
	// Model holds everything that could be resolved.
	Model *model.Model
	// Diagnostics are all of the files' mistakes, those of syntax included, in
	// the order of diagnostic.Sort.
	Diagnostics []diagnostic.Diagnostic
	// Complete reports whether the model is what the text means: false where an
	// error makes numbers wrong.
	Complete bool
	// Library reports that the file has no model line and holds only what other
	// files may use: it is no model, and that is no mistake.
	Library bool
	// Trees are the files, as Model.Files has them.
	Trees []*syntax.Tree

	entries []entry // every statement with what it came to, in the order of the text
	header  header
	global  *scope
	names   nameIndex
	values  valueIndex
}

// entry is one statement of a result, in its scope. Of the fragment only what
// never changes may be read here: statement, scope, place, parameter, kind and
// name.
type entry struct {
	fragment *fragment
	outcome  *outcome
	inner    *scope // of a placed part: its names
	file     int32
	unit     int32
}

// span returns the statement's place in its file.
func (r *Result) span(e *entry) source.Span { return r.Trees[e.file].Units[e.unit].Span() }

// FileIndex returns the index of a file in Trees and Model.Files, or −1.
func (r *Result) FileIndex(path string) int {
	for i, t := range r.Trees {
		if t.File.Path == path {
			return i
		}
	}
	return -1
}
