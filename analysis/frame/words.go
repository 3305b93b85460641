package frame

import (
	"fmt"
	"math"
	"strings"
)

// movementNames and axisNames are how freedoms are called.
var (
	movementNames = [6]string{"ux", "uy", "uz", "rx", "ry", "rz"}
	axisNames     = [3]string{"x", "y", "z"}
)

// Error says in words what moves and what would stop it.
func (e *MechanismError) Error() string {
	text := "the structure can move without resistance: " + e.MovesInWords()
	if e.Load != "" {
		text = strings.TrimSuffix(text, ".") + ", and " + e.Load + "."
	}
	if e.Slack != "" {
		text = strings.TrimSuffix(text, ".") + " when " + e.Slack + "."
	}
	if r := e.RemedyInWords(); r != "" {
		text += " " + r
	}
	return text
}

// MovesInWords says which nodes move which way, for at most three shapes.
func (e *MechanismError) MovesInWords() string {
	var sentences []string
	for i := range e.Shapes {
		if i == 3 {
			sentences = append(sentences, fmt.Sprintf("and %d more movements", len(e.Shapes)-3))
			break
		}
		sentences = append(sentences, e.shapeInWords(e.Shapes[i]))
	}
	return strings.Join(sentences, "; ") + "."
}

// shapeInWords says what one shape does: who moves along which axis, and who
// only turns.
func (e *MechanismError) shapeInWords(shape [][6]float64) string {
	s := e.structure
	var along [3][]string
	var turning []string
	for node, v := range shape {
		v = s.scaled(v, 1)
		moves := false
		for k := range 3 {
			if math.Abs(v[k]) > 1e-6 {
				along[k] = append(along[k], s.nodeName(node))
				moves = true
			}
		}
		if !moves && max(math.Abs(v[3]), math.Abs(v[4]), math.Abs(v[5])) > 1e-6 {
			turning = append(turning, s.nodeName(node))
		}
	}
	var parts []string
	said := map[string]int{}
	for k, names := range along {
		if len(names) == 0 {
			continue
		}
		who := listed(names)
		if at, ok := said[who]; ok { // the same nodes along another axis too
			parts[at] += " and " + axisNames[k]
			continue
		}
		said[who] = len(parts)
		parts = append(parts, who+verb(names, " moves", " move")+" along "+axisNames[k])
	}
	text := strings.Join(parts, ", ")
	if len(turning) > 0 {
		turns := listed(turning) + verb(turning, " turns", " turn") + e.aboutOneAxis(shape)
		if text == "" {
			return turns
		}
		text += " while " + turns
	}
	return text
}

// aboutOneAxis names the axis that everything turns about, where there is one.
func (e *MechanismError) aboutOneAxis(shape [][6]float64) string {
	if e.structure.model.Plane {
		return ""
	}
	axis := -1
	for _, v := range shape {
		v = e.structure.scaled(v, 1)
		for k := range 3 {
			if math.Abs(v[3+k]) > 1e-6 {
				if axis >= 0 && axis != k {
					return ""
				}
				axis = k
			}
		}
	}
	if axis < 0 {
		return ""
	}
	return " about " + axisNames[axis]
}

func verb(names []string, one, many string) string {
	if len(names) == 1 {
		return one
	}
	return many
}

// listed writes names as "A, B and C", and no more than six of them.
func listed(names []string) string {
	const most = 6
	if len(names) > most {
		return strings.Join(names[:most-1], ", ") + fmt.Sprintf(" and %d more", len(names)-most+1)
	}
	if len(names) == 1 {
		return names[0]
	}
	return strings.Join(names[:len(names)-1], ", ") + " and " + names[len(names)-1]
}

// RemedyInWords says which restraints would stop the movement.
func (e *MechanismError) RemedyInWords() string {
	if len(e.Remedy) == 0 {
		return ""
	}
	var parts []string
	for i, r := range e.Remedy {
		if i == 4 {
			parts = append(parts, fmt.Sprintf("%d more", len(e.Remedy)-4))
			break
		}
		parts = append(parts, fmt.Sprintf("%s at %s", movementNames[r.Freedom], e.structure.nodeName(r.Node)))
	}
	if len(e.Remedy) == 1 {
		return "A support that holds " + parts[0] + " stops it."
	}
	return "Supports that hold " + listed(parts) + " stop it."
}
