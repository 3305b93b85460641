package lsp

import (
	"path/filepath"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lsp/lsptest"
)

// The folders of a workspace are looked through; one that goes takes its models
// along.
func TestWorkspaceFolders(t *testing.T) {
	folder := t.TempDir()
	_, file := write(t, folder, "shed.span", frame)
	write(t, folder, "notes.txt", "node Q = (0, 0) m")
	folderURI := uriOf(filepath.ToSlash(folder))

	eventually := func(c *lsptest.Client, count int) {
		t.Helper()
		for deadline := time.Now().Add(lsptest.Patience); len(c.WorkspaceSymbols("post")) != count; time.Sleep(5 * time.Millisecond) {
			require.True(t, time.Now().Before(deadline), "%d symbols never come", count)
		}
	}
	c := start(t, lsptest.Options{Folders: []string{folderURI}})
	eventually(c, 1)
	assert.Equal(t, file, c.WorkspaceSymbols("post")[0].Location.URI)
	assert.Empty(t, c.WorkspaceSymbols("Q"))
	change := func(what string) {
		event := map[string]any{"added": []any{}, "removed": []any{}}
		event[what] = []any{map[string]any{"uri": folderURI, "name": "x"}}
		c.Notify("workspace/didChangeWorkspaceFolders", map[string]any{"event": event})
	}
	change("removed")
	eventually(c, 0)
	change("added")
	eventually(c, 1)

	// A file that is not a model's is none of our business.
	before := c.Log()
	c.Notify("workspace/didChangeWatchedFiles", map[string]any{"changes": []any{map[string]any{"uri": folderURI + "/notes.txt", "type": 2}}})
	eventually(c, 1)
	assert.Equal(t, before, c.Log())
}
