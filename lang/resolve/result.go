package resolve

import (
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
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
}

// entry is one statement of a result.
type entry struct {
	fragment *fragment // only its parts that never change may be read here
	outcome  *outcome
	file     int
	unit     int
}
