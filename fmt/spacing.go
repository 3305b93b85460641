package format

import (
	"strings"

	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// statementLine is one line of a statement in its normal spelling.
type statementLine struct {
	cells   []string
	comment string
	closes  bool // begins with a closing bracket
}

// piece is a token in its normal spelling.
type piece struct {
	text       string
	kind       syntax.TokenKind
	unary      bool   // a sign before an operand
	glued      bool   // no blank stood before it
	startsLine bool   // the author began a line with it
	comment    string // that stood behind it, at the end of the author's line
	call       bool   // an opening bracket of arguments
	perUnit    bool   // a "/" between a plain number and a unit
	tight      bool   // a "*" between two units
}

// spaced returns the lines of a statement with its tokens in normal spelling
// and the blanks between them, cut into cells that can line up.
func spaced(s *syntax.Statement) []statementLine {
	pieces := normal(s)
	var lines []statementLine
	var cell strings.Builder
	current := statementLine{}
	flush := func() {
		if cell.Len() > 0 {
			current.cells = append(current.cells, cell.String())
			cell.Reset()
		}
	}
	for i := range pieces {
		p := &pieces[i]
		switch {
		case p.startsLine:
			flush()
			lines = append(lines, current)
			current = statementLine{closes: p.text == ")" || p.text == "}"}
		case len(lines) == 0 && cellStarts(s.Kind, pieces, i):
			flush()
		case i > 0 && space(&pieces[i-1], p):
			cell.WriteByte(' ')
		}
		cell.WriteString(p.text)
		if p.comment != "" {
			current.comment = p.comment
		}
	}
	flush()
	return append(lines, current)
}

// cellStarts reports whether a piece begins a cell: the "=", each "->" and the
// "of" of sections and members, and the name behind a member's key word.
func cellStarts(kind syntax.Kind, pieces []piece, i int) bool {
	text := pieces[i].text
	switch kind {
	case syntax.BeamKind, syntax.BarKind, syntax.LinkKind, syntax.SpringKind:
		return i == 1 || text == "=" || text == "->" || text == "of" && pieces[i].kind == syntax.Word
	case syntax.SectionKind:
		return text == "=" || text == "of" && pieces[i].kind == syntax.Word
	case syntax.LetKind, syntax.MaterialKind, syntax.NodeKind, syntax.GroupKind, syntax.CombinationKind, syntax.PlaceKind:
		return text == "="
	}
	return false
}

// normal returns the tokens of a statement that mean something, in their normal
// spelling.
func normal(s *syntax.Statement) []piece {
	unary := map[int]bool{}
	s.Expressions(func(e *syntax.Expression) {
		syntax.Walk(e.Root, func(n syntax.Node) {
			if u, ok := n.(*syntax.UnaryNode); ok {
				unary[u.Span.Start] = true
			}
		})
	})
	var pieces []piece
	glued, startsLine := true, false
	for _, t := range syntax.Tokens(s.Text) {
		text := t.In(s.Text)
		switch t.Kind {
		case syntax.Blank:
			glued = false
			continue
		case syntax.LineEnd:
			glued, startsLine = false, len(pieces) > 0
			continue
		case syntax.Comment:
			if n := len(pieces); n > 0 {
				pieces[n-1].comment = joinComments(pieces[n-1].comment, trim(text))
			}
			continue
		}
		p := piece{text: spelling(t.Kind, text), kind: t.Kind, glued: glued, startsLine: startsLine}
		p.unary = unary[int(t.Start)] || (p.text == "-" && len(pieces) > 0 && reserved(&pieces[len(pieces)-1]))
		p.call = p.text == "(" && len(pieces) > 0 && calls(s.Kind, pieces, glued)
		pieces = append(pieces, p)
		glued, startsLine = true, false
	}
	pieces = joinUnits(pieces)
	markOperators(pieces)
	return pieces
}

// joinComments puts comments that stood on several lines of one statement, with
// no token between them, behind each other.
func joinComments(first, second string) string {
	if first == "" {
		return second
	}
	return first + " " + second
}

func reserved(p *piece) bool { return p.kind == syntax.Word && syntax.Reserved(p.text) }

// calls reports whether an opening bracket behind the pieces holds arguments.
func calls(kind syntax.Kind, pieces []piece, glued bool) bool {
	before := &pieces[len(pieces)-1]
	if before.kind != syntax.Word || reserved(before) {
		return false
	}
	switch kind {
	case syntax.PartKind:
		return len(pieces) == 2
	case syntax.PlaceKind:
		if len(pieces) == 4 {
			return true
		}
	}
	return glued
}

// spelling returns the normal spelling of a token.
func spelling(kind syntax.TokenKind, text string) string {
	switch kind {
	case syntax.Number:
		mantissa, exponent, has := strings.Cut(strings.ToLower(text), "e")
		if has {
			return mantissa + "e" + strings.TrimPrefix(exponent, "+")
		}
	case syntax.Word:
		return syntax.NormalUnit(text)
	case syntax.Sign:
		switch text {
		case "−":
			return "-"
		case "·":
			return "*"
		case "×":
			return "x"
		case "≤":
			return "<="
		case "≥":
			return ">="
		case "→":
			return "->"
		}
	}
	return text
}

// joinUnits writes units in their normal form: "m^2" as m2, "kN*m" and "kN.m"
// as kNm.
func joinUnits(pieces []piece) []piece {
	var out []piece
	for i := 0; i < len(pieces); i++ {
		p := pieces[i]
		if unit(p.text) && i+2 < len(pieces) && pieces[i+1].text == "^" && pieces[i+1].glued && pieces[i+2].glued && unit(p.text+pieces[i+2].text) {
			p.text += pieces[i+2].text
			p.comment = pieces[i+2].comment
			i += 2
		}
		if strings.Contains(p.text, ".") && p.kind == syntax.Word {
			p.text = dotted(p.text)
		}
		// a/kN*m is (a/kN)·m: there the product must stay.
		n := len(out)
		if unit(p.text) && n >= 2 && out[n-1].text == "*" && unit(out[n-2].text) && unit(out[n-2].text+p.text) &&
			!p.startsLine && !out[n-1].startsLine && (n < 3 || out[n-3].text != "/" && out[n-3].text != "^") &&
			(i+1 >= len(pieces) || pieces[i+1].text != "^") && out[n-2].comment == "" && out[n-1].comment == "" {
			out[n-2].text += p.text
			out[n-2].comment = p.comment
			out = out[:n-1]
			continue
		}
		out = append(out, p)
	}
	return out
}

// dotted returns "kN.m" as kNm, or as kN*m where there is no such unit; a
// qualified name stays.
func dotted(text string) string {
	parts := strings.Split(text, ".")
	for i, part := range parts {
		if !syntax.UnitSymbol(part) {
			return text
		}
		parts[i] = syntax.NormalUnit(part)
	}
	if joined := strings.Join(parts, ""); unit(joined) {
		return joined
	}
	return strings.Join(parts, "*")
}

func unit(text string) bool {
	_, ok := quantity.Lookup(text)
	return ok
}

// space reports whether a blank stands between two pieces of one line.
func space(a, b *piece) bool {
	switch b.text {
	case ",", ")", ":", "^":
		return false
	case "/":
		return b.perUnit
	case "(":
		if b.call {
			return false
		}
	case "*":
		return !b.tight
	}
	switch a.text {
	case "(", "^", "/":
		return false
	case "*":
		return !a.tight
	}
	return !a.unary
}

// markOperators says of each "/" whether it stands between a plain number and a
// unit ("12e-6 /K"), and of each "*" whether it joins two units ("kg*m2").
func markOperators(pieces []piece) {
	for i := 1; i+1 < len(pieces); i++ {
		p, before, after := &pieces[i], &pieces[i-1], &pieces[i+1]
		p.perUnit = p.text == "/" && before.kind == syntax.Number && unit(after.text)
		p.tight = p.text == "*" && unit(before.text) && unit(after.text)
	}
}
