package resolve

import (
	"fmt"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// checkLooseNodes finds nodes that no member reaches although something is done
// with them.
func (a *assembly) checkLooseNodes() {
	if a.errors {
		return // the member that is missing may be in a line with a mistake
	}
	m := a.model
	reached := make([]bool, len(m.Nodes))
	for i := range m.Members {
		for _, n := range m.Members[i].Nodes {
			reached[n] = true
		}
	}
	told := map[int]bool{}
	tell := func(f *fragment, node int, severity diagnostic.Severity, what string) {
		if node < 0 || reached[node] || told[node] {
			return
		}
		told[node] = true
		a.note(f, f.nameSpan(), severity, "loose-node",
			fmt.Sprintf("Join %s to a member, or delete this %s: nothing is connected to the node.", m.Nodes[node].Name, what))
	}
	for _, f := range a.kinds[syntax.LoadKind] {
		for _, item := range f.outcome.result.(*loadResult).loads {
			if item.target != nil && item.target.kind() == NodeName {
				tell(f, item.target.winner().index, diagnostic.Error, "load")
			}
		}
	}
	for _, f := range a.kinds[syntax.SupportKind] {
		if f.index >= 0 {
			tell(f, m.Supports[f.index].Node, diagnostic.Warning, "support")
		}
	}
	for _, f := range a.kinds[syntax.MassKind] {
		if f.index >= 0 {
			tell(f, m.Masses[f.index].Node, diagnostic.Warning, "mass")
		}
	}
}

// checkUnused finds declarations that nothing uses and blocks that hold nothing.
// Where the text has errors it stays silent: what is missing may be the use.
func (a *assembly) checkUnused() {
	if a.errors {
		return
	}
	loaded := map[*fragment]bool{}
	for _, f := range a.all {
		if f.statement.Kind == syntax.LoadKind && f.owner != nil {
			loaded[f.owner] = true
			if r, ok := f.owner.result().(*caseResult); ok && r.outer != nil {
				loaded[r.outer.winner()] = true
			}
		}
	}
	told := map[*syntax.Statement]bool{} // a line of a part is told of once
	for _, f := range a.all {
		if f.name == nil || f.sheet != a.main && f.kind != PlaceName {
			continue // a library may hold more than this model wants
		}
		if f.kind == CaseName && f.place == nil && !loaded[f] {
			a.note(f, f.nameSpan(), diagnostic.Warning, "empty-case",
				fmt.Sprintf("Put loads into case %s, or delete it: it is empty.", f.name.name))
			continue
		}
		if len(f.name.users) > 0 || !fades(f) || f.place != nil && (told[f.statement] || a.usedElsewhere(f)) {
			continue
		}
		if f.parameter >= 0 {
			continue
		}
		told[f.statement] = true
		d := a.note(f, f.nameSpan(), diagnostic.Hint, "unused-declaration",
			fmt.Sprintf("Use %s, or delete it: nothing in the model does.", f.name.name))
		d.Unnecessary = true
		d.Fixes = []diagnostic.Fix{{Title: "Delete " + f.name.name, Edits: []diagnostic.Edit{{Edit: source.Edit{Span: a.wholeLines(f)}}}}}
	}
}

// fades reports whether a kind of thing does nothing by itself.
func fades(f *fragment) bool {
	switch f.kind {
	case LetName, NodeName, GroupName, SectionName, MaterialName:
		return true
	case PartName:
		return true
	}
	return false
}

// usedElsewhere reports whether the same line of a part is used in another of
// the part's places.
func (a *assembly) usedElsewhere(f *fragment) bool {
	for _, g := range a.all {
		if g.statement == f.statement && g.name != nil && len(g.name.users) > 0 {
			return true
		}
	}
	return false
}

// wholeLines returns the span of the fragment's statement with its line end; of
// a part, with its block.
func (a *assembly) wholeLines(f *fragment) source.Span {
	tree := f.sheet.tree
	span := tree.Units[f.unit].Span()
	if f.kind == PartName {
		if closing := tree.Closing(f.unit); closing >= 0 {
			span.End = tree.Units[closing].End
		}
	}
	file := tree.File
	first, last := file.LineAt(span.Start), file.LineAt(span.End)
	return source.Span{Start: file.LineStart(first), End: file.LineStart(last + 1)}
}
