package analysis

import (
	"errors"
	"unicode"
	"unicode/utf8"

	"spanwright/analysis/frame"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
)

// Mechanism returns the movement that nothing resists, with its shape and what
// would stop it, or nil where the results have numbers or are missing for another
// reason.
func (r *Results) Mechanism() *frame.MechanismError { return r.mechanism }

// refuse leaves the results without numbers, for a reason that frame gives.
func (r *Results) refuse(reason error) {
	m := r.model
	var mechanism *frame.MechanismError
	var member *frame.MemberError
	var support *frame.SupportError
	name, origin := diagnostic.CannotSolve, m.Heading
	switch {
	case errors.As(reason, &mechanism):
		r.mechanism = mechanism
		name = diagnostic.Mechanism
	case errors.As(reason, &member):
		origin = m.Members[member.Member].Origin
	case errors.As(reason, &support):
		origin = supportOrigin(m, support.Node)
	}
	d := about(m, origin, name, sentence(reason.Error()))
	if mechanism != nil {
		d.Related = movingNodes(m, mechanism)
	}
	r.diagnostics = append(r.diagnostics, d)
}

// mostRelated is the number of places that a mechanism points to.
const mostRelated = 8

// movingNodes points to the nodes that move.
func movingNodes(m *model.Model, e *frame.MechanismError) []diagnostic.Related {
	var related []diagnostic.Related
	last := -1
	for _, move := range e.Moves {
		if move.Node == last || len(related) == mostRelated {
			continue
		}
		last = move.Node
		origin := m.Nodes[move.Node].Origin
		if origin.File < 0 || origin.File >= len(m.Files) {
			continue
		}
		related = append(related, diagnostic.Related{
			File: m.Files[origin.File].Path, Span: origin.Name, Message: m.Nodes[move.Node].Name + " moves.",
		})
	}
	return related
}

// supportOrigin returns the origin of the last support of a node: the one that
// is too many.
func supportOrigin(m *model.Model, node int) model.Origin {
	origin := m.Heading
	for _, s := range m.Supports {
		if s.Node == node {
			origin = s.Origin
		}
	}
	return origin
}

// sentence makes a sentence of an error's text.
func sentence(text string) string {
	first, size := utf8.DecodeRuneInString(text)
	text = string(unicode.ToUpper(first)) + text[size:]
	if last := text[len(text)-1]; last != '.' && last != '?' {
		text += "."
	}
	return text
}
