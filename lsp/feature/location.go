package feature

import (
	"cmp"
	"slices"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// Location is a place in a file.
type Location struct {
	Path string
	Span source.Span
}

// meaning is what a name stands for in each of the models that its file belongs
// to: a name in a shared file has one definition and users in several models.
type meaning struct {
	view        workspace.View // the model that the file is looked at through
	reference   resolve.Reference
	definitions []modelDefinition
}

type modelDefinition struct {
	result     *resolve.Result
	definition *resolve.Definition
}

// meaningAt finds the name at a place.
func meaningAt(s *workspace.Snapshot, path string, offset int) (meaning, bool) {
	v, ok := s.View(path)
	if !ok {
		return meaning{}, false
	}
	r, ok := v.Resolved.ReferenceAt(path, offset)
	if !ok || r.Definition == nil {
		return meaning{}, false
	}
	m := meaning{view: v, reference: r, definitions: []modelDefinition{{v.Resolved, r.Definition}}}
	for _, other := range append([]string{v.Path}, s.Models(r.Definition.File)...) {
		result := s.Resolve(other)
		if result == nil || result == v.Resolved {
			continue
		}
		for _, d := range result.Definitions() {
			if d.File == r.Definition.File && d.Span == r.Definition.Span {
				m.definitions = append(m.definitions, modelDefinition{result, d})
			}
		}
	}
	return m, true
}

// places returns all places of the name, declarations too, in order.
func (m *meaning) places() []resolve.Reference {
	var all []resolve.Reference
	for _, d := range m.definitions {
		all = append(all, d.result.ReferencesTo(d.definition)...)
	}
	slices.SortFunc(all, func(a, b resolve.Reference) int {
		return cmp.Or(cmp.Compare(a.File, b.File), a.Span.Start-b.Span.Start)
	})
	return slices.CompactFunc(all, func(a, b resolve.Reference) bool { return a.File == b.File && a.Span == b.Span })
}
