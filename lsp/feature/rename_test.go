package feature

import (
	"maps"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// library is a workspace without solves, with texts by path.
func library(t testing.TB, texts map[string]string) *workspace.Workspace {
	w := workspace.New(workspace.Options{Pause: time.Hour, Staleness: time.Hour, Slow: time.Hour, Freedoms: 1}, workspace.Events{})
	t.Cleanup(w.Close)
	for _, path := range slices.Sorted(maps.Keys(texts)) {
		w.Open(path, 1, texts[path])
	}
	return w
}

// apply makes edits in open buffers.
func apply(t require.TestingT, w *workspace.Workspace, edits map[string][]source.Edit) {
	for path, list := range edits {
		d, ok := w.Snapshot().Document(path)
		require.True(t, ok, path)
		text, err := source.Apply(d.File.Text, list)
		require.NoError(t, err)
		w.Change(path, d.Version+1, []workspace.Replacement{{Whole: true, Text: text}}, source.UTF16)
	}
}

func textOf(t require.TestingT, w *workspace.Workspace, path string) string {
	d, ok := w.Snapshot().Document(path)
	require.True(t, ok)
	return d.File.Text
}

var sharedTexts = map[string]string{
	"/yard/steel.span": "material steel = S275\nsection post = HEB 200 of steel\n",
	"/yard/hut.span": `model "Hut" plane
use "steel.span"
let high = 3 m
node A = (0, 0) m
node B = A + (0 m, high)
beam c = A -> B of post
support A fixed
case W wind { B: 1 kN along x }
combination ULS.a = 1.5 W
limit ux at B <= high/200 under ULS.a
`,
	"/yard/shed.span": `model "Shed" plane
use "steel.span"
node P = (0, 0) m
node Q = (0, 2) m
beam column = P -> Q of post
support P fixed
case G permanent { self-weight }
`,
}

// A name in a shared file is renamed in every model that uses it.
func TestRenameAcrossFiles(t *testing.T) {
	w := library(t, sharedTexts)
	at := strings.Index(sharedTexts["/yard/hut.span"], "post")
	edits, err := Rename(w.Snapshot(), "/yard/hut.span", at, "stanchion")
	require.NoError(t, err)
	assert.Len(t, edits, 3)
	apply(t, w, edits)
	for path := range sharedTexts {
		assert.Equal(t, strings.ReplaceAll(sharedTexts[path], "post", "stanchion"), textOf(t, w, path))
	}
}

func TestRenameOfCombination(t *testing.T) {
	w := library(t, sharedTexts)
	text := sharedTexts["/yard/hut.span"]
	edits, err := Rename(w.Snapshot(), "/yard/hut.span", strings.Index(text, "a = 1.5"), "gust")
	require.NoError(t, err)
	apply(t, w, edits)
	assert.Equal(t, strings.ReplaceAll(text, "ULS.a", "ULS.gust"), textOf(t, w, "/yard/hut.span"))
}

// What would change the model, or is no name, is refused with the reason.
func TestRenameRefuses(t *testing.T) {
	w := library(t, sharedTexts)
	text := sharedTexts["/yard/hut.span"]
	ask := func(at, name string) string {
		_, err := Rename(w.Snapshot(), "/yard/hut.span", strings.Index(text, at), name)
		require.Error(t, err, name)
		var refusal Refusal
		require.ErrorAs(t, err, &refusal)
		return err.Error()
	}
	assert.Contains(t, ask("B of", "A"), "A is already the name of a node")
	assert.Contains(t, ask("B of", "high"), "high is already the name of a let")
	assert.Contains(t, ask("B of", "beam"), "word of the language")
	assert.Contains(t, ask("B of", "kN"), "unit")
	assert.Contains(t, ask("B of", "2b"), "no name")
	assert.Contains(t, ask("B of", "a b"), "no name")
	assert.Contains(t, ask("B of", ""), "no name")
	assert.Contains(t, ask("1 kN", "x"), "Put the cursor on a name")
	_, _, err := PrepareRename(w.Snapshot(), "/yard/hut.span", strings.Index(text, "wind"))
	assert.ErrorContains(t, err, "Put the cursor on a name")
}

// Renaming and renaming back gives the same text, and in between the same
// structure: for any name of the demo models, at any of its places.
func TestRenameThereAndBack(t *testing.T) {
	for _, name := range models(t) {
		content, err := os.ReadFile(name)
		require.NoError(t, err)
		path, err := filepath.Abs(name)
		require.NoError(t, err)
		path = filepath.ToSlash(path)
		w := library(t, map[string]string{path: string(content)})
		before := w.Snapshot().Resolve(path)
		var places []resolve.Reference
		for _, r := range before.References(path) {
			if r.Definition.File == path { // what another file declares is not open here
				places = append(places, r)
			}
		}
		rapid.Check(t, func(t *rapid.T) {
			r := rapid.SampledFrom(places).Draw(t, "place")
			fresh := rapid.StringMatching(`zz[a-z0-9_]{1,12}`).Draw(t, "name")
			offset := rapid.IntRange(r.Span.Start, r.Span.End).Draw(t, "offset")
			if found, ok := before.ReferenceAt(path, offset); !ok || found.Definition != r.Definition {
				return // where two names meet the other one counts
			}
			span, old, err := PrepareRename(w.Snapshot(), path, offset)
			require.NoError(t, err)
			edits, err := Rename(w.Snapshot(), path, offset, fresh)
			require.NoError(t, err)
			apply(t, w, edits)
			now := w.Snapshot().Resolve(path)
			same, what := sameStructure(before.Model, now.Model)
			assert.True(t, same, what)
			assert.Equal(t, names(before.Diagnostics), names(now.Diagnostics))
			assert.NotEqual(t, string(content), textOf(t, w, path))

			moved := now.ReferencesTo(movedDefinition(now, fresh))
			require.NotEmpty(t, moved)
			back, err := Rename(w.Snapshot(), path, moved[0].Span.End, old)
			require.NoError(t, err)
			apply(t, w, back)
			assert.Equal(t, string(content), textOf(t, w, path), "%s of %v", old, span)
		})
	}
}

// movedDefinition is the thing that has a name now.
func movedDefinition(r *resolve.Result, name string) *resolve.Definition {
	i := slices.IndexFunc(r.Definitions(), func(d *resolve.Definition) bool { return lastPart(d.Name) == name })
	if i < 0 {
		return nil
	}
	return r.Definitions()[i]
}
