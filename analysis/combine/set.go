package combine

import (
	"errors"
	"fmt"
	"slices"
	"strings"

	"github.com/agnivade/levenshtein"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// Combination is a sum of factored cases, written in the model or asked for by
// a code.
type Combination struct {
	// Name is the full name, the family's first: "ULS.S+W".
	Name   string
	Family int // index into Model.Families, or −1
	// Factors are by case index, each case once, none zero.
	Factors []model.Factor
	// Equation is the code's expression: "EN 1990 (6.10)"; "" when written by
	// hand.
	Equation string
	Written  int // index into Model.Combinations, or −1 for a generated one
}

// Words returns the sum as it would be written: "1.35 G + 1.5 S".
func (c *Combination) Words(m *model.Model) string {
	var b strings.Builder
	for i, f := range c.Factors {
		value := f.Factor
		switch {
		case i == 0 && value < 0:
			b.WriteString("−")
		case i > 0 && value < 0:
			b.WriteString(" − ")
		case i > 0:
			b.WriteString(" + ")
		}
		if value < 0 {
			value = -value
		}
		if value != 1 {
			b.WriteString(quantity.Number(value, 4) + " ")
		}
		b.WriteString(m.Cases[f.Case].Name)
	}
	return b.String()
}

// Set is all combinations of a model. It does not change once it is made.
type Set struct {
	// All holds the combinations written without a family, then those of each
	// family in the order of the families: the written ones, then the
	// generated ones.
	All []Combination
	// Families lists for each family of the model its combinations, as indices
	// into All. Those that the family's code asks for and that were refused are
	// missing.
	Families [][]int

	byName     map[string]int
	bySpelling map[string]int // −1 where two names share a spelling
}

// TooManyError says that a family asks for more combinations than
// [MaxPerFamily]. The family is left with those written by hand.
type TooManyError struct {
	Family int // index into Model.Families
	Name   string
	Cases  int
}

// Error names the family and what reduces the number.
func (e *TooManyError) Error() string {
	return fmt.Sprintf("Family %s asks for more than %d combinations of %d cases. Join permanent cases that come from one source, or say which cases never act together with alternate.", e.Name, MaxPerFamily, e.Cases)
}

// Expand forms all combinations of a model. The errors are of type
// *[RuleError] and *[TooManyError], one for each family that could not be
// formed; all others are there.
func Expand(m *model.Model) (*Set, []error) {
	s := &Set{Families: make([][]int, len(m.Families)), byName: map[string]int{}, bySpelling: map[string]int{}}
	s.addWritten(m, -1)
	var problems []error
	for f := range m.Families {
		known := s.addWritten(m, f)
		list, err := generate(m, f, known)
		if err != nil {
			problems = append(problems, err)
			continue
		}
		for _, arrangement := range list {
			name := m.Families[f].Name + "." + arrangement.name
			if _, taken := s.byName[name]; taken {
				name = m.Families[f].Name + "." + arrangement.otherName
			}
			for n := 2; ; n++ {
				if _, taken := s.byName[name]; !taken {
					break
				}
				name = fmt.Sprintf("%s.%s_%d", m.Families[f].Name, arrangement.otherName, n)
			}
			s.add(Combination{Name: name, Family: f, Factors: arrangement.factors, Equation: arrangement.equation, Written: -1})
		}
	}
	return s, problems
}

// addWritten adds the combinations written for a family and returns their
// factor keys.
func (s *Set) addWritten(m *model.Model, family int) map[string]bool {
	known := map[string]bool{}
	for w, c := range m.Combinations {
		if c.Family != family {
			continue
		}
		factors := slices.DeleteFunc(slices.Clone(c.Factors), func(f model.Factor) bool { return f.Factor == 0 })
		slices.SortFunc(factors, func(a, b model.Factor) int { return a.Case - b.Case })
		known[factorKey(factors)] = true
		s.add(Combination{Name: c.Name, Family: family, Factors: factors, Written: w})
	}
	return known
}

func (s *Set) add(c Combination) {
	at := len(s.All)
	s.All = append(s.All, c)
	if c.Family >= 0 {
		s.Families[c.Family] = append(s.Families[c.Family], at)
	}
	s.byName[c.Name] = at
	spelling := Spelling(c.Name)
	if _, taken := s.bySpelling[spelling]; taken {
		at = -1
	}
	s.bySpelling[spelling] = at
}

// generate returns the arrangements that a family's code asks for, without
// those in known.
func generate(m *model.Model, family int, known map[string]bool) ([]arrangement, error) {
	f := &m.Families[family]
	if f.Code == model.Written {
		return nil, nil
	}
	c, ok := codes()[f.Code]
	if !ok {
		return nil, &RuleError{family, fmt.Sprintf("Family %s asks for a code that is not known here.", f.Name)}
	}
	chosen, wrong := c.chosen(f)
	if wrong != nil {
		wrong.Family = family
		return nil, wrong
	}
	expressions := c.expressions(f.Situation, chosen)
	if len(expressions) == 0 {
		return nil, &RuleError{family, fmt.Sprintf("%s has no such combinations. EN 1990 has strength, characteristic, frequent and quasi-permanent; ASCE 7 has strength and allowable.", c.name)}
	}
	a := newArranger(m, f, c, chosen)
	a.seen = known
	for i := range expressions {
		err := a.expression(&expressions[i])
		if errors.Is(err, errTooMany) {
			return nil, &TooManyError{Family: family, Name: f.Name, Cases: len(m.Cases)}
		}
	}
	return a.found, nil
}

// Find returns the combination of this name, as an index into All. It takes
// the name itself, the name with a plain hyphen for its minus sign, and its
// spelling in letters ([Spelling]) where that is unambiguous.
func (s *Set) Find(name string) (int, bool) {
	if i, ok := s.byName[name]; ok {
		return i, true
	}
	if i, ok := s.byName[strings.ReplaceAll(name, "-", "−")]; ok {
		return i, true
	}
	if i, ok := s.bySpelling[Spelling(name)]; ok && i >= 0 {
		return i, true
	}
	return 0, false
}

// Spelling writes the name of a combination with letters, digits, underscores
// and dots alone, as the model language and shells want it: plus becomes _,
// the minus sign _low, followed by _ and what it is for: ULS.S+W is ULS.S_W,
// ULS.W− is ULS.W_low, ULS.W−G2 is ULS.W_low_G2.
func Spelling(name string) string {
	name = strings.ReplaceAll(name, "-", "−")
	var b strings.Builder
	for rest := name; rest != ""; {
		before, after, found := strings.Cut(rest, "−")
		b.WriteString(strings.ReplaceAll(before, "+", "_"))
		if !found {
			break
		}
		b.WriteString("_low")
		if after != "" && after[0] != '.' && !strings.HasPrefix(after, "−") {
			b.WriteString("_")
		}
		rest = after
	}
	return b.String()
}

// PsiOf returns the ψ factors that EN 1990 table A1.1 gives for an action;
// highSnow picks its row for snow above 1000 m.
func PsiOf(a Action, highSnow bool) Psi {
	return en1990Psi(a, options{ruleHighSnow: highSnow})
}

// Near returns the spellings of at most count combinations whose names are
// closest to a name that does not exist, the closest first. Names of other
// families, and names that differ in more than half of their letters, are not
// proposed.
func (s *Set) Near(name string, count int) []string {
	wanted := Spelling(name)
	family, _, _ := strings.Cut(wanted, ".")
	type candidate struct {
		spelling string
		distance int
	}
	var near []candidate
	for i := range s.All {
		spelling := Spelling(s.All[i].Name)
		if of, _, _ := strings.Cut(spelling, "."); of != family {
			continue
		}
		distance := levenshtein.ComputeDistance(strings.ToLower(wanted), strings.ToLower(spelling))
		if own := max(len(spelling)-len(family)-1, 1); distance <= max(own/2, 1) {
			near = append(near, candidate{spelling, distance})
		}
	}
	slices.SortStableFunc(near, func(a, b candidate) int { return a.distance - b.distance })
	var names []string
	for _, c := range near[:min(count, len(near))] {
		names = append(names, c.spelling)
	}
	return names
}
