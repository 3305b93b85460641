package lsp

import (
	"encoding/json"
	"fmt"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lsp/lsptest"
	"spanwright/lsp/protocol"
)

// What is published is of growing versions, and the last word is right.
func TestPublishedInOrder(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, frame)
	for i := range 60 {
		if i%2 == 0 {
			c.Edit(uri, "support A fixed", "support A pinned")
		} else {
			c.Edit(uri, "support A pinned", "support A fixed")
		}
	}
	assert.Empty(t, c.WaitDiagnosticsThat(uri, "are none", none))
	c.Edit(uri, "support A fixed", "support A pinned")
	d := c.WaitDiagnostic(uri, "mechanism")
	assert.Contains(t, d.Message, "A")
	last := int32(0)
	for _, p := range c.Published(uri) {
		require.NotNil(t, p.Version)
		assert.GreaterOrEqual(t, *p.Version, last)
		last = *p.Version
	}
}

// The place of an error follows the text above it.
func TestRelatedPlaces(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, strings.Replace(frame, "node B", "node A = (1, 0) m\nnode B", 1))
	list := c.WaitDiagnosticsThat(uri, "there are", func(l []protocol.Diagnostic) bool { return len(l) > 0 })
	require.NotEmpty(t, list[0].RelatedInformation)
	related := list[0].RelatedInformation[0]
	assert.Equal(t, uri, related.Location.URI)
	assert.NotEmpty(t, related.Message)

	plain := start(t, lsptest.Options{Capabilities: map[string]any{}})
	plain.Open(uri, c.Text(uri))
	list = plain.WaitDiagnosticsThat(uri, "there are", func(l []protocol.Diagnostic) bool { return len(l) > 0 })
	assert.Empty(t, list[0].RelatedInformation, "the client did not ask for it")
}

// write writes a file and returns its path and URI.
func write(t *testing.T, folder, name, text string) (path, uri string) {
	t.Helper()
	path = filepath.Join(folder, name)
	require.NoError(t, os.WriteFile(path, []byte(text), 0o644))
	return path, uriOf(filepath.ToSlash(path))
}

// parts is a model over two files.
func parts(t *testing.T) (folder, main, common string) {
	folder = t.TempDir()
	_, common = write(t, folder, "common.span", "material steel = S235\nsection post = HEA 100 of steel\n")
	_, main = write(t, folder, "main.span", strings.Replace(frame, "material steel = S235\nsection post = HEA 100 of steel\n", "use \"common.span\"\n", 1))
	return folder, main, common
}

func fileText(t *testing.T, uri string) string {
	text, err := os.ReadFile(filepath.FromSlash(pathOf(uri)))
	require.NoError(t, err)
	return string(text)
}

// Changes on disk and in buffers of a shared file reach the model that uses it;
// closing the buffer makes the file on disk count again.
func TestSharedFiles(t *testing.T) {
	folder, main, common := parts(t)
	c := start(t, lsptest.Options{Capabilities: pushing(), Folders: []string{uriOf(filepath.ToSlash(folder))}})
	c.Open(main, fileText(t, main))
	assert.Empty(t, c.WaitDiagnostics(main))

	c.Open(common, fileText(t, common))
	c.Edit(common, "section post", "section pole")
	c.WaitDiagnostic(main, "unknown-name")
	c.Close(common)
	assert.Empty(t, c.WaitDiagnosticsThat(main, "are none", none))

	write(t, folder, "common.span", "material steel = S235\nsection mast = HEA 100 of steel\n")
	changed := func(kind int) {
		c.Notify("workspace/didChangeWatchedFiles", map[string]any{"changes": []any{map[string]any{"uri": common, "type": kind}}})
	}
	changed(2)
	c.WaitDiagnostic(main, "unknown-name")
	require.NoError(t, os.Remove(filepath.FromSlash(pathOf(common))))
	changed(3)
	c.WaitDiagnosticsThat(main, "speak of the file", func(l []protocol.Diagnostic) bool {
		return len(l) > 0 && strings.Contains(fmt.Sprint(l), "common.span")
	})
	write(t, folder, "common.span", "material steel = S235\nsection post = HEA 100 of steel\n")
	changed(1)
	assert.Empty(t, c.WaitDiagnosticsThat(main, "are none", none))
}

func none(list []protocol.Diagnostic) bool { return len(list) == 0 }

// Of a hopeless file the first thousand messages are listed, and how many there
// are besides.
func TestAHopelessFile(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, frame+strings.Repeat("node\n", 3000))
	list := c.WaitDiagnostics(uri)
	require.Len(t, list, mostDiagnostics)
	assert.Contains(t, list[mostDiagnostics-1].Message, "2001 more messages")
	assert.Nil(t, list[mostDiagnostics-1].Code)
	assert.NotEmpty(t, list[mostDiagnostics-2].Code)
}

// An error in a file that is not open is published about that file, and taken
// back when the model is closed.
func TestFilesThatAreNotOpen(t *testing.T) {
	folder, main, common := parts(t)
	write(t, folder, "common.span", "material steel = S235\nsection post = HEA 101 of steel\n")
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(main, fileText(t, main))
	last := func(count int) lsptest.Published {
		t.Helper()
		deadline := time.Now().Add(lsptest.Patience)
		for time.Now().Before(deadline) {
			if all := c.Published(common); len(all) > 0 && len(all[len(all)-1].Diagnostics) == count {
				return all[len(all)-1]
			}
			time.Sleep(5 * time.Millisecond)
		}
		require.Fail(t, "never", "%d diagnostics of %s: %+v", count, common, c.Published(common))
		return lsptest.Published{}
	}
	assert.Nil(t, last(1).Version)
	c.Close(main)
	last(0)
}

func TestThePathOfAURI(t *testing.T) {
	for uri, want := range map[string]string{
		"file:///a/b.span":            "/a/b.span",
		"file:///a/x/../b%20c.span":   "/a/b c.span",
		"file:///C:/a.span":           "C:/a.span",
		"file:///c%3A/a.span":         "C:/a.span",
		"file:///c%3a/%C3%A9.span":    "C:/é.span",
		"file://localhost/a.span":     "/a.span",
		"file://server/share/a.span":  "//server/share/a.span",
		"untitled:Untitled-1":         "untitled:Untitled-1",
		"git:/a/b.span?%7B%22x%22%7D": "git:/a/b.span?%7B%22x%22%7D",
		"vscode-vfs://host/a/b.span":  "vscode-vfs://host/a/b.span",
		"file:///%zz":                 "file:///%zz",
		"file:///a/%F0%9F%8F%97.span": "/a/🏗.span",
	} {
		assert.Equal(t, want, pathOf(uri), uri)
		assert.Equal(t, want, pathOf(uriOf(want)), "there and back: %s", uri)
	}
	assert.Equal(t, "file:///a/b%20%23c.span", uriOf("/a/b #c.span"))
}

// The client is answered under the URI that it opened the document by.
func TestTheClientsSpelling(t *testing.T) {
	c := start(t, lsptest.Options{Capabilities: pushing()})
	const spelt = "file:///c%3A/models/sh%65d.span"
	c.Open(spelt, strings.Replace(frame, "A -> B", "A -> Bee", 1))
	c.WaitDiagnostic(spelt, "unknown-name")
}

// A client that pulls is not pushed to: it would show everything twice.
func TestPulledDiagnostics(t *testing.T) {
	capabilities := lsptest.Set(lsptest.Capabilities(), map[string]any{"dynamicRegistration": false}, "textDocument", "diagnostic")
	c := start(t, lsptest.Options{Capabilities: capabilities})
	require.Equal(t, map[string]any{"identifier": "spanwright", "interFileDependencies": true, "workspaceDiagnostics": false}, c.ServerCapabilities["diagnosticProvider"])
	c.Open(uri, strings.Replace(frame, "A -> B", "A -> Bee", 1))
	c.WaitDiagnostic(uri, "unknown-name") // before the first pull
	report := c.Pull(uri, "")
	assert.Equal(t, "full", report.Kind)
	assert.Equal(t, []string{"unknown-name"}, codes(report.Items))
	assert.Empty(t, c.WaitDiagnosticsThat(uri, "are taken back", none))
	assert.Equal(t, "unchanged", c.Pull(uri, report.ResultID).Kind)
	pushed := len(c.Published(uri))

	// A solve that finds something makes the client ask again.
	c.Edit(uri, "Bee", "B")
	c.Edit(uri, "support A fixed", "support A pinned")
	for {
		asked := len(c.Received(protocol.ServerWorkspaceDiagnosticRefresh))
		if report = c.Pull(uri, ""); len(report.Items) > 0 {
			break
		}
		c.WaitReceived(protocol.ServerWorkspaceDiagnosticRefresh, asked+1)
	}
	assert.Equal(t, []string{"mechanism"}, codes(report.Items))
	assert.Len(t, c.Published(uri), pushed, "nothing is pushed any more")

	c.Close(uri)
	c.Open(uri, frame)
	assert.Empty(t, c.WaitDiagnostics(uri), "a document that was not pulled yet is pushed")
}

func TestAClientThatCannotBeAskedToPullAgain(t *testing.T) {
	capabilities := lsptest.Set(lsptest.Capabilities(), map[string]any{}, "textDocument", "diagnostic")
	lsptest.Set(capabilities, nil, "workspace", "diagnostics")
	c := start(t, lsptest.Options{Capabilities: capabilities})
	assert.Nil(t, c.ServerCapabilities["diagnosticProvider"])
}

// After a solve the client is asked once for each thing, and not once per case.
func TestRefreshes(t *testing.T) {
	methods := []string{protocol.ServerWorkspaceInlayHintRefresh, protocol.ServerWorkspaceCodeLensRefresh, protocol.ServerWorkspaceSemanticTokensRefresh}
	c := start(t, lsptest.Options{Capabilities: pushing()})
	c.Open(uri, model(t, "boathouse.span"))
	for _, m := range methods {
		c.WaitReceived(m, 1)
	}
	time.Sleep(300 * time.Millisecond)
	for _, m := range methods {
		assert.Len(t, c.Received(m), 1, m)
	}
	none := start(t, lsptest.Options{Capabilities: map[string]any{}})
	none.Open(uri, model(t, "boathouse.span"))
	none.WaitDiagnostics(uri)
	time.Sleep(300 * time.Millisecond)
	for _, m := range methods {
		assert.Empty(t, none.Received(m), m)
	}
}

func TestConfigurationIsFetched(t *testing.T) {
	c := start(t, lsptest.Options{Configuration: map[string]any{"spanwright": map[string]any{"inlayHints": map[string]any{"supports": false}}}})
	asked := c.WaitReceived("workspace/configuration", 1)
	assert.JSONEq(t, `{"items":[{"section":"spanwright"}]}`, string(asked[0].Params))
	c.Configure(nil)
	c.WaitReceived("workspace/configuration", 2)

	registered := c.WaitReceived("client/registerCapability", 1)
	var params struct {
		Registrations []struct {
			Method          string
			RegisterOptions json.RawMessage
		}
	}
	require.NoError(t, json.Unmarshal(registered[0].Params, &params))
	require.Len(t, params.Registrations, 2)
	assert.Equal(t, "workspace/didChangeWatchedFiles", params.Registrations[0].Method)
	assert.JSONEq(t, `{"watchers":[{"globPattern":"**/*.span"}]}`, string(params.Registrations[0].RegisterOptions))
	assert.Equal(t, "workspace/didChangeConfiguration", params.Registrations[1].Method)

	// A client that can do none of this is asked for nothing.
	plain := start(t, lsptest.Options{Capabilities: map[string]any{}})
	plain.Open(uri, frame)
	plain.WaitDiagnostics(uri)
	assert.Empty(t, plain.Received("workspace/configuration"))
	assert.Empty(t, plain.Received("client/registerCapability"))
}
