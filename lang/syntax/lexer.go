package syntax

import (
	"strings"
	"unicode"
	"unicode/utf8"
)

// Tokens cuts a text into tokens; nothing is lost, and no text is refused.
func Tokens(text string) []Token {
	tokens := make([]Token, 0, len(text)/3+1)
	for at := 0; at < len(text); {
		t := next(text, at)
		tokens = append(tokens, t)
		at = int(t.End)
	}
	return tokens
}

// byteOrderMark may open a file; it counts as a blank.
const byteOrderMark = "\ufeff"

// next returns the token that starts at an offset inside the text. It depends
// on nothing but the text from there on and the byte before it.
func next(text string, at int) Token {
	c := text[at]
	switch {
	case c == ' ' || c == '\t':
		return blank(text, at)
	case c == '\n':
		return token(LineEnd, at, at+1)
	case c == '\r':
		if strings.HasPrefix(text[at:], "\r\n") {
			return token(LineEnd, at, at+2)
		}
		return token(LineEnd, at, at+1)
	case c == '#':
		return token(Comment, at, lineEnd(text, at))
	case c == '"':
		return quoted(text, at)
	case digit(c) || c == '.' && at+1 < len(text) && digit(text[at+1]):
		return number(text, at)
	case c == '_' || letter(c):
		return word(text, at)
	case c < utf8.RuneSelf:
		return sign(text, at)
	}
	return beyondASCII(text, at)
}

func token(kind TokenKind, start, end int) Token { return Token{kind, int32(start), int32(end)} }

func digit(c byte) bool  { return '0' <= c && c <= '9' }
func letter(c byte) bool { return 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' }

func blank(text string, at int) Token {
	end := at + 1
	for end < len(text) && (text[end] == ' ' || text[end] == '\t') {
		end++
	}
	return token(Blank, at, end)
}

func lineEnd(text string, at int) int {
	if n := strings.IndexAny(text[at:], "\r\n"); n >= 0 {
		return at + n
	}
	return len(text)
}

// quoted cuts a text in quotes, up to the closing quote or the line's end.
func quoted(text string, at int) Token {
	end := lineEnd(text, at)
	if n := strings.IndexByte(text[at+1:end], '"'); n >= 0 {
		end = at + 1 + n + 1
	}
	return token(Text, at, end)
}

// number cuts digits, a fraction and an exponent. An "e" counts as an exponent
// only if digits follow, so that "2 e" and "2eaves" stay a number and a name.
func number(text string, at int) Token {
	end := digits(text, at)
	if end < len(text) && text[end] == '.' {
		end = digits(text, end+1)
	}
	if end < len(text) && (text[end] == 'e' || text[end] == 'E') {
		exponent := end + 1
		if exponent < len(text) && (text[exponent] == '+' || text[exponent] == '-') {
			exponent++
		}
		if stop := digits(text, exponent); stop > exponent {
			end = stop
		}
	}
	return token(Number, at, end)
}

func digits(text string, at int) int {
	for at < len(text) && digit(text[at]) {
		at++
	}
	return at
}

// hyphenated are the words of the language that hold a hyphen.
var hyphenated = [...]string{"self-weight", "quasi-permanent"}

// word cuts a name, with dots inside where a name goes on behind them.
func word(text string, at int) Token {
	// "100x60x4": the x between two numbers stands alone.
	if text[at] == 'x' && at > 0 && digit(text[at-1]) && at+1 < len(text) && digit(text[at+1]) {
		return token(Word, at, at+1)
	}
	for _, h := range hyphenated {
		if text[at] == h[0] && strings.HasPrefix(text[at:], h) && nameEnd(text, at+len(h)) == at+len(h) {
			return token(Word, at, at+len(h))
		}
	}
	end := nameEnd(text, at)
	for end+1 < len(text) && text[end] == '.' && nameStarts(text, end+1) {
		end = nameEnd(text, end+1)
	}
	return token(Word, at, end)
}

func nameStarts(text string, at int) bool {
	if c := text[at]; c < utf8.RuneSelf {
		return c == '_' || letter(c)
	}
	r, _ := utf8.DecodeRuneInString(text[at:])
	return unicode.IsLetter(r)
}

// nameEnd returns the offset behind the letters, digits, low lines and
// superscript digits from an offset on.
func nameEnd(text string, at int) int {
	for at < len(text) {
		c := text[at]
		if c == '_' || letter(c) || digit(c) {
			at++
			continue
		}
		if c < utf8.RuneSelf {
			break
		}
		r, size := utf8.DecodeRuneInString(text[at:])
		if !unicode.IsLetter(r) && !strings.ContainsRune("²³⁴⁵⁶", r) {
			break
		}
		at += size
	}
	return at
}

func sign(text string, at int) Token {
	for _, pair := range [...]string{"->", "<=", ">="} {
		if strings.HasPrefix(text[at:], pair) {
			return token(Sign, at, at+2)
		}
	}
	if strings.IndexByte("=:,{}()+-*/^%<>", text[at]) >= 0 {
		return token(Sign, at, at+1)
	}
	return token(Stray, at, at+1)
}

// beyondASCII cuts one character that is not ASCII, or a name that starts with
// a letter which is not. A true minus, a middle dot and a multiplication cross
// are signs; a no-break space and a byte-order mark are blanks.
func beyondASCII(text string, at int) Token {
	r, size := utf8.DecodeRuneInString(text[at:])
	switch {
	case r == '−' || r == '·' || r == '×' || r == '≤' || r == '≥' || r == '→':
		return token(Sign, at, at+size)
	case unicode.IsSpace(r) || strings.HasPrefix(text[at:], byteOrderMark):
		return token(Blank, at, at+size)
	case unicode.IsLetter(r):
		return word(text, at)
	}
	return token(Stray, at, at+size)
}

// plainSign returns the ASCII spelling of a sign.
func plainSign(s string) string {
	switch s {
	case "−":
		return "-"
	case "·":
		return "*"
	case "≤":
		return "<="
	case "≥":
		return ">="
	case "→":
		return "->"
	}
	return s
}
