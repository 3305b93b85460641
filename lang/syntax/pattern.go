package syntax

import (
	"strings"

	"spanwright/lang/source"
)

// Statements of one pattern differ in the names and numbers that they hold, and
// in nothing that matters for whether and how they are read. Most statements of
// a file have a pattern that has been seen before, so a formatter, which wants to
// know no more than that, need not read them all.

// Pattern is what statements have in common that are made of the same tokens.
type Pattern struct {
	// Broken: such statements cannot be read.
	Broken bool
	// Unary are the indices of the tokens that are signs of one operand.
	Unary []int
}

// Patterns knows the patterns that it has seen. The zero value knows none.
type Patterns struct {
	seen map[string]Pattern
	key  []byte
}

// Outline cuts a file into statements and does not read them: they have their
// kind and text only. [Patterns] says what else one may want to know.
func Outline(file *source.File) *Tree {
	return cutUp(file, func(s string) string { return s })
}

// Of returns the pattern of a statement, read or not. tokens are those of its
// text.
func (s *Patterns) Of(statement *Statement, tokens []Token) Pattern {
	s.key = appendPattern(s.key[:0], statement, tokens)
	if pattern, ok := s.seen[string(s.key)]; ok {
		return pattern
	}
	read := &Statement{Kind: statement.Kind, Text: statement.Text}
	read.read()
	pattern := PatternOf(read, tokens)
	if s.seen == nil {
		s.seen = map[string]Pattern{}
	}
	s.seen[string(s.key)] = pattern
	return pattern
}

// PatternOf returns the pattern of a statement that has been read.
func PatternOf(s *Statement, tokens []Token) Pattern {
	pattern := Pattern{Broken: s.Broken()}
	unary := map[int32]bool{}
	s.Expressions(func(e *Expression) {
		Walk(e.Root, func(n Node) {
			if u, ok := n.(*UnaryNode); ok {
				unary[int32(u.Span.Start)] = true
			}
		})
	})
	if len(unary) == 0 {
		return pattern
	}
	for i, t := range tokens {
		if unary[t.Start] {
			pattern.Unary = append(pattern.Unary, i)
		}
	}
	return pattern
}

// appendPattern writes what reading a statement depends on: its kind, and of each
// token what kind it is, with the text of signs and of words that the language
// or the table of units may know. Of other names only that there is one.
func appendPattern(key []byte, s *Statement, tokens []Token) []byte {
	key = append(key, byte(s.Kind))
	power := false
	for _, t := range tokens {
		text := t.In(s.Text)
		key = append(key, byte(t.Kind))
		switch t.Kind {
		case Word:
			if w := known(text); w != "" {
				key = append(append(key, w...), 0)
			}
		case Number:
			if power { // mm^2 is a unit, mm^7 is not
				key = append(append(key, text...), 0)
			}
		case Text:
			if len(text) > 1 && text[len(text)-1] == '"' {
				key = append(key, '"')
			}
		case Sign, Stray:
			key = append(append(key, text...), 0)
		}
		power = t.Kind == Sign && text == "^"
	}
	return key
}

// known returns a word that the language may know: one of small letters only,
// or a unit. Of other words it returns whether they are joined by a dot.
func known(word string) string {
	small, dotted := true, false
	for i := range len(word) {
		c := word[i]
		small = small && ('a' <= c && c <= 'z' || c == '-')
		dotted = dotted || c == '.'
	}
	switch {
	case small || !dotted && UnitSymbol(word):
		return word
	case !dotted:
		return ""
	}
	if head, _, _ := strings.Cut(word, "."); UnitSymbol(head) {
		return word
	}
	return "."
}
