package analysis_test

import (
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/require"

	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// folderLoader reads the files that a model uses from disk.
type folderLoader struct{}

func (folderLoader) Load(path string) (*syntax.Tree, error) {
	text, err := os.ReadFile(filepath.FromSlash(path))
	if err != nil {
		return nil, err
	}
	return syntax.Parse(source.New(path, string(text))), nil
}

// resolveFile reads a model file and resolves it. Errors in it fail the test;
// warnings do not.
func resolveFile(t *testing.T, path string) *model.Model {
	t.Helper()
	tree, err := folderLoader{}.Load(filepath.ToSlash(path))
	require.NoError(t, err)
	resolved := resolve.Model(tree, folderLoader{})
	for _, d := range resolved.Diagnostics {
		require.NotEqual(t, diagnostic.Error, d.Severity, "%s: %s", path, d.Summary)
	}
	require.NotNil(t, resolved.Model, path)
	return resolved.Model
}
