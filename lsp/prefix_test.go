package lsp

import (
	"encoding/json"
	"errors"
	"flag"
	"io/fs"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/sourcegraph/jsonrpc2"
	"github.com/stretchr/testify/require"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/lsptest"
)

var prefixes = flag.Int("prefixes", 4, "number of prefixes of each model that the requests are asked about; 0 stands for all")

// Every request about every state of a text that is being written, from its
// first letter on, has an answer: no error of the server, no panic.
func TestEveryPrefixHasAnAnswer(t *testing.T) {
	var texts []string
	require.NoError(t, filepath.WalkDir(filepath.Join("..", "testdata"), func(path string, d fs.DirEntry, err error) error {
		if err != nil || d.IsDir() || filepath.Ext(path) != extension {
			return err
		}
		text, err := os.ReadFile(path)
		texts = append(texts, string(text))
		return err
	}))
	require.NotEmpty(t, texts)
	if testing.Short() {
		texts = texts[:min(len(texts), 10)]
	}
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, "")
	all := questions()
	for _, text := range texts {
		step := 1
		if *prefixes > 0 {
			step = max(1, len(text)/(*prefixes))
		}
		for end := 0; end <= len(text); end += step {
			c.Replace(uri, text[:end])
			askAll(t, c, all, text[:end])
		}
		c.Forget()
	}
}

// askAll asks all questions about the end of a text.
func askAll(t *testing.T, c *lsptest.Client, all []question, text string) {
	t.Helper()
	file := source.New(uri, strings.ToValidUTF8(text, "\ufffd"))
	p := file.Point(len(file.Text), source.UTF16)
	at := lsp.Position{Line: uint32(p.Line), Character: uint32(p.Character)}
	pending := make([]lsptest.Pending, len(all))
	for i, q := range all {
		pending[i] = c.Send(uint64(2_000_000+i), q.method, q.params(uri, at, text))
	}
	for i, p := range pending {
		var result json.RawMessage
		err := c.Wait(p, &result)
		var failed *jsonrpc2.Error
		if errors.As(err, &failed) {
			require.NotEqualValues(t, jsonrpc2.CodeInternalError, failed.Code, "%s after\n%s\n%v\n%s", all[i].method, text, failed, c.Log())
			require.NotEqualValues(t, jsonrpc2.CodeMethodNotFound, failed.Code, all[i].method)
		}
	}
}
