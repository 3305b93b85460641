package diagram

import (
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/quantity"
)

func metric(t testing.TB, label string, value func(float64) float64, length float64, most, least Mark) Course {
	t.Helper()
	kNm, ok := quantity.Lookup("kNm")
	require.True(t, ok)
	m, ok := quantity.Lookup("m")
	require.True(t, ok)
	return Course{Label: label, Length: length, First: "B", Last: "C", Value: value, Most: most, Least: least, Unit: kNm, Lengths: m}
}

// propped is the moment of a beam of 8 m under 1 kN/m, fixed at B, on a
// bearing at C: −ql²/8 = −8 at B, 9ql²/128 = 4.5 at 5/8 of the length.
func propped(t testing.TB) Course {
	return metric(t, "My", func(x float64) float64 { return -8e3 + 5e3*x - 500*x*x }, 8, Mark{4.5e3, 5}, Mark{-8e3, 0})
}

func TestTextShowsBothSignsToOneScale(t *testing.T) {
	assert.Equal(t, strings.Join([]string{
		"My + B     ▁▃▃▄▄▅▅▄▄▃▃▁ C  4.5 kNm at 5 m",
		"   − B █▆▄▂             C  −8 kNm at B",
	}, "\n"), Text(propped(t), 16))
}

func TestTextOfOneSignIsOneLine(t *testing.T) {
	c := metric(t, "My", func(x float64) float64 { return 500 * x * (8 - x) }, 8, Mark{8e3, 4}, Mark{0, 0})
	assert.Equal(t, "My + B ▄▆████▆▄ C  8 kNm at 4 m", Text(c, 8))
	c = metric(t, "My", func(x float64) float64 { return 0 }, 8, Mark{}, Mark{})
	assert.Equal(t, "My 0 along the whole length", Text(c, 8))
}

func TestTextOfAnyCourse(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		a, b := rapid.Float64().Draw(rt, "a"), rapid.Float64().Draw(rt, "b")
		width := rapid.IntRange(-1, 60).Draw(rt, "width")
		c := metric(t, "N", func(x float64) float64 { return a + b*x }, 1, Mark{math.Max(a, a+b), 0}, Mark{math.Min(a, a+b), 1})
		text := Text(c, width)
		for line := range strings.SplitSeq(text, "\n") {
			require.NotEmpty(rt, line)
			require.LessOrEqual(rt, len([]rune(line)), max(width, 1)+60)
		}
	})
}
