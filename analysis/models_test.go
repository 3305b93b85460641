package analysis_test

import (
	"context"
	"path/filepath"
	"strings"
	"testing"

	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis"
	"spanwright/analysis/combine"
	"spanwright/lang/diagnostic"
)

// TestMarlReachModels holds the demo models to what every sound model shows: it
// is solved without a word of doubt, equilibrium closes, every limit is
// answered, combinations can be found by their spelling, and the document obeys
// its schema.
func TestMarlReachModels(t *testing.T) {
	paths, err := filepath.Glob("../testdata/models/*.span")
	require.NoError(t, err)
	require.NotEmpty(t, paths)
	ctx := context.Background()
	for _, path := range paths {
		t.Run(strings.TrimSuffix(filepath.Base(path), ".span"), func(t *testing.T) {
			m := resolveFile(t, path)
			r, err := analysis.Run(ctx, m, nil)
			require.NoError(t, err)
			require.True(t, r.Solved(), "%v", r.Diagnostics())
			for _, d := range r.Diagnostics() {
				assert.NotContains(t, []diagnostic.Severity{diagnostic.Error, diagnostic.Warning}, d.Severity, d.Summary)
			}
			for i := range r.Len() {
				assert.Empty(t, r.At(i).Problem())
				assert.Less(t, r.At(i).Equilibrium().Residual, 1e-9)
				found, ok := r.Find(combine.Spelling(r.At(i).Name()))
				require.True(t, ok, r.At(i).Name())
				assert.Equal(t, i, found.Index())
			}
			limits, err := r.Limits(ctx)
			require.NoError(t, err)
			for _, l := range limits {
				assert.Empty(t, l.Problem)
				if testing.Verbose() {
					t.Log(r.Words(l))
				}
			}
			var text strings.Builder
			require.NoError(t, r.WriteJSON(ctx, &text, analysis.DocumentOptions{Stations: 3}))
			t.Logf("%d combinations, %d members, %d kB, %+v, %+v", len(r.Combinations().All), len(m.Members), text.Len()/1000, r.Timings(), r.Trust())
			validate(t, text.String())
		})
	}
}

func validate(t *testing.T, text string) {
	t.Helper()
	schema, err := jsonschema.UnmarshalJSON(strings.NewReader(string(analysis.Schema)))
	require.NoError(t, err)
	compiler := jsonschema.NewCompiler()
	require.NoError(t, compiler.AddResource("results.json", schema))
	compiled, err := compiler.Compile("results.json")
	require.NoError(t, err)
	document, err := jsonschema.UnmarshalJSON(strings.NewReader(text))
	require.NoError(t, err)
	require.NoError(t, compiled.Validate(document))
}
