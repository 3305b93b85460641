package main

import (
	"context"
	"fmt"
	"io"
	"math"
	"slices"
	"strings"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

type solveCommand struct {
	File     string   `arg:"" help:"The model, or - for standard input." predictor:"file"`
	JSON     bool     `name:"json" xor:"form" help:"Print everything as JSON in SI units."`
	Markdown bool     `xor:"form" help:"Print the tables as Markdown."`
	CSV      bool     `name:"csv" xor:"form" help:"Print the tables as comma-separated values."`
	Only     []string `help:"Only these nodes, members, cases, combinations or families." placeholder:"NAME"`
	Stations int      `default:"11" help:"Points along each member in JSON."`
	Verbose  bool     `short:"v" help:"Say how the solve went and how long it took."`
}

// caution stands under everything that is written down.
const caution = "For use by, or under the responsible charge of, a qualified structural engineer; local codes, national annexes and licensed practice decide. Linear small-displacement theory."

// Help adds examples to the help of the command.
func (*solveCommand) Help() string {
	return `Examples:
    spanwright solve roof.span                     tables
    spanwright solve roof.span --only ULS,A,r1     one family, one support, one member
    spanwright solve roof.span --json > roof.json  everything, for programs
    spanwright solve roof.span --csv > roof.csv    for a spreadsheet`
}

// Run solves the model and prints the results.
func (c *solveCommand) Run(t *terminal) error {
	if c.Stations < 2 || c.Stations > 10001 {
		return fmt.Errorf("--stations takes a number from 2 to 10001, not %d", c.Stations)
	}
	p, err := open(c.File, t)
	if err != nil {
		return err
	}
	ctx := context.Background()
	results, err := p.solve(ctx)
	if err != nil {
		return err
	}
	problems, err := p.diagnostics(ctx, results)
	if err != nil {
		return err
	}
	if p.Library {
		return fmt.Errorf("%s has no model line: it holds declarations for other files, and nothing to solve", c.File)
	}
	say := teller{project: p, terminal: t}
	if results == nil || !results.Solved() {
		say.tell(t.err, problems)
		return &foundError{}
	}
	say.tell(t.err, gravest(problems))
	if c.Verbose {
		times := results.Timings()
		fmt.Fprintf(t.err, "%s: %s; prepared in %v, solved in %v\n", c.File, results.Way(), times.Prepare, times.Solve)
	}
	if err := c.write(ctx, t, results); err != nil {
		return err
	}
	if hasErrors(problems) {
		return &foundError{}
	}
	return nil
}

// write writes the results in the form that is asked for.
func (c *solveCommand) write(ctx context.Context, t *terminal, results *analysis.Results) error {
	if c.JSON {
		return results.WriteJSON(ctx, t.out, analysis.DocumentOptions{Stations: c.Stations})
	}
	form := asText
	if c.Markdown {
		form = asMarkdown
	}
	r := report{results: results, model: results.Model(), only: c.Only}
	if unknown := r.unknown(); unknown != "" {
		return fmt.Errorf("%s has no node, member, case, combination or family called %s", c.File, unknown)
	}
	if c.CSV {
		return r.writeCSV(t.out)
	}
	return r.write(t.out, form)
}

// report makes the tables of one solved model.
type report struct {
	results *analysis.Results
	model   *model.Model
	only    []string
}

// unknown returns the first wish that names nothing, or "".
func (r *report) unknown() string {
	for _, name := range r.only {
		if !r.names(name) {
			return name
		}
	}
	return ""
}

func (r *report) names(name string) bool {
	m := r.model
	return slices.ContainsFunc(m.Nodes, func(n model.Node) bool { return n.Name == name }) ||
		slices.ContainsFunc(m.Members, func(b model.Member) bool { return b.Name == name }) ||
		r.isResult(name)
}

// isResult reports whether a name is that of a case, combination or family.
func (r *report) isResult(name string) bool {
	if _, ok := r.results.Find(name); ok {
		return true
	}
	return slices.ContainsFunc(r.model.Families, func(f model.Family) bool { return f.Name == name })
}

// wanted reports whether a node or member is to be shown: all are, unless the
// user named some.
func (r *report) wanted(name string) bool {
	things := slices.ContainsFunc(r.only, func(o string) bool { return !r.isResult(o) })
	return !things || slices.Contains(r.only, name)
}

// wantedResult does the same for cases, combinations and families.
func (r *report) wantedResult(name string) bool {
	results := slices.ContainsFunc(r.only, r.isResult)
	return !results || slices.Contains(r.only, name)
}

// write writes the whole report.
func (r *report) write(w io.Writer, form style) error {
	fmt.Fprintf(w, "%s\n\n", r.heading())
	r.caseReactions().write(w, form)
	for _, e := range r.envelopes() {
		r.reactions(e).write(w, form)
		r.movements(e).write(w, form)
		r.members(e).write(w, form)
	}
	for _, s := range r.single() {
		s.write(w, form)
	}
	limits, err := r.limits()
	if err != nil {
		return err
	}
	limits.write(w, form)
	fmt.Fprintln(w, caution)
	return nil
}

// heading says in one line what was solved.
func (r *report) heading() string {
	m := r.model
	space := "space"
	if m.Plane {
		space = "plane"
	}
	worst := 0.0
	for i := range r.results.Len() {
		worst = max(worst, r.results.At(i).Equilibrium().Residual)
	}
	return fmt.Sprintf("%s · %s · %d nodes, %d members, %d freedoms · equilibrium %.0e", m.Title, space, len(m.Nodes), len(m.Members), r.results.Freedoms(), worst)
}

// envelopes returns those to show: the families', or, in a model without any,
// one over all its combinations, or over all its cases.
func (r *report) envelopes() []*analysis.Envelope {
	var list []*analysis.Envelope
	for i, f := range r.model.Families {
		if e := r.results.Envelope(i); !e.Empty() && r.wantedResult(f.Name) {
			list = append(list, e)
		}
	}
	if len(r.model.Families) > 0 || len(r.only) > 0 && slices.ContainsFunc(r.only, r.isResult) {
		return list
	}
	from, name := len(r.model.Cases), "all combinations"
	if from == r.results.Len() {
		from, name = 0, "all cases"
	}
	var all []analysis.Result
	for i := from; i < r.results.Len(); i++ {
		all = append(all, r.results.At(i))
	}
	return append(list, r.results.EnvelopeOf(name, all))
}

// single returns the tables of cases and combinations that the user named.
func (r *report) single() []*sheet {
	var sheets []*sheet
	for _, name := range r.only {
		if result, ok := r.results.Find(name); ok {
			e := r.results.EnvelopeOf(result.Name(), []analysis.Result{result})
			sheets = append(sheets, r.reactions(e), r.movements(e), r.members(e))
		}
	}
	return sheets
}

// forces and movements by freedom.
var (
	forceNames    = [6]string{"Fx", "Fy", "Fz", "Mx", "My", "Mz"}
	movementNames = [6]string{"ux", "uy", "uz", "rx", "ry", "rz"}
)

// freedoms returns the freedoms of the model: three in a plane, six in space.
func freedoms(m *model.Model) []int {
	if m.Plane {
		return []int{0, 2, 4}
	}
	return []int{0, 1, 2, 3, 4, 5}
}

func forceUnit(d quantity.Display, freedom int) quantity.Unit {
	if freedom < 3 {
		return d.Force
	}
	return d.Moment
}

func movementUnit(d quantity.Display, freedom int) quantity.Unit {
	if freedom < 3 {
		return d.Movement
	}
	return d.Angle
}

// figures writes an SI value in a unit, without the unit, for tables whose
// heading has it.
func figures(value float64, u quantity.Unit) string { return quantity.Number(value/u.Factor, 3) }

// turned writes a force, or a moment about y of a plane model with its arrow.
func (r *report) turned(value float64, freedom int, u quantity.Unit) string {
	if !r.model.Plane || freedom != 4 || value == 0 {
		return figures(value, u)
	}
	if value > 0 {
		return figures(value, u) + " ↻"
	}
	return figures(-value, u) + " ↺"
}

// caseReactions lists the reactions of each case.
func (r *report) caseReactions() *sheet {
	d := r.model.Display
	s := &sheet{title: "Reactions by case (what the support does to the structure, global axes)", columns: []string{"node", "case"}, numbers: map[int]bool{}}
	for i, f := range freedoms(r.model) {
		s.columns = append(s.columns, forceNames[f]+" "+forceUnit(d, f).Symbol)
		s.numbers[2+i] = true
	}
	for _, node := range analysis.SupportedNodes(r.model) {
		if !r.wanted(r.model.Nodes[node].Name) {
			continue
		}
		name := r.model.Nodes[node].Name
		for i := range r.model.Cases {
			result := r.results.Case(i)
			if !r.wantedResult(result.Name()) || result.Problem() != "" {
				continue
			}
			cells := []string{name, result.Name()}
			reaction := result.Reaction(node)
			for _, f := range freedoms(r.model) {
				cells = append(cells, r.turned(reaction[f], f, forceUnit(d, f)))
			}
			s.appendRow(cells...)
			name = ""
		}
	}
	return s
}

// reactions lists the extreme reactions of an envelope.
func (r *report) reactions(e *analysis.Envelope) *sheet {
	s := &sheet{title: "Reactions, " + e.Name() + " (least and most, each with its combination)",
		columns: []string{"node", "", "least", "in", "most", "in"}, numbers: map[int]bool{2: true, 4: true}}
	last := -1
	for _, row := range e.SupportRows() {
		node := r.model.Nodes[row.Node].Name
		if !r.wanted(node) {
			continue
		}
		if row.Node == last {
			node = ""
		}
		last = row.Node
		u := forceUnit(r.model.Display, row.Freedom)
		s.appendRow(node, forceNames[row.Freedom]+" "+u.Symbol,
			r.turned(row.Band.Least.Value, row.Freedom, u), r.name(row.Band.Least), r.turned(row.Band.Most.Value, row.Freedom, u), r.name(row.Band.Most))
	}
	return s
}

// name returns the name of the result that governs.
func (r *report) name(g analysis.Governed) string {
	if g.Result < 0 {
		return ""
	}
	return r.results.At(g.Result).Name()
}

// movements lists the largest movement of each node and freedom.
func (r *report) movements(e *analysis.Envelope) *sheet {
	d := r.model.Display
	s := &sheet{title: "Movements, " + e.Name() + " (the largest, with its sign and combination)", columns: []string{"node"}, numbers: map[int]bool{}}
	for i, f := range freedoms(r.model) {
		s.columns = append(s.columns, movementNames[f]+" "+movementUnit(d, f).Symbol, "in")
		s.numbers[1+2*i] = true
	}
	if e.Empty() {
		return s
	}
	for node := range r.model.Nodes {
		if !r.wanted(r.model.Nodes[node].Name) {
			continue
		}
		cells := []string{r.model.Nodes[node].Name}
		bands := e.Movement(node)
		for _, f := range freedoms(r.model) {
			g := bands[f].Largest()
			cells = append(cells, r.turned(g.Value, f, movementUnit(d, f)), r.name(g))
		}
		s.appendRow(cells...)
	}
	return s
}

// members lists what governs each member.
func (r *report) members(e *analysis.Envelope) *sheet {
	s := &sheet{title: "Members, " + e.Name() + " (N > 0 tension; My > 0 tension on the −z side, Mz > 0 on the −y side)",
		columns: []string{"member", "", "value", "at", "in", ""}, numbers: map[int]bool{2: true, 3: true}}
	d := r.model.Display
	for i := range r.model.Members {
		member := &r.model.Members[i]
		if !r.wanted(member.Name) {
			continue
		}
		name := member.Name
		for _, g := range e.Governing(i) {
			u := unitOf(d, g.Quantity)
			note := ""
			if g.Share > 0 {
				note = percent(g.Share) + " of yield"
			}
			if g.Quantity == analysis.Deflection && g.Value > 0 {
				note = "length/" + quantity.Number(member.Length/g.Value, 3)
			}
			s.appendRow(name, g.Quantity.String()+" "+u.Symbol, figures(g.Value, u), quantity.Write(g.At, d.Length, 3), r.name(g.Governed), note)
			name = ""
		}
	}
	return s
}

// unitOf returns the unit in which a quantity along a member is shown.
func unitOf(d quantity.Display, q analysis.Quantity) quantity.Unit {
	switch q {
	case analysis.N, analysis.Vy, analysis.Vz:
		return d.Force
	case analysis.T, analysis.My, analysis.Mz:
		return d.Moment
	case analysis.Deflection:
		return d.Movement
	}
	return d.Stress
}

func percent(share float64) string { return fmt.Sprintf("%.0f %%", 100*share) }

// answers are those to the limits.
func (r *report) answers() ([]analysis.Limit, error) { return r.results.Limits(context.Background()) }

// limits lists the answers to the limits.
func (r *report) limits() (*sheet, error) {
	answers, err := r.answers()
	if err != nil {
		return nil, err
	}
	s := &sheet{title: "Limits", columns: []string{"", "", "limit", "value", "bound", "governs"}, numbers: map[int]bool{1: true, 3: true, 4: true}}
	for i, l := range answers {
		limit := &r.model.Limits[i]
		text := strings.TrimPrefix(limit.Text, "limit ")
		if l.Governs.Result < 0 {
			s.appendRow("open", "", text, "", "", l.Problem)
			continue
		}
		word := "ok"
		if !l.Holds {
			word = "over"
		}
		u := analysis.MeasureUnit(r.model.Display, limit)
		governs := r.results.At(l.Governs.Result).Name()
		if member := l.Governs.Member; member >= 0 && !math.IsNaN(l.Governs.At) {
			governs += " " + analysis.PlaceWords(r.model, member, l.Governs.At)
		}
		s.appendRow(word, analysis.ShareWords(l.Governs.Ratio), text, quantity.Write(l.Governs.Value, u, 3), quantity.Write(l.Governs.Bound, u, 3), governs)
	}
	return s, nil
}
