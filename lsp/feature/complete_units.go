package feature

import (
	"slices"
	"strings"

	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
)

// behindNumber reports whether the word being typed stands right behind a
// number, where a unit is the likeliest.
func (c *completer) behindNumber() bool {
	words := c.before
	if c.expected.Prefix != "" && len(words) > 0 {
		words = words[:len(words)-1]
	}
	return len(words) > 0 && words[len(words)-1].Kind == syntax.Number
}

// tradeUnits are the joined units of the trade, with what they measure.
var tradeUnits = []struct {
	symbol    string
	dimension quantity.Dimension
}{
	{"kN/m", quantity.ForcePerLength}, {"N/mm", quantity.ForcePerLength}, {"kN/mm", quantity.ForcePerLength}, {"MN/m", quantity.ForcePerLength},
	{"kN/m2", quantity.Stress}, {"N/mm2", quantity.Stress}, {"kg/m3", quantity.Density}, {"/K", quantity.Expansion},
	{"kNm/rad", quantity.Moment}, {"MNm/rad", quantity.Moment}, {"kNm/m", quantity.Force}, {"m/s2", quantity.Acceleration}, {"K/m", quantity.TemperaturePerLength},
}

// units proposes units of the dimensions that fit the place; where that cannot
// be told, all. Right behind a number the list changes with each letter.
func (c *completer) units(behindNumber bool) {
	c.result.Incomplete = c.result.Incomplete || behindNumber
	wanted := c.dimensions()
	display := quantity.Metric()
	if c.viewed {
		display = c.view.Resolved.Model.Display
	}
	// In the order of what is wanted; the units of the display first, customary
	// ones last where the file is metric.
	rank := func(u quantity.Unit, symbol string) int {
		rank := 3 * max(0, slices.IndexFunc(wanted, func(w want) bool { return w.dimension == u.Dimension && w.angle == u.Angle }))
		if !behindNumber {
			rank += 6
		}
		if symbol != display.For(u.Dimension).Symbol {
			rank++
		}
		if u.Customary != display.Force.Customary {
			rank++
		}
		return rank
	}
	fits := func(d quantity.Dimension, angle bool) bool {
		return len(wanted) == 0 || slices.ContainsFunc(wanted, func(w want) bool { return w.dimension == d && w.angle == angle })
	}
	for _, u := range quantity.Units() {
		if fits(u.Dimension, u.Angle) {
			c.add(Proposal{Label: u.Symbol, Detail: u.Name, Kind: UnitProposal, Rank: rank(u, u.Symbol), Key: "unit:" + u.Symbol})
		}
	}
	if !behindNumber {
		return
	}
	for _, x := range tradeUnits {
		if len(wanted) > 0 && fits(x.dimension, false) {
			c.add(Proposal{Label: x.symbol, Detail: x.dimension.Words(), Kind: UnitProposal,
				Rank: rank(quantity.Unit{Dimension: x.dimension, Customary: display.Force.Customary}, x.symbol)})
		}
	}
}

// want is a dimension that fits a place.
type want struct {
	dimension quantity.Dimension
	angle     bool
}

func wants(list ...quantity.Dimension) []want {
	var all []want
	for _, d := range list {
		all = append(all, want{dimension: d})
	}
	return all
}

var angle = want{angle: true}

// dimensions returns what may be measured at the place; nothing where anything
// may be.
func (c *completer) dimensions() []want {
	if len(c.before) == 0 {
		return nil
	}
	keyword, known := syntax.KeywordOf(c.before[0].In(c.text))
	has := func(word string) bool {
		return slices.ContainsFunc(c.before, func(t syntax.Token) bool { return t.In(c.text) == word })
	}
	property := c.word(1)
	switch {
	case !known:
		return c.loadDimensions(has)
	case keyword.Kind == syntax.NodeKind:
		return wants(quantity.Length)
	case keyword.Kind == syntax.MaterialKind:
		return map[string][]want{"E": wants(quantity.Stress), "G": wants(quantity.Stress), "yield": wants(quantity.Stress),
			"density": wants(quantity.Density), "expansion": wants(quantity.Expansion)}[property]
	case keyword.Kind == syntax.SectionKind:
		return wants(quantity.Length, quantity.Length.Times(quantity.Length), quantity.SecondMoment, quantity.Length.Times(quantity.Length).Times(quantity.Length))
	case keyword.Kind == syntax.MassKind:
		return wants(quantity.Mass, quantity.MassInertia)
	case keyword.Kind == syntax.SupportKind && has("turned"), property == "roll", property == "turned":
		return []want{angle}
	case keyword.Kind == syntax.SupportKind, keyword.Kind == syntax.SpringKind:
		return wants(quantity.ForcePerLength, quantity.Moment)
	case keyword.Kind == syntax.BeamKind || keyword.Kind == syntax.BarKind:
		if has("joint") {
			return wants(quantity.ForcePerLength, quantity.Moment)
		}
		return wants(quantity.Length)
	case keyword.Kind == syntax.LimitKind && len(c.before) > 1:
		return limitDimensions(c.before[1].In(c.text), c.text)
	case keyword.Kind == syntax.ModelKind:
		return wants(quantity.Acceleration)
	}
	return nil
}

// limitDimensions are those of a measure.
func limitDimensions(measure, line string) []want {
	switch measure {
	case "deflection", "drift", "ux", "uy", "uz":
		return wants(quantity.Length)
	case "rx", "ry", "rz":
		return []want{angle}
	case "stress":
		return wants(quantity.Stress)
	case "axial", "shear":
		return wants(quantity.Force)
	case "moment":
		return wants(quantity.Moment)
	case "reaction":
		if strings.Contains(line, " M") {
			return wants(quantity.Moment)
		}
		return wants(quantity.Force)
	case "frequency":
		return wants(quantity.Frequency)
	}
	return nil
}

// loadDimensions are those of an amount behind the colon, by what is loaded,
// and lengths before it.
func (c *completer) loadDimensions(has func(string) bool) []want {
	if !has(":") {
		if has("at") || has("from") {
			return wants(quantity.Length)
		}
		return nil
	}
	who := c.before[0].In(c.text)
	if c.viewed {
		for _, d := range c.view.Resolved.Visible(c.tree.File.Path, c.offset)[who] {
			if d.Kind == resolve.NodeName {
				return append(wants(quantity.Force, quantity.Moment, quantity.Length), angle)
			}
		}
	}
	if has("at") {
		return wants(quantity.Force, quantity.Moment)
	}
	return wants(quantity.ForcePerLength, quantity.Force, quantity.Temperature, quantity.TemperaturePerLength, quantity.Length, quantity.Stress)
}
