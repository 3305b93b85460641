package sparse

import (
	"context"
	"math"
)

// Condition estimates the condition of the scaled matrix in the 1-norm, from
// below and rarely by more than a factor of three: Higham, Accuracy and
// Stability of Numerical Algorithms, 2nd ed., algorithm 15.1 (Hager's method).
func (f *Factor) Condition(ctx context.Context, m *Matrix) (float64, error) {
	n := f.symbolic.n
	if n == 0 {
		return 1, nil
	}
	x := make([]float64, n)
	for i := range x {
		x[i] = 1 / float64(n)
	}
	estimate, last := 0.0, -1
	for range 5 {
		y, err := f.inverse(ctx, x)
		if err != nil {
			return 0, err
		}
		norm := 0.0
		for i, v := range y {
			norm += math.Abs(v)
			x[i] = math.Copysign(1, v)
		}
		if norm <= estimate {
			break
		}
		estimate = norm
		z, err := f.inverse(ctx, x)
		if err != nil {
			return 0, err
		}
		largest, at := 0.0, 0
		for i, v := range z {
			if math.Abs(v) > largest {
				largest, at = math.Abs(v), i
			}
		}
		if at == last {
			break
		}
		last = at
		clear(x)
		x[at] = 1
	}
	return estimate * f.norm(m), nil
}

// inverse returns the solution of the scaled system.
func (f *Factor) inverse(ctx context.Context, x []float64) ([]float64, error) {
	y := make([]float64, len(x))
	for i := range x {
		y[i] = x[i] / f.scale[i]
	}
	if err := f.Solve(ctx, y, 1); err != nil {
		return nil, err
	}
	for i := range y {
		y[i] /= f.scale[i]
	}
	return y, nil
}

// norm returns the 1-norm of the scaled matrix.
func (f *Factor) norm(m *Matrix) float64 {
	columns := make([]float64, f.symbolic.n)
	m.each(func(row, column int, v float64) {
		size := math.Abs(v * f.scale[row] * f.scale[column])
		columns[column] += size
		if row != column {
			columns[row] += size
		}
	})
	largest := 0.0
	for _, c := range columns {
		largest = max(largest, c)
	}
	return largest
}
