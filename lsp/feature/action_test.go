package feature

import (
	"context"
	"os"
	"path/filepath"
	"strings"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

// acted opens a text and waits until it is solved, as far as it can be.
func acted(t *testing.T, path, text string) *workspace.Snapshot {
	t.Helper()
	w := workspace.New(workspace.DefaultOptions(), workspace.Events{})
	t.Cleanup(w.Close)
	w.Open(path, 1, text)
	require.Eventually(t, func() bool {
		v, ok := w.Snapshot().View(path)
		return ok && v.State != workspace.Overtaken
	}, 20*time.Second, time.Millisecond)
	return w.Snapshot()
}

func whole(s *workspace.Snapshot, path string) source.Span {
	d, _ := s.Document(path)
	return source.Span{End: len(d.File.Text)}
}

func appliedTo(t *testing.T, s *workspace.Snapshot, path string, edits map[string][]source.Edit) string {
	t.Helper()
	d, _ := s.Document(path)
	text, err := source.Apply(d.File.Text, edits[path])
	require.NoError(t, err)
	return text
}

// TestFixesMend applies every fix on offer for the models with one slip each,
// and checks that what it mends is gone.
func TestFixesMend(t *testing.T) {
	paths, err := filepath.Glob("../../testdata/diagnostics/slips/*.span")
	require.NoError(t, err)
	require.NotEmpty(t, paths)
	fixes := 0
	for _, path := range paths {
		text, err := os.ReadFile(path)
		require.NoError(t, err)
		s := acted(t, path, string(text))
		for _, a := range Actions(s, path, whole(s, path)) {
			if !a.Fix || a.Edits == nil || a.Diagnostic == nil || !a.Preferred {
				continue
			}
			fixes++
			after := acted(t, path, appliedTo(t, s, path, a.Edits))
			count := func(s *workspace.Snapshot) (n int) {
				for _, d := range s.Diagnostics(path) {
					if d.Name == a.Diagnostic.Name {
						n++
					}
				}
				return n
			}
			assert.Less(t, count(after), count(s), "%s: %s", filepath.Base(path), a.Title)
		}
	}
	assert.GreaterOrEqual(t, fixes, 5)
}

// TestRestrain stops a mechanism with the support on offer.
func TestRestrain(t *testing.T) {
	for _, x := range []struct{ name, supports string }{
		{"roller and roller", "support A holds uz\nsupport B holds uz\n"},
		{"one hinge", "support A pinned\n"},
		{"nothing", ""},
	} {
		const path = "/m.span"
		s := acted(t, path, `model "Loose" plane
material steel = S235
section plank = rect 100 x 200 mm of steel
node A = (0, 0) m
node B = (4, 0) m
beam r = A -> B of plank
`+x.supports+`case P imposed {
    r: 10 kN/m down
}
`)
		var found bool
		for _, a := range Actions(s, path, whole(s, path)) {
			if a.Key != "restrain:" {
				continue
			}
			found = true
			assert.Equal(t, diagnostic.Mechanism, a.Diagnostic.Name)
			title, edits, err := ResolveAction(context.Background(), s, path, a.Key)
			require.NoError(t, err, x.name)
			assert.True(t, strings.HasPrefix(title, "Hold "), title)
			after := acted(t, path, appliedTo(t, s, path, edits))
			v, _ := after.View(path)
			assert.Equal(t, workspace.Current, v.State, "%s: %s", x.name, v.Words())
		}
		assert.True(t, found, x.name)
	}
}

// TestResize makes a limit of the boathouse too tight and lets the rafter be
// chosen anew; the next lighter size must not do.
func TestResize(t *testing.T) {
	const path = "../../testdata/models/boathouse.span"
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	s := acted(t, path, strings.Replace(string(text), "limit deflection of r1 <= length/250", "limit deflection of r1 <= length/1400", 1))
	limit := strings.Index(string(text), "limit deflection")
	var key string
	for _, a := range Actions(s, path, source.At(limit)) {
		if strings.HasPrefix(a.Key, "resize:") {
			key = a.Key
			assert.True(t, a.Fix)
		}
	}
	require.Equal(t, "resize:rafter", key)
	title, edits, err := ResolveAction(context.Background(), s, path, key)
	require.NoError(t, err)
	assert.Regexp(t, `^IPE 300 → IPE 3[36]0: worst limit \d+ % → \d+ %$`, title)
	after := acted(t, path, appliedTo(t, s, path, edits))
	assert.Empty(t, after.Diagnostics(path))
	v, _ := after.View(path)
	_, _, err = ResolveAction(context.Background(), after, path, key)
	assert.ErrorContains(t, err, "is the lightest", "%v", v.State)
}

func TestConversionsAreExact(t *testing.T) {
	const path = "/m.span"
	s := acted(t, path, "model \"M\" plane\nlet eaves = 4.2 m\nlet third = 0.333 ft\nlet turn = 30 deg\n")
	titles := func(mark string) []string {
		d, _ := s.Document(path)
		var list []string
		for _, a := range Actions(s, path, source.At(strings.Index(d.File.Text, mark))) {
			if !a.Fix {
				list = append(list, a.Title)
			}
		}
		return list
	}
	assert.Contains(t, titles("4.2 m"), "Write 4200 mm: the same value")
	assert.Contains(t, titles("4.2 m"), "Write 420 cm: the same value")
	assert.NotContains(t, strings.Join(titles("4.2 m"), " "), "ft")
	assert.Contains(t, titles("0.333"), "Write 3.996 in: the same value")
	assert.Empty(t, titles("30 deg"), "no angle in degrees is an exact one in radians")
}
