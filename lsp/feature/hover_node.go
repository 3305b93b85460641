package feature

import (
	"fmt"
	"math"
	"slices"
	"strings"

	"spanwright/analysis"
	"spanwright/analysis/frame"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
)

const (
	// mostCases bounds the rows of single cases in a hover.
	mostCases = 12
	// mostFreedomsAsked bounds the models whose stiffness a hover works out: it
	// must not take longer than a moment.
	mostFreedomsAsked = 5000
)

func (h *hover) node(d *resolve.Definition) {
	m := h.model
	i := indexOf(m.Nodes, fullName(d), func(n *model.Node) string { return n.Name })
	if i < 0 {
		h.page.add("**" + d.Name + "** · node")
		return
	}
	h.page.add("**" + m.Nodes[i].Name + "** · " + h.supportWords(i) + " at " + position(m, m.Nodes[i].Position) + h.massWords(i))
	if !h.solved {
		return
	}
	n := h.solvedNode(m.Nodes[i].Name)
	if n < 0 {
		return
	}
	h.reactions(n)
	h.movements(n)
	h.stiffness(n)
}

// solvedNode is the node's index in the solved model, which may be older.
func (h *hover) solvedNode(name string) int { return h.numbers.solution.Node(name) }

// massWords says which mass is put at a node.
func (h *hover) massWords(node int) string {
	mass := 0.0
	for i := range h.model.Masses {
		if h.model.Masses[i].Node == node {
			mass += h.model.Masses[i].Mass
		}
	}
	if mass == 0 {
		return ""
	}
	return ", mass " + quantity.Write(mass, h.model.Display.Mass, 4)
}

// supportWords says how a node is held.
func (h *hover) supportWords(node int) string {
	var words []string
	for i := range h.model.Supports {
		if s := &h.model.Supports[i]; s.Node == node {
			words = append(words, s.Words)
		}
	}
	if len(words) == 0 {
		return "node"
	}
	return "support " + strings.Join(words, ", ")
}

// position writes a place in the plane or in space.
func position(m *model.Model, p [3]float64) string {
	u := m.Display.Length
	parts := []string{number(p[0], u), number(p[1], u), number(p[2], u)}
	if m.Plane {
		parts = []string{parts[0], parts[2]}
	}
	return "(" + strings.Join(parts, ", ") + ") " + u.Symbol
}

// support writes about the node of a support line.
func (h *hover) support() {
	for i := range h.model.Supports {
		s := &h.model.Supports[i]
		if s.Origin.File != h.file || s.Origin.Statement.Start != h.unit.Start {
			continue
		}
		h.page.add("**" + h.model.Nodes[s.Node].Name + "** · " + h.supportWords(s.Node) + " at " + position(h.model, h.model.Nodes[s.Node].Position))
		if h.solved {
			if n := h.solvedNode(h.model.Nodes[s.Node].Name); n >= 0 {
				h.reactions(n)
			}
		}
		return
	}
}

// reactions writes the reactions of a node, envelopes first.
func (h *hover) reactions(node int) {
	n := h.numbers
	if !supported(n.model, node) {
		return
	}
	h.page.add(h.bands("Reaction", analysis.ForceNames, n.forceUnit,
		func(e *analysis.Envelope) [6]analysis.Band { return e.Reaction(node) },
		func(r analysis.Result) [6]float64 { return r.Reaction(node) }))
	h.page.add("What the support does to the structure, along the global axes." + h.turnNote())
}

// turnNote explains the arrows of turns in a plane model.
func (h *hover) turnNote() string {
	if h.model.Plane {
		return " ↻ is clockwise as drawn with x to the right and z up, positive about y."
	}
	return ""
}

func supported(m *model.Model, node int) bool {
	return slices.ContainsFunc(m.Supports, func(s model.Support) bool { return s.Node == node })
}

// movements writes the movements of a node, envelopes first.
func (h *hover) movements(node int) {
	n := h.numbers
	h.page.add(h.bands("Movement", analysis.MovementNames, n.movementUnit,
		func(e *analysis.Envelope) [6]analysis.Band { return e.Movement(node) },
		func(r analysis.Result) [6]float64 { return r.Movement(node) }))
}

// bandRow is a row of six components, each with the result that gives it where
// the row is one of an envelope.
type bandRow struct {
	title  string
	values [6]float64
	in     [6]string
	none   bool   // there are no numbers
	note   string // what stands in their place
}

// bands writes a table of six components at a node: most and least of each
// envelope with the result that gives them, then each case.
func (h *hover) bands(title string, names [6]string, unit func(int) quantity.Unit,
	of func(*analysis.Envelope) [6]analysis.Band, single func(analysis.Result) [6]float64) string {
	return h.components(title, names, unit, h.bandRows(of, single))
}

// components writes a table of six components. One that is zero throughout has
// no column.
func (h *hover) components(title string, names [6]string, unit func(int) quantity.Unit, rows []bandRow) string {
	var size [2]float64
	for i := range rows {
		size[0], size[1] = math.Max(size[0], largest(rows[i].values[:3])), math.Max(size[1], largest(rows[i].values[3:]))
	}
	size[0] = math.Max(size[0], unit(0).Factor)
	size[1] = math.Max(size[1], unit(3).Factor)
	// A moment is rounding too where the forces make it at an arm of nothing.
	size[1] = math.Max(size[1], 1e-3*size[0])
	headings := []string{title}
	cells := make([][]string, len(rows))
	for i := range rows {
		cells[i] = []string{rows[i].title}
		if rows[i].none {
			cells[i] = append(cells[i], rows[i].note)
		}
	}
	for _, f := range h.numbers.freedoms() {
		zero := true
		for i := range rows {
			zero = zero && cleaned(rows[i].values[f], size[f/3]) == 0
		}
		if zero {
			continue
		}
		headings = append(headings, names[f]+" "+unit(f).Symbol+">")
		for i := range rows {
			if !rows[i].none {
				value := cleaned(rows[i].values[f], size[f/3])
				cell := h.numbers.component(value, f, unit(f), false)
				if value != 0 {
					cell = strings.TrimSpace(cell + " " + code(rows[i].in[f]))
				}
				cells[i] = append(cells[i], cell)
			}
		}
	}
	if len(headings) == 1 {
		return title + ": none in any result"
	}
	return table(headings, cells)
}

func (h *hover) bandRows(of func(*analysis.Envelope) [6]analysis.Band, single func(analysis.Result) [6]float64) []bandRow {
	n := h.numbers
	var rows []bandRow
	for _, e := range n.envelopes() {
		most, least := bandRow{title: "**" + e.Name() + "** most"}, bandRow{title: "**" + e.Name() + "** least"}
		for f, b := range of(e) {
			most.values[f], most.in[f] = b.Most.Value, n.name(b.Most)
			least.values[f], least.in[f] = b.Least.Value, n.name(b.Least)
		}
		if len(e.Results()) == 1 {
			most.title = "**" + e.Name() + "**"
			rows = append(rows, most)
		} else {
			rows = append(rows, most, least)
		}
	}
	for i := range n.model.Cases {
		r := n.results.Case(i)
		switch {
		case i == mostCases:
			return append(rows, bandRow{title: fmt.Sprintf("… %d more cases", len(n.model.Cases)-i), none: true})
		case r.Problem() != "":
			rows = append(rows, bandRow{title: r.Name(), none: true, note: "no numbers"})
		default:
			rows = append(rows, bandRow{title: r.Name(), values: single(r)})
		}
	}
	return rows
}

// stiffness says how the structure resists movements of the node.
func (h *hover) stiffness(node int) {
	n := h.numbers
	if n.results.Freedoms() > mostFreedomsAsked {
		return
	}
	var s *frame.NodeStiffness
	asked := n.solution.Stiffness(func() {
		s, _ = n.results.Solver().Structure().StiffnessAt(h.ctx, node)
	})
	if !asked || s == nil {
		return
	}
	var parts []string
	for _, f := range n.freedoms() {
		k := s.OthersFree[f]
		if math.IsInf(k, 1) || k == 0 {
			continue
		}
		parts = append(parts, analysis.MovementNames[f]+" "+stiffnessWords(k, f))
	}
	if len(parts) > 0 {
		h.page.add("Stiffness here against " + strings.Join(parts, " · ") + " (force for one unit of movement, everything else free)")
	}
}

// stiffnessWords writes a stiffness with a prefix that keeps it short.
func stiffnessWords(k float64, freedom int) string {
	per, base := "/m", "N"
	if freedom > 2 {
		per, base = "/rad", "Nm"
	}
	for _, p := range []struct {
		factor float64
		prefix string
	}{{1e9, "G"}, {1e6, "M"}, {1e3, "k"}} {
		if math.Abs(k) >= p.factor {
			return quantity.Number(k/p.factor, 3) + " " + p.prefix + base + per
		}
	}
	return quantity.Number(k, 3) + " " + base + per
}
