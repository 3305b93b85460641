package combine

import (
	"fmt"
	"strings"

	"spanwright/lang/model"
)

// code is a code of practice as data.
type code struct {
	name string
	// permanentSymbol stands in names where only permanent cases act.
	permanentSymbol string
	// expressions returns those of a situation under the options of a family,
	// or none where the code does not know the situation.
	expressions func(model.Situation, options) []expression
	// gamma returns the partial factors of an action.
	gamma func(Action, options) partial
	// psi returns the combination factors of a variable action.
	psi func(Action, options) Psi
	// xi reduces unfavourable permanent actions where an expression says so.
	xi float64
	// apart are pairs of actions that the code never lets act together.
	apart [][2]Action
	// options are the words that a family may add, the first of each group the
	// default.
	options []Option
}

// Option is a word that a family may add to its code's name to pick among the
// code's alternatives.
type Option struct {
	Word string // as written: "6.10a/b"
	// Group holds the options that exclude each other.
	Group string
	Title string // what it does, with the source
}

// partial is an unfavourable and a favourable partial factor.
type partial struct{ unfavourable, favourable float64 }

// Psi are the factors for the combination, frequent and quasi-permanent value
// of a variable action.
type Psi [3]float64

// options are the words that a family adds to the name of its code.
type options map[string]bool

// codes returns the codes of practice.
func codes() map[model.Code]code {
	return map[model.Code]code{model.EN1990: en1990(), model.ASCE7: asce7()}
}

// Options returns the words that a family by this code may add, for checks and
// completion. The first of each group is what holds without any word.
func Options(c model.Code) []Option { return codes()[c].options }

// RuleError says that a family asks its code for something it does not have.
type RuleError struct {
	Family int // index into Model.Families
	Reason string
}

// Error names what the code does not have and what there is.
func (e *RuleError) Error() string { return e.Reason }

// chosen reads the rule of a family: words separated by commas. An empty rule
// chooses nothing.
func (c *code) chosen(family *model.Family) (options, *RuleError) {
	words := options{}
	groups := map[string]string{}
	for word := range strings.SplitSeq(family.Rule, ",") {
		word = strings.TrimSpace(word)
		if word == "" {
			continue
		}
		option, ok := c.option(word)
		if !ok {
			return nil, &RuleError{Reason: fmt.Sprintf("%s has no rule %q. It has %s.", c.name, word, c.optionWords())}
		}
		if other, taken := groups[option.Group]; taken && other != option.Word {
			return nil, &RuleError{Reason: fmt.Sprintf("%s and %s exclude each other. Keep one.", other, option.Word)}
		}
		groups[option.Group] = option.Word
		words[option.Word] = true
	}
	return words, nil
}

// option finds an option whose word differs by no more than case, blanks,
// hyphens and the name of the code.
func (c *code) option(word string) (Option, bool) {
	for _, o := range c.options {
		if bare := c.bare(word); bare == c.bare(o.Word) {
			return o, true
		}
	}
	return Option{}, false
}

func (c *code) bare(word string) string {
	squeeze := strings.NewReplacer(" ", "", "-", "", "_", "")
	whole := squeeze.Replace(strings.ToLower(word))
	publisher, _, _ := strings.Cut(strings.ToLower(c.name), " ")
	return strings.TrimPrefix(whole, publisher)
}

func (c *code) optionWords() string {
	words := make([]string, len(c.options))
	for i, o := range c.options {
		words[i] = o.Word
	}
	return strings.Join(words, ", ")
}

// expression is one rule of a code: permanent cases with their factor, and
// terms of which each adds actions.
type expression struct {
	equation string // for people: "EN 1990 (6.10)"
	label    string // goes into names before the cases, "" for none
	// unfavourable and favourable are the factors of permanent cases.
	unfavourable, favourable factor
	// low marks an expression that has the permanent cases at their least.
	low   bool
	terms []term
}

// pick says how many choices of a term act.
type pick int

const (
	one  pick = iota // exactly one
	most             // one or none
	any              // each or not
)

// term adds actions to an expression. An action that an earlier term has taken
// is not taken again.
type term struct {
	pick    pick
	choices []choice
	// leading marks the term whose cases come first in names; its factors are
	// the principal ones for overrides.
	leading bool
}

// choice is a set of cases with the factor that they take together: those of
// all its actions. At least one of them acts when it is chosen.
type choice struct {
	of     []Action
	factor factor
}

// factor is a number, times γ, ψ and ξ of the case where asked for.
type factor struct {
	number float64
	gamma  bool
	psi    int // 1 + index into Psi, or 0 for none
	xi     bool
}

// number is a plain factor.
func number(value float64) factor { return factor{number: value} }

// each makes a choice of every action.
func each(of []Action, f factor) []choice {
	list := make([]choice, len(of))
	for i, a := range of {
		list[i] = choice{[]Action{a}, f}
	}
	return list
}
