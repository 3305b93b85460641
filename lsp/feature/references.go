package feature

import "spanwright/lsp/workspace"

// References returns where the name at a place is used, in all models and
// files, and where it is declared if that is wanted.
func References(s *workspace.Snapshot, path string, offset int, declaration bool) []Location {
	m, ok := meaningAt(s, path, offset)
	if !ok {
		return nil
	}
	var list []Location
	for _, r := range m.places() {
		if declaration || !r.Declaration {
			list = append(list, Location{r.File, r.Span})
		}
	}
	return list
}
