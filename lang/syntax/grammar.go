package syntax

import (
	"github.com/alecthomas/participle/v2"
	"github.com/alecthomas/participle/v2/lexer"

	"spanwright/lang/source"
)

// The productions of the statements. They accept a little more than the
// language: what only makes sense in other company is rejected by check, in
// words. Positions are relative to the statement.

// Name is a word that names something.
type Name struct {
	Pos  lexer.Position
	Text string `parser:"@Word"`
}

// Span returns the name's place, relative to the statement.
func (n *Name) Span() source.Span {
	return source.Span{Start: n.Pos.Offset, End: n.Pos.Offset + len(n.Text)}
}

// Title is a text in quotes.
type Title struct {
	Pos  lexer.Position
	Text string `parser:"@Text"` // quotes included
}

// Span returns the title's place, quotes included.
func (t *Title) Span() source.Span {
	return source.Span{Start: t.Pos.Offset, End: t.Pos.Offset + len(t.Text)}
}

// Value returns the text without its quotes.
func (t *Title) Value() string {
	if t == nil {
		return ""
	}
	text := t.Text
	if len(text) > 0 && text[0] == '"' {
		text = text[1:]
	}
	if len(text) > 0 && text[len(text)-1] == '"' {
		text = text[:len(text)-1]
	}
	return text
}

// ModelStatement is: model "Title" plane, options.
type ModelStatement struct {
	Title   *Title         `parser:"'model' @@?"`
	Space   *Name          `parser:"@@?"`
	Options []*ModelOption `parser:"(',' @@)*"`
}

// ModelOption is one option of the model line: words, and a value behind them.
type ModelOption struct {
	Words []*Name     `parser:"@@ @@?"`
	Value *Expression `parser:"@@?"`
}

// ShowStatement is: show kN, m, mm.
type ShowStatement struct {
	Units []*Expression `parser:"'show' @@ (',' @@)*"`
}

// LetStatement is: let NAME = expression.
type LetStatement struct {
	Name  *Name       `parser:"'let' @@"`
	Value *Expression `parser:"'=' @@"`
}

// Property is a property word with its value: E 210 GPa.
type Property struct {
	Word  *Name       `parser:"@@"`
	Value *Expression `parser:"@@"`
}

// Grade is the name of a catalogue material: S275, C30/37.
type Grade struct {
	Text string
	Span source.Span
}

// Parse takes the tokens up to the end.
func (g *Grade) Parse(lex *lexer.PeekingLexer) error {
	first := lex.Peek()
	// Aluminium alloys begin with a number: 6082-T6.
	if first.EOF() || TokenKind(first.Type) != Word && TokenKind(first.Type) != Number {
		return participle.NextMatch
	}
	g.Span = spanOf(first)
	for t := lex.Peek(); !t.EOF() && t.Value != ","; t = lex.Peek() {
		g.Text += t.Value
		g.Span.End = spanOf(t).End
		lex.Next()
	}
	return nil
}

// MaterialStatement is: material NAME = GRADE, or with properties in braces.
type MaterialStatement struct {
	Name       *Name       `parser:"'material' @@ '='"`
	Properties []*Property `parser:"( '{' (@@ (',' @@)* ','?)? '}'"`
	Grade      *Grade      `parser:"| @@ )"`
}

// SectionStatement is: section NAME = IPE 300 of MATERIAL, a shape, or
// properties in braces.
type SectionStatement struct {
	Name       *Name       `parser:"'section' @@ '='"`
	Properties []*Property `parser:"( '{' (@@ (',' @@)* ','?)? '}'"`
	Profile    *Profile    `parser:"| @@ )"`
	Material   *Name       `parser:"('of' @@)?"`
}

// NodeStatement is: node NAME = vector.
type NodeStatement struct {
	Name     *Name       `parser:"'node' @@"`
	Position *Expression `parser:"'=' @@"`
}

// MemberStatement is: beam NAME = A -> B of SECTION, options; and so for bars,
// links and springs.
type MemberStatement struct {
	Keyword string          `parser:"@('beam' | 'bar' | 'link' | 'spring')"`
	Name    *Name           `parser:"@@ '='"`
	Path    []*Name         `parser:"@@ ('->' @@)*"`
	Section *Name           `parser:"('of' @@)?"`
	Options []*MemberOption `parser:"(',' @@)*"`
}

// MemberOption is one option of a member: a spring's along, across or about
// with its stiffness, or a Word (hinge, release, joint, roll, offset, tension,
// compression) with what belongs to it.
type MemberOption struct {
	Way   string      `parser:"( @('along' | 'across' | 'about')"`
	Axis  *Name       `parser:"  @@?"`
	Rate  *Expression `parser:"  @@"`
	Word  *Name       `parser:"| @@"`
	Only  bool        `parser:"  @'only'?"`        // tension only
	Whom  []*Name     `parser:"  ((?! 'at') @@)*"` // My Mz; the node of an offset
	At    *Name       `parser:"  ('at' @@)?"`      // the node
	Value *Expression `parser:"  @@? )"`           // a stiffness, an angle, a vector
}

// SupportStatement is: support NODE pinned, options.
type SupportStatement struct {
	Node  *Name          `parser:"'support' @@"`
	Items []*SupportItem `parser:"@@ (',' @@)*"`
}

// SupportItem is one piece of a support: fixed, pinned, holds ux uz, spring uz
// 12 kN/mm, turned 30 deg about y, up only.
type SupportItem struct {
	UpOnly bool        `parser:"( @'up' 'only'"`
	Spring *SpringItem `parser:"| 'spring' @@"`
	Turned *TurnedItem `parser:"| 'turned' @@"`
	Word   *Name       `parser:"| @@"`
	Whom   []*Name     `parser:"  @@* )"`
}

// SpringItem is a freedom with its stiffness.
type SpringItem struct {
	Freedom *Name       `parser:"@@"`
	Rate    *Expression `parser:"@@"`
}

// TurnedItem is an angle and the axis that it turns about.
type TurnedItem struct {
	Angle *Expression `parser:"@@"`
	Axis  *Name       `parser:"('about' @@)?"`
}

// MassStatement is: mass NODE 500 kg, inertia 12 kg*m2 about y.
type MassStatement struct {
	Node    *Name          `parser:"'mass' @@"`
	Value   *Expression    `parser:"@@"`
	Inertia []*InertiaItem `parser:"(',' @@)*"`
}

// InertiaItem is a moment of inertia about an axis.
type InertiaItem struct {
	Value *Expression `parser:"'inertia' @@"`
	Axis  *Name       `parser:"'about' @@"`
}

// GroupStatement is: group NAME = member, member.
type GroupStatement struct {
	Name    *Name   `parser:"'group' @@ '='"`
	Members []*Name `parser:"@@ (',' @@)*"`
}

// CaseStatement is the opening of a case: case NAME KIND CATEGORY "title" {.
type CaseStatement struct {
	Name     *Name  `parser:"'case' @@"`
	Kind     *Name  `parser:"@@?"`
	Category *Name  `parser:"@@?"`
	Title    *Title `parser:"@@? '{'"`
}

// AlternateStatement is: alternate CASE, CASE.
type AlternateStatement struct {
	Cases []*Name `parser:"'alternate' @@ (',' @@)*"`
}

// CombinationStatement is: combination NAME = 1.35 G + 1.5 S.
type CombinationStatement struct {
	Name *Name       `parser:"'combination' @@"`
	Sum  *Expression `parser:"'=' @@"`
}

// FamilyStatement is: family NAME by EN1990 strength, options.
type FamilyStatement struct {
	Name      *Name           `parser:"'family' @@"`
	Code      *Name           `parser:"'by' @@"`
	Situation *Name           `parser:"@@?"`
	Options   []*FamilyOption `parser:"(',' @@)*"`
}

// FamilyOption is a rule of the code ("rule 6.10a/b") or a factor that replaces
// the code's ("gamma permanent 1.35 or 1.0", "psi0 snow 0.7", "xi 0.85").
type FamilyOption struct {
	Word  *Name       `parser:"( (?! 'rule') @@"`
	Whom  []*Name     `parser:"  @@*"` // a case, or a kind with its category
	Value *Expression `parser:"  @@"`
	Or    *Expression `parser:"  ('or' @@)?"`
	Rule  *Rule       `parser:"| 'rule' @@ )"`
}

// Rule is the name of a rule as the code writes it: 6.10a/b, 7-22.
type Rule struct {
	Text string
	Span source.Span
}

// Parse takes the tokens up to a comma or the end.
func (r *Rule) Parse(lex *lexer.PeekingLexer) error {
	first := lex.Peek()
	if first.EOF() || first.Value == "," {
		return participle.NextMatch
	}
	r.Span = spanOf(first)
	for t := lex.Peek(); !t.EOF() && t.Value != ","; t = lex.Peek() {
		r.Text += t.Value
		r.Span.End = spanOf(t).End
		lex.Next()
	}
	return nil
}

// LimitStatement is: limit MEASURE <= expression under FAMILY.
type LimitStatement struct {
	Words []*Name     `parser:"'limit' @@ ((?! ('of'|'at')) @@)?"`
	Of    *Name       `parser:"('of' @@)?"`
	At    *Name       `parser:"('at' @@)?"`
	Over  *Name       `parser:"('over' @@)?"`
	Sense string      `parser:"@('<=' | '>=' | '<' | '>')"`
	Bound *Expression `parser:"@@"`
	Under []*Name     `parser:"('under' @@ (',' @@)*)?"`
}

// UseStatement is: use "path".
type UseStatement struct {
	Path *Title `parser:"'use' @@"`
}

// PartStatement is the opening of a part: part NAME(parameter, …) {.
type PartStatement struct {
	Name       *Name   `parser:"'part' @@"`
	Parameters []*Name `parser:"('(' (@@ (',' @@)*)? ')')? '{'"`
}

// PlaceStatement is: place NAME = PART(value, …) at position, turned angle.
type PlaceStatement struct {
	Name   *Name         `parser:"'place' @@ '='"`
	Part   *Name         `parser:"@@"`
	Values []*Expression `parser:"('(' (@@ (',' @@)*)? ')')?"`
	At     *Expression   `parser:"('at' @@)?"`
	Turned []*TurnedItem `parser:"(',' 'turned' @@)*"`
}

// SelfWeightLine is: 1.1 self-weight of GROUP.
type SelfWeightLine struct {
	Factor *Expression `parser:"@@?"`
	Group  *Name       `parser:"'self-weight' ('of' @@)?"`
}

// LoadLine is: who, who from 0 m to 3 m: amount to amount, direction.
type LoadLine struct {
	Who    []*Name         `parser:"@@ (',' @@)*"`
	At     *Expression     `parser:"( 'at' @@"`
	From   *Expression     `parser:"| 'from' @@"`
	Until  *Expression     `parser:"  ('to' @@)? )?"`
	Amount *Expression     `parser:"':' @@"`
	To     *Expression     `parser:"('to' @@)?"`
	How    []*LoadModifier `parser:"(','? @@)*"`
}

// LoadModifier is one word on how a load acts.
type LoadModifier struct {
	Pos    lexer.Position
	Down   bool       `parser:"( @'down'"`
	Up     bool       `parser:"| @'up'"`
	On     *Name      `parser:"| 'on' @@"` // plan, elevation
	Along  *Direction `parser:"| 'along' @@"`
	About  *Direction `parser:"| 'about' @@"`
	Across *Name      `parser:"| 'across' @@"`    // y, z
	Word   *Name      `parser:"| (?! 'at') @@ )"` // pretension
}

// Direction is an axis, global or local, or a vector.
type Direction struct {
	Pos    lexer.Position
	Local  bool        `parser:"( @'local'?"`
	Minus  bool        `parser:"  @('-' | '−')?"`
	Axis   string      `parser:"  @('x' | 'y' | 'z')"`
	Vector *Expression `parser:"| @@ )"`
}

// productions is the root that makes participle know every production.
type productions struct {
	Model       *ModelStatement       `parser:"  @@"`
	Show        *ShowStatement        `parser:"| @@"`
	Let         *LetStatement         `parser:"| @@"`
	Material    *MaterialStatement    `parser:"| @@"`
	Section     *SectionStatement     `parser:"| @@"`
	Node        *NodeStatement        `parser:"| @@"`
	Member      *MemberStatement      `parser:"| @@"`
	Support     *SupportStatement     `parser:"| @@"`
	Mass        *MassStatement        `parser:"| @@"`
	Group       *GroupStatement       `parser:"| @@"`
	Case        *CaseStatement        `parser:"| @@"`
	Alternate   *AlternateStatement   `parser:"| @@"`
	Combination *CombinationStatement `parser:"| @@"`
	Family      *FamilyStatement      `parser:"| @@"`
	Limit       *LimitStatement       `parser:"| @@"`
	Use         *UseStatement         `parser:"| @@"`
	Part        *PartStatement        `parser:"| @@"`
	Place       *PlaceStatement       `parser:"| @@"`
	SelfWeight  *SelfWeightLine       `parser:"| @@"`
	Load        *LoadLine             `parser:"| @@"`
}
