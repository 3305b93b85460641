package syntax

import (
	"fmt"

	"spanwright/lang/source"
)

// check rejects what the grammar lets pass but the language does not know: the
// grammar accepts a superset, so that these get words of their own.
func (s *Statement) check() *Problem {
	switch n := s.Tree.(type) {
	case *ModelStatement:
		return n.check(s)
	case *MemberStatement:
		return n.check(s)
	case *SectionStatement:
		if n.Material == nil {
			return s.missing("missing-material", "Say what the section is made of: end the line with \"of MATERIAL\".")
		}
	case *LimitStatement:
		return n.check(s)
	case *SupportStatement:
		return n.check()
	case *CaseStatement:
		if n.Kind == nil {
			return &Problem{Name: "missing-kind", Span: n.Name.Span(), Summary: fmt.Sprintf("Say what kind of actions case %s holds: permanent, imposed, snow, wind, thermal, settlement, accidental or earthquake.", n.Name.Text)}
		}
	case *FamilyStatement:
		if n.Situation == nil {
			return s.missing("missing-situation", "Say which combinations the family holds: strength, characteristic, frequent or quasi-permanent by EN1990, strength or allowable by ASCE7.")
		}
	case *LoadLine:
		if n.From != nil && n.Until == nil {
			return &Problem{Name: "missing-to", Span: n.From.Span, Summary: "Say where the load ends: write \"from 1 m to 3 m\"."}
		}
	}
	return nil
}

// missing is a problem of something that should stand at the statement's end.
func (s *Statement) missing(name, summary string) *Problem {
	return &Problem{Name: name, Span: s.lastToken(), Summary: summary}
}

func (n *ModelStatement) check(s *Statement) *Problem {
	if n.Title == nil {
		return s.missing("missing-title", `Give the model a title in quotes: write model "Title" plane.`)
	}
	if n.Space == nil {
		return s.missing("missing-space", "Say whether the model is plane or space: write it behind the title.")
	}
	if w := n.Space.Text; w != "plane" && w != "space" {
		return &Problem{Name: "missing-space", Span: n.Space.Span(), Summary: fmt.Sprintf("Write plane or space instead of \"%s\".", w)}
	}
	for _, o := range n.Options {
		if p := o.check(); p != nil {
			return p
		}
	}
	return nil
}

func (o *ModelOption) check() *Problem {
	words := o.Words[0].Text
	span := o.Words[0].Span()
	if len(o.Words) > 1 {
		words += " " + o.Words[1].Text
		span = span.Join(o.Words[1].Span())
	}
	switch {
	case (words == "second order" || words == "shear flexible") && o.Value == nil:
		return nil
	case words == "gravity" && o.Value != nil:
		return nil
	case words == "gravity":
		return &Problem{Name: "incomplete-statement", Span: span, Summary: "Say how strong gravity is: write gravity 9.81 m/s2."}
	}
	return &Problem{Name: "unknown-option", Span: span, Summary: fmt.Sprintf("\"%s\" is no option of a model. Options are: second order, shear flexible, gravity 9.81 m/s2.", words)}
}

func (n *MemberStatement) check(s *Statement) *Problem {
	if len(n.Path) < 2 {
		last := n.Path[0]
		return &Problem{Name: "missing-arrow", Span: last.Span(), Summary: fmt.Sprintf("Say where %s ends: write %s.", n.Name.Text, s.Kind.Form())}
	}
	if n.Section == nil && (s.Kind == BeamKind || s.Kind == BarKind) {
		return s.missing("missing-section", fmt.Sprintf("Give %s a section: write \"of SECTION\" behind its last node.", n.Name.Text))
	}
	if n.Section != nil && (s.Kind == LinkKind || s.Kind == SpringKind) {
		return &Problem{Name: "does-not-fit", Span: n.Section.Span(), Summary: fmt.Sprintf("Delete \"of %s\": a %s has no section.", n.Section.Text, s.Kind.Word())}
	}
	if len(n.Path) > 2 && s.Kind != BeamKind {
		return &Problem{Name: "too-many-nodes", Span: n.Path[2].Span(), Summary: fmt.Sprintf("A %s goes from one node to another. Write one %s for each piece.", s.Kind.Word(), s.Kind.Word())}
	}
	for _, o := range n.Options {
		if p := o.check(s.Kind, n.Name.Text); p != nil {
			return p
		}
	}
	if s.Kind == SpringKind && len(n.Options) == 0 {
		return s.missing("missing-stiffness", "Say how stiff the spring is: write along 12 kN/mm, across z 3 kN/mm or about y 5 MNm/rad behind a comma.")
	}
	return nil
}

// place returns the span of the option's first word.
func (o *MemberOption) place() source.Span {
	switch {
	case o.Word != nil:
		return o.Word.Span()
	case o.Axis != nil:
		return o.Axis.Span()
	case o.Rate != nil:
		return o.Rate.Span
	}
	return source.Span{}
}

func (o *MemberOption) check(kind Kind, member string) *Problem {
	if o.Way != "" {
		return o.checkSpring(kind)
	}
	word := o.Word.Text
	complain := func(name, summary string) *Problem {
		return &Problem{Name: name, Span: o.place(), Summary: summary}
	}
	if kind == SpringKind || kind == LinkKind {
		return complain("unknown-option", fmt.Sprintf("\"%s\" is no option of a %s.", word, kind.Word()))
	}
	switch word {
	case "hinge":
		if o.At == nil || len(o.Whom) > 0 || o.Value != nil {
			return complain("incomplete-option", fmt.Sprintf("Say at which end the hinge is: write hinge at NODE, with an end node of %s.", member))
		}
	case "release":
		if o.At == nil || len(o.Whom) == 0 || o.Value != nil {
			return complain("incomplete-option", "Say what is released and where: write release My at NODE, with N, Vy, Vz, T, My or Mz.")
		}
	case "joint":
		if o.At == nil || len(o.Whom) == 0 || o.Value == nil {
			return complain("incomplete-option", "Say which joint, where, and how stiff: write joint My at NODE 12 MNm/rad.")
		}
	case "roll":
		if o.At != nil || o.Value == nil {
			return complain("incomplete-option", "Say by which angle the member is turned about its axis: write roll 30 deg.")
		}
	case "offset":
		if o.Value == nil {
			return complain("incomplete-option", "Say at which node and how far the member's end is off it: write offset NODE (0, 0, -0.2) m.")
		}
	case "tension", "compression":
		if !o.Only {
			return complain("incomplete-option", fmt.Sprintf("Write %s only.", word))
		}
	default:
		return complain("unknown-option", fmt.Sprintf("\"%s\" is no option of a %s. Options are: hinge at, release … at, joint … at, roll, offset, tension only, compression only.", word, kind.Word()))
	}
	return nil
}

func (o *MemberOption) checkSpring(kind Kind) *Problem {
	if kind != SpringKind {
		return &Problem{Name: "unknown-option", Span: o.place(), Summary: fmt.Sprintf("\"%s\" is an option of springs, not of a %s.", o.Way, kind.Word())}
	}
	switch {
	case o.Way == "along" && o.Axis != nil:
		return &Problem{Name: "does-not-fit", Span: o.Axis.Span(), Summary: "A spring acts along its own axis x: write along 12 kN/mm."}
	case o.Way == "across" && (o.Axis == nil || o.Axis.Text != "y" && o.Axis.Text != "z"):
		return &Problem{Name: "incomplete-option", Span: o.place(), Summary: "Say across which axis: write across y or across z, then the stiffness."}
	case o.Way == "about" && (o.Axis == nil || o.Axis.Text != "x" && o.Axis.Text != "y" && o.Axis.Text != "z"):
		return &Problem{Name: "incomplete-option", Span: o.place(), Summary: "Say about which axis: write about x, y or z, then the stiffness."}
	}
	return nil
}

func (n *SupportStatement) check() *Problem {
	for _, i := range n.Items {
		if i.Word == nil {
			continue
		}
		switch i.Word.Text {
		case "fixed", "pinned":
			if len(i.Whom) > 0 {
				return &Problem{Name: "does-not-fit", Span: i.Whom[0].Span(), Summary: fmt.Sprintf("\"%s\" does not fit behind %s. Put a comma before it.", i.Whom[0].Text, i.Word.Text)}
			}
		case "holds":
			if len(i.Whom) == 0 {
				return &Problem{Name: "incomplete-option", Span: i.Word.Span(), Summary: "Say what the support holds: write holds ux uz, with ux, uy, uz, rx, ry or rz."}
			}
		default:
			return &Problem{Name: "unknown-option", Span: i.Word.Span(), Summary: fmt.Sprintf("\"%s\" is no kind of support. Write fixed, pinned, holds ux uz ry, spring uz 12 kN/mm, turned 30 deg, or up only.", i.Word.Text)}
		}
	}
	return nil
}

func (n *LimitStatement) check(s *Statement) *Problem {
	if n.Sense == "<" || n.Sense == ">" {
		return &Problem{Name: "does-not-fit", Span: n.Words[0].Span(), Summary: fmt.Sprintf("Write %s= instead of %s.", n.Sense, n.Sense)}
	}
	return nil
}
