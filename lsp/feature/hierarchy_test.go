package feature

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/source"
)

func TestTypeHierarchy(t *testing.T) {
	d := open(t, "/shed.span", shed)
	s := d.snapshot()
	section, ok := TypeItem(s, d.path, d.at("of |post\nbeam r"))
	require.True(t, ok)
	assert.Equal(t, "post", section.Name)
	assert.Equal(t, "rect 100 × 200 mm", section.Detail)
	assert.Equal(t, []string{"steel"}, itemNames(Supertypes(s, section)))
	assert.Equal(t, []string{"c", "r"}, itemNames(Subtypes(s, section)))
	assert.Equal(t, "beam, 4 m", Subtypes(s, section)[1].Detail)
	assert.Equal(t, []string{"post"}, itemNames(Subtypes(s, Supertypes(s, section)[0])))
	assert.Equal(t, section, Supertypes(s, Subtypes(s, section)[0])[0])
	_, ok = TypeItem(s, d.path, d.at("node |A"))
	assert.False(t, ok, "a node is made of nothing")
}

func itemNames(list []Item) []string {
	var all []string
	for _, i := range list {
		all = append(all, i.Name)
	}
	return all
}

func steps(list []Step) []string {
	var all []string
	for _, s := range list {
		all = append(all, s.Item.Name+": "+s.Item.Detail)
	}
	return all
}

// A joist rests on two girders, one of which runs on through a node; a column
// and the ground take the load.
const floor = `model "Floor" space
material steel = S275
section joist = IPE 200 of steel
section girder = HEB 300 of steel

node A = (0, 0, 3) m
node M = (2, 0, 3) m
node B = (6, 0, 3) m
node C = (0, 4, 3) m
node P = (2, 4, 3) m
node D = (6, 4, 3) m
node F = (0, 0, 0) m

beam g1 = A -> M -> B of girder
beam g2 = C -> P -> D of girder
beam j1 = M -> P of joist, hinge at M, hinge at P
beam col = F -> A of girder

support F fixed
support B pinned
support C fixed
support D pinned

case Q imposed B {
    j1: 3 kN/m down
    j1 at 2 m: 12 kN down
}
`

func TestLoadPath(t *testing.T) {
	d := open(t, "/floor.span", floor)
	require.Empty(t, d.snapshot().Diagnostics(d.path))
	s := d.snapshot()
	q, ok := PathItem(s, d.path, d.at("case |Q"))
	require.True(t, ok)
	to := LoadsTo(s, q)
	assert.Equal(t, []string{"j1: Fz −24 kN ↓"}, steps(to))
	assert.Equal(t, []string{"j1: 3 kN/m down", "j1 at 2 m: 12 kN down"}, textsOf(d, to[0].From))

	joist := to[0].Item
	assert.Equal(t, []string{"g1: takes 12 kN at M in Q", "g2: takes 12 kN at P in Q"}, steps(LoadsTo(s, joist)), "half of 24 kN each")
	assert.Equal(t, []string{"M", "M"}, textsOf(d, LoadsTo(s, joist)[0].From), "in its path and at its hinge")
	assert.Equal(t, []string{"Q: Fz −24 kN ↓"}, steps(LoadsFrom(s, joist)))

	girder := LoadsTo(s, joist)[0].Item
	next := strings.Join(steps(LoadsTo(s, girder)), "\n")
	assert.Contains(t, next, "col: takes")
	assert.Contains(t, next, "B: support takes")
	assert.Equal(t, []string{"j1: gives 12 kN at M in Q"}, steps(LoadsFrom(s, girder)))

	ground, ok := PathItem(s, d.path, d.at("support |F"))
	require.True(t, ok)
	assert.Empty(t, LoadsTo(s, ground), "the ground is the end")
	assert.Len(t, LoadsFrom(s, ground), 1)
	assert.Equal(t, "col", LoadsFrom(s, ground)[0].Item.Name)
}

func textsOf(d *desk, spans []source.Span) []string {
	var all []string
	for _, s := range spans {
		all = append(all, d.file().Slice(s))
	}
	return all
}

// What is given at a node is taken there.
func TestLoadPathIsInBalance(t *testing.T) {
	for _, name := range models(t) {
		d := openFile(t, name)
		v := d.settle()
		p, ok := pathOf(&v)
		require.True(t, ok)
		loaded := map[int]bool{}
		for i := range p.n.model.Cases {
			for _, l := range p.n.model.Cases[i].Loads {
				loaded[l.Node] = true
			}
		}
		for node := range p.n.model.Nodes {
			if loaded[node] {
				continue
			}
			sum := 0.0
			for _, touch := range p.touching(node) {
				sum += p.given(touch.member, touch.place)
			}
			r := p.result.Reaction(node)
			sum += r[0]*p.way[0] + r[1]*p.way[1] + r[2]*p.way[2]
			assert.InDelta(t, 0, sum, 1e-8*p.size, "%s, node %s", name, p.n.model.Nodes[node].Name)
		}
	}
}
