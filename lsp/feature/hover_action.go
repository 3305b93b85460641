package feature

import (
	"fmt"
	"math"
	"strings"

	"spanwright/analysis"
	"spanwright/analysis/combine"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
)

const (
	// mostNodeSums bounds the movements that a hover superposes.
	mostNodeSums = 200_000
	// mostCombinations bounds the combinations that a hover lists.
	mostCombinations = 12
)

// result writes what a load case or combination does to the structure.
func (h *hover) result(r analysis.Result) {
	if r.Problem() != "" {
		h.page.add(r.Problem())
		return
	}
	e := h.numbers.results.EnvelopeOf(r.Name(), []analysis.Result{r})
	h.page.add(h.sums(e)...)
	h.largestMovement(e)
	h.worst(e, h.everyMember())
}

// sums writes the sums of the reactions of an envelope.
func (h *hover) sums(e *analysis.Envelope) []string {
	n := h.numbers
	var least, most [3]float64
	for k, r := range e.Results() {
		reacted := r.Equilibrium().Reacted
		for f := range 3 {
			if k == 0 || reacted[f] < least[f] {
				least[f] = reacted[f]
			}
			if k == 0 || reacted[f] > most[f] {
				most[f] = reacted[f]
			}
		}
	}
	size := math.Max(math.Max(largest(least[:]), largest(most[:])), n.display.Force.Factor)
	var parts []string
	for f := range 3 {
		if math.Max(math.Abs(least[f]), math.Abs(most[f])) <= 1e-9*size {
			continue
		}
		least[f], most[f] = cleaned(least[f], size), cleaned(most[f], size)
		text := analysis.ForceNames[f] + " " + n.component(most[f], f, n.display.Force, true)
		if most[f]-least[f] > 1e-9*size {
			text = analysis.ForceNames[f] + " " + number(least[f], n.display.Force) + " … " + n.component(most[f], f, n.display.Force, true)
		}
		parts = append(parts, text)
	}
	if len(parts) == 0 {
		return nil
	}
	return []string{"Sum of the reactions " + strings.Join(parts, " · ")}
}

// largestMovement writes which node moves most.
func (h *hover) largestMovement(e *analysis.Envelope) {
	n := h.numbers
	results := e.Results()
	if len(results)*len(n.model.Nodes) > mostNodeSums {
		return
	}
	size, node, in := 0.0, -1, ""
	for _, r := range results {
		for i := range n.model.Nodes {
			u := r.Movement(i)
			if d := math.Sqrt(u[0]*u[0] + u[1]*u[1] + u[2]*u[2]); d > (1+1e-9)*size {
				size, node, in = d, i, r.Name()
			}
		}
	}
	if node < 0 || nothing(size, n.display.Movement) {
		h.page.add("No node moves.")
		return
	}
	text := fmt.Sprintf("Largest movement of a node %s at %s", quantity.Write(size, n.display.Movement, 3), n.model.Nodes[node].Name)
	if len(results) > 1 {
		text += " in " + code(in)
	}
	h.page.add(text)
}

// everyMember returns the indices of the members of the text's model, or none
// where there are too many to look through.
func (h *hover) everyMember() []int {
	if len(h.model.Members) > mostAsked {
		return nil
	}
	list := make([]int, len(h.model.Members))
	for i := range list {
		list[i] = i
	}
	return list
}

// combination writes what a combination is and does.
func (h *hover) combination(name string) {
	title := "**" + name + "** · combination"
	if !h.solved {
		h.page.add(title)
		return
	}
	r, ok := h.numbers.results.Find(name)
	if !ok || r.Combination() == nil {
		h.page.add(title)
		return
	}
	c := r.Combination()
	title += " = " + c.Words(h.numbers.model)
	if c.Equation != "" {
		title += " · " + c.Equation
	}
	h.page.add(title)
	h.result(r)
}

// codes are the names of the codes and what families ask of them.
var (
	codeTitles = map[model.Code]string{model.Written: "written combinations", model.EN1990: "EN 1990", model.ASCE7: "ASCE 7"}
	situations = map[model.Situation]string{model.Strength: "strength", model.Characteristic: "characteristic", model.Frequent: "frequent",
		model.QuasiPermanent: "quasi-permanent", model.Allowable: "allowable stress"}
)

// family writes the combinations of a family and what governs over all of them.
func (h *hover) family(d *resolve.Definition) {
	m := h.model
	i := indexOf(m.Families, fullName(d), func(f *model.Family) string { return f.Name })
	if i < 0 {
		h.page.add("**" + d.Name + "** · family of combinations")
		return
	}
	f := &m.Families[i]
	title := "**" + f.Name + "** · family of combinations, " + codeTitles[f.Code]
	if f.Code != model.Written {
		title += " " + situations[f.Situation]
	}
	h.page.add(title)
	if !h.solved {
		return
	}
	n := h.numbers
	k := indexOf(n.model.Families, f.Name, func(f *model.Family) string { return f.Name })
	if k < 0 {
		return
	}
	e := n.results.Envelope(k)
	if e.Empty() {
		h.page.add("It has no combinations.")
		return
	}
	h.page.add(h.sums(e)...)
	h.largestMovement(e)
	h.worst(e, h.everyMember())
	h.page.add(h.combinations(k))
}

// combinations lists those of a family with their factors.
func (h *hover) combinations(family int) string {
	n := h.numbers
	set := n.results.Combinations()
	members := set.Families[family]
	var lines []string
	for _, c := range members[:min(len(members), mostCombinations)] {
		lines = append(lines, fmt.Sprintf("%s = %s", set.All[c].Name, set.All[c].Words(n.model)))
	}
	if more := len(members) - len(lines); more > 0 {
		lines = append(lines, fmt.Sprintf("… %d more", more))
	}
	return counted(len(members), "combination") + ":\n\n" + block(strings.Join(lines, "\n"))
}

// generated writes about a combination that a code asks for: the text names it,
// but nothing declares it.
func (h *hover) generated(name string) bool {
	if !h.solved {
		return false
	}
	i, ok := h.numbers.results.Combinations().Find(name)
	if !ok {
		return false
	}
	h.combination(combine.Spelling(h.numbers.results.Combinations().All[i].Name))
	return true
}

// whole writes about the model: size, solve, trust, limits.
func (h *hover) whole() {
	m := h.model
	kind := "space"
	if m.Plane {
		kind = "plane"
	}
	title := m.Title
	if title == "" {
		title = "Model"
	}
	h.page.add(fmt.Sprintf("**%s** · %s, %s, %s, %s, %s", title, kind, counted(len(m.Nodes), "node"), counted(len(m.Members), "member"),
		counted(len(m.Supports), "support"), counted(len(m.Cases), "load case")))
	if !h.solved {
		return
	}
	n := h.numbers
	t := n.results.Trust()
	h.page.add(fmt.Sprintf("%d freedoms · equilibrium %s · backward error %s · condition %s", n.results.Freedoms(),
		quantity.Number(t.Residual, 1), quantity.Number(t.BackwardError, 1), quantity.Number(t.Condition, 1)))
	if len(n.solution.Limits) > 0 {
		broken, unchecked := analysis.Broken(n.solution.Limits)
		text := fmt.Sprintf("%s: %d broken", counted(len(n.solution.Limits), "limit"), broken)
		if unchecked > 0 {
			text += fmt.Sprintf(", %d not checked", unchecked)
		}
		if i := n.solution.Effect.Limit; i >= 0 {
			text += ". The one used most: " + n.results.Words(n.solution.Limits[i])
		}
		h.page.add(text)
	}
}
