package envelope

import (
	"math"
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/analysis/element"
)

// simpleBeam is the moment of a simply supported beam of 8 m under q = 1 over
// the whole length (state 0) and a unit force in the middle (state 1).
func simpleBeam() *Path {
	return NewPath([]float64{0, 4, 8}, [][]element.Polynomial{
		{{0, 4, -0.5}, {8, 0, -0.5}},
		{{0, 0.5}, {2, -0.5}},
	})
}

func TestExtremesOfASimpleBeam(t *testing.T) {
	p := simpleBeam()
	sums := []Sum{{{0, 1}}, {{0, 1}, {1, 10}}, {{0, -1}}, {{0, 1}, {1, -3}}}
	most, least := p.Extremes(sums)
	assert.Equal(t, Peak{8 + 20, 4, 1}, most)
	assert.Equal(t, Peak{-8, 4, 2}, least)

	// q x (l − x)/2 − 3x/2: largest at x = l/2 − 3/2.
	most, _ = p.Extremes(sums[3:])
	assert.InDelta(t, 2.5*5.5/2-1.5*2.5, most.Value, 1e-14)
	assert.InDelta(t, 2.5, most.At, 1e-14, "of two equal places the one nearest the first end")
}

func TestNoSumsHaveNoPeak(t *testing.T) {
	most, least := simpleBeam().Extremes(nil)
	assert.Equal(t, -1, most.Sum)
	assert.Equal(t, -1, least.Sum)
	assert.Empty(t, Largest(nil, 4, simpleBeam(), nil))
}

func TestOfEqualValuesTheFirstGoverns(t *testing.T) {
	p := simpleBeam()
	sums := []Sum{{{0, 1}}, {{0, 1 + 1e-15}}, {{0, 1}}}
	most, _ := p.Extremes(sums)
	assert.Equal(t, 0, most.Sum)
	ranked := Largest(sums, 3, p, nil)
	require.Len(t, ranked, 3)
	assert.Equal(t, []int{0, 1, 2}, []int{ranked[0].Sum, ranked[1].Sum, ranked[2].Sum})
}

func TestBothSidesOfAStepAreSeen(t *testing.T) {
	shear := NewPath([]float64{0, 1, 3}, [][]element.Polynomial{{{2}, {-5}}})
	most, least := shear.Extremes([]Sum{{{0, 2}}})
	assert.Equal(t, Peak{4, 0, 0}, most)
	assert.Equal(t, Peak{-10, 1, 0}, least)
	assert.Equal(t, 4.0, shear.At(Sum{{0, 2}}, 1, true))
	assert.Equal(t, -10.0, shear.At(Sum{{0, 2}}, 1, false))
}

// A helix-like pair: a = 3 − 3s², b = 4s over one metre has its largest size
// where −18 s (1 − s²) + 16 s = 0: s = 0 and s = 1/3; at the ends 3 and 4.
func TestLargestNorm(t *testing.T) {
	a := NewPath([]float64{0, 1}, [][]element.Polynomial{{{3, 0, -3}}})
	b := NewPath([]float64{0, 1}, [][]element.Polynomial{{{0, 4}}})
	top := Largest([]Sum{{{0, 1}}}, 1, a, b)
	require.Len(t, top, 1)
	assert.Equal(t, Peak{4, 1, 0}, top[0])
	stationary := normStationary(a.course(0, Sum{{0, 1}}), b.course(0, Sum{{0, 1}}), 1)
	assert.InDeltaSlice(t, []float64{1.0 / 3}, stationary.at[:stationary.count], 1e-15)
}

func drawPath(t *rapid.T, name string, breaks []float64, states int) *Path {
	degree := rapid.IntRange(-1, 5).Draw(t, name+" degree")
	courses := make([][]element.Polynomial, states)
	for s := range courses {
		courses[s] = make([]element.Polynomial, len(breaks)-1)
		for piece := range courses[s] {
			for k := 0; k <= degree; k++ {
				courses[s][piece][k] = rapid.Float64Range(-3, 3).Draw(t, name)
			}
		}
	}
	return NewPath(breaks, courses)
}

func drawBreaks(t *rapid.T) []float64 {
	breaks := []float64{0}
	for range rapid.IntRange(1, 3).Draw(t, "pieces") {
		breaks = append(breaks, breaks[len(breaks)-1]+rapid.Float64Range(0.1, 2).Draw(t, "length"))
	}
	return breaks
}

func drawSums(t *rapid.T, states int) []Sum {
	sums := make([]Sum, rapid.IntRange(1, 12).Draw(t, "sums"))
	for i := range sums {
		for s := range states {
			if rapid.Bool().Draw(t, "acts") {
				sums[i] = append(sums[i], Term{s, rapid.SampledFrom([]float64{1.35, 1, 1.5, 0.75, -1}).Draw(t, "factor")})
			}
		}
	}
	return sums
}

// everywhere calls see at the ends, at 200 places on each piece and close
// around every place in at.
func everywhere(breaks []float64, see func(x float64, before bool)) {
	for i := range len(breaks) - 1 {
		from, to := breaks[i], breaks[i+1]
		for k := range 201 {
			see(from+(to-from)*float64(k)/200, k > 0)
		}
	}
}

func TestEnvelopeEqualsBruteForce(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		breaks := drawBreaks(t)
		states := rapid.IntRange(1, 4).Draw(t, "states")
		a, b, c := drawPath(t, "a", breaks, states), drawPath(t, "b", breaks, states), drawPath(t, "c", breaks, states)
		sums := drawSums(t, states)
		measures := map[string]struct {
			top   []Peak
			value func(sum Sum, x float64, before bool) float64
		}{
			"signed": {LargestSigned(sums, 3, a, false), func(s Sum, x float64, before bool) float64 { return a.At(s, x, before) }},
			"least":  {LargestSigned(sums, 3, a, true), func(s Sum, x float64, before bool) float64 { return -a.At(s, x, before) }},
			"size":   {Largest(sums, 3, a, nil), func(s Sum, x float64, before bool) float64 { return math.Abs(a.At(s, x, before)) }},
			"norm":   {Largest(sums, 3, a, b), func(s Sum, x float64, before bool) float64 { return math.Hypot(a.At(s, x, before), b.At(s, x, before)) }},
			"offset": {LargestOffset(sums, 3, c, a, b), func(s Sum, x float64, before bool) float64 {
				return c.At(s, x, before) + math.Hypot(a.At(s, x, before), b.At(s, x, before))
			}},
		}
		for name, m := range measures {
			// Per sum: the sampled largest value never exceeds what was found, and
			// what was found is a value that the measure takes.
			sampled := make([]float64, len(sums))
			for i, sum := range sums {
				sampled[i] = math.Inf(-1)
				everywhere(breaks, func(x float64, before bool) {
					sampled[i] = math.Max(sampled[i], m.value(sum, x, before))
				})
			}
			order := slices.Clone(sampled)
			slices.Sort(order)
			slices.Reverse(order)
			require.Len(t, m.top, min(3, len(sums)), name)
			for k, peak := range m.top {
				value := peak.Value
				if name == "least" {
					value = -value
				}
				tolerance := 1e-9 * (1 + math.Abs(value))
				taken := math.Max(m.value(sums[peak.Sum], peak.At, true), m.value(sums[peak.Sum], peak.At, false))
				require.InDelta(t, taken, value, tolerance, "%s: taken there", name)
				require.GreaterOrEqual(t, value, order[k]-tolerance, "%s: number %d", name, k)
				require.GreaterOrEqual(t, value, sampled[peak.Sum]-tolerance, "%s: own sum", name)
			}
		}
		most, least := a.Extremes(sums)
		require.InDelta(t, measures["signed"].top[0].Value, most.Value, 1e-11*(1+math.Abs(most.Value)))
		require.InDelta(t, measures["least"].top[0].Value, least.Value, 1e-11*(1+math.Abs(least.Value)))
	})
}

func TestBlendIsTheWeightedSum(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		breaks := drawBreaks(t)
		a, b := drawPath(t, "a", breaks, 2), drawPath(t, "b", breaks, 2)
		blend := Blend([]float64{2, -0.5}, a, b)
		sum := Sum{{0, 1}, {1, -2}}
		x := rapid.Float64Range(0, breaks[len(breaks)-1]).Draw(t, "x")
		require.InDelta(t, 2*a.At(sum, x, true)-0.5*b.At(sum, x, true), blend.At(sum, x, true), 1e-9)
	})
}

func TestRootsOfHighDegree(t *testing.T) {
	// (s − 0.1)(s − 0.2) … (s − 0.9), and beyond the length.
	p := polynomial{c: [10]float64{1}}
	var want []float64
	for k := 1; k <= 9; k++ {
		r := float64(k) / 10
		var next polynomial
		for i, c := range p.c[:k] {
			next.c[i] -= r * c
			next.c[i+1] += c
		}
		p = next
		if r < 0.75 {
			want = append(want, r)
		}
	}
	roots := func(p polynomial, length float64) []float64 {
		p.trimmed()
		found := p.roots(length)
		return found.at[:found.count]
	}
	assert.InDeltaSlice(t, want, roots(p, 0.75), 1e-9)
	assert.Empty(t, roots(polynomial{}, 1))
	assert.Equal(t, []float64{0.5}, roots(polynomial{c: [10]float64{0.25, -1, 1}}, 1), "touching")
	assert.Equal(t, []float64{0.25}, roots(polynomial{c: [10]float64{-1, 4}}, 1))
	assert.Empty(t, roots(polynomial{c: [10]float64{-1, 4}}, 0.2))
}
