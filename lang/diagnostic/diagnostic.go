package diagnostic

import (
	"cmp"
	"slices"

	"spanwright/lang/source"
)

// Severity says how much a diagnostic matters.
type Severity int

// The severities, gravest first, numbered as the language server protocol does.
const (
	Error Severity = 1 + iota
	Warning
	Information
	Hint
)

// String returns the severity in a word.
func (s Severity) String() string {
	switch s {
	case Error:
		return "error"
	case Warning:
		return "warning"
	case Information:
		return "information"
	}
	return "hint"
}

// Name is the short stable name of a kind of diagnostic, such as
// "unknown-name". Every Name in use stands in the register.
type Name string

// Diagnostic is one thing to say about one place.
type Diagnostic struct {
	Name     Name
	Severity Severity
	// File is the path of the file the diagnostic belongs to (source.File.Path).
	File string
	// Subject is the tight place: the word or number that is wrong.
	Subject source.Span
	// Context is the wider place, the whole statement as a rule. It holds
	// Subject, or is empty.
	Context source.Span
	// Summary is one or two sentences for people: what is wrong, in the
	// engineer's words, and what to do.
	Summary string
	// Detail holds further facts that a reader may want, or is empty.
	Detail string
	// Related are other places that belong to the matter.
	Related []Related
	// Fixes are changes that would mend it, the best first.
	Fixes []Fix
	// Unnecessary marks text that does nothing, which editors fade.
	Unnecessary bool
}

// Related is another place that belongs to a diagnostic, with a word on why.
type Related struct {
	File    string
	Span    source.Span
	Message string
}

// Fix is a change of text that mends a diagnostic.
type Fix struct {
	// Title says what the change does: "Write 4.5 m".
	Title string
	// Edits are the changes, in File of the diagnostic unless they name another.
	Edits []Edit
	// Preferred marks the one fix that is almost surely meant.
	Preferred bool
}

// Edit is a change of text in a file. An empty File is the diagnostic's own.
type Edit struct {
	File string
	source.Edit
}

// Sort puts diagnostics in the order in which people read them: by file,
// place, gravity, name.
func Sort(list []Diagnostic) {
	slices.SortStableFunc(list, func(a, b Diagnostic) int {
		return cmp.Or(
			cmp.Compare(a.File, b.File),
			cmp.Compare(a.Subject.Start, b.Subject.Start),
			cmp.Compare(a.Severity, b.Severity),
			cmp.Compare(a.Name, b.Name),
			cmp.Compare(a.Summary, b.Summary),
		)
	})
}

// Worst returns the gravest severity in the list, and false for an empty list.
func Worst(list []Diagnostic) (Severity, bool) {
	worst, found := Hint, false
	for _, d := range list {
		worst, found = min(worst, d.Severity), true
	}
	return worst, found
}
