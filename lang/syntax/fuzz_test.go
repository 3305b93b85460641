package syntax

import (
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/source"
)

// Tokens one behind the other are the text, whatever the text.
func FuzzTokens(f *testing.F) {
	f.Add(portal)
	f.Add("\ufeff“x” \x00 \xff 1e+ 2e5 mm² 100x60x4 self-weight_ \r\n\r")
	f.Fuzz(func(t *testing.T, text string) {
		at := int32(0)
		for _, tok := range Tokens(text) {
			require.Equal(t, at, tok.Start)
			require.Greater(t, tok.End, tok.Start)
			at = tok.End
		}
		require.Equal(t, len(text), int(at))
	})
}

// Any text is read; statements are in order and apart, diagnostics lie inside
// the text, and every edit of it gives the same tree as reading anew.
func FuzzParse(f *testing.F) {
	f.Add(portal, 40, 60, "beam ")
	f.Add("case G permanent {\nself-weight\n}", 17, 18, "")
	f.Fuzz(func(t *testing.T, text string, from, to int, insert string) {
		tree := Parse(source.New("f.span", text))
		end := 0
		for i := range tree.Units {
			u := &tree.Units[i]
			require.LessOrEqual(t, end, u.Start)
			require.Less(t, u.Start, u.End)
			require.Equal(t, text[u.Start:u.End], u.Statement.Text)
			end = u.End
		}
		for _, d := range tree.Diagnostics() {
			require.GreaterOrEqual(t, d.Subject.Start, 0)
			require.LessOrEqual(t, d.Subject.End, len(text), "%s", d.Name)
		}
		from, to = max(0, min(from, len(text))), max(0, min(to, len(text)))
		if from > to {
			from, to = to, from
		}
		edited := source.New("f.span", text[:from]+insert+text[to:])
		requireSame(t, Parse(edited), tree.Reparse(edited))
	})
}

func requireSame(t require.TestingT, want, got *Tree) {
	require.Equal(t, len(want.Units), len(got.Units))
	for i := range want.Units {
		w, g := want.Units[i], got.Units[i]
		require.Equal(t, w.Statement, g.Statement)
		w.Statement, g.Statement = nil, nil
		require.Equal(t, w, g)
	}
	require.Equal(t, want.end, got.end)
	require.Equal(t, want.Diagnostics(), got.Diagnostics())
}

// A session of random edits leaves the tree that reading anew gives, and what
// the edits did not touch keeps its statements.
func TestReparseEqualsParse(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := portal
		tree := Parse(source.New("p.span", text))
		for range rapid.IntRange(1, 8).Draw(t, "edits") {
			from := rapid.IntRange(0, len(text)).Draw(t, "from")
			to := min(len(text), from+rapid.IntRange(0, 40).Draw(t, "length"))
			insert := rapid.SampledFrom([]string{"", "\n", "}", "{", "(", ",", "node Q = (1, 2) m\n", "case X wind {\n", " # c\n", "\"", "beam", "-"}).Draw(t, "insert")
			text = text[:from] + insert + text[to:]
			file := source.New("p.span", text)
			tree = tree.Reparse(file)
			requireSame(t, Parse(file), tree)
		}
	})
}

func TestAnEditKeepsTheOtherStatements(t *testing.T) {
	before := Parse(source.New("p.span", portal))
	after := before.Reparse(source.New("p.span", "# one line more\n"+portal[:600]+portal[600:]))
	for i := range before.Units {
		if i > 2 {
			require.Same(t, before.Units[i].Statement, after.Units[i].Statement)
		}
	}
}
