package lsp

import (
	"encoding/json"
	"errors"
	"flag"
	"math/rand/v2"
	"regexp"
	"runtime"
	"strings"
	"testing"
	"time"

	"github.com/sourcegraph/jsonrpc2"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	format "spanwright/fmt"
	"spanwright/lang/source"
	"spanwright/lsp/lsptest"
	"spanwright/lsp/rpc"
)

var edits = flag.Int("edits", 600, "number of edits in the load session")

// question is a request about a place, as a client in use sends it.
type question struct {
	method string
	params func(uri string, at lsp.Position, text string) map[string]any
}

// questions are all requests that take a document and perhaps a place.
func questions() []question {
	document := func(uri string, _ lsp.Position, _ string) map[string]any {
		return map[string]any{"textDocument": map[string]any{"uri": uri}}
	}
	place := func(more ...any) func(string, lsp.Position, string) map[string]any {
		return func(uri string, at lsp.Position, _ string) map[string]any {
			p := map[string]any{"textDocument": map[string]any{"uri": uri}, "position": at}
			for i := 0; i < len(more); i += 2 {
				p[more[i].(string)] = more[i+1]
			}
			return p
		}
	}
	spanned := func(more ...any) func(string, lsp.Position, string) map[string]any {
		return func(uri string, at lsp.Position, _ string) map[string]any {
			p := map[string]any{"textDocument": map[string]any{"uri": uri},
				"range": lsp.Range{Start: lsp.Position{Line: at.Line / 2}, End: at}}
			for i := 0; i < len(more); i += 2 {
				p[more[i].(string)] = more[i+1]
			}
			return p
		}
	}
	options := map[string]any{"tabSize": 4, "insertSpaces": true}
	return []question{
		{"textDocument/hover", place()},
		{"textDocument/completion", place()},
		{"textDocument/signatureHelp", place()},
		{"textDocument/codeAction", spanned("context", map[string]any{"diagnostics": []any{}})},
		{"textDocument/prepareCallHierarchy", place()},
		{"textDocument/prepareTypeHierarchy", place()},
		{"textDocument/definition", place()},
		{"textDocument/references", place("context", map[string]any{"includeDeclaration": true})},
		{"textDocument/documentHighlight", place()},
		{"textDocument/documentSymbol", document},
		{"textDocument/formatting", func(uri string, _ lsp.Position, _ string) map[string]any {
			return map[string]any{"textDocument": map[string]any{"uri": uri}, "options": options}
		}},
		{"textDocument/rangeFormatting", spanned("options", options)},
		{"textDocument/onTypeFormatting", place("ch", "\n", "options", options)},
		{"textDocument/inlayHint", spanned()},
		{"textDocument/codeLens", document},
		{"textDocument/documentLink", document},
		{"textDocument/foldingRange", document},
		{"textDocument/selectionRange", func(uri string, at lsp.Position, _ string) map[string]any {
			return map[string]any{"textDocument": map[string]any{"uri": uri}, "positions": []any{at}}
		}},
		{"textDocument/prepareRename", place()},
		{"textDocument/rename", place("newName", "fresh_name")},
		{"textDocument/semanticTokens/full", document},
		{"textDocument/semanticTokens/range", spanned()},
		{"workspace/symbol", func(string, lsp.Position, string) map[string]any { return map[string]any{"query": "a"} }},
	}
}

// player plays a random session.
type player struct {
	t       *testing.T
	random  *rand.Rand
	client  *lsptest.Client
	base    map[string]string // by URI, a sound text to come back to
	uris    []string
	pending []asked
	asked   uint64
	answers map[string]int // by method
}

// asked is a request under way.
type asked struct {
	lsptest.Pending
	method    string
	text      string // the document when it was asked about
	uri       string
	cancelled bool
}

var number = regexp.MustCompile(`\d+(\.\d+)?`)

// fragments are what is typed: sound and unsound pieces.
var fragments = []string{
	"\n", " ", "a", "5", "kN", " m", "->", "(", ")", "{", "}", ",", "\"", "#", "🏗", "\r\n",
	"node Z1 = (1, 2) m\n", "let q = 3 kN/m\n", "support Z1 pinned\n", "beam\n", "case Q {\n", "}\n", "limit deflection of ",
}

// edit makes one edit of a random document.
func (p *player) edit() {
	uri := p.uris[p.random.IntN(len(p.uris))]
	text := p.client.Text(uri)
	switch r := p.random.IntN(100); {
	case r < 45: // another number
		if places := number.FindAllStringIndex(text, -1); len(places) > 0 {
			at := places[p.random.IntN(len(places))]
			digit := string(rune('1' + p.random.IntN(9)))
			p.client.Change(uri, source.Edit{Span: source.Span{Start: at[0], End: at[0] + 1}, New: digit})
			return
		}
		p.client.Replace(uri, p.base[uri])
	case r < 70: // typing, perhaps in two changes of one message
		piece := fragments[p.random.IntN(len(fragments))]
		change := source.Edit{Span: source.At(p.offset(text)), New: piece}
		if r%5 == 0 {
			p.client.Change(uri, change, source.Edit{Span: source.Span{Start: change.Start, End: change.Start + len(piece)}})
			return
		}
		p.client.Change(uri, change)
	case r < 85: // deleting
		start := p.offset(text)
		end := start + p.random.IntN(20)
		for end < len(text) && text[end]&0xc0 == 0x80 {
			end++
		}
		p.client.Change(uri, source.Edit{Span: source.Span{Start: start, End: min(end, len(text))}})
	default: // back to a sound text
		p.client.Replace(uri, p.base[uri])
	}
}

// offset returns a random offset between two signs.
func (p *player) offset(text string) int {
	at := p.random.IntN(len(text) + 1)
	for at > 0 && at < len(text) && text[at]&0xc0 == 0x80 {
		at--
	}
	return at
}

// ask sends a random question and perhaps cancels it.
func (p *player) ask() {
	p.asked++
	id := 1_000_000 + p.asked // apart from those of Call
	all := questions()
	q := all[p.random.IntN(len(all))]
	uri := p.uris[p.random.IntN(len(p.uris))]
	text := p.client.Text(uri)
	at := lsp.Position{Line: uint32(p.random.IntN(strings.Count(text, "\n") + 2)), Character: uint32(p.random.IntN(40))}
	a := asked{Pending: p.client.Send(id, q.method, q.params(uri, at, text)), method: q.method, text: text, uri: uri}
	if p.random.IntN(6) == 0 {
		p.client.Cancel(a.Pending)
		a.cancelled = true
	}
	p.pending = append(p.pending, a)
}

// settle waits for the oldest answers until at most so many are under way.
func (p *player) settle(most int) {
	for len(p.pending) > most {
		a := p.pending[0]
		p.pending = p.pending[1:]
		var result json.RawMessage
		err := p.client.Wait(a.Pending, &result)
		var failed *jsonrpc2.Error
		if errors.As(err, &failed) {
			refused := failed.Code == rpc.CodeRequestFailed && (a.method == "textDocument/rename" || a.method == "textDocument/prepareRename")
			cancelled := failed.Code == rpc.CodeRequestCancelled && a.cancelled
			require.True(p.t, refused || cancelled, "%s: %v\n%s", a.method, failed, p.client.Log())
			continue
		}
		require.NoError(p.t, err)
		p.answers[a.method]++
		if a.method == "textDocument/formatting" {
			p.check(a, result)
		}
	}
}

// check holds a formatting against the text that it was asked about: it tells
// whether the request was answered from its own snapshot.
func (p *player) check(a asked, result json.RawMessage) {
	var edits []lsp.TextEdit
	require.NoError(p.t, json.Unmarshal(result, &edits))
	file := source.New(a.uri, a.text)
	var all []source.Edit
	for _, e := range edits {
		offset := func(at lsp.Position) int {
			return file.Offset(source.Point{Line: int(at.Line), Character: int(at.Character)}, source.UTF16)
		}
		all = append(all, source.Edit{Span: source.Span{Start: offset(e.Range.Start), End: offset(e.Range.End)}, New: e.NewText})
	}
	text, err := source.Apply(a.text, all)
	require.NoError(p.t, err)
	require.Equal(p.t, format.File(file), text)
}

// A long random session over several open models, with all requests between
// the edits and some of them cancelled: nothing fails, nothing grows, and
// afterwards every answer is that of a server which has only seen the end.
func TestLoad(t *testing.T) {
	p := &player{t: t, random: rand.New(rand.NewPCG(7, 11)), base: map[string]string{}, answers: map[string]int{}}
	p.client = start(t, lsptest.Options{Capabilities: pushing()})
	for _, name := range []string{"boathouse", "jetty", "clubroom"} {
		u := "file:///load/" + name + ".span"
		p.uris = append(p.uris, u)
		p.base[u] = model(t, name+".span")
		p.client.Open(u, p.base[u])
	}
	var early uint64
	var routines int
	for i := range *edits {
		p.edit()
		for range p.random.IntN(3) {
			p.ask()
		}
		p.settle(12)
		if i%100 == 0 {
			p.client.Forget()
		}
		if i == *edits/3 {
			p.settle(0)
			early, routines = heap(), runtime.NumGoroutine()
		}
	}
	p.settle(0)
	for _, u := range p.uris {
		p.client.Replace(u, p.base[u])
	}
	assert.Less(t, heap(), early+16<<20, "the heap has grown")
	assert.LessOrEqual(t, runtime.NumGoroutine(), routines+8, "goroutines are left")
	for _, q := range questions() {
		assert.NotZero(t, p.answers[q.method], "%s was never answered", q.method)
	}
	p.compare()
}

func heap() uint64 {
	runtime.GC()
	var m runtime.MemStats
	runtime.ReadMemStats(&m)
	return m.HeapAlloc
}

// compare asks the server and a fresh one the same of the last texts.
func (p *player) compare() {
	fresh := start(p.t, lsptest.Options{Capabilities: pushing()})
	for _, u := range p.uris {
		fresh.Open(u, p.client.Text(u))
	}
	for _, u := range p.uris {
		text := p.client.Text(u)
		for _, q := range questions() {
			for range 6 {
				at := lsp.Position{Line: uint32(p.random.IntN(strings.Count(text, "\n") + 1)), Character: uint32(p.random.IntN(30))}
				p.same(fresh, q, u, at, text)
			}
		}
	}
}

// history is what differs between two servers that say the same: how long a
// solve took and what it could use again, what the last edit did, versions.
var history = regexp.MustCompile(`[0-9.]+ (µs|ms|s)\b|"resultId":"[^"]*"|"version":[0-9]+` +
	`|this version · [^·"]*|\{"range":\{"start":\{[^}]*\},"end":\{[^}]*\}\},"command":\{"title":"last edit:[^}]*\}\},?`)

// same asks both until they agree: the solves of one may take longer.
func (p *player) same(fresh *lsptest.Client, q question, uri string, at lsp.Position, text string) {
	answer := func(c *lsptest.Client) string {
		var result json.RawMessage
		if err := c.Call(q.method, q.params(uri, at, text), &result); err != nil {
			return err.Error()
		}
		return history.ReplaceAllString(string(result), "")
	}
	var before, after string
	for deadline := time.Now().Add(lsptest.Patience); time.Now().Before(deadline); time.Sleep(10 * time.Millisecond) {
		if before, after = answer(p.client), answer(fresh); before == after {
			return
		}
	}
	require.Equal(p.t, after, before, "%s at %v of %s", q.method, at, uri)
}
