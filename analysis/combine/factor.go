package combine

import (
	"math"
	"strconv"
	"strings"

	"spanwright/lang/model"
)

// The symbols of overrides.
const (
	symbolGamma = "gamma"
	symbolXi    = "xi"
)

var symbolPsi = [3]string{"psi0", "psi1", "psi2"}

// override returns what the file says in place of the code's value of a
// symbol for a case: what is said for the case itself comes before what is
// said for its kind and category, and that before what is said for its kind.
// Of several the last counts.
func (a *arranger) override(symbol string, i int) (model.Override, bool) {
	c := &a.m.Cases[i]
	best, rank := model.Override{}, 0
	for _, o := range a.family.Overrides {
		if !strings.EqualFold(o.Symbol, symbol) {
			continue
		}
		r := 0
		switch {
		case o.Case == i:
			r = 3
		case o.Case >= 0 || o.Kind != c.Kind:
		case o.Category != 0 && o.Category == c.Category:
			r = 2
		case o.Category == 0:
			r = 1
		}
		if r > 0 && r >= rank {
			best, rank = o, r
		}
	}
	return best, rank > 0
}

// gammaOf returns the partial factors of a case.
func (a *arranger) gammaOf(i int) partial {
	if o, ok := a.override(symbolGamma, i); ok {
		return partial{o.Unfavourable, o.Favourable}
	}
	return a.code.gamma(ActionOf(&a.m.Cases[i]), a.options)
}

// variableFactor returns the factor of a case that is not permanent.
func (a *arranger) variableFactor(i int, f factor, leading bool) float64 {
	value := f.number
	if !f.gamma && f.psi == 0 && a.family.Code == model.ASCE7 {
		// The factor is one number: gamma replaces it where the load leads,
		// psi0 where it accompanies.
		symbol := symbolPsi[0]
		if leading {
			symbol = symbolGamma
		}
		if o, ok := a.override(symbol, i); ok {
			return o.Unfavourable
		}
		return value
	}
	if f.gamma {
		value *= a.gammaOf(i).unfavourable
	}
	if f.psi > 0 {
		psi := a.code.psi(ActionOf(&a.m.Cases[i]), a.options)[f.psi-1]
		if o, ok := a.override(symbolPsi[f.psi-1], i); ok {
			psi = o.Unfavourable
		}
		value *= psi
	}
	return tidy(value)
}

// permanentFactors returns the two factors of a permanent case.
func (a *arranger) permanentFactors(i int, e *expression) (unfavourable, favourable float64) {
	unfavourable, favourable = e.unfavourable.number, e.favourable.number
	if a.family.Code == model.ASCE7 {
		o, ok := a.override(symbolGamma, i)
		switch {
		case ok && e.low:
			return o.Favourable, o.Favourable
		case ok && len(e.terms) > 0: // the dead load alone keeps its 1.4
			return o.Unfavourable, o.Unfavourable
		}
		return unfavourable, favourable
	}
	gamma := a.gammaOf(i)
	if e.unfavourable.gamma {
		unfavourable *= gamma.unfavourable
	}
	if e.favourable.gamma {
		favourable *= gamma.favourable
	}
	if e.unfavourable.xi {
		xi := a.code.xi
		if o, ok := a.override(symbolXi, i); ok {
			xi = o.Unfavourable
		}
		unfavourable *= xi
	}
	return tidy(unfavourable), tidy(favourable)
}

// tidy rounds a product of factors to twelve decimals, so that 1.5 · 0.7 is
// 1.05 and not its neighbour.
func tidy(value float64) float64 { return math.Round(value*1e12) / 1e12 }

// factorKey is a text that two combinations share only if they are the same.
func factorKey(factors []model.Factor) string {
	var b []byte
	for _, f := range factors {
		b = strconv.AppendInt(b, int64(f.Case), 10)
		b = append(b, ':')
		b = strconv.AppendFloat(b, f.Factor, 'g', -1, 64)
		b = append(b, ' ')
	}
	return string(b)
}
