package format

import (
	"slices"
	"strings"
	"unicode/utf8"

	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

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

// spell adds the rows of a statement: its tokens in normal spelling with the
// blanks between them, cut into cells that can line up.
func (l *layout) spell(s statement) {
	pieces := l.normal(s)
	r := row{depth: l.depth, kind: paragraphKind(s.Kind), first: len(l.cells)}
	start := len(l.spelled)
	grade := s.Kind == syntax.MaterialKind && !strings.Contains(s.Text, "{")
	flush := func() {
		if end := len(l.spelled); end > start {
			l.cells = append(l.cells, cell{start: start, end: end, width: utf8.RuneCount(l.spelled[start:end])})
			start = end
		}
	}
	for i := range pieces {
		p := &pieces[i]
		switch {
		case p.startsLine:
			flush()
			r.cells = len(l.cells) - r.first
			l.rows = append(l.rows, r)
			r = row{depth: l.depth + 1, first: len(l.cells)}
			if p.text == ")" || p.text == "}" {
				r.depth--
			}
		case r.kind != 0 && cellStarts(s.Kind, pieces, i):
			flush()
		case i > 0 && grade && p.glued && !isSign(p, "=") && !isSign(&pieces[i-1], "="):
			// A grade such as A572-50 stays as it is written.
		case i > 0 && space(&pieces[i-1], p):
			l.spelled = append(l.spelled, ' ')
		}
		l.spelled = append(l.spelled, p.text...)
		if p.comment != "" {
			r.comment = p.comment
		}
	}
	flush()
	r.cells = len(l.cells) - r.first
	l.rows = append(l.rows, r)
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
// spelling. They are good until the next call.
func (l *layout) normal(s statement) []piece {
	pieces := l.pieces[:0]
	glued, startsLine := true, false
	for i, t := range s.tokens {
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
		if p.text == "-" || p.text == "+" {
			p.unary = slices.Contains(s.unary, i) || (p.text == "-" && len(pieces) > 0 && reserved(&pieces[len(pieces)-1]))
		}
		p.call = p.text == "(" && len(pieces) > 0 && calls(s.Kind, pieces, glued)
		pieces = append(pieces, p)
		glued, startsLine = true, false
	}
	l.pieces = pieces
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
		if strings.IndexByte(text, 'e') < 0 && strings.IndexByte(text, 'E') < 0 {
			return text
		}
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
	out := pieces[:0] // it never gets ahead of what is read
	for i := 0; i < len(pieces); i++ {
		p := pieces[i]
		if p.kind != syntax.Word {
			out = append(out, p)
			continue
		}
		if unit(p.text) && i+2 < len(pieces) && pieces[i+1].text == "^" && pieces[i+1].glued && pieces[i+2].glued && unit(p.text+pieces[i+2].text) {
			p.text += pieces[i+2].text
			p.comment = pieces[i+2].comment
			i += 2
		}
		if strings.Contains(p.text, ".") {
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

func isSign(p *piece, sign string) bool { return p.kind == syntax.Sign && p.text == sign }

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
