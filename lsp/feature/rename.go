package feature

import (
	"fmt"
	"maps"
	"slices"
	"strings"

	"spanwright/lang/diagnostic"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// PrepareRename returns the place of the name that can be given a new one. The
// error says in words why there is none.
func PrepareRename(s *workspace.Snapshot, path string, offset int) (span source.Span, name string, err error) {
	m, ok := meaningAt(s, path, offset)
	if !ok {
		return span, "", refuse("Put the cursor on a name to rename it.")
	}
	tree, err := s.Tree(path)
	if err != nil {
		return span, "", err
	}
	span = tailSpan(tree.File, m.reference)
	return span, tree.File.Slice(span), nil
}

// tailSpan is the part of a qualified name that is its own: the A of F1.A.
func tailSpan(file *source.File, r resolve.Reference) source.Span {
	text := file.Slice(r.Span)
	own := lastPart(r.Definition.Name)
	if strings.HasSuffix(text, own) {
		return source.Span{Start: r.Span.End - len(own), End: r.Span.End}
	}
	return r.Span
}

// lastPart is what of a declared name another name takes the place of: all of
// it, or what stands behind the family of a combination.
func lastPart(name string) string { return name[strings.LastIndexByte(name, '.')+1:] }

// Rename gives the name at a place a new one, everywhere that it is used. It
// returns the edits by file. The error says in words why that cannot be: the
// name is no name, it would collide, or the model would no longer be the same.
func Rename(s *workspace.Snapshot, path string, offset int, name string) (map[string][]source.Edit, error) {
	m, ok := meaningAt(s, path, offset)
	if !ok {
		return nil, refuse("Put the cursor on a name to rename it.")
	}
	if err := nameable(name); err != nil {
		return nil, err
	}
	edits := map[string][]source.Edit{}
	for _, r := range m.places() {
		if own := lastPart(r.Definition.Name); own == name {
			return edits, nil
		}
		if err := collision(s, m.view.Resolved, r, name); err != nil {
			return nil, err
		}
		tree, err := s.Tree(r.File)
		if err != nil {
			return nil, refuse("%s uses the name and cannot be read: %v.", r.File, err)
		}
		edits[r.File] = append(edits[r.File], source.Edit{Span: tailSpan(tree.File, r), New: name})
	}
	for _, d := range m.definitions {
		if err := sameAfter(s, d.result, edits); err != nil {
			return nil, err
		}
	}
	return edits, nil
}

// nameable says why a word can be no name.
func nameable(name string) error {
	tokens := syntax.Tokens(name)
	switch {
	case len(tokens) != 1 || tokens[0].Kind != syntax.Word || strings.ContainsAny(name, ".-²³⁴⁵⁶"):
		return refuse("%q is no name: a name is a letter or _, then letters, digits and _.", name)
	case syntax.Reserved(name):
		return refuse("%s is a word of the language. Choose another name.", name)
	case syntax.UnitSymbol(name):
		return refuse("%s is a unit. Choose another name.", name)
	}
	return nil
}

// collision says what already has the new name where the old one is used.
func collision(s *workspace.Snapshot, result *resolve.Result, r resolve.Reference, name string) error {
	written := name
	if tree, err := s.Tree(r.File); err == nil {
		text := tree.File.Slice(r.Span)
		written = strings.TrimSuffix(text, lastPart(r.Definition.Name)) + name
	}
	for _, other := range result.Visible(r.File, r.Span.Start)[written] {
		if other.Kind.Space() == r.Definition.Kind.Space() {
			return refuse("%s is already the name of a %s. Choose another name.", written, other.Kind)
		}
	}
	return nil
}

// sameAfter resolves a model with edits made, and says why it would not be the
// same but for the name.
func sameAfter(s *workspace.Snapshot, before *resolve.Result, edits map[string][]source.Edit) error {
	changed, err := editedFiles(s, edits)
	if err != nil {
		return err
	}
	main := before.Trees[0].File.Path
	tree := changed.trees[main]
	if tree == nil {
		tree = before.Trees[0]
	}
	after := resolve.Model(tree, changed)
	if same, what := sameStructure(before.Model, after.Model); !same {
		return refuse("With this name the model would change: %s would not be the same.", what)
	}
	old := names(before.Diagnostics)
	if now := names(after.Diagnostics); !slices.Equal(old, now) {
		for _, d := range after.Diagnostics {
			if !slices.Contains(old, d.Name) {
				return refuse("With this name the model would have a new mistake: %s", d.Summary)
			}
		}
		return refuse("With this name the model would have other mistakes than now.")
	}
	return nil
}

func names(list []diagnostic.Diagnostic) []diagnostic.Name {
	var all []diagnostic.Name
	for _, d := range list {
		all = append(all, d.Name)
	}
	slices.Sort(all)
	return all
}

// edited is a snapshot with some files changed.
type edited struct {
	snapshot *workspace.Snapshot
	trees    map[string]*syntax.Tree
}

// editedFiles reads the files that edits change, as they are afterwards.
func editedFiles(s *workspace.Snapshot, edits map[string][]source.Edit) (*edited, error) {
	e := &edited{s, map[string]*syntax.Tree{}}
	for _, path := range slices.Sorted(maps.Keys(edits)) {
		tree, err := s.Tree(path)
		if err != nil {
			return nil, err
		}
		text, err := source.Apply(tree.File.Text, edits[path])
		if err != nil {
			return nil, fmt.Errorf("the changes of %s do not fit: %w", path, err)
		}
		e.trees[path] = tree.Reparse(source.New(path, text))
	}
	return e, nil
}

// Load returns a file as it is after the edits.
func (e *edited) Load(path string) (*syntax.Tree, error) {
	if tree, ok := e.trees[path]; ok {
		return tree, nil
	}
	return e.snapshot.Tree(path)
}
