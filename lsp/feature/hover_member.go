package feature

import (
	"encoding/base64"
	"fmt"
	"math"
	"strings"
	"unicode/utf8"

	"spanwright/analysis"
	"spanwright/analysis/diagram"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
)

const (
	// diagramWidth is that of text diagrams, in characters.
	diagramWidth = 32
	// mostPicture bounds a picture: clients drop it where a hover gets too long.
	mostPicture = 60_000
	// leastSag is the part of its length by which a bar may sag as a beam: beyond,
	// movements are not small and a beam's equations do not hold.
	leastSag = 20
)

func (h *hover) member(d *resolve.Definition) {
	m := h.model
	i := indexOf(m.Members, fullName(d), func(b *model.Member) string { return b.Name })
	if i < 0 {
		h.page.add(fmt.Sprintf("**%s** · %s", d.Name, d.Kind))
		return
	}
	h.page.add(h.memberLine(&m.Members[i]))
	if !h.solved {
		return
	}
	n := h.numbers
	member := n.solution.Member(m.Members[i].Name)
	if member < 0 {
		return
	}
	envelopes := n.envelopes()
	if len(envelopes) == 0 {
		return
	}
	rows, governs := h.governing(envelopes, member)
	heading := envelopes[0].Name() + " governs"
	if strings.Contains(envelopes[0].Name(), " ") {
		heading = "governs in " + envelopes[0].Name()
	}
	h.page.add(table([]string{heading, "value>", "where", "in", ""}, rows))
	switch kind := n.model.Members[member].Kind; {
	case kind == model.Link:
		h.page.add("A rigid link: statics alone does not tell what passes through it.")
	case len(rows) == 0:
		h.page.add("No force in " + envelopes[0].Name() + ".")
	case kind == model.Bar:
		h.page.add(h.ownBending(envelopes[0], member))
	case kind == model.Beam:
		h.diagrams(member, governs)
	}
	h.ownStiffness(member)
	if len(rows) > 0 {
		h.page.add(signs(h.model.Plane))
	}
}

// signs reminds of the sign convention.
func signs(plane bool) string {
	if plane {
		return "N > 0 is tension; My > 0 puts tension on the −z side (a floor beam sags)."
	}
	return "N > 0 is tension; My > 0 puts tension on the −z side (a floor beam sags), Mz > 0 on the −y side; member axes."
}

// memberLine says what a member is: "**r1** · beam B → C, 6.18 m, rafter IPE 300, S275".
func (h *hover) memberLine(b *model.Member) string {
	m := h.model
	var nodes []string
	for _, n := range b.Nodes {
		nodes = append(nodes, m.Nodes[n].Name)
	}
	parts := []string{fmt.Sprintf("%s %s, %s", b.Kind, strings.Join(nodes, " → "), quantity.Write(b.Length, m.Display.Length, 3))}
	if b.Section >= 0 {
		s := &m.Sections[b.Section]
		parts = append(parts, strings.TrimSpace(code(s.Name)+" "+s.Title))
		if material := &m.Materials[s.Material]; material.Grade != "" {
			parts = append(parts, material.Grade)
		} else {
			parts = append(parts, material.Name)
		}
	}
	switch b.Sense {
	case model.TensionOnly:
		parts = append(parts, "tension only")
	case model.CompressionOnly:
		parts = append(parts, "compression only")
	}
	return "**" + b.Name + "** · " + strings.Join(parts, ", ")
}

// governing returns the rows of what governs a member, and the result that the
// diagrams are drawn of: that of the largest moment, else of the first row.
// Deflections are those of the first family for service, where there is one.
func (h *hover) governing(envelopes []*analysis.Envelope, member int) (rows [][]string, governs int) {
	n := h.numbers
	governs = -1
	length := n.model.Members[member].Length
	service := envelopes[0]
	for i := range n.model.Families {
		e := n.results.Envelope(i)
		if f := &n.model.Families[i]; f.Code != model.Written && f.Situation != model.Strength && !e.Empty() {
			service = e
			break
		}
	}
	add := func(g *analysis.Governing) {
		note := ""
		switch {
		case g.Quantity == analysis.Deflection:
			note = spanRatio(length, g.Value)
		case g.Share > 0:
			note = percent(g.Share) + " of yield"
		}
		rows = append(rows, []string{g.Quantity.String(), quantity.Write(g.Value, n.unitOf(g.Quantity), 3),
			placeWords(n.model, member, g.At), code(n.name(g.Governed)), note})
	}
	list := n.governing(envelopes[0], member)
	for i := range list {
		g := &list[i]
		if g.Quantity == analysis.Deflection && service != envelopes[0] {
			continue
		}
		if governs < 0 {
			governs = g.Result
		}
		add(g)
	}
	if service != envelopes[0] {
		for _, g := range n.governing(service, member) {
			if g.Quantity == analysis.Deflection {
				add(&g)
			}
		}
	}
	return rows, governs
}

// exceeds reports whether a governs more than b: by size, a stress by its share of
// what the material takes. Of equals the first stays.
func exceeds(a, b *analysis.Governing) bool {
	if a.Share > 0 && b.Share > 0 {
		return a.Share > (1+1e-9)*b.Share
	}
	return math.Abs(a.Value) > (1+1e-9)*math.Abs(b.Value)
}

// ownBending says how a bar bends under the loads on it, which carry to its ends
// as on a simple beam and add nothing to what the structure does.
func (h *hover) ownBending(e *analysis.Envelope, member int) string {
	n := h.numbers
	if sag, known := e.Along(member, analysis.Deflection); known && sag.Most.Value > n.model.Members[member].Length/leastSag {
		return "The bar is too slender to carry loads across it, such as its weight, by bending: it hangs as a rope does, which is not worked out."
	}
	var parts []string
	for _, q := range []analysis.Quantity{analysis.My, analysis.Mz, analysis.NormalStress, analysis.Deflection} {
		band, known := e.Along(member, q)
		if g := band.Largest(); known && math.Abs(g.Value) > 0 {
			text := q.String() + " " + quantity.Write(g.Value, n.unitOf(q), 3)
			if q == analysis.Deflection {
				text += " (" + spanRatio(n.model.Members[member].Length, g.Value) + ")"
			}
			parts = append(parts, text)
		}
	}
	if len(parts) < 3 {
		return "" // nothing but the axial stress, which the table has
	}
	return "With the bending of loads on the bar itself, its weight among them, as on a simple beam: " + strings.Join(parts, ", ") + "."
}

// placeWords writes a place along a member: "at B", "3.72 m".
func placeWords(m *model.Model, member int, at float64) string {
	words := analysis.PlaceWords(m, member, at)
	if strings.HasSuffix(words, " "+m.Display.Length.Symbol) {
		return words
	}
	return "at " + words
}

// diagrams draws the moment and the deflected shape of a member in one result.
func (h *hover) diagrams(member, result int) {
	n := h.numbers
	r := n.results.At(result)
	courses := diagram.Bending(r.Member(member))
	if len(courses) == 0 {
		return
	}
	h.page.add("In " + code(r.Name()) + ":")
	if h.options.Pictures {
		if svg, err := diagram.Picture(courses...); err == nil && len(svg) <= mostPicture {
			h.page.add(fmt.Sprintf("![%s along %s in %s](data:image/svg+xml;base64,%s)", courses[0].Label, n.model.Members[member].Name, r.Name(), base64.StdEncoding.EncodeToString(svg)))
			return
		}
	}
	var lines []string
	width := 0
	for _, c := range courses {
		width = max(width, utf8.RuneCountInString(c.Label))
	}
	for _, c := range courses {
		c.Label += strings.Repeat(" ", width-utf8.RuneCountInString(c.Label))
		lines = append(lines, diagram.Text(c, diagramWidth))
	}
	h.page.add(block(strings.Join(lines, "\n")))
}

// ownStiffness writes the member's own terms with their closed forms.
func (h *hover) ownStiffness(member int) {
	n := h.numbers
	s, ok := n.results.Solver().Structure().StiffnessOf(member)
	if !ok {
		return
	}
	var parts []string
	for _, t := range s.Terms {
		freedom := 0
		if t.Row%6 > 2 && t.Column%6 > 2 {
			freedom = 3
		} else if t.Row%6 > 2 || t.Column%6 > 2 {
			continue // a force for a turn: it follows from the others
		}
		parts = append(parts, t.Name+" "+stiffnessWords(t.Value, freedom))
	}
	if len(parts) > 0 {
		h.page.add("Own stiffness " + strings.Join(parts, " · "))
	}
}

func (h *hover) group(d *resolve.Definition) {
	i := indexOf(h.model.Groups, fullName(d), func(g *model.Group) string { return g.Name })
	if i < 0 {
		h.page.add("**" + d.Name + "** · group")
		return
	}
	g := &h.model.Groups[i]
	length := 0.0
	var list []string
	for _, m := range g.Members {
		length += h.model.Members[m].Length
		if len(list) < 20 {
			list = append(list, h.model.Members[m].Name)
		}
	}
	text := strings.Join(list, ", ")
	if len(g.Members) > len(list) {
		text += fmt.Sprintf(" and %d more", len(g.Members)-len(list))
	}
	h.page.add(fmt.Sprintf("**%s** · group of %s, %s in all: %s", g.Name, counted(len(g.Members), "member"), quantity.Write(length, h.model.Display.Length, 3), text))
	if h.solved {
		if e, ok := h.numbers.first(); ok {
			h.worst(e, g.Members)
		}
	}
}

// worst says which members of some have the largest forces, stress and
// deflection in an envelope.
func (h *hover) worst(e *analysis.Envelope, members []int) {
	n := h.numbers
	if len(members) > mostAsked {
		return
	}
	best := map[analysis.Quantity]struct {
		analysis.Governing
		member int
	}{}
	for _, m := range members {
		member := n.solution.Member(h.model.Members[m].Name)
		if member < 0 {
			continue
		}
		for _, g := range n.governing(e, member) {
			if b, ok := best[g.Quantity]; !ok || exceeds(&g, &b.Governing) {
				best[g.Quantity] = struct {
					analysis.Governing
					member int
				}{g, member}
			}
		}
	}
	var rows [][]string
	for _, q := range []analysis.Quantity{analysis.My, analysis.Mz, analysis.T, analysis.Vy, analysis.Vz, analysis.N, analysis.NormalStress, analysis.Deflection} {
		b, ok := best[q]
		if !ok {
			continue
		}
		note := ""
		if b.Share > 0 {
			note = percent(b.Share) + " of yield"
		}
		rows = append(rows, []string{q.String(), quantity.Write(b.Value, n.unitOf(q), 3), n.model.Members[b.member].Name + ", " + placeWords(n.model, b.member, b.At), code(n.name(b.Governed)), note})
	}
	h.page.add(table([]string{"Largest in " + e.Name(), "value>", "where", "in", ""}, rows))
}

// mostAsked bounds the members that a hover looks through.
const mostAsked = 300
