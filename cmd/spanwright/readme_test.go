package main

import (
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

// TestReadmeQuotesTheRecipes holds the recipes of the README to those that the
// scripts of testdata/script play.
func TestReadmeQuotesTheRecipes(t *testing.T) {
	readme, err := os.ReadFile("../../README.md")
	require.NoError(t, err)
	recipes, err := filepath.Glob("../../testdata/review/*")
	require.NoError(t, err)
	require.Len(t, recipes, 3)
	for _, path := range recipes {
		text, err := os.ReadFile(path)
		require.NoError(t, err)
		quoted := "    " + strings.ReplaceAll(strings.TrimSpace(string(text)), "\n", "\n    ")
		assert.Contains(t, string(readme), quoted, path)
	}
}
