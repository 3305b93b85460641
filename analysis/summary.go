package analysis

import (
	"math"

	"spanwright/lang/model"
)

// SupportRow is one force of one support in an envelope.
type SupportRow struct {
	Node    int // index into Model.Nodes
	Freedom int // 0 to 5: Fx … Mz, global
	Band    Band
}

// SupportRows returns the reactions of all supported nodes in the order of the
// supports, without forces that are zero in all results.
func (e *Envelope) SupportRows() []SupportRow {
	if e.Empty() {
		return nil
	}
	var rows []SupportRow
	for _, node := range SupportedNodes(e.results.model) {
		bands := e.Reaction(node)
		for freedom, band := range bands {
			if band.Most.Value != 0 || band.Least.Value != 0 {
				rows = append(rows, SupportRow{node, freedom, band})
			}
		}
	}
	return rows
}

// SupportedNodes returns the nodes with supports, each once, in the order of the
// supports.
func SupportedNodes(m *model.Model) []int {
	seen := make(map[int]bool, len(m.Supports))
	var nodes []int
	for _, s := range m.Supports {
		if !seen[s.Node] {
			seen[s.Node] = true
			nodes = append(nodes, s.Node)
		}
	}
	return nodes
}

// Governing is one line of a member's summary: a value that governs it.
type Governing struct {
	Quantity Quantity
	Governed
	// Share is that of the yield strength for a normal stress, where the
	// material has one, else 0.
	Share float64
}

// Governing returns what governs a member, in the order in which people read it:
// the moments of both signs, the largest shear and axial force, torsion, stress
// and deflection. What is zero throughout, or one part in 1e9 of the largest of
// its kind, is left out, as is what cannot be known.
func (e *Envelope) Governing(member int) []Governing {
	if e.Empty() {
		return nil
	}
	var list []Governing
	add := func(q Quantity, g Governed, scale float64) {
		if math.Abs(g.Value) > 1e-9*scale {
			list = append(list, Governing{Quantity: q, Governed: g, Share: e.yieldShare(member, q, g.Value)})
		}
	}
	band := func(q Quantity) Band {
		b, _ := e.Along(member, q)
		return b
	}
	size := func(q Quantity) float64 { return math.Abs(band(q).Largest().Value) }
	moments, forces := max(size(My), size(Mz), size(T)), max(size(Vy), size(Vz), size(N))
	for _, q := range []Quantity{My, Mz} {
		// The larger first; the other if it has the other sign.
		b := band(q)
		first, second := b.Most, b.Least
		if b.Largest() == b.Least {
			first, second = second, first
		}
		add(q, first, moments)
		if first.Value*second.Value < 0 {
			add(q, second, moments)
		}
	}
	add(T, band(T).Largest(), moments)
	add(Vy, band(Vy).Largest(), forces)
	add(Vz, band(Vz).Largest(), forces)
	for _, g := range []Governed{band(N).Least, band(N).Most} { // compression, tension
		if g == band(N).Largest() || g.Value*band(N).Largest().Value < 0 {
			add(N, g, forces)
		}
	}
	add(NormalStress, band(NormalStress).Largest(), 0)
	add(Deflection, band(Deflection).Most, 0)
	return list
}

// yieldShare is the share that a normal stress takes of the yield strength.
func (e *Envelope) yieldShare(member int, q Quantity, value float64) float64 {
	m := e.results.model
	section := m.Members[member].Section
	if q != NormalStress || section < 0 {
		return 0
	}
	if yield := m.Materials[m.Sections[section].Material].Yield; yield > 0 {
		return math.Abs(value) / yield
	}
	return 0
}
