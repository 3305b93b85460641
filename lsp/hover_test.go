package lsp

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lsp/lsptest"
)

// The main job: a reaction beside the support, milliseconds after the edit,
// without a save.
func TestHoverFollowsTheText(t *testing.T) {
	c := start(t, lsptest.Options{})
	c.Open(uri, frame)
	c.WaitReceived("workspace/inlayHint/refresh", 1)
	hover := c.Hover(uri, c.At(uri, "support |A"))
	require.NotNil(t, hover)
	assert.Equal(t, "A", c.Under(uri, *hover.Range))
	assert.EqualValues(t, "markdown", hover.Contents.Kind)
	assert.Contains(t, hover.Contents.Value, "4 ←", "the support holds against 4 kN to the right")
	assert.Contains(t, hover.Contents.Value, "this version")

	c.Edit(uri, "4 kN along x", "5 kN along x")
	c.WaitReceived("workspace/inlayHint/refresh", 2)
	assert.Contains(t, c.Hover(uri, c.At(uri, "support |A")).Contents.Value, "5 ←")

	c.Edit(uri, "support A fixed", "support A pinned")
	c.WaitDiagnostic(uri, "mechanism")
	text := c.Hover(uri, c.At(uri, "support |A")).Contents.Value
	assert.NotContains(t, text, "5 ←", "a mechanism has no numbers")
	assert.Contains(t, text, "No numbers")

	c.Insert(uri, "case |W", "# a note\n")
	assert.Nil(t, c.Hover(uri, c.At(uri, "# a |note")), "there is nothing to say about a note")
}

// Pictures and Markdown go only to clients that show them.
func TestHoverSuitsTheClient(t *testing.T) {
	ask := func(options lsptest.Options) *lsptest.Hover {
		c := start(t, options)
		c.Open(uri, frame)
		if options.Capabilities == nil {
			c.WaitReceived("workspace/inlayHint/refresh", 1)
		}
		return c.Hover(uri, c.At(uri, "beam |c"))
	}
	drawn := ask(lsptest.Options{InitializationOptions: map[string]any{"pictures": true}})
	assert.Contains(t, drawn.Contents.Value, "data:image/svg+xml")
	assert.Less(t, len(drawn.Contents.Value), 90_000)
	assert.NotContains(t, ask(lsptest.Options{}).Contents.Value, "data:image")

	plain := ask(lsptest.Options{Capabilities: map[string]any{}, InitializationOptions: map[string]any{"pictures": true}})
	assert.EqualValues(t, "plaintext", plain.Contents.Kind)
	assert.NotContains(t, plain.Contents.Value, "data:image")
	assert.NotContains(t, plain.Contents.Value, "**")
	assert.False(t, strings.Contains(plain.Contents.Value, "|---"))
}
