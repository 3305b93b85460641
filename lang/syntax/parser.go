package syntax

import (
	"errors"
	"io"
	"sync"

	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"
)

// definition hands our tokens to participle. Trivia is dropped before.
type definition struct{}

// Symbols names the token kinds for the grammar.
func (definition) Symbols() map[string]lexer.TokenType {
	return map[string]lexer.TokenType{
		"EOF": lexer.EOF, "Word": lexer.TokenType(Word), "Number": lexer.TokenType(Number),
		"Text": lexer.TokenType(Text), "Sign": lexer.TokenType(Sign), "Stray": lexer.TokenType(Stray),
	}
}

// Lex is the general door that participle asks for; statements come through
// [feed] instead.
func (definition) Lex(_ string, r io.Reader) (lexer.Lexer, error) {
	text, err := io.ReadAll(r)
	if err != nil {
		return nil, err
	}
	return &feed{text: string(text), tokens: Tokens(string(text))}, nil
}

// feed yields the tokens of one statement that mean something.
type feed struct {
	text   string
	tokens []Token
	at     int
}

// Next returns the next token, and the end of the file again and again.
func (f *feed) Next() (lexer.Token, error) {
	for f.at < len(f.tokens) {
		t := f.tokens[f.at]
		f.at++
		if t.Trivia() {
			continue
		}
		return lexer.Token{Type: lexer.TokenType(t.Kind), Value: plainSign(t.In(f.text)), Pos: lexer.Position{Offset: int(t.Start)}}, nil
	}
	return lexer.EOFToken(lexer.Position{Offset: len(f.text)}), nil
}

// grammar holds one parser for each production. They are safe for concurrent
// use.
type grammar struct {
	productions map[Kind]func(*lexer.PeekingLexer) (any, error)
	selfWeight  func(*lexer.PeekingLexer) (any, error)
}

// theGrammar is built once, on first use; building takes some milliseconds.
var theGrammar = sync.OnceValue(func() *grammar {
	root := participle.MustBuild[productions](participle.Lexer(definition{}), participle.UseLookahead(1))
	g := &grammar{productions: map[Kind]func(*lexer.PeekingLexer) (any, error){
		ModelKind: production[ModelStatement](root), ShowKind: production[ShowStatement](root),
		LetKind: production[LetStatement](root), MaterialKind: production[MaterialStatement](root),
		SectionKind: production[SectionStatement](root), NodeKind: production[NodeStatement](root),
		SupportKind: production[SupportStatement](root), MassKind: production[MassStatement](root),
		GroupKind: production[GroupStatement](root), CaseKind: production[CaseStatement](root),
		AlternateKind: production[AlternateStatement](root), CombinationKind: production[CombinationStatement](root),
		FamilyKind: production[FamilyStatement](root), LimitKind: production[LimitStatement](root),
		UseKind: production[UseStatement](root), PartKind: production[PartStatement](root),
		PlaceKind: production[PlaceStatement](root), LoadKind: production[LoadLine](root),
	}}
	member := production[MemberStatement](root)
	for _, kind := range []Kind{BeamKind, BarKind, LinkKind, SpringKind} {
		g.productions[kind] = member
	}
	g.selfWeight = production[SelfWeightLine](root)
	return g
})

// production returns the parser of one production.
func production[P any](root *participle.Parser[productions]) func(*lexer.PeekingLexer) (any, error) {
	parser, err := participle.ParserForProduction[P](root)
	if err != nil {
		panic(err) // the grammar above lacks the production: a slip of ours, seen by the first test
	}
	return func(tokens *lexer.PeekingLexer) (any, error) {
		node, err := parser.ParseFromLexer(tokens)
		if node == nil {
			return nil, err
		}
		return node, err
	}
}

// parseTree reads one statement. It returns what could be read also where the
// statement is wrong, with the offset of the token that did not fit, or −1.
func parseTree(kind Kind, text string, tokens []Token) (node any, stuck int) {
	read := theGrammar().productions[kind]
	if kind == LoadKind && isSelfWeight(text, tokens) {
		read = theGrammar().selfWeight
	}
	if read == nil {
		return nil, -1
	}
	lex, err := lexer.Upgrade(&feed{text: text, tokens: tokens})
	if err != nil {
		return nil, 0
	}
	node, err = read(lex)
	if err == nil {
		return node, -1
	}
	var at participle.Error
	if errors.As(err, &at) {
		return node, at.Position().Offset
	}
	return node, 0
}

// isSelfWeight reports whether a load line is one of self-weight.
func isSelfWeight(text string, tokens []Token) bool {
	for _, t := range tokens {
		if t.Kind == Word && t.In(text) == "self-weight" {
			return true
		}
		if t.Kind == Sign && t.In(text) == ":" {
			return false
		}
	}
	return false
}
