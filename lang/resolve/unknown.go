package resolve

import (
	"fmt"
	"slices"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
)

// fitting returns the kinds of names that fit where a kind is wanted.
func fitting(want string) func(Kind) bool {
	switch want {
	case "node":
		return isNode
	case "value":
		return func(k Kind) bool { return k == LetName || k == ParameterName || k == NodeName }
	case "case":
		return isCase
	case "member or group", "group or member":
		return func(k Kind) bool { return k.Member() || k == GroupName }
	case "node or member":
		return func(k Kind) bool { return k.Member() || k == GroupName || k == NodeName }
	case "member, group or section":
		return func(k Kind) bool { return k.Member() || k == GroupName || k == SectionName }
	}
	return func(Kind) bool { return true }
}

// spell puts into words that a name stands for nothing: with the names like it,
// and with changes of the text that would mend it.
func (a *assembly) spell(f *fragment, found *finding, d *diagnostic.Diagnostic, look bool) {
	u := found.unknown
	var near []string
	if look {
		near = nearest(u.name, a.namesFor(f, u))
	}
	if len(near) > 0 {
		d.Summary = fmt.Sprintf("Did you mean %s? No %s is called %s.", either(near), u.want, u.name)
		for i, n := range near {
			d.Fixes = append(d.Fixes, diagnostic.Fix{Title: "Write " + n, Preferred: i == 0,
				Edits: []diagnostic.Edit{{Edit: source.Edit{Span: d.Subject, New: n}}}})
		}
	} else {
		d.Summary = fmt.Sprintf("Declare %s, or name another %s: nothing is called so.", u.name, u.want)
	}
	if text := a.declaration(u); text != "" && plainName(u.name) && !slices.Contains([]byte(u.name), '.') {
		at := f
		if f.owner != nil {
			at = f.owner
		}
		start := a.lineStart(at)
		d.Fixes = append(d.Fixes, diagnostic.Fix{Title: "Declare " + u.name,
			Edits: []diagnostic.Edit{{Edit: source.Edit{Span: source.At(start), New: text}}}})
	}
}

// lineStart returns the offset of the first byte of the fragment's line.
func (a *assembly) lineStart(f *fragment) int {
	file := f.sheet.tree.File
	return file.LineStart(file.LineAt(f.sheet.tree.Units[f.unit].Start))
}

// namesFor returns the names that would fit in place of an unknown one.
func (a *assembly) namesFor(f *fragment, u *unknownName) []string {
	fits := fitting(u.want)
	var names []string
	for key, symbol := range a.symbols {
		if w := symbol.winner(); w == nil || !fits(w.kind) {
			continue
		}
		inSpace := key.space == u.space || u.want == "member, group or section" && key.space == Sections
		if !inSpace {
			continue
		}
		switch {
		case key.scope == f.scope, key.scope == a.global:
			names = append(names, key.name)
		case f.place == nil && key.scope.holder == nil && key.scope.place != "":
			names = append(names, symbol.full())
		}
	}
	return names
}

// declaration returns a line that would declare an unknown name.
func (a *assembly) declaration(u *unknownName) string {
	switch u.want {
	case "node":
		if a.header.plane {
			return "node " + u.name + " = (0, 0) m\n"
		}
		return "node " + u.name + " = (0, 0, 0) m\n"
	case "section":
		material := "steel"
		if len(a.model.Materials) > 0 {
			material = a.model.Materials[0].Name
		}
		return "section " + u.name + " = IPE 300 of " + material + "\n"
	case "material":
		return "material " + u.name + " = S275\n"
	case "case":
		return "case " + u.name + " permanent {\n}\n"
	}
	return ""
}
