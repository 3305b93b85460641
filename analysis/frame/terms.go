package frame

import (
	"fmt"
	"math"

	"spanwright/analysis/element"
	"spanwright/lang/model"
)

// closedForm is a name for a stiffness and its value.
type closedForm struct {
	name  string
	value float64
}

// name finds the closed form of each entry of the stiffness in member axes.
func (k *MemberStiffness) name(s *Structure, b *model.Member, e *element.Element) {
	listed := map[string]bool{}
	for i := range 12 {
		for j := range 12 {
			value := math.Abs(k.Own[12*i+j])
			if value == 0 || !s.hasFreedom(i%6) && b.Roll == 0 || !s.hasFreedom(j%6) && b.Roll == 0 {
				continue
			}
			for _, form := range closedForms(b, e, i, j) {
				if math.Abs(form.value-value) > 1e-11*value {
					continue
				}
				k.Names[12*i+j] = form.name
				if !listed[form.name] {
					listed[form.name] = true
					k.Terms = append(k.Terms, Term{Name: form.name, Value: form.value, Row: i, Column: j})
				}
				break
			}
		}
	}
}

// closedForms lists what an entry of a member's stiffness can be. The forms of a
// beam with an end hinged are those of any table of stiffnesses of members, such
// as Przemieniecki, Theory of Matrix Structural Analysis (1968), table 5.1, with
// the turn of the hinged end condensed; Φ is its shear parameter (eq. 5.114).
func closedForms(b *model.Member, e *element.Element, i, j int) []closedForm {
	i, j = i%6, j%6
	if b.Kind == model.Spring {
		return springForms(b, e.Length(), i, j)
	}
	p, l := e.Properties(), e.Length()
	switch {
	case i == 0 && j == 0:
		return []closedForm{{"EA/L", p.EA / l}}
	case i == 3 && j == 3:
		return []closedForm{{"GIt/L", p.GIt / l}}
	case (i == 1 || i == 5) && (j == 1 || j == 5):
		return bendingForms("z", "y", p.EIz, element.ShearParameter(p.EIz, p.GAy, l), l, turns(i)+turns(j))
	case (i == 2 || i == 4) && (j == 2 || j == 4):
		return bendingForms("y", "z", p.EIy, element.ShearParameter(p.EIy, p.GAz, l), l, turns(i)+turns(j))
	}
	return nil
}

// turns is 1 for a turn and 0 for a movement.
func turns(freedom int) int { return freedom / 3 }

// bendingForms lists the forms of bending about an axis with shear along
// another, by how many of the entry's two freedoms are turns.
func bendingForms(about, along string, ei, phi, l float64, turns int) []closedForm {
	per := [...]string{"/L³", "/L²", "/L"}[turns]
	value := ei / math.Pow(l, float64(3-turns))
	form := func(factor float64) closedForm {
		text := fmt.Sprintf("%gEI%s%s", factor, about, per)
		if factor == 1 {
			text = fmt.Sprintf("EI%s%s", about, per)
		}
		return closedForm{text, factor * value}
	}
	if phi == 0 {
		fast := [...][]closedForm{{form(12)}, {form(6)}, {form(4), form(2)}}[turns]
		// One end hinged; guided (the shear released) at one end.
		return append(fast, form(3), form(1))
	}
	shear := "Φ" + along
	under := "/((1+" + shear + ")L" + [...]string{"³", "²", ""}[turns] + ")"
	with := func(numerator string, factor float64) closedForm {
		return closedForm{numerator + "EI" + about + under, factor * value / (1 + phi)}
	}
	fast := [...][]closedForm{
		{with("12", 12)},
		{with("6", 6)},
		{with("(4+"+shear+")", 4+phi), with("(2−"+shear+")", 2-phi)},
	}[turns]
	hinged := closedForm{"3EI" + about + "/((1+" + shear + "/4)L" + [...]string{"³", "²", ""}[turns] + ")", 3 * value / (1 + phi/4)}
	return append(fast, hinged, form(1))
}

// springForms names the entries of a spring, whose forces act at mid-length.
func springForms(b *model.Member, l float64, i, j int) []closedForm {
	k := b.Stiffness
	names := [6]string{"k along", "k across y", "k across z", "k about x", "k about y", "k about z"}
	if i == j {
		forms := []closedForm{{names[i], k[i]}}
		if i == 5 {
			forms = append(forms, closedForm{"k about z + k across y L²/4", k[5] + k[1]*l*l/4}, closedForm{"k about z − k across y L²/4", math.Abs(k[5] - k[1]*l*l/4)})
		}
		if i == 4 {
			forms = append(forms, closedForm{"k about y + k across z L²/4", k[4] + k[2]*l*l/4}, closedForm{"k about y − k across z L²/4", math.Abs(k[4] - k[2]*l*l/4)})
		}
		return forms
	}
	switch i + j {
	case 6: // (1, 5) and (2, 4)
		across := min(i, j)
		return []closedForm{{names[across] + " L/2", k[across] * l / 2}}
	}
	return nil
}
