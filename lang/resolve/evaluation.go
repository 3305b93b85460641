package resolve

import (
	"fmt"
	"math"
	"strings"

	"spanwright/lang/diagnostic"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// evaluation is the work on one fragment: it looks names up, works expressions
// out and collects what is wrong.
type evaluation struct {
	session *Session
	*fragment
	out *outcome
	// special gives words a meaning that they have in one place only: "length"
	// in a load's position, "yield" in a limit.
	special map[string]value
	// silent keeps findings and references back, for questions from an editor.
	silent bool
	steps  int
}

// report notes something wrong and returns it, for a fix or a related place.
func (e *evaluation) report(name diagnostic.Name, severity diagnostic.Severity, span source.Span, summary string, arguments ...any) *finding {
	if len(arguments) > 0 {
		summary = fmt.Sprintf(summary, arguments...)
	}
	f := finding{Diagnostic: diagnostic.Diagnostic{Name: name, Severity: severity, Subject: span, Summary: summary}}
	if e.silent {
		return &f
	}
	e.out.findings = append(e.out.findings, f)
	return &e.out.findings[len(e.out.findings)-1]
}

// fail notes an error.
func (e *evaluation) fail(name diagnostic.Name, span source.Span, summary string, arguments ...any) *finding {
	return e.report(name, diagnostic.Error, span, summary, arguments...)
}

// warn notes a warning.
func (e *evaluation) warn(name diagnostic.Name, span source.Span, summary string, arguments ...any) *finding {
	return e.report(name, diagnostic.Warning, span, summary, arguments...)
}

// fix adds a change of the statement's own text that mends the finding.
func (f *finding) fix(title string, span source.Span, text string) *finding {
	f.Fixes = append(f.Fixes, diagnostic.Fix{
		Title: title, Preferred: len(f.Fixes) == 0,
		Edits: []diagnostic.Edit{{Edit: source.Edit{Span: span, New: text}}},
	})
	return f
}

// relate adds another place that belongs to the finding.
func (f *finding) relate(other *fragment, message string, arguments ...any) *finding {
	if other == nil {
		return f
	}
	r := relation{symbol: other.name, message: fmt.Sprintf(message, arguments...)}
	if other.name == nil || other.name.winner() != other {
		r.symbol, r.fragment = nil, other
	}
	f.related = append(f.related, r)
	return f
}

// text returns the statement's text at a span.
func (e *evaluation) text(span source.Span) string {
	if span.Start < 0 || span.End > len(e.statement.Text) || span.End < span.Start {
		return ""
	}
	return e.statement.Text[span.Start:span.End]
}

// calls returns how a message may call an expression: by its text where that
// is short, else by a word.
func (e *evaluation) calls(n syntax.Node, otherwise string) string {
	text := strings.Join(strings.Fields(e.text(n.Place())), " ")
	if text == "" || len(text) > 28 {
		return otherwise
	}
	return text
}

// scalar works an expression out that must be a scalar of a dimension. What
// says what it is for: "a stiffness along x". ok is false where it is not, which
// has been reported then.
func (e *evaluation) scalar(x *syntax.Expression, want quantity.Dimension, what string) (float64, bool) {
	v := e.value(x)
	return e.want(v, x, want, what)
}

// want checks that a value is a scalar of a dimension.
func (e *evaluation) want(v value, x *syntax.Expression, want quantity.Dimension, what string) (float64, bool) {
	switch {
	case v.isBad():
		return 0, false
	case v.isVector():
		e.fail("wrong-dimension", x.Span, "Write %s here, as one number with its unit: %s is %s.", what, e.calls(x.Root, "this"), v.words())
		return 0, false
	case v.q().Dimension == want, v.zero:
		return v.number(), true
	case v.bare && want != quantity.None:
		e.missingUnit(x.Root, want, what)
		return 0, false
	}
	e.fail("wrong-dimension", x.Span, "Write %s here: %s is %s, not %s.", what, e.calls(x.Root, "this"), v.words(), want.Words())
	return 0, false
}

// angle works an expression out that must be an angle.
func (e *evaluation) angle(x *syntax.Expression) (float64, bool) {
	v := e.value(x)
	switch {
	case v.isBad():
		return 0, false
	case v.isVector() || v.q().Dimension != quantity.None:
		e.fail("wrong-dimension", x.Span, "Write an angle here, such as 30 deg: %s is %s.", e.calls(x.Root, "this"), v.words())
		return 0, false
	case v.bare && !v.q().Angle && v.number() != 0:
		e.fail("missing-unit", x.Span, "Write %s deg, or rad: an angle needs its unit.", e.calls(x.Root, "30")).
			fix("Write "+e.text(x.Span)+" deg", source.At(x.Span.End), " deg")
		return 0, false
	}
	return v.number(), true
}

// missingUnit says that a number lacks its unit.
func (e *evaluation) missingUnit(n syntax.Node, want quantity.Dimension, what string) {
	unit := e.likelyUnit(want)
	text := e.calls(n, "the number")
	if unit == "" {
		e.fail("missing-unit", n.Place(), "Write %s with its unit: %s is only a number, and %s is needed here.", text, text, what)
		return
	}
	e.fail("missing-unit", n.Place(), "Write %s %s, or another unit: %s is only a number, and %s is needed here.", text, unit, text, what).
		fix(fmt.Sprintf("Write %s %s", text, unit), source.At(n.Place().End), " "+unit)
}

// likelyUnit returns the unit that a number of a dimension most likely has.
func (e *evaluation) likelyUnit(d quantity.Dimension) string {
	switch d {
	case quantity.Length:
		return "m"
	case quantity.Force:
		return "kN"
	case quantity.Moment:
		return "kNm"
	case quantity.ForcePerLength:
		return "kN/m"
	case quantity.Stress:
		return "MPa"
	case quantity.Density:
		return "kg/m3"
	case quantity.Mass:
		return "kg"
	case quantity.Expansion:
		return "/K"
	case quantity.Temperature:
		return "K"
	case quantity.Area:
		return "cm2"
	case quantity.Volume:
		return "cm3"
	case quantity.SecondMoment:
		return "cm4"
	case quantity.Acceleration:
		return "m/s2"
	case quantity.Frequency:
		return "Hz"
	case quantity.MassInertia:
		return "kg*m2"
	}
	return ""
}

// vector works an expression out that must be a vector of lengths, as global
// coordinates: a plane model's (x, z) gets y = 0.
func (e *evaluation) vector(x *syntax.Expression, want quantity.Dimension, what string) ([3]float64, bool) {
	v := e.value(x)
	if v.isBad() {
		return [3]float64{}, false
	}
	parts := e.session.parts()
	example := "(2, 3) m"
	if parts == 3 {
		example = "(2, 0, 3) m"
	}
	if want == quantity.None {
		example = strings.TrimSuffix(example, " m")
	}
	switch {
	case !v.isVector():
		e.fail("not-a-vector", x.Span, "Write %s as a vector, such as %s: %s is %s.", what, example, e.calls(x.Root, "this"), v.words())
		return [3]float64{}, false
	case int(v.count) != parts:
		e.fail("wrong-vector", x.Span, "Write %s with %s, such as %s: this is a %s model.", what, partWords(parts), example, e.session.modelWord())
		return [3]float64{}, false
	}
	dimension, bare := quantity.None, false
	for i := range v.count {
		if v.parts[i].Value != 0 || v.parts[i].Dimension != quantity.None {
			dimension = v.parts[i].Dimension
			bare = dimension == quantity.None
		}
	}
	if dimension != want && !(v.allZero() && dimension == quantity.None) {
		if bare && want == quantity.Length {
			e.fail("missing-unit", x.Span, "Write %s m, or another unit: a position is made of lengths.", e.calls(x.Root, "(x, z)")).
				fix("Write "+e.calls(x.Root, "it")+" m", source.At(x.Span.End), " m")
		} else {
			e.fail("wrong-dimension", x.Span, "Write %s as a vector of lengths: the parts of %s are each %s.", what, e.calls(x.Root, "this"), dimension.Words())
		}
		return [3]float64{}, false
	}
	if parts == 2 {
		return [3]float64{v.parts[0].Value, 0, v.parts[1].Value}, true
	}
	return [3]float64{v.parts[0].Value, v.parts[1].Value, v.parts[2].Value}, true
}

func partWords(parts int) string {
	if parts == 2 {
		return "two parts (x, z)"
	}
	return "three parts (x, y, z)"
}

func (v value) allZero() bool {
	for i := range v.count {
		if v.parts[i].Value != 0 {
			return false
		}
	}
	return true
}

// tiny is the share of the model's size below which lengths count as nothing.
const tiny = 1e-9

func distance(a, b [3]float64) float64 {
	return math.Hypot(math.Hypot(b[0]-a[0], b[1]-a[1]), b[2]-a[2])
}

func minus(a, b [3]float64) [3]float64 {
	return [3]float64{a[0] - b[0], a[1] - b[1], a[2] - b[2]}
}

func plus(a, b [3]float64) [3]float64 {
	return [3]float64{a[0] + b[0], a[1] + b[1], a[2] + b[2]}
}

func times(k float64, a [3]float64) [3]float64 {
	return [3]float64{k * a[0], k * a[1], k * a[2]}
}
