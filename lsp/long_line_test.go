package lsp

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/lsptest"
)

// A line of a hundred kilobytes, in which every word has a place to be told,
// is answered about: no request takes its length times the number of words.
func TestALongLine(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, frame+"group all = "+strings.Repeat("c, ", 30_000)+"c\n")
	assert.Greater(t, len(c.Tokens(uri).Data), 30_000*perToken)
	assert.Len(t, c.References(uri, c.At(uri, "beam |c")), 30_002)
	assert.Len(t, c.Highlights(uri, c.At(uri, "beam |c")), 30_002)
	c.WaitDiagnostics(uri)
	middle := lsp.Position{Line: 10, Character: 60_000}
	c.Hover(uri, middle)
	c.Complete(uri, middle)
	c.SignatureHelp(uri, middle)
	c.CodeActions(uri, lsp.Range{Start: middle, End: middle}, nil)
	c.Format(uri)
}
