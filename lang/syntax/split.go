package syntax

import "strings"

// A statement is one line. It goes on over the line's end while a bracket is
// open or behind a comma, but a line that begins with a key word always begins
// a new statement. The opening of a case or part ends with its brace; what
// stands in the braces are statements of their own, so that an edit in a long
// case touches one line.

// Block says what a statement stands in.
type Block uint8

// The blocks.
const (
	TopLevel Block = iota
	InCase
	InPart
	InCaseOfPart
)

// cut is one statement as the splitter found it.
type cut struct {
	start, end int // of the first and behind the last token that is not trivia
	kind       Kind
	block      Block // that it stands in; for a closing brace, that it closes
	implicit   bool  // a key word came before the brace that should have closed the block
}

// splitter walks through a text and cuts it into statements.
type splitter struct {
	text  string
	at    int
	block Block
}

// next returns the next statement, and false at the end of the text.
func (s *splitter) next() (cut, bool) {
	first, ok := s.meaningful()
	if !ok {
		return cut{}, false
	}
	c := cut{start: int(first.Start), block: s.block}
	if first.Kind == Sign && first.In(s.text) == "}" {
		c.kind, c.end = CloseKind, int(first.End)
		s.at = c.end
		s.block = s.block.outer()
		return c, true
	}
	c.kind = s.kindOf(first)
	if c.kind != LoadKind && c.kind != UnknownKind && (s.block == InCase || s.block == InCaseOfPart) {
		// A key word in a case: its closing brace is missing.
		s.block = s.block.outer()
		c.block, c.implicit = s.block, true
	}
	s.at = int(first.End)
	c.end = s.rest(c.kind, int(first.End))
	return c, true
}

func (b Block) outer() Block {
	if b == InCaseOfPart {
		return InPart
	}
	return TopLevel
}

// meaningful skips trivia and returns the next token, not consumed.
func (s *splitter) meaningful() (Token, bool) {
	for s.at < len(s.text) {
		t := next(s.text, s.at)
		if !t.Trivia() {
			return t, true
		}
		s.at = int(t.End)
	}
	return Token{}, false
}

// kindOf returns what a statement is by its first word.
func (s *splitter) kindOf(first Token) Kind {
	if first.Kind == Word {
		if k, ok := KeywordOf(first.In(s.text)); ok {
			return k.Kind
		}
	}
	if s.block == InCase || s.block == InCaseOfPart {
		return LoadKind
	}
	return UnknownKind
}

// rest consumes the statement up to its end and returns the offset behind its
// last token.
func (s *splitter) rest(kind Kind, end int) int {
	opens := kind == CaseKind || kind == PartKind
	depth, comma, lineBegins := 0, false, false
	for s.at < len(s.text) {
		t := next(s.text, s.at)
		switch t.Kind {
		case Blank, Comment:
			s.at = int(t.End)
			continue
		case LineEnd:
			if depth <= 0 && !comma {
				return end
			}
			lineBegins = true
			s.at = int(t.End)
			continue
		case Word:
			if lineBegins {
				if _, isKeyword := KeywordOf(t.In(s.text)); isKeyword {
					return end
				}
			}
		}
		lineBegins, comma = false, false
		if opens && t.Kind == Text && strings.HasSuffix(strings.TrimRight(t.In(s.text), " \t"), "{") {
			// A title that is not closed has swallowed the brace; its block is meant
			// all the same, or every line of it would be another mistake.
			s.enter(kind)
			s.at = int(t.End)
			return int(t.Start) + len(strings.TrimRight(t.In(s.text), " \t"))
		}
		if t.Kind == Sign {
			switch s.text[t.Start] {
			case ',':
				comma = true
			case '(':
				depth++
			case ')':
				depth--
			case '{':
				if opens {
					s.enter(kind)
					s.at = int(t.End)
					return int(t.End)
				}
				depth++
			case '}':
				if depth <= 0 {
					return end // closes the block that the statement stands in
				}
				depth--
			}
		}
		end = int(t.End)
		s.at = end
	}
	return end
}

// enter goes into the block of a case or part.
func (s *splitter) enter(kind Kind) {
	switch {
	case kind == PartKind:
		s.block = InPart
	case s.block == InPart:
		s.block = InCaseOfPart
	default:
		s.block = InCase
	}
}
