package feature

import (
	"context"
	"strconv"
	"strings"

	"spanwright/lang/catalogue"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// Describe returns the documentation of a proposal by its key, as Markdown, or
// "". It is asked for the one proposal that somebody looks at.
func Describe(ctx context.Context, s *workspace.Snapshot, path, key string) string {
	kind, what, _ := strings.Cut(key, ":")
	switch kind {
	case "word":
		if k, ok := syntax.KeywordOf(what); ok {
			var p page
			p.add(k.Does, block(k.Example))
			return p.String()
		}
		number, word, _ := strings.Cut(what, ":")
		statement, err := strconv.Atoi(number)
		if err != nil {
			return ""
		}
		if meaning, ok := wordMeaning(syntax.Kind(statement), word); ok {
			return "**" + word + "** · " + meaning
		}
	case "unit":
		h := bareHover(ctx)
		h.unitMeaning(what)
		return h.page.String()
	case "function":
		for _, f := range resolve.Functions() {
			if f.Name == what {
				return code(f.Form) + " " + f.Does
			}
		}
	case "series":
		if series, ok := catalogue.FindSeries(what); ok {
			return series.Title + "\n\n" + series.Source
		}
	case "section":
		if section, ok := catalogue.Lookup(what); ok {
			return sectionWords(&section)
		}
	case "grade":
		if m, ok := catalogue.FindGrade(what); ok {
			return "**" + m.Grade + "** · " + m.Title + "\n\n" + m.Source
		}
	case "name":
		return describeName(ctx, s, path, what)
	}
	return ""
}

// bareHover writes about words that mean the same in every model.
func bareHover(ctx context.Context) *hover {
	return &hover{ctx: ctx, model: &model.Model{Display: quantity.Metric()}}
}

// describeName is what a hover over a declaration says.
func describeName(ctx context.Context, s *workspace.Snapshot, path, what string) string {
	v, ok := s.View(path)
	if !ok {
		return ""
	}
	number, full, _ := strings.Cut(what, ":")
	space, err := strconv.Atoi(number)
	if err != nil {
		return ""
	}
	if d, ok := v.Resolved.Lookup(resolve.Space(space), full); ok {
		if h, ok := HoverAt(ctx, s, d.File, d.Span.Start, HoverOptions{}); ok {
			return h.Markdown
		}
	}
	return ""
}

// sectionWords are the dimensions and properties of a section of the catalogue.
func sectionWords(s *catalogue.Section) string {
	mm, _ := quantity.Lookup("mm")
	var rows [][]string
	for _, d := range s.Dimensions {
		rows = append(rows, []string{d.Symbol, d.Name, quantity.Write(d.Value, mm, 4)})
	}
	var p page
	p.add("**"+s.Title+"** · "+sizeDetail(s), table([]string{"", "", "value>"}, rows), s.Source)
	return p.String()
}
