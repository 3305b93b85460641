package feature

import (
	"fmt"
	"slices"
	"strings"

	"spanwright/lang/catalogue"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// ProposalKind is what a proposal puts into the text, for its icon.
type ProposalKind int

// The kinds of proposals.
const (
	WordProposal      ProposalKind = iota // of the language
	StatementProposal                     // a whole statement
	NameProposal                          // something declared; Proposal.Name says what
	UnitProposal
	FunctionProposal
	SectionProposal // of the catalogue
	GradeProposal
)

// Proposal is one thing that may stand at a place.
type Proposal struct {
	Label  string
	Detail string // short, beside the label
	Kind   ProposalKind
	Name   resolve.Kind // of a NameProposal
	// Insert is the text to write. With Snippet it has places to fill in, in the
	// form of the protocol: ${1:name}.
	Insert  string
	Snippet bool
	// Rank puts proposals in order: lower first, then by label.
	Rank int
	// Key finds the documentation again: see [Describe].
	Key string

	definition *resolve.Definition // of a name: detail and key wait until it is sure to be offered
}

// Completion is what may stand at a place.
type Completion struct {
	// Span is the text to replace: what of a word stands before the place.
	Span source.Span
	// Incomplete: with the next letter other things may fit, ask again.
	Incomplete bool
	Proposals  []Proposal
}

// CompleteOptions say what the client can take.
type CompleteOptions struct{ Snippets bool }

// mostProposals bounds a list that nobody could read; typing on narrows it.
const mostProposals = 1000

// Complete returns what may stand at a place of a file.
func Complete(s *workspace.Snapshot, path string, offset int, options CompleteOptions) Completion {
	tree, err := s.Tree(path)
	if err != nil {
		return Completion{Span: source.At(offset)}
	}
	c := completer{snapshot: s, tree: tree, offset: offset, options: options}
	c.line()
	if c.inText() {
		return Completion{Span: source.At(offset)}
	}
	c.expected = resolve.ExpectedAt(tree, offset)
	c.result = Completion{Span: source.Span{Start: c.expected.Word.Start, End: offset}}
	if !c.expected.Declares {
		c.view, c.viewed = s.View(path)
		c.propose()
	}
	c.narrow()
	return c.result
}

// completer gathers proposals for one place.
type completer struct {
	snapshot *workspace.Snapshot
	view     workspace.View
	viewed   bool
	tree     *syntax.Tree
	offset   int
	options  CompleteOptions
	expected resolve.Expected
	// before are the words of the statement before the place, the one being
	// typed left out.
	before []syntax.Token
	text   string // that the tokens are cut from
	start  int    // of the text in the file
	result Completion
}

// line cuts the statement before the place into words.
func (c *completer) line() {
	start := c.tree.File.LineStart(c.tree.File.LineAt(c.offset))
	if i := c.tree.UnitBefore(c.offset); i >= 0 && c.tree.Units[i].End >= start {
		start = c.tree.Units[i].Start
	}
	c.start = start
	c.text = c.tree.File.Text[min(start, c.offset):c.offset]
	for _, t := range syntax.Tokens(c.text) {
		if t.Kind == syntax.Comment || !t.Trivia() {
			c.before = append(c.before, t)
		}
	}
}

// inText reports whether the place is in a title or a comment, where nothing
// is proposed.
func (c *completer) inText() bool {
	if len(c.before) == 0 {
		return false
	}
	last := c.before[len(c.before)-1]
	word := last.In(c.text)
	open := last.Kind == syntax.Text && (len(word) < 2 || word[len(word)-1] != '"')
	return int(last.End) == len(c.text) && (last.Kind == syntax.Comment || open)
}

// word returns the text of the i-th word before the place, counted from behind.
func (c *completer) word(back int) string {
	words := c.before
	if c.expected.Prefix != "" && len(words) > 0 {
		words = words[:len(words)-1]
	}
	if back >= len(words) {
		return ""
	}
	return words[len(words)-1-back].In(c.text)
}

func (c *completer) add(p Proposal) {
	if p.Insert == "" {
		p.Insert = p.Label
	}
	c.result.Proposals = append(c.result.Proposals, p)
}

// propose gathers everything that fits.
func (c *completer) propose() {
	if c.profile() {
		return
	}
	c.words()
	if c.expected.Grade {
		c.grades()
	}
	behindNumber := c.behindNumber()
	keyword := syntax.UnknownKind
	if len(c.before) > 0 {
		k, _ := syntax.KeywordOf(c.before[0].In(c.text))
		keyword = k.Kind
	}
	combination := keyword == syntax.CombinationKind
	if !behindNumber || combination {
		c.names()
	}
	if (c.expected.Expression || behindNumber) && !combination {
		c.units(behindNumber)
	}
	if c.expected.Expression && !behindNumber && keyword != syntax.ShowKind {
		c.functions()
	}
}

// words proposes words of the language, whole statements at the start of a line.
func (c *completer) words() {
	start := len(c.before) == 0 || len(c.before) == 1 && c.expected.Prefix != ""
	for _, w := range c.expected.Words {
		keyword, isKeyword := syntax.KeywordOf(w)
		if !start || !isKeyword {
			c.add(c.plainWord(w))
			continue
		}
		p := Proposal{Label: w, Detail: keyword.Form, Kind: StatementProposal, Key: "word:" + w}
		if text, ok := statements[keyword.Kind]; ok && c.options.Snippets {
			p.Insert, p.Snippet = text, true
		} else {
			p.Insert = w + " "
		}
		c.add(p)
	}
}

// plainWord proposes a word inside a statement.
func (c *completer) plainWord(w string) Proposal {
	kind := syntax.LoadKind
	if len(c.before) > 0 {
		if k, ok := syntax.KeywordOf(c.before[0].In(c.text)); ok {
			kind = k.Kind
		}
	}
	first, _, _ := strings.Cut(w, " ")
	p := Proposal{Label: w, Kind: WordProposal, Key: fmt.Sprintf("word:%d:%s", kind, first)}
	if c.behindNumber() {
		p.Rank = 2 // behind the units
	}
	return p
}

// statements are the snippets of whole statements.
var statements = map[syntax.Kind]string{
	syntax.ModelKind:       `model "${1:Title}" ${2|plane,space|}`,
	syntax.ShowKind:        `show ${1:kN, m, mm, kNm, MPa}`,
	syntax.LetKind:         `let ${1:name} = ${2:1 m}`,
	syntax.MaterialKind:    `material ${1:steel} = ${2:S275}`,
	syntax.SectionKind:     `section ${1:name} = ${2:IPE 300} of ${3:material}`,
	syntax.NodeKind:        `node ${1:name} = (${2:0}, ${3:0}) m`,
	syntax.BeamKind:        `beam ${1:name} = ${2:first} -> ${3:last} of ${4:section}`,
	syntax.BarKind:         `bar ${1:name} = ${2:first} -> ${3:last} of ${4:section}`,
	syntax.LinkKind:        `link ${1:name} = ${2:first} -> ${3:last}`,
	syntax.SpringKind:      `spring ${1:name} = ${2:first} -> ${3:last}, ${4|along,across y,across z,about x,about y,about z|} ${5:12 kN/mm}`,
	syntax.SupportKind:     `support ${1:node} ${2|pinned,fixed,holds uz,spring uz 12 kN/mm|}`,
	syntax.MassKind:        `mass ${1:node} ${2:500} kg`,
	syntax.GroupKind:       `group ${1:name} = ${2:members}`,
	syntax.CaseKind:        "case ${1:name} ${2|permanent,imposed,snow,wind,thermal,settlement,accidental,earthquake|} \"${3:title}\" {\n    $0\n}",
	syntax.AlternateKind:   `alternate ${1:case}, ${2:case}`,
	syntax.CombinationKind: `combination ${1:name} = ${2:1.35 G + 1.5 Q}`,
	syntax.FamilyKind:      `family ${1:ULS} by ${2|EN1990 strength,EN1990 characteristic,EN1990 frequent,EN1990 quasi-permanent,ASCE7 strength,ASCE7 allowable|}`,
	syntax.LimitKind:       `limit ${1:deflection of} ${2:member} <= ${3:length/250} under ${4:SLS}`,
	syntax.UseKind:         `use "${1:path.span}"`,
	syntax.PartKind:        "part ${1:name}(${2:parameters}) {\n    $0\n}",
	syntax.PlaceKind:       `place ${1:name} = ${2:part}(${3:values}) at ${4:(0, 0) m}`,
}

// names proposes what is declared and of a kind that fits.
func (c *completer) names() {
	if !c.viewed || len(c.expected.Kinds) == 0 {
		return
	}
	path := c.tree.File.Path
	taken := c.taken()
	for name, list := range c.view.Resolved.Visible(path, c.offset) {
		for _, d := range list {
			if !slices.Contains(c.expected.Kinds, d.Kind) || d.File == path && d.Statement.Start == c.start {
				continue // a thing does not follow from itself
			}
			p := Proposal{Label: name, definition: d, Kind: NameProposal, Name: d.Kind, Rank: c.rank(d)}
			if taken[name] {
				p.Rank += 10
			}
			c.add(p)
		}
	}
}

// taken are the names that the statement has already: they come last.
func (c *completer) taken() map[string]bool {
	taken := map[string]bool{}
	for _, t := range c.before {
		taken[t.In(c.text)] = true
	}
	return taken
}

// rank puts what is declared close above the place before the rest.
func (c *completer) rank(d *resolve.Definition) int {
	if d.File != c.tree.File.Path {
		return 3
	}
	switch lines := c.tree.File.LineAt(c.offset) - c.tree.File.LineAt(d.Span.Start); {
	case lines >= 0 && lines <= 20:
		return 1
	case d.Uses == 0:
		return 1
	}
	return 2
}

// detail says in short what a name stands for: the rest of its line.
func (c *completer) detail(d *resolve.Definition) string {
	for _, t := range c.view.Resolved.Trees {
		if t.File.Path == d.File {
			return d.Kind.String() + " " + oneLine(t.File.Slice(d.Statement), d.Name)
		}
	}
	return d.Kind.String()
}

// oneLine is what a statement says behind its name, cut to a line.
func oneLine(text, name string) string {
	if at := strings.Index(text, name); at >= 0 {
		text = text[at+len(name):]
	}
	text = strings.TrimSpace(strings.TrimPrefix(strings.Join(strings.Fields(text), " "), "="))
	if runes := []rune(text); len(runes) > 50 {
		text = string(runes[:49]) + "…"
	}
	return strings.TrimSpace(strings.TrimPrefix(text, "= "))
}

func (c *completer) functions() {
	for _, f := range resolve.Functions() {
		p := Proposal{Label: f.Name, Detail: f.Form, Kind: FunctionProposal, Rank: 5, Key: "function:" + f.Name}
		if p.Insert = f.Name + "("; c.options.Snippets {
			p.Insert, p.Snippet = f.Name+"($1)", true
		}
		c.add(p)
	}
	pi := c.plainWord("pi")
	pi.Rank = 5
	c.add(pi)
}

func (c *completer) grades() {
	for i, m := range catalogue.AllGrades() {
		c.add(Proposal{Label: m.Grade, Detail: m.Title, Kind: GradeProposal, Rank: i, Key: "grade:" + m.Grade})
	}
}

// narrow keeps what begins like the word being typed, or holds its letters in
// order, and puts the list in order.
func (c *completer) narrow() {
	prefix := c.tree.File.Slice(c.result.Span)
	list := c.result.Proposals
	if prefix != "" {
		list = slices.DeleteFunc(list, func(p Proposal) bool { return !matches(p.Label, strings.ReplaceAll(prefix, " ", "")) })
	}
	slices.SortFunc(list, func(a, b Proposal) int {
		if a.Rank != b.Rank {
			return a.Rank - b.Rank
		}
		return compareNatural(a.Label, b.Label)
	})
	list = slices.CompactFunc(list, func(a, b Proposal) bool { return a.Label == b.Label && a.Kind == b.Kind })
	if len(list) > mostProposals {
		list, c.result.Incomplete = list[:mostProposals], true
	}
	for i := range list {
		if d := list[i].definition; d != nil {
			list[i].Detail = c.detail(d)
			list[i].Key = fmt.Sprintf("name:%d:%s", d.Kind.Space(), fullName(d))
		}
	}
	c.result.Proposals = list
}

// compareNatural orders names as people do: r2 before r10.
func compareNatural(a, b string) int {
	for a != "" && b != "" {
		x, restA := leadingNumber(a)
		y, restB := leadingNumber(b)
		switch {
		case x >= 0 && y >= 0 && x != y:
			return x - y
		case x >= 0 && y >= 0:
			a, b = restA, restB
		case a[0] != b[0]:
			return int(a[0]) - int(b[0])
		default:
			a, b = a[1:], b[1:]
		}
	}
	return len(a) - len(b)
}

// leadingNumber returns the number that a text begins with, or −1.
func leadingNumber(s string) (int, string) {
	n, i := 0, 0
	for ; i < len(s) && i < 9 && '0' <= s[i] && s[i] <= '9'; i++ {
		n = 10*n + int(s[i]-'0')
	}
	if i == 0 {
		return -1, s
	}
	return n, s[i:]
}
