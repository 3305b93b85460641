package resolve

import (
	"math"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// Bounds of what a building material or a load on a frame can be. They are wide:
// common practice, not a standard. What lies outside is almost surely a slip in
// a unit.
const (
	softestE, stiffestE     = 5e5, 1.2e12 // Pa: soft rubber to diamond
	lightest, heaviest      = 5.0, 25e3   // kg/m3: foam to tungsten and beyond
	weakestYield, strongest = 1e5, 6e9    // Pa
	leastExpansion          = 1e-8        // 1/K
	mostExpansion           = 5e-4
)

// plausibleMaterial warns of values that no building material has.
func (e *evaluation) plausibleMaterial(tree *syntax.MaterialStatement, r *materialResult) {
	span := func(word string) *syntax.Property {
		for _, p := range tree.Properties {
			if p.Word.Text == word {
				return p
			}
		}
		return nil
	}
	metalDensity := r.density > 7000 && r.density < 8200
	if p := span("E"); p != nil {
		text := e.calls(p.Value.Root, "this")
		switch {
		case r.e > 100e6 && r.e < 300e6 && (metalDensity || r.yield > 150e6 || r.density == 0):
			// 210 MPa for steel: a thousandth.
			e.warn("implausible-value", p.Value.Span, "Did you mean %s GPa? E = %s is a thousandth of steel's.", quantity.Number(r.e/1e6, 4), text).
				fix("Write "+quantity.Number(r.e/1e6, 6)+" GPa", p.Value.Span, quantity.Number(r.e/1e6, 6)+" GPa")
			return
		case r.e < softestE || r.e > stiffestE:
			e.warn("implausible-value", p.Value.Span, "Check the unit of E: %s is far from any building material; steel has 210 GPa.", text)
			return
		}
	}
	if p := span("G"); p != nil && (r.g > r.e || r.g < r.e/100) {
		e.warn("implausible-value", p.Value.Span, "Check the unit of G: %s does not go with E; it is mostly a third to a half of E, less in timber.", e.calls(p.Value.Root, "this"))
		return
	}
	if p := span("density"); p != nil && r.density > 0 && (r.density < lightest || r.density > heaviest) {
		e.warn("implausible-value", p.Value.Span, "Check the unit of the density: %s is %s kg/m3; steel has 7850 kg/m3.", e.calls(p.Value.Root, "this"), quantity.Number(r.density, 3))
		return
	}
	if p := span("yield"); p != nil && (r.yield < weakestYield || r.yield > strongest || r.yield > r.e/10) {
		e.warn("implausible-value", p.Value.Span, "Check the unit of the yield stress: %s is far from any building material; S275 has 275 MPa.", e.calls(p.Value.Root, "this"))
		return
	}
	if p := span("expansion"); p != nil && r.expansion > 0 && (r.expansion < leastExpansion || r.expansion > mostExpansion) {
		e.warn("implausible-value", p.Value.Span, "Check the thermal expansion: %s is far from any building material; steel has 12e-6 /K.", e.calls(p.Value.Root, "this"))
	}
}

// plausibleSection warns of properties that do not go together: for any section,
// I is at most A·(depth)² and W = I/c.
func (e *evaluation) plausibleSection(tree *syntax.SectionStatement, s *model.Section) {
	value := func(word string) *syntax.Property {
		for _, p := range tree.Properties {
			if p.Word.Text == word {
				return p
			}
		}
		return nil
	}
	if p := value("depth"); p != nil && s.Iy > 0 && s.A > 0 {
		// The radius of gyration is at most half the depth.
		if radius := math.Sqrt(s.Iy / s.A); radius > s.Depth {
			e.warn("implausible-value", p.Value.Span, "Check depth, A and Iy together: with these values the radius of gyration, %s, is larger than the depth.", showLength(radius))
			return
		}
	}
	if p := value("Wy"); p != nil && s.Iy > 0 && s.Depth > 0 {
		if ratio := s.Wy * s.Depth / 2 / s.Iy; ratio > 1.5 || ratio < 0.1 {
			e.warn("implausible-value", p.Value.Span, "Check Wy: %s does not go with Iy and the depth, which give %s cm3.", e.calls(p.Value.Root, "this"), quantity.Number(2*s.Iy/s.Depth*1e6, 3))
			return
		}
	}
}

// plausibleLoad warns of amounts that are far from any load on a frame.
func (l *loading) plausibleLoad(kind model.LoadKind, amount float64) {
	amount = math.Abs(amount)
	if amount == 0 {
		return
	}
	var least, most float64
	what := ""
	switch kind {
	case model.NodeForce, model.PointForce:
		least, most, what = 1e-3, 1e10, "force"
	case model.LineForce:
		least, most, what = 1e-3, 1e9, "line load"
	case model.NodeMoment, model.PointMoment:
		least, most, what = 1e-3, 1e11, "moment"
	case model.NodeMove:
		most, what = 5, "settlement"
	case model.NodeTurn:
		most, what = 1, "rotation"
	default:
		return
	}
	if amount < least || amount > most {
		l.warn("implausible-value", l.tree.Amount.Span, "Check the unit: %s is far from any %s on a structure.", l.calls(l.tree.Amount.Root, "this"), what)
	}
}

// plausibleWhole warns of temperatures and lengths far from any.
func (l *loading) plausibleWhole(kind model.LoadKind, amount float64, r *memberResult) {
	switch {
	case kind == model.Warming && math.Abs(amount) > 1500:
		l.warn("implausible-value", l.tree.Amount.Span, "Check the temperature: it is a difference in K, and %s is beyond any.", l.calls(l.tree.Amount.Root, "this"))
	case kind == model.LackOfFit && math.Abs(amount) > r.length/5:
		l.warn("implausible-value", l.tree.Amount.Span, "Check the unit: a lack of fit of %s is large for a member of %s. A line load is a force per length, such as 3 kN/m.", l.calls(l.tree.Amount.Root, "this"), showLength(r.length))
	}
}
