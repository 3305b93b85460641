package frame

import "spanwright/analysis/element"

// Pieces returns the exact courses along a whole physical member, with distances
// from its first flexible end, and whether its departure from the chord is
// known. A link has none.
func (st *State) Pieces(member int) (pieces []element.Piece, bentKnown bool) {
	s := st.structure
	bentKnown = true
	first, last := s.first[member], s.first[member+1]
	for i := first; i < last; i++ {
		g := &s.segments[i]
		c := g.element.Recover(st.movedEnds(i), s.spansOn(i, &st.loading), nil)
		bentKnown = bentKnown && c.BentYKnown && c.BentZKnown
		for _, p := range c.Pieces {
			p.From += g.from
			p.To += g.from
			pieces = append(pieces, p)
		}
	}
	if last-first > 1 {
		overWholeChord(pieces)
	}
	return pieces, bentKnown
}

// overWholeChord measures the departures of a member of several segments from
// the line between its two ends instead of from each segment's own chord.
func overWholeChord(pieces []element.Piece) {
	first, last := &pieces[0], &pieces[len(pieces)-1]
	length := last.To - first.From
	for _, c := range [...]struct{ moved, bent element.Component }{{element.V, element.BentV}, {element.W, element.BentW}} {
		start := first.Courses[c.moved].At(0)
		slope := (last.Courses[c.moved].At(last.To-last.From) - start) / length
		for i := range pieces {
			p := &pieces[i]
			bent := p.Courses[c.moved]
			bent[0] -= start + slope*(p.From-first.From)
			bent[1] -= slope
			p.Courses[c.bent] = bent
		}
	}
}
