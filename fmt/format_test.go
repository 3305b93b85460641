package format

import (
	"flag"
	goformat "go/format"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

var update = flag.Bool("update", false, "write the golden files anew")

const folder = "../testdata/format"

// Every NAME.span is laid out badly; NAME.golden is what the formatter makes of it.
func TestGoldenFiles(t *testing.T) {
	files, err := filepath.Glob(filepath.Join(folder, "*.span"))
	require.NoError(t, err)
	require.NotEmpty(t, files)
	for _, path := range files {
		in, err := os.ReadFile(path)
		require.NoError(t, err)
		got := File(source.New(path, string(in)))
		golden := strings.TrimSuffix(path, ".span") + ".golden"
		if *update {
			require.NoError(t, os.WriteFile(golden, []byte(got), 0o644))
		}
		want, err := os.ReadFile(golden)
		require.NoError(t, err)
		assert.Equal(t, string(want), got, path)
		assert.Equal(t, got, File(source.New(path, got)), "%s: formatting again changes it", path)
	}
}

func TestTheCanonicalFileIsCanonical(t *testing.T) {
	text, err := os.ReadFile(filepath.Join(folder, "canonical.golden"))
	require.NoError(t, err)
	assert.Empty(t, Edits(syntax.Parse(source.New("canonical.span", string(text)))))
}

// meaning is the tokens of a text in normal spelling, blanks and line ends
// aside: what formatting must not change.
func meaning(text string) []string {
	var words []string
	var l layout
	tree := syntax.Parse(source.New("t", text))
	for _, u := range tree.Units {
		if u.Statement.Broken() {
			words = append(words, u.Statement.Text)
			continue
		}
		tokens := syntax.Tokens(u.Statement.Text)
		for _, p := range l.normal(statement{u.Statement, tokens, syntax.PatternOf(u.Statement, tokens).Unary}) {
			words = append(words, p.text)
		}
	}
	return words
}

// remarks are the comments of a text, in order.
func remarks(text string) string {
	var all []string
	for _, t := range syntax.Tokens(text) {
		if t.Kind == syntax.Comment {
			all = append(all, trim(t.In(text)))
		}
	}
	return strings.Join(all, "\n")
}

func check(t require.TestingT, text string) {
	once := File(source.New("t", text))
	require.Equal(t, once, File(source.New("t", once)), "not idempotent for %q", text)
	require.Equal(t, once, Tree(syntax.Parse(source.New("t", text))), "patterns differ in %q", text)
	require.Equal(t, meaning(text), meaning(once), "meaning changed of %q", text)
	require.Equal(t, strings.ReplaceAll(remarks(text), "\n", " "), strings.ReplaceAll(remarks(once), "\n", " "), "comments lost of %q", text)
	tree := syntax.Parse(source.New("t", text))
	applied, err := source.Apply(text, Edits(tree))
	require.NoError(t, err)
	require.Equal(t, once, applied)
}

func corpus(t testing.TB) []string {
	var texts []string
	for _, pattern := range []string{folder + "/*.span", "../testdata/models/*.span", "../testdata/verification/*.span"} {
		files, err := filepath.Glob(pattern)
		require.NoError(t, err)
		for _, f := range files {
			text, err := os.ReadFile(f)
			require.NoError(t, err)
			texts = append(texts, string(text))
		}
	}
	return texts
}

func TestTheCorpusKeepsItsMeaning(t *testing.T) {
	for _, text := range corpus(t) {
		check(t, text)
	}
}

// Whatever happens to the blanks, the formatter brings the same text back.
func TestMangledBlanksComeBack(t *testing.T) {
	texts := corpus(t)
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.SampledFrom(texts).Draw(t, "text")
		want := File(source.New("t", text))
		if strings.Contains(want, "format off") || len(syntax.Parse(source.New("t", want)).Diagnostics()) > 0 {
			return
		}
		var mangled strings.Builder
		for _, tok := range syntax.Tokens(want) {
			if tok.Kind == syntax.Blank {
				mangled.WriteString(rapid.SampledFrom([]string{" ", "  ", "\t", "       "}).Draw(t, "blank"))
				continue
			}
			mangled.WriteString(tok.In(want))
		}
		require.Equal(t, want, File(source.New("t", mangled.String())))
	})
}

func TestCRLFStays(t *testing.T) {
	got := File(source.New("t", "let a=1 m\r\nlet b=2 m\r\n"))
	assert.Equal(t, "let a   = 1 m\r\nlet b   = 2 m\r\n", got)
}

func TestBrokenStatementsStayAndTheRestIsFormatted(t *testing.T) {
	got := File(source.New("t", "let a=1 m\nlet   b == 2   # odd\nlet c=3 m\n"))
	assert.Equal(t, "let a = 1 m\nlet   b == 2   # odd\nlet c = 3 m\n", got)
}

func TestRangeIsAPartOfTheWhole(t *testing.T) {
	text := "let a=1 m\n\nlet b=2 m\n\nlet c=3 m\n"
	tree := syntax.Parse(source.New("t", text))
	got, err := source.Apply(text, RangeEdits(tree, source.Span{Start: 11, End: 15}))
	require.NoError(t, err)
	assert.Equal(t, "let a=1 m\n\nlet b = 2 m\n\nlet c=3 m\n", got)
}

// Of one-line edits to formatted models, at least nine in ten leave every other
// line as it was.
func TestMostEditsChangeTheirOwnLineOnly(t *testing.T) {
	texts := corpus(t)
	edits, alone := 0, 0
	for _, text := range texts {
		before := File(source.New("t", text))
		tree := syntax.Parse(source.New("t", before))
		for i := range tree.Units {
			u := &tree.Units[i]
			name := u.Statement.Declares()
			if name == nil || u.Statement.Broken() {
				continue
			}
			at := u.Start + name.Span().End
			after := File(source.New("t", before[:at]+"7"+before[at:]))
			edits++
			changed := 0
			a, b := strings.Split(before, "\n"), strings.Split(after, "\n")
			for l := range a {
				if l >= len(b) || a[l] != b[l] {
					changed++
				}
			}
			if changed <= 1 {
				alone++
			}
		}
	}
	share := float64(alone) / float64(edits)
	t.Logf("%d of %d edits changed one line (%.1f %%)", alone, edits, 100*share)
	assert.GreaterOrEqual(t, share, 0.9)
}

func FuzzFile(f *testing.F) {
	for _, text := range corpus(f) {
		f.Add(text)
	}
	f.Add("case G permanent { self-weight }")
	f.Add("let a = (1 m, # one\n 2 m) # two\n")
	f.Fuzz(func(t *testing.T, text string) { check(t, text) })
}

// BenchmarkAgainstGo measures the formatter beside go/format on as many bytes
// of Go and reports the ratio of the times per byte.
func BenchmarkAgainstGo(b *testing.B) {
	model := strings.Join(corpus(b), "\n")
	program, err := os.ReadFile("spacing.go")
	require.NoError(b, err)
	times := map[string]float64{}
	b.Run("span", func(b *testing.B) {
		b.SetBytes(int64(len(model)))
		for b.Loop() {
			File(source.New("t", model))
		}
		times["span"] = float64(b.Elapsed().Nanoseconds()) / float64(b.N) / float64(len(model))
	})
	b.Run("go", func(b *testing.B) {
		b.SetBytes(int64(len(program)))
		for b.Loop() {
			if _, err := goformat.Source(program); err != nil {
				b.Fatal(err)
			}
		}
		times["go"] = float64(b.Elapsed().Nanoseconds()) / float64(b.N) / float64(len(program))
		if times["span"] > 0 {
			b.ReportMetric(times["span"]/times["go"], "span/go")
		}
	})
}
