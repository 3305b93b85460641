package feature

import (
	"fmt"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// Item is a thing in a hierarchy: that of the load path, or that of materials,
// sections and members.
type Item struct {
	// Name is the full one in the model; with Kind it finds the item again.
	Name   string
	Kind   resolve.Kind
	Detail string
	// Location is the place of the name, Whole that of the statement.
	Location Location
	Whole    source.Span
}

// itemOf returns the item of a thing with a full name.
func itemOf(v *workspace.View, kind resolve.Kind, full, detail string) (Item, bool) {
	d, ok := v.Resolved.Lookup(kind.Space(), full)
	if !ok {
		return Item{}, false
	}
	return Item{Name: full, Kind: d.Kind, Detail: detail, Location: Location{d.File, d.Span}, Whole: d.Statement}, true
}

// itemAt returns the item of the name at a place, where it is one of the kinds
// that the hierarchy knows.
func itemAt(s *workspace.Snapshot, path string, offset int, detail func(v *workspace.View, d *resolve.Definition) (string, bool)) (Item, bool) {
	v, ok := s.View(path)
	if !ok {
		return Item{}, false
	}
	r, ok := v.Resolved.ReferenceAt(path, offset)
	if !ok || r.Definition == nil || len(r.Definition.Full) == 0 {
		return Item{}, false
	}
	text, ok := detail(&v, r.Definition)
	if !ok {
		return Item{}, false
	}
	return itemOf(&v, r.Definition.Kind, r.Definition.Full[0], text)
}

// TypeItem returns the material, section or member at a place.
func TypeItem(s *workspace.Snapshot, path string, offset int) (Item, bool) {
	return itemAt(s, path, offset, func(v *workspace.View, d *resolve.Definition) (string, bool) {
		m := v.Resolved.Model
		switch {
		case d.Kind == resolve.MaterialName:
			if i := indexOf(m.Materials, d.Full[0], func(x *model.Material) string { return x.Name }); i >= 0 {
				return m.Materials[i].Grade, true
			}
		case d.Kind == resolve.SectionName:
			if i := indexOf(m.Sections, d.Full[0], func(x *model.Section) string { return x.Name }); i >= 0 {
				return m.Sections[i].Title, true
			}
		case d.Kind.Member():
			if i := indexOf(m.Members, d.Full[0], func(x *model.Member) string { return x.Name }); i >= 0 {
				return memberDetail(m, i), true
			}
		}
		return "", false
	})
}

func memberDetail(m *model.Model, member int) string {
	b := &m.Members[member]
	return fmt.Sprintf("%s, %s", b.Kind, quantity.Write(b.Length, m.Display.Length, 3))
}

// Supertypes returns what an item is made of: the section of a member, the
// material of a section.
func Supertypes(s *workspace.Snapshot, item Item) []Item {
	v, ok := s.View(item.Location.Path)
	if !ok {
		return nil
	}
	m := v.Resolved.Model
	switch {
	case item.Kind == resolve.SectionName:
		i := indexOf(m.Sections, item.Name, func(x *model.Section) string { return x.Name })
		if i < 0 || m.Sections[i].Material < 0 {
			return nil
		}
		material := &m.Materials[m.Sections[i].Material]
		return someItems(itemOf(&v, resolve.MaterialName, material.Name, material.Grade))
	case item.Kind.Member():
		i := indexOf(m.Members, item.Name, func(x *model.Member) string { return x.Name })
		if i < 0 || m.Members[i].Section < 0 {
			return nil
		}
		section := &m.Sections[m.Members[i].Section]
		return someItems(itemOf(&v, resolve.SectionName, section.Name, section.Title))
	}
	return nil
}

func someItems(item Item, ok bool) []Item {
	if !ok {
		return nil
	}
	return []Item{item}
}

// mostItems bounds an answer about a hierarchy.
const mostItems = 500

// Subtypes returns what is made of an item: the sections of a material, the
// members of a section.
func Subtypes(s *workspace.Snapshot, item Item) []Item {
	v, ok := s.View(item.Location.Path)
	if !ok {
		return nil
	}
	m := v.Resolved.Model
	var list []Item
	switch item.Kind {
	case resolve.MaterialName:
		for i := range m.Sections {
			if x := &m.Sections[i]; x.Material >= 0 && m.Materials[x.Material].Name == item.Name && len(list) < mostItems {
				list = append(list, someItems(itemOf(&v, resolve.SectionName, x.Name, x.Title))...)
			}
		}
	case resolve.SectionName:
		for i := range m.Members {
			if x := &m.Members[i]; x.Section >= 0 && m.Sections[x.Section].Name == item.Name && len(list) < mostItems {
				list = append(list, someItems(itemOf(&v, resolve.BeamName, x.Name, memberDetail(m, i)))...)
			}
		}
	}
	return list
}
