package resolve

import (
	"cmp"
	"slices"
	"sort"
	"sync"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Definition is a thing with a name, at the place in the text that declares it.
// What a part declares is one definition, however often the part is placed.
type Definition struct {
	// Name is as the declaring line writes it: "A", "ULS.a".
	Name string
	Kind Kind
	// Full are the names in the model: "A" itself, or "F1.A", "F2.A" for what
	// stands in a placed part. A part that is not placed has none for its things.
	Full []string
	File string
	// Span is the place of the name, Statement that of the whole statement.
	Span, Statement source.Span
	// Description is the comment above the statement.
	Description string
	// Part is the name of the part that the thing belongs to, or "".
	Part string
	// Uses counts the places that name it, its own line not counted.
	Uses int
}

// Reference is a name in the text: where it is declared, or where it is used.
type Reference struct {
	File string
	Span source.Span
	// Definition is what the name stands for.
	Definition *Definition
	// Declaration marks the name in its declaring line.
	Declaration bool
}

// site is where a definition stands.
type site struct {
	file  int32
	start int
}

// nameIndex is made when it is first asked for.
type nameIndex struct {
	once        sync.Once
	definitions []*Definition
	bySymbol    map[*symbol]*Definition
	byFile      [][]Reference // by file, in the order of the text
}

// index makes the index of names.
func (r *Result) index() *nameIndex {
	r.names.once.Do(func() { r.makeIndex() })
	return &r.names
}

func (r *Result) makeIndex() {
	declared := r.indexDefinitions()
	r.indexReferences(declared)
}

// indexDefinitions finds the definitions. It returns them by the entry that is
// the first to declare them.
func (r *Result) indexDefinitions() (declared []*Definition) {
	n := &r.names
	n.bySymbol = make(map[*symbol]*Definition, len(r.entries))
	declared = make([]*Definition, len(r.entries))
	all := make([]Definition, 0, len(r.entries)) // in one piece: there are many, and they live and die together
	sites := map[site]*Definition{}              // of what may be declared more than once: a line of a part
	for i := range r.entries {
		e := &r.entries[i]
		f := e.fragment
		if f.name == nil || n.bySymbol[f.name] != nil {
			continue
		}
		file, unit, span := r.declares(e)
		tree := r.Trees[file]
		block := tree.Units[unit].Block
		inPart := f.parameter >= 0 || block == syntax.InPart || block == syntax.InCaseOfPart
		at := site{file, span.Start}
		var d *Definition
		if inPart {
			d = sites[at]
		}
		if d == nil {
			all = append(all, Definition{Name: f.name.name, Kind: f.kind, File: tree.File.Path, Span: span,
				Statement: tree.Units[unit].Span(), Description: tree.Description(int(unit))})
			d = &all[len(all)-1]
			if inPart {
				d.Part = partOf(tree, int(unit))
				sites[at] = d
			}
			n.definitions = append(n.definitions, d)
			declared[i] = d
		}
		if f.name.scope.holder == nil {
			d.Full = append(d.Full, f.name.full())
		}
		n.bySymbol[f.name] = d
	}
	return declared
}

// partOf returns the name of the part in whose block a unit stands, or "".
func partOf(tree *syntax.Tree, unit int) string {
	if block := tree.Units[unit].Block; block != syntax.InPart && block != syntax.InCaseOfPart {
		return "" // a parameter, in the opening line
	}
	if o := tree.Opening(unit); o >= 0 {
		if name := tree.Units[o].Statement.Declares(); name != nil {
			return name.Text
		}
	}
	return ""
}

// indexReferences gathers all names of all files, in the order of the text.
func (r *Result) indexReferences(declared []*Definition) {
	n := &r.names
	n.byFile = make([][]Reference, len(r.Trees))
	order := func(a, b Reference) int {
		return cmp.Or(cmp.Compare(a.Span.Start, b.Span.Start), cmp.Compare(a.Span.End, b.Span.End))
	}
	seen := map[source.Span]bool{}
	var previous *syntax.Statement
	for i := range r.entries {
		e := &r.entries[i]
		before := len(n.byFile[e.file])
		if d := declared[i]; d != nil {
			file := r.FileIndex(d.File)
			n.byFile[file] = append(n.byFile[file], Reference{d.File, d.Span, d, true})
		}
		if e.fragment.statement != previous {
			clear(seen)
			previous = e.fragment.statement
		}
		base := r.Trees[e.file].Units[e.unit].Start
		for _, ref := range e.outcome.references {
			d := n.bySymbol[ref.symbol]
			span := ref.span.Shift(base)
			if d == nil || e.fragment.place == nil && seen[span] {
				continue
			}
			seen[span] = true
			n.byFile[e.file] = append(n.byFile[e.file], Reference{r.Trees[e.file].File.Path, span, d, false})
		}
		slices.SortStableFunc(n.byFile[e.file][before:], order)
	}
	for i, list := range n.byFile {
		if !slices.IsSortedFunc(list, order) { // lines of a part come once for each place
			slices.SortStableFunc(list, order)
		}
		// A line of a part gives its references once for each place.
		n.byFile[i] = slices.CompactFunc(list, func(a, b Reference) bool { return a.Span == b.Span && a.Definition == b.Definition })
		for _, ref := range n.byFile[i] {
			if !ref.Declaration {
				ref.Definition.Uses++
			}
		}
	}
}

// declares returns where the name that an entry declares stands: for a
// parameter, in the opening line of its part.
func (r *Result) declares(e *entry) (file, unit int32, span source.Span) {
	f := e.fragment
	if f.parameter < 0 {
		return e.file, e.unit, f.nameSpan().Shift(r.Trees[e.file].Units[e.unit].Start)
	}
	for i := range r.entries {
		part := &r.entries[i]
		if part.fragment.kind != PartName || part.fragment.statement != e.fragment.partStatement {
			continue
		}
		if tree, ok := part.fragment.statement.Tree.(*syntax.PartStatement); ok && f.parameter < len(tree.Parameters) {
			return part.file, part.unit, tree.Parameters[f.parameter].Span().Shift(r.Trees[part.file].Units[part.unit].Start)
		}
	}
	return e.file, e.unit, f.nameSpan().Shift(r.Trees[e.file].Units[e.unit].Start)
}

// Definitions returns everything that has a name, in the order of the text. The
// slice and what it points to must not be changed.
func (r *Result) Definitions() []*Definition { return r.index().definitions }

// References returns the names in a file, declarations and uses, in the order
// of the text. The slice must not be changed.
func (r *Result) References(path string) []Reference {
	if i := r.FileIndex(path); i >= 0 {
		return r.index().byFile[i]
	}
	return nil
}

// ReferenceAt returns the name at an offset of a file; a place right behind a
// name counts.
func (r *Result) ReferenceAt(path string, offset int) (Reference, bool) {
	list := r.References(path)
	i := sort.Search(len(list), func(i int) bool { return list[i].Span.End >= offset })
	best, found := Reference{}, false
	for ; i < len(list) && list[i].Span.Start <= offset; i++ {
		// Of "F1.A" with the cursor on the dot's right, A is meant.
		if list[i].Span.Contains(offset) {
			best, found = list[i], true
		}
	}
	return best, found
}

// ReferencesTo returns all names in all files that stand for a definition, its
// declaration first in its file's order.
func (r *Result) ReferencesTo(d *Definition) []Reference {
	var list []Reference
	for _, file := range r.index().byFile {
		for _, ref := range file {
			if ref.Definition == d {
				list = append(list, ref)
			}
		}
	}
	return list
}

// Lookup returns what a full name of the model stands for: "A", "F1.A", "ULS.a".
func (r *Result) Lookup(space Space, full string) (*Definition, bool) {
	for _, d := range r.index().definitions {
		if d.Kind.Space() == space && slices.Contains(d.Full, full) {
			return d, true
		}
	}
	return nil, false
}

// Visible returns the definitions whose names can be used at an offset of a
// file, by the name to write there: inside a part its own names and the
// model's, elsewhere the model's and those of placed parts ("F1.A").
func (r *Result) Visible(path string, offset int) map[string][]*Definition {
	part := r.partAt(path, offset)
	visible := map[string][]*Definition{}
	for _, d := range r.index().definitions {
		switch {
		case d.Part == "":
			visible[d.Name] = append(visible[d.Name], d)
		case part != "" && d.Part == part:
			visible[d.Name] = append(visible[d.Name], d)
		case part == "":
			for _, full := range d.Full {
				visible[full] = append(visible[full], d)
			}
		}
	}
	return visible
}

// partAt returns the name of the part whose block holds an offset, or "".
func (r *Result) partAt(path string, offset int) string {
	i := r.FileIndex(path)
	if i < 0 {
		return ""
	}
	tree := r.Trees[i]
	u := tree.UnitBefore(offset)
	for u >= 0 {
		s := tree.Units[u].Statement
		if s.Kind == syntax.PartKind {
			if name := s.Declares(); name != nil && (tree.Units[u].End <= offset || tree.Units[u].Start == offset) {
				return name.Text
			}
			return ""
		}
		if tree.Units[u].Block == syntax.TopLevel {
			return ""
		}
		if s.Kind == syntax.CloseKind && tree.Units[u].Block == syntax.InPart && tree.Units[u].End <= offset {
			return ""
		}
		u = tree.Opening(u)
	}
	return ""
}
