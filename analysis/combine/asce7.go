package combine

import "spanwright/lang/model"

// The options of families by ASCE 7.
const (
	ruleASCE16 = "7-16"
	ruleASCE22 = "7-22"
)

// asce7 is ASCE/SEI 7, chapter 2, editions 2016 (the default) and 2022. All
// values from memory of the standard.
//
// Imposed loads of category H are roof live loads Lr, all others are live
// loads L, taken with 1.0 in strength combinations 3 and 4 (the reduction to
// 0.5 of 2.3.1, exception 1, can be had with an override of psi0). Thermal and
// settlement cases are self-straining loads T. Rain, fluids, soil, ice and
// tornado have no kind of case; they are written by hand.
//
// gamma overrides the factor of a variable load where it leads, psi0 where it
// accompanies; for permanent cases gamma replaces the higher and the lower
// factor of the dead load (1.2 and 0.9, allowable 1.0 and 0.6).
func asce7() code {
	return code{
		name:            "ASCE 7",
		permanentSymbol: "D",
		expressions:     asce7Expressions,
		gamma:           func(Action, options) partial { return partial{1, 1} },
		psi:             func(Action, options) Psi { return Psi{1, 1, 1} },
		xi:              1,
		options: []Option{
			{ruleASCE16, "edition", "ASCE/SEI 7-16"},
			{ruleASCE22, "edition", "ASCE/SEI 7-22, snow at strength level"},
		},
	}
}

// asce7Snow are the factors of snow that changed between the editions.
type asce7Snow struct {
	principal, companion, seismic, extraordinary float64 // 2.3.1, 2.3.6, 2.5.2
	service, serviceSeismic                      float64 // 2.4.1 (beside 0.75 or 1), 2.4.5
}

func asce7SnowOf(o options) asce7Snow {
	if o[ruleASCE22] {
		return asce7Snow{principal: 1.0, companion: 0.3, seismic: 0.15, extraordinary: 0.15, service: 0.7, serviceSeismic: 0.1}
	}
	return asce7Snow{principal: 1.6, companion: 0.5, seismic: 0.2, extraordinary: 0.2, service: 1.0, serviceSeismic: 0.75}
}

// load is one choice with a plain factor.
func load(value float64, of ...Action) choice { return choice{of, number(value)} }

// live are the loads L: imposed on floors.
func live(value float64) choice { return load(value, imposedBelow()...) }

// strain are the self-straining loads T.
func strain(value float64) choice { return load(value, thermal, settlement) }

// roofs is "(Lr or S)".
func roofs(lr, s float64) []choice { return []choice{load(lr, imposedOf('H')), load(s, snow)} }

func leads(choices ...choice) term { return term{pick: one, leading: true, choices: choices} }
func needs(choices ...choice) term { return term{pick: one, choices: choices} }
func may(choices ...choice) term   { return term{pick: most, choices: choices} }

func asce7Expressions(s model.Situation, o options) []expression {
	switch s {
	case model.Strength:
		return asce7Strength(asce7SnowOf(o))
	case model.Allowable:
		return asce7Allowable(asce7SnowOf(o))
	}
	return nil
}

// dead is a combination of dead load by one factor and further terms.
func dead(equation string, value float64, terms ...term) expression {
	return expression{equation: "ASCE 7 " + equation, unfavourable: number(value), favourable: number(value), terms: terms}
}

// least is dead, where the dead load helps.
func least(equation string, value float64, terms ...term) expression {
	e := dead(equation, value, terms...)
	e.low = true
	return e
}

// asce7Strength are the combinations of 2.3.1, 2.3.4 (commentary C2.3.4), 2.3.6
// (the vertical seismic effect belongs in the earthquake case) and 2.5.2.
func asce7Strength(s asce7Snow) []expression {
	quake, event := load(1, earthquake), load(1, accidental)
	companions := roofs(0.5, s.companion)
	return []expression{
		dead("2.3.1-1", 1.4),
		dead("2.3.1-2", 1.2, leads(live(1.6)), may(companions...)),
		dead("2.3.1-3", 1.2, leads(roofs(1.6, s.principal)...), may(live(1), load(0.5, wind))),
		dead("2.3.1-4", 1.2, leads(load(1, wind)), may(live(1)), may(companions...)),
		least("2.3.1-5", 0.9, leads(load(1, wind))),
		dead("2.3.6-6", 1.2, leads(quake), may(live(1)), may(load(s.seismic, snow))),
		least("2.3.6-7", 0.9, leads(quake)),
		dead("C2.3.4", 1.2, leads(strain(1.2)), may(live(0.5))),
		dead("C2.3.4", 1.2, leads(live(1.6)), needs(strain(1))),
		dead("2.5-1", 1.2, leads(event), may(live(0.5)), may(load(s.extraordinary, snow))),
		least("2.5-1", 0.9, leads(event), may(live(0.5)), may(load(s.extraordinary, snow))),
	}
}

// asce7Allowable are the combinations of 2.4.1, 2.4.4 (commentary C2.4.4) and
// 2.4.5. Those with 0.75 need two loads: with one alone they lie between
// combinations that are in the list.
func asce7Allowable(s asce7Snow) []expression {
	quake, shared := load(0.7, earthquake), load(0.525, earthquake)
	roof, most := roofs(1, s.service), roofs(0.75, 0.75*s.service)
	return []expression{
		dead("2.4.1-1", 1),
		dead("2.4.1-2", 1, leads(live(1))),
		dead("2.4.1-3", 1, leads(roof...)),
		dead("2.4.1-4", 1, leads(live(0.75)), needs(most...)),
		dead("2.4.1-5", 1, leads(load(0.6, wind))),
		dead("2.4.1-6", 1, leads(load(0.75*0.6, wind)), needs(live(0.75)), may(most...)),
		dead("2.4.1-6", 1, leads(load(0.75*0.6, wind)), needs(most...)),
		least("2.4.1-7", 0.6, leads(load(0.6, wind))),
		dead("2.4.5-8", 1, leads(quake)),
		dead("2.4.5-9", 1, leads(shared), needs(live(0.75)), may(load(s.serviceSeismic, snow))),
		dead("2.4.5-9", 1, leads(shared), needs(load(s.serviceSeismic, snow))),
		least("2.4.5-10", 0.6, leads(quake)),
		dead("C2.4.4", 1, leads(strain(1))),
		dead("C2.4.4", 1, leads(live(0.75)), needs(strain(0.75))),
	}
}
