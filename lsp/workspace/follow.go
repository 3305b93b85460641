package workspace

import "spanwright/lang/source"

// marks returns the versions of the open documents.
func (s *Snapshot) marks() map[string]mark {
	m := make(map[string]mark, len(s.documents))
	for path, d := range s.documents {
		m[path] = mark{d.opening, d.serial}
	}
	return m
}

// Follow returns where a place in a file of a solution's version is in the
// snapshot, and false where an edit has touched it since.
func (s *Snapshot) Follow(solution *Solution, path string, span source.Span) (source.Span, bool) {
	d, open := s.documents[path]
	m, was := solution.serials[path]
	switch {
	case !open && !was:
		return span, true
	case !open || !was || d.opening != m.opening:
		return span, false
	}
	return d.follow(span, m.serial)
}
