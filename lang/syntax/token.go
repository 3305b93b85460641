package syntax

import "spanwright/lang/source"

// TokenKind says what a token is.
type TokenKind uint8

// The kinds of tokens. Blank, LineEnd and Comment are trivia: they separate,
// but mean nothing.
const (
	Blank   TokenKind = iota // spaces and tabs
	LineEnd                  // "\n", "\r\n" or a lone "\r"
	Comment                  // "#" up to the line's end
	Word                     // a name, key word or unit: "r1", "F1.B", "kN.m", "mm²", "self-weight"
	Number                   // "12", "0.35", "12e-6"
	Text                     // "…", quotes included; without the closing one where that is missing
	Sign                     // one character of punctuation, and "->", "<=", ">="
	Stray                    // anything else, one character each
)

// Token is a piece of text. The tokens of a text, one behind the other, are the
// text.
type Token struct {
	Kind       TokenKind
	Start, End int32
}

// Span returns the token's place.
func (t Token) Span() source.Span { return source.Span{Start: int(t.Start), End: int(t.End)} }

// In returns the token's text out of the text that it was cut from.
func (t Token) In(text string) string { return text[t.Start:t.End] }

// Trivia reports whether the token means nothing.
func (t Token) Trivia() bool { return t.Kind <= Comment }
