package editors

import (
	"os"
	"regexp"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
)

// TestWordLists holds the word lists of every syntax file against the language.
func TestWordLists(t *testing.T) {
	words := syntax.Joining()
	for _, k := range syntax.Keywords() {
		words = append(words, k.Word)
	}
	for _, u := range quantity.Units() {
		words = append(words, u.Symbol)
	}
	for _, f := range resolve.Functions() {
		words = append(words, f.Name)
	}
	for k := model.Permanent; k <= model.Earthquake; k++ {
		words = append(words, k.String())
	}
	require.Greater(t, len(words), 100)
	for _, file := range []string{"vscode/syntaxes/span.tmLanguage.json", "vim/syntax/span.vim", "emacs/span-mode.el", "kate/span.xml"} {
		text, err := os.ReadFile(file)
		require.NoError(t, err)
		for _, w := range words {
			// A backslash before a letter is an escape of the pattern: \bpi.
			whole := regexp.MustCompile(`(?:^|[^\pL\pN_\\]|\\[bnt])` + regexp.QuoteMeta(w) + `(?:$|[^\pL\pN_])`)
			assert.Regexp(t, whole, string(text), "%s does not know %q", file, w)
		}
	}
}
