package resolve

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/generate"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// sameAsIndex compares what is answered without the index of names with what the
// index says, at every place of every file.
func sameAsIndex(t require.TestingT, r *Result) {
	for _, tree := range r.Trees {
		path, text := tree.File.Path, tree.File.Text
		times := map[source.Span]int{} // in a broken text a word may have been looked up as two things
		for _, ref := range r.References(path) {
			times[ref.Span]++
		}
		for offset := 0; offset <= len(text); offset++ {
			want, found := r.ReferenceAt(path, offset)
			got, ok := r.NameAt(path, offset)
			require.Equal(t, found, ok, "at %d of\n%s", offset, text)
			if !ok {
				continue
			}
			require.Equal(t, want.Span, got.Span, "at %d of\n%s", offset, text)
			if times[want.Span] > 1 {
				continue
			}
			require.Equal(t, want.Declaration, got.Declaration, "at %d of\n%s", offset, text)
			definition, made := *want.Definition, *got.Definition
			definition.Uses, made.Uses = 0, 0
			require.Equal(t, definition, made, "at %d of\n%s", offset, text)
		}
		named := map[source.Span]Named{}
		for _, n := range r.NamesIn(path, source.Span{Start: 0, End: len(text)}) {
			named[n.Span] = n
		}
		for _, ref := range r.References(path) {
			if times[ref.Span] > 1 {
				continue
			}
			require.Equal(t, Named{ref.Span, ref.Definition.Kind, ref.Declaration}, named[ref.Span], "%s", text)
		}
	}
}

func TestNamesWithoutTheIndexOfModels(t *testing.T) {
	files, err := filepath.Glob("../../testdata/models/*.span")
	require.NoError(t, err)
	for _, name := range files {
		if strings.Contains(name, "lookout") && testing.Short() {
			continue
		}
		text, err := os.ReadFile(name)
		require.NoError(t, err)
		sameAsIndex(t, Model(syntax.Parse(source.New(name, string(text))), disk{}))
	}
}

func TestNamesWithoutTheIndex(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lines := append([]string{"model \"T\" plane", "material steel = S275"}, rapid.SliceOfN(lineDraw(), 0, 25).Draw(t, "lines")...)
		loader := &shelf{texts: map[string]string{"lib.span": strings.Join(librarySample[:2], "\n")}, trees: map[string]*syntax.Tree{}}
		sameAsIndex(t, Model(syntax.Parse(source.New("main.span", strings.Join(lines, "\n"))), loader))
	})
}

func TestNamesOfAPartOfAFile(t *testing.T) {
	text := "node A = (0, 0) m\nnode B = A + (1, 0) m\nnode C = B + (1, 0) m\n"
	r := Model(syntax.Parse(source.New("m.span", "model \"M\" plane\n"+text)), nil)
	at := len("model \"M\" plane\nnode A = (0, 0) m\n")
	named := r.NamesIn("m.span", source.Span{Start: at, End: at + 4})
	require.Len(t, named, 2)
	assert.Equal(t, NodeName, named[1].Kind)
	assert.True(t, named[0].Declaration)
	assert.Nil(t, r.NamesIn("other.span", source.Span{}))
	_, ok := r.NameAt("other.span", 0)
	assert.False(t, ok)
}

// BenchmarkNameAt measures the first question about a version of 10,000 members.
func BenchmarkNameAt(b *testing.B) {
	text := generate.TenThousand.Text()
	tree := syntax.Parse(source.New("m.span", text))
	session := NewSession()
	r := session.Update(tree, nil)
	at := strings.Index(text, "n1_1_1 =") + 2
	screen := source.Span{Start: at, End: at + 3000}
	b.Run("name", func(b *testing.B) {
		for b.Loop() {
			if _, ok := r.NameAt("m.span", at); !ok {
				b.Fatal("no name")
			}
		}
	})
	b.Run("screen", func(b *testing.B) {
		for b.Loop() {
			r.NamesIn("m.span", screen)
		}
	})
	b.Run("index", func(b *testing.B) {
		for b.Loop() {
			fresh := &Result{Trees: r.Trees, entries: r.entries}
			fresh.ReferenceAt("m.span", at)
		}
	})
}
