package analysis

import (
	"spanwright/analysis/combine"
	"spanwright/analysis/envelope"
	"spanwright/lang/model"
)

// loading is a sum of load cases that is solved as such.
type loading struct {
	name    string
	factors []model.Factor
}

// caseLoadings are those of the load cases, each on its own.
func caseLoadings(m *model.Model) []loading {
	list := make([]loading, len(m.Cases))
	for i := range m.Cases {
		list[i] = loading{m.Cases[i].Name, []model.Factor{{Case: i, Factor: 1}}}
	}
	return list
}

// combinationLoadings are those of the combinations, where they cannot be
// superposed.
func combinationLoadings(set *combine.Set) []loading {
	list := make([]loading, len(set.All))
	for i := range set.All {
		list[i] = loading{set.All[i].Name, set.All[i].Factors}
	}
	return list
}

// superposedSubjects makes the cases and combinations of a structure in which
// everything may be superposed; state i is load case i.
func superposedSubjects(m *model.Model, set *combine.Set) []subject {
	var list []subject
	for i, l := range caseLoadings(m) {
		list = append(list, subject{name: l.name, combination: -1, factors: l.factors, sum: envelope.Sum{{State: i, Factor: 1}}})
	}
	for i, l := range combinationLoadings(set) {
		sum := make(envelope.Sum, len(l.factors))
		for k, f := range l.factors {
			sum[k] = envelope.Term{State: f.Case, Factor: f.Factor}
		}
		list = append(list, subject{name: l.name, combination: i, factors: l.factors, sum: sum})
	}
	return list
}

// ownSubjects makes the cases and combinations of a structure in which each is
// solved on its own. problems says of each why it has no result, or nothing;
// the states are those of the others, in order.
func ownSubjects(m *model.Model, set *combine.Set, problems []string) []subject {
	loadings := append(caseLoadings(m), combinationLoadings(set)...)
	list := make([]subject, len(loadings))
	states := 0
	for i, l := range loadings {
		list[i] = subject{name: l.name, combination: i - len(m.Cases), factors: l.factors, problem: problems[i]}
		if i < len(m.Cases) {
			list[i].combination = -1
		}
		if problems[i] == "" {
			list[i].sum = envelope.Sum{{State: states, Factor: 1}}
			states++
		}
	}
	return list
}
