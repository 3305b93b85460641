package resolve

import (
	"spanwright/lang/catalogue"
	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// ProfileOf returns the section that a text names as a model would write it: of
// the catalogue, or a shape such as "rect 100 x 200 mm". Where it names none,
// the diagnostics say why; their places are of no meaning.
func ProfileOf(text string) (catalogue.Section, []diagnostic.Diagnostic) {
	if section, ok := catalogue.Lookup(text); ok {
		return section, nil
	}
	file := source.New("/profile.span", "model \"Profile\" plane\nmaterial steel = S235\nsection profile = "+text+" of steel\n")
	s := NewSession()
	r := s.Update(syntax.Parse(file), nil)
	var problems []diagnostic.Diagnostic
	for _, d := range r.Diagnostics {
		if d.Severity == diagnostic.Error {
			problems = append(problems, d)
		}
	}
	if len(problems) > 0 {
		return catalogue.Section{}, problems
	}
	for _, f := range s.main.fragments {
		statement, ok := f.statement.Tree.(*syntax.SectionStatement)
		if !ok || statement.Profile == nil || statement.Profile.Shape == "" {
			continue
		}
		e := &evaluation{session: s, fragment: f, out: &outcome{}}
		if sizes, ok := e.sizes(statement.Profile); ok {
			section, err := makeShape(statement.Profile.Shape, sizes)
			f.forget(s.symbols)
			if err == nil {
				return section, nil
			}
		}
	}
	return catalogue.Section{}, []diagnostic.Diagnostic{{Name: "unknown-section", Severity: diagnostic.Error,
		Summary: "Write a series and size of the catalogue, or a shape such as rect 200 x 400 mm."}}
}
