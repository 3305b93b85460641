package feature

import (
	"cmp"
	"context"
	"fmt"
	"math"
	"slices"

	"spanwright/analysis"
	"spanwright/lang/catalogue"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// resizeForLimit offers another size for the section of the member at which a
// limit breaks.
func resizeForLimit(v *workspace.View, d *diagnostic.Diagnostic) []Action {
	if v.State != workspace.Current || v.Solution.Results.Freedoms() > mostTried {
		return nil
	}
	m := v.Resolved.Model
	var list []Action
	for _, l := range v.Solution.Limits {
		if l.Holds || l.Governs.Member < 0 || m.Limits[l.Index].Origin.Statement.Start != d.Context.Start && m.Limits[l.Index].Origin.Statement.Start != d.Subject.Start {
			continue
		}
		if s := m.Members[l.Governs.Member].Section; s >= 0 && m.Sections[s].Series != "" {
			list = append(list, resizeAction(m, s, d))
		}
	}
	return list
}

func resizeAction(m *model.Model, section int, d *diagnostic.Diagnostic) Action {
	s := &m.Sections[section]
	return Action{Title: fmt.Sprintf("Resize %s: the lightest %s with which all limits hold", s.Name, s.Series), Fix: d != nil, Diagnostic: d, Key: "resize:" + s.Name}
}

// resizeHere offers another size for the section that stands at the cursor.
func resizeHere(v *workspace.View, path string, part source.Span) []Action {
	m := v.Resolved.Model
	if v.State != workspace.Current || len(m.Limits) == 0 || v.Solution.Results.Freedoms() > mostTried {
		return nil
	}
	for i := range m.Sections {
		s := &m.Sections[i]
		if s.Series != "" && s.Origin.Place < 0 && m.Files[s.Origin.File].Path == path && s.Origin.Statement.Overlaps(part) {
			return []Action{resizeAction(m, i, nil)}
		}
	}
	return nil
}

// resize finds the lightest section of the same series with which all limits
// hold that depend on results.
func resize(ctx context.Context, v *workspace.View, name string) (string, map[string][]source.Edit, error) {
	m := v.Resolved.Model
	i := indexOf(m.Sections, name, func(s *model.Section) string { return s.Name })
	if i < 0 || m.Sections[i].Series == "" || v.State != workspace.Current {
		return "", nil, refuse("The section is not of the catalogue any more, or the model is being solved.")
	}
	section := &m.Sections[i]
	file, span, ok := profileOf(v, section)
	if !ok {
		return "", nil, refuse("The size of %s does not stand in its line.", name)
	}
	sizes := slices.Clone(catalogue.Sizes(section.Series))
	slices.SortStableFunc(sizes, func(a, b catalogue.Section) int { return cmp.Compare(a.Mass, b.Mass) })
	before := worst(v.Solution.Limits)
	for _, size := range sizes {
		edits := map[string][]source.Edit{file: {{Span: span, New: size.Title}}}
		t, err := try(ctx, v, edits)
		if err != nil {
			return "", nil, err
		}
		if !t.results.Solved() {
			continue
		}
		limits, err := t.results.Limits(ctx)
		if err != nil {
			return "", nil, err
		}
		broken, unchecked := analysis.Broken(limits)
		if broken > 0 || unchecked > 0 && before.unchecked == 0 {
			continue
		}
		if size.Size == section.Size {
			return "", nil, refuse("%s is the lightest %s with which all limits hold.", section.Title, section.Series)
		}
		after := worst(limits)
		return fmt.Sprintf("%s → %s: worst limit %s → %s", section.Title, size.Title, analysis.ShareWords(before.ratio), analysis.ShareWords(after.ratio)), edits, nil
	}
	return "", nil, refuse("With no size of %s do all limits hold.", section.Series)
}

type worstLimit struct {
	ratio     float64
	unchecked int
}

func worst(limits []analysis.Limit) worstLimit {
	w := worstLimit{}
	_, w.unchecked = analysis.Broken(limits)
	for _, l := range limits {
		if l.Governs.Result >= 0 && !math.IsInf(l.Governs.Ratio, 0) {
			w.ratio = max(w.ratio, l.Governs.Ratio)
		}
	}
	return w
}

// profileOf finds where the size of a section is written.
func profileOf(v *workspace.View, s *model.Section) (file string, span source.Span, ok bool) {
	tree := v.Resolved.Trees[s.Origin.File]
	u := tree.UnitAt(s.Origin.Statement.Start)
	if u < 0 {
		return "", source.Span{}, false
	}
	statement, ok := tree.Units[u].Statement.Tree.(*syntax.SectionStatement)
	if !ok || statement.Profile == nil {
		return "", source.Span{}, false
	}
	return tree.File.Path, statement.Profile.Span.Shift(tree.Units[u].Start), true
}
