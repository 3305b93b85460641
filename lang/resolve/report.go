package resolve

import (
	"fmt"
	"strings"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// note adds something wrong that shows only when the model is put together.
func (a *assembly) note(f *fragment, span source.Span, severity diagnostic.Severity, name diagnostic.Name, summary string) *diagnostic.Diagnostic {
	return a.locate(f, &finding{Diagnostic: diagnostic.Diagnostic{Name: name, Severity: severity, Subject: span, Summary: summary}})
}

// locate turns a finding into a diagnostic at its place in the file.
func (a *assembly) locate(f *fragment, found *finding) *diagnostic.Diagnostic {
	d := found.Diagnostic
	whole := f.sheet.tree.Units[f.unit].Span()
	d.File = f.sheet.path
	d.Subject = d.Subject.Shift(whole.Start)
	d.Context = whole
	d.Related = nil
	for _, r := range found.related {
		other := r.stands()
		if other == nil {
			continue
		}
		at := other.sheet.tree.Units[other.unit].Start
		d.Related = append(d.Related, diagnostic.Related{File: other.sheet.path, Span: other.nameSpan().Shift(at), Message: r.message})
	}
	for p := f.place; p != nil && p.name != nil; p = p.place {
		at := p.sheet.tree.Units[p.unit].Start
		d.Related = append(d.Related, diagnostic.Related{File: p.sheet.path, Span: p.nameSpan().Shift(at), Message: "placed here as " + p.full()})
	}
	if len(found.Fixes) > 0 {
		d.Fixes = make([]diagnostic.Fix, len(found.Fixes))
		for i, fix := range found.Fixes {
			edits := make([]diagnostic.Edit, len(fix.Edits))
			for j, edit := range fix.Edits {
				edit.Span = edit.Span.Shift(whole.Start)
				edits[j] = edit
			}
			fix.Edits = edits
			d.Fixes[i] = fix
		}
	}
	if d.Severity == diagnostic.Error {
		a.errors = true
	}
	a.diagnostics = append(a.diagnostics, d)
	return &a.diagnostics[len(a.diagnostics)-1]
}

// report collects the diagnostics of all files.
func (a *assembly) report(r *Result) {
	for _, tree := range r.Trees {
		for _, d := range tree.Diagnostics() {
			a.errors = a.errors || d.Severity == diagnostic.Error
			a.diagnostics = append(a.diagnostics, d)
		}
	}
	seen := map[string]bool{}
	spelt := 0
	circles := map[*cycle]bool{}
	for _, f := range a.all {
		if c := f.outcome.cycle; c != nil && !circles[c] {
			circles[c] = true
			a.circleFound(c)
		}
		if f.name != nil && f.name.winner() != f {
			a.duplicate(f)
		}
		for i := range f.outcome.findings {
			found := &f.outcome.findings[i]
			if u := found.unknown; u != nil && u.want == actionWanted {
				if _, known := a.byHand[u.name]; known {
					continue
				}
			}
			if f.place != nil {
				// The same mistake in a part shows in each of its places.
				key := fmt.Sprint(found.Name, f.sheet.path, f.sheet.tree.Units[f.unit].Start+found.Subject.Start)
				if seen[key] {
					continue
				}
				seen[key] = true
			}
			d := a.locate(f, found)
			if found.unknown != nil {
				a.spell(f, found, d, spelt < maxSpelt)
				spelt++
			}
		}
	}
	for _, f := range a.main.fragments {
		if first := a.firstModel(); f.statement.Kind == syntax.ModelKind && f != first {
			found := &finding{Diagnostic: diagnostic.Diagnostic{Name: "second-model", Severity: diagnostic.Error, Subject: f.nameSpan(), Summary: "Delete this line: a file has one model line."}}
			found.relate(first, "the model line")
			a.locate(f, found)
		}
	}
	r.Library = !a.header.found && a.onlyDeclares()
	if !a.header.found && !r.Library {
		a.noModelLine()
	}
	a.check()
	diagnostic.Sort(a.diagnostics)
	r.Diagnostics = a.diagnostics
	r.Complete = !a.errors && a.header.found
}

// maxSpelt bounds the unknown names for which near ones are looked for.
const maxSpelt = 20

// onlyDeclares reports whether the main file holds only what other files may
// use.
func (a *assembly) onlyDeclares() bool {
	if len(a.main.fragments) == 0 {
		return false
	}
	for _, f := range a.main.fragments {
		switch f.statement.Kind {
		case syntax.LetKind, syntax.MaterialKind, syntax.SectionKind, syntax.PartKind, syntax.UseKind:
		default:
			return false
		}
	}
	return true
}

func (a *assembly) noModelLine() {
	a.errors = true
	end := 0
	if len(a.main.tree.Units) > 0 {
		u := &a.main.tree.Units[0]
		if u.Statement.Kind == syntax.UnknownKind {
			return // the first line is broken, and may be the model line
		}
	}
	a.diagnostics = append(a.diagnostics, diagnostic.Diagnostic{
		Name: "missing-model", Severity: diagnostic.Error, File: a.main.path, Subject: source.Span{End: end},
		Summary: `Begin the file with a model line, such as model "Title" plane.`,
		Fixes: []diagnostic.Fix{{Title: "Add a model line", Preferred: true,
			Edits: []diagnostic.Edit{{Edit: source.Edit{New: "model \"Title\" plane\n\n"}}}}},
	})
}

// circleFound says that definitions need each other, at the first of them.
func (a *assembly) circleFound(c *cycle) {
	first := c.members[0]
	var names []string
	for _, f := range c.members {
		if f.name != nil {
			names = append(names, f.name.name)
		}
	}
	summary := fmt.Sprintf("Give %s a value of its own: it is defined by itself.", both(names))
	if len(names) > 1 {
		summary = fmt.Sprintf("Give one of %s a value of its own: each is defined by another of them, in a circle.", both(clip(names, 6)))
	}
	found := &finding{Diagnostic: diagnostic.Diagnostic{Name: "circular-definition", Severity: diagnostic.Error, Subject: first.nameSpan(), Summary: summary}}
	for i, f := range c.members {
		if i > 0 && i < 12 {
			found.relate(f, "%s belongs to the circle", f.full())
		}
	}
	a.locate(first, found)
}

// clip shortens a list for a message.
func clip(names []string, most int) []string {
	if len(names) <= most {
		return names
	}
	return append(append([]string(nil), names[:most-1]...), fmt.Sprintf("%d more", len(names)-most+1))
}

// duplicate says that a name is declared twice.
func (a *assembly) duplicate(f *fragment) {
	w := f.name.winner()
	line := w.sheet.tree.File.Position(w.sheet.tree.Units[w.unit].Start).Line
	where := fmt.Sprintf("in line %d", line)
	if w.sheet != f.sheet {
		where = fmt.Sprintf("in %s, line %d", baseName(w.sheet.path), line)
	}
	what := "a " + w.kind.String()
	if w.kind == f.kind {
		what = "another " + w.kind.String()
	}
	found := &finding{Diagnostic: diagnostic.Diagnostic{Name: "duplicate-name", Severity: diagnostic.Error, Subject: f.nameSpan(),
		Summary: fmt.Sprintf("Rename this %s: %s is %s already, %s.", f.kind, f.name.name, what, where)}}
	if f.parameter >= 0 {
		return // the part's own line says it
	}
	found.relate(w, "%s is declared here first", f.name.name)
	a.locate(f, found)
}

func baseName(path string) string { return path[strings.LastIndexByte(path, '/')+1:] }
