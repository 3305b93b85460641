package analysis

import (
	"context"
	"fmt"
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/model"
)

// drawFrame draws a portal-like frame of one to three bays, plane or in space,
// with loads of all shapes and a family.
func drawFrame(t testing.TB, rt *rapid.T) *builder {
	plane := rapid.Bool().Draw(rt, "plane")
	b := build(t, plane)
	bays := rapid.IntRange(1, 3).Draw(rt, "bays")
	for i := range bays + 1 {
		x, y := 5*float64(i), 0.0
		if !plane {
			y = rapid.Float64Range(-2, 2).Draw(rt, "y")
		}
		foot, head := fmt.Sprintf("F%d", i), fmt.Sprintf("H%d", i)
		b.node(foot, x, 0, 0).node(head, x+0.3, y, rapid.Float64Range(3, 5).Draw(rt, "z")).beam("c"+foot, foot, head)
		if plane {
			b.holds(foot, "ux uz ry")
		} else {
			b.holds(foot, "ux uy uz rx ry rz")
		}
		if i > 0 {
			b.beam("r"+head, fmt.Sprintf("H%d", i-1), head)
		}
	}
	for i, kind := range []model.CaseKind{model.Permanent, model.Snow, model.Wind}[:rapid.IntRange(1, 3).Draw(rt, "cases")] {
		var loads []model.Load
		for range rapid.IntRange(1, 3).Draw(rt, "loads") {
			member := rapid.IntRange(0, len(b.m.Members)-1).Draw(rt, "member")
			length := b.m.Members[member].Length
			l := model.Load{Kind: model.LineForce, Node: -1, Member: member, To: length}
			if rapid.Bool().Draw(rt, "partial") {
				l.From = rapid.Float64Range(0, 0.4).Draw(rt, "from") * length
				l.To = rapid.Float64Range(0.5, 1).Draw(rt, "to") * length
			}
			for k := range 3 {
				if k == 1 && plane {
					continue
				}
				l.Start[k] = rapid.Float64Range(-5e3, 5e3).Draw(rt, "q")
				l.End[k] = rapid.Float64Range(-5e3, 5e3).Draw(rt, "q")
			}
			if rapid.IntRange(0, 3).Draw(rt, "point") == 0 {
				l.Kind, l.To = model.PointForce, 0
			}
			loads = append(loads, l)
		}
		b.load(string("GSW"[i]), kind, loads...)
	}
	return b.family("ULS", model.Strength)
}

func TestEnvelopeEqualsBruteForceOverCombinations(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		r := run(t, drawFrame(t, rt))
		require.True(rt, r.Solved(), "%v", r.Diagnostics())
		e := r.Envelope(0)
		member := rapid.IntRange(0, len(r.model.Members)-1).Draw(rt, "asked")
		for q := range quantities {
			band, known := e.Along(member, q)
			if q == ShearStress {
				continue // the section has no shear areas
			}
			require.True(rt, known)
			most, least := math.Inf(-1), math.Inf(1)
			for _, result := range e.Results() {
				high, low, _ := result.Member(member).Range(q)
				most, least = max(most, high.Value), min(least, low.Value)
			}
			tolerance := 1e-10 * (math.Abs(most) + math.Abs(least))
			require.InDelta(rt, most, band.Most.Value, tolerance, q.String())
			require.InDelta(rt, least, band.Least.Value, tolerance, q.String())
			// The value is there, in that combination, at that place.
			if q < Deflection {
				governs := r.At(band.Most.Result).Member(member)
				there := max(governs.Force(q, band.Most.At), governs.ForceBefore(q, band.Most.At))
				require.InDelta(rt, band.Most.Value, there, tolerance, q.String())
			}
		}
		node := rapid.IntRange(0, len(r.model.Nodes)-1).Draw(rt, "node")
		for freedom, band := range e.Movement(node) {
			for _, result := range e.Results() {
				value := result.Movement(node)[freedom]
				require.LessOrEqual(rt, value, band.Most.Value+1e-11*math.Abs(value))
				require.GreaterOrEqual(rt, value, band.Least.Value-1e-11*math.Abs(value))
			}
			require.Equal(rt, band.Most.Value, r.At(band.Most.Result).Movement(node)[freedom])
		}
	})
}

// Stress in a rectangle: at the corners, and nowhere more.
func TestStressBandCoversEveryCorner(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		r := run(t, drawFrame(t, rt))
		member := rapid.IntRange(0, len(r.model.Members)-1).Draw(rt, "asked")
		band, known := r.Envelope(0).Along(member, NormalStress)
		require.True(rt, known)
		s := &r.model.Sections[0]
		reached := math.Inf(-1)
		for _, result := range r.Envelope(0).Results() {
			along := result.Member(member)
			for k := range 101 {
				at := along.Length() * float64(k) / 100
				high := along.Force(N, at)/s.A + math.Abs(along.Force(My, at))/s.Wy + math.Abs(along.Force(Mz, at))/s.Wz
				require.LessOrEqual(rt, high, band.Most.Value*(1+1e-9)+1)
				reached = max(reached, high)
			}
		}
		governs := r.At(band.Most.Result).Member(member)
		there := math.Inf(-1)
		for _, force := range []func(Quantity, float64) float64{governs.Force, governs.ForceBefore} {
			at := band.Most.At
			there = max(there, force(N, at)/s.A+math.Abs(force(My, at))/s.Wy+math.Abs(force(Mz, at))/s.Wz)
		}
		require.InDelta(rt, there, band.Most.Value, 1e-9*math.Abs(there)+1)
		require.LessOrEqual(rt, reached, there*(1+1e-9)+1)
	})
}

// edit changes one thing of a model, as an engineer does between two solves.
func edit(rt *rapid.T, m *model.Model) *model.Model {
	changed := *m
	switch rapid.IntRange(0, 3).Draw(rt, "edit") {
	case 0: // a load
		changed.Cases = append([]model.Case(nil), m.Cases...)
		c := &changed.Cases[rapid.IntRange(0, len(m.Cases)-1).Draw(rt, "case")]
		c.Loads = append([]model.Load(nil), c.Loads...)
		c.Loads[0].Start[2] = rapid.Float64Range(-9e3, 9e3).Draw(rt, "q")
	case 1: // the section
		changed.Sections = append([]model.Section(nil), m.Sections...)
		changed.Sections[0].Iy *= rapid.Float64Range(0.5, 2).Draw(rt, "Iy")
	case 2: // a support
		changed.Supports = append([]model.Support(nil), m.Supports...)
		changed.Supports[0].Freedoms[4].Kind = model.RestraintKind(rapid.IntRange(0, 1).Draw(rt, "ry"))
	case 3: // a node
		changed.Nodes = append([]model.Node(nil), m.Nodes...)
		changed.Nodes[1].Position[0] += rapid.Float64Range(-0.2, 0.2).Draw(rt, "dx")
		changed.Members = append([]model.Member(nil), m.Members...)
		for i := range changed.Members {
			b := &changed.Members[i]
			a, z := changed.Nodes[b.Nodes[0]].Position, changed.Nodes[b.Nodes[len(b.Nodes)-1]].Position
			d := [3]float64{z[0] - a[0], z[1] - a[1], z[2] - a[2]}
			b.Length = math.Sqrt(model.Dot(d, d))
		}
		changed.Cases = append([]model.Case(nil), m.Cases...)
		for i := range changed.Cases {
			loads := append([]model.Load(nil), changed.Cases[i].Loads...)
			for k := range loads {
				loads[k].To = min(loads[k].To, changed.Members[loads[k].Member].Length)
				loads[k].From = min(loads[k].From, changed.Members[loads[k].Member].Length/2)
			}
			changed.Cases[i].Loads = loads
		}
	}
	return &changed
}

func TestReuseEqualsAFreshSolve(t *testing.T) {
	rapid.Check(t, func(rt *rapid.T) {
		b := drawFrame(t, rt)
		r := run(t, b)
		for range rapid.IntRange(1, 5).Draw(rt, "edits") {
			m := edit(rt, r.model)
			next, err := Run(context.Background(), m, r)
			require.NoError(rt, err)
			fresh, err := Run(context.Background(), m, nil)
			require.NoError(rt, err)
			require.Equal(rt, fresh.Solved(), next.Solved())
			require.NotEmpty(rt, next.Way())
			for c := range m.Cases {
				for node := range m.Nodes {
					want, got := fresh.Case(c).Movement(node), next.Case(c).Movement(node)
					for i := range want {
						require.InDelta(rt, want[i], got[i], 1e-9*(1e-3+math.Abs(want[i])), next.Way())
					}
				}
				require.Less(rt, next.Case(c).Equilibrium().Residual, 1e-9)
			}
			r = next
		}
	})
}

func TestALoadEditKeepsTheFactor(t *testing.T) {
	b := simple(t)
	r := run(t, b)
	b.m.Cases[0].Loads[0].Start[2], b.m.Cases[0].Loads[0].End[2] = -10e3, -10e3
	next, err := Run(context.Background(), b.m, r)
	require.NoError(t, err)
	assert.Contains(t, next.Way(), "loads only")
	assert.InEpsilon(t, 30e3, find(t, next, "G").Reaction(0)[2], 1e-12)
	assert.Equal(t, r.Trust().Condition, next.Trust().Condition)
}

// A post on a footing that only pushes, held by two cables: under uplift the
// footing lets go, and each combination finds its own state.
func TestOneWayPartsAreSolvedPerCombination(t *testing.T) {
	b := build(t, true).node("A", -3, 0, 0).node("B", 0, 0, 4).node("C", 3, 0, 0)
	b.beam("left", "A", "B").beam("right", "C", "B")
	for i := range b.m.Members {
		b.m.Members[i].Kind, b.m.Members[i].Sense = model.Bar, model.TensionOnly
	}
	b.node("D", 0, 0, 0).beam("post", "D", "B").holds("A", "ux uz").holds("C", "ux uz").holds("D", "ux uz ry")
	b.load("G", model.Permanent, force(1, 0, -20e3))
	b.load("W", model.Wind, force(1, 15e3, 0))
	b.family("ULS", model.Strength)
	r := run(t, b)
	require.True(t, r.Solved(), "%v", r.Diagnostics())
	require.True(t, r.OneWay())
	w := find(t, r, "ULS.W")
	tension, _, _ := w.Member(0).Range(N)
	assert.Greater(t, tension.Value, 0.0, "the cable to windward pulls")
	_, slack, _ := w.Member(1).Range(N)
	assert.Zero(t, slack.Value, "the one to leeward is slack")
	sum := 0.0
	for node := range b.m.Nodes {
		sum += w.Reaction(node)[0]
	}
	assert.InEpsilon(t, -1.5*15e3, sum, 1e-9)
	// The combination is not the sum of its cases: G alone leaves both cables
	// slack, and its own share of them is nothing.
	g, _, _ := find(t, r, "G").Member(0).Range(N)
	assert.Zero(t, g.Value)
	band, known := r.Envelope(0).Along(0, N)
	require.True(t, known)
	assert.GreaterOrEqual(t, band.Least.Value, 0.0)
	assert.GreaterOrEqual(t, band.Most.Value, tension.Value)
}

func TestMembersThroughNodesAreOneMember(t *testing.T) {
	b := build(t, true).node("A", 0, 0, 0).node("P", 2, 0, 0).node("B", 6, 0, 0).beam("b", "A", "P", "B").
		holds("A", "ux uz").holds("B", "uz").load("G", model.Permanent, model.Load{})
	b.m.Cases[0].Loads = []model.Load{b.line(0, 0, -5e3)}
	most, _, _ := run(t, b).Case(0).Member(0).Range(Deflection)
	assert.InEpsilon(t, 5*5e3*math.Pow(6, 4)/384/(210e9*8e-5), most.Value, 1e-10)
	assert.InDelta(t, 3, most.At, 1e-7)
}
