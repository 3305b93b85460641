package feature

import (
	"math/big"
	"strconv"
	"strings"

	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// conversions offer a number in other units of its dimension, where it can be
// written exactly, in a few digits, and the model stays the same to the last
// digit.
func conversions(s *workspace.Snapshot, v *workspace.View, path string, part source.Span) []Action {
	file := v.Resolved.FileIndex(path)
	if file < 0 {
		return nil
	}
	tree := v.Resolved.Trees[file]
	number, unit, span, ok := numberAt(tree, part.Start)
	if !ok {
		return nil
	}
	var list []Action
	for _, other := range quantity.ByDimension(unit.Dimension) {
		if other.Symbol == unit.Symbol || other.Angle != unit.Angle || other.Customary != unit.Customary {
			continue
		}
		text, ok := converted(number, unit, other)
		if !ok {
			continue
		}
		edits := map[string][]source.Edit{path: {{Span: span, New: text + " " + other.Symbol}}}
		if sameAfter(s, v.Resolved, edits) != nil {
			continue
		}
		if list = append(list, Action{Title: "Write " + text + " " + other.Symbol + ": the same value", Edits: edits}); len(list) == 4 {
			break
		}
	}
	return list
}

// numberAt finds a number with its unit at a place.
func numberAt(tree *syntax.Tree, offset int) (number string, unit quantity.Unit, span source.Span, ok bool) {
	i := tree.UnitAt(offset)
	if i < 0 {
		return "", unit, span, false
	}
	u := &tree.Units[i]
	var tokens []syntax.Token
	for _, t := range syntax.Tokens(u.Statement.Text) {
		if !t.Trivia() {
			tokens = append(tokens, t)
		}
	}
	for k := 0; k+1 < len(tokens); k++ {
		span = source.Span{Start: int(tokens[k].Start), End: int(tokens[k+1].End)}.Shift(u.Start)
		if tokens[k].Kind != syntax.Number || tokens[k+1].Kind != syntax.Word || !span.Contains(offset) {
			continue
		}
		unit, ok = quantity.Lookup(syntax.NormalUnit(tokens[k+1].In(u.Statement.Text)))
		return tokens[k].In(u.Statement.Text), unit, span, ok
	}
	return "", unit, span, false
}

// converted writes a number of one unit in another, where that takes no more
// than nine digits.
func converted(number string, from, to quantity.Unit) (string, bool) {
	value, ok := new(big.Rat).SetString(number)
	a, okA := new(big.Rat).SetString(strconv.FormatFloat(from.Factor, 'g', -1, 64))
	b, okB := new(big.Rat).SetString(strconv.FormatFloat(to.Factor, 'g', -1, 64))
	if !ok || !okA || !okB || b.Sign() == 0 {
		return "", false
	}
	value.Mul(value, a).Quo(value, b)
	places, exact := value.FloatPrec()
	if !exact || places > 6 {
		return "", false
	}
	text := value.FloatString(places)
	if len(strings.Trim(strings.ReplaceAll(text, ".", ""), "0")) > 9 || len(text) > 12 {
		return "", false
	}
	return text, true
}
