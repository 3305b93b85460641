package syntax

import (
	"strings"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"

	"spanwright/lang/source"
)

// Profile is a cross-section by catalogue or by shape: "IPE 300",
// "UB 406x178x54", "rect 200 x 400 mm".
type Profile struct {
	// Shape is the word of a shape (rect, round, pipe, tube, angle), or "".
	Shape string
	// Sizes are the dimensions of a shape, in the order written. A unit behind
	// the last one counts for all that have none of their own.
	Sizes []*Expression
	// Text is what is written, blanks as they are, the shape's word included.
	Text string
	Span source.Span // relative to the statement
}

// shapes are the words that begin a shape.
var shapes = []string{"rect", "round", "pipe", "tube", "angle"}

// Shapes returns the words of the shapes. The slice is the caller's own.
func Shapes() []string { return append([]string(nil), shapes...) }

// Parse takes the tokens up to "of", a comma or the end.
func (f *Profile) Parse(lex *lexer.PeekingLexer) error {
	first := lex.Peek()
	if first.EOF() || first.Value == "of" || TokenKind(first.Type) != Word {
		return participle.NextMatch
	}
	var text strings.Builder
	f.Span = spanOf(first)
	for _, s := range shapes {
		if first.Value == s {
			f.Shape = s
		}
	}
	if f.Shape != "" {
		lex.Next()
		text.WriteString(f.Shape)
		f.sizes(lex, &text)
		f.Text = text.String()
		return nil
	}
	for t := lex.Peek(); !t.EOF() && t.Value != "of" && t.Value != ","; t = lex.Peek() {
		if gap := t.Pos.Offset - f.Span.End; gap > 0 {
			text.WriteByte(' ')
		}
		text.WriteString(t.Value)
		f.Span.End = spanOf(t).End
		lex.Next()
	}
	f.Text = text.String()
	return nil
}

// sizes reads the dimensions of a shape, with an x between them.
func (f *Profile) sizes(lex *lexer.PeekingLexer, text *strings.Builder) {
	for {
		t := lex.Peek()
		if t.EOF() || t.Value == "of" {
			return
		}
		size := &Expression{}
		// The x between two sizes is not a name that the first one multiplies.
		p := climber{lex: lex}
		size.Root = p.size()
		size.Problem = p.problem
		if size.Root == nil {
			return
		}
		size.Span = size.Root.Place()
		f.Span.End = size.Span.End
		f.Sizes = append(f.Sizes, size)
		if len(f.Sizes) > 1 {
			text.WriteString(" x")
		}
		text.WriteByte(' ')
		text.WriteString(t.Value)
		if u := trailingUnit(size.Root); u != nil {
			text.WriteString(" " + u.Text)
		}
		if next := lex.Peek(); next.EOF() || next.Value != "x" && next.Value != "×" {
			return
		}
		lex.Next()
	}
}

// size reads one dimension: a number with or without a unit, a name, or a
// bracket.
func (p *climber) size() Node {
	if !p.begins() {
		return nil
	}
	t := p.lex.Peek()
	if TokenKind(t.Type) != Number {
		return p.operand()
	}
	before := p.lex.MakeCheckpoint()
	p.lex.Next()
	if next := p.lex.Peek(); !next.EOF() && next.Value == "x" {
		p.lex.LoadCheckpoint(before)
		number := &climber{lex: p.lex}
		return number.bare()
	}
	p.lex.LoadCheckpoint(before)
	return p.number()
}

// bare reads a number and leaves what stands behind it.
func (p *climber) bare() Node {
	t := p.lex.Next()
	n := parseNumber(t.Value)
	return &NumberNode{Span: spanOf(t), Value: n}
}

// trailingUnit returns the unit behind a number, or nil.
func trailingUnit(n Node) *NameNode {
	if b, ok := n.(*BinaryNode); ok && b.Op == Joined {
		if u, ok := b.Y.(*NameNode); ok {
			return u
		}
	}
	return nil
}
