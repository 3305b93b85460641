package resolve

import (
	"slices"
	"strings"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Expected says what may stand at a place in the text.
type Expected struct {
	// Kinds are the kinds of names that fit.
	Kinds []Kind
	// Words are words of the language that fit.
	Words []string
	// Expression: an expression fits, and so do units, functions, lets and nodes.
	Expression bool
	// Grade: a grade of the catalogue fits. Profile: a section of the catalogue.
	Grade, Profile bool
	// Declares: a new name is wanted, so nothing can be proposed.
	Declares bool
	// Prefix is what of a word stands before the place, and Word its span.
	Prefix string
	Word   source.Span
}

var (
	memberKinds = []Kind{BeamName, BarName, LinkName, SpringName}
	valueKinds  = []Kind{LetName, ParameterName, NodeName}
	actionKinds = []Kind{CaseName, CombinationName, FamilyName}
)

// ExpectedAt returns what may stand at an offset of a file, by what stands
// before it in its statement. It works on statements that are not finished.
func ExpectedAt(tree *syntax.Tree, offset int) Expected {
	i := tree.UnitBefore(offset)
	start, block := offset, syntax.TopLevel
	if i >= 0 {
		u := &tree.Units[i]
		block = u.Block
		line := tree.File.LineStart(tree.File.LineAt(offset))
		switch {
		case offset <= u.End || u.End > line, strings.HasSuffix(strings.TrimRight(tree.File.Text[u.Start:u.End], " \t"), ","):
			start = u.Start
			if opens(u.Statement) && offset >= u.End {
				start, block = offset, inside(u)
			}
		case opens(u.Statement):
			block = inside(u)
		case u.Statement.Kind == syntax.CloseKind:
			block = outside(u.Block)
		}
	}
	before := tree.File.Text[min(start, offset):offset]
	var words []string
	end := 0
	for _, t := range syntax.Tokens(before) {
		if !t.Trivia() {
			words = append(words, t.In(before))
			end = int(t.End)
		}
	}
	x := Expected{Word: source.At(offset)}
	if n := len(words); n > 0 && end == len(before) && wordLike(words[n-1]) {
		x.Prefix = words[n-1]
		x.Word.Start = offset - len(x.Prefix)
		words = words[:n-1]
	}
	x.fill(words, block)
	return x
}

func opens(s *syntax.Statement) bool {
	return (s.Kind == syntax.CaseKind || s.Kind == syntax.PartKind) && strings.HasSuffix(s.Text, "{")
}

func inside(u *syntax.Unit) syntax.Block {
	switch {
	case u.Statement.Kind == syntax.PartKind:
		return syntax.InPart
	case u.Block == syntax.InPart:
		return syntax.InCaseOfPart
	}
	return syntax.InCase
}

func outside(b syntax.Block) syntax.Block {
	if b == syntax.InCaseOfPart {
		return syntax.InPart
	}
	return syntax.TopLevel
}

func wordLike(s string) bool {
	c := s[0]
	return c == '_' || 'a' <= c && c <= 'z' || 'A' <= c && c <= 'Z' || c == '%' || c >= 0x80 && len(s) > 2
}

// fill finds what fits behind the words of a statement.
func (x *Expected) fill(words []string, block syntax.Block) {
	if len(words) == 0 {
		x.begin(block)
		return
	}
	keyword, known := syntax.KeywordOf(words[0])
	if !known {
		if block == syntax.InCase || block == syntax.InCaseOfPart {
			x.load(words)
		}
		return
	}
	last := words[len(words)-1]
	switch keyword.Kind {
	case syntax.ModelKind:
		switch {
		case strings.HasPrefix(last, `"`):
			x.Words = []string{"plane", "space"}
		case last == ",":
			x.Words = []string{"second order", "shear flexible", "gravity"}
		case last == "gravity":
			x.Expression = true
		}
	case syntax.ShowKind:
		x.Expression = true
	case syntax.SupportKind:
		x.support(words)
	case syntax.MassKind:
		if len(words) == 1 {
			x.Kinds = []Kind{NodeName}
		} else if last == "about" {
			x.Words = []string{"x", "y", "z"}
		} else if last == "," {
			x.Words = []string{"inertia"}
		} else {
			x.value()
		}
	case syntax.CaseKind:
		switch len(words) {
		case 1:
			x.Declares = true
		case 2:
			x.Words = slices.Clone(caseKinds)
		case 3:
			if last == "imposed" {
				x.Words = []string{"A", "B", "C", "D", "E", "F", "G", "H"}
			}
		}
	case syntax.AlternateKind:
		x.Kinds = []Kind{CaseName}
	case syntax.LimitKind:
		x.limit(words)
	case syntax.FamilyKind:
		x.family(words)
	default:
		x.declaration(keyword.Kind, words)
	}
}

// begin is the start of a line.
func (x *Expected) begin(block syntax.Block) {
	switch block {
	case syntax.InCase, syntax.InCaseOfPart:
		x.Kinds = append(slices.Clone(memberKinds), NodeName, GroupName)
		x.Words = []string{"self-weight"}
		return
	}
	for _, k := range syntax.Keywords() {
		inPart := k.Kind != syntax.ModelKind && k.Kind != syntax.ShowKind && k.Kind != syntax.UseKind && k.Kind != syntax.PartKind &&
			k.Kind != syntax.AlternateKind && k.Kind != syntax.CombinationKind && k.Kind != syntax.FamilyKind
		if block == syntax.TopLevel || inPart {
			x.Words = append(x.Words, k.Word)
		}
	}
}

func (x *Expected) value() {
	x.Expression = true
	x.Kinds = slices.Clone(valueKinds)
}

// declaration is a statement of the form KEYWORD NAME = ….
func (x *Expected) declaration(kind syntax.Kind, words []string) {
	last := words[len(words)-1]
	if len(words) == 1 {
		x.Declares = true
		return
	}
	if !slices.Contains(words, "=") {
		return
	}
	switch kind {
	case syntax.LetKind, syntax.NodeKind:
		x.value()
	case syntax.MaterialKind:
		x.properties(words, materialProperties, func() { x.Grade = true })
	case syntax.SectionKind:
		if last == "of" {
			x.Kinds = []Kind{MaterialName}
			return
		}
		x.properties(words, sectionProperties, func() {
			x.Profile = true
			if last == "=" {
				x.Words = syntax.Shapes()
			} else {
				x.Words = []string{"of"}
			}
		})
	case syntax.BeamKind, syntax.BarKind, syntax.LinkKind, syntax.SpringKind:
		x.member(kind, words)
	case syntax.GroupKind:
		x.Kinds = append(slices.Clone(memberKinds), GroupName)
	case syntax.CombinationKind:
		x.Expression = true
		x.Kinds = []Kind{CaseName, LetName}
	case syntax.PlaceKind:
		switch {
		case last == "=":
			x.Kinds = []Kind{PartName}
		case last == "about":
			x.Words = []string{"x", "y", "z"}
		case last == ")":
			x.Words = []string{"at"}
		case last == "," && strings.Count(strings.Join(words, ""), "(") == strings.Count(strings.Join(words, ""), ")"):
			x.Words = []string{"turned"}
		default:
			x.value()
		}
	}
}

// properties is the inside of braces, or what stands instead of them.
func (x *Expected) properties(words []string, known []property, otherwise func()) {
	open := slices.Index(words, "{")
	last := words[len(words)-1]
	switch {
	case open < 0:
		otherwise()
	case slices.Contains(words, "}"):
		x.Words = []string{"of"}
	case last == "{" || last == ",":
		for _, p := range known {
			if !slices.Contains(words[open:], p.word) {
				x.Words = append(x.Words, p.word)
			}
		}
	default:
		x.value()
	}
}

// member is the path and the options of a member.
func (x *Expected) member(kind syntax.Kind, words []string) {
	last := words[len(words)-1]
	comma := slices.Index(words, ",")
	switch {
	case last == "=" || last == "->":
		x.Kinds = []Kind{NodeName}
	case last == "of":
		x.Kinds = []Kind{SectionName}
	case comma < 0:
		x.Words = []string{"->"}
		if kind == syntax.BeamKind || kind == syntax.BarKind {
			x.Words = append(x.Words, "of")
		}
	case last == "," && kind == syntax.SpringKind:
		x.Words = []string{"along", "across y", "across z", "about x", "about y", "about z"}
	case last == ",":
		x.Words = []string{"hinge at", "release", "joint", "roll", "offset", "tension only", "compression only"}
	case last == "at" || last == "offset":
		x.Kinds = []Kind{NodeName}
	case last == "release" || last == "joint" || slices.Contains(forces, last):
		x.Words = append(slices.Clone(forces), "at")
	case last == "tension" || last == "compression":
		x.Words = []string{"only"}
	default:
		x.value()
	}
}

func (x *Expected) support(words []string) {
	last := words[len(words)-1]
	switch {
	case len(words) == 1:
		x.Kinds = []Kind{NodeName}
	case len(words) == 2 || last == ",":
		x.Words = []string{"fixed", "pinned", "holds", "spring", "turned", "up only"}
	case last == "holds" || last == "spring" || slices.Contains(freedoms, last) && slices.Contains(words, "holds") && !slices.Contains(words, "spring"):
		x.Words = slices.Clone(freedoms)
	case last == "about":
		x.Words = []string{"x", "y", "z"}
	default:
		x.value()
	}
}

func (x *Expected) limit(words []string) {
	last := words[len(words)-1]
	switch {
	case slices.Contains(words, "under"):
		x.Kinds = slices.Clone(actionKinds)
	case slices.Contains(words, "<=") || slices.Contains(words, ">="):
		x.value()
		x.Words = []string{"length", "yield", "under"}
	case len(words) == 1:
		x.Words = measureWords()
	case last == "reaction":
		x.Words = slices.Clone(reactions)
	case last == "at" || last == "over" || last == "of" && slices.Contains(words, "drift"):
		x.Kinds = []Kind{NodeName}
	case last == "of":
		x.Kinds = []Kind{BeamName, BarName, GroupName, SectionName}
		x.Words = []string{"all"}
	default:
		x.Words = []string{"of", "at", "over", "<=", ">="}
	}
}

func (x *Expected) family(words []string) {
	last := words[len(words)-1]
	switch {
	case len(words) == 1:
		x.Declares = true
	case len(words) == 2:
		x.Words = []string{"by"}
	case last == "by":
		x.Words = []string{"EN1990", "ASCE7"}
	case len(words) == 4 && last == "ASCE7":
		x.Words = []string{"strength", "allowable"}
	case len(words) == 4:
		x.Words = []string{"strength", "characteristic", "frequent", "quasi-permanent"}
	case last == ",":
		x.Words = append([]string{"rule"}, factorSymbols...)
	case slices.Contains(factorSymbols, last):
		x.Words = slices.Clone(caseKinds)
		x.Kinds = []Kind{CaseName}
	default:
		x.value()
	}
}

func (x *Expected) load(words []string) {
	last := words[len(words)-1]
	colon := slices.Index(words, ":")
	if slices.Contains(words, "self-weight") {
		if last == "of" {
			x.Kinds = append(slices.Clone(memberKinds), GroupName)
		} else {
			x.Words = []string{"of"}
		}
		return
	}
	switch {
	case colon < 0 && last == ",":
		x.Kinds = append(slices.Clone(memberKinds), NodeName, GroupName)
	case colon < 0 && (last == "at" || last == "from" || last == "to"):
		x.value()
		x.Words = []string{"length"}
	case colon < 0:
		x.Words = []string{"at", "from", "to", ":"}
		x.Expression = true
	case last == "along" || last == "about":
		x.Words = []string{"x", "y", "z", "-x", "-y", "-z", "local x", "local y", "local z"}
	case last == "local":
		x.Words = []string{"x", "y", "z"}
	case last == "across":
		x.Words = []string{"y", "z"}
	case last == "on":
		x.Words = []string{"plan", "elevation"}
	case last == ":" || last == "to":
		x.value()
	default:
		x.value()
		x.Words = slices.Concat(modifierWords, []string{"to"})
	}
}
