package syntax

import (
	"strconv"
	"strings"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"

	"spanwright/lang/source"
)

// Expression is an expression in a statement. Root is nil only where Problem
// says why.
type Expression struct {
	Root    Node
	Span    source.Span // relative to the statement
	Problem *Problem    // what stopped the reading, or nil
}

// Node is a node of an expression. Spans are relative to the statement.
type Node interface {
	// Place returns the node's span.
	Place() source.Span
}

// NumberNode is a number as written.
type NumberNode struct {
	Span  source.Span
	Value float64 // +Inf where the number is too large
}

// NameNode is a name, unit or constant: "span", "kN", "F1.B", "pi", "%".
type NameNode struct {
	Span source.Span
	Text string
}

// UnaryNode is a minus or plus before an operand.
type UnaryNode struct {
	Span  source.Span
	Minus bool
	X     Node
}

// Operator joins two operands.
type Operator uint8

// The operators. Joined is the multiplication by standing side by side.
const (
	Add Operator = iota
	Subtract
	Multiply
	Divide
	Power
	Joined
)

// BinaryNode is an operation on two operands.
type BinaryNode struct {
	Op   Operator
	X, Y Node
	Span source.Span
}

// CallNode is a function's name with its arguments.
type CallNode struct {
	Function  NameNode
	Arguments []Node
	Span      source.Span
}

// VectorNode is two or more expressions in brackets.
type VectorNode struct {
	Parts []Node
	Span  source.Span
}

// GroupNode is one expression in brackets.
type GroupNode struct {
	X    Node
	Span source.Span
}

// Place returns the node's span.
func (n *NumberNode) Place() source.Span { return n.Span }

// Place returns the node's span.
func (n *NameNode) Place() source.Span { return n.Span }

// Place returns the node's span.
func (n *UnaryNode) Place() source.Span { return n.Span }

// Place returns the node's span.
func (n *BinaryNode) Place() source.Span { return n.Span }

// Place returns the node's span.
func (n *CallNode) Place() source.Span { return n.Span }

// Place returns the node's span.
func (n *VectorNode) Place() source.Span { return n.Span }

// Place returns the node's span.
func (n *GroupNode) Place() source.Span { return n.Span }

// Parse reads an expression; it is the hook of the statement grammar. It
// refuses only a token that cannot begin an expression. Anything wrong further
// on becomes the expression's Problem, so that the grammar does not lose it.
func (e *Expression) Parse(lex *lexer.PeekingLexer) error {
	p := climber{lex: lex}
	if !p.begins() {
		return participle.NextMatch
	}
	e.Root = p.sum()
	e.Problem = p.problem
	if e.Root != nil {
		e.Span = e.Root.Place()
	}
	return nil
}

// deepest bounds the nesting of brackets, signs and powers, well above any
// formula and well below the end of the stack.
const deepest = 200

// climber reads an expression by climbing its precedences, loosest first: sum,
// product, sign, power, number with unit, single operand.
type climber struct {
	lex     *lexer.PeekingLexer
	depth   int
	problem *Problem
}

// begins reports whether the next token can begin an expression.
func (p *climber) begins() bool {
	t := p.lex.Peek()
	switch TokenKind(t.Type) {
	case Number:
		return true
	case Word:
		return !ends(t.Value)
	case Sign:
		s := plainSign(t.Value)
		return s == "(" || s == "-" || s == "+"
	}
	return false
}

func (p *climber) sign() string {
	if t := p.lex.Peek(); !t.EOF() && TokenKind(t.Type) == Sign {
		return plainSign(t.Value)
	}
	return ""
}

func spanOf(t *lexer.Token) source.Span {
	return source.Span{Start: t.Pos.Offset, End: t.Pos.Offset + len(t.Value)}
}

// fail notes the first thing that is wrong, at the next token.
func (p *climber) fail(name, summary string) Node {
	if p.problem == nil {
		p.problem = &Problem{Name: name, Span: spanOf(p.lex.Peek()), Summary: summary}
	}
	return nil
}

// deeper counts a level of nesting and reports whether it is still bearable.
func (p *climber) deeper() bool {
	p.depth++
	if p.depth > deepest {
		p.fail("nested-too-deep", "Brackets or signs are nested more than "+strconv.Itoa(deepest)+" deep here. Name parts of the formula with let.")
		return false
	}
	return true
}

func (p *climber) sum() Node {
	x := p.product()
	for x != nil && p.problem == nil {
		var op Operator
		switch p.sign() {
		case "+":
			op = Add
		case "-":
			op = Subtract
		default:
			return x
		}
		p.lex.Next()
		x = binary(op, x, p.need(p.product))
	}
	return x
}

func (p *climber) product() Node {
	x := p.signed()
	for x != nil && p.problem == nil {
		var op Operator
		switch p.sign() {
		case "*":
			op = Multiply
		case "/":
			op = Divide
		default:
			return x
		}
		p.lex.Next()
		x = binary(op, x, p.need(p.signed))
	}
	return x
}

// need reads an operand that must be there.
func (p *climber) need(read func() Node) Node {
	if !p.begins() {
		return p.fail("missing-operand", "A value is missing here, behind the operator.")
	}
	return read()
}

func binary(op Operator, x, y Node) Node {
	if y == nil {
		return x
	}
	return &BinaryNode{Op: op, X: x, Y: y, Span: x.Place().Join(y.Place())}
}

func (p *climber) signed() Node {
	s := p.sign()
	if s != "-" && s != "+" {
		return p.power()
	}
	if !p.deeper() {
		return nil
	}
	start := spanOf(p.lex.Next()).Start
	x := p.need(p.signed)
	p.depth--
	if x == nil {
		return nil
	}
	return &UnaryNode{Minus: s == "-", X: x, Span: source.Span{Start: start, End: x.Place().End}}
}

func (p *climber) power() Node {
	x := p.operand()
	if x == nil || p.sign() != "^" {
		return x
	}
	if !p.deeper() {
		return nil
	}
	p.lex.Next()
	y := p.need(p.signed) // right-associative; the exponent may carry a sign
	p.depth--
	return binary(Power, x, y)
}

func (p *climber) operand() Node {
	t := p.lex.Peek()
	switch TokenKind(t.Type) {
	case Number:
		return p.number()
	case Word:
		if ends(t.Value) {
			break
		}
		return p.name()
	case Sign:
		if t.Value == "(" {
			return p.bracket()
		}
	}
	return p.fail("missing-operand", "A value is missing here.")
}

// number reads a number and what it multiplies by standing before it: a unit,
// bound tightest of all, a name, or a bracket.
func (p *climber) number() Node {
	t := p.lex.Next()
	n := Node(&NumberNode{Span: spanOf(t), Value: parseNumber(t.Value)})
	follower := p.lex.Peek()
	if follower.EOF() {
		return n
	}
	switch TokenKind(follower.Type) {
	case Word:
		if ends(follower.Value) {
			return n
		}
		x := p.name()
		// "2 m^2" was read as a unit by name; "2 a^2" is twice the square.
		if name, isName := x.(*NameNode); isName && p.sign() == "^" && !UnitSymbol(name.Text) && p.deeper() {
			p.lex.Next()
			x = binary(Power, x, p.need(p.signed))
			p.depth--
		}
		return binary(Joined, n, x)
	case Sign:
		switch follower.Value {
		case "%":
			p.lex.Next()
			return binary(Joined, n, &NameNode{Span: spanOf(follower), Text: "%"})
		case "(":
			return binary(Joined, n, p.bracket())
		}
	}
	return n
}

// parseNumber returns the value of a Number token; one too large to hold is
// +Inf, which the resolver refuses.
func parseNumber(text string) float64 {
	value, _ := strconv.ParseFloat(text, 64)
	return value
}

// name reads a name, a unit with its power ("mm^2" is the unit mm2), joined
// units with a dot ("kN.m"), or a function with its arguments.
func (p *climber) name() Node {
	t := p.lex.Next()
	name := &NameNode{Span: spanOf(t), Text: t.Value}
	if next := p.lex.Peek(); !next.EOF() && next.Value == "(" && next.Pos.Offset == name.Span.End {
		return p.call(name)
	}
	if strings.Contains(name.Text, ".") {
		return dotted(name)
	}
	if UnitSymbol(name.Text) {
		return p.unitPower(name)
	}
	return name
}

// unitPower joins a unit with a whole exponent right behind it.
func (p *climber) unitPower(unit *NameNode) Node {
	caret := p.lex.Peek()
	if caret.EOF() || caret.Value != "^" || caret.Pos.Offset != unit.Span.End {
		return unit
	}
	before := p.lex.MakeCheckpoint()
	p.lex.Next()
	exponent := p.lex.Peek()
	if len(exponent.Value) == 1 && digit(exponent.Value[0]) && exponent.Pos.Offset == caret.Pos.Offset+1 && UnitSymbol(unit.Text+exponent.Value) {
		p.lex.Next()
		return &NameNode{Text: unit.Text + exponent.Value, Span: source.Span{Start: unit.Span.Start, End: exponent.Pos.Offset + 1}}
	}
	p.lex.LoadCheckpoint(before)
	return unit
}

// dotted turns "kN.m" into a product where every part is a unit; anything else
// with a dot is a qualified name.
func dotted(name *NameNode) Node {
	parts := strings.Split(name.Text, ".")
	for _, part := range parts {
		if !UnitSymbol(part) {
			return name
		}
	}
	var product Node
	at := name.Span.Start
	for _, part := range parts {
		unit := &NameNode{Text: part, Span: source.Span{Start: at, End: at + len(part)}}
		at += len(part) + 1
		if product == nil {
			product = unit
		} else {
			product = binary(Multiply, product, unit)
		}
	}
	return product
}

// call reads the arguments of a function.
func (p *climber) call(name *NameNode) Node {
	arguments, end, ok := p.list()
	if !ok {
		return nil
	}
	return &CallNode{Function: *name, Arguments: arguments, Span: source.Span{Start: name.Span.Start, End: end}}
}

// bracket reads one expression in brackets, or a vector.
func (p *climber) bracket() Node {
	start := p.lex.Peek().Pos.Offset
	parts, end, ok := p.list()
	if !ok {
		return nil
	}
	span := source.Span{Start: start, End: end}
	switch len(parts) {
	case 0:
		if p.problem == nil {
			p.problem = &Problem{Name: "missing-operand", Span: span, Summary: "These brackets are empty. Write a value, or a position such as (0, 3) m."}
		}
		return nil
	case 1:
		return p.scaled(&GroupNode{X: parts[0], Span: span})
	}
	return p.scaled(&VectorNode{Parts: parts, Span: span})
}

// scaled reads the unit right behind a bracket: "(0, 3.2) m".
func (p *climber) scaled(x Node) Node {
	t := p.lex.Peek()
	if t.EOF() || TokenKind(t.Type) != Word || ends(t.Value) {
		return x
	}
	return binary(Joined, x, p.name())
}

// list reads expressions in brackets, separated by commas.
func (p *climber) list() (parts []Node, end int, ok bool) {
	if !p.deeper() {
		return nil, 0, false
	}
	defer func() { p.depth-- }()
	open := p.lex.Next()
	for p.sign() != ")" {
		if !p.begins() {
			if p.lex.Peek().EOF() {
				p.unclosed(open)
			} else {
				p.fail("missing-operand", "A value is missing here, inside the brackets.")
			}
			return nil, 0, false
		}
		x := p.sum()
		if x == nil || p.problem != nil {
			return nil, 0, false
		}
		parts = append(parts, x)
		switch p.sign() {
		case ",":
			p.lex.Next()
		case ")":
		default:
			p.unclosed(open)
			return nil, 0, false
		}
	}
	return parts, spanOf(p.lex.Next()).End, true
}

// unclosed says where the bracket that is open could be closed: before the
// token that does not belong in it.
func (p *climber) unclosed(open *lexer.Token) {
	if p.problem != nil {
		return
	}
	span := spanOf(open)
	p.problem = &Problem{Name: "unclosed-bracket", Span: span, Summary: "This bracket is never closed. Add \")\" behind the last value that belongs in it."}
	if t := p.lex.Peek(); !t.EOF() {
		if TokenKind(t.Type) == Number || TokenKind(t.Type) == Word {
			p.problem = &Problem{Name: "missing-operator", Span: spanOf(t), Summary: "An operator or a comma is missing before \"" + t.Value + "\"."}
		}
	}
}
