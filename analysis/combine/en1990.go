package combine

import "spanwright/lang/model"

// The options of families by EN 1990.
const (
	ruleSimple    = "6.10"
	ruleSplit     = "6.10a/b"
	ruleStrength  = "STR"
	ruleBalance   = "EQU"
	ruleGround    = "GEO"
	ruleHighSnow  = "high-snow"
	ruleLowSnow   = "low-snow"
	ruleOneSource = "one-source"
	ruleEachCase  = "each-case"
)

// en1990 is EN 1990:2002 with amendment A1:2005, buildings (annex A1), with
// the recommended values. All values from memory of the standard.
func en1990() code {
	return code{
		name:            "EN 1990",
		permanentSymbol: "G",
		expressions:     en1990Expressions,
		gamma:           en1990Gamma,
		psi:             en1990Psi,
		xi:              0.85, // EN 1990 table A1.2(B), note 2
		// EN 1991-1-1, 3.3.2(1): imposed loads on roofs (category H) are not
		// applied together with snow or wind.
		apart: [][2]Action{{imposedOf('H'), snow}, {imposedOf('H'), wind}},
		options: []Option{
			{ruleSimple, "expression", "expression (6.10)"},
			{ruleSplit, "expression", "expressions (6.10a) and (6.10b)"},
			{ruleStrength, "set", "strength, table A1.2(B)"},
			{ruleBalance, "set", "static equilibrium, table A1.2(A)"},
			{ruleGround, "set", "ground, table A1.2(C)"},
			{ruleLowSnow, "snow", "snow at sites up to 1000 m, table A1.1"},
			{ruleHighSnow, "snow", "snow at sites above 1000 m and in the Nordic countries, table A1.1"},
			{ruleEachCase, "source", "each permanent case is a source of its own"},
			{ruleOneSource, "source", "all permanent cases are one source, table A1.2(B) note 3"},
		},
	}
}

// en1990PsiTable is EN 1990 table A1.1.
var en1990PsiTable = map[Action]Psi{
	imposedOf('A'): {0.7, 0.5, 0.3}, // domestic
	imposedOf('B'): {0.7, 0.5, 0.3}, // offices
	imposedOf('C'): {0.7, 0.7, 0.6}, // congregation
	imposedOf('D'): {0.7, 0.7, 0.6}, // shopping
	imposedOf('E'): {1.0, 0.9, 0.8}, // storage
	imposedOf('F'): {0.7, 0.7, 0.6}, // traffic, vehicles up to 30 kN
	imposedOf('G'): {0.7, 0.5, 0.3}, // traffic, vehicles of 30 to 160 kN
	imposedOf('H'): {0, 0, 0},       // roofs
	// Without a category: the highest of A to D, F and G.
	imposedOf(0): {0.7, 0.7, 0.6},
	snow:         {0.5, 0.2, 0}, // sites up to 1000 m
	wind:         {0.6, 0.2, 0},
	thermal:      {0.6, 0.5, 0}, // not in fire
}

// en1990HighSnow is the row of table A1.1 for sites above 1000 m, and for
// Finland, Iceland, Norway and Sweden.
var en1990HighSnow = Psi{0.7, 0.5, 0.2}

func en1990Psi(a Action, o options) Psi {
	if a == snow && o[ruleHighSnow] {
		return en1990HighSnow
	}
	return en1990PsiTable[a]
}

// en1990Gamma returns γ of EN 1990 tables A1.2(A), (B) and (C).
//
// Settlements count as permanent actions (EN 1993-1-1, 2.3.1(4); EN 1992-1-1,
// 2.3.1.3 allows 1.2 for linear analysis) that are left out where they help.
func en1990Gamma(a Action, o options) partial {
	permanent, variable := partial{1.35, 1.0}, 1.5
	switch {
	case o[ruleBalance]:
		permanent = partial{1.10, 0.90}
	case o[ruleGround]:
		permanent, variable = partial{1.0, 1.0}, 1.3
	}
	switch a.Kind {
	case model.Permanent:
		return permanent
	case model.Settlement:
		return partial{permanent.unfavourable, 0}
	}
	return partial{variable, 0}
}

func en1990Expressions(s model.Situation, o options) []expression {
	settles := term{pick: any, choices: []choice{{[]Action{settlement}, number(1)}}}
	// service has γ = 1: a leading action by one factor, the others by another.
	service := func(equation string, leading, others int) []expression {
		base := expression{equation: equation, unfavourable: number(1), favourable: number(1)}
		return []expression{base.with(settles), base.with(
			term{pick: one, leading: true, choices: each(variableActions(), factor{number: 1, psi: leading})},
			term{pick: any, choices: each(variableActions(), factor{number: 1, psi: others})},
			settles)}
	}
	switch s {
	case model.Strength:
		return en1990Strength(o)
	case model.Characteristic:
		return service("EN 1990 (6.14b)", 0, 1)
	case model.Frequent:
		return service("EN 1990 (6.15b)", 2, 3)
	case model.QuasiPermanent:
		base := expression{equation: "EN 1990 (6.16b)", unfavourable: number(1), favourable: number(1)}
		return []expression{base.with(
			term{pick: any, choices: each(variableActions(), factor{number: 1, psi: 3})},
			settles)}
	}
	return nil
}

// en1990Strength holds the persistent, accidental and seismic situations.
func en1990Strength(o options) []expression {
	gamma := factor{number: 1, gamma: true}
	gammaPsi0 := factor{number: 1, gamma: true, psi: 1}
	settles := term{pick: any, choices: []choice{{[]Action{settlement}, gamma}}}
	leading := term{pick: one, leading: true, choices: each(variableActions(), gamma)}
	others := term{pick: any, choices: each(variableActions(), gammaPsi0)}

	var list []expression
	if o[ruleSplit] {
		a := expression{equation: "EN 1990 (6.10a)", label: "a", unfavourable: gamma, favourable: gamma}
		b := expression{equation: "EN 1990 (6.10b)", label: "b", unfavourable: factor{number: 1, gamma: true, xi: true}, favourable: gamma}
		list = append(list, a.with(others, settles), b.with(leading, others, settles))
	} else {
		base := expression{equation: "EN 1990 (6.10)", unfavourable: gamma, favourable: gamma}
		list = append(list, base.with(settles), base.with(leading, others, settles))
	}

	// Accidental (6.11b): the main variable action by ψ1, the others by ψ2
	// (table A1.3; ψ1 for the main one is the safe choice of the two).
	event := term{pick: one, leading: true, choices: each([]Action{accidental}, number(1))}
	main := term{pick: one, leading: true, choices: each(variableActions(), factor{number: 1, psi: 2})}
	quasi := term{pick: any, choices: each(variableActions(), factor{number: 1, psi: 3})}
	sinks := term{pick: any, choices: []choice{{[]Action{settlement}, number(1)}}}
	crash := expression{equation: "EN 1990 (6.11b)", unfavourable: number(1), favourable: number(1)}
	// Earthquake (6.12b).
	quake := expression{equation: "EN 1990 (6.12b)", unfavourable: number(1), favourable: number(1)}
	shock := term{pick: one, leading: true, choices: each([]Action{earthquake}, number(1))}
	return append(list, crash.with(event, sinks), crash.with(event, main, quasi, sinks), quake.with(shock, quasi, sinks))
}

// with returns the expression with these terms.
func (e expression) with(terms ...term) expression {
	e.terms = terms
	return e
}
