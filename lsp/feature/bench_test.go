package feature

import (
	"testing"

	"spanwright/lang/generate"
	"spanwright/lang/source"
)

// BenchmarkLarge measures what an editor asks for often, with 10,000 members: a
// screenful of 60 lines, or the whole file where the protocol has no less. Aim:
// below 10 ms for a screenful.
func BenchmarkLarge(b *testing.B) {
	d := open(b, "/building.span", generate.TenThousand.Text())
	s, file := d.snapshot(), d.file()
	middle := file.Lines() / 2
	screen := source.Span{Start: file.LineStart(middle), End: file.LineEnd(middle + 60)}
	whole := source.Span{Start: 0, End: len(file.Text)}
	tree, err := s.Tree(d.path)
	if err != nil {
		b.Fatal(err)
	}
	at := d.at("node |n1_1_1 =")
	for _, c := range []struct {
		name string
		do   func()
	}{
		{"hints of a screen", func() { Hints(s, d.path, screen, AllHints()) }},
		{"tokens of a screen", func() { Tokens(s, d.path, screen) }},
		{"tokens", func() { Tokens(s, d.path, whole) }},
		{"lenses", func() { Lenses(s, d.path) }},
		{"symbols", func() { Symbols(s, d.path) }},
		{"workspace symbols", func() { WorkspaceSymbols(s, "n1_1") }},
		{"folds", func() { Folds(tree) }},
		{"definition", func() { Definition(s, d.path, at) }},
		{"references", func() { References(s, d.path, at, true) }},
		{"rename", func() {
			if _, err := Rename(s, d.path, at, "corner"); err != nil {
				b.Fatal(err)
			}
		}},
		{"load path", func() {
			item, _ := PathItem(s, d.path, at)
			LoadsTo(s, item)
		}},
	} {
		b.Run(c.name, func(b *testing.B) {
			for b.Loop() {
				c.do()
			}
		})
	}
}
