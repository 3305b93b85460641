package model

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

func TestMemberAxesFollowTheLanguage(t *testing.T) {
	for _, c := range []struct {
		name      string
		direction [3]float64
		roll      float64
		y, z      [3]float64
	}{
		{"along x", [3]float64{2, 0, 0}, 0, [3]float64{0, 1, 0}, [3]float64{0, 0, 1}},
		{"along −x", [3]float64{-2, 0, 0}, 0, [3]float64{0, -1, 0}, [3]float64{0, 0, 1}},
		{"along y", [3]float64{0, 3, 0}, 0, [3]float64{-1, 0, 0}, [3]float64{0, 0, 1}},
		{"upward", [3]float64{0, 0, 3}, 0, [3]float64{0, 1, 0}, [3]float64{-1, 0, 0}},
		{"downward", [3]float64{0, 0, -3}, 0, [3]float64{0, 1, 0}, [3]float64{1, 0, 0}},
		{"along x, rolled a quarter", [3]float64{1, 0, 0}, math.Pi / 2, [3]float64{0, 0, 1}, [3]float64{0, -1, 0}},
	} {
		axes := AxesAlong(c.direction, c.roll)
		for i := range 3 {
			assert.InDelta(t, c.y[i], axes[1][i], 1e-15, c.name)
			assert.InDelta(t, c.z[i], axes[2][i], 1e-15, c.name)
		}
	}
}

func TestMemberAxesAreRightHandedAndSquare(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		d := [3]float64{}
		for i := range d {
			d[i] = rapid.Float64Range(-10, 10).Draw(t, "d")
		}
		if Dot(d, d) < 1e-6 {
			return
		}
		axes := AxesAlong(d, rapid.Float64Range(-7, 7).Draw(t, "roll"))
		for i := range 3 {
			for j := range 3 {
				want := 0.0
				if i == j {
					want = 1
				}
				require.InDelta(t, want, Dot(axes[i], axes[j]), 1e-12)
			}
		}
		z := Cross(axes[0], axes[1])
		require.InDelta(t, 1, Dot(z, axes[2]), 1e-12)
	})
}
