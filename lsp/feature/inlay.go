package feature

import (
	"fmt"
	"math"
	"strings"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// Hint is a number at the end of a statement.
type Hint struct {
	At      int // offset, right behind the statement
	Label   string
	Tooltip string // Markdown; says which version the number belongs to
}

// HintSwitches say which hints are wanted.
type HintSwitches struct{ Supports, Members, Limits, Lets, Cases bool }

// AllHints has all of them on.
func AllHints() HintSwitches { return HintSwitches{true, true, true, true, true} }

// Hints returns the numbers beside the statements of a part of a file. Numbers
// that belong to an earlier text end in "…" while a solve is running, and in
// "(old)" where the text has errors.
func Hints(s *workspace.Snapshot, path string, part source.Span, on HintSwitches) []Hint {
	v, ok := s.View(path)
	if !ok {
		return nil
	}
	file := v.Resolved.FileIndex(path)
	if file < 0 {
		return nil
	}
	h := hinter{view: &v, tree: v.Resolved.Trees[file], file: file, part: part}
	h.numbers, h.solved = numbersOf(&v)
	m := v.Resolved.Model
	if on.Lets {
		h.lets(m)
	}
	if !h.solved {
		return h.list
	}
	if on.Supports {
		h.supports(m)
	}
	if on.Members {
		h.members(m)
	}
	if on.Limits {
		h.limits(m)
	}
	if on.Cases {
		h.cases(m)
	}
	return h.list
}

type hinter struct {
	view    *workspace.View
	tree    *syntax.Tree
	file    int
	part    source.Span
	numbers *numbers
	solved  bool
	list    []Hint
}

// here reports whether a thing stands in the part that is asked about, and not
// in a placed part, where one line stands for several things.
func (h *hinter) here(o model.Origin) bool {
	return o.File == h.file && o.Place < 0 && o.Statement.Start <= h.part.End && o.Statement.End >= h.part.Start
}

// mark says how old numbers are.
func (h *hinter) mark() string {
	switch h.view.State {
	case workspace.Current:
		return ""
	case workspace.Overtaken:
		return " …"
	}
	return " (old)"
}

func (h *hinter) add(o model.Origin, label, tooltip string) {
	h.list = append(h.list, Hint{At: o.Statement.End, Label: label + h.mark(), Tooltip: tooltip + "\n\n" + h.view.Words()})
}

// lets shows what expressions come to, not plain numbers.
func (h *hinter) lets(m *model.Model) {
	for i := range m.Lets {
		l := &m.Lets[i]
		if !h.here(l.Origin) || len(l.Values) == 0 {
			continue
		}
		u := h.tree.UnitAt(l.Origin.Statement.Start)
		if u < 0 {
			continue
		}
		let, ok := h.tree.Units[u].Statement.Tree.(*syntax.LetStatement)
		if !ok || let.Value == nil || plainNumber(let.Value.Root) {
			continue
		}
		h.list = append(h.list, Hint{At: l.Origin.Statement.End, Label: "= " + showAll(m.Display, l.Values)})
	}
}

// plainNumber reports whether an expression is one number with its unit, so
// that there is nothing to say about it.
func plainNumber(n syntax.Node) bool {
	numbers, plain := 0, true
	syntax.Walk(n, func(n syntax.Node) {
		switch x := n.(type) {
		case *syntax.CallNode, *syntax.VectorNode:
			plain = false
		case *syntax.NameNode:
			plain = plain && syntax.UnitSymbol(x.Text)
		case *syntax.NumberNode:
			numbers++
		}
	})
	return plain && numbers <= 1
}

// showAll writes a scalar, or a vector in one unit.
func showAll(d quantity.Display, values []quantity.Quantity) string {
	if len(values) == 1 {
		return d.Show(values[0])
	}
	u := d.For(values[0].Dimension)
	parts := make([]string, len(values))
	for i, v := range values {
		parts[i] = number(v.Value, u)
	}
	text := "(" + strings.Join(parts, ", ") + ")"
	if u.Symbol != "" {
		text += " " + u.Symbol
	}
	return text
}

// supports shows the largest reactions of the first family.
func (h *hinter) supports(m *model.Model) {
	e, ok := h.numbers.first()
	if !ok {
		return
	}
	seen := map[int]bool{}
	for i := range m.Supports {
		s := &m.Supports[i]
		if !h.here(s.Origin) || seen[s.Node] {
			continue
		}
		seen[s.Node] = true
		node := h.numbers.solution.Node(m.Nodes[s.Node].Name)
		if node < 0 {
			continue
		}
		label, tooltip := h.reaction(e, node)
		if label != "" {
			h.add(s.Origin, label, tooltip)
		}
	}
}

// reaction writes the largest part of each force and moment that a support
// gives, of a force in both directions: whether a support is ever pulled matters
// more than by how much it is pressed.
func (h *hinter) reaction(e *analysis.Envelope, node int) (label, tooltip string) {
	n := h.numbers
	bands := e.Reaction(node)
	var size [2]float64
	for f, b := range bands {
		size[f/3] = math.Max(size[f/3], math.Abs(b.Largest().Value))
	}
	size[1] = math.Max(size[1], 1e-3*size[0]) // what is less at an arm of 1 mm is rounding
	var parts []string
	tooltip = "Largest reactions in " + e.Name() + " (what the support does to the structure):"
	for _, f := range n.freedoms() {
		sides := []analysis.Governed{bands[f].Largest()}
		if other := bands[f].Least; f < 3 && bands[f].Most.Value > 0 && other.Value < 0 {
			if sides[0] == other {
				other = bands[f].Most
			}
			sides = append(sides, other)
		}
		var texts []string
		for _, g := range sides {
			value := cleaned(g.Value, size[f/3])
			if nothing(value, n.forceUnit(f)) {
				continue
			}
			texts = append(texts, n.directed(value, f))
			tooltip += fmt.Sprintf("\n- %s %s in %s", analysis.ForceNames[f], n.component(value, f, n.forceUnit(f), true), n.name(g))
		}
		if len(texts) > 0 {
			parts = append(parts, strings.Join(texts, " ")+" "+n.forceUnit(f).Symbol)
		}
	}
	return strings.Join(parts, "  "), tooltip
}

// members shows the governing moment, or the axial force where there is none,
// and the share of the yield strength.
func (h *hinter) members(m *model.Model) {
	e, ok := h.numbers.first()
	if !ok {
		return
	}
	for i := range m.Members {
		b := &m.Members[i]
		if !h.here(b.Origin) {
			continue
		}
		member := h.numbers.solution.Member(b.Name)
		if member < 0 || h.numbers.model.Members[member].Kind != b.Kind {
			continue
		}
		if label, tooltip := h.governing(e, member); label != "" {
			h.add(b.Origin, label, tooltip)
		}
	}
}

func (h *hinter) governing(e *analysis.Envelope, member int) (label, tooltip string) {
	n := h.numbers
	var shown *analysis.Governing
	share := 0.0
	tooltip = "Governs in " + e.Name() + ":"
	bar := n.model.Members[member].Kind == model.Bar
	list := n.governing(e, member)
	for i := range list {
		g := &list[i]
		moment := g.Quantity == analysis.My || g.Quantity == analysis.Mz
		switch {
		case g.Quantity == analysis.NormalStress:
			share = g.Share
		case bar && g.Quantity == analysis.N, !bar && moment, !bar && shown == nil && g.Quantity == analysis.N:
			if shown == nil || shown.Quantity == analysis.N && moment || shown.Quantity == g.Quantity && math.Abs(g.Value) > math.Abs(shown.Value) ||
				moment && shown.Quantity != analysis.N && math.Abs(g.Value) > math.Abs(shown.Value) {
				shown = g
			}
		}
	}
	if shown == nil {
		return "", ""
	}
	u := n.unitOf(shown.Quantity)
	label = fmt.Sprintf("%s %s", shown.Quantity, quantity.Write(shown.Value, u, 3))
	if share > 0 {
		label += " · " + percent(share)
	}
	tooltip += fmt.Sprintf("\n- %s %s at %s in %s", shown.Quantity, quantity.Write(shown.Value, u, 3), analysis.PlaceWords(n.model, member, shown.At), n.name(shown.Governed))
	if share > 0 {
		kind := "elastic stress"
		if bar {
			kind = "axial stress"
		}
		tooltip += "\n- " + kind + ": " + percent(share) + " of yield"
	}
	return label, tooltip
}

// limits shows value, bound and share.
func (h *hinter) limits(m *model.Model) {
	for i := range m.Limits {
		l := &m.Limits[i]
		if !h.here(l.Origin) {
			continue
		}
		if answer, ok := h.numbers.limitAnswer(l); ok {
			h.limit(l, answer)
		}
	}
}

func (h *hinter) limit(l *model.Limit, answer *analysis.Limit) {
	n := h.numbers
	if answer.Governs.Result < 0 {
		h.add(l.Origin, "not checked", answer.Problem)
		return
	}
	u := analysis.MeasureUnit(n.display, l)
	label := fmt.Sprintf("%s of %s", number(answer.Governs.Value, u), quantity.Write(answer.Governs.Bound, u, 3))
	if answer.Governs.Bound == 0 {
		label = quantity.Write(answer.Governs.Value, u, 3) // there is no share of nothing
	} else if share := analysis.ShareWords(answer.Governs.Ratio); share != "" {
		label += " · " + share
	}
	if !answer.Holds {
		label += " · over"
	}
	h.add(l.Origin, label, n.results.Words(*answer))
}

// cases shows what the loads of a case come to.
func (h *hinter) cases(m *model.Model) {
	for i := range m.Cases {
		c := &m.Cases[i]
		if !h.here(c.Origin) {
			continue
		}
		index := h.numbers.solution.Case(c.Name)
		if index < 0 || h.numbers.results.Case(index).Problem() != "" {
			continue
		}
		applied := h.numbers.results.Case(index).Equilibrium().Applied
		h.add(c.Origin, h.resultant(applied), "Sum of the loads of "+c.Name+": "+forceWords(h.numbers.model, applied))
	}
}

// resultant writes the parts of a force with arrows: "→ 12 kN  ↓ 62.4 kN".
func (h *hinter) resultant(total [6]float64) string {
	n := h.numbers
	largest := math.Max(math.Abs(total[0]), math.Max(math.Abs(total[1]), math.Abs(total[2])))
	if largest == 0 {
		return "sum 0"
	}
	var parts []string
	for f := range 3 {
		if math.Abs(total[f]) < 1e-9*largest {
			continue
		}
		parts = append(parts, n.directed(total[f], f)+" "+n.display.Force.Symbol)
	}
	return strings.Join(parts, "  ")
}
