package feature

import (
	"context"
	"fmt"
	"slices"
	"strings"

	"spanwright/analysis"
	"spanwright/analysis/frame"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// restrainActions offer the supports that would stop a mechanism.
func restrainActions(v *workspace.View, d *diagnostic.Diagnostic) []Action {
	if v.State != workspace.Refused || v.Solution.Results == nil || v.Solution.Results.Freedoms() > mostTried {
		return nil
	}
	mechanism := v.Solution.Results.Mechanism()
	if mechanism == nil || len(mechanism.Remedy) == 0 {
		return nil
	}
	return []Action{{Title: "Hold " + remedyWords(v.Resolved.Model, mechanism.Remedy), Fix: true, Preferred: true, Diagnostic: d, Key: "restrain:"}}
}

// remedyWords says what would be held: "ux at E and ry at A".
func remedyWords(m *model.Model, remedy []frame.NodeFreedom) string {
	var parts []string
	for _, r := range remedy {
		parts = append(parts, analysis.MovementNames[r.Freedom]+" at "+m.Nodes[r.Node].Name)
	}
	if len(parts) == 1 {
		return parts[0]
	}
	return strings.Join(parts[:len(parts)-1], ", ") + " and " + parts[len(parts)-1]
}

// restrain writes the supports that stop the mechanism of a view, and makes sure
// that they do.
func restrain(ctx context.Context, v *workspace.View) (string, map[string][]source.Edit, error) {
	if v.State != workspace.Refused || v.Solution.Results.Mechanism() == nil {
		return "", nil, refuse("The model is no longer a mechanism.")
	}
	m := v.Resolved.Model
	remedy := v.Solution.Results.Mechanism().Remedy
	edits := map[string][]source.Edit{}
	var nodes []int
	for _, r := range remedy {
		if !slices.Contains(nodes, r.Node) {
			nodes = append(nodes, r.Node)
		}
	}
	var fresh strings.Builder
	for _, node := range nodes {
		var freedoms []string
		for _, r := range remedy {
			if r.Node == node {
				freedoms = append(freedoms, analysis.MovementNames[r.Freedom])
			}
		}
		if file, edit, ok := heldFurther(v, node, freedoms); ok {
			edits[file] = append(edits[file], edit)
			continue
		}
		fmt.Fprintf(&fresh, "support %s holds %s\n", m.Nodes[node].Name, strings.Join(freedoms, " "))
	}
	if fresh.Len() > 0 {
		at := behindSupports(v.Resolved.Trees[0])
		text := fresh.String()
		if at > 0 && v.Resolved.Trees[0].File.Text[at-1] != '\n' {
			text = "\n" + strings.TrimSuffix(text, "\n")
		}
		edits[v.Path] = append(edits[v.Path], source.Edit{Span: source.At(at), New: text})
	}
	t, err := try(ctx, v, edits)
	if err != nil {
		return "", nil, err
	}
	if !t.results.Solved() {
		return "", nil, refuse("That alone does not stop the movement.")
	}
	return "Hold " + remedyWords(m, remedy), edits, nil
}

// heldFurther adds freedoms to a support that the node has already.
func heldFurther(v *workspace.View, node int, freedoms []string) (file string, e source.Edit, ok bool) {
	m := v.Resolved.Model
	for i := range m.Supports {
		s := &m.Supports[i]
		if s.Node == node && s.Origin.Place < 0 && !s.Turned {
			return m.Files[s.Origin.File].Path, source.Edit{Span: source.At(s.Origin.Statement.End), New: ", holds " + strings.Join(freedoms, " ")}, true
		}
	}
	return "", source.Edit{}, false
}

// behindSupports is the start of the line behind the last support, else behind
// the last member or node, else the end.
func behindSupports(tree *syntax.Tree) int {
	best, rank := len(tree.File.Text), 0
	for i := range tree.Units {
		r := 0
		switch tree.Units[i].Statement.Kind {
		case syntax.SupportKind:
			r = 3
		case syntax.BeamKind, syntax.BarKind, syntax.LinkKind, syntax.SpringKind:
			r = 2
		case syntax.NodeKind:
			r = 1
		}
		if r > 0 && r >= rank && tree.Units[i].Block == syntax.TopLevel {
			best, rank = tree.File.LineStart(tree.File.LineAt(tree.Units[i].End)+1), r
		}
	}
	return best
}
