package main

import (
	"bytes"
	"flag"
	"os"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
)

var update = flag.Bool("update", false, "write the golden files anew")

// TestSlips holds what check says of models with one typical slip each to the
// text beside them, which a person can read aloud.
func TestSlips(t *testing.T) {
	t.Chdir("../../testdata/diagnostics/slips")
	paths, err := filepath.Glob("*.span")
	require.NoError(t, err)
	require.GreaterOrEqual(t, len(paths), 20)
	for _, path := range paths {
		var out, problems bytes.Buffer
		status := run([]string{"check", path}, &terminal{in: &bytes.Buffer{}, out: &out, err: &problems})
		assert.NotEqual(t, statusMisuse, status, path)
		assert.Empty(t, problems.String(), path)
		golden := strings.TrimSuffix(path, ".span") + ".txt"
		if *update {
			require.NoError(t, os.WriteFile(golden, out.Bytes(), 0o644))
		}
		want, err := os.ReadFile(golden)
		require.NoError(t, err)
		assert.Equal(t, string(want), out.String(), path)
		assert.NotEmpty(t, out.String(), "%s: the slip goes unseen", path)
	}
}
