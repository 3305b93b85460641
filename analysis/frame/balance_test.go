package frame_test

import (
	"context"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis/frame"
)

// A practically rigid beam on soft springs is the hardest case for balance: its
// stiffness is 4e7 times that of the springs. Rigid-body statics gives the
// reactions, and the force method with the redundant group (1, −2, 1) what the
// last of the beam's flexibility changes: X = −∫mM₀/EI / (Σ x²/k + ∫m²/EI).
func TestARigidBeamOnSoftSpringsIsInBalance(t *testing.T) {
	v, err := frame.Prepare(context.Background(), read(t, "../../testdata/verification/J03-a.span"), nil)
	require.NoError(t, err)
	states, _, err := v.Cases(context.Background())
	require.NoError(t, err)
	assert.Less(t, states[0].Residual(), 1e-11)
	const ei = 1e15
	x := -208e3 / ei / (1/10e6 + 4/20e6 + 1/30e6 + 18/ei)
	for node, want := range []float64{26e3 + x, 28e3 - 2*x, 6e3 + x} {
		assert.InEpsilon(t, want, states[0].Reaction(node)[2], 1e-11)
	}
}
