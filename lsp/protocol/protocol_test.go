package protocol

import (
	"encoding/json"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	glsp "github.com/tliron/glsp/protocol_3_16"
)

func encode(t *testing.T, value any) string {
	t.Helper()
	text, err := json.Marshal(value)
	require.NoError(t, err)
	return string(text)
}

func TestListsAreNeverNull(t *testing.T) {
	assert.Equal(t, `[]`, encode(t, List[int](nil)))
	assert.Equal(t, `[1,2]`, encode(t, List[int]{1, 2}))
	assert.JSONEq(t, `{"uri":"a","diagnostics":[]}`, encode(t, PublishDiagnosticsParams{URI: "a"}))
	assert.JSONEq(t, `{"isIncomplete":false,"items":[]}`, encode(t, CompletionList{}))
	assert.JSONEq(t, `{"kind":"full","items":[]}`, encode(t, FullDocumentDiagnosticReport{Kind: DiagnosticReportFull}))
}

// The fields of 3.17 stand beside those of 3.16, not in an object of their own.
func TestServerCapabilitiesAreFlat(t *testing.T) {
	var c ServerCapabilities
	c.HoverProvider = true
	c.PositionEncoding = PositionEncodingUTF8
	c.InlayHintProvider = &InlayHintOptions{}
	c.CompletionProvider = &glsp.CompletionOptions{TriggerCharacters: []string{"."}}
	assert.JSONEq(t, `{"capabilities":{"hoverProvider":true,"positionEncoding":"utf-8","inlayHintProvider":{},
		"completionProvider":{"triggerCharacters":["."]}}}`, encode(t, InitializeResult{Capabilities: c}))
}

// What a diagnostic carries comes back as it was sent.
func TestDiagnosticsSurviveTheRoundTrip(t *testing.T) {
	const text = `{"range":{"start":{"line":1,"character":2},"end":{"line":1,"character":3}},"severity":1,
		"code":"unknown-name","source":"spanwright","message":"E","tags":[1],"data":{"fix":[1,"a"]}}`
	var d Diagnostic
	require.NoError(t, json.Unmarshal([]byte(text), &d))
	assert.JSONEq(t, text, encode(t, d))
}

func TestProgressToken(t *testing.T) {
	for params, want := range map[string]any{
		`{"token":7}`:      int64(7),
		`{"token":"a"}`:    "a",
		`{"token":null}`:   nil,
		`{"token":[]}`:     nil,
		`{"token":1.5}`:    nil,
		`{"other":7}`:      nil,
		`[]`:               nil,
		`{"token":"\ud800`: nil,
	} {
		token := ProgressToken(json.RawMessage(params), "token")
		if want == nil {
			assert.Nil(t, token, params)
			continue
		}
		require.NotNil(t, token, params)
		assert.Equal(t, want, token.Value)
	}
}

func TestClientCapabilities(t *testing.T) {
	c, err := DecodeClientCapabilities(json.RawMessage(`{"clientInfo":{"name":"x"},"capabilities":{
		"general":{"positionEncodings":["utf-8","utf-16"]},
		"window":{"workDoneProgress":true},
		"workspace":{"configuration":true,"didChangeWatchedFiles":{"dynamicRegistration":true},"inlayHint":{"refreshSupport":true}},
		"textDocument":{
			"hover":{"contentFormat":["plaintext","markdown"]},
			"completion":{"completionItem":{"snippetSupport":true,"documentationFormat":["markdown"]}},
			"diagnostic":{},
			"rangeFormatting":{"rangesSupport":true},
			"codeAction":{"dataSupport":true,"resolveSupport":{"properties":["edit"]}}}}}`))
	require.NoError(t, err)
	assert.True(t, c.OffersEncoding("utf-8"))
	assert.True(t, c.OffersEncoding("utf-16"))
	assert.False(t, c.OffersEncoding("utf-32"))
	assert.True(t, c.WorkDoneProgress && c.Configuration && c.RegisterWatchedFiles && c.RefreshInlayHints)
	assert.False(t, c.HoverMarkdown(), "the first format is the client's choice")
	assert.True(t, c.CompletionMarkdown() && c.Snippets && c.PullDiagnostics && c.RangesFormatting && c.CodeActionData)
	assert.Equal(t, []string{"edit"}, c.CodeActionResolve)

	// A field of a wrong type costs that field, no other.
	c, err = DecodeClientCapabilities(json.RawMessage(`{"capabilities":{"window":{"workDoneProgress":"yes"},"workspace":{"configuration":true}}}`))
	require.Error(t, err)
	assert.True(t, c.Configuration)
	assert.False(t, c.WorkDoneProgress)

	for _, params := range []string{`{}`, `null`, `{"capabilities":null}`, `{"capabilities":{"textDocument":{"semanticTokens":{"requests":{"full":false}}}}}`} {
		c, err = DecodeClientCapabilities(json.RawMessage(params))
		require.NoError(t, err, params)
		assert.Equal(t, ClientCapabilities{}, c, params)
	}
}

func TestAVersionThatIsNotKnownIsNull(t *testing.T) {
	edit := WorkspaceEdit{DocumentChanges: []TextDocumentEdit{{
		TextDocument: OptionalVersionedTextDocumentIdentifier{URI: "a"},
		Edits:        List[glsp.TextEdit]{{Range: glsp.Range{}, NewText: "x"}},
	}}}
	assert.JSONEq(t, `{"documentChanges":[{"textDocument":{"uri":"a","version":null},
		"edits":[{"range":{"start":{"line":0,"character":0},"end":{"line":0,"character":0}},"newText":"x"}]}]}`, encode(t, edit))
}
