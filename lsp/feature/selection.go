package feature

import (
	"cmp"
	"slices"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Selections returns the places that a growing selection goes through, the
// smallest first: word, expressions around it, statement, block, file. Each
// holds the one before.
func Selections(tree *syntax.Tree, offset int) []source.Span {
	spans := []source.Span{{Start: 0, End: len(tree.File.Text)}}
	if i := tree.UnitAt(offset); i >= 0 {
		u := &tree.Units[i]
		for opening := tree.Opening(i); opening >= 0; opening = tree.Opening(opening) {
			if closing := tree.Closing(opening); closing >= 0 {
				spans = append(spans, source.Span{Start: tree.Units[opening].Start, End: tree.Units[closing].End})
			}
			if tree.Opening(opening) == opening {
				break
			}
		}
		spans = append(spans, u.Span())
		inside := offset - u.Start
		add := func(s source.Span) {
			if s.Contains(inside) && !s.Empty() {
				spans = append(spans, s.Shift(u.Start))
			}
		}
		u.Statement.Expressions(func(e *syntax.Expression) {
			add(e.Span)
			syntax.Walk(e.Root, func(n syntax.Node) { add(n.Place()) })
		})
		for _, t := range syntax.Tokens(u.Statement.Text) {
			if !t.Trivia() {
				add(t.Span())
			}
		}
	}
	slices.SortStableFunc(spans, func(a, b source.Span) int { return cmp.Compare(a.Len(), b.Len()) })
	// Two words that meet at the cursor do not hold each other: the first stays.
	chain := spans[:1]
	for _, s := range spans[1:] {
		last := chain[len(chain)-1]
		if s.Start <= last.Start && last.End <= s.End && s != last {
			chain = append(chain, s)
		}
	}
	return chain
}
