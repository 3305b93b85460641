package resolve

import (
	"spanwright/lang/model"
	"spanwright/lang/syntax"
)

// profile works out a section by shape or from the catalogue.
func (e *evaluation) profile(p *syntax.Profile, into *model.Section) bool {
	e.fail("unknown-section", p.Span, "Write the section in braces: %s is not in the catalogue.", p.Text)
	return false
}

func (e *evaluation) grade(g *syntax.Grade) {
	e.fail("unknown-grade", g.Span, "Write the material in braces: %s is not in the catalogue.", g.Text)
}
