package feature

import (
	"math"
	"slices"
	"strings"

	"spanwright/analysis"
	"spanwright/analysis/frame"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lsp/workspace"
)

// load writes what a load line comes to: the resultant, where it acts, and how
// the supports share it.
func (h *hover) load() {
	loadCase, loads := h.loadsHere()
	if loadCase < 0 {
		return
	}
	m := h.model
	total := resultant(m, loads)
	text := h.resultantWords(total)
	if !slices.ContainsFunc(loads, func(l model.Load) bool { return l.Kind != model.NodeMove && l.Kind != model.NodeTurn }) {
		text = "it moves the support, and is no force itself"
	}
	h.page.add("Load in case **" + m.Cases[loadCase].Name + "**: " + text)
	if where := h.actionWords(total); where != "" {
		h.page.add(where)
	}
	h.shares(loadCase, loads)
}

// loadsHere returns the loads of the line at the place, and their case.
func (h *hover) loadsHere() (loadCase int, loads []model.Load) {
	for i := range h.model.Cases {
		c := &h.model.Cases[i]
		for k := range c.Loads {
			if o := c.Loads[k].Origin; o.File == h.file && o.Statement.Start == h.unit.Start {
				loads = append(loads, c.Loads[k])
			}
		}
		if len(loads) > 0 {
			return i, loads
		}
	}
	return -1, nil
}

// resultantWords writes a force, or a moment where there is no force.
func (h *hover) resultantWords(total [6]float64) string {
	if largest(total[:3]) > 0 {
		return forceWords(h.model, total)
	}
	size := largest(total[3:])
	if size == 0 {
		return "no resultant, it is in balance by itself"
	}
	var parts []string
	for f := 3; f < 6; f++ {
		if math.Abs(total[f]) > 1e-9*size {
			parts = append(parts, analysis.ForceNames[f]+" "+quantity.Write(total[f], h.model.Display.Moment, 3))
		}
	}
	return "no force, a moment " + strings.Join(parts, ", ")
}

// cleaned takes a value that is nothing but rounding, beside values of a size,
// for zero.
func cleaned(value, size float64) float64 {
	if math.Abs(value) <= 1e-9*size {
		return 0
	}
	return value
}

func largest(values []float64) float64 {
	size := 0.0
	for _, v := range values {
		size = math.Max(size, math.Abs(v))
	}
	return size
}

// actionWords says where a resultant acts.
func (h *hover) actionWords(total [6]float64) string {
	m := h.model
	size := largest(total[:3])
	if size == 0 {
		return ""
	}
	point, ok := lineOfAction(total)
	if !ok {
		return "It acts along no single line: its moment about its own direction stays."
	}
	far := largest(point[:])
	for i := range point {
		point[i] = cleaned(point[i], far)
	}
	length := func(v float64) string { return quantity.Write(v, m.Display.Length, 3) }
	upright, level := math.Abs(total[2]) > (1-1e-9)*size, math.Abs(total[2]) < 1e-9*size
	horizontal := math.Hypot(total[0], total[1])
	switch {
	case upright && horizontal < 1e-9*size && m.Plane:
		return "It acts at x = " + length(point[0])
	case upright && horizontal < 1e-9*size:
		return "It acts at x = " + length(point[0]) + ", y = " + length(point[1])
	case level && m.Plane:
		return "It acts at z = " + length(point[2])
	}
	return "Its line of action passes through " + position(m, point)
}

// shares writes what each support takes of the loads of a line, acting alone.
// It takes the solved factor, so that it is quick, and only of this very text.
func (h *hover) shares(loadCase int, loads []model.Load) {
	if !h.solved || h.view.State != workspace.Current || h.numbers.results.Freedoms() > mostFreedomsAsked {
		return
	}
	n := h.numbers
	alone := *n.model
	c := n.model.Cases[loadCase]
	c.Loads = loads
	alone.Cases = []model.Case{c}
	var state *frame.State
	asked := n.solution.Stiffness(func() {
		solver, err := frame.Prepare(h.ctx, &alone, n.results.Solver())
		if err != nil {
			return
		}
		if states, problems, err := solver.Cases(h.ctx); err == nil && problems[0] == nil {
			state = states[0]
		}
	})
	if !asked || state == nil {
		return
	}
	h.page.add(h.components("Taken alone, reactions", analysis.ForceNames, n.forceUnit, shareRows(n.model, state)))
	if n.results.OneWay() {
		h.page.add("With one-way parts as they act under this load alone; shares of several loads do not add up.")
	}
}

// shareRows are the reactions of the supports that take part in a load.
func shareRows(m *model.Model, state *frame.State) []bandRow {
	var rows []bandRow
	size := 0.0
	nodes := analysis.SupportedNodes(m)
	for _, node := range nodes {
		r := state.Reaction(node)
		size = math.Max(size, largest(r[:]))
	}
	for _, node := range nodes {
		r := state.Reaction(node)
		if largest(r[:]) <= 1e-6*size {
			continue
		}
		if len(rows) == mostCases {
			return append(rows, bandRow{title: "… further supports", none: true})
		}
		rows = append(rows, bandRow{title: m.Nodes[node].Name, values: r})
	}
	return rows
}

// loadCase writes what a load case is and comes to.
func (h *hover) loadCase(d *resolve.Definition) {
	i := indexOf(h.model.Cases, fullName(d), func(c *model.Case) string { return c.Name })
	if i < 0 {
		h.page.add("**" + d.Name + "** · load case")
		return
	}
	c := &h.model.Cases[i]
	title := c.Kind.String()
	if c.Category != 0 {
		title += " " + string(c.Category)
	}
	if c.Title != "" {
		title += " · " + c.Title
	}
	h.page.add("**" + c.Name + "** · load case, " + title)
	lines := map[int]bool{}
	for k := range c.Loads {
		lines[c.Loads[k].Origin.Statement.Start] = true
	}
	total := resultant(h.model, c.Loads)
	h.page.add(counted(len(lines), "load line") + ", in all " + h.resultantWords(total))
	if where := h.actionWords(total); where != "" {
		h.page.add(where)
	}
	if !h.solved {
		return
	}
	if k := h.numbers.solution.Case(c.Name); k >= 0 {
		h.result(h.numbers.results.Case(k))
	}
}
