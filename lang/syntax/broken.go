package syntax

import (
	"fmt"
	"strings"

	"github.com/agnivade/levenshtein"

	"spanwright/lang/source"
)

// wrong returns what is wrong with a statement, or nil: one problem at the most,
// the one that explains the others. stuck is the offset of the token that the
// grammar could not place, or −1.
func (s *Statement) wrong(tokens []Token, stuck int) *Problem {
	if p := strayCharacter(s.Text, tokens); p != nil {
		return p
	}
	if p := decimalComma(s.Text, tokens); p != nil {
		return p
	}
	if p := unclosedText(s.Text, tokens); p != nil {
		return p
	}
	if p := s.expressionProblem(stuck); p != nil {
		return p
	}
	if stuck >= 0 {
		return s.misfit(tokens, stuck)
	}
	return s.check()
}

// strayCharacter finds characters that the language does not know; quotes and
// dashes that a word processor makes get a fix.
func strayCharacter(text string, tokens []Token) *Problem {
	for _, t := range tokens {
		if t.Kind != Stray {
			continue
		}
		c := t.In(text)
		switch {
		case strings.Contains("“”„«»‘’", c):
			return &Problem{Name: "smart-quote", Span: t.Span(), Summary: fmt.Sprintf("Write plain quotes \" instead of %s: titles stand in straight double quotes.", c), Fix: smartQuotes(text)}
		case strings.Contains("–—", c):
			return &Problem{Name: "stray-character", Span: t.Span(), Summary: fmt.Sprintf("Write a plain minus \"-\" instead of the dash %s.", c), Fix: &ProblemFix{Title: "Write -", Span: t.Span(), New: "-"}}
		case c == ";":
			return &Problem{Name: "stray-character", Span: t.Span(), Summary: "Delete the semicolon: a statement ends with its line.", Fix: &ProblemFix{Title: "Delete the semicolon", Span: t.Span()}}
		}
		return &Problem{Name: "stray-character", Span: t.Span(), Summary: fmt.Sprintf("Delete %s: the language has no use for this character.", printable(c)), Fix: &ProblemFix{Title: "Delete the character", Span: t.Span()}}
	}
	return nil
}

// printable shows a character, by its number where it cannot be seen.
func printable(c string) string {
	r := []rune(c)
	if len(r) == 1 && (r[0] < 0x20 || r[0] == 0xFFFD) {
		return fmt.Sprintf("the character U+%04X", r[0])
	}
	return "\"" + c + "\""
}

// smartQuotes replaces all quotes of a statement by plain ones.
func smartQuotes(text string) *ProblemFix {
	plain := strings.NewReplacer("“", `"`, "”", `"`, "„", `"`, "«", `"`, "»", `"`, "‘", `"`, "’", `"`).Replace(text)
	return &ProblemFix{Title: "Write straight quotes", Span: source.Span{End: len(text)}, New: plain}
}

// decimalComma finds "4,5" outside of round brackets, where a comma between two
// digits separates nothing. (In brackets it may be a vector.)
func decimalComma(text string, tokens []Token) *Problem {
	depth := 0
	for i, t := range tokens {
		if t.Kind == Sign {
			switch t.In(text) {
			case "(":
				depth++
			case ")":
				depth--
			}
		}
		if depth > 0 || t.Kind != Number || i+2 >= len(tokens) {
			continue
		}
		comma, after := tokens[i+1], tokens[i+2]
		if comma.Kind == Sign && comma.In(text) == "," && after.Kind == Number {
			span := source.Span{Start: int(t.Start), End: int(after.End)}
			mended := t.In(text) + "." + after.In(text)
			return &Problem{Name: "decimal-comma", Span: span,
				Summary: fmt.Sprintf("Write %s: \"%s\" has a decimal comma.", mended, text[span.Start:span.End]),
				Fix:     &ProblemFix{Title: "Write " + mended, Span: span, New: mended}}
		}
	}
	return nil
}

func unclosedText(text string, tokens []Token) *Problem {
	for _, t := range tokens {
		if s := t.In(text); t.Kind == Text && (len(s) < 2 || s[len(s)-1] != '"') {
			return &Problem{Name: "unclosed-text", Span: t.Span(), Summary: "Close the title with a quote \" on the same line.",
				Fix: &ProblemFix{Title: "Add the closing quote", Span: source.At(int(t.End)), New: `"`}}
		}
	}
	return nil
}

// expressionProblem returns the first problem inside an expression, unless the
// grammar got stuck before it.
func (s *Statement) expressionProblem(stuck int) *Problem {
	var first *Problem
	s.Expressions(func(e *Expression) {
		if first == nil && e.Problem != nil {
			first = e.Problem
		}
	})
	if first == nil || stuck >= 0 && stuck < first.Span.Start && first.Name != "unclosed-bracket" {
		return nil
	}
	p := *first
	if p.Span.Start >= len(s.Text) {
		p.Span = s.lastToken()
	}
	return &p
}

// lastToken returns the place of the statement's last token: an error behind
// the end is shown there.
func (s *Statement) lastToken() source.Span {
	span := source.Span{End: len(s.Text)}
	for _, t := range Tokens(s.Text) {
		if !t.Trivia() {
			span = t.Span()
		}
	}
	return span
}

// misfit says in words why the grammar could not place a token.
func (s *Statement) misfit(tokens []Token, stuck int) *Problem {
	if p := unbalanced(s.Text, tokens); p != nil {
		return p
	}
	if p := s.missingSign(tokens); p != nil {
		return p
	}
	form := s.Kind.Form()
	if stuck >= len(s.Text) {
		return &Problem{Name: "incomplete-statement", Span: s.lastToken(),
			Summary: fmt.Sprintf("Complete the %s: something is missing behind \"%s\". Write %s.", s.Kind.Word(), s.Text[s.lastToken().Start:], form)}
	}
	for _, t := range tokens {
		if int(t.Start) != stuck {
			continue
		}
		word := t.In(s.Text)
		if s.Kind == ModelKind || t.Kind != Number {
			return &Problem{Name: "does-not-fit", Span: t.Span(), Summary: fmt.Sprintf("\"%s\" does not fit here. Write %s.", word, form)}
		}
		return &Problem{Name: "does-not-fit", Span: t.Span(), Summary: fmt.Sprintf("The number %s does not fit here. Write %s.", word, form)}
	}
	return &Problem{Name: "does-not-fit", Span: source.Span{End: len(s.Text)}, Summary: "This line cannot be read. Write " + form + "."}
}

// unbalanced finds a bracket without its partner.
func unbalanced(text string, tokens []Token) *Problem {
	var open []Token
	for _, t := range tokens {
		if t.Kind != Sign {
			continue
		}
		switch c := t.In(text); c {
		case "(", "{":
			open = append(open, t)
		case ")", "}":
			if len(open) == 0 {
				return &Problem{Name: "stray-bracket", Span: t.Span(), Summary: fmt.Sprintf("This \"%s\" closes nothing. Delete it, or open a bracket before it.", c),
					Fix: &ProblemFix{Title: "Delete the bracket", Span: t.Span()}}
			}
			open = open[:len(open)-1]
		}
	}
	if len(open) == 0 || text[open[0].Start] == '{' && strings.HasSuffix(text, "{") {
		return nil
	}
	last := open[len(open)-1]
	closing := ")"
	if last.In(text) == "{" {
		closing = "}"
	}
	return &Problem{Name: "unclosed-bracket", Span: last.Span(), Summary: fmt.Sprintf("Close this bracket: a \"%s\" is missing behind the last value that belongs in it.", closing)}
}

// missingSign finds the sign or name that a kind of statement cannot do without.
func (s *Statement) missingSign(tokens []Token) *Problem {
	var words []Token
	has := map[string]bool{}
	for _, t := range tokens {
		if t.Trivia() {
			continue
		}
		if t.Kind == Sign {
			has[plainSign(t.In(s.Text))] = true
		}
		words = append(words, t)
	}
	switch s.Kind {
	case LetKind, MaterialKind, SectionKind, NodeKind, BeamKind, BarKind, LinkKind, SpringKind, GroupKind, CombinationKind, PlaceKind:
		if len(words) < 2 || words[1].Kind != Word {
			return &Problem{Name: "missing-name", Span: after(words, 0), Summary: fmt.Sprintf("Name the %s: write %s.", s.Kind.Word(), s.Kind.Form())}
		}
		if !has["="] {
			return &Problem{Name: "missing-equals", Span: after(words, 1), Summary: fmt.Sprintf("Put \"=\" behind %s: write %s.", words[1].In(s.Text), s.Kind.Form()),
				Fix: &ProblemFix{Title: "Insert =", Span: source.At(int(words[1].End)), New: " ="}}
		}
		return s.missingArrow(words)
	case CaseKind, PartKind:
		if !has["{"] {
			return &Problem{Name: "missing-brace", Span: after(words, len(words)-1), Summary: fmt.Sprintf("Open the block with \"{\" at the end of this line: write %s.", s.Kind.Form()),
				Fix: &ProblemFix{Title: "Add {", Span: source.At(len(s.Text)), New: " {"}}
		}
	case LoadKind:
		if !has[":"] {
			return &Problem{Name: "missing-colon", Span: after(words, 0), Summary: fmt.Sprintf("Put \":\" between what is loaded and the load: write %s.", s.Kind.Form())}
		}
	case LimitKind:
		if !has["<="] && !has[">="] && !has["<"] && !has[">"] {
			return &Problem{Name: "missing-comparison", Span: after(words, len(words)-1), Summary: fmt.Sprintf("Say what the limit is, with <= or >=: write %s.", s.Kind.Form())}
		}
	}
	return nil
}

// missingArrow finds two nodes of a member with nothing between them.
func (s *Statement) missingArrow(words []Token) *Problem {
	if s.Kind != BeamKind && s.Kind != BarKind && s.Kind != LinkKind && s.Kind != SpringKind {
		return nil
	}
	for i := 3; i+1 < len(words); i++ {
		a, b := words[i], words[i+1]
		if a.Kind != Word || b.Kind != Word || a.In(s.Text) == "of" || b.In(s.Text) == "of" || words[i-1].Kind != Sign || words[i-1].In(s.Text) == "," {
			continue
		}
		return &Problem{Name: "missing-arrow", Span: b.Span(), Summary: fmt.Sprintf("Write -> between %s and %s.", a.In(s.Text), b.In(s.Text)),
			Fix: &ProblemFix{Title: "Insert ->", Span: source.At(int(a.End)), New: " ->"}}
	}
	return nil
}

// after returns the place of the i-th token, where something is missing behind
// it.
func after(words []Token, i int) source.Span {
	if len(words) == 0 {
		return source.Span{}
	}
	return words[max(0, min(i, len(words)-1))].Span()
}

// unknownStatement says that a line begins with no key word.
func unknownStatement(text string, tokens []Token) Problem {
	first := tokens[0]
	for _, t := range tokens {
		if !t.Trivia() {
			first = t
			break
		}
	}
	if p := strayCharacter(text, tokens); p != nil {
		return *p
	}
	word := first.In(text)
	p := Problem{Name: "unknown-statement", Span: first.Span(), Summary: fmt.Sprintf("\"%s\" begins no statement. A line begins with a key word such as node, beam, support or case.", word)}
	if first.Kind != Word {
		return p
	}
	best, distance := "", 3
	for _, k := range keywords {
		if d := levenshtein.ComputeDistance(strings.ToLower(word), k.Word); d < distance && d < len(k.Word) && d < len(word) {
			best, distance = k.Word, d
		}
	}
	if best != "" {
		p.Summary = fmt.Sprintf("Write %s: \"%s\" begins no statement.", best, word)
		p.Fix = &ProblemFix{Title: "Write " + best, Span: first.Span(), New: best}
	}
	for _, t := range tokens {
		if t.Kind == Sign && t.In(text) == ":" && best == "" {
			p.Summary = fmt.Sprintf("Put this load into a case: \"%s\" begins no statement, and loads stand inside case NAME KIND { … }.", word)
			p.Name = "load-outside-case"
			break
		}
	}
	return p
}
