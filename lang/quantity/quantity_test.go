package quantity

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

func TestUnitsHaveTheirLegalValues(t *testing.T) {
	// NIST Special Publication 811 (2008), appendix B.8, except where exact by definition.
	for symbol, want := range map[string]float64{
		"in": 0.0254, "ft": 0.3048, "yd": 0.9144, "lb": 0.45359237,
		"lbf": 4.448221615260500, "kip": 4448.221615260500,
		"psi": 6894.757293168, "ksi": 6894757.293168, "psf": 47.88025898034, "ksf": 47880.25898034,
		"kipft": 1355.817948331, "kipin": 112.9848290276, "lbft": 1.355817948331,
		"plf": 14.59390293721, "klf": 14593.90293721,
		"mm2": 1e-6, "cm4": 1e-8, "in4": 4.16231426e-7, "t": 1000, "kPa": 1e3, "MNm": 1e6,
		"deg": math.Pi / 180, "%": 0.01,
	} {
		u, ok := Lookup(symbol)
		require.True(t, ok, symbol)
		assert.InEpsilon(t, want, u.Factor, 1e-9, symbol)
	}
}

func TestJoinedUnitsHaveTheDimensionOfTheirParts(t *testing.T) {
	assert.Equal(t, Moment, unit("kN").Dimension.Times(unit("m").Dimension))
	assert.Equal(t, Stress, unit("kN").Over(unit("m2")).Dimension)
	assert.Equal(t, unit("klf").Dimension, unit("kip").Over(unit("ft")).Dimension)
	assert.Equal(t, Force, Mass.Times(Acceleration))
}

func TestWrongCaseFindsTheUnitThatWasMeant(t *testing.T) {
	for wrong, want := range map[string]string{"KN": "kN", "mpa": "MPa", "Kg": "kg", "knm": "kNm", "KIP": "kip", "MM2": "mm2"} {
		u, ok := WrongCase(wrong)
		require.True(t, ok, wrong)
		assert.Equal(t, want, u.Symbol)
	}
	for _, right := range []string{"kN", "mm", "frog"} {
		_, ok := WrongCase(right)
		assert.False(t, ok, right)
	}
}

func TestNumbersAreWrittenForPeople(t *testing.T) {
	for want, value := range map[string]float64{
		"21.4": 21.44, "−18.2": -18.16, "9.7": 9.699, "12346": 12345.6, "0.0123": 0.01234,
		"0": math.Copysign(0, -1), "1.23e−7": 1.234e-7, "2.1e11": 2.1e11, "∞": math.Inf(1), "100": 99.96,
	} {
		assert.Equal(t, want, Number(value, 3))
	}
	assert.Equal(t, "12 kN/m", Write(12e3, unit("kN").Over(unit("m")), 3))
	assert.Equal(t, "12.5 kNm", Metric().Show(Quantity{Value: 12.5e3, Dimension: Moment}))
}

func TestEveryDimensionOfTheTableIsSpoken(t *testing.T) {
	assert.Equal(t, "a length", Length.Words())
	assert.Equal(t, "a force per area", Stress.Words())
	assert.Equal(t, "a quantity in kg2·m/s3", Dimension{Mass: 2, Length: 1, Time: -3}.Words())
}

func TestDimensionsObeyTheirAlgebra(t *testing.T) {
	small := rapid.Custom(func(t *rapid.T) Dimension {
		e := rapid.Int8Range(-4, 4)
		return Dimension{e.Draw(t, "l"), e.Draw(t, "m"), e.Draw(t, "t"), e.Draw(t, "k")}
	})
	rapid.Check(t, func(t *rapid.T) {
		a, b, c := small.Draw(t, "a"), small.Draw(t, "b"), small.Draw(t, "c")
		require.Equal(t, a.Times(b), b.Times(a))
		require.Equal(t, a.Times(b).Times(c), a.Times(b.Times(c)))
		require.Equal(t, a, a.Times(b).Over(b))
		square, ok := a.Power(2)
		require.True(t, ok)
		root, ok := square.Root()
		require.True(t, ok)
		require.Equal(t, a, root)
		x, y := Quantity{Value: 3, Dimension: a}, Quantity{Value: 4, Dimension: b}
		_, err := x.Plus(y)
		require.Equal(t, a == b, err == nil)
	})
}
