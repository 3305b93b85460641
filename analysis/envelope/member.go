package envelope

import (
	"math"
	"slices"
	"sync/atomic"

	"spanwright/analysis/element"
)

// Member holds the quantities along one physical member in every basic state.
// It may be read by several goroutines at once.
type Member struct {
	// Length is that of the member's flexible part, m.
	Length float64
	// BentKnown says that the departure from the chord could be worked out in
	// all states.
	BentKnown bool

	breaks []float64
	states [][]element.Piece // by state, each with one piece between breaks
	paths  [element.BentW + 1]atomic.Pointer[Path]
}

// NewMember makes a member from the pieces of each state, which follow each
// other from the first end to the last. The states may have different breaks; a
// state without pieces is zero everywhere.
func NewMember(states [][]element.Piece, bentKnown bool) *Member {
	m := &Member{BentKnown: bentKnown, breaks: commonBreaks(states)}
	m.Length = m.breaks[len(m.breaks)-1]
	m.states = make([][]element.Piece, len(states))
	for s, pieces := range states {
		m.states[s] = split(pieces, m.breaks)
	}
	return m
}

// same is the share of a member's length below which two breaks are one.
const same = 1e-12

// commonBreaks returns the places where a piece of any state begins or ends.
func commonBreaks(states [][]element.Piece) []float64 {
	var all []float64
	for _, pieces := range states {
		for _, p := range pieces {
			all = append(all, p.From, p.To)
		}
	}
	if len(all) == 0 {
		return []float64{0, 0}
	}
	slices.Sort(all)
	tolerance := same * all[len(all)-1]
	breaks := slices.CompactFunc(all, func(a, b float64) bool { return math.Abs(b-a) <= tolerance })
	if len(breaks) == 1 {
		breaks = append(breaks, breaks[0]) // a member without length
	}
	return breaks
}

// split cuts pieces at the breaks, among which all their own ends are.
func split(pieces []element.Piece, breaks []float64) []element.Piece {
	if len(pieces) == len(breaks)-1 {
		return pieces
	}
	cut := make([]element.Piece, len(breaks)-1)
	if len(pieces) == 0 { // a rigid link: nothing is known along it
		for i := range cut {
			cut[i] = element.Piece{From: breaks[i], To: breaks[i+1]}
		}
		return cut
	}
	at := 0
	for i := range cut {
		middle := breaks[i] + (breaks[i+1]-breaks[i])/2
		for at+1 < len(pieces) && pieces[at].To < middle {
			at++
		}
		cut[i] = element.Piece{From: breaks[i], To: breaks[i+1], Courses: pieces[at].Courses}
		if moved := breaks[i] - pieces[at].From; moved > same*breaks[len(breaks)-1] {
			for c := range cut[i].Courses {
				cut[i].Courses[c] = shifted(cut[i].Courses[c], moved)
			}
		}
	}
	return cut
}

// shifted returns p(s + by) as a polynomial of s, by Horner's scheme repeated.
func shifted(p element.Polynomial, by float64) element.Polynomial {
	for i := 0; i < len(p)-1; i++ {
		for k := len(p) - 2; k >= i; k-- {
			p[k] += by * p[k+1]
		}
	}
	return p
}

// Path returns the path of one component.
func (m *Member) Path(c element.Component) *Path {
	if p := m.paths[c].Load(); p != nil {
		return p
	}
	p := &Path{Breaks: m.breaks, states: len(m.states), power: make([]element.Polynomial, (len(m.breaks)-1)*len(m.states))}
	for s, pieces := range m.states {
		for i := range pieces {
			p.power[i*p.states+s] = pieces[i].Courses[c]
		}
	}
	p.finish()
	m.paths[c].Store(p) // whoever comes second stores the same
	return p
}

// At returns a component of a sum at a place; at a step that before it if
// before is set, else that after it.
func (m *Member) At(c element.Component, sum Sum, x float64, before bool) float64 {
	piece := 0
	for piece+2 < len(m.breaks) && (m.breaks[piece+1] < x || !before && m.breaks[piece+1] == x) {
		piece++
	}
	value := 0.0
	for _, t := range sum {
		value += t.Factor * m.states[t.State][piece].Courses[c].At(x-m.breaks[piece])
	}
	return value
}

// Breaks returns the places at which pieces meet, the ends included, m. The
// caller does not change them.
func (m *Member) Breaks() []float64 { return m.breaks }

// LargestOf joins rankings of the same sums by different measures: of each sum its
// largest value counts. It returns at most count of them, largest first.
func LargestOf(count int, rankings ...[]Peak) []Peak {
	var all []Peak
	for _, ranking := range rankings {
		for _, peak := range ranking {
			i := slices.IndexFunc(all, func(p Peak) bool { return p.Sum == peak.Sum })
			switch {
			case i < 0:
				all = append(all, peak)
			case further(peak.Value, peak.At, all[i].Value, all[i].At):
				all[i] = peak
			}
		}
	}
	var best []Peak
	for _, peak := range all {
		place := len(best)
		for place > 0 && (Above(peak.Value, best[place-1].Value) ||
			!Above(best[place-1].Value, peak.Value) && peak.Sum < best[place-1].Sum) {
			place--
		}
		best = slices.Insert(best, place, peak)
	}
	return best[:min(count, len(best))]
}
