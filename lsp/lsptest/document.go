package lsptest

import (
	"strings"

	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/protocol"
)

// document is the client's own copy of an open document.
type document struct {
	version int32
	file    *source.File
}

// Open opens a document; its version is 1.
func (c *Client) Open(uri, text string) {
	c.t.Helper()
	c.update(func() { c.documents[uri] = &document{1, source.New(uri, text)} })
	c.Notify("textDocument/didOpen", map[string]any{"textDocument": map[string]any{
		"uri": uri, "languageId": "span", "version": 1, "text": text,
	}})
}

// Close closes a document.
func (c *Client) Close(uri string) {
	c.t.Helper()
	c.update(func() { delete(c.documents, uri) })
	c.Notify("textDocument/didClose", identifier(uri))
}

// Save says that a document was saved.
func (c *Client) Save(uri string) {
	c.t.Helper()
	c.Notify("textDocument/didSave", identifier(uri))
}

// Edit replaces a text, which must stand in the document once, by another, and
// returns the new version.
func (c *Client) Edit(uri, from, to string) int32 {
	c.t.Helper()
	text := c.Text(uri)
	require.Equal(c.t, 1, strings.Count(text, from), "%q must stand once in\n%s", from, text)
	start := strings.Index(text, from)
	return c.Change(uri, source.Edit{Span: source.Span{Start: start, End: start + len(from)}, New: to})
}

// Insert puts text at a mark such as "node B = |A", as typing would.
func (c *Client) Insert(uri, mark, text string) int32 {
	c.t.Helper()
	return c.Change(uri, source.Edit{Span: source.At(c.offset(uri, mark)), New: text})
}

// Change makes edits, one after the other: each speaks of the text that the one
// before it has left. It returns the new version.
func (c *Client) Change(uri string, edits ...source.Edit) int32 {
	c.t.Helper()
	var changes []any
	var version int32
	var err error
	c.update(func() {
		d := c.document(uri)
		for _, e := range edits {
			changes = append(changes, map[string]any{"range": c.rangeOf(d.file, e.Span), "text": e.New})
			var text string
			if text, err = source.Apply(d.file.Text, []source.Edit{e}); err != nil {
				return
			}
			d.file = source.New(uri, text)
		}
		d.version++
		version = d.version
	})
	require.NoError(c.t, err)
	c.didChange(uri, version, changes)
	return version
}

// Replace sends the whole text of a document anew, and returns the new version.
func (c *Client) Replace(uri, text string) int32 {
	c.t.Helper()
	var version int32
	c.update(func() {
		d := c.document(uri)
		d.file = source.New(uri, text)
		d.version++
		version = d.version
	})
	c.didChange(uri, version, []any{map[string]any{"text": text}})
	return version
}

func (c *Client) didChange(uri string, version int32, changes []any) {
	c.t.Helper()
	c.Notify("textDocument/didChange", map[string]any{
		"textDocument":   map[string]any{"uri": uri, "version": version},
		"contentChanges": changes,
	})
}

// Text returns a document as the client has it.
func (c *Client) Text(uri string) string {
	c.t.Helper()
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.document(uri).file.Text
}

// Version returns the version of a document as the client has it.
func (c *Client) Version(uri string) int32 {
	c.t.Helper()
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.document(uri).version
}

// At returns the place of the bar in a mark such as "support |A", whose other
// text stands in the document once. Without a bar it is the start of the mark.
func (c *Client) At(uri, mark string) lsp.Position {
	c.t.Helper()
	offset := c.offset(uri, mark)
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.point(c.document(uri).file, offset)
}

// Range returns the range of a text that stands in the document once.
func (c *Client) Range(uri, text string) lsp.Range {
	c.t.Helper()
	start := c.offset(uri, text)
	c.mu.Lock()
	defer c.mu.Unlock()
	return c.rangeOf(c.document(uri).file, source.Span{Start: start, End: start + len(text)})
}

// Under returns the text of a range.
func (c *Client) Under(uri string, r lsp.Range) string {
	c.t.Helper()
	c.mu.Lock()
	defer c.mu.Unlock()
	file := c.document(uri).file
	return file.Slice(c.span(file, r))
}

// Applied returns a document's text with edits made. The document itself stays.
func (c *Client) Applied(uri string, edits []lsp.TextEdit) string {
	c.t.Helper()
	c.mu.Lock()
	defer c.mu.Unlock()
	file := c.document(uri).file
	text, err := source.Apply(file.Text, c.edits(file, edits))
	require.NoError(c.t, err)
	return text
}

// ApplyEdits makes edits that all speak of the text as it is, and tells the
// server.
func (c *Client) ApplyEdits(uri string, edits []lsp.TextEdit) int32 {
	c.t.Helper()
	return c.Replace(uri, c.Applied(uri, edits))
}

// Apply makes a change over several documents, and tells the server.
func (c *Client) Apply(edit WorkspaceEdit) {
	c.t.Helper()
	for uri, edits := range edit.ByDocument() {
		c.ApplyEdits(uri, edits)
	}
}

// WorkspaceEdit is a change over several documents as it is decoded.
type WorkspaceEdit struct {
	Changes         map[string][]lsp.TextEdit `json:"changes"`
	DocumentChanges []struct {
		TextDocument protocol.OptionalVersionedTextDocumentIdentifier `json:"textDocument"`
		Edits        []lsp.TextEdit                                   `json:"edits"`
	} `json:"documentChanges"`
}

// ByDocument returns the edits by the URI of their document.
func (e WorkspaceEdit) ByDocument() map[string][]lsp.TextEdit {
	all := map[string][]lsp.TextEdit{}
	for uri, edits := range e.Changes {
		all[uri] = append(all[uri], edits...)
	}
	for _, change := range e.DocumentChanges {
		all[change.TextDocument.URI] = append(all[change.TextDocument.URI], change.Edits...)
	}
	return all
}

func identifier(uri string) map[string]any {
	return map[string]any{"textDocument": map[string]any{"uri": uri}}
}

func (c *Client) offset(uri, mark string) int {
	c.t.Helper()
	before, after, _ := strings.Cut(mark, "|")
	text := c.Text(uri)
	require.Equal(c.t, 1, strings.Count(text, before+after), "%q must stand once in\n%s", before+after, text)
	return strings.Index(text, before+after) + len(before)*min(1, strings.Count(mark, "|"))
}

// document returns an open document. The caller holds the lock.
func (c *Client) document(uri string) *document {
	c.t.Helper()
	d := c.documents[uri]
	require.NotNil(c.t, d, "%s is not open", uri)
	return d
}

func (c *Client) point(file *source.File, offset int) lsp.Position {
	p := file.Point(offset, c.encoding)
	return lsp.Position{Line: uint32(p.Line), Character: uint32(p.Character)}
}

func (c *Client) rangeOf(file *source.File, s source.Span) lsp.Range {
	return lsp.Range{Start: c.point(file, s.Start), End: c.point(file, s.End)}
}

func (c *Client) span(file *source.File, r lsp.Range) source.Span {
	offset := func(p lsp.Position) int {
		return file.Offset(source.Point{Line: int(p.Line), Character: int(p.Character)}, c.encoding)
	}
	return source.Span{Start: offset(r.Start), End: offset(r.End)}
}

func (c *Client) edits(file *source.File, edits []lsp.TextEdit) []source.Edit {
	all := make([]source.Edit, len(edits))
	for i, e := range edits {
		all[i] = source.Edit{Span: c.span(file, e.Range), New: e.NewText}
	}
	return all
}
