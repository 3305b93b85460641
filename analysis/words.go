package analysis

import (
	"fmt"
	"math"
	"strings"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// Words says what a verdict comes to: "deflection of r2 is 31.4 mm in SLS.S at
// 3.2 m; the limit is 24.7 mm (127 %)."
func (r *Results) Words(l Limit) string {
	if l.Problem != "" {
		return l.Problem
	}
	m := r.model
	written := &m.Limits[l.Index]
	v := l.Governs
	unit := MeasureUnit(m.Display, written)
	show := func(value float64) string { return quantity.Write(value, unit, 3) }
	var b strings.Builder
	fmt.Fprintf(&b, "%s is %s in %s", MeasureWords(m, written, v.Member), show(v.Value), r.At(v.Result).Name())
	if !math.IsNaN(v.At) && v.Member >= 0 {
		fmt.Fprintf(&b, " at %s", PlaceWords(m, v.Member, v.At))
	}
	fmt.Fprintf(&b, "; the limit is %s", show(v.Bound))
	if share := ShareWords(v.Ratio); share != "" {
		fmt.Fprintf(&b, " (%s)", share)
	}
	b.WriteString(".")
	return b.String()
}

// ShareWords writes a ratio in percent, and nothing for one that is infinite.
func ShareWords(ratio float64) string {
	if math.IsInf(ratio, 0) || math.IsNaN(ratio) {
		return ""
	}
	percent := ratio * 100
	if ratio > 1 && math.Round(percent) <= 100 {
		return "just over 100 %" // broken, but not by a whole percent
	}
	return fmt.Sprintf("%.0f %%", percent)
}

// PlaceWords writes a place along a member: the name of the node at an end, else
// the distance from the first end.
func PlaceWords(m *model.Model, member int, at float64) string {
	b := &m.Members[member]
	switch {
	case at <= 1e-9*b.Length:
		return m.Nodes[b.Nodes[0]].Name
	case at >= (1-1e-9)*b.Length:
		return m.Nodes[b.Nodes[len(b.Nodes)-1]].Name
	}
	return quantity.Write(at, m.Display.Length, 3)
}

// The names of freedoms, as the language has them.
var (
	MovementNames = [6]string{"ux", "uy", "uz", "rx", "ry", "rz"}
	ForceNames    = [6]string{"Fx", "Fy", "Fz", "Mx", "My", "Mz"}
)

// MeasureWords writes what a limit measures, of one member where it is about
// members: "deflection of r2".
func MeasureWords(m *model.Model, l *model.Limit, member int) string {
	name := ""
	if member >= 0 {
		name = m.Members[member].Name
	}
	switch l.Measure {
	case model.Deflection:
		return "deflection of " + name
	case model.Movement:
		return MovementNames[l.Freedom] + " at " + m.Nodes[l.Node].Name
	case model.Drift:
		return "drift of " + m.Nodes[l.Node].Name + " over " + m.Nodes[l.OtherNode].Name
	case model.Stress:
		return "stress of " + name
	case model.AxialForce:
		return "axial force of " + name
	case model.ShearForce:
		return "shear of " + name
	case model.BendingMoment:
		return "moment of " + name
	case model.Reaction:
		return "reaction " + ForceNames[l.Freedom] + " at " + m.Nodes[l.Node].Name
	case model.CriticalFactor:
		return "critical factor"
	}
	return "frequency"
}

// MeasureUnit returns the unit in which values of a limit's measure are shown.
func MeasureUnit(d quantity.Display, l *model.Limit) quantity.Unit {
	switch l.Measure {
	case model.Deflection, model.Drift:
		return d.Movement
	case model.Movement:
		if l.Freedom > 2 {
			return d.Angle
		}
		return d.Movement
	case model.Stress:
		return d.Stress
	case model.BendingMoment:
		return d.Moment
	case model.Reaction:
		if l.Freedom > 2 {
			return d.Moment
		}
	case model.CriticalFactor:
		return d.For(quantity.None)
	case model.Frequency:
		return d.For(quantity.Frequency)
	}
	return d.Force
}
