package feature

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"spanwright/analysis"
	"spanwright/lang/diagnostic"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// Action is a change of the text on offer.
type Action struct {
	Title string
	// Fix: it mends the diagnostic; otherwise it only writes things anew.
	Fix        bool
	Preferred  bool
	Diagnostic *diagnostic.Diagnostic // that it mends, or nil
	// Edits are by file. They are nil where they take a solve to find: then
	// [ResolveAction] finds them by the key.
	Edits map[string][]source.Edit
	Key   string
}

// mostMended bounds the diagnostics for which fixes are offered at once: nobody
// chooses from a longer list.
const mostMended = 50

// Actions returns what is on offer for a part of a file: fixes of what is said
// about it, larger or smaller sections for broken limits, supports that stop a
// mechanism, and other units for a number.
func Actions(s *workspace.Snapshot, path string, part source.Span) []Action {
	v, ok := s.View(path)
	if !ok {
		return nil
	}
	var list []Action
	all := s.Diagnostics(path)
	touched, mended := 0, map[diagnostic.Name]bool{}
	for i := range all {
		d := &all[i]
		if !touches(d, part) {
			continue
		}
		if touched++; touched > mostMended {
			break
		}
		for _, f := range d.Fixes {
			if edits, ok := editsOf(s, d, f); ok {
				list = append(list, Action{Title: f.Title, Fix: true, Preferred: f.Preferred, Diagnostic: d, Edits: edits})
			}
		}
		if !mended[d.Name] {
			list = append(list, mendAll(s, d, all)...)
			mended[d.Name] = true
		}
		switch d.Name {
		case diagnostic.Mechanism:
			list = append(list, restrainActions(&v, d)...)
		case diagnostic.LimitExceeded:
			list = append(list, resizeForLimit(&v, d)...)
		}
	}
	list = append(list, resizeHere(&v, path, part)...)
	return append(list, conversions(s, &v, path, part)...)
}

// touches reports whether a diagnostic is about a part of the file.
func touches(d *diagnostic.Diagnostic, part source.Span) bool {
	return d.Subject.Overlaps(part) || !d.Context.Empty() && d.Context.Overlaps(part)
}

// editsOf returns the edits of a fix by file, and false where they do not fit
// the text.
func editsOf(s *workspace.Snapshot, d *diagnostic.Diagnostic, f diagnostic.Fix) (map[string][]source.Edit, bool) {
	edits := map[string][]source.Edit{}
	for _, e := range f.Edits {
		file := e.File
		if file == "" {
			file = d.File
		}
		edits[file] = append(edits[file], e.Edit)
	}
	_, err := editedFiles(s, edits)
	return edits, err == nil && len(edits) > 0
}

// mendAll offers to mend all diagnostics of a name at once, each by its
// preferred fix.
func mendAll(s *workspace.Snapshot, d *diagnostic.Diagnostic, all []diagnostic.Diagnostic) []Action {
	edits, count := map[string][]source.Edit{}, 0
	for i := range all {
		other := &all[i]
		k := slices.IndexFunc(other.Fixes, func(f diagnostic.Fix) bool { return f.Preferred })
		if other.Name != d.Name || k < 0 {
			continue
		}
		more, ok := editsOf(s, other, other.Fixes[k])
		if !ok {
			continue
		}
		count++
		for file, list := range more {
			edits[file] = append(edits[file], list...)
		}
	}
	if _, err := editedFiles(s, edits); count < 2 || err != nil {
		return nil
	}
	return []Action{{Title: fmt.Sprintf("Mend all %d of %s", count, d.Name), Fix: true, Edits: edits}}
}

// ResolveAction finds the edits of an action that takes a solve, and returns its
// title with what they come to: "IPE 300 → IPE 330: worst limit 127 % → 91 %".
// The error says in words why there is no such change, or is the context's.
func ResolveAction(ctx context.Context, s *workspace.Snapshot, path, key string) (title string, edits map[string][]source.Edit, err error) {
	v, ok := s.View(path)
	if !ok {
		return "", nil, refuse("The model cannot be read.")
	}
	switch kind, what, _ := strings.Cut(key, ":"); kind {
	case "restrain":
		return restrain(ctx, &v)
	case "resize":
		return resize(ctx, &v, what)
	}
	return "", nil, refuse("There is no such change.")
}

// tried is a model with a change in its text, solved.
type tried struct {
	resolved *resolve.Result
	results  *analysis.Results
}

// try solves a view's model with edits made.
func try(ctx context.Context, v *workspace.View, edits map[string][]source.Edit) (*tried, error) {
	files, err := editedFiles(v.Snapshot, edits)
	if err != nil {
		return nil, err
	}
	main := files.trees[v.Path]
	if main == nil {
		main = v.Resolved.Trees[0]
	}
	t := &tried{resolved: resolve.Model(main, files)}
	if !t.resolved.Complete {
		return nil, refuse("With this change the model would have a mistake.")
	}
	if t.results, err = analysis.Run(ctx, t.resolved.Model, nil); err != nil {
		return nil, err
	}
	return t, nil
}

// mostTried bounds the models for which changes are tried out.
const mostTried = 6000
