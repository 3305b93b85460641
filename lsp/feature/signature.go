package feature

import (
	"slices"
	"strings"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Signature is a form of what is being written.
type Signature struct {
	Label string
	// Does says what it means, as Markdown.
	Does string
	// Parameters are parts of the label, as spans in it.
	Parameters []source.Span
}

// Help is the forms of what is being written at a place, with the one and the
// parameter that the place is at.
type Help struct {
	Signatures        []Signature
	Active, Parameter int
}

// SignatureAt returns the forms of what is being written at a place: of a
// function's arguments, of a load, of a member's options, of a statement.
func SignatureAt(tree *syntax.Tree, offset int) (Help, bool) {
	i := tree.UnitBefore(offset)
	if i < 0 || tree.File.LineAt(offset) > tree.File.LineAt(tree.Units[i].End) {
		return Help{}, false
	}
	u := &tree.Units[i]
	if offset <= u.Start || u.Statement.Kind == syntax.CloseKind {
		return Help{}, false
	}
	written := tree.File.Text[u.Start:min(offset, len(tree.File.Text))]
	if h, ok := functionHelp(written); ok {
		return h, true
	}
	switch u.Statement.Kind {
	case syntax.UnknownKind:
		return Help{}, false
	case syntax.LoadKind:
		return loadHelp(written), true
	case syntax.BeamKind, syntax.BarKind:
		if strings.Contains(written, ",") {
			return optionHelp(written), true
		}
	case syntax.SectionKind:
		if strings.Contains(written, "=") {
			return shapeHelp(written), true
		}
	}
	k, ok := syntax.KeywordOf(u.Statement.Kind.Word())
	if !ok {
		return Help{}, false
	}
	return Help{Signatures: []Signature{form(k.Form, k.Does)}, Parameter: -1}, true
}

// form makes a signature of a form in words; its parameters are what stands in
// capitals.
func form(label, does string) Signature {
	s := Signature{Label: label, Does: does}
	for _, t := range syntax.Tokens(label) {
		if word := t.In(label); t.Kind == syntax.Word && len(word) > 1 && word == strings.ToUpper(word) && word != strings.ToLower(word) {
			s.Parameters = append(s.Parameters, t.Span())
		}
	}
	return s
}

// functionHelp finds the innermost call that is open at the end of a text.
func functionHelp(written string) (Help, bool) {
	type call struct {
		name   string
		commas int
	}
	var open []call
	last := ""
	for _, t := range syntax.Tokens(written) {
		word := t.In(written)
		switch {
		case t.Trivia():
			continue
		case word == "(":
			open = append(open, call{name: last})
		case word == ")" && len(open) > 0:
			open = open[:len(open)-1]
		case word == "," && len(open) > 0:
			open[len(open)-1].commas++
		}
		last = word
	}
	for i := len(open) - 1; i >= 0; i-- {
		for _, f := range resolve.Functions() {
			if f.Name == open[i].name {
				s := Signature{Label: f.Form, Does: f.Does, Parameters: arguments(f.Form)}
				return Help{Signatures: []Signature{s}, Parameter: min(open[i].commas, max(0, len(s.Parameters)-1))}, true
			}
		}
	}
	return Help{}, false
}

// arguments are the places of the arguments in a form such as "atan2(z, x)".
func arguments(form string) []source.Span {
	start := strings.IndexByte(form, '(') + 1
	end := strings.LastIndexByte(form, ')')
	if start == 0 || end < start {
		return nil
	}
	var list []source.Span
	for _, part := range strings.SplitAfter(form[start:end], ",") {
		text := strings.TrimSpace(strings.TrimSuffix(part, ","))
		at := start + strings.Index(part, text)
		list = append(list, source.Span{Start: at, End: at + len(text)})
		start += len(part)
	}
	return list
}

// loadForms are the forms of a load line, by the language reference.
var loadForms = []Signature{
	form("MEMBER: 3 kN/m DIRECTION", "Line load over the whole member. The unit says what a load is."),
	form("MEMBER from 1 m to 3 m: 3 kN/m to 5 kN/m DIRECTION", "Line load on a part, with a linear change."),
	form("MEMBER: 3 kN/m down on plan", "Line load per length of the member's projection on the ground; on elevation for horizontal loads."),
	form("MEMBER at 2 m: 4 kN DIRECTION", "Point load on the member."),
	form("MEMBER at 2 m: 4 kNm about y", "Moment on the member."),
	form("MEMBER: 20 K", "Uniform warming; 20 K across z: the + side is warmer by so much."),
	form("MEMBER: 3 mm", "Lack of fit, positive when made too long."),
	form("MEMBER: 10 kN pretension", "Initial tension."),
	form("NODE: 4 kN DIRECTION", "Force at the node."),
	form("NODE: 4 kNm about y", "Moment at the node."),
	form("NODE: 5 mm DIRECTION", "Settlement of a held node."),
	form("self-weight", "The weight of all members and masses; self-weight of GROUP, 1.1 self-weight."),
}

// loadHelp picks the form that is nearest to what is written.
func loadHelp(written string) Help {
	h := Help{Signatures: loadForms, Parameter: -1}
	has := func(word string) bool { return strings.Contains(" "+written+" ", " "+word+" ") }
	switch {
	case has("from"):
		h.Active = 1
	case has("plan") || has("elevation"):
		h.Active = 2
	case has("at") && has("about"):
		h.Active = 4
	case has("at"):
		h.Active = 3
	case has("K"):
		h.Active = 5
	case has("pretension"):
		h.Active = 7
	}
	return h
}

var optionForms = []Signature{
	form("hinge at NODE", "Releases all bending moments at an end."),
	form("release My at NODE", "Releases some of N, Vy, Vz, T, My, Mz, in member axes."),
	form("joint My at NODE 12 MNm/rad", "A semi-rigid joint, in member axes."),
	form("roll 30 deg", "Turns the member's y and z about its x."),
	form("offset NODE (0, 0, -0.2) m", "A rigid piece from the node to the member's end, global; two parts in a plane model."),
	form("tension only", "The member takes no compression."),
	form("compression only", "The member takes no tension."),
}

func optionHelp(written string) Help {
	return beginningLike(optionForms, written[strings.LastIndexByte(written, ',')+1:])
}

// beginningLike picks the form that begins with the first word of a text.
func beginningLike(forms []Signature, text string) Help {
	h := Help{Signatures: forms, Parameter: -1}
	first, _, _ := strings.Cut(strings.TrimSpace(text), " ")
	if i := slices.IndexFunc(forms, func(s Signature) bool { return first != "" && strings.HasPrefix(s.Label, first) }); i >= 0 {
		h.Active = i
	}
	return h
}

var shapeForms = []Signature{
	form("IPE 300 of MATERIAL", "A section of the catalogue: series and size."),
	form("rect 200 x 400 mm of MATERIAL", "Width and depth."),
	form("round 24 mm of MATERIAL", "Diameter of a solid bar."),
	form("pipe 114.3 x 5 mm of MATERIAL", "Outer diameter and wall."),
	form("tube 100 x 60 x 4 mm of MATERIAL", "Depth, width and wall of a hollow section."),
	form("angle 80 x 80 x 8 mm of MATERIAL", "Depth, width and thickness."),
	form("{ A 53.8 cm2, Iy 8360 cm4, Wy 557 cm3 } of MATERIAL", "Given properties; what an analysis does not need may be left out."),
}

func shapeHelp(written string) Help {
	return beginningLike(shapeForms, written[strings.IndexByte(written, '=')+1:])
}
