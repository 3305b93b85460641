package feature

import "spanwright/lsp/workspace"

// Definition returns where the name at a place is declared.
func Definition(s *workspace.Snapshot, path string, offset int) (Location, bool) {
	v, ok := s.View(path)
	if !ok {
		return Location{}, false
	}
	if r, ok := v.Resolved.NameAt(path, offset); ok {
		return Location{r.Definition.File, r.Definition.Span}, true
	}
	if i := v.Resolved.FileIndex(path); i >= 0 {
		for _, link := range Links(v.Resolved.Trees[i]) {
			if link.Span.Contains(offset) {
				return Location{Path: link.Target}, true
			}
		}
	}
	return Location{}, false
}
