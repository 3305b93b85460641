package feature

import (
	"fmt"
	"strings"

	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
)

// part writes how often a part is placed and where.
func (h *hover) part(d *resolve.Definition) {
	text := "**" + d.Name + "** · part"
	switch places := h.places(d.Name); len(places) {
	case 0:
		text += ", not placed"
	default:
		var names []string
		for _, p := range places[:min(len(places), mostCases)] {
			names = append(names, p.statement.Name.Text)
		}
		text += ", " + counted(len(places), "place") + ": " + strings.Join(names, ", ")
		if len(places) > len(names) {
			text += " …"
		}
	}
	h.page.add(text)
}

// placed is a place statement where it stands.
type placed struct {
	file      string
	start     int
	statement *syntax.PlaceStatement
}

// places returns the statements that place a part.
func (h *hover) places(part string) []placed {
	var list []placed
	for _, tree := range h.view.Resolved.Trees {
		for i := range tree.Units {
			u := &tree.Units[i]
			if p, ok := u.Statement.Tree.(*syntax.PlaceStatement); ok && p.Part != nil && p.Name != nil && p.Part.Text == part {
				list = append(list, placed{tree.File.Path, u.Start, p})
			}
		}
	}
	return list
}

// place writes what a placed part consists of.
func (h *hover) place(d *resolve.Definition) {
	prefix := fullName(d) + "."
	nodes, members := 0, 0
	for i := range h.model.Nodes {
		if strings.HasPrefix(h.model.Nodes[i].Name, prefix) {
			nodes++
		}
	}
	for i := range h.model.Members {
		if strings.HasPrefix(h.model.Members[i].Name, prefix) {
			members++
		}
	}
	h.page.add(fmt.Sprintf("**%s** · placed part of %s and %s; their names begin with %s", d.Name, counted(nodes, "node"), counted(members, "member"), code(prefix)))
}

// parameter writes the value of a part's parameter in the first place.
func (h *hover) parameter(d *resolve.Definition) {
	file := h.view.Resolved.FileIndex(d.File)
	if file < 0 {
		return
	}
	i := h.view.Resolved.Trees[file].UnitAt(d.Statement.Start)
	if i < 0 {
		return
	}
	part, ok := h.view.Resolved.Trees[file].Units[i].Statement.Tree.(*syntax.PartStatement)
	if !ok || part.Name == nil {
		return
	}
	text := "**" + d.Name + "** · parameter of part " + part.Name.Text
	for k, p := range part.Parameters {
		places := h.places(part.Name.Text)
		if p.Text != d.Name || len(places) == 0 || k >= len(places[0].statement.Values) {
			continue
		}
		first := places[0]
		if v := h.view.Resolved.Value(first.file, first.start, first.statement.Values[k]); len(v.Parts) > 0 {
			text += fmt.Sprintf(", %s in %s", showAll(h.model.Display, v.Parts), first.statement.Name.Text)
		}
	}
	h.page.add(text)
}
