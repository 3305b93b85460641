package resolve

import (
	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// fragment is one statement in one scope: a line of a file, or a line of a
// part as it stands in one of the part's places. It belongs to a session,
// which keeps it from edit to edit; its outcome is replaced, never changed.
type fragment struct {
	nameAt    source.Span // see nameSpan; worked out once, because every version asks for it
	sheet     *sheet
	statement *syntax.Statement
	unit      int    // index into the sheet's units, of the edit at hand
	scope     *scope // where the statement looks names up
	place     *fragment
	owner     *fragment // the case that a load line stands in, or nil
	parameter int       // for a parameter: its number among the part's; else −1
	// partStatement is, for a parameter, the opening of the part that declares it.
	partStatement *syntax.Statement
	kind          Kind
	name          *symbol     // what the statement declares, or nil
	inner         *instance   // what a place makes of its part
	body          []line      // of a part: its lines
	use           *useProblem // of a use: why the file cannot be had
	expansion     expansion   // of a place: why it makes nothing of its part

	order        int
	state        state
	must         bool // evaluate without asking whether anything has changed
	dependencies []dependency
	outcome      *outcome
	evaluated    int // revision of the last evaluation
	changed      int // revision in which the outcome last changed
	index        int // in the model's slice of its kind, set at each assembly; −1: not in the model

	bodies []*body // where a node or member stands in the grid

	visit, low int // for finding cycles
	open       bool
}

type state uint8

const (
	clean state = iota
	dirty
)

// outcome is what a statement comes to. It does not change once it is made.
type outcome struct {
	findings   []finding
	references []reference
	units      uint64 // the units written, by their bit in unitBits
	result     any    // *letResult, *nodeResult …; nil where there is none
	cycle      *cycle // the definitions that run in a circle with this one
}

// finding is a diagnostic whose places are relative to the statement.
type finding struct {
	diagnostic.Diagnostic
	related []relation
	unknown *unknownName // for a name that stands for nothing: the words come later
}

// relation is another place of a finding: where a name is declared, or where a
// fragment without a name stands. A name's line may have been written anew since
// the finding, without the finding being any different.
type relation struct {
	symbol   *symbol
	fragment *fragment // where symbol is nil
	message  string
}

// stands returns the fragment at the place, or nil where there is none any more.
func (r *relation) stands() *fragment {
	if r.symbol != nil {
		return r.symbol.winner()
	}
	return r.fragment
}

// reference is a name in the text with what it stands for.
type reference struct {
	span   source.Span // relative to the statement
	symbol *symbol
}

// cycle is a set of definitions that need each other, in the order of the text.
type cycle struct{ members []*fragment }

// nameSpan returns the place of the declared name relative to the statement,
// or of the statement's first word.
func (f *fragment) nameSpan() source.Span {
	if f.nameAt.End > 0 {
		return f.nameAt
	}
	if n := f.statement.Declares(); n != nil {
		return n.Span()
	}
	for i := range len(f.statement.Text) {
		if c := f.statement.Text[i]; c == ' ' || c == '\t' || c == ':' || c == ',' {
			return source.Span{End: i}
		}
	}
	return source.Span{End: len(f.statement.Text)}
}

// kindOf returns what a statement declares.
func kindOf(s *syntax.Statement) Kind {
	switch s.Kind {
	case syntax.LetKind:
		return LetName
	case syntax.MaterialKind:
		return MaterialName
	case syntax.SectionKind:
		return SectionName
	case syntax.NodeKind:
		return NodeName
	case syntax.BeamKind:
		return BeamName
	case syntax.BarKind:
		return BarName
	case syntax.LinkKind:
		return LinkName
	case syntax.SpringKind:
		return SpringName
	case syntax.GroupKind:
		return GroupName
	case syntax.CaseKind:
		return CaseName
	case syntax.CombinationKind:
		return CombinationName
	case syntax.FamilyKind:
		return FamilyName
	case syntax.PartKind:
		return PartName
	case syntax.PlaceKind:
		return PlaceName
	}
	return NoKind
}
