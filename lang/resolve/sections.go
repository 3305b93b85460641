package resolve

import (
	"strings"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// sectionResult is the properties of a section, without its material.
type sectionResult struct {
	material *symbol
	section  model.Section // without Name, Material, Mass and Origin
	// turned is the angle (rad) from the section's own y to the major principal
	// axis, to which its properties belong; 0 for most.
	turned float64
}

func (r *sectionResult) same(other any) bool {
	o, ok := other.(*sectionResult)
	return ok && *o == *r
}

func (e *evaluation) section(tree *syntax.SectionStatement) {
	r := &sectionResult{}
	ok := true
	if w := e.need(tree.Material, Materials, "material", false, func(k Kind) bool { return k == MaterialName }); w != nil {
		r.material = w.name
	} else {
		ok = false
	}
	if tree.Profile != nil {
		ok = e.profile(tree.Profile, r) && ok
	} else {
		v, fine := e.properties(tree.Properties, sectionProperties, "section")
		ok = ok && fine
		r.section = model.Section{
			A: v["A"], Iy: v["Iy"], Iz: v["Iz"], It: v["It"], Iw: v["Iw"], Wy: v["Wy"], Wz: v["Wz"],
			Avy: v["Avy"], Avz: v["Avz"], Depth: v["depth"], Width: v["width"],
		}
		if fine && v["A"] == 0 {
			e.fail("missing-property", e.nameSpan(), "Give %s its area: write A 53.8 cm2, or what is right for it.", tree.Name.Text)
			ok = false
		}
		if ok {
			e.plausibleSection(tree, &r.section)
		}
	}
	if ok {
		e.out.result = r
	}
}

// sizes works out the dimensions of a shape. A unit behind the last one counts
// for all that have none of their own.
func (e *evaluation) sizes(p *syntax.Profile) ([]float64, bool) {
	values := make([]value, len(p.Sizes))
	for i, x := range p.Sizes {
		if values[i] = e.value(x); values[i].isBad() {
			return nil, false
		}
	}
	if len(values) == 0 {
		return nil, true
	}
	unit := lastUnit(p.Sizes[len(p.Sizes)-1].Root)
	list := make([]float64, len(values))
	for i, v := range values {
		if v.bare && unit != "" && i < len(values)-1 {
			u, _ := quantity.Lookup(unit)
			v = e.withUnit(v, u)
		}
		if v.bare {
			last := p.Sizes[len(p.Sizes)-1].Span.End
			e.fail("missing-unit", p.Sizes[i].Span, "Write the unit behind the last size: %s mm.", p.Text).
				fix("Write "+p.Text+" mm", source.At(last), " mm")
			return nil, false
		}
		size, ok := e.want(v, p.Sizes[i], quantity.Length, "a length")
		if !ok || !e.positive(size, p.Sizes[i], "The size of a section") {
			return nil, false
		}
		list[i] = size
	}
	return list, true
}

// lastUnit returns the unit behind a number, or "".
func lastUnit(n syntax.Node) string {
	if b, ok := n.(*syntax.BinaryNode); ok && b.Op == syntax.Joined {
		if u, ok := b.Y.(*syntax.NameNode); ok {
			return syntax.NormalUnit(u.Text)
		}
	}
	return ""
}

// squeezed returns a text with every run of blanks as one space.
func squeezed(text string) string { return strings.Join(strings.Fields(text), " ") }
