package feature

import (
	"fmt"
	"slices"
	"strings"

	"spanwright/lang/catalogue"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// profile proposes series, sizes and shapes behind the "=" of a section, and
// reports whether that is where the place is. A size has digits and blanks in
// it, so all behind the "=" is one word to be replaced.
func (c *completer) profile() bool {
	if len(c.before) < 3 || c.before[0].In(c.text) != "section" {
		return false
	}
	from := -1
	for _, t := range c.before {
		switch word := t.In(c.text); {
		case word == "=" && from < 0:
			from = int(t.End)
		case from >= 0 && (word == "of" || word == "{" || word == ","):
			return false
		}
	}
	if from < 0 {
		return false
	}
	typed := strings.TrimLeft(c.text[from:], " \t")
	if strings.HasSuffix(typed, " ") && c.complete(strings.TrimSpace(typed)) {
		c.add(c.plainWord("of")) // a section stands there
		return true
	}
	if first, _, more := strings.Cut(typed, " "); more && slices.Contains(syntax.Shapes(), first) {
		return false // the sizes of a shape: numbers and lengths
	}
	c.result.Span = source.Span{Start: c.offset - len(typed), End: c.offset}
	c.result.Incomplete = true
	series, _, _ := strings.Cut(typed, " ")
	if found, ok := catalogue.FindSeries(strings.TrimRight(series, "0123456789")); ok && typed != "" {
		for i, s := range catalogue.Sizes(found.Name) {
			c.add(Proposal{Label: s.Title, Detail: sizeDetail(&s), Kind: SectionProposal, Rank: i, Key: "section:" + s.Title})
		}
	}
	for _, s := range catalogue.AllSeries() {
		c.add(Proposal{Label: s.Name, Detail: s.Title, Kind: SectionProposal, Insert: s.Name + " ", Rank: 1000, Key: "series:" + s.Name})
	}
	for _, w := range syntax.Shapes() {
		shape := c.plainWord(w)
		shape.Detail, shape.Insert, shape.Rank = "shape", w+" ", 1001
		c.add(shape)
	}
	squeezed := squeeze(typed)
	c.result.Proposals = slices.DeleteFunc(c.result.Proposals, func(p Proposal) bool { return !strings.HasPrefix(squeeze(p.Label), squeezed) })
	return true
}

// squeeze takes blanks and case off a name: "IPE 300" and "ipe300" are one.
func squeeze(s string) string { return strings.ToLower(strings.ReplaceAll(s, " ", "")) }

// complete reports whether a text names a section of the catalogue, or a shape
// with sizes and a unit.
func (c *completer) complete(text string) bool {
	if _, ok := catalogue.Lookup(text); ok {
		return true
	}
	tokens := syntax.Tokens(text)
	return len(tokens) > 2 && syntax.UnitSymbol(tokens[len(tokens)-1].In(text))
}

// sizeDetail says what tells a size from its neighbours: mass and Iy.
func sizeDetail(s *catalogue.Section) string {
	cm, _ := quantity.Lookup("cm")
	return fmt.Sprintf("%s kg/m · Iy %s", quantity.Number(s.Mass, 3), quantity.Write(s.Iy, cm.Power(4), 3))
}
