package feature

import (
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// Highlight is one place of the name under the cursor.
type Highlight struct {
	Span        source.Span
	Declaration bool
}

// Highlights returns the places in the same file of the name at a place.
func Highlights(s *workspace.Snapshot, path string, offset int) []Highlight {
	m, ok := meaningAt(s, path, offset)
	if !ok {
		return nil
	}
	var list []Highlight
	for _, r := range m.places() {
		if r.File == path {
			list = append(list, Highlight{r.Span, r.Declaration})
		}
	}
	return list
}
