package resolve

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// disk loads used files from disk.
type disk struct{}

func (disk) Load(p string) (*syntax.Tree, error) {
	b, err := os.ReadFile(p)
	if err != nil {
		return nil, err
	}
	return syntax.Parse(source.New(p, string(b))), nil
}

func texts(t testing.TB, patterns ...string) map[string]string {
	all := map[string]string{}
	for _, pattern := range patterns {
		files, err := filepath.Glob(pattern)
		require.NoError(t, err)
		require.NotEmpty(t, files, pattern)
		for _, f := range files {
			b, err := os.ReadFile(f)
			require.NoError(t, err)
			all[f] = string(b)
		}
	}
	return all
}

// TestSoundModelsHaveNoErrors resolves every model that the analysis is checked
// with, and the demo models, which must not even be warned of.
func TestSoundModelsHaveNoErrors(t *testing.T) {
	for path, text := range texts(t, "../../testdata/models/*.span", "../../testdata/verification/*.span", "../../testdata/mechanisms/*/*.span") {
		for _, d := range Model(syntax.Parse(source.New(path, text)), disk{}).Diagnostics {
			assert.NotEqual(t, diagnostic.Error, d.Severity, "%s: %s", path, d.Summary)
			if filepath.Base(filepath.Dir(path)) == "models" {
				assert.Greater(t, d.Severity, diagnostic.Warning, "%s: %s", path, d.Summary)
			}
		}
	}
}

// TestEveryPrefix resolves demo models cut off at every byte, one after the
// other in one session, as if they were being typed.
func TestEveryPrefix(t *testing.T) {
	step := 1
	if testing.Short() {
		step = 17
	}
	for path, text := range texts(t, "../../testdata/models/boathouse.span", "../../testdata/models/clubroom.span") {
		session := NewSession()
		tree := syntax.Parse(source.New(path, ""))
		for end := 0; end <= len(text); end += step {
			tree = tree.Reparse(source.New(path, text[:end]))
			session.Update(tree, disk{})
		}
	}
}

// FuzzResolve replaces a piece of a text and checks that the session ends where
// a fresh start does.
func FuzzResolve(f *testing.F) {
	for _, text := range texts(f, "../../testdata/models/*.span", "../../testdata/diagnostics/slips/*.span") {
		f.Add(text, len(text)/2, 5, "node Q = (1, 2) m\n")
	}
	f.Fuzz(func(t *testing.T, text string, at, length int, piece string) {
		if len(text) > 20_000 {
			return
		}
		at = min(max(at, 0), len(text))
		end := min(max(at, at+length%100), len(text))
		session := NewSession()
		tree := syntax.Parse(source.New("dir/main.span", text))
		session.Update(tree, nothing{})
		tree = tree.Reparse(source.New("dir/main.span", text[:at]+piece+text[end:]))
		got := session.Update(tree, nothing{})
		want := Model(syntax.Parse(tree.File), nothing{})
		require.Equal(t, want.Diagnostics, got.Diagnostics)
		require.Equal(t, want.Complete, got.Complete)
	})
}
