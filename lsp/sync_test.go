package lsp

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/lsptest"
	"spanwright/lsp/protocol"
)

func TestEditsArrive(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, frame)
	assert.Empty(t, c.WaitDiagnostics(uri))
	c.Edit(uri, "A -> B of", "A -> Bee of")
	d := c.WaitDiagnostic(uri, "unknown-name")
	assert.Equal(t, "Bee", c.Under(uri, d.Range))
	assert.Equal(t, lsp.DiagnosticSeverityError, d.Severity)
	assert.Equal(t, "spanwright", d.Source)
	c.Edit(uri, "Bee", "B")
	assert.Empty(t, c.WaitDiagnostics(uri))
}

// Positions count UTF-16 units, or bytes where the client offers them; signs
// beyond the basic plane stand before the place of the edit on its line.
func TestPositionsBehindAstralSigns(t *testing.T) {
	for _, test := range []struct {
		name     string
		offered  []string
		option   any
		encoding string
	}{
		{"UTF-16 by default", nil, nil, "utf-16"},
		{"UTF-16 where nothing else is offered", []string{"utf-16", "utf-32"}, nil, "utf-16"},
		{"UTF-8 where it is offered", []string{"utf-16", "utf-8"}, nil, "utf-8"},
		{"UTF-16 where it is forced", []string{"utf-8"}, map[string]any{"positionEncoding": "utf-16"}, "utf-16"},
	} {
		t.Run(test.name, func(t *testing.T) {
			capabilities := pushing()
			if test.offered != nil {
				lsptest.Set(capabilities, test.offered, "general", "positionEncodings")
			}
			c := start(t, lsptest.Options{Capabilities: capabilities, InitializationOptions: test.option})
			require.Equal(t, test.encoding, c.ServerCapabilities["positionEncoding"])
			c.Open(uri, strings.Replace(frame, `"Shed" plane`, `"🏚 Shed 𝛼é漢" plain`, 1))
			misspelt := func(word string) {
				list := c.WaitDiagnosticsThat(uri, "there are", func(list []protocol.Diagnostic) bool { return len(list) > 0 })
				assert.Equal(t, word, c.Under(uri, list[0].Range))
			}
			misspelt("plain")
			c.Edit(uri, "plain", "plane")
			assert.Empty(t, c.WaitDiagnostics(uri))
			c.Edit(uri, "plane", "plan")
			misspelt("plan")
		})
	}
}

// Lines may end in any way, and the ends stay what they are.
func TestLineEndsAndByteOrderMark(t *testing.T) {
	for name, text := range map[string]string{
		"CRLF":            strings.ReplaceAll(frame, "\n", "\r\n"),
		"byte-order mark": "\ufeff" + frame,
		"both":            "\ufeff" + strings.ReplaceAll(frame, "\n", "\r\n"),
		"lone CR":         strings.ReplaceAll(frame, "\n", "\r"),
	} {
		t.Run(name, func(t *testing.T) {
			c := start(t, lsptest.Options{Capabilities: pushing()})
			c.Open(uri, text)
			assert.Empty(t, c.WaitDiagnostics(uri))
			c.Edit(uri, "A -> B of post", "A->Bee of post")
			assert.Equal(t, "Bee", c.Under(uri, c.WaitDiagnostic(uri, "unknown-name").Range))
			c.Edit(uri, "Bee", "B")
			assert.Empty(t, c.WaitDiagnostics(uri))
			for _, e := range c.Format(uri) {
				assert.Equal(t, strings.Contains(text, "\r\n"), strings.Contains(c.Under(uri, e.Range)+e.NewText, "\r\n") || !strings.Contains(e.NewText, "\n"))
			}
			c.ApplyEdits(uri, c.Format(uri))
			assert.Empty(t, c.Format(uri), "formatting is done after one time")
			assert.Empty(t, c.WaitDiagnostics(uri))
			if strings.Contains(text, "\r\n") {
				assert.Equal(t, strings.Count(c.Text(uri), "\n"), strings.Count(c.Text(uri), "\r\n"))
			}
		})
	}
}

// Several changes in one message apply one after the other, and a whole text
// among them too.
func TestChangesApplyInOrder(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, "x")
	c.Change(uri,
		source.Edit{Span: source.Span{Start: 0, End: 1}, New: frame},
		source.Edit{Span: source.Span{Start: 0, End: 5}, New: "m"},
		source.Edit{Span: source.Span{Start: 0, End: 1}, New: "model"},
	)
	assert.Empty(t, c.WaitDiagnostics(uri))
	c.Replace(uri, strings.Replace(frame, "support A fixed", "support A fixd", 1))
	assert.NotEmpty(t, c.WaitDiagnostics(uri))
	c.Replace(uri, frame)
	assert.Empty(t, c.WaitDiagnostics(uri))
}

// Changes that make no sense are logged or moved to the nearest place, and the
// server goes on.
func TestChangesOutOfOrder(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	change := func(version any, changes ...any) {
		c.Notify("textDocument/didChange", map[string]any{
			"textDocument": map[string]any{"uri": uri, "version": version}, "contentChanges": changes,
		})
	}
	position := func(line, character any) map[string]any {
		return map[string]any{"line": line, "character": character}
	}
	replace := func(from, to map[string]any, text string) map[string]any {
		return map[string]any{"range": map[string]any{"start": from, "end": to}, "text": text}
	}
	change(1, map[string]any{"text": "of nothing open"})
	c.Notify("textDocument/didClose", map[string]any{"textDocument": map[string]any{"uri": uri}})
	c.Open(uri, "rest")
	// Beyond the line, beyond the text, before it, the wrong way round.
	change(2, replace(position(0, 1_000_000), position(0, 2_000_000), "?"))
	change(7, replace(position(1_000, 1e18), position(1_000, 4e9), "!"))
	change(7, replace(position(-5, -5), position(-1, 0), "#"))
	change(3, replace(position(0, 5), position(0, 1), "*"))
	change(4, replace(position(0, "x"), position(0, 1), "lost"))
	change(nil)
	change(9, map[string]any{"text": c.Text(uri) + "?!"}, replace(position(0, 0), position(0, 0), "#"), replace(position(0, 1), position(0, 5), "*"))
	// What is left is a comment without its line end.
	edits := c.Format(uri)
	require.Len(t, edits, 1)
	assert.Equal(t, "#*?!\n", edits[0].NewText)
	assert.Contains(t, c.Log(), "not open")
	assert.Contains(t, c.Log(), "does not follow")

	c.Open(uri, frame) // once more, without a close
	assert.Empty(t, c.Pull(uri, "").Items)
}

func TestUnknownDocuments(t *testing.T) {
	c := start(t, lsptest.Options{})
	for _, name := range []string{"file:///no/such/file.span", "untitled:Untitled-1", "%zz", ""} {
		err := c.Refused("textDocument/formatting", map[string]any{"textDocument": map[string]any{"uri": name}, "options": map[string]any{}})
		assert.EqualValues(t, -32602, err.Code, name)
	}
	c.Open("untitled:Untitled-1", "node A=(0,0)m")
	assert.NotEmpty(t, c.Format("untitled:Untitled-1"))
}

// A document of ten megabytes is taken, edited and answered.
func TestALargeDocument(t *testing.T) {
	if testing.Short() {
		t.Skip("takes seconds")
	}
	c := start(t, lsptest.Options{Capabilities: pushing()})
	var text strings.Builder
	text.WriteString(frame)
	for text.Len() < 10<<20 {
		text.WriteString("# A note of a careful engineer on why things are as they are, line after line. 🏗\n")
	}
	c.Open(uri, text.String())
	assert.Empty(t, c.WaitDiagnostics(uri))
	c.Change(uri, source.Edit{Span: source.At(text.Len()), New: "beam d = A -> Bee of post\n"})
	assert.Equal(t, "Bee", c.Under(uri, c.WaitDiagnostic(uri, "unknown-name").Range))
}
