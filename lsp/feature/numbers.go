package feature

import (
	"cmp"
	"fmt"
	"math"
	"slices"
	"strings"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lsp/workspace"
)

// numbers are the last results of a model with what is needed to write them.
type numbers struct {
	view     *workspace.View
	solution *workspace.Solution
	results  *analysis.Results
	model    *model.Model // that was solved; the text may have moved on
	display  quantity.Display
}

// numbersOf returns the numbers of a view, and false where there are none that
// may be shown.
func numbersOf(v *workspace.View) (*numbers, bool) {
	r := v.Solution.Numbers()
	if r == nil || v.State == workspace.Refused {
		return nil, false
	}
	return &numbers{v, v.Solution, r, r.Model(), v.Resolved.Model.Display}, true
}

// envelopes returns what is shown first: those of the families; in a model
// without any one over all combinations, or over all cases.
func (n *numbers) envelopes() []*analysis.Envelope {
	var list []*analysis.Envelope
	for i := range n.model.Families {
		if e := n.results.Envelope(i); !e.Empty() {
			list = append(list, e)
		}
	}
	if len(list) > 0 {
		return list
	}
	from, name := len(n.model.Cases), "all combinations"
	if from == n.results.Len() {
		from, name = 0, "all cases"
	}
	if n.results.Len()-from == 1 {
		name = n.results.At(from).Name()
	}
	var all []analysis.Result
	for i := from; i < n.results.Len(); i++ {
		all = append(all, n.results.At(i))
	}
	if e := n.results.EnvelopeOf(name, all); !e.Empty() {
		list = append(list, e)
	}
	return list
}

// first is the envelope that hints speak of: that of the first family.
func (n *numbers) first() (*analysis.Envelope, bool) {
	list := n.envelopes()
	if len(list) == 0 {
		return nil, false
	}
	return list[0], true
}

// freedoms returns those of the model: three in a plane, six in space.
func (n *numbers) freedoms() []int {
	if n.model.Plane {
		return []int{0, 2, 4}
	}
	return []int{0, 1, 2, 3, 4, 5}
}

func (n *numbers) forceUnit(freedom int) quantity.Unit {
	if freedom < 3 {
		return n.display.Force
	}
	return n.display.Moment
}

func (n *numbers) movementUnit(freedom int) quantity.Unit {
	if freedom < 3 {
		return n.display.Movement
	}
	return n.display.Angle
}

// unitOf returns the unit of a quantity along a member.
func (n *numbers) unitOf(q analysis.Quantity) quantity.Unit {
	switch q {
	case analysis.N, analysis.Vy, analysis.Vz:
		return n.display.Force
	case analysis.T, analysis.My, analysis.Mz:
		return n.display.Moment
	case analysis.Deflection:
		return n.display.Movement
	}
	return n.display.Stress
}

// component writes a force, a moment, a movement or a turn with the arrow that
// shows its sense in a drawing with x to the right and z up.
func (n *numbers) component(value float64, freedom int, u quantity.Unit, unit bool) string {
	write := func(v float64) string {
		if unit {
			return quantity.Write(v, u, 3)
		}
		return quantity.Number(v/u.Factor, 3)
	}
	if nothing(value, u) {
		return write(0)
	}
	return write(value) + n.arrow(value, freedom)
}

// nothing says that a value is zero to any engineer: less than a thousand
// millionth of the unit that it is shown in, 1 µN or 1 picometre. Rounding leaves
// such values where loads are in balance by themselves.
func nothing(value float64, u quantity.Unit) bool { return math.Abs(value) < 1e-9*u.Factor }

func (n *numbers) arrow(value float64, freedom int) string {
	arrows := map[int][2]string{0: {" →", " ←"}, 2: {" ↑", " ↓"}}
	if n.model.Plane {
		arrows[4] = [2]string{" ↻", " ↺"} // about +y, z turns toward x
	} else {
		delete(arrows, 0)
	}
	pair, ok := arrows[freedom]
	switch {
	case !ok:
		return ""
	case value < 0:
		return pair[1]
	}
	return pair[0]
}

// directed writes the size of a force with its arrow in front, or a moment, or
// a force that has no arrow, with its sign behind its name.
func (n *numbers) directed(value float64, freedom int) string {
	u := n.forceUnit(freedom)
	if arrow := strings.TrimSpace(n.arrow(value, freedom)); arrow != "" {
		return arrow + " " + number(math.Abs(value), u)
	}
	return analysis.ForceNames[freedom] + " " + number(value, u)
}

// name returns the name of the result that governs.
func (n *numbers) name(g analysis.Governed) string {
	if g.Result < 0 {
		return ""
	}
	return n.results.At(g.Result).Name()
}

// number writes an SI value in a unit, without the unit.
func number(value float64, u quantity.Unit) string { return quantity.Number(value/u.Factor, 3) }

func percent(share float64) string { return fmt.Sprintf("%.0f %%", 100*share) }

// spanRatio writes a deflection as a share of the length: "length/435".
func spanRatio(length, deflection float64) string {
	if deflection == 0 {
		return ""
	}
	return "length/" + quantity.Number(math.Abs(length/deflection), 3)
}

// governing returns what governs a member. Of a bar it is the axial force with
// its stress: how the bar bends between its ends under loads of its own is no
// matter of the structure.
func (n *numbers) governing(e *analysis.Envelope, member int) []analysis.Governing {
	list := slices.DeleteFunc(e.Governing(member), func(g analysis.Governing) bool { return nothing(g.Value, n.unitOf(g.Quantity)) })
	b := &n.model.Members[member]
	if b.Kind != model.Bar || b.Section < 0 {
		return list
	}
	list = slices.DeleteFunc(list, func(g analysis.Governing) bool { return g.Quantity != analysis.N })
	s := &n.model.Sections[b.Section]
	if len(list) == 0 || s.A == 0 {
		return nil
	}
	stress := slices.MaxFunc(list, func(a, b analysis.Governing) int { return cmp.Compare(math.Abs(a.Value), math.Abs(b.Value)) })
	stress.Quantity, stress.Value, stress.Share = analysis.NormalStress, stress.Value/s.A, 0
	if fy := n.model.Materials[s.Material].Yield; fy > 0 {
		stress.Share = math.Abs(stress.Value) / fy
	}
	return append(list, stress)
}
