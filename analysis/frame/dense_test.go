package frame

import (
	"context"
	"os"
	"path/filepath"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"gonum.org/v1/gonum/mat"

	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// onDisk loads used files from disk.
type onDisk struct{}

func (onDisk) Load(path string) (*syntax.Tree, error) {
	text, err := os.ReadFile(path)
	if err != nil {
		return nil, err
	}
	return syntax.Parse(source.New(path, string(text))), nil
}

// TestDenseReference takes the assembled stiffness of models out of its sparse
// storage, finds it symmetric, and solves every load case once more by gonum's
// dense Cholesky factorisation.
func TestDenseReference(t *testing.T) {
	ctx := context.Background()
	var paths []string
	for _, pattern := range []string{"../../testdata/models/*.span", "../../testdata/verification/*.span"} {
		found, err := filepath.Glob(pattern)
		require.NoError(t, err)
		paths = append(paths, found...)
	}
	compared := 0
	for _, path := range paths {
		text, err := os.ReadFile(path)
		require.NoError(t, err)
		r := resolve.Model(syntax.Parse(source.New(path, string(text))), onDisk{})
		require.True(t, r.Complete, path)
		v, err := Prepare(ctx, r.Model, nil)
		if err != nil || v.OneWay() || v.structure.unknowns == 0 || v.structure.unknowns > 400 {
			continue
		}
		compared++
		s := v.structure
		n := s.unknowns
		K := mat.NewSymDense(n, nil)
		zero, unit, column, size := make([]float64, n), make([]float64, n), make([]float64, n), make([]float64, n)
		for j := range n {
			unit[j] = 1
			s.matrix.Residual(zero, unit, column, size)
			unit[j] = 0
			for i := range j + 1 {
				if i < j {
					K.SetSym(i, j, -column[i])
				} else {
					K.SetSym(j, j, -column[j])
				}
			}
		}
		var dense mat.Cholesky
		if !assert.True(t, dense.Factorize(K), "%s: gonum finds it not positive definite", path) {
			continue
		}
		for i := range v.loadings {
			b, x := make([]float64, n), make([]float64, n)
			s.rightSide(&v.loadings[i], b)
			copy(x, b)
			require.NoError(t, s.substitute(ctx, x, 1))
			want := mat.NewVecDense(n, nil)
			require.NoError(t, dense.SolveVecTo(want, mat.NewVecDense(n, b)))
			// In the energy norm, so that small movements beside large ones count
			// for what they are worth; as far as the condition lets both agree.
			difference := mat.NewVecDense(n, nil)
			difference.SubVec(want, mat.NewVecDense(n, x))
			energy, off := mat.Inner(want, K, want), mat.Inner(difference, K, difference)
			assert.LessOrEqual(t, off, 1e-14*energy+1e-30, "%s case %d", path, i)
		}
	}
	assert.Greater(t, compared, 60)
}
