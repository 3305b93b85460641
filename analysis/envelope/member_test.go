package envelope

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/analysis/element"
)

// Two states of one member with different breaks: their sum is the same as
// that of the values of each.
func TestStatesWithDifferentBreaks(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		length := rapid.Float64Range(1, 20).Draw(t, "length")
		states := make([][]element.Piece, 2)
		for s := range states {
			at := 0.0
			for at < length {
				to := at + rapid.Float64Range(0.3, 1).Draw(t, "share")*length
				if to > 0.95*length {
					to = length
				}
				p := element.Piece{From: at, To: to}
				for k := range p.Courses[element.My] {
					p.Courses[element.My][k] = rapid.Float64Range(-2, 2).Draw(t, "c")
				}
				states[s] = append(states[s], p)
				at = to
			}
		}
		m := NewMember(states, true)
		require.InDelta(t, length, m.Length, 1e-12)
		x := rapid.Float64Range(0, 1).Draw(t, "x") * length
		value := func(pieces []element.Piece) float64 {
			for _, p := range pieces {
				if x <= p.To {
					return p.Courses[element.My].At(x - p.From)
				}
			}
			return 0
		}
		sum := Sum{{0, 1.35}, {1, -0.5}}
		want := 1.35*value(states[0]) - 0.5*value(states[1])
		scale := 10.0
		for range 5 {
			scale *= 1 + length
		}
		require.InDelta(t, want, m.At(element.My, sum, x, true), 1e-13*scale)
		require.InDelta(t, want, m.Path(element.My).At(sum, x, true), 1e-13*scale)
	})
}

func TestMemberWithoutLength(t *testing.T) {
	var p element.Piece
	p.Courses[element.N] = element.Polynomial{7}
	m := NewMember([][]element.Piece{{p}}, true)
	most, _ := m.Path(element.N).Extremes([]Sum{{{0, 2}}})
	assert.Equal(t, Peak{14, 0, 0}, most)

	link := NewMember([][]element.Piece{nil, {p}}, true)
	most, _ = link.Path(element.N).Extremes([]Sum{{{0, 2}}, {{1, 1}}})
	assert.Equal(t, Peak{7, 0, 1}, most)
	assert.Zero(t, link.At(element.My, Sum{{0, 2}}, 0, true))
}

func TestLargestOfKeepsTheLargestOfEachSum(t *testing.T) {
	got := LargestOf(2,
		[]Peak{{Value: 5, At: 1, Sum: 0}, {Value: 3, At: 1, Sum: 2}},
		[]Peak{{Value: 6, At: 2, Sum: 2}, {Value: 5, At: 0, Sum: 0}, {Value: 1, Sum: 1}})
	assert.Equal(t, []Peak{{Value: 6, At: 2, Sum: 2}, {Value: 5, At: 0, Sum: 0}}, got)
}
