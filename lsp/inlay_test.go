package lsp

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/lsptest"
)

func everything(text string) lsp.Range {
	return lsp.Range{End: lsp.Position{Line: uint32(strings.Count(text, "\n") + 1)}}
}

// Numbers stand at the end of their lines, and each kind has its switch.
func TestInlayHints(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame+"let h = 1 m + 2 m\nlimit deflection of c <= 10 mm under W\n")
	c.WaitReceived("workspace/inlayHint/refresh", 1)
	byLine := func() map[string]string {
		labels := map[string]string{}
		for _, h := range c.InlayHints(uri, everything(c.Text(uri))) {
			line := strings.Split(c.Text(uri), "\n")[h.Position.Line]
			assert.LessOrEqual(t, int(h.Position.Character), len(line))
			word, _, _ := strings.Cut(line, " ")
			labels[word] = h.Label
			if word != "let" {
				assert.Contains(t, h.Tooltip.(map[string]any)["value"], "this version")
			}
		}
		return labels
	}
	all := byLine()
	assert.Contains(t, all["support"], "4 kN")
	assert.Contains(t, all["support"], "12 kNm")
	assert.Contains(t, all["beam"], "My")
	assert.Contains(t, all["limit"], "10 mm")
	assert.Equal(t, "= 3 m", all["let"])
	assert.Contains(t, all["case"], "4 kN")
	assert.Len(t, c.InlayHints(uri, c.Range(uri, "support A fixed")), 1)

	settings := map[string]string{"supports": "support", "members": "beam", "limits": "limit", "lets": "let", "cases": "case"}
	asked := len(c.Received("workspace/inlayHint/refresh"))
	for name, word := range settings {
		c.Configure(map[string]any{"spanwright": map[string]any{"inlayHints": map[string]any{name: false}}})
		asked++
		c.WaitReceived("workspace/inlayHint/refresh", asked)
		rest := byLine()
		assert.NotContains(t, rest, word)
		assert.Len(t, rest, len(all)-1)
	}
}

// While the text has errors the hints say that they are old.
func TestHintsSayHowOldTheyAre(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	c.WaitReceived("workspace/inlayHint/refresh", 1)
	c.Edit(uri, "4 kN along x", "4 kN along")
	hints := c.InlayHints(uri, c.Range(uri, "support A fixed"))
	require.Len(t, hints, 1)
	assert.Contains(t, hints[0].Label, "(old)")
}
