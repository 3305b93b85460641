package feature

import (
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Link is the path of another file, written in this one.
type Link struct {
	Span   source.Span // between the quotes
	Target string      // the file's path
}

// Links returns the paths of use statements.
func Links(tree *syntax.Tree) []Link {
	var links []Link
	for i := range tree.Units {
		u := &tree.Units[i]
		use, ok := u.Statement.Tree.(*syntax.UseStatement)
		if !ok || u.Statement.Broken() || use.Path == nil || use.Path.Value() == "" {
			continue
		}
		span := use.Path.Span().Shift(u.Start)
		links = append(links, Link{
			Span:   source.Span{Start: span.Start + 1, End: span.End - 1},
			Target: resolve.ResolvePath(tree.File.Path, use.Path.Value()),
		})
	}
	return links
}
