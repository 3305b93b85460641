package resolve

import (
	"cmp"
	"slices"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Who types asks one or two questions about each version: what the cursor is on,
// what a screenful of lines is made of. The functions of this file answer them
// from the statements concerned, without the index of all names.

// NameAt returns what [Result.ReferenceAt] returns, for one question about a
// version. The Definition is made for this answer: it is equal to none of
// [Result.Definitions] as a pointer, and Uses is not counted.
func (r *Result) NameAt(path string, offset int) (Reference, bool) {
	file := r.FileIndex(path)
	if file < 0 {
		return Reference{}, false
	}
	unit := r.Trees[file].UnitAt(offset)
	if unit < 0 {
		return Reference{}, false
	}
	if r.Trees[file].Units[unit].Statement.Kind == syntax.PartKind {
		return r.ReferenceAt(path, offset) // a part's parameters stand in its line
	}
	var found Reference
	var meant *symbol
	base := r.Trees[file].Units[unit].Start
	// take takes a name for the answer: a reference where declaring is nil, else
	// the declaration of that entry, unless an earlier one declares the same.
	take := func(span source.Span, s *symbol, declaring *entry) {
		if !span.Contains(offset) {
			return
		}
		later := span.Start > found.Span.Start || span.Start == found.Span.Start && span.End > found.Span.End
		if meant != nil && !later {
			return
		}
		if first := r.declaredBy(s); first != nil && (declaring == nil || declaring == first) {
			found, meant = Reference{File: path, Span: span}, s
		}
	}
	for i := range r.entries {
		e := &r.entries[i]
		if int(e.file) != file || int(e.unit) != unit {
			continue
		}
		if s := e.fragment.name; s != nil && e.fragment.parameter < 0 { // a parameter's line is that of its place
			take(e.fragment.nameSpan().Shift(base), s, e)
		}
		for _, ref := range e.outcome.references {
			take(ref.span.Shift(base), ref.symbol, nil)
		}
	}
	if meant == nil {
		return Reference{}, false
	}
	found.Definition = r.define(meant)
	found.Declaration = found.Definition.File == path && found.Definition.Span == found.Span
	return found, true
}

// declaredBy returns the entry that is the first to declare a symbol, or nil.
func (r *Result) declaredBy(s *symbol) *entry {
	for i := range r.entries {
		if r.entries[i].fragment.name == s {
			return &r.entries[i]
		}
	}
	return nil
}

// define makes the definition of a symbol. What stands in a part is one
// definition, with the names of all its places.
func (r *Result) define(s *symbol) *Definition {
	first := r.declaredBy(s)
	file, unit, span := r.declares(first)
	tree := r.Trees[file]
	d := &Definition{Name: s.name, Kind: first.fragment.kind, File: tree.File.Path, Span: span,
		Statement: tree.Units[unit].Span(), Description: tree.Description(int(unit))}
	block := tree.Units[unit].Block
	if first.fragment.parameter < 0 && block != syntax.InPart && block != syntax.InCaseOfPart {
		if s.scope.holder == nil {
			d.Full = []string{s.full()}
		}
		return d
	}
	d.Part = partOf(tree, int(unit))
	seen := map[*symbol]bool{}
	for i := range r.entries {
		e := &r.entries[i]
		f := e.fragment
		if f.name == nil || seen[f.name] || f.name.name != s.name || f.name.scope.holder != nil {
			continue
		}
		if otherFile, _, other := r.declares(e); otherFile == file && other == span {
			seen[f.name] = true
			d.Full = append(d.Full, f.name.full())
		}
	}
	return d
}

// Named is a name in the text with what it stands for.
type Named struct {
	Span source.Span
	Kind Kind
	// Declaration marks the name in its declaring line.
	Declaration bool
}

// NamesIn returns the names in a part of a file, in the order of the text.
func (r *Result) NamesIn(path string, part source.Span) []Named {
	file := r.FileIndex(path)
	if file < 0 {
		return nil
	}
	tree := r.Trees[file]
	var list []Named
	var meant []*symbol // of the name at the same place in the list; nil where the kind is known
	kinds := map[*symbol]Kind{}
	for i := range r.entries {
		e := &r.entries[i]
		f := e.fragment
		if f.parameter >= 0 {
			// It is declared in the opening line of its part; what it is given stands in
			// the line of the place, which is that of the entry.
			if at, _, span := r.declares(e); int(at) == file && span.Overlaps(part) {
				list, meant = append(list, Named{span, f.kind, true}), append(meant, nil)
			}
		}
		if int(e.file) != file {
			continue
		}
		u := &tree.Units[e.unit]
		if u.Start > part.End || u.End < part.Start {
			continue
		}
		if f.name != nil && f.parameter < 0 {
			list, meant = append(list, Named{f.nameSpan().Shift(u.Start), f.kind, true}), append(meant, nil)
		}
		for _, ref := range e.outcome.references {
			list, meant = append(list, Named{Span: ref.span.Shift(u.Start)}), append(meant, ref.symbol)
			kinds[ref.symbol] = NoKind
		}
	}
	for i := range r.entries {
		f := r.entries[i].fragment
		if f.name == nil {
			continue
		}
		if k, wanted := kinds[f.name]; wanted && k == NoKind {
			kinds[f.name] = f.kind
		}
	}
	for i, s := range meant {
		if s != nil {
			list[i].Kind = kinds[s]
		}
	}
	list = slices.DeleteFunc(list, func(n Named) bool { return n.Kind == NoKind })
	slices.SortStableFunc(list, func(a, b Named) int {
		return cmp.Or(cmp.Compare(a.Span.Start, b.Span.Start), cmp.Compare(a.Span.End, b.Span.End))
	})
	return slices.CompactFunc(list, func(a, b Named) bool { return a.Span == b.Span })
}
