package resolve

import "slices"

// Space is one of the language's name spaces.
type Space uint8

// The name spaces. The same name may stand for one thing in each.
const (
	Structure Space = iota // let values, nodes, members, groups, placed parts
	Sections
	Materials
	Actions // cases, combinations and families
	Parts
)

// Kind says what a name stands for.
type Kind uint8

// The kinds of named things.
const (
	NoKind Kind = iota
	LetName
	ParameterName
	NodeName
	BeamName
	BarName
	LinkName
	SpringName
	GroupName
	PlaceName
	SectionName
	MaterialName
	CaseName
	CombinationName
	FamilyName
	PartName
)

var kindWords = [...]string{
	"name", "let", "parameter", "node", "beam", "bar", "link", "spring", "group", "placed part",
	"section", "material", "case", "combination", "family", "part",
}

// String returns the kind in a word: "node", "beam", "placed part".
func (k Kind) String() string { return kindWords[k] }

// Member reports whether the kind is one of beam, bar, link and spring.
func (k Kind) Member() bool { return k >= BeamName && k <= SpringName }

// Space returns the name space that names of the kind live in.
func (k Kind) Space() Space {
	switch k {
	case SectionName:
		return Sections
	case MaterialName:
		return Materials
	case CaseName, CombinationName, FamilyName:
		return Actions
	case PartName:
		return Parts
	}
	return Structure
}

// scope is a set of names: that of the model, or that of one placed part.
type scope struct {
	outer *scope // where names are looked up that this one lacks; nil for the model's
	place string // "F1" for names F1.A; "" for the model's own
	// holder stands for the place of a part that nothing places; else nil.
	holder *fragment
}

// prefix returns what stands before the scope's names when they are spoken of
// from outside: "F1.".
func (s *scope) prefix() string {
	if s.place == "" {
		return ""
	}
	return s.place + "."
}

type symbolKey struct {
	scope *scope
	space Space
	name  string
}

// symbol is one name in one scope and space, declared or only asked for. It
// lives as long as anything declares or uses it.
type symbol struct {
	symbolKey
	declarations []*fragment // in the order of the text; the first one counts
	users        []user
	// was is what the name stood for before the edit at hand.
	was Kind
	// touched marks a symbol whose declarations the edit at hand changes.
	touched bool
	changed int // revision in which the declarations last changed
}

// user is a fragment that has looked the symbol up, with the place of the
// symbol in the fragment's list.
type user struct {
	fragment *fragment
	slot     int
}

// winner returns the fragment that the name stands for, or nil.
func (s *symbol) winner() *fragment {
	if len(s.declarations) == 0 {
		return nil
	}
	return s.declarations[0]
}

// kind returns what the name stands for.
func (s *symbol) kind() Kind {
	if w := s.winner(); w != nil {
		return w.kind
	}
	return NoKind
}

// full returns the name as spoken of from outside its scope: "F1.A".
func (s *symbol) full() string { return s.scope.prefix() + s.name }

// table holds the symbols of a session.
type table map[symbolKey]*symbol

// get returns a symbol, made where it is new.
func (t table) get(key symbolKey) *symbol {
	s := t[key]
	if s == nil {
		s = &symbol{symbolKey: key}
		t[key] = s
	}
	return s
}

// release forgets a symbol that nothing declares or uses any more.
func (t table) release(s *symbol) {
	if len(s.declarations) == 0 && len(s.users) == 0 && !s.touched {
		delete(t, s.symbolKey)
	}
}

// dependency is one entry of a fragment's list of symbols looked up.
type dependency struct {
	symbol *symbol
	slot   int // of the fragment in the symbol's users
	// byValue: the fragment's outcome follows from what the name stands for, not
	// only from there being such a thing.
	byValue bool
}

// depend notes that a fragment has looked a symbol up.
func (f *fragment) depend(s *symbol, byValue bool) {
	for i := range f.dependencies {
		if f.dependencies[i].symbol == s {
			f.dependencies[i].byValue = f.dependencies[i].byValue || byValue
			return
		}
	}
	f.dependencies = append(f.dependencies, dependency{s, len(s.users), byValue})
	s.users = append(s.users, user{f, len(f.dependencies) - 1})
}

// forget takes back all that a fragment has noted by depend.
func (f *fragment) forget(t table) {
	for _, d := range f.dependencies {
		s := d.symbol
		last := len(s.users) - 1
		moved := s.users[last]
		s.users[d.slot] = moved
		moved.fragment.dependencies[moved.slot].slot = d.slot
		s.users = s.users[:last]
		t.release(s)
	}
	f.dependencies = f.dependencies[:0]
}

// declare adds a fragment to the declarations of a symbol.
func (s *symbol) declare(f *fragment) { s.declarations = append(s.declarations, f) }

// withdraw removes a fragment from the declarations of a symbol.
func (s *symbol) withdraw(f *fragment) {
	if i := slices.Index(s.declarations, f); i >= 0 {
		s.declarations = slices.Delete(s.declarations, i, i+1)
	}
}
