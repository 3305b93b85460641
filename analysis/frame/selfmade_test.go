package frame_test

import (
	"context"
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis/frame"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// A statically determinate beam takes up warming and settlements without any
// force. What rounding leaves is no lack of balance.
func TestDeterminateStructuresGiveWayFreely(t *testing.T) {
	for _, load := range []string{"b: 10 K", "c: 10 K across z", "b: 3 mm", "b: 8 kN, pretension", "A: 5 mm down", "B: 5 mm up", "A: 2 mm along x"} {
		for _, end := range []string{"(6, 0) m", "(5.1, 2.3) m", "(4.123, 3.456) m"} {
			text := fmt.Sprintf(`model "Simple" plane
material steel = S275
section joist = IPE 200 of steel
node A = (0, 0) m
node B = %s
node C = A + 0.3 (B - A)
beam b = A -> C of joist
beam c = C -> B of joist
support A pinned
support B holds uz
case T thermal { %s }
`, end, load)
			r := resolve.Model(syntax.Parse(source.New("simple.span", text)), nil)
			require.Empty(t, r.Diagnostics)
			v, err := frame.Prepare(context.Background(), r.Model, nil)
			require.NoError(t, err)
			states, _, err := v.Cases(context.Background())
			require.NoError(t, err)
			assert.Less(t, states[0].Residual(), 1e-11, "%s, B at %s", load, end)
			for node := range r.Model.Nodes {
				for _, f := range states[0].Reaction(node) {
					assert.Less(t, math.Abs(f), 1e-6, "N")
				}
			}
		}
	}
}
