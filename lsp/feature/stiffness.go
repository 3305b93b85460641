package feature

import (
	"context"
	"fmt"
	"math"
	"strings"

	"spanwright/analysis"
	"spanwright/analysis/frame"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lsp/workspace"
)

// StiffnessAt writes the stiffness of the structure at the node of a place, or
// of the member there on its own, as a page of Markdown. The error says in words
// why there is none, or is the context's.
func StiffnessAt(ctx context.Context, s *workspace.Snapshot, path string, offset int) (string, error) {
	v, ok := s.View(path)
	if !ok {
		return "", refuse("The model cannot be read.")
	}
	r, ok := v.Resolved.ReferenceAt(path, offset)
	if !ok || r.Definition == nil || r.Definition.Kind != resolve.NodeName && !r.Definition.Kind.Member() {
		return "", refuse("Put the cursor on the name of a node or a member to see its stiffness.")
	}
	n, ok := numbersOf(&v)
	if !ok {
		return "", refuse("There is no stiffness to show. %s", v.Words())
	}
	name := fullName(r.Definition)
	var p page
	var err error
	if r.Definition.Kind == resolve.NodeName {
		err = n.nodeStiffness(ctx, &p, name)
	} else {
		err = n.memberStiffness(&p, name)
	}
	if err != nil {
		return "", err
	}
	if n.results.OneWay() {
		p.add("One-way members and supports count as acting.")
	}
	p.add(v.Words())
	return p.String(), nil
}

// nodeStiffness writes, for each freedom of a node, the force for one unit of
// movement.
func (n *numbers) nodeStiffness(ctx context.Context, p *page, name string) error {
	node := n.solution.Node(name)
	if node < 0 {
		return refuse("%s is not in the version that was solved.", name)
	}
	var s *frame.NodeStiffness
	var err error
	asked := n.solution.Stiffness(func() {
		s, err = n.results.Solver().Structure().StiffnessAt(ctx, node)
	})
	switch {
	case !asked:
		return refuse("The solver is at work on the next version. Ask again in a moment.")
	case err != nil:
		return err
	}
	heading := "## Stiffness of the structure at " + name
	if s.Axes != [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} {
		heading += ", along the axes of its turned support"
	}
	p.add(heading)
	var rows [][]string
	for _, f := range n.freedoms() {
		held, free := s.OthersHeld[f], s.OthersFree[f]
		row := []string{analysis.MovementNames[f], directWords(held, f), directWords(free, f), ""}
		switch {
		case math.IsInf(held, 1) && math.IsInf(free, 1):
			row = []string{analysis.MovementNames[f], "", "", "held by the support"}
		case held == 0 && free == 0:
			row[3] = "nothing resists it"
		}
		rows = append(rows, row)
	}
	p.add(table([]string{"Movement", "others held>", "others free>", ""}, rows))
	p.add("The force or moment for one unit of the movement, while the node's other movements are held, and while they are free. Everything else follows.")
	return nil
}

func directWords(k float64, freedom int) string {
	if math.IsInf(k, 1) {
		return "rigid"
	}
	return stiffnessWords(k, freedom)
}

// memberStiffness writes the terms of a member's own stiffness with their closed
// forms.
func (n *numbers) memberStiffness(p *page, name string) error {
	member := n.solution.Member(name)
	if member < 0 {
		return refuse("%s is not in the version that was solved.", name)
	}
	s, ok := n.results.Solver().Structure().StiffnessOf(member)
	if !ok {
		return refuse("%s is a rigid link: it has no stiffness of its own, its nodes move as one body.", name)
	}
	b := &n.model.Members[member]
	p.add("## Stiffness of "+name+" on its own",
		fmt.Sprintf("%s %s → %s, %s", b.Kind, n.model.Nodes[b.Nodes[0]].Name, n.model.Nodes[b.Nodes[len(b.Nodes)-1]].Name,
			quantity.Write(b.Length, n.display.Length, 4)))
	var rows [][]string
	for _, t := range s.Terms {
		rows = append(rows, []string{t.Name, termWords(t), entryWords(t)})
	}
	p.add(table([]string{"Term", "value>", "is"}, rows))
	if len(rows) == 0 {
		p.add("Its joints leave it no entry with a closed form.")
	}
	p.add("In member axes: the end force for one unit of movement of an end, all other movements of both ends held.")
	return nil
}

// termWords writes a term with its unit: a force or moment per length or turn.
func termWords(t frame.Term) string {
	force, turn := t.Row%6 < 3, t.Column%6 > 2
	switch {
	case force && !turn:
		return stiffnessWords(t.Value, 0)
	case !force && turn:
		return stiffnessWords(t.Value, 3)
	}
	return strings.Replace(stiffnessWords(t.Value, 0), "N/m", "N/rad", 1)
}

// entryWords says where in the member's stiffness a term stands.
func entryWords(t frame.Term) string {
	end := func(i int) string { return [...]string{"first", "last"}[i/6] }
	return fmt.Sprintf("%s at the %s end for %s at the %s end",
		analysis.ForceNames[t.Row%6], end(t.Row), analysis.MovementNames[t.Column%6], end(t.Column))
}
