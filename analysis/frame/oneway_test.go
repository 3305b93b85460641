package frame_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis/frame"
)

// solverOf resolves and prepares a model given as text.
func solverOf(t testing.TB, text string) *frame.Solver {
	s, err := frame.Prepare(context.Background(), resolved(t, "test.span", text), nil)
	require.NoError(t, err)
	return s
}

const crossedPanel = "model \"\" plane\n" + simpleSection + `
node A = (0, 0) m
node B = (3, 0) m
node C = (3, 4) m
node D = (0, 4) m
bar left  = A -> D of sec
bar right = B -> C of sec
bar top   = D -> C of sec
bar rising  = A -> C of sec, tension only
bar falling = B -> D of sec, tension only
support A pinned
support B pinned
`

// Under gravity alone both diagonals of a crossed panel would be pressed, and
// without both the panel has no hold sideways. It needs none: one diagonal stays,
// without a force.
func TestACrossedPanelUnderGravityStands(t *testing.T) {
	v := solverOf(t, crossedPanel+`
case G permanent {
    C: 10 kN down
    D: 10 kN down
}
case E permanent {
    C: 10 kN down
}
case W wind {
    D: 6 kN along x
}
combination both = G + W
`)
	m := v.Structure().Model()
	states, errs, err := v.Cases(context.Background())
	require.NoError(t, err)
	for i := range states {
		require.NoError(t, errs[i])
		assert.Less(t, states[i].Residual(), 1e-12)
	}
	for _, c := range []struct {
		name   string
		of     *frame.State
		member int
		n      float64
	}{
		{"left under gravity", states[0], 0, -10e3}, {"rising under gravity", states[0], 3, 0}, {"falling under gravity", states[0], 4, 0},
		{"left, load at the right", states[1], 0, 0}, {"right, load at the right", states[1], 1, -10e3}, {"rising, load at the right", states[1], 3, 0},
		// Wind: the rising diagonal takes 6 kN · 5/3, the right post 6 kN · 4/3.
		{"rising in the wind", states[2], 3, 10e3}, {"falling in the wind", states[2], 4, 0}, {"right in the wind", states[2], 1, -8e3},
	} {
		ends := c.of.Ends(c.member)
		assert.InDelta(t, c.n, -ends[0][0], 1e-4, c.name)
	}
	both, err := v.Combination(context.Background(), m.Combinations[0].Factors)
	require.NoError(t, err)
	assert.InDelta(t, 10e3, both.Ends(3)[1][0], 1e-4)
	slack, _ := both.Acting()
	assert.Equal(t, []int{4}, slack)
}
