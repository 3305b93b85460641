package combine

import (
	"errors"
	"slices"
	"strings"

	"spanwright/lang/model"
)

// MaxPerFamily is the number of combinations above which a family is refused:
// far beyond what anybody reads, well within what can be superposed.
const MaxPerFamily = 2000

// maxSteps bounds the walk through arrangements, duplicates included.
const maxSteps = 100 * MaxPerFamily

var errTooMany = errors.New("too many combinations")

// arranger walks through the arrangements of one family. Its slices over cases
// are indexed as Model.Cases.
type arranger struct {
	m         *model.Model
	family    *model.Family
	code      code
	options   options
	permanent []int            // permanent cases, by name
	parts     map[Action][]int // the other cases of each action, by name
	excludes  [][]int          // the cases that each case never acts with

	// The arrangement under way.
	factors []float64 // 0: the case does not act
	leading []int     // in the order chosen
	others  []int
	taken   map[Action]bool

	steps int
	found []arrangement
	seen  map[string]bool
}

// arrangement is one outcome of the walk.
type arrangement struct {
	factors   []model.Factor
	name      string // without the family's
	equation  string
	otherName string // for the case that another arrangement has the name
}

func newArranger(m *model.Model, family *model.Family, c code, o options) *arranger {
	a := &arranger{
		m: m, family: family, code: c, options: o,
		parts:    map[Action][]int{},
		excludes: exclusions(m, c.apart),
		factors:  make([]float64, len(m.Cases)),
		taken:    map[Action]bool{},
		seen:     map[string]bool{},
	}
	for _, i := range casesByName(m) {
		if m.Cases[i].Kind == model.Permanent {
			a.permanent = append(a.permanent, i)
			continue
		}
		action := ActionOf(&m.Cases[i])
		a.parts[action] = append(a.parts[action], i)
	}
	return a
}

// casesByName returns the indices of all cases in the order of their names, so
// that nothing depends on the order of statements.
func casesByName(m *model.Model) []int {
	order := make([]int, len(m.Cases))
	for i := range order {
		order[i] = i
	}
	slices.SortFunc(order, func(i, j int) int { return strings.Compare(m.Cases[i].Name, m.Cases[j].Name) })
	return order
}

// exclusions lists for each case those that it never acts with: alternates,
// and the actions that the code holds apart.
func exclusions(m *model.Model, apart [][2]Action) [][]int {
	list := make([][]int, len(m.Cases))
	for _, alternate := range m.Alternates {
		for _, i := range alternate.Cases {
			for _, j := range alternate.Cases {
				if i != j {
					list[i] = append(list[i], j)
				}
			}
		}
	}
	for i := range m.Cases {
		for j := range m.Cases {
			a, b := ActionOf(&m.Cases[i]), ActionOf(&m.Cases[j])
			if slices.Contains(apart, [2]Action{a, b}) || slices.Contains(apart, [2]Action{b, a}) {
				list[i] = append(list[i], j)
			}
		}
	}
	return list
}

// expression walks through the arrangements of one expression.
func (a *arranger) expression(e *expression) error { return a.term(e, 0) }

// term walks through the picks of term number t and all after it.
func (a *arranger) term(e *expression, t int) error {
	if t == len(e.terms) {
		return a.emit(e)
	}
	term := &e.terms[t]
	if term.pick == any {
		return a.eachOrNot(e, t, 0)
	}
	if term.pick == most {
		if err := a.term(e, t+1); err != nil {
			return err
		}
	}
	for c := range term.choices {
		next := func() error { return a.term(e, t+1) }
		if err := a.choose(term, &term.choices[c], next); err != nil {
			return err
		}
	}
	return nil
}

// eachOrNot walks through taking or leaving the choices of term t from number
// c on.
func (a *arranger) eachOrNot(e *expression, t, c int) error {
	term := &e.terms[t]
	if c == len(term.choices) {
		return a.term(e, t+1)
	}
	next := func() error { return a.eachOrNot(e, t, c+1) }
	if err := next(); err != nil {
		return err
	}
	return a.choose(term, &term.choices[c], next)
}

// choose walks through all ways in which at least one case of the choice acts.
func (a *arranger) choose(t *term, c *choice, next func() error) error {
	var cases []int
	for _, action := range c.of {
		if !a.taken[action] {
			cases = append(cases, a.parts[action]...)
		}
	}
	if len(cases) == 0 {
		return nil
	}
	free := c.of[:0:0]
	for _, action := range c.of {
		if !a.taken[action] {
			free = append(free, action)
			a.taken[action] = true
		}
	}
	err := a.subset(t, c, cases, false, next)
	for _, action := range free {
		delete(a.taken, action)
	}
	return err
}

// subset walks through the subsets of cases; acts says that one acts already.
func (a *arranger) subset(t *term, c *choice, cases []int, acts bool, next func() error) error {
	if a.steps++; a.steps > maxSteps {
		return errTooMany
	}
	if len(cases) == 0 {
		if !acts {
			return nil
		}
		return next()
	}
	i := cases[0]
	if f := a.variableFactor(i, c.factor, t.leading); f != 0 && a.mayAct(i) {
		list := &a.others
		if t.leading {
			list = &a.leading
		}
		a.factors[i] = f
		*list = append(*list, i)
		err := a.subset(t, c, cases[1:], true, next)
		*list = (*list)[:len(*list)-1]
		a.factors[i] = 0
		if err != nil {
			return err
		}
	}
	return a.subset(t, c, cases[1:], acts, next)
}

func (a *arranger) mayAct(i int) bool {
	return !slices.ContainsFunc(a.excludes[i], func(j int) bool { return a.factors[j] != 0 })
}

// add keeps the arrangement under way unless it is empty or there already.
func (a *arranger) add(e *expression, suffix string) error {
	var factors []model.Factor
	for i, f := range a.factors {
		if f != 0 {
			factors = append(factors, model.Factor{Case: i, Factor: f})
		}
	}
	key := factorKey(factors)
	if len(factors) == 0 || a.seen[key] {
		return nil
	}
	a.seen[key] = true
	if len(a.found) == MaxPerFamily {
		return errTooMany
	}
	name := a.actingName() + suffix
	if e.label != "" {
		name = e.label + "." + name
	}
	number := strings.Trim(e.equation[strings.LastIndex(e.equation, " ")+1:], "()")
	a.found = append(a.found, arrangement{
		factors: factors, name: name, equation: e.equation,
		otherName: name + "." + strings.Map(identifierRune, number),
	})
	return nil
}

// identifierRune keeps what a name may hold.
func identifierRune(r rune) rune {
	if r >= '0' && r <= '9' || r >= 'a' && r <= 'z' || r >= 'A' && r <= 'Z' {
		return r
	}
	return '_'
}

// actingName joins the names of the cases that act beside the permanent ones.
// A permanent case that has alternates is named with them.
func (a *arranger) actingName() string {
	var names, others []string
	for _, i := range a.leading {
		names = append(names, a.m.Cases[i].Name)
	}
	named := func(i int) { others = append(others, a.m.Cases[i].Name) }
	ranked := len(a.leading) > 0
	for _, i := range a.others {
		named(i)
		ranked = ranked || a.m.Cases[i].Kind != model.Settlement
	}
	for _, i := range a.permanent {
		if len(a.excludes[i]) > 0 && a.factors[i] != 0 {
			named(i)
		}
	}
	if !ranked {
		names = append(names, a.code.permanentSymbol)
	}
	slices.Sort(others)
	return strings.Join(append(names, others...), "+")
}
