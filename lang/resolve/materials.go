package resolve

import (
	"slices"

	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// materialResult is the properties of a material; 0 where not given.
type materialResult struct {
	grade                           string
	zeroDensity, zeroExpansion      bool // written as zero, on purpose
	e, g, density, expansion, yield float64
}

// given reports whether a property stands in the text with the value zero.
func (r *materialResult) given(word string) bool {
	return word == "density" && r.zeroDensity || word == "expansion" && r.zeroExpansion
}

func (r *materialResult) same(other any) bool {
	o, ok := other.(*materialResult)
	return ok && *o == *r
}

// property is a word that may stand in the braces of a material or section.
type property struct {
	word      string
	dimension quantity.Dimension
	what      string
}

var materialProperties = []property{
	{"E", quantity.Stress, "a modulus of elasticity, such as 210 GPa,"},
	{"G", quantity.Stress, "a shear modulus, such as 81 GPa,"},
	{"poisson", quantity.None, "Poisson's ratio, such as 0.3,"},
	{"density", quantity.Density, "a density, such as 7850 kg/m3,"},
	{"expansion", quantity.Expansion, "a thermal expansion, such as 12e-6 /K,"},
	{"yield", quantity.Stress, "a yield stress, such as 275 MPa,"},
}

var sectionProperties = []property{
	{"A", quantity.Area, "an area, such as 53.8 cm2,"},
	{"Iy", quantity.SecondMoment, "a second moment of area, such as 8356 cm4,"},
	{"Iz", quantity.SecondMoment, "a second moment of area, such as 604 cm4,"},
	{"It", quantity.SecondMoment, "a torsion constant, such as 20.1 cm4,"},
	{"Iw", quantity.WarpingConstant, "a warping constant, such as 126000 cm6,"},
	{"Wy", quantity.Volume, "a section modulus, such as 557 cm3,"},
	{"Wz", quantity.Volume, "a section modulus, such as 80.5 cm3,"},
	{"Avy", quantity.Area, "a shear area, such as 32 cm2,"},
	{"Avz", quantity.Area, "a shear area, such as 25.7 cm2,"},
	{"depth", quantity.Length, "a depth, such as 300 mm,"},
	{"width", quantity.Length, "a width, such as 150 mm,"},
}

func words(list []property) []string {
	out := make([]string, len(list))
	for i, p := range list {
		out[i] = p.word
	}
	return out
}

// properties works out the properties in braces, each above zero.
func (e *evaluation) properties(list []*syntax.Property, known []property, of string) (values map[string]float64, ok bool) {
	values, ok = map[string]float64{}, true
	for _, p := range list {
		i := slices.IndexFunc(known, func(k property) bool { return k.word == p.Word.Text })
		if i < 0 {
			f := e.fail("unknown-property", p.Word.Span(), "Write %s: %s is no property of a %s.", either(words(known)), p.Word.Text, of)
			if near := nearest(p.Word.Text, words(known)); len(near) > 0 {
				f.Summary = "Did you mean " + either(near) + "? " + p.Word.Text + " is no property of a " + of + "."
				f.fix("Write "+near[0], p.Word.Span(), near[0])
			}
			ok = false
			continue
		}
		if _, twice := values[p.Word.Text]; twice {
			e.fail("given-twice", p.Word.Span(), "Keep one %s: it stands here twice.", p.Word.Text)
			ok = false
			continue
		}
		v, fine := e.scalar(p.Value, known[i].dimension, known[i].what)
		if fine && p.Word.Text == "poisson" {
			if v <= -1 || v > 0.5 {
				e.fail("out-of-range", p.Value.Span, "Write Poisson's ratio between −1 and 0.5: %s is outside.", e.calls(p.Value.Root, "this"))
				fine = false
			}
		} else if fine && !(v == 0 && (p.Word.Text == "density" || p.Word.Text == "expansion")) {
			fine = e.positive(v, p.Value, p.Word.Text)
		}
		if !fine {
			ok = false
			values[p.Word.Text] = 0
			continue
		}
		values[p.Word.Text] = v
	}
	return values, ok
}

func (e *evaluation) material(tree *syntax.MaterialStatement) {
	if tree.Grade != nil {
		e.grade(tree.Grade)
		return
	}
	v, ok := e.properties(tree.Properties, materialProperties, "material")
	if !ok {
		return
	}
	r := &materialResult{e: v["E"], g: v["G"], density: v["density"], expansion: v["expansion"], yield: v["yield"]}
	if r.e == 0 {
		e.fail("missing-property", e.nameSpan(), "Give %s its modulus of elasticity: write E 210 GPa, or what is right for it.", tree.Name.Text)
		return
	}
	_, hasDensity := v["density"]
	_, hasExpansion := v["expansion"]
	r.zeroDensity, r.zeroExpansion = hasDensity && r.density == 0, hasExpansion && r.expansion == 0
	poisson, given := v["poisson"]
	if given {
		shear := r.e / (2 * (1 + poisson))
		if r.g != 0 && abs64(r.g-shear) > 0.02*shear {
			e.warn("contradiction", e.nameSpan(), "Keep one of G and poisson: with this E, a ratio of %s gives G = %s, not %s.",
				quantity.Number(poisson, 3), e.stress(shear), e.stress(r.g))
		} else if r.g == 0 {
			r.g = shear
		}
	}
	e.plausibleMaterial(tree, r)
	e.out.result = r
}

func (e *evaluation) stress(v float64) string {
	return quantity.Metric().Show(quantity.Quantity{Value: v, Dimension: quantity.Stress})
}

func abs64(x float64) float64 {
	if x < 0 {
		return -x
	}
	return x
}
