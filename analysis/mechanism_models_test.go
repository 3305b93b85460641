package analysis_test

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

const mechanisms = "../testdata/mechanisms"

// TestUnstableModelsAreRefused holds the models that move without resistance
// against the nodes that their "moves" comment names: no number comes out, and
// the words that do name those nodes.
func TestUnstableModelsAreRefused(t *testing.T) {
	paths, err := filepath.Glob(filepath.Join(mechanisms, "unstable", "*.span"))
	require.NoError(t, err)
	require.GreaterOrEqual(t, len(paths), 40)
	for _, path := range paths {
		t.Run(strings.TrimSuffix(filepath.Base(path), ".span"), func(t *testing.T) {
			words := refusal(t, path)
			for _, move := range expectedMoves(t, path) {
				node, _, _ := strings.Cut(move, " ")
				assert.Regexp(t, regexp.MustCompile(`\b`+node+`\b`), words)
			}
		})
	}
}

// refusal returns the words in which a model is refused, as a whole or in its
// only load case.
func refusal(t *testing.T, path string) string {
	t.Helper()
	m := solveFile(t, path)
	var words []string
	for _, d := range m.problems {
		words = append(words, d.Summary, d.Detail)
	}
	if m.results.Solved() {
		problem := m.results.Case(0).Problem()
		require.NotEmpty(t, problem, "%s has numbers", path)
		words = append(words, problem)
	}
	return strings.Join(words, "\n")
}

// expectedMoves reads the comment "# moves: B ux, C ux" of a model.
func expectedMoves(t *testing.T, path string) []string {
	t.Helper()
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	for line := range strings.Lines(string(text)) {
		if moves, ok := strings.CutPrefix(line, "# moves: "); ok {
			return strings.Split(strings.TrimSpace(moves), ", ")
		}
	}
	require.Fail(t, "no line # moves:", path)
	return nil
}

// TestSoftModelsAreSolved holds very soft but sound models against two laws that
// any answer obeys: forces and reactions are in balance, and something moves.
func TestSoftModelsAreSolved(t *testing.T) {
	paths, err := filepath.Glob(filepath.Join(mechanisms, "soft", "*.span"))
	require.NoError(t, err)
	require.Len(t, paths, 20)
	for _, path := range paths {
		t.Run(strings.TrimSuffix(filepath.Base(path), ".span"), func(t *testing.T) {
			m := solveFile(t, path)
			require.True(t, m.results.Solved(), "%v", m.problems)
			result := m.results.Case(0)
			require.Empty(t, result.Problem())
			assert.Less(t, result.Equilibrium().Residual, 1e-9)
			moved := false
			for node := range m.model.Nodes {
				moved = moved || result.Movement(node) != [6]float64{}
			}
			assert.True(t, moved)
		})
	}
}
