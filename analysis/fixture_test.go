package analysis

import (
	"fmt"
	"math"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
)

// builder makes models for tests, in SI.
type builder struct {
	t testing.TB
	m *model.Model
}

// build starts a model with steel and one section: A = 5e-3 m2, Iy = 8e-5 m4,
// Iz = 6e-6 m4, Wy = 6e-4 m3, Wz = 8e-5 m3.
func build(t testing.TB, plane bool) *builder {
	t.Helper()
	file := source.New("test.span", "model \"Test\" plane\n"+strings.Repeat("limit\n", 40))
	return &builder{t, &model.Model{
		Title: "Test", Plane: plane, Gravity: 9.80665, Display: quantity.Metric(), Files: []*source.File{file},
		Materials: []model.Material{{Name: "steel", E: 210e9, G: 81e9, Density: 7850, Expansion: 12e-6, Yield: 275e6}},
		Sections: []model.Section{{Name: "s", Title: "test section", A: 5e-3, Iy: 8e-5, Iz: 6e-6, It: 2e-7,
			Wy: 6e-4, Wz: 8e-5, Depth: 0.3, Width: 0.15, Mass: 39.25}},
	}}
}

func (b *builder) node(name string, x, y, z float64) *builder {
	b.m.Nodes = append(b.m.Nodes, model.Node{Name: name, Position: [3]float64{x, y, z}})
	return b
}

func (b *builder) find(name string) int {
	for i := range b.m.Nodes {
		if b.m.Nodes[i].Name == name {
			return i
		}
	}
	require.Fail(b.t, "no node", name)
	return -1
}

// beam adds a member through nodes.
func (b *builder) beam(name string, nodes ...string) *builder {
	m := model.Member{Name: name, Kind: model.Beam}
	for _, n := range nodes {
		m.Nodes = append(m.Nodes, b.find(n))
	}
	a, z := b.m.Nodes[m.Nodes[0]].Position, b.m.Nodes[m.Nodes[len(m.Nodes)-1]].Position
	m.Length = math.Sqrt((z[0]-a[0])*(z[0]-a[0]) + (z[1]-a[1])*(z[1]-a[1]) + (z[2]-a[2])*(z[2]-a[2]))
	b.m.Members = append(b.m.Members, m)
	return b
}

// holds adds a support that holds freedoms, "ux uz ry".
func (b *builder) holds(node string, freedoms string) *builder {
	s := model.Support{Node: b.find(node), Words: "holds " + freedoms, Axes: [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}}
	for _, f := range strings.Fields(freedoms) {
		for i, name := range MovementNames {
			if f == name {
				s.Freedoms[i].Kind = model.Held
			}
		}
	}
	b.m.Supports = append(b.m.Supports, s)
	return b
}

func (b *builder) load(name string, kind model.CaseKind, loads ...model.Load) *builder {
	b.m.Cases = append(b.m.Cases, model.Case{Name: name, Kind: kind, Loads: loads})
	return b
}

func (b *builder) family(name string, s model.Situation) *builder {
	b.m.Families = append(b.m.Families, model.Family{Name: name, Code: model.EN1990, Situation: s})
	return b
}

// limit adds a limit on line 2 + its number, under families.
func (b *builder) limit(l model.Limit, families ...int) *builder {
	line := len(b.m.Limits) + 1
	start := b.m.Files[0].LineStart(line)
	l.Origin = model.Origin{Statement: source.Span{Start: start, End: start + 5}, Name: source.Span{Start: start, End: start + 5}, Place: -1}
	l.Under.Families = append(l.Under.Families, families...)
	if l.Text == "" {
		l.Text = fmt.Sprintf("limit %d", line)
	}
	b.m.Limits = append(b.m.Limits, l)
	return b
}

// line is a uniform load along the whole member, global, N/m.
func (b *builder) line(member int, x, z float64) model.Load {
	q := [3]float64{x, 0, z}
	return model.Load{Kind: model.LineForce, Node: -1, Member: member, Start: q, End: q, To: b.m.Members[member].Length}
}

func (b *builder) point(member int, at, z float64) model.Load {
	return model.Load{Kind: model.PointForce, Node: -1, Member: member, Start: [3]float64{0, 0, z}, From: at}
}

func force(node int, x, z float64) model.Load {
	return model.Load{Kind: model.NodeForce, Node: node, Member: -1, Start: [3]float64{x, 0, z}}
}

// simple is a simply supported beam of 6 m from A to B: G 5 kN/m and S 3 kN/m
// down, W 8 kN up in the middle. Families ULS and SLS.
func simple(t testing.TB) *builder {
	b := build(t, true).node("A", 0, 0, 0).node("B", 6, 0, 0).beam("b", "A", "B").
		holds("A", "ux uz").holds("B", "uz")
	b.load("G", model.Permanent, b.line(0, 0, -5e3))
	b.load("S", model.Snow, b.line(0, 0, -3e3))
	b.load("W", model.Wind, b.point(0, 3, 8e3))
	return b.family("ULS", model.Strength).family("SLS", model.Characteristic)
}
