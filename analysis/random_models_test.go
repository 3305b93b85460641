package analysis_test

import (
	"context"
	"fmt"
	"math"
	"math/rand/v2"
	"regexp"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"

	"spanwright/analysis"
	format "spanwright/fmt"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// randomModel writes structures with every linear feature mixed, plane and in
// space, that stand by their first node.
type randomModel struct {
	*rand.Rand
	plane bool
	nodes int
	lines []string // declarations, in any order
	// beams are members without ends of their own kind, which may be split.
	beams [][2]int
}

func (r *randomModel) add(format string, arguments ...any) {
	r.lines = append(r.lines, fmt.Sprintf(format, arguments...))
}

// vector writes parts for the plane or for space.
func (r *randomModel) vector(x, y, z float64) string {
	if r.plane {
		return fmt.Sprintf("(%.4f, %.4f)", x, z)
	}
	return fmt.Sprintf("(%.4f, %.4f, %.4f)", x, y, z)
}

func (r *randomModel) between(a, b float64) float64 { return a + (b-a)*r.Float64() }

func newRandomModel(seed uint64) *randomModel {
	r := &randomModel{Rand: rand.New(rand.NewPCG(seed, 99)), plane: seed%2 == 0}
	r.nodes = 3 + r.IntN(5)
	r.add("material steel = S275")
	r.add("section thin = tube 120 x 80 x 5 mm of steel")
	r.add("section stout = IPE 200 of steel")
	for i := range r.nodes {
		// A coarse grid with some play, so that no member is short.
		r.add("node n%d = %s m", i, r.vector(3*float64(i%3)+r.between(-0.8, 0.8), 2.5*float64(i%2)+r.between(-0.8, 0.8), 2.7*float64(i/3)+r.between(-0.8, 0.8)))
	}
	for i := 1; i < r.nodes; i++ {
		r.member(i, r.IntN(i), i)
	}
	for k := range r.IntN(3) {
		if a, b := r.IntN(r.nodes), r.IntN(r.nodes); a != b && !r.joined(a, b) {
			r.member(r.nodes+k, a, b)
		}
	}
	r.supports()
	r.cases()
	return r
}

func (r *randomModel) joined(a, b int) bool {
	for _, line := range r.lines {
		if strings.Contains(line, fmt.Sprintf("= n%d -> n%d", a, b)) || strings.Contains(line, fmt.Sprintf("= n%d -> n%d", b, a)) {
			return true
		}
	}
	return false
}

// member joins two nodes so that the second cannot fall off the first.
func (r *randomModel) member(name, a, b int) {
	section := []string{"thin", "stout"}[r.IntN(2)]
	head := fmt.Sprintf("beam m%d = n%d -> n%d of %s", name, a, b, section)
	switch r.IntN(8) {
	case 0:
		r.add("%s, joint My at n%d %.1f kNm/rad", head, b, r.between(500, 9000))
	case 1:
		r.add("%s, offset n%d %s m", head, a, r.vector(0.1, 0, 0.15))
	case 2:
		r.add("link m%d = n%d -> n%d", name, a, b)
	case 3:
		all := "along 9 kN/mm, across y 7 kN/mm, across z 8 kN/mm, about x 900 kNm/rad, about y 1200 kNm/rad, about z 1100 kNm/rad"
		if r.plane {
			all = "along 9 kN/mm, across z 8 kN/mm, about y 1200 kNm/rad"
		}
		r.add("spring m%d = n%d -> n%d, %s", name, a, b, all)
	case 4:
		r.add("%s, roll %.1f deg", head, map[bool]float64{true: 0, false: r.between(0, 90)}[r.plane])
	default:
		r.add("%s", head)
		r.beams = append(r.beams, [2]int{name, b})
	}
}

func (r *randomModel) supports() {
	r.add("support n0 fixed")
	last := r.nodes - 1
	switch r.IntN(4) {
	case 0:
		r.add("support n%d holds uz", last)
	case 1:
		r.add("support n%d spring uz %.1f kN/mm", last, r.between(1, 20))
	case 2:
		about := " about y"
		if r.plane {
			about = ""
		}
		r.add("support n%d holds ux, turned %.1f deg%s", last, r.between(5, 80), about)
	}
}

// cases writes one case of each sort of load, and combinations.
func (r *randomModel) cases() {
	node := 1 + r.IntN(r.nodes-1)
	var loads []string
	for _, b := range r.beams {
		name := fmt.Sprintf("m%d", b[0])
		loads = append(loads, fmt.Sprintf("    %s: %.2f kN/m down", name, r.between(-5, 5)))
		switch r.IntN(6) {
		case 0:
			loads = append(loads, fmt.Sprintf("    %s from 0.2 m to 0.9 m: 2 kN/m to 4 kN/m along local z", name))
		case 1:
			loads = append(loads, fmt.Sprintf("    %s at 0.7 m: %.2f kN along x", name, r.between(-9, 9)))
		case 2:
			loads = append(loads, fmt.Sprintf("    %s at 0.4 m: %.2f kNm about local y", name, r.between(-9, 9)))
		case 3:
			loads = append(loads, fmt.Sprintf("    %s: 30 K", name), fmt.Sprintf("    %s: 12 K across z", name))
		case 4:
			loads = append(loads, fmt.Sprintf("    %s: 2 mm", name))
		}
	}
	loads = append(loads, fmt.Sprintf("    n%d: %.2f kN down", node, r.between(1, 20)), fmt.Sprintf("    n%d: %.2f kNm about y", node, r.between(-9, 9)))
	r.add("case G permanent {\n    self-weight\n}")
	r.add("case Q imposed {\n%s\n}", strings.Join(loads, "\n"))
	r.add("case P imposed {\n    n%d: 1 kN along x\n}", node)
	r.add("case R imposed {\n    n%d: 1 kN down\n}", r.nodes-1)
	r.add("case D settlement {\n    n0: 3 mm down\n}")
	r.add("combination U = 1.35 G + 1.5 Q - 0.7 P")
}

func (r *randomModel) text(lines []string) string {
	kind := "space"
	if r.plane {
		kind = "plane"
	}
	return "model \"Random\" " + kind + ", shear flexible\n" + strings.Join(lines, "\n") + "\n"
}

// answered solves a text that must be a sound model.
func answered(t *testing.T, text string) *analysis.Results {
	t.Helper()
	m := resolve.Model(syntax.Parse(source.New("/random.span", text)), nil)
	require.True(t, m.Complete, "%v\n%s", m.Diagnostics, text)
	r, err := analysis.Run(context.Background(), m.Model, nil)
	require.NoError(t, err)
	if !r.Solved() && r.Diagnostics()[0].Name == "cannot-solve" && strings.Contains(r.Diagnostics()[0].Summary, "rigid links") {
		return nil // links that hold one body twice: refused with reason
	}
	require.True(t, r.Solved(), "%v\n%s", r.Diagnostics(), text)
	return r
}

// movementsOf are the movements of the nodes in all results, by name.
func movementsOf(r *analysis.Results) (all map[string][6]float64, scale [2]float64) {
	all = map[string][6]float64{}
	for i := range r.Len() {
		for n := range r.Model().Nodes {
			u := r.At(i).Movement(n)
			all[r.At(i).Name()+" "+r.Model().Nodes[n].Name] = u
			for f, v := range u {
				scale[f/3] = math.Max(scale[f/3], math.Abs(v))
			}
		}
	}
	return all, scale
}

// same holds the movements that two answers have in common against each other.
func same(t *testing.T, a, b *analysis.Results, what, text string) {
	t.Helper()
	y, _ := movementsOf(b)
	sameMovements(t, a, y, what, text)
}

func sameMovements(t *testing.T, a *analysis.Results, y map[string][6]float64, what, text string) {
	t.Helper()
	x, scale := movementsOf(a)
	for name, u := range x {
		v, both := y[name]
		if !both {
			continue
		}
		for f := range u {
			require.InDelta(t, u[f], v[f], 1e-8*scale[f/3]+1e-13, "%s: %s freedom %d\n%s", what, name, f, text)
		}
	}
}

// TestRandomModels holds a thousand random structures to what every right answer
// has: equilibrium; reciprocity (Betti and Maxwell); superposition; the same
// answer whatever the order of the statements, the units, the ends of members; at
// another place, turned about, formatted, and with a node put into a beam.
func TestRandomModels(t *testing.T) {
	count := uint64(1000)
	if testing.Short() {
		count = 60
	}
	refused := uint64(0)
	for seed := range count {
		r := newRandomModel(seed)
		text := r.text(r.lines)
		a := answered(t, text)
		if a == nil {
			refused++
			continue
		}
		for i := range a.Len() {
			require.Less(t, a.At(i).Equilibrium().Residual, 1e-9, "%s\n%s", a.At(i).Name(), text)
		}
		reciprocal(t, r, a, text)
		superposed(t, a, text)

		shuffled := append([]string(nil), r.lines...)
		r.Shuffle(len(shuffled), func(i, j int) { shuffled[i], shuffled[j] = shuffled[j], shuffled[i] })
		same(t, a, answered(t, r.text(shuffled)), "another order", text)
		same(t, a, answered(t, format.File(source.New("/random.span", r.text(r.moved())))), "another place, formatted", text)
		same(t, a, answered(t, r.text(r.swapped())), "swapped ends", text)
		same(t, a, answered(t, otherUnits.Replace(text)), "other units", text)
		sameMovements(t, a, turnedBack(answered(t, halfTurn(text))), "half a turn", text)
		if split, ok := r.split(); ok {
			same(t, a, answered(t, r.text(split)), "a node in a beam", text)
		}
	}
	require.Less(t, refused, count/10)
}

// reciprocal checks that the force of P moves the place of R, along the force of
// R, as far as the force of R moves the place of P along that of P.
func reciprocal(t *testing.T, r *randomModel, a *analysis.Results, text string) {
	t.Helper()
	at := func(name string) int {
		for i := range a.Model().Cases {
			if a.Model().Cases[i].Name == name {
				return a.Model().Cases[i].Loads[0].Node
			}
		}
		return -1
	}
	p, _ := a.Find("P")
	q, _ := a.Find("R")
	one, two := -p.Movement(at("R"))[2], q.Movement(at("P"))[0]
	_, scale := movementsOf(a)
	require.InDelta(t, one, two, 1e-8*scale[0]+1e-15, "not reciprocal\n%s", text)
}

// superposed checks the combination against the sum of its cases, in movements
// and in section forces.
func superposed(t *testing.T, a *analysis.Results, text string) {
	t.Helper()
	u, _ := a.Find("U")
	for n := range a.Model().Nodes {
		var sum [6]float64
		for _, f := range u.Factors() {
			for i, v := range a.Case(f.Case).Movement(n) {
				sum[i] += f.Factor * v
			}
		}
		require.InDeltaSlice(t, sum[:], vectorOf(u.Movement(n)), 1e-12, "not superposed\n%s", text)
	}
}

func vectorOf(v [6]float64) []float64 { return v[:] }

// otherUnits writes some quantities in other units of the same value.
var otherUnits = strings.NewReplacer(" kN/m ", " N/mm ", "3 mm down", "0.3 cm down", "2 mm\n", "0.2 cm\n", "120 x 80 x 5 mm", "12 x 8 x 0.5 cm", " kNm about", " kN*m about")

// swapped lets plain beams whose loads do not speak of places or member axes run
// the other way.
func (r *randomModel) swapped() []string {
	lines := append([]string(nil), r.lines...)
	text := strings.Join(lines, "\n")
	for _, b := range r.beams {
		name := fmt.Sprintf("m%d", b[0])
		if strings.Contains(text, name+" from") || strings.Contains(text, name+" at") {
			continue
		}
		for i, line := range lines {
			if rest, ok := strings.CutPrefix(line, "beam "+name+" = "); ok && !strings.Contains(rest, "roll") {
				f := strings.Fields(rest)
				f[0], f[2] = f[2], f[0]
				lines[i] = "beam " + name + " = " + strings.Join(f, " ")
			}
		}
	}
	return lines
}

var (
	position = regexp.MustCompile(`\(([-0-9.]+), ([-0-9.]+)(?:, ([-0-9.]+))?\)`)
	moment   = regexp.MustCompile(`([-0-9.]+) kNm about y`)
	turned   = regexp.MustCompile(`turned ([-0-9.]+) deg`)
)

// halfTurn turns a model by 180 degrees about the global z: x and y change sign,
// as do moments and turns about y. Member axes turn along.
func halfTurn(text string) string {
	text = position.ReplaceAllStringFunc(text, func(v string) string {
		p := position.FindStringSubmatch(v)
		if p[3] == "" {
			return "(" + negated(p[1]) + ", " + p[2] + ")"
		}
		return "(" + negated(p[1]) + ", " + negated(p[2]) + ", " + p[3] + ")"
	})
	text = moment.ReplaceAllStringFunc(text, func(v string) string { return negated(moment.FindStringSubmatch(v)[1]) + " kNm about y" })
	text = turned.ReplaceAllStringFunc(text, func(v string) string { return "turned " + negated(turned.FindStringSubmatch(v)[1]) + " deg" })
	return strings.ReplaceAll(text, "along x\n", "along -x\n")
}

func negated(number string) string {
	if rest, negative := strings.CutPrefix(number, "-"); negative {
		return rest
	}
	return "-" + number
}

// turnedBack are the movements of a model turned by halfTurn, turned back.
func turnedBack(r *analysis.Results) map[string][6]float64 {
	all, _ := movementsOf(r)
	for name, u := range all {
		all[name] = [6]float64{-u[0], -u[1], u[2], -u[3], -u[4], u[5]}
	}
	return all
}

// moved puts the whole structure somewhere else.
func (r *randomModel) moved() []string {
	lines := append([]string(nil), r.lines...)
	for i, line := range lines {
		if strings.HasPrefix(line, "node ") {
			lines[i] += " + " + r.vector(12, -7, 5) + " m"
		}
	}
	return lines
}

// split leads a plain beam through a node in its middle.
func (r *randomModel) split() ([]string, bool) {
	if len(r.beams) == 0 {
		return nil, false
	}
	name := fmt.Sprintf("beam m%d = ", r.beams[0][0])
	lines := append([]string(nil), r.lines...)
	for i, line := range lines {
		if rest, ok := strings.CutPrefix(line, name); ok {
			first, second, _ := strings.Cut(strings.Fields(rest)[0]+" "+strings.Fields(rest)[2], " ")
			lines[i] = strings.Replace(line, " -> ", " -> middle -> ", 1)
			return append(lines, fmt.Sprintf("node middle = (%s + %s)/2", first, second)), true
		}
	}
	return nil, false
}

// TestTheSameDigitsEveryTime solves the look-out with its tension-only bracing
// twice, and wants the same movements to the last digit.
func TestTheSameDigitsEveryTime(t *testing.T) {
	var first map[string][6]float64
	for range 2 {
		r, err := analysis.Run(context.Background(), resolveFile(t, "../testdata/models/lookout.span"), nil)
		require.NoError(t, err)
		all, _ := movementsOf(r)
		if first == nil {
			first = all
		}
		require.Equal(t, first, all)
	}
}
