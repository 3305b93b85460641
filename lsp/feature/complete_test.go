package feature

import (
	"context"
	"fmt"
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/generate"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/workspace"
)

// completionModel has something of everything; lines under test stand behind it.
const completionModel = `model "Completion" plane
let span = 6 m
material steel = S275
section rafter = IPE 300 of steel
node A = (0, 0) m
node B = (span, 0) m
beam r1 = A -> B of rafter
beam r2 = B -> A of rafter
group roof = r1, r2
support A fixed
case G permanent {
    self-weight
}
case S snow {
    r1: 3 kN/m down
}
family ULS by EN1990 strength
`

// completed returns what is offered at the bar of the last lines of a model.
func completed(t testing.TB, text string, options CompleteOptions) (Completion, *workspace.Snapshot) {
	t.Helper()
	at := strings.Index(text, "|")
	require.GreaterOrEqual(t, at, 0)
	w := workspace.New(workspace.DefaultOptions(), workspace.Events{})
	t.Cleanup(w.Close)
	w.Open("/m.span", 1, text[:at]+text[at+1:])
	return Complete(w.Snapshot(), "/m.span", at, options), w.Snapshot()
}

// TestCompleteEverywhere reads testdata/complete.txt: a line with the place as a
// bar, then what is offered there, and is written anew with -update.
func TestCompleteEverywhere(t *testing.T) {
	golden := filepath.Join("testdata", "complete.txt")
	text, err := os.ReadFile(golden)
	require.NoError(t, err)
	var out strings.Builder
	for _, paragraph := range strings.Split(strings.TrimSpace(string(text)), "\n\n") {
		line, _, _ := strings.Cut(paragraph, "\n")
		written := strings.ReplaceAll(line, "⏎", "\n")
		c, _ := completed(t, completionModel+written+"\n", CompleteOptions{})
		fmt.Fprintln(&out, line)
		var labels []string
		for i, p := range c.Proposals {
			if i == 40 {
				labels = append(labels, fmt.Sprintf("… %d in all", len(c.Proposals)))
				break
			}
			labels = append(labels, p.Label)
		}
		more := ""
		if c.Incomplete {
			more = " (incomplete)"
		}
		fmt.Fprintf(&out, "    %s%s\n\n", strings.Join(labels, ", "), more)
	}
	got := strings.TrimSpace(out.String()) + "\n"
	if *update {
		require.NoError(t, os.WriteFile(golden, []byte(got), 0o644))
	}
	assert.Equal(t, string(text), got)
}

// TestEveryProposalIsDescribed asks for the documentation of what is offered.
func TestEveryProposalIsDescribed(t *testing.T) {
	for _, line := range []string{"|", "beam x = |", "section s = IPE |", "material m = |", "let a = 3 |", "let a = |", "support |", "support B |"} {
		c, s := completed(t, completionModel+line, CompleteOptions{})
		require.NotEmpty(t, c.Proposals, line)
		for _, p := range c.Proposals {
			if p.Key != "" {
				assert.NotEmpty(t, Describe(context.Background(), s, "/m.span", p.Key), "%s: %s", line, p.Key)
			}
		}
	}
}

// TestSnippetsAreStatements fills every snippet's places with what they suggest,
// and wants a statement that can be read.
func TestSnippetsAreStatements(t *testing.T) {
	c, _ := completed(t, completionModel+"|", CompleteOptions{Snippets: true})
	snippets := 0
	for _, p := range c.Proposals {
		if p.Snippet {
			snippets++
			assert.Empty(t, brokenLines(filled(p.Insert)), p.Insert)
		}
	}
	assert.Equal(t, 21, snippets)
}

// BenchmarkComplete measures one completion in a model of ten thousand members.
func BenchmarkComplete(b *testing.B) {
	text := generate.TenThousand.Text() + "beam new = n0_0_0 -> "
	w := workspace.New(workspace.DefaultOptions(), workspace.Events{})
	defer w.Close()
	w.Open("/m.span", 1, text)
	s := w.Snapshot()
	s.View("/m.span")
	for b.Loop() {
		Complete(s, "/m.span", len(text), CompleteOptions{})
	}
}

// filled is a snippet with its places filled with their suggestions.
func filled(snippet string) string {
	choice := regexp.MustCompile(`\$\{\d+\|([^,|]*)[^}]*\}`)
	place := regexp.MustCompile(`\$\{\d+:([^}]*)\}`)
	text := place.ReplaceAllString(choice.ReplaceAllString(snippet, "$1"), "$1")
	return strings.ReplaceAll(text, "$0", "")
}

// brokenLines are the statements of a text that cannot be read.
func brokenLines(text string) []string {
	var broken []string
	for _, u := range syntax.Parse(source.New("t", text)).Units {
		if u.Statement.Broken() {
			broken = append(broken, u.Statement.Text+": "+u.Statement.Problems[0].Summary)
		}
	}
	return broken
}
