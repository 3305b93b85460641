package resolve

import (
	"errors"
	"fmt"
	"slices"

	"spanwright/lang/catalogue"
	"spanwright/lang/model"
	"spanwright/lang/syntax"
)

// shapeForms are the shapes with how many sizes each has.
var shapeForms = map[string]struct {
	sizes int
	form  string
}{
	"rect":  {2, "rect 200 x 400 mm (width by depth)"},
	"round": {1, "round 24 mm"},
	"pipe":  {2, "pipe 114.3 x 5 mm (diameter by wall)"},
	"tube":  {3, "tube 100 x 60 x 4 mm (depth by width by wall)"},
	"angle": {3, "angle 80 x 80 x 8 mm (leg by leg by thickness)"},
}

// profile works out a section by shape or from the catalogue.
func (e *evaluation) profile(p *syntax.Profile, r *sectionResult) bool {
	if p.Shape == "" {
		return e.fromCatalogue(p, r)
	}
	form := shapeForms[p.Shape]
	if len(p.Sizes) != form.sizes {
		e.fail("wrong-sizes", p.Span, "Write %s: a %s has %s.", form.form, p.Shape, countWords(form.sizes, "size"))
		return false
	}
	sizes, ok := e.sizes(p)
	if !ok {
		return false
	}
	section, err := makeShape(p.Shape, sizes)
	if err != nil {
		span := p.Span
		var which *catalogue.DimensionError
		if errors.As(err, &which) && which.Index < len(p.Sizes) {
			span = p.Sizes[which.Index].Span
		}
		e.fail("impossible-section", span, "Correct the sizes: %s.", err.Error())
		return false
	}
	r.take(section)
	e.plausibleShape(p, sizes, section)
	return true
}

func makeShape(shape string, sizes []float64) (catalogue.Section, error) {
	switch shape {
	case "rect":
		return catalogue.Rect(sizes[0], sizes[1])
	case "round":
		return catalogue.Round(sizes[0])
	case "pipe":
		return catalogue.Pipe(sizes[0], sizes[1])
	case "tube":
		return catalogue.Tube(sizes[0], sizes[1], sizes[2])
	}
	return catalogue.Angle(sizes[0], sizes[1], sizes[2])
}

// fromCatalogue looks a section up by series and size.
func (e *evaluation) fromCatalogue(p *syntax.Profile, r *sectionResult) bool {
	section, ok := catalogue.Lookup(p.Text)
	if ok {
		r.take(section)
		return true
	}
	near := catalogue.NearestTo(p.Text)
	if len(near) > 0 {
		f := e.fail("unknown-section", p.Span, "Did you mean %s? The catalogue has no %s.", either(near), squeezed(p.Text))
		for _, n := range near {
			f.fix("Write "+n, p.Span, n)
		}
		return false
	}
	var series []string
	for _, s := range catalogue.AllSeries() {
		series = append(series, s.Name)
	}
	e.fail("unknown-section", p.Span, "Write a series and size of the catalogue, a shape such as rect 200 x 400 mm, or properties in braces: %s is none of them.", squeezed(p.Text)).
		Detail = "Series of the catalogue: " + joinWords(series, "and") + "."
	return false
}

// take fills the result from a computed section. A section whose y and z are
// not its principal axes, such as an angle, is taken in its principal axes; the
// members then turn with it.
func (r *sectionResult) take(s catalogue.Section) {
	if !s.IsPrincipal() {
		r.turned = s.Alpha
		s = s.Principal()
	}
	r.section = model.Section{
		Title: s.Title, A: s.A, Iy: s.Iy, Iz: s.Iz, It: s.It, Iw: s.Iw, Wy: s.Wely, Wz: s.Welz, Wply: s.Wply, Wplz: s.Wplz,
		Avy: s.Asy, Avz: s.Asz, Depth: s.Depth, Width: s.Width, Series: s.Series, Size: s.Size,
	}
}

func (e *evaluation) plausibleShape(p *syntax.Profile, sizes []float64, s catalogue.Section) {
	most := slices.Max(sizes)
	switch {
	case most > 10:
		e.warn("implausible-value", p.Span, "Check the unit: %s is larger than any section of a member.", squeezed(p.Text))
	case most < 0.002:
		e.warn("implausible-value", p.Span, "Check the unit: %s is thinner than any member.", squeezed(p.Text))
	}
}

// grade takes a material from the catalogue.
func (e *evaluation) grade(g *syntax.Grade) {
	m, ok := catalogue.FindGrade(g.Text)
	if !ok {
		near := catalogue.NearestGrade(g.Text)
		if len(near) == 0 {
			e.fail("unknown-grade", g.Span, "Write a grade of the catalogue such as S275, C30/37 or C24, or properties in braces: %s is neither.", g.Text)
			return
		}
		f := e.fail("unknown-grade", g.Span, "Did you mean %s? The catalogue has no grade %s.", either(near), g.Text)
		for _, n := range near {
			f.fix(fmt.Sprintf("Write %s", n), g.Span, n)
		}
		return
	}
	e.out.result = &materialResult{grade: m.Grade, e: m.E, g: m.G, density: m.Density, expansion: m.Expansion, yield: m.Yield}
}
