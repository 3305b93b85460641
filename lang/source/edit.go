package source

import (
	"fmt"
	"sort"
	"strings"
)

// Edit replaces the text of a span by new text.
type Edit struct {
	Span
	New string
}

// Apply returns the text with the edits made. All spans speak of the text as
// it was before. Edits that overlap or lie outside the text are refused.
func Apply(text string, edits []Edit) (string, error) {
	sorted := append([]Edit(nil), edits...)
	sort.SliceStable(sorted, func(i, j int) bool { return sorted[i].Start < sorted[j].Start })
	var out strings.Builder
	at := 0
	for _, e := range sorted {
		if e.Start < at || e.End < e.Start || e.End > len(text) {
			return "", fmt.Errorf("edit of bytes %d to %d overlaps another or lies outside the text of %d bytes", e.Start, e.End, len(text))
		}
		out.WriteString(text[at:e.Start])
		out.WriteString(e.New)
		at = e.End
	}
	out.WriteString(text[at:])
	return out.String(), nil
}
