package diagnostic

import (
	"slices"
	"strings"
)

// Entry is what the register knows of one name.
type Entry struct {
	Name     Name
	Severity Severity // as a rule; a single diagnostic may differ
	// Title is a short heading: "A name that nothing declares".
	Title string
	// Explanation says in a few sentences what it means and why it matters.
	Explanation string
	// Example is a piece of .span text that shows the mistake.
	Example string
	// Mend is the same text, mended, or words on what to do.
	Mend string
}

// Entries returns the whole register, sorted by name. The slice is the
// caller's own.
func Entries() []Entry {
	var all []Entry
	for _, list := range [][]Entry{syntaxEntries(), nameEntries(), quantityEntries(), modelEntries(), analysisEntries()} {
		all = append(all, list...)
	}
	slices.SortFunc(all, func(a, b Entry) int { return strings.Compare(string(a.Name), string(b.Name)) })
	return all
}

// Explain returns the entry of a name, and false where there is none.
func Explain(name Name) (Entry, bool) {
	for _, e := range Entries() {
		if e.Name == name {
			return e, true
		}
	}
	return Entry{}, false
}
