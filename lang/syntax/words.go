package syntax

import (
	"slices"

	"spanwright/lang/quantity"
)

// Kind says what a statement is.
type Kind uint8

// The kinds of statements. The first are those with a key word of their own.
const (
	UnknownKind Kind = iota
	ModelKind
	ShowKind
	LetKind
	MaterialKind
	SectionKind
	NodeKind
	BeamKind
	BarKind
	LinkKind
	SpringKind
	SupportKind
	MassKind
	GroupKind
	CaseKind
	AlternateKind
	CombinationKind
	FamilyKind
	LimitKind
	UseKind
	PartKind
	PlaceKind
	LoadKind  // a line in a case
	CloseKind // the closing brace of a case or part
)

// Keyword is a word that begins a statement.
type Keyword struct {
	Word string
	Kind Kind
	// Form is how the statement is written, in one line.
	Form string
	// Does says what the statement is for, and Example shows one.
	Does, Example string
}

// keywords is the table of statements, in the order of the language reference.
var keywords = []Keyword{
	{"model", ModelKind, `model "Title" plane|space, options`, "Names the model and says whether it is plane or in space. Options: second order, shear flexible, gravity 9.81 m/s2.", `model "Boathouse portal" plane`},
	{"show", ShowKind, "show UNIT, UNIT …", "Chooses the units that results are shown in; a second length unit is for movements.", "show kN, m, mm, kNm, MPa"},
	{"let", LetKind, "let NAME = expression", "Names a value, to be used in any expression.", "let span = 12 m"},
	{"material", MaterialKind, "material NAME = GRADE, or { E …, G …, density …, expansion …, yield … }", "Declares a material, from the catalogue or by its properties.", "material steel = S275"},
	{"section", SectionKind, "section NAME = SERIES SIZE of MATERIAL, or a shape, or { A …, Iy … } of MATERIAL", "Declares a cross-section of a material.", "section rafter = IPE 300 of steel"},
	{"node", NodeKind, "node NAME = (x, z) m in a plane model, (x, y, z) m in space", "Declares a joint of the structure at a position.", "node B = A + (0 m, eaves)"},
	{"beam", BeamKind, "beam NAME = A -> B of SECTION, options", "Declares a member with axial, bending and torsional stiffness.", "beam r1 = B -> C of rafter, hinge at C"},
	{"bar", BarKind, "bar NAME = A -> B of SECTION, options", "Declares a member that carries axial force only.", "bar t1 = B -> D of rod, tension only"},
	{"link", LinkKind, "link NAME = A -> B", "Joins two nodes rigidly.", "link k1 = A -> B"},
	{"spring", SpringKind, "spring NAME = A -> B, along 12 kN/mm", "Joins two nodes by springs: along, across y or z, about x, y or z.", "spring s1 = A -> B, along 12 kN/mm"},
	{"support", SupportKind, "support NODE fixed | pinned | holds ux uz ry | spring uz 12 kN/mm, options", "Holds a node.", "support A pinned"},
	{"mass", MassKind, "mass NODE 500 kg, inertia 12 kg*m2 about y", "Puts a mass at a node; it counts in frequencies and in self-weight.", "mass C 500 kg"},
	{"group", GroupKind, "group NAME = member, member, group …", "Names a set of members.", "group roof = r1, r2"},
	{"case", CaseKind, `case NAME KIND "title" { loads }`, "Opens a load case. Kinds: permanent, imposed A to H, snow, wind, thermal, settlement, accidental, earthquake.", "case S snow {\n    r1: 3 kN/m down on plan\n}"},
	{"alternate", AlternateKind, "alternate CASE, CASE …", "Says that these cases never act together.", "alternate W1, W2"},
	{"combination", CombinationKind, "combination NAME = 1.35 G + 1.5 S", "Adds cases with factors; a name such as ULS.a belongs to family ULS.", "combination ULS.a = 1.35 G + 1.5 S"},
	{"family", FamilyKind, "family NAME by EN1990 strength | characteristic | frequent | quasi-permanent, or by ASCE7 strength | allowable", "Makes the combinations that a code of practice asks for.", "family ULS by EN1990 strength"},
	{"limit", LimitKind, "limit MEASURE <= expression under CASE, COMBINATION or FAMILY", "States an acceptance criterion that is checked with every solve.", "limit deflection of r1 <= length/250 under SLS"},
	{"use", UseKind, `use "path/common.span"`, "Brings in the declarations of another file.", `use "library/sections.span"`},
	{"part", PartKind, "part NAME(parameter, …) { statements }", "Describes a sub-structure that can be placed several times.", "part frame(span) {\n    node A = (0, 0) m\n}"},
	{"place", PlaceKind, "place NAME = PART(value, …) at position, turned angle", "Places a part; its names are then NAME.A and so on.", "place F1 = frame(12 m) at (0, 0) m"},
}

// Keywords returns the table of statements. The slice is the caller's own.
func Keywords() []Keyword { return slices.Clone(keywords) }

// KeywordOf returns the entry of a word, and false where it begins no statement.
func KeywordOf(word string) (Keyword, bool) {
	for i := range keywords {
		if keywords[i].Word == word {
			return keywords[i], true
		}
	}
	return Keyword{}, false
}

// Form returns how a statement of a kind is written.
func (k Kind) Form() string {
	for i := range keywords {
		if keywords[i].Kind == k {
			return keywords[i].Form
		}
	}
	if k == LoadKind {
		return "WHO: AMOUNT DIRECTION, for example r1: 3 kN/m down"
	}
	return ""
}

// Word returns the key word of a kind, or "load" for a load line.
func (k Kind) Word() string {
	for i := range keywords {
		if keywords[i].Kind == k {
			return keywords[i].Word
		}
	}
	if k == LoadKind {
		return "load"
	}
	return ""
}

// joining are the words that join the parts of statements, besides key words.
// They cannot be names.
var joining = []string{
	"of", "at", "to", "from", "by", "under", "over", "on", "or", "about", "along", "across",
	"down", "up", "local", "only", "self-weight", "quasi-permanent", "pi",
}

// Joining returns the words besides key words that the language keeps for
// itself. The slice is the caller's own.
func Joining() []string { return slices.Clone(joining) }

// Reserved reports whether a word cannot be a name because the language itself
// uses it: key words and joining words. Unit symbols cannot be names either;
// see [UnitSymbol].
func Reserved(word string) bool {
	if _, ok := KeywordOf(word); ok {
		return true
	}
	return slices.Contains(joining, word)
}

// UnitSymbol reports whether a word is a unit, in any spelling that is read.
func UnitSymbol(word string) bool {
	_, ok := quantity.Lookup(NormalUnit(word))
	return ok
}

// NormalUnit returns a unit's normal spelling: "mm²" becomes "mm2". A word that
// is no unit comes back as it is.
func NormalUnit(word string) string {
	if ascii(word) {
		return word
	}
	plain := make([]rune, 0, len(word))
	for _, r := range word {
		switch r {
		case '²':
			r = '2'
		case '³':
			r = '3'
		case '⁴':
			r = '4'
		case '⁵':
			r = '5'
		case '⁶':
			r = '6'
		}
		plain = append(plain, r)
	}
	if _, ok := quantity.Lookup(string(plain)); ok {
		return string(plain)
	}
	return word
}

// ascii reports whether a text has no character beyond ASCII.
func ascii(text string) bool {
	for i := range len(text) {
		if text[i] >= 0x80 {
			return false
		}
	}
	return true
}

// ends reports whether a word ends an expression: it joins, so a number before
// it does not multiply it.
func ends(word string) bool { return Reserved(word) && word != "pi" }
