package resolve

import (
	"os"
	"path/filepath"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// base is the model around the examples of the register that are not whole
// models themselves.
const base = `model "Base" plane
material steel = S235
section plank = rect 100 x 200 mm of steel
node A = (0, 0) m
node B = (4, 0) m
beam r = A -> B of plank
support A fixed
case G permanent {
    self-weight
}
`

// grave are the errors and warnings in a text.
func grave(text string) (names []diagnostic.Name, all []diagnostic.Name) {
	if !strings.Contains(text, "model ") && !strings.HasPrefix(text, "node A = (0, 0) m\n") {
		text = base + text + "\n"
	} else if strings.HasPrefix(text, "model \"Another\"") {
		text = base + text + "\n"
	}
	r := Model(syntax.Parse(source.New("/example.span", text)), nothing{})
	for _, d := range r.Diagnostics {
		all = append(all, d.Name)
		if d.Severity <= diagnostic.Warning {
			names = append(names, d.Name)
		}
	}
	return names, all
}

// nothing has no files.
type nothing struct{}

func (nothing) Load(string) (*syntax.Tree, error) { return nil, os.ErrNotExist }

// unsolved are the names whose examples show only when the model is solved; the
// tests of analysis have them. untold have no example of a few lines.
var (
	unsolved = regexp.MustCompile(`^(mechanism|soft-structure|ill-conditioned|lost-digits|no-equilibrium|one-way-cycling|cannot-solve|too-many-combinations|unknown-rule|unknown-combination|limit-exceeded|limit-unanswered)$`)
	untold   = map[diagnostic.Name]bool{"nested-too-deep": true, "use-cycle": true, "use-of-model": true, "too-much-placed": true, "too-long": true}
)

// TestExamplesShowTheMistake reads every example and every mend of the register:
// the one has just the mistake that it is about, the other none.
func TestExamplesShowTheMistake(t *testing.T) {
	entries := diagnostic.Entries()
	require.Greater(t, len(entries), 100)
	for _, e := range entries {
		assert.NotEmpty(t, e.Title, e.Name)
		assert.NotEmpty(t, e.Explanation, e.Name)
		assert.NotEmpty(t, e.Mend, e.Name)
		if unsolved.MatchString(string(e.Name)) || untold[e.Name] {
			continue
		}
		names, all := grave(e.Example)
		if e.Severity <= diagnostic.Warning {
			assert.Equal(t, []diagnostic.Name{e.Name}, names, "the example of %s", e.Name)
		} else {
			assert.Contains(t, all, e.Name, "the example of %s", e.Name)
		}
		names, all = grave(e.Mend)
		assert.Empty(t, names, "the mend of %s", e.Name)
		assert.NotContains(t, all, e.Name, "the mend of %s", e.Name)
	}
}

// TestEveryNameIsRegistered looks for the names in the source: each one that is
// reported is explained, and each one that is explained is reported.
func TestEveryNameIsRegistered(t *testing.T) {
	reported := map[string]bool{}
	literal := regexp.MustCompile(`"([a-z]+(?:-[a-z]+)+|contradiction)"`)
	for _, folder := range []string{".", "../syntax"} {
		files, err := filepath.Glob(folder + "/*.go")
		require.NoError(t, err)
		for _, f := range files {
			if strings.HasSuffix(f, "_test.go") {
				continue
			}
			text, err := os.ReadFile(f)
			require.NoError(t, err)
			for _, m := range literal.FindAllStringSubmatch(string(text), -1) {
				reported[m[1]] = true
			}
		}
	}
	for _, word := range []string{"self-weight", "quasi-permanent", "one-source", "pound-force"} { // of the language
		delete(reported, word)
	}
	for name := range reported {
		_, ok := diagnostic.Explain(diagnostic.Name(name))
		assert.True(t, ok, "%s is reported and not explained", name)
	}
	for _, e := range diagnostic.Entries() {
		assert.True(t, reported[string(e.Name)] || unsolved.MatchString(string(e.Name)), "%s is explained and never reported", e.Name)
	}
}
