package analysis

import (
	"context"
	"math"
	"sync"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/model"
)

func run(t testing.TB, b *builder) *Results {
	t.Helper()
	r, err := Run(context.Background(), b.m, nil)
	require.NoError(t, err)
	return r
}

func find(t testing.TB, r *Results, name string) Result {
	t.Helper()
	result, ok := r.Find(name)
	require.True(t, ok, name)
	return result
}

// Simple beam of length l under q: reactions ql/2, moment ql²/8, deflection
// 5ql⁴/(384 EI); closed forms.
func TestSimpleBeamByHand(t *testing.T) {
	r := run(t, simple(t))
	require.True(t, r.Solved())
	assert.Empty(t, r.Diagnostics())
	assert.Equal(t, 3, r.Freedoms(), "ux of B, ry of both")
	g := find(t, r, "G")
	assert.True(t, g.IsCase())
	assert.InEpsilon(t, 15e3, g.Reaction(0)[2], 1e-12)
	assert.InEpsilon(t, 15e3, g.Reaction(1)[2], 1e-12)
	beam := g.Member(0)
	most, least, known := beam.Range(My)
	require.True(t, known)
	assert.InEpsilon(t, 22.5e3, most.Value, 1e-12)
	assert.InDelta(t, 3, most.At, 1e-9)
	assert.InDelta(t, 0, least.Value, 1e-9)
	most, _, _ = beam.Range(Deflection)
	ei := 210e9 * 8e-5
	assert.InEpsilon(t, 5*5e3*math.Pow(6, 4)/384/ei, most.Value, 1e-12)
	_, least, _ = beam.Sag(2)
	assert.InEpsilon(t, -5*5e3*math.Pow(6, 4)/384/ei, least.Value, 1e-12)
	assert.InEpsilon(t, -5*5e3*math.Pow(6, 4)/384/ei, beam.Movement(3)[2], 1e-12)
	assert.InEpsilon(t, 5e3*math.Pow(6, 3)/24/ei, beam.Movement(0)[4], 1e-12)
	_, least = beam.MovementRange(2)
	assert.InEpsilon(t, -5*5e3*math.Pow(6, 4)/384/ei, least.Value, 1e-12)
	assert.InDelta(t, 3, least.At, 1e-9)
	w := find(t, r, "W").Member(0)
	assert.InEpsilon(t, -4e3, w.ForceBefore(Vz, 3), 1e-12)
	assert.InEpsilon(t, 4e3, w.Force(Vz, 3), 1e-12)
	assert.InEpsilon(t, 15e3, beam.Force(Vz, 0), 1e-12)
	assert.InEpsilon(t, -15e3, beam.Force(Vz, 6), 1e-12)
	ends := beam.Ends()
	assert.InEpsilon(t, 15e3, ends[0][2], 1e-12)
	assert.InEpsilon(t, 15e3, ends[1][2], 1e-12)
	most, _, _ = beam.Range(NormalStress)
	assert.InEpsilon(t, 22.5e3/6e-4, most.Value, 1e-12)
	_, _, known = beam.Range(ShearStress)
	assert.False(t, known, "the section has no shear area")
	assert.Less(t, g.Equilibrium().Residual, 1e-12)
	assert.InEpsilon(t, -30e3, g.Equilibrium().Applied[2], 1e-12)
	assert.InEpsilon(t, 30e3, g.Equilibrium().Reacted[2], 1e-12)
}

func TestCombinationsAreSuperposed(t *testing.T) {
	r := run(t, simple(t))
	c := find(t, r, "ULS.S+W")
	assert.False(t, c.IsCase())
	assert.Equal(t, "EN 1990 (6.10)", c.Combination().Equation)
	// 1.35 G + 1.5 S + 0.9 W: 20.25 + 13.5 − 3.6 kN.
	assert.InEpsilon(t, 30.15e3, c.Reaction(0)[2], 1e-12)
	assert.InEpsilon(t, 1.35*22.5e3+1.5*13.5e3-0.9*12e3, c.Member(0).Force(My, 3), 1e-12)
	also, ok := r.Find("ULS.S_W")
	require.True(t, ok)
	assert.Equal(t, c.Index(), also.Index())
	_, ok = r.Find("ULS.X")
	assert.False(t, ok)
}

func TestEnvelopeByHand(t *testing.T) {
	r := run(t, simple(t))
	e := r.Envelope(0)
	name := func(g Governed) string { return r.At(g.Result).Name() }
	bands := e.Reaction(0)
	assert.InEpsilon(t, 33.75e3, bands[2].Most.Value, 1e-12)
	assert.Equal(t, "ULS.S", name(bands[2].Most))
	assert.InEpsilon(t, 9e3, bands[2].Least.Value, 1e-12)
	assert.Equal(t, "ULS.W−", name(bands[2].Least))
	band, known := e.Along(0, My)
	require.True(t, known)
	assert.InEpsilon(t, 50.625e3, band.Most.Value, 1e-12)
	assert.InDelta(t, 3, band.Most.At, 1e-9)
	assert.Equal(t, "ULS.S", name(band.Most))
	band, _ = e.Along(0, NormalStress)
	assert.InEpsilon(t, 50.625e3/6e-4, band.Most.Value, 1e-12)
	assert.InEpsilon(t, -50.625e3/6e-4, band.Least.Value, 1e-12)
	moved := e.Movement(1)
	assert.InEpsilon(t, -33.75e3*36/(16*210e9*8e-5)*2*8/12, moved[4].Least.Value, 1e-9, "−wl³/24EI with w = 11.25 kN/m")

	governing := e.Governing(0)
	require.NotEmpty(t, governing)
	assert.Equal(t, My, governing[0].Quantity)
	assert.InEpsilon(t, 50.625e3, governing[0].Value, 1e-12)
	for _, g := range governing {
		assert.NotEqual(t, N, g.Quantity, "there is no axial force")
		if g.Quantity == NormalStress {
			assert.InEpsilon(t, 50.625e3/6e-4/275e6, g.Share, 1e-12)
		}
	}
	rows := e.SupportRows()
	assert.Len(t, rows, 2, "Fz of A and of B")
}

func TestLimitsByHand(t *testing.T) {
	b := simple(t)
	b.limit(model.Limit{Measure: model.Deflection, AtMost: true, Targets: []model.Target{{Member: 0, Bound: 6.0 / 1000}}, Text: "limit deflection of b <= length/1000 under SLS"}, 1)
	b.limit(model.Limit{Measure: model.Stress, AtMost: true, Targets: []model.Target{{Member: 0, Bound: 275e6}}}, 0)
	b.limit(model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, Targets: []model.Target{{Member: -1, Bound: 0}}}, 0)
	b.limit(model.Limit{Measure: model.Frequency, Targets: []model.Target{{Member: -1, Bound: 4}}})
	b.limit(model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, AtMost: true, Targets: []model.Target{{Member: -1, Bound: 33e3}}, Under: model.Under{Generated: []string{"ULS.S_W"}}})
	b.limit(model.Limit{Measure: model.Reaction, Node: 0, Freedom: 2, Targets: []model.Target{{Member: -1, Bound: 0}}, Under: model.Under{Generated: []string{"ULS.S_w"}}})
	r := run(t, b)
	limits, err := r.Limits(context.Background())
	require.NoError(t, err)
	require.Len(t, limits, 6)

	// Characteristic with snow: 8 kN/m.
	sag := 5 * 8e3 * math.Pow(6, 4) / 384 / (210e9 * 8e-5)
	assert.InEpsilon(t, sag, limits[0].Governs.Value, 1e-12)
	assert.InEpsilon(t, sag/0.006, limits[0].Governs.Ratio, 1e-12)
	assert.Equal(t, "SLS.S", r.At(limits[0].Governs.Result).Name())
	assert.False(t, limits[0].Holds)
	require.Len(t, limits[0].Next, 3)
	assert.Equal(t, "SLS.S+W", r.At(limits[0].Next[0].Result).Name())
	assert.InEpsilon(t, sag-0.6*8e3*math.Pow(6, 3)/48/(210e9*8e-5), limits[0].Next[0].Value, 1e-12)
	assert.Equal(t, "deflection of b is 8.04 mm in SLS.S at 3 m; the limit is 6 mm (134 %).", r.Words(limits[0]))

	assert.InEpsilon(t, 50.625e3/6e-4, limits[1].Governs.Value, 1e-12)
	assert.True(t, limits[1].Holds)

	assert.InEpsilon(t, 9e3, limits[2].Governs.Value, 1e-12)
	assert.Equal(t, "ULS.W−", r.At(limits[2].Governs.Result).Name())
	assert.True(t, limits[2].Holds)

	assert.Contains(t, limits[3].Problem, "vibration analysis")
	assert.InEpsilon(t, 30.15e3, limits[4].Governs.Value, 1e-12)
	assert.Equal(t, []string{"ULS.S_w"}, limits[5].Unknown)

	list, err := r.LimitDiagnostics(context.Background())
	require.NoError(t, err)
	var lines []string
	for _, d := range list {
		at := b.m.Files[0].Position(d.Subject.Start)
		lines = append(lines, string(d.Name)+" "+d.Severity.String()+" "+string(rune('0'+at.Line)))
	}
	assert.Equal(t, []string{"limit-exceeded error 2", "limit-unanswered warning 5", "unknown-combination error 7"}, lines)
	assert.Contains(t, list[2].Summary, "Near in name: ULS.S_W")
	broken, unchecked := Broken(limits)
	assert.Equal(t, []int{1, 2}, []int{broken, unchecked})
}

func TestAMechanismHasNoNumbers(t *testing.T) {
	b := simple(t)
	b.m.Supports = b.m.Supports[:1]
	r := run(t, b)
	assert.False(t, r.Solved())
	assert.Zero(t, r.Len())
	require.Len(t, r.Diagnostics(), 1)
	d := r.Diagnostics()[0]
	assert.Equal(t, "mechanism", string(d.Name))
	assert.Contains(t, d.Summary, "B")
	assert.NotNil(t, r.Mechanism())
	_, ok := r.Find("G")
	assert.False(t, ok)
	assert.NotEmpty(t, r.Combinations().All)
	limits, err := r.Limits(context.Background())
	assert.NoError(t, err)
	assert.Empty(t, limits)
	assert.True(t, r.Envelope(0).Empty())
}

func TestManyReadersAtOnce(t *testing.T) {
	b := simple(t)
	b.limit(model.Limit{Measure: model.Stress, AtMost: true, Targets: []model.Target{{Member: 0, Bound: 275e6}}}, 0)
	r := run(t, b)
	want, _ := run(t, b).Envelope(0).Along(0, My)
	var group sync.WaitGroup
	for range 16 {
		group.Go(func() {
			for i := range r.Len() {
				_ = r.At(i).Member(0).Movement(2)
			}
			band, _ := r.Envelope(0).Along(0, My)
			assert.Equal(t, want, band)
			_, err := r.Limits(context.Background())
			assert.NoError(t, err)
			assert.NoError(t, Prepare(context.Background(), r.Envelope(0), r.Envelope(1)))
			_ = r.Envelope(1).Governing(0)
		})
	}
	group.Wait()
}

func TestACancelledRunReturnsTheContextsError(t *testing.T) {
	ctx, cancel := context.WithCancel(context.Background())
	cancel()
	_, err := Run(ctx, simple(t).m, nil)
	assert.ErrorIs(t, err, context.Canceled)
	r := run(t, simple(t).limit(model.Limit{Measure: model.Stress, AtMost: true, Targets: []model.Target{{Member: 0, Bound: 275e6}}}, 0))
	_, err = r.Limits(ctx)
	assert.ErrorIs(t, err, context.Canceled)
	limits, err := r.Limits(context.Background())
	require.NoError(t, err)
	assert.Len(t, limits, 1, "what was cancelled is done when asked again")
}
