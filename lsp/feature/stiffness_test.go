package feature

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// A cantilever of E = 200 GPa, A = 50 cm2, Iy = 3000 cm4, 2 m: EA/L = 500 MN/m
// along it; across it at the tip 3EI/L³ = 2.25 MN/m with the turn free and
// 12EI/L³ = 9 MN/m with the turn held; 4EI/L = 12 MNm/rad and EI/L = 3 MNm/rad.
const cantilever = `model "Cantilever" plane
material steel = { E 200 GPa, G 80 GPa, density 7850 kg/m3 }
section rib = { A 50 cm2, Iy 3000 cm4 } of steel
node A = (0, 0) m
node B = (2, 0) m
beam b = A -> B of rib
support A fixed
case Q permanent {
    B: 1 kN down
}
`

func TestStiffnessAt(t *testing.T) {
	d := open(t, "/cantilever.span", cantilever)
	ask := func(marked string) (string, error) {
		return StiffnessAt(t.Context(), d.snapshot(), d.path, d.at(marked))
	}
	text, err := ask("support |A")
	require.NoError(t, err)
	assert.Equal(t, 3, strings.Count(text, "held by the support"))

	text, err = ask("node |B")
	require.NoError(t, err)
	assert.Contains(t, text, "| ux | 500 MN/m | 500 MN/m |")
	assert.Contains(t, text, "| uz | 9 MN/m | 2.25 MN/m |")
	assert.Contains(t, text, "| ry | 12 MNm/rad | 3 MNm/rad |")
	assert.Contains(t, text, "this version")

	text, err = ask("beam |b")
	require.NoError(t, err)
	assert.Contains(t, text, "| EA/L | 500 MN/m |")
	assert.Contains(t, text, "| 12EIy/L³ | 9 MN/m |")
	assert.Contains(t, text, "| 6EIy/L² | 9 MN/rad |")
	assert.Contains(t, text, "| 4EIy/L | 12 MNm/rad |")
	assert.Contains(t, text, "| 2EIy/L | 6 MNm/rad |")

	_, err = ask("section |rib")
	var refusal Refusal
	require.ErrorAs(t, err, &refusal)
	assert.Contains(t, err.Error(), "node or a member")
}
