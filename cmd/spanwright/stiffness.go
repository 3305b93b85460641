package main

import (
	"context"
	"errors"
	"fmt"
	"math"
	"slices"

	"spanwright/analysis"
	"spanwright/analysis/frame"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

type stiffnessCommand struct {
	File     string `arg:"" help:"The model, or - for standard input." predictor:"file"`
	At       string `xor:"what" required:"" placeholder:"NODE" help:"How the structure resists movements of this node."`
	Of       string `xor:"what" required:"" placeholder:"MEMBER" help:"The stiffness of this member on its own, with the closed form of each term."`
	JSON     bool   `name:"json" xor:"form" help:"Print as JSON in SI units."`
	Markdown bool   `xor:"form" help:"Print the tables as Markdown."`
	CSV      bool   `name:"csv" xor:"form" help:"Print the tables as comma-separated values."`
}

// Help adds examples to the help of the command.
func (*stiffnessCommand) Help() string {
	return `A stiffness K(i, j) is the force at freedom i for one unit of movement at freedom j while the others are held.

Examples:
    spanwright stiffness roof.span --at B     the structure at node B: for springs of what is joined there
    spanwright stiffness roof.span --of r1    member r1: EA/L, 12EIy/L³, 6EIy/L², 4EIy/L and so on`
}

// Run prints the stiffness at a node or of a member.
func (c *stiffnessCommand) Run(t *terminal) error {
	p, err := open(c.File, t)
	if err != nil {
		return err
	}
	if p.Library {
		return fmt.Errorf("%s has no model line: it holds declarations for other files, and nothing to solve", c.File)
	}
	ctx := context.Background()
	results, err := p.solve(ctx)
	if err != nil {
		return err
	}
	if results == nil || results.Solver() == nil {
		problems, err := p.diagnostics(ctx, results)
		if err != nil {
			return err
		}
		say := teller{project: p, terminal: t}
		say.tell(t.err, problems)
		return &foundError{}
	}
	if c.At != "" {
		return c.atNode(ctx, t, results)
	}
	return c.ofMember(t, results)
}

// atNode answers --at.
func (c *stiffnessCommand) atNode(ctx context.Context, t *terminal, results *analysis.Results) error {
	m := results.Model()
	node := slices.IndexFunc(m.Nodes, func(n model.Node) bool { return n.Name == c.At })
	if node < 0 {
		return fmt.Errorf("%s has no node called %s", c.File, c.At)
	}
	k, err := results.Solver().Structure().StiffnessAt(ctx, node)
	if err != nil {
		return err
	}
	if c.JSON {
		return writeDocument(t.out, documentOfNode(m, k))
	}
	r := nodeReport{model: m, stiffness: k, oneWay: results.OneWay()}
	form := c.form()
	if form != asCSV {
		fmt.Fprintf(t.out, "%s\n\n", r.heading())
	}
	r.directions().write(t.out, form)
	r.block("Stiffness K: force in the row for one unit of movement in the column, the node's other movements held",
		k.Stiffness, forceNames, movementNames, func(i, j int) quantity.Unit { return stiffnessUnit(m.Display, i, j) }).write(t.out, form)
	r.block("Flexibility: movement in the row for one unit of force in the column, everything free",
		k.Flexibility, movementNames, forceNames, func(i, j int) quantity.Unit { return flexibilityUnit(m.Display, i, j) }).write(t.out, form)
	if form != asCSV {
		fmt.Fprintln(t.out, caution)
	}
	return nil
}

// ofMember answers --of.
func (c *stiffnessCommand) ofMember(t *terminal, results *analysis.Results) error {
	m := results.Model()
	member := slices.IndexFunc(m.Members, func(b model.Member) bool { return b.Name == c.Of })
	if member < 0 {
		return fmt.Errorf("%s has no member called %s", c.File, c.Of)
	}
	k, ok := results.Solver().Structure().StiffnessOf(member)
	if !ok {
		return errors.New(c.Of + " is a rigid link: it has no stiffness of its own, its nodes move as one body")
	}
	if c.JSON {
		return writeDocument(t.out, documentOfMember(m, k))
	}
	r := memberReport{model: m, stiffness: k}
	form := c.form()
	if form != asCSV {
		fmt.Fprintf(t.out, "%s\n\n", r.heading())
	}
	r.terms().write(t.out, form)
	r.matrix("In member axes: force in the row for one unit of movement in the column, all others held", &k.Own).write(t.out, form)
	r.names().write(t.out, form)
	r.matrix("The same in global axes, at the nodes", &k.Global).write(t.out, form)
	if form != asCSV {
		fmt.Fprintln(t.out, caution)
	}
	return nil
}

func (c *stiffnessCommand) form() style {
	switch {
	case c.Markdown:
		return asMarkdown
	case c.CSV:
		return asCSV
	}
	return asText
}

// stiffnessUnit is that of a force at freedom i for a movement at freedom j.
// Turns are always in rad here: a stiffness per mrad or degree invites mistakes.
func stiffnessUnit(d quantity.Display, i, j int) quantity.Unit {
	return forceUnit(d, i).Over(perMovement(d, j))
}

func perMovement(d quantity.Display, freedom int) quantity.Unit {
	if freedom < 3 {
		return d.Length
	}
	radian, _ := quantity.Lookup("rad")
	return radian
}

// flexibilityUnit is that of a movement at freedom i for a force at freedom j.
func flexibilityUnit(d quantity.Display, i, j int) quantity.Unit {
	return movementUnit(d, i).Over(forceUnit(d, j))
}

// nodeReport makes the tables of the stiffness at a node.
type nodeReport struct {
	model     *model.Model
	stiffness *frame.NodeStiffness
	oneWay    bool
}

func (r *nodeReport) heading() string {
	text := fmt.Sprintf("%s · stiffness of the structure at %s · everything else is free to follow", r.model.Title, r.model.Nodes[r.stiffness.Node].Name)
	if r.stiffness.Axes != [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}} {
		text += " · axes of its turned support"
	}
	if r.oneWay {
		text += "\nOne-way members and supports count as acting."
	}
	return text
}

// directions lists each direct stiffness, with the node's other movements held
// and free.
func (r *nodeReport) directions() *sheet {
	s := &sheet{title: "Force for one unit of movement", columns: []string{"movement", "unit", "others held", "others free", ""}, numbers: map[int]bool{2: true, 3: true}}
	for _, f := range freedoms(r.model) {
		u := stiffnessUnit(r.model.Display, f, f)
		held, free := r.stiffness.OthersHeld[f], r.stiffness.OthersFree[f]
		switch {
		case math.IsInf(held, 1) && math.IsInf(free, 1):
			s.appendRow(movementNames[f], "", "", "", "held by the support")
		case held == 0 && free == 0:
			s.appendRow(movementNames[f], u.Symbol, "0", "0", "nothing resists it")
		default:
			s.appendRow(movementNames[f], u.Symbol, stiff(held, u), stiff(free, u), "")
		}
	}
	return s
}

// stiff writes a stiffness in a unit, or that there is no end to it.
func stiff(value float64, u quantity.Unit) string {
	if math.IsInf(value, 0) {
		return "rigid"
	}
	return quantity.Number(value/u.Factor, 4)
}

// block lists a matrix over the free freedoms of the node.
func (r *nodeReport) block(title string, values [][]float64, rows, columns [6]string, unit func(i, j int) quantity.Unit) *sheet {
	s := &sheet{title: title, columns: []string{""}, numbers: map[int]bool{}}
	if len(r.stiffness.Freedoms) < 2 {
		return s // the directions have said it
	}
	for c, j := range r.stiffness.Freedoms {
		s.columns = append(s.columns, columns[j], "")
		s.numbers[1+2*c] = true
	}
	largest := largestOnDiagonal(values)
	for a, i := range r.stiffness.Freedoms {
		cells := []string{rows[i]}
		for b, j := range r.stiffness.Freedoms {
			u := unit(i, j)
			if v := values[a][b]; math.IsInf(v, 0) {
				cells = append(cells, "no end", u.Symbol)
			} else {
				cells = append(cells, quantity.Number(cleared(v, largest[a]*largest[b])/u.Factor, 4), u.Symbol)
			}
		}
		s.appendRow(cells...)
	}
	return s
}

// largestOnDiagonal returns the roots of a matrix's diagonal.
func largestOnDiagonal(values [][]float64) []float64 {
	roots := make([]float64, len(values))
	for i := range values {
		roots[i] = math.Sqrt(values[i][i])
	}
	return roots
}

// cleared takes a value that is nothing but rounding, next to the size of its
// matrix there, for zero.
func cleared(value, size float64) float64 {
	if math.Abs(value) < 1e-12*size {
		return 0
	}
	return value
}

// memberReport makes the tables of the stiffness of a member.
type memberReport struct {
	model     *model.Model
	stiffness *frame.MemberStiffness
}

func (r *memberReport) heading() string {
	b := &r.model.Members[r.stiffness.Member]
	text := fmt.Sprintf("%s · stiffness of %s, %s %s → %s, %s", r.model.Title, b.Name, b.Kind,
		r.nodeAt(0), r.nodeAt(1), quantity.Write(b.Length, r.model.Display.Length, 4))
	if b.Section >= 0 {
		text += ", " + r.model.Sections[b.Section].Name
	}
	if len(b.Nodes) > 2 {
		text += "\nAs one piece between its ends, whatever nodes lie between."
	}
	return text
}

// nodeAt returns the name of the node at an end.
func (r *memberReport) nodeAt(end int) string {
	nodes := r.model.Members[r.stiffness.Member].Nodes
	if end == 1 {
		return r.model.Nodes[nodes[len(nodes)-1]].Name
	}
	return r.model.Nodes[nodes[0]].Name
}

// terms lists the closed forms with their numbers.
func (r *memberReport) terms() *sheet {
	s := &sheet{title: "Terms", columns: []string{"term", "value", "", "for example"}, numbers: map[int]bool{1: true}}
	for _, term := range r.stiffness.Terms {
		u := stiffnessUnit(r.model.Display, term.Row%6, term.Column%6)
		s.appendRow(term.Name, quantity.Number(term.Value/u.Factor, 4), u.Symbol,
			r.freedom(forceNames, term.Row)+" for a unit of "+r.freedom(movementNames, term.Column))
	}
	return s
}

// freedom names one of the twelve: "Fx at A".
func (r *memberReport) freedom(names [6]string, i int) string {
	return names[i%6] + " at " + r.nodeAt(i/6)
}

// shown are the freedoms of both ends that the model has.
func (r *memberReport) shown() []int {
	list := freedoms(r.model)
	both := slices.Clone(list)
	for _, f := range list {
		both = append(both, 6+f)
	}
	return both
}

// table makes a sheet with a row and a column for each shown freedom.
func (r *memberReport) table(title string, cell func(i, j int) string) *sheet {
	s := &sheet{title: title, columns: []string{""}, numbers: map[int]bool{}}
	for n, j := range r.shown() {
		s.columns = append(s.columns, r.freedom(movementNames, j))
		s.numbers[1+n] = true
	}
	for _, i := range r.shown() {
		cells := []string{r.freedom(forceNames, i)}
		for _, j := range r.shown() {
			cells = append(cells, cell(i, j))
		}
		s.appendRow(cells...)
	}
	return s
}

// matrix lists the numbers of a stiffness.
func (r *memberReport) matrix(title string, k *[144]float64) *sheet {
	d := r.model.Display
	title += fmt.Sprintf(" (%s, %s, %s, %s)", stiffnessUnit(d, 0, 0).Symbol, stiffnessUnit(d, 0, 3).Symbol, stiffnessUnit(d, 3, 0).Symbol, stiffnessUnit(d, 3, 3).Symbol)
	return r.table(title, func(i, j int) string {
		size := math.Sqrt(math.Abs(k[13*i] * k[13*j]))
		return quantity.Number(cleared(k[12*i+j], size)/stiffnessUnit(d, i%6, j%6).Factor, 4)
	})
}

// names lists the closed form of each entry in member axes, with its sign.
func (r *memberReport) names() *sheet {
	return r.table("Its closed forms", func(i, j int) string {
		value, name := r.stiffness.Own[12*i+j], r.stiffness.Names[12*i+j]
		switch {
		case value == 0:
			return "·"
		case name == "":
			return "(with joint)"
		case value < 0:
			return "−" + name
		}
		return name
	})
}
