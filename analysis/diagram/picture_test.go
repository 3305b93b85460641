package diagram

import (
	"encoding/xml"
	"flag"
	"io"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/quantity"
)

var update = flag.Bool("update", false, "write the golden files anew")

func TestPictureOfMomentAndMovement(t *testing.T) {
	moment := propped(t)
	moment.Flipped = true
	mm, ok := quantity.Lookup("mm")
	require.True(t, ok)
	moved := Course{
		Label: "w", Length: 8, First: "B", Last: "C", Unit: mm, Lengths: moment.Lengths,
		// A propped beam with EI = 1e6 Nm2: w = −q x² (3l² − 5lx + 2x²)/(48 EI).
		Value: func(x float64) float64 { return -1e3 * x * x * (192 - 40*x + 2*x*x) / 48e6 },
		Least: Mark{Value: -0.02218, At: 4.63},
	}
	svg, err := Picture(moment, moved)
	require.NoError(t, err)
	golden := filepath.Join("testdata", "propped.svg")
	if *update {
		require.NoError(t, os.MkdirAll("testdata", 0o755))
		require.NoError(t, os.WriteFile(golden, svg, 0o644))
	}
	want, err := os.ReadFile(golden)
	require.NoError(t, err)
	assert.Equal(t, string(want), string(svg))
	assert.Less(t, len(svg), 60_000, "a hover must stay below 90 kB")
	for _, words := range []string{"4.5 kNm at 5 m", "−8 kNm at B", "My, kNm", "w, mm"} {
		assert.Contains(t, string(svg), words)
	}
}

func TestPictureEscapesNamesAndIsXML(t *testing.T) {
	c := propped(t)
	c.First, c.Label = `<&">`, "a<b"
	for _, courses := range [][]Course{{c}, {}, {{Label: "N", Length: 0, Value: func(float64) float64 { return 0 }}}} {
		svg, err := Picture(courses...)
		require.NoError(t, err)
		decoder := xml.NewDecoder(strings.NewReader(string(svg)))
		for {
			_, err := decoder.Token()
			if err == io.EOF {
				break
			}
			require.NoError(t, err)
		}
	}
}
