package feature

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// Every prefix of every model goes through every feature without a panic.
func TestEveryPrefix(t *testing.T) {
	for _, name := range models(t) {
		text, err := os.ReadFile(name)
		require.NoError(t, err)
		path, err := filepath.Abs(name)
		require.NoError(t, err)
		w := workspace.New(workspace.Options{Pause: time.Hour, Staleness: time.Hour, Slow: time.Hour}, workspace.Events{})
		path = filepath.ToSlash(path)
		w.Open(path, 1, string(text))
		for !settled(w, path) {
			time.Sleep(time.Millisecond)
		}
		step := max(1, len(text)/150)
		if testing.Short() {
			step *= 10
		}
		for n := len(text); n >= 0; n -= step {
			w.Change(path, int32(len(text)-n+2), []workspace.Replacement{{Whole: true, Text: string(text[:n])}}, source.UTF16)
			everything(w.Snapshot(), path, n)
		}
		w.Close()
	}
}

func settled(w *workspace.Workspace, path string) bool {
	v, ok := w.Snapshot().View(path)
	return ok && v.State != workspace.Overtaken
}

// everything asks all that can be asked at a place.
func everything(s *workspace.Snapshot, path string, offset int) {
	tree, err := s.Tree(path)
	if err != nil {
		return
	}
	whole := source.Span{Start: 0, End: len(tree.File.Text)}
	for _, at := range []int{offset, max(0, offset-3), offset / 2} {
		h, _ := HoverAt(context.Background(), s, path, at, HoverOptions{Pictures: offset%2 == 0})
		Plain(h.Markdown)
		Definition(s, path, at)
		References(s, path, at, true)
		Highlights(s, path, at)
		Selections(tree, at)
		if item, ok := TypeItem(s, path, at); ok {
			Supertypes(s, item)
			Subtypes(s, item)
		}
		if item, ok := PathItem(s, path, at); ok {
			LoadsTo(s, item)
			LoadsFrom(s, item)
		}
		if _, _, err := PrepareRename(s, path, at); err == nil {
			Rename(s, path, at, "renamed")
		}
	}
	Hints(s, path, whole, AllHints())
	Lenses(s, path)
	Symbols(s, path)
	WorkspaceSymbols(s, "a")
	Folds(tree)
	Links(tree)
	Tokens(s, path, whole)
}

// Places beyond the text and unknown files are answered with nothing.
func TestNowhere(t *testing.T) {
	d := open(t, "/shed.span", shed)
	for _, at := range []int{-5, len(shed), len(shed) + 100} {
		everything(d.snapshot(), d.path, at)
	}
	everything(d.snapshot(), "/nowhere.span", 0)
	_, ok := HoverAt(t.Context(), d.snapshot(), "/nowhere.span", 0, HoverOptions{})
	require.False(t, ok)
	require.Nil(t, Hints(d.snapshot(), "/nowhere.span", source.Span{}, AllHints()))
	require.False(t, strings.Contains(d.hover("node |A ="), "NaN"))
}

// No text makes any feature fail.
func FuzzEverything(f *testing.F) {
	for _, name := range models(f) {
		text, err := os.ReadFile(name)
		require.NoError(f, err)
		if len(text) < 6000 { // larger ones only make it slow
			f.Add(string(text), len(text)/2)
		}
	}
	f.Add(frames, 100)
	f.Add(shed, 20)
	f.Add("case Q {\n{", 3)
	f.Add("let a = (((1 m", 9)
	f.Fuzz(func(t *testing.T, text string, offset int) {
		w := library(t, map[string]string{"/f.span": text})
		everything(w.Snapshot(), "/f.span", offset)
	})
}
