package frame_test

import (
	"context"
	"errors"
	"os"
	"path/filepath"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis/frame"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// disk loads used files.
type disk struct{}

func (disk) Load(path string) (*syntax.Tree, error) {
	text, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	return syntax.Parse(source.New(path, string(text))), nil
}

// read resolves a model, which must be free of errors.
func read(t testing.TB, path string) *model.Model {
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	return resolved(t, path, string(text))
}

func resolved(t testing.TB, path, text string) *model.Model {
	r := resolve.Model(syntax.Parse(source.New(path, text)), disk{})
	for _, d := range r.Diagnostics {
		require.NotEqual(t, diagnostic.Error, d.Severity, "%s: %s [%s]", path, d.Summary, d.Name)
	}
	return r.Model
}

func files(t testing.TB, pattern string) []string {
	list, err := filepath.Glob(pattern)
	require.NoError(t, err)
	require.NotEmpty(t, list)
	return list
}

// All shipped models are solved, in equilibrium, case by case.
func TestShippedModelsAreInEquilibrium(t *testing.T) {
	for _, path := range files(t, "../../testdata/models/*.span") {
		solver, err := frame.Prepare(context.Background(), read(t, path), nil)
		if !assert.NoError(t, err, path) {
			continue
		}
		states, errs, err := solver.Cases(context.Background())
		require.NoError(t, err)
		for i, s := range states {
			if assert.NoError(t, errs[i], path) {
				assert.Less(t, s.Residual(), 1e-11, "%s case %d", path, i)
				assert.Less(t, s.BackwardError(), 1e-12, "%s case %d", path, i)
			}
		}
	}
}

// moves returns the freedoms named in the "# moves:" line of a model.
func moves(text string) []string {
	for _, line := range strings.Split(text, "\n") {
		if rest, ok := strings.CutPrefix(line, "# moves:"); ok {
			var list []string
			for _, item := range strings.Split(rest, ",") {
				list = append(list, strings.TrimSpace(item))
			}
			return list
		}
	}
	return nil
}

func TestUnstableModelsAreRefusedWithTheNodesNamed(t *testing.T) {
	names := [6]string{"ux", "uy", "uz", "rx", "ry", "rz"}
	for _, path := range files(t, "../../testdata/mechanisms/unstable/*.span") {
		t.Run(filepath.Base(path), func(t *testing.T) {
			m := read(t, path)
			err := solveAll(m)
			var mechanism *frame.MechanismError
			if !errors.As(err, &mechanism) {
				t.Fatalf("not refused: %v", err)
			}
			var got []string
			for _, f := range mechanism.Moves {
				got = append(got, m.Nodes[f.Node].Name+" "+names[f.Freedom])
			}
			for _, want := range moves(m.Files[0].Text) {
				assert.True(t, slices.Contains(got, want), "%s should move; %v do. %v", want, got, err)
			}
			assert.NotEmpty(t, mechanism.Remedy)
			t.Log(err)
		})
	}
}

// solveAll solves cases and, where parts act one way, written combinations.
func solveAll(m *model.Model) error {
	ctx := context.Background()
	solver, err := frame.Prepare(ctx, m, nil)
	if err != nil {
		return err
	}
	_, errs, err := solver.Cases(ctx)
	if err != nil {
		return err
	}
	for _, err := range errs {
		if err != nil {
			return err
		}
	}
	if solver.OneWay() {
		for _, c := range m.Combinations {
			if _, err := solver.Combination(ctx, c.Factors); err != nil {
				return err
			}
		}
	}
	return nil
}

func TestSoftModelsAreSolved(t *testing.T) {
	for _, path := range files(t, "../../testdata/mechanisms/soft/*.span") {
		t.Run(filepath.Base(path), func(t *testing.T) {
			assert.NoError(t, solveAll(read(t, path)))
		})
	}
}
