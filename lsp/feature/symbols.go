package feature

import (
	"cmp"
	"slices"
	"strings"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// Symbol is an entry of the outline.
type Symbol struct {
	Name   string
	Detail string
	// Kind is what the name stands for. Headings, supports and limits, which
	// declare nothing, have [resolve.NoKind].
	Kind resolve.Kind
	// Whole is the place of the statement or block, Name of the name in it.
	Whole, NameSpan source.Span
	Children        []Symbol
}

// Symbols returns the outline of a file, gathered by what things are: nodes,
// members, sections and so on, each in the order of the text. What stands in a
// part stands under it.
func Symbols(s *workspace.Snapshot, path string) []Symbol {
	v, ok := s.View(path)
	if !ok {
		return nil
	}
	i := v.Resolved.FileIndex(path)
	if i < 0 {
		return nil
	}
	o := outline{tree: v.Resolved.Trees[i], definitions: map[int]*resolve.Definition{}}
	for _, d := range v.Resolved.Definitions() {
		if d.File == path && d.Kind != resolve.ParameterName {
			o.definitions[d.Statement.Start] = d
		}
	}
	return o.gather(0, len(o.tree.Units))
}

type outline struct {
	tree        *syntax.Tree
	definitions map[int]*resolve.Definition // by the start of their statement
}

// headings are the names under which things are gathered, in order.
var headings = []struct {
	title string
	kinds []resolve.Kind
}{
	{"Values", []resolve.Kind{resolve.LetName}},
	{"Materials", []resolve.Kind{resolve.MaterialName}},
	{"Sections", []resolve.Kind{resolve.SectionName}},
	{"Parts", []resolve.Kind{resolve.PartName, resolve.PlaceName}},
	{"Nodes", []resolve.Kind{resolve.NodeName}},
	{"Members", []resolve.Kind{resolve.BeamName, resolve.BarName, resolve.LinkName, resolve.SpringName}},
	{"Groups", []resolve.Kind{resolve.GroupName}},
	{"Load cases", []resolve.Kind{resolve.CaseName}},
	{"Combinations", []resolve.Kind{resolve.FamilyName, resolve.CombinationName}},
}

// gather returns the outline of units from … to−1.
func (o *outline) gather(from, to int) (gathered []Symbol) {
	var all []Symbol
	var supports, limits []Symbol
	for i := from; i < to; i++ {
		u := &o.tree.Units[i]
		d := o.definitions[u.Start]
		end := i
		if closing := closingOf(o.tree, i); closing > i && closing < to {
			end = closing
		}
		if d == nil {
			switch tree := u.Statement.Tree.(type) {
			case *syntax.SupportStatement:
				if tree.Node != nil {
					name := tree.Node.Span()
					supports = append(supports, Symbol{Name: tree.Node.Text, Detail: detail(u.Statement.Text[name.End:]), Whole: u.Span(), NameSpan: name.Shift(u.Start)})
				}
			case *syntax.LimitStatement:
				if text := detail(u.Statement.Text[len("limit"):]); text != "" {
					limits = append(limits, Symbol{Name: text, Whole: u.Span(), NameSpan: u.Span()})
				}
			}
			continue
		}
		symbol := Symbol{Name: d.Name, Detail: detail(u.Statement.Text[d.Span.End-u.Start:]), Kind: d.Kind,
			Whole: source.Span{Start: u.Start, End: o.tree.Units[end].End}, NameSpan: d.Span}
		if d.Kind == resolve.PartName && end > i {
			symbol.Children = o.gather(i+1, end)
		}
		all = append(all, symbol)
		i = end
	}
	add := func(title string, children []Symbol) {
		if len(children) == 0 {
			return
		}
		group := Symbol{Name: title, Whole: children[0].Whole, NameSpan: children[0].NameSpan, Children: children}
		for _, c := range children {
			group.Whole = group.Whole.Join(c.Whole)
		}
		gathered = append(gathered, group)
	}
	for _, h := range headings {
		var children []Symbol
		for _, symbol := range all {
			if slices.Contains(h.kinds, symbol.Kind) {
				children = append(children, symbol)
			}
		}
		add(h.title, children)
	}
	add("Supports", supports)
	add("Limits", limits)
	slices.SortStableFunc(gathered, func(a, b Symbol) int { return cmp.Compare(a.Whole.Start, b.Whole.Start) })
	return gathered
}

// detail is what a statement says behind its name, on one line.
func detail(rest string) string {
	rest = strings.Join(strings.Fields(rest), " ")
	rest = strings.TrimSpace(strings.TrimSuffix(strings.TrimPrefix(rest, "="), "{"))
	if runes := []rune(rest); len(runes) > 60 {
		rest = string(runes[:59]) + "…"
	}
	return rest
}

// WorkspaceSymbol is something with a name, anywhere in the workspace.
type WorkspaceSymbol struct {
	Name     string
	Kind     resolve.Kind
	Location Location
	// Container is the title of the model, or the part.
	Container string
}

// mostSymbols bounds the answer: nobody reads further.
const mostSymbols = 500

// WorkspaceSymbols returns what has a name like the query in all files known:
// each letter of the query stands in the name, in this order.
func WorkspaceSymbols(s *workspace.Snapshot, query string) []WorkspaceSymbol {
	var list []WorkspaceSymbol
	seen := map[Location]bool{}
	for _, path := range s.Files() {
		model := s.ModelOf(path)
		if model != path {
			continue // it comes with its models
		}
		r := s.Resolve(path)
		if r == nil {
			continue
		}
		for _, d := range r.Definitions() {
			at := Location{d.File, d.Span}
			if seen[at] || !matches(d.Name, query) {
				continue
			}
			seen[at] = true
			container := r.Model.Title
			if d.Part != "" {
				container = "part " + d.Part
			}
			list = append(list, WorkspaceSymbol{d.Name, d.Kind, at, container})
		}
	}
	slices.SortStableFunc(list, func(a, b WorkspaceSymbol) int {
		return cmp.Or(cmp.Compare(rank(a.Name, query), rank(b.Name, query)), cmp.Compare(a.Name, b.Name))
	})
	return list[:min(len(list), mostSymbols)]
}

func matches(name, query string) bool {
	name, query = strings.ToLower(name), strings.ToLower(query)
	for _, r := range query {
		i := strings.IndexRune(name, r)
		if i < 0 {
			return false
		}
		name = name[i+len(string(r)):]
	}
	return true
}

// rank is lower the better a name fits: equal, beginning, holding, the rest.
func rank(name, query string) int {
	switch {
	case name == query:
		return 0
	case strings.HasPrefix(strings.ToLower(name), strings.ToLower(query)):
		return 1
	case strings.Contains(strings.ToLower(name), strings.ToLower(query)):
		return 2
	}
	return 3
}
