package resolve

import (
	"math"
	"slices"
	"strings"

	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// Function is a function of the language.
type Function struct {
	Name string
	// Form shows its arguments: "atan2(z, x)".
	Form string
	// Does says what it returns.
	Does string
	// Least and Most bound the number of arguments; Most is −1 where there is no
	// bound.
	Least, Most int
}

var functions = []Function{
	{"sqrt", "sqrt(x)", "The square root; of an area, a length.", 1, 1},
	{"abs", "abs(x)", "The size without the sign; of a vector, its length.", 1, 1},
	{"min", "min(a, b, …)", "The smallest of values of one dimension.", 1, -1},
	{"max", "max(a, b, …)", "The largest of values of one dimension.", 1, -1},
	{"sin", "sin(angle)", "The sine of an angle.", 1, 1},
	{"cos", "cos(angle)", "The cosine of an angle.", 1, 1},
	{"tan", "tan(angle)", "The tangent of an angle.", 1, 1},
	{"asin", "asin(x)", "The angle whose sine is x.", 1, 1},
	{"acos", "acos(x)", "The angle whose cosine is x.", 1, 1},
	{"atan", "atan(x)", "The angle whose tangent is x.", 1, 1},
	{"atan2", "atan2(rise, run)", "The angle of a slope, in all four quadrants.", 2, 2},
	{"hypot", "hypot(a, b)", "The hypotenuse: the root of a² + b².", 2, 2},
	{"floor", "floor(x)", "The next whole number below a plain number.", 1, 1},
	{"ceil", "ceil(x)", "The next whole number above a plain number.", 1, 1},
	{"round", "round(x)", "The nearest whole number to a plain number.", 1, 1},
}

// Functions returns the functions of the language. The slice is the caller's
// own.
func Functions() []Function { return slices.Clone(functions) }

func functionNames() []string {
	names := make([]string, len(functions))
	for i, f := range functions {
		names[i] = f.Name
	}
	return names
}

// call works a function out.
func (e *evaluation) call(n *syntax.CallNode) value {
	// All arguments are worked out, so that every name in them is looked up.
	arguments := make([]value, len(n.Arguments))
	whole := true
	for i, a := range n.Arguments {
		arguments[i] = e.node(a)
		whole = whole && !arguments[i].isBad()
	}
	name := n.Function.Text
	i := slices.IndexFunc(functions, func(f Function) bool { return f.Name == name })
	if i < 0 {
		return e.unknownFunction(n)
	}
	f := functions[i]
	if len(n.Arguments) < f.Least || f.Most >= 0 && len(n.Arguments) > f.Most {
		e.fail("wrong-arguments", n.Span, "Write %s: this call has %d values.", f.Form, len(n.Arguments))
		return bad
	}
	if !whole {
		return bad
	}
	if name == "abs" && arguments[0].isVector() {
		return norm(arguments[0])
	}
	for i, a := range arguments {
		if a.isVector() {
			e.fail("vector-operation", n.Arguments[i].Place(), "Give %s a number: %s is a vector.", name, e.calls(n.Arguments[i], "this"))
			return bad
		}
	}
	v := e.apply(n, arguments)
	if !v.isBad() && !v.finite() {
		e.fail("not-finite", n.Span, "Change the value in %s: %s has no result for it.", e.calls(n, "this call"), name)
		return bad
	}
	return v
}

// norm returns a vector's length.
func norm(v value) value {
	q := v.parts[0]
	q.Value = math.Hypot(math.Hypot(v.parts[0].Value, v.parts[1].Value), v.parts[2].Value)
	return scalar(q)
}

func (e *evaluation) apply(n *syntax.CallNode, a []value) value {
	x := a[0].q()
	switch n.Function.Text {
	case "sqrt":
		d, ok := x.Dimension.Root()
		if !ok {
			e.fail("wrong-dimension", n.Span, "Take the root of something square: %s is %s.", e.calls(n.Arguments[0], "this"), a[0].words())
			return bad
		}
		return scalar(quantity.Quantity{Value: math.Sqrt(x.Value), Dimension: d})
	case "abs":
		x.Value = math.Abs(x.Value)
		return scalar(x)
	case "min", "max", "hypot", "atan2":
		return e.alike(n, a)
	case "floor", "ceil", "round", "sin", "cos", "tan", "asin", "acos", "atan":
		if x.Dimension != quantity.None {
			what := "a plain number"
			if n.Function.Text == "sin" || n.Function.Text == "cos" || n.Function.Text == "tan" {
				what = "an angle"
			}
			e.fail("wrong-dimension", n.Arguments[0].Place(), "Give %s %s: %s is %s.", n.Function.Text, what, e.calls(n.Arguments[0], "this"), a[0].words())
			return bad
		}
	}
	angle := func(y float64) value { return scalar(quantity.Quantity{Value: y, Angle: true}) }
	switch n.Function.Text {
	case "floor":
		return plain(math.Floor(x.Value))
	case "ceil":
		return plain(math.Ceil(x.Value))
	case "round":
		return plain(math.Round(x.Value))
	case "sin":
		return plain(math.Sin(x.Value))
	case "cos":
		return plain(math.Cos(x.Value))
	case "tan":
		return plain(math.Tan(x.Value))
	case "asin":
		return angle(math.Asin(x.Value))
	case "acos":
		return angle(math.Acos(x.Value))
	}
	return angle(math.Atan(x.Value))
}

// alike works out the functions whose arguments must have one dimension.
func (e *evaluation) alike(n *syntax.CallNode, a []value) value {
	name := n.Function.Text
	r := a[0].q()
	for i := 1; i < len(a); i++ {
		q := a[i].q()
		switch {
		case a[i].zero:
			q.Dimension = r.Dimension
		case a[0].zero && r.Value == 0:
			r.Dimension = q.Dimension
		case q.Dimension != r.Dimension:
			e.fail("dimension-mismatch", n.Arguments[i].Place(), "Give %s values that are alike: %s is %s, %s is %s.", name,
				e.calls(n.Arguments[0], "the first"), a[0].words(), e.calls(n.Arguments[i], "this"), a[i].words())
			return bad
		}
		r.Angle = r.Angle || q.Angle
		switch name {
		case "min":
			r.Value = math.Min(r.Value, q.Value)
		case "max":
			r.Value = math.Max(r.Value, q.Value)
		case "hypot":
			r.Value = math.Hypot(r.Value, q.Value)
		case "atan2":
			r = quantity.Quantity{Value: math.Atan2(r.Value, q.Value), Angle: true}
		}
	}
	return scalar(r)
}

func (e *evaluation) unknownFunction(n *syntax.CallNode) value {
	near := nearest(n.Function.Text, functionNames())
	if len(near) == 0 {
		e.fail("unknown-function", n.Function.Span, "Use one of %s: %s is no function.", strings.Join(functionNames(), ", "), n.Function.Text)
		return bad
	}
	e.fail("unknown-function", n.Function.Span, "Write %s: %s is no function.", near[0], n.Function.Text).
		fix("Write "+near[0], n.Function.Span, near[0])
	return bad
}
