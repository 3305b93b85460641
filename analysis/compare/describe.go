package compare

import (
	"fmt"
	"strconv"
	"strings"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// Kind is what a thing is, in a word for people.
type Kind string

// The kinds of things, in the order in which they are matched: what others
// refer to comes first.
const (
	Header      Kind = "model"
	Material    Kind = "material"
	Section     Kind = "section"
	Node        Kind = "node"
	MemberKind  Kind = "member"
	Support     Kind = "support"
	MassKind    Kind = "mass"
	Group       Kind = "group"
	Case        Kind = "case"
	Load        Kind = "load"
	Alternate   Kind = "alternate"
	Combination Kind = "combination"
	Family      Kind = "family"
	Limit       Kind = "limit"
)

// thing is one thing of a model with what it is.
type thing struct {
	kind Kind
	// word is what people call it: "beam", "section".
	word string
	name string
	// named: it may be renamed. Others, such as loads, are only told apart by
	// what they are.
	named      bool
	attributes []attribute
}

// attribute is one thing that can be said of a thing.
type attribute struct {
	label string
	// key is equal where the attribute is; show is for people. References are
	// names of a kind, so that renames can be followed.
	key  string
	show string
	ref  Kind
}

// anyText marks an attribute whose text has names of all kinds in it.
const anyText Kind = "text"

// describer describes the things of one model.
type describer struct {
	m *model.Model
	d quantity.Display
}

// key writes a number so that rounding in the last digits does not count.
func key(values ...float64) string {
	parts := make([]string, len(values))
	for i, v := range values {
		if parts[i] = strconv.FormatFloat(v, 'g', 9, 64); v == 0 {
			parts[i] = "0" // no minus zero
		}
	}
	return strings.Join(parts, " ")
}

func (d *describer) value(label string, v float64, dimension quantity.Dimension) attribute {
	return attribute{label: label, key: key(v), show: quantity.Write(v, d.d.For(dimension), 4)}
}

func words(label, text string) attribute { return attribute{label: label, key: text, show: text} }

func reference(label string, kind Kind, name string) attribute {
	return attribute{label: label, key: name, show: name, ref: kind}
}

func (d *describer) header() []thing {
	m := d.m
	space := "space"
	if m.Plane {
		space = "plane"
	}
	yes := map[bool]string{true: "yes", false: "no"}
	return []thing{{kind: Header, word: "model", name: "model", attributes: []attribute{
		words("title", m.Title), words("kind", space), words("second order", yes[m.SecondOrder]), words("shear flexible", yes[m.ShearFlexible]),
		{label: "gravity", key: key(m.Gravity), show: quantity.Number(m.Gravity, 6) + " m/s2"},
	}}}
}

func (d *describer) materials() []thing {
	var list []thing
	for i := range d.m.Materials {
		x := &d.m.Materials[i]
		list = append(list, thing{kind: Material, word: "material", name: x.Name, named: true, attributes: []attribute{
			words("grade", x.Grade), d.value("E", x.E, quantity.Stress), d.value("G", x.G, quantity.Stress), d.value("density", x.Density, quantity.Density),
			{label: "expansion", key: key(x.Expansion), show: quantity.Number(x.Expansion*1e6, 4) + "e-6 /K"}, d.value("yield", x.Yield, quantity.Stress),
		}})
	}
	return list
}

func (d *describer) sections() []thing {
	var list []thing
	for i := range d.m.Sections {
		x := &d.m.Sections[i]
		title := x.Title
		if title == "" {
			title = "in braces"
		}
		list = append(list, thing{kind: Section, word: "section", name: x.Name, named: true, attributes: []attribute{
			{label: "size", key: title + key(x.A, x.Iy, x.Iz, x.It, x.Wy, x.Wz, x.Avy, x.Avz, x.Depth, x.Width, x.Mass), show: title},
			reference("material", Material, d.m.Materials[x.Material].Name),
		}})
	}
	return list
}

func (d *describer) nodes() []thing {
	var list []thing
	for i := range d.m.Nodes {
		x := &d.m.Nodes[i]
		list = append(list, thing{kind: Node, word: "node", name: x.Name, named: true, attributes: []attribute{
			{label: "position", key: key(x.Position[:]...), show: d.vector(x.Position, quantity.Length)},
		}})
	}
	return list
}

// vector writes three parts in one unit, or two in a plane model.
func (d *describer) vector(v [3]float64, dimension quantity.Dimension) string {
	u := d.d.For(dimension)
	parts := []string{quantity.Number(v[0]/u.Factor, 4), quantity.Number(v[1]/u.Factor, 4), quantity.Number(v[2]/u.Factor, 4)}
	if d.m.Plane {
		parts = []string{parts[0], parts[2]}
	}
	return "(" + strings.Join(parts, ", ") + ") " + u.Symbol
}

func (d *describer) node(i int) string { return d.m.Nodes[i].Name }

func (d *describer) members() []thing {
	var list []thing
	for i := range d.m.Members {
		x := &d.m.Members[i]
		t := thing{kind: MemberKind, word: x.Kind.String(), name: x.Name, named: true}
		t.attributes = append(t.attributes, words("kind", x.Kind.String()), words("nodes", strconv.Itoa(len(x.Nodes))))
		for k, n := range x.Nodes {
			label := "through"
			switch k {
			case 0:
				label = "from"
			case len(x.Nodes) - 1:
				label = "to"
			}
			t.attributes = append(t.attributes, reference(label, Node, d.node(n)))
		}
		if x.Section >= 0 {
			t.attributes = append(t.attributes, reference("section", Section, d.m.Sections[x.Section].Name))
		}
		t.attributes = append(t.attributes, d.value("roll", x.Roll, quantity.None), words("acts", [...]string{"both ways", "tension only", "compression only"}[x.Sense]))
		for k := range x.Ends {
			end := [...]string{"first end", "last end"}[k]
			joint := d.joint(&x.Ends[k])
			t.attributes = append(t.attributes, words(end, joint), attribute{label: end + " offset", key: key(x.Ends[k].Offset[:]...), show: d.vector(x.Ends[k].Offset, quantity.Length)})
		}
		if x.Kind == model.Spring {
			t.attributes = append(t.attributes, attribute{label: "stiffness", key: key(x.Stiffness[:]...), show: d.stiffnesses(x.Stiffness)})
		}
		list = append(list, t)
	}
	return list
}

// joint says how a member's end is joined: "rigid", "releases My", "joint My 12 MNm".
func (d *describer) joint(e *model.End) string {
	var parts []string
	for i, j := range e.Joint {
		name := [...]string{"N", "Vy", "Vz", "T", "My", "Mz"}[i]
		switch j.Kind {
		case model.Released:
			parts = append(parts, "releases "+name)
		case model.SemiRigid:
			parts = append(parts, "joint "+name+" "+d.stiffness(j.Stiffness, i))
		}
	}
	if len(parts) == 0 {
		return "rigid"
	}
	return strings.Join(parts, ", ")
}

func (d *describer) stiffness(k float64, freedom int) string {
	if freedom < 3 {
		return quantity.Write(k, d.d.Force.Over(d.d.Length), 4)
	}
	return quantity.Write(k, d.d.Moment, 4) + "/rad"
}

func (d *describer) stiffnesses(list [6]float64) string {
	names := [...]string{"along", "across y", "across z", "about x", "about y", "about z"}
	var parts []string
	for i, k := range list {
		if k != 0 {
			parts = append(parts, names[i]+" "+d.stiffness(k, i))
		}
	}
	return strings.Join(parts, ", ")
}

func (d *describer) supports() []thing {
	var list []thing
	for i := range d.m.Supports {
		x := &d.m.Supports[i]
		k := ""
		for _, r := range x.Freedoms {
			k += fmt.Sprint(r.Kind, " ", key(r.Stiffness), " ")
		}
		for _, axis := range x.Axes {
			k += key(axis[:]...) + " "
		}
		list = append(list, thing{kind: Support, word: "support", name: d.node(x.Node), attributes: []attribute{
			reference("node", Node, d.node(x.Node)), {label: "holds", key: k + fmt.Sprint(x.UpOnly), show: x.Words},
		}})
	}
	return list
}

func (d *describer) masses() []thing {
	var list []thing
	for i := range d.m.Masses {
		x := &d.m.Masses[i]
		list = append(list, thing{kind: MassKind, word: "mass", name: d.node(x.Node), attributes: []attribute{
			reference("node", Node, d.node(x.Node)), d.value("mass", x.Mass, quantity.Mass), {label: "inertia", key: key(x.Inertia[:]...), show: key(x.Inertia[:]...) + " kg·m2"},
		}})
	}
	return list
}

func (d *describer) groups() []thing {
	var list []thing
	for i := range d.m.Groups {
		t := thing{kind: Group, word: "group", name: d.m.Groups[i].Name, named: true}
		for _, m := range d.m.Groups[i].Members {
			t.attributes = append(t.attributes, reference("member", MemberKind, d.m.Members[m].Name))
		}
		list = append(list, t)
	}
	return list
}

func (d *describer) cases() []thing {
	var list []thing
	for i := range d.m.Cases {
		x := &d.m.Cases[i]
		kind := x.Kind.String()
		if x.Category != 0 {
			kind += " " + string(rune(x.Category))
		}
		list = append(list, thing{kind: Case, word: "case", name: x.Name, named: true, attributes: []attribute{words("kind", kind), words("title", x.Title)}})
	}
	return list
}

// loads describes every load under the name of its case.
func (d *describer) loads() []thing {
	var list []thing
	for i := range d.m.Cases {
		for k := range d.m.Cases[i].Loads {
			list = append(list, thing{kind: Load, word: "load", name: d.m.Cases[i].Name,
				attributes: append([]attribute{reference("case", Case, d.m.Cases[i].Name)}, d.load(&d.m.Cases[i].Loads[k])...)})
		}
	}
	return list
}

// load describes one load: on what, and how much.
func (d *describer) load(l *model.Load) []attribute {
	m := d.m
	axes := ""
	if l.Axes == model.Local && l.Kind != model.Warming && l.Kind != model.Gradient && l.Kind != model.LackOfFit && l.Kind != model.Pretension {
		axes = " in member axes"
	}
	var target attribute
	switch {
	case l.Node >= 0:
		target = reference("on", Node, m.Nodes[l.Node].Name)
	case l.Member >= 0:
		target = reference("on", MemberKind, m.Members[l.Member].Name)
	default:
		target = words("on", "all members")
		if l.Members != nil {
			target = words("on", counted(len(l.Members), "member"))
		}
	}
	at := quantity.Write(l.From, d.d.Length, 4)
	between := ""
	if l.Member >= 0 && (l.From > 0 || l.To < m.Members[l.Member].Length*(1-1e-9)) {
		between = " from " + at + " to " + quantity.Write(l.To, d.d.Length, 4)
	}
	text := ""
	switch l.Kind {
	case model.NodeForce:
		text = d.vector(l.Start, quantity.Force)
	case model.NodeMoment:
		text = "moment " + d.whole(l.Start, d.d.Moment)
	case model.NodeMove:
		text = "settlement " + d.vector(l.Start, quantity.Length)
	case model.NodeTurn:
		text = "turn " + d.whole(l.Start, d.d.Angle)
	case model.PointForce:
		text = "at " + at + " " + d.vector(l.Start, quantity.Force)
	case model.PointMoment:
		text = "at " + at + " moment " + d.whole(l.Start, d.d.Moment)
	case model.LineForce:
		text = d.vector(l.Start, quantity.ForcePerLength)
		if l.Start != l.End {
			text += " to " + d.vector(l.End, quantity.ForcePerLength)
		}
		text += between
	case model.LineMoment:
		text = "moment " + d.whole(l.Start, d.d.Force) + between
	case model.Warming:
		text = "warmer by " + quantity.Number(l.Amount, 4) + " K"
	case model.Gradient:
		text = "gradient " + quantity.Number(l.Amount, 4) + " K/m"
	case model.LackOfFit:
		text = "too long by " + quantity.Write(l.Amount, d.d.Movement, 4)
	case model.Pretension:
		text = "pretension " + quantity.Write(l.Amount, d.d.Force, 4)
	case model.SelfWeight:
		text = "self-weight"
		if l.Amount != 1 {
			text = quantity.Number(l.Amount, 4) + " self-weight"
		}
	}
	k := fmt.Sprint(int(l.Kind), " ", int(l.Axes), " ", l.Axis, " ", key(l.Start[:]...), " ", key(l.End[:]...), " ", key(l.From, l.To, l.Amount), " ", len(l.Members))
	return []attribute{target, {label: "load", key: k, show: text + axes}}
}

// whole writes all three parts of a vector that a plane model keeps in its
// second one, such as a moment.
func (d *describer) whole(v [3]float64, u quantity.Unit) string {
	if d.m.Plane {
		return quantity.Write(v[1], u, 4)
	}
	return "(" + quantity.Number(v[0]/u.Factor, 4) + ", " + quantity.Number(v[1]/u.Factor, 4) + ", " + quantity.Number(v[2]/u.Factor, 4) + ") " + u.Symbol
}

func (d *describer) alternates() []thing {
	var list []thing
	for i := range d.m.Alternates {
		t := thing{kind: Alternate, word: "alternate", name: "cases that never act together"}
		for _, c := range d.m.Alternates[i].Cases {
			t.attributes = append(t.attributes, reference("case", Case, d.m.Cases[c].Name))
		}
		list = append(list, t)
	}
	return list
}

func (d *describer) combinations() []thing {
	var list []thing
	for i := range d.m.Combinations {
		x := &d.m.Combinations[i]
		t := thing{kind: Combination, word: "combination", name: x.Name, named: true}
		for _, f := range x.Factors {
			t.attributes = append(t.attributes, reference("case", Case, d.m.Cases[f.Case].Name),
				attribute{label: "factor of " + d.m.Cases[f.Case].Name, key: key(f.Factor), show: quantity.Number(f.Factor, 4)})
		}
		list = append(list, t)
	}
	return list
}

func (d *describer) families() []thing {
	var list []thing
	for i := range d.m.Families {
		x := &d.m.Families[i]
		t := thing{kind: Family, word: "family", name: x.Name, named: true, attributes: []attribute{
			words("code", [...]string{"by hand", "EN1990", "ASCE7"}[x.Code]),
			words("situation", [...]string{"strength", "characteristic", "frequent", "quasi-permanent", "allowable"}[x.Situation]), words("rule", x.Rule),
		}}
		for _, o := range x.Overrides {
			of := o.Kind.String()
			if o.Case >= 0 {
				of = d.m.Cases[o.Case].Name
			}
			t.attributes = append(t.attributes, attribute{label: o.Symbol + " of " + of, key: fmt.Sprint(o.Category, " ", key(o.Unfavourable, o.Favourable)), show: quantity.Number(o.Unfavourable, 4)})
		}
		list = append(list, t)
	}
	return list
}

// limits describes limits: their text has its names in it, so what a limit is
// named is what it measures.
func (d *describer) limits() []thing {
	var list []thing
	for i := range d.m.Limits {
		l := &d.m.Limits[i]
		list = append(list, thing{kind: Limit, word: "limit", name: measured(l.Text), attributes: []attribute{{label: "says", key: l.Text, show: strings.TrimPrefix(l.Text, "limit "), ref: anyText}}})
	}
	return list
}

// measured returns what a limit's text says before its bound.
func measured(text string) string {
	text = strings.TrimPrefix(text, "limit ")
	for _, sign := range []string{"<=", ">="} {
		if before, after, ok := strings.Cut(text, sign); ok {
			_, under, _ := strings.Cut(after, " under ")
			if under != "" {
				under = " under " + under
			}
			return strings.TrimSpace(before) + under
		}
	}
	return text
}

func counted(n int, what string) string {
	if n == 1 {
		return "1 " + what
	}
	return fmt.Sprintf("%d %ss", n, what)
}
