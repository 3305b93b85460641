package syntax

import (
	"sort"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
)

// Statement is one statement, read. It holds nothing that depends on where it
// stands, so that it survives edits elsewhere; its address stays the same as
// long as its text does. It does not change.
type Statement struct {
	Kind Kind
	Text string // from the first to the last token that means something
	// Tree is a pointer to the production of the kind (*NodeStatement …), with
	// what could be read also where the statement is broken; nil where nothing
	// could be, and for a closing brace.
	Tree any
	// Problems are what is wrong with the statement by itself; a statement with
	// one is broken and must not be taken at its word.
	Problems []Problem
}

// Broken reports whether the statement has a syntax error.
func (s *Statement) Broken() bool { return len(s.Problems) > 0 }

// Unit is a statement in its place in a file.
type Unit struct {
	Start, End int // offsets in the file
	// Block is what the statement stands in; for a closing brace, what it closes.
	Block     Block
	Statement *Statement

	before   Block // the splitter's state when it came to the statement
	implicit bool
}

// Span returns the statement's place in the file.
func (u *Unit) Span() source.Span { return source.Span{Start: u.Start, End: u.End} }

// Tree is one file, read. It does not change.
type Tree struct {
	File  *source.File
	Units []Unit
	// end is the block that is still open at the end of the file.
	end Block
}

// UnitAt returns the index of the unit that holds an offset or ends there, or
// −1.
func (t *Tree) UnitAt(offset int) int {
	i := sort.Search(len(t.Units), func(i int) bool { return t.Units[i].End >= offset })
	if i < len(t.Units) && t.Units[i].Start <= offset {
		return i
	}
	return -1
}

// UnitBefore returns the index of the last unit that starts at or before an
// offset, or −1.
func (t *Tree) UnitBefore(offset int) int {
	return sort.Search(len(t.Units), func(i int) bool { return t.Units[i].Start > offset }) - 1
}

// Opening returns the index of the case or part statement whose block holds
// unit i, or −1. A closing brace counts as inside its block.
func (t *Tree) Opening(i int) int {
	depth := 0
	for j := i - 1; j >= 0; j-- {
		switch t.Units[j].Statement.Kind {
		case CloseKind:
			depth++
		case CaseKind, PartKind:
			if t.Units[i].Block == TopLevel {
				return -1
			}
			if depth == 0 {
				return j
			}
			depth--
		}
	}
	return -1
}

// Closing returns the index of the brace that closes the block opened by unit
// i, or −1 where it is missing.
func (t *Tree) Closing(i int) int {
	depth := 0
	for j := i + 1; j < len(t.Units); j++ {
		u := &t.Units[j]
		if u.implicit {
			if depth == 0 {
				return -1
			}
			depth--
		}
		switch u.Statement.Kind {
		case CloseKind:
			if depth == 0 {
				return j
			}
			depth--
		case CaseKind, PartKind:
			depth++
		}
	}
	return -1
}

// Description returns the comment lines directly above unit i, without their
// "#", or "".
func (t *Tree) Description(i int) string {
	line := t.File.LineAt(t.Units[i].Start)
	text := ""
	for line--; line >= 0; line-- {
		content := trimBlank(t.File.Text[t.File.LineStart(line):t.File.LineEnd(line)])
		if len(content) == 0 || content[0] != '#' {
			break
		}
		text = trimBlank(content[1:]) + "\n" + text
	}
	return trimBlank(text)
}

func trimBlank(s string) string {
	for len(s) > 0 && (s[0] == ' ' || s[0] == '\t' || s[0] == '\n') {
		s = s[1:]
	}
	for len(s) > 0 && (s[len(s)-1] == ' ' || s[len(s)-1] == '\t' || s[len(s)-1] == '\n') {
		s = s[:len(s)-1]
	}
	return s
}

// Diagnostics returns what is wrong with the file's syntax, in order.
func (t *Tree) Diagnostics() []diagnostic.Diagnostic {
	var all []diagnostic.Diagnostic
	for i := range t.Units {
		u := &t.Units[i]
		for p := range u.Statement.Problems {
			all = append(all, u.Statement.Problems[p].diagnose(t.File.Path, u))
		}
		if u.implicit {
			all = append(all, t.unclosedBlock(i))
		}
		if u.Statement.Kind == CloseKind && u.Block == TopLevel {
			p := Problem{Name: "stray-brace", Span: source.Span{End: 1}, Summary: "This brace closes nothing. Delete it.",
				Fix: &ProblemFix{Title: "Delete the brace", Span: source.Span{End: 1}}}
			all = append(all, p.diagnose(t.File.Path, u))
		}
	}
	if t.end != TopLevel {
		all = append(all, t.unclosedBlock(len(t.Units)))
	}
	return all
}

// unclosedBlock says that the block open before unit i lacks its brace.
func (t *Tree) unclosedBlock(i int) diagnostic.Diagnostic {
	opening, depth := -1, 0
	for j := i - 1; j >= 0 && opening < 0; j-- {
		switch t.Units[j].Statement.Kind {
		case CloseKind:
			depth++
		case CaseKind, PartKind:
			if depth == 0 {
				opening = j
			}
			depth--
		}
	}
	if opening < 0 {
		opening = max(0, i-1)
	}
	u := &t.Units[opening]
	last := &t.Units[max(i-1, opening)]
	brace := source.Span{Start: u.End - 1, End: u.End}
	return diagnostic.Diagnostic{
		Name: "unclosed-block", Severity: diagnostic.Error, File: t.File.Path,
		Subject: brace, Context: u.Span(),
		Summary: "Close this block: a line with \"}\" is missing behind its last line.",
		Fixes: []diagnostic.Fix{{Title: "Add the closing brace", Preferred: true,
			Edits: []diagnostic.Edit{{Edit: source.Edit{Span: source.At(last.End), New: "\n}"}}}}},
	}
}
