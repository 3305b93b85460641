package feature

import (
	"fmt"
	"math"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// Lens is a line of numbers above a statement.
type Lens struct {
	Span  source.Span
	Title string
}

// Lenses returns the lines above the model, its cases and its families. They
// speak of the last numbers, and say so where those are older than the text.
func Lenses(s *workspace.Snapshot, path string) []Lens {
	v, ok := s.View(path)
	if !ok || v.State == workspace.Library {
		return nil
	}
	m := v.Resolved.Model
	l := lenses{view: &v, numbers: v.Solution.Numbers(), file: v.Resolved.FileIndex(path)}
	if l.here(m.Heading) && m.Heading.Statement.Len() > 0 {
		l.model(m)
	}
	if l.numbers == nil {
		return l.list
	}
	for i := range m.Cases {
		if l.here(m.Cases[i].Origin) {
			l.loadCase(&m.Cases[i])
		}
	}
	for i := range m.Families {
		if l.here(m.Families[i].Origin) {
			l.family(&m.Families[i])
		}
	}
	return l.list
}

type lenses struct {
	view    *workspace.View
	numbers *analysis.Results
	file    int
	list    []Lens
}

func (l *lenses) here(o model.Origin) bool { return o.File == l.file }

func (l *lenses) add(o model.Origin, title string) {
	l.list = append(l.list, Lens{Span: o.Statement, Title: title})
}

// model says how large the model is and how the solve went, and what the last
// edit did.
func (l *lenses) model(m *model.Model) {
	size := fmt.Sprintf("%d nodes · %d members", len(m.Nodes), len(m.Members))
	if l.numbers == nil {
		l.add(m.Heading, size+" · "+l.view.Words())
		return
	}
	worst := 0.0
	for i := range l.numbers.Len() {
		worst = max(worst, l.numbers.At(i).Equilibrium().Residual)
	}
	title := fmt.Sprintf("%s · %d freedoms · %s", size, l.numbers.Freedoms(), l.view.Words())
	if l.view.State == workspace.Current {
		title += fmt.Sprintf(" · %s · equilibrium %.0e", l.numbers.Way(), worst)
	}
	l.add(m.Heading, title)
	if text := l.lastEdit(); text != "" && l.view.State == workspace.Current {
		l.add(m.Heading, text)
	}
}

// lastEdit says what the last edit did to the largest movement and to the worst
// limit, or nothing where it changed neither.
func (l *lenses) lastEdit() string {
	before, after := l.view.Solution.Before, &l.view.Solution.Effect
	if before == nil {
		return ""
	}
	text := ""
	u := l.numbers.Model().Display.Movement
	if old, now := quantity.Number(before.Movement/u.Factor, 3), quantity.Number(after.Movement/u.Factor, 3); old != now {
		text = fmt.Sprintf("largest movement %s → %s %s (%s in %s)", old, now, u.Symbol, after.Node, after.Result)
	}
	if before.Limit >= 0 && after.Limit >= 0 {
		old, now := analysis.ShareWords(before.Ratio), analysis.ShareWords(after.Ratio)
		if old != now && old != "" && now != "" {
			if text != "" {
				text += " · "
			}
			text += fmt.Sprintf("worst limit %s → %s", old, now)
		}
	}
	if text == "" {
		return ""
	}
	return "last edit: " + text
}

// loadCase says what a case comes to: the sum of its loads.
func (l *lenses) loadCase(c *model.Case) {
	i := l.view.Solution.Case(c.Name)
	if i < 0 {
		return
	}
	r := l.numbers.Case(i)
	if r.Problem() != "" {
		l.add(c.Origin, r.Problem())
		return
	}
	l.add(c.Origin, "sum of loads "+forceWords(l.numbers.Model(), r.Equilibrium().Applied)+l.older())
}

// older says that numbers are not of this text.
func (l *lenses) older() string {
	switch l.view.State {
	case workspace.Current:
		return ""
	case workspace.Overtaken:
		return " · from before the last edit"
	}
	return " · from the last version that solved"
}

// forceWords writes a resultant, its parts that are not zero, with the direction
// as drawn for upright ones.
func forceWords(m *model.Model, total [6]float64) string {
	u := m.Display.Force
	largest := math.Max(math.Abs(total[0]), math.Max(math.Abs(total[1]), math.Abs(total[2])))
	if largest == 0 {
		return "zero"
	}
	text := ""
	for i, name := range analysis.ForceNames[:3] {
		if math.Abs(total[i]) < 1e-9*largest {
			continue
		}
		if text != "" {
			text += ", "
		}
		text += name + " " + quantity.Write(total[i], u, 3)
		switch {
		case i == 2:
			text += upOrDown(total[i])
		case i == 0 && m.Plane && total[i] < 0:
			text += " ←"
		case i == 0 && m.Plane:
			text += " →"
		}
	}
	return text
}

func upOrDown(fz float64) string {
	if fz < 0 {
		return " ↓"
	}
	return " ↑"
}

// family says how many combinations there are, and between what the sum of the
// upright reactions lies.
func (l *lenses) family(f *model.Family) {
	solved := l.numbers.Model()
	for i := range solved.Families {
		if solved.Families[i].Name != f.Name {
			continue
		}
		results := l.numbers.Envelope(i).Results()
		if len(results) == 0 {
			l.add(f.Origin, "no combinations")
			return
		}
		least, most := math.Inf(1), math.Inf(-1)
		for _, r := range results {
			fz := r.Equilibrium().Reacted[2]
			least, most = min(least, fz), max(most, fz)
		}
		u := solved.Display.Force
		l.add(f.Origin, fmt.Sprintf("%s · sum of reactions Fz %s … %s ↑%s", counted(len(results), "combination"),
			quantity.Number(least/u.Factor, 3), quantity.Write(most, u, 3), l.older()))
	}
}

// counted writes a number of things: "1 combination", "12 combinations".
func counted(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}
