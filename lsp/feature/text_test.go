package feature

import (
	"fmt"
	"path/filepath"
	"sort"
	"strings"
	"testing"

	"spanwright/lang/source"
)

// What stands beside and above the lines of the demo models, as an editor shows
// it.
func TestHintsAndLensesOfTheModels(t *testing.T) {
	for _, name := range models(t) {
		base := strings.TrimSuffix(filepath.Base(name), ".span")
		if base == "lookout" {
			continue // see TestHoversOfTheModels
		}
		t.Run(base, func(t *testing.T) {
			golden(t, "hints/"+base+".txt", annotated(openFile(t, name)))
		})
	}
}

// annotated writes a file with its lenses and hints.
func annotated(d *desk) string {
	s, file := d.snapshot(), d.file()
	above, beside := map[int][]string{}, map[int][]string{}
	for _, l := range Lenses(s, d.path) {
		line := file.LineAt(l.Span.Start)
		above[line] = append(above[line], l.Title)
	}
	hints := Hints(s, d.path, source.Span{Start: 0, End: len(file.Text)}, AllHints())
	sort.SliceStable(hints, func(i, j int) bool { return hints[i].At < hints[j].At })
	for _, h := range hints {
		line := file.LineAt(h.At)
		beside[line] = append(beside[line], h.Label)
	}
	var b strings.Builder
	for line := range file.Lines() {
		for _, l := range above[line] {
			fmt.Fprintf(&b, "    ⌄ %s\n", l)
		}
		text := file.Text[file.LineStart(line):file.LineEnd(line)]
		if len(beside[line]) > 0 {
			text = fmt.Sprintf("%-60s ⟵ %s", text, strings.Join(beside[line], " ⟵ "))
		}
		b.WriteString(text + "\n")
	}
	return b.String()
}
