package feature

import (
	"fmt"
	"strings"

	"spanwright/lang/catalogue"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
)

// section writes the properties of a cross-section.
func (h *hover) section(d *resolve.Definition) {
	i := indexOf(h.model.Sections, fullName(d), func(s *model.Section) string { return s.Name })
	if i < 0 {
		h.page.add("**" + d.Name + "** · section")
		return
	}
	s := &h.model.Sections[i]
	title := strings.TrimSpace("section " + s.Title)
	if s.Material >= 0 {
		title += " of " + materialTitle(&h.model.Materials[s.Material])
	}
	h.page.add("**" + s.Name + "** · " + title)
	h.page.add(table([]string{"", "value>", ""}, h.properties(s)))
	found, ok := catalogue.Find(s.Series, s.Size)
	if !ok {
		return
	}
	var dimensions []string
	for _, x := range found.Dimensions {
		dimensions = append(dimensions, x.Symbol+" "+quantity.Write(x.Value, h.fine(), 4))
	}
	h.page.add(strings.Join(dimensions, " · "))
	h.page.add("Dimensions: " + found.Source + ". Properties are computed from them.")
	h.page.add(found.Notes...)
}

func materialTitle(m *model.Material) string {
	if m.Grade == "" || m.Grade == m.Name {
		return code(m.Name)
	}
	return code(m.Name) + " " + m.Grade
}

// fine is the unit of the dimensions of sections: mm, or inches.
func (h *hover) fine() quantity.Unit {
	symbol := "mm"
	if h.model.Display.Length.Customary {
		symbol = "in"
	}
	u, _ := quantity.Lookup(symbol)
	return u
}

// properties are the rows of a section's table. What was not given is left out.
func (h *hover) properties(s *model.Section) [][]string {
	area, modulus, inertia, warping := h.model.Display.For(quantity.Area), h.model.Display.For(quantity.Volume),
		h.model.Display.For(quantity.SecondMoment), h.model.Display.For(quantity.WarpingConstant)
	var rows [][]string
	for _, p := range []struct {
		symbol string
		value  float64
		unit   quantity.Unit
		words  string
	}{
		{"depth", s.Depth, h.fine(), "along z"},
		{"width", s.Width, h.fine(), "along y"},
		{"A", s.A, area, "area"},
		{"Iy", s.Iy, inertia, "second moment about y"},
		{"Iz", s.Iz, inertia, "second moment about z"},
		{"It", s.It, inertia, "torsion constant"},
		{"Iw", s.Iw, warping, "warping constant"},
		{"Wy", s.Wy, modulus, "elastic modulus about y"},
		{"Wz", s.Wz, modulus, "elastic modulus about z"},
		{"Wpl,y", s.Wply, modulus, "plastic modulus about y"},
		{"Wpl,z", s.Wplz, modulus, "plastic modulus about z"},
		{"Avy", s.Avy, area, "shear area along y"},
		{"Avz", s.Avz, area, "shear area along z"},
		{"mass", s.Mass, h.model.Display.For(quantity.MassPerLength), ""},
	} {
		if p.value != 0 {
			rows = append(rows, []string{p.symbol, quantity.Write(p.value, p.unit, 4), p.words})
		}
	}
	return rows
}

// material writes the values of a material and the standard they come from.
func (h *hover) material(d *resolve.Definition) {
	i := indexOf(h.model.Materials, fullName(d), func(m *model.Material) string { return m.Name })
	if i < 0 {
		h.page.add("**" + d.Name + "** · material")
		return
	}
	m := &h.model.Materials[i]
	found, standard := catalogue.FindGrade(m.Grade)
	title := "material"
	if standard {
		title = found.Title
	}
	h.page.add("**" + m.Name + "** · " + title)
	stress := h.model.Display.Stress
	rows := [][]string{
		{"E", quantity.Write(m.E, stress, 4), "modulus of elasticity"},
		{"G", quantity.Write(m.G, stress, 4), "shear modulus"},
	}
	if m.Density > 0 {
		rows = append(rows, []string{"density", quantity.Write(m.Density, h.model.Display.For(quantity.Density), 4), ""})
	}
	if m.Expansion > 0 {
		rows = append(rows, []string{"expansion", quantity.Write(m.Expansion, h.model.Display.For(quantity.Expansion), 4), "for one kelvin"})
	}
	if m.Yield > 0 {
		rows = append(rows, []string{"yield", quantity.Write(m.Yield, stress, 4), found.YieldNote})
	}
	for _, s := range found.Strengths {
		rows = append(rows, []string{s.Symbol, quantity.Write(s.Value, stress, 4), s.Name})
	}
	h.page.add(table([]string{"", "value>", ""}, rows))
	if !standard {
		h.page.add("Values as given in the model.")
		return
	}
	if len(found.Steps) > 1 {
		var steps []string
		for _, s := range found.Steps {
			steps = append(steps, fmt.Sprintf("%s up to %s", quantity.Write(s.Yield, stress, 4), quantity.Write(s.UpTo, h.fine(), 4)))
		}
		h.page.add("Yield by thickness: " + strings.Join(steps, ", ") + ". The model takes the first.")
	}
	h.page.add("Values: " + found.Source + ".")
	h.page.add(found.Notes...)
}
