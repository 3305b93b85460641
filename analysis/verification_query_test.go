package analysis_test

import (
	"context"
	"math"
	"path/filepath"
	"slices"
	"testing"

	"github.com/stretchr/testify/require"

	"spanwright/analysis"
	"spanwright/lang/catalogue"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
)

// query says which result of a solved model is meant. Kind decides which of the
// other fields count.
type query struct {
	Kind      string
	Node      string     // reaction, movement of a node
	Section   string     // section: Component is A, Iy … mass
	Member    string     // force, movement along a member, extremes
	At        float64    // m from the member's first end
	Side      string     // "before" or "after" a jump at At; "" is after
	Component string     // Fx … Mz, ux … rz, or N … Mz
	Along     [3]float64 // instead of Component: a direction, global
	Which     string     // "max" or "min"
}

// models are those that have been solved, by file name.
type models struct {
	t      *testing.T
	folder string
	known  map[string]*solvedModel
}

// solvedModel is a model with its results, or with the reason why it has none.
type solvedModel struct {
	model    *model.Model
	results  *analysis.Results
	problems []diagnostic.Diagnostic
}

func (s *models) get(name string) *solvedModel {
	if known, ok := s.known[name]; ok {
		return known
	}
	m := solveFile(s.t, filepath.Join(s.folder, name))
	s.known[name] = m
	return m
}

// solveFile reads, resolves and solves a model file. A file with errors fails
// the test.
func solveFile(t *testing.T, path string) *solvedModel {
	t.Helper()
	m := resolveFile(t, path)
	results, err := analysis.Run(context.Background(), m, nil)
	require.NoError(t, err, path)
	return &solvedModel{model: m, results: results, problems: results.Diagnostics()}
}

// value returns the engine's answer to an expectation, in the expectation's unit.
func (s *models) value(t *testing.T, e expectation) float64 {
	t.Helper()
	m := s.get(e.Model)
	if e.Query.Kind == "accepted" {
		if m.results.Solved() {
			return 1
		}
		require.True(t, slices.ContainsFunc(m.problems, func(d diagnostic.Diagnostic) bool { return d.Name == "mechanism" }),
			"%s is refused, but not as a mechanism: %v", e.Model, m.problems)
		return 0
	}
	var got float64
	if e.Query.Kind == "section" {
		got = m.sectionProperty(t, *e.Query)
	} else {
		require.True(t, m.results.Solved(), "%s has no results: %v", e.Model, m.problems)
		got = m.ask(t, m.find(t, e), *e.Query)
	}
	if e.Per != 0 {
		got /= e.Per
	}
	return got
}

func (m *solvedModel) find(t *testing.T, e expectation) analysis.Result {
	t.Helper()
	if e.Family != "" {
		return m.findByFactors(t, e)
	}
	name := e.Case
	if e.Combination != "" {
		name = e.Combination
	}
	result, ok := m.results.Find(name)
	require.True(t, ok, "%s has no case or combination %s", e.Model, name)
	require.Empty(t, result.Problem(), "%s, %s", e.Model, name)
	return result
}

// findByFactors returns the combination of a family that takes just the cases of
// the expectation, each by its factor.
func (m *solvedModel) findByFactors(t *testing.T, e expectation) analysis.Result {
	t.Helper()
	family := slices.IndexFunc(m.model.Families, func(f model.Family) bool { return f.Name == e.Family })
	require.GreaterOrEqual(t, family, 0, "%s has no family %s", e.Model, e.Family)
	set := m.results.Combinations()
	var known []string
	for _, i := range set.Families[family] {
		known = append(known, set.All[i].Words(m.model))
		if m.sameFactors(set.All[i].Factors, e.Factors) {
			return m.results.Combination(i)
		}
	}
	require.Fail(t, "no such combination", "%v is not among those of %s: %v", e.Factors, e.Family, known)
	return analysis.Result{}
}

func (m *solvedModel) sameFactors(got []model.Factor, want map[string]float64) bool {
	if len(got) != len(want) {
		return false
	}
	for _, f := range got {
		if w, ok := want[m.model.Cases[f.Case].Name]; !ok || math.Abs(w-f.Factor) > 1e-12 {
			return false
		}
	}
	return true
}

// ask returns one number of a result, SI.
func (m *solvedModel) ask(t *testing.T, r analysis.Result, q query) float64 {
	t.Helper()
	switch q.Kind {
	case "reaction":
		return q.pick(t, r.Reaction(m.node(t, q.Node)), reactions)
	case "movement":
		if q.Node != "" {
			return q.pick(t, r.Movement(m.node(t, q.Node)), movements)
		}
		return q.pick(t, r.Member(m.member(t, q.Member)).Movement(q.At), movements)
	case "force":
		at := q.At
		if q.Side == "before" {
			at = math.Nextafter(at, 0) - justBefore*r.Member(m.member(t, q.Member)).Length()
		}
		return r.Member(m.member(t, q.Member)).Force(sectionForce(t, q.Component), max(at, 0))
	case "extreme":
		return m.extreme(t, r, q).Value
	case "place of extreme":
		return m.extreme(t, r, q).At
	}
	require.Fail(t, "unknown kind of query", q.Kind)
	return math.NaN()
}

// justBefore is the step back from a jump, as a share of the length: far above
// the rounding of a place, and far below what a course changes by.
const justBefore = 1e-12

var (
	reactions = []string{"Fx", "Fy", "Fz", "Mx", "My", "Mz"}
	movements = []string{"ux", "uy", "uz", "rx", "ry", "rz"}
	forces    = []string{"N", "Vy", "Vz", "T", "My", "Mz"}
)

// pick returns a component by its name, or the one along a direction.
func (q query) pick(t *testing.T, values [6]float64, names []string) float64 {
	t.Helper()
	if q.Component == "" {
		require.NotZero(t, q.Along)
		return values[0]*q.Along[0] + values[1]*q.Along[1] + values[2]*q.Along[2]
	}
	i := slices.Index(names, q.Component)
	require.GreaterOrEqual(t, i, 0, q.Component)
	return values[i]
}

func sectionForce(t *testing.T, name string) analysis.Quantity {
	t.Helper()
	i := slices.Index(forces, name)
	require.GreaterOrEqual(t, i, 0, name)
	return []analysis.Quantity{analysis.N, analysis.Vy, analysis.Vz, analysis.T, analysis.My, analysis.Mz}[i]
}

// extreme returns the largest or smallest value along a member as the engine
// finds it. The extreme of uz is that of the departure from the chord: the cases
// ask for it on level members whose ends do not move up or down.
func (m *solvedModel) extreme(t *testing.T, r analysis.Result, q query) analysis.Extreme {
	t.Helper()
	index := m.member(t, q.Member)
	along := r.Member(index)
	var most, least analysis.Extreme
	var known bool
	if q.Component == "uz" {
		require.Equal(t, [3]float64{0, 0, 1}, m.model.MemberAxes(index)[2], "%s is not level", q.Member)
		for _, end := range []float64{0, along.Length()} {
			require.InDelta(t, 0, along.Movement(end)[2], 1e-15, "an end of %s moves", q.Member)
		}
		most, least, known = along.Sag(2)
	} else {
		most, least, known = along.Range(sectionForce(t, q.Component))
	}
	require.True(t, known)
	if q.Which == "max" {
		return most
	}
	require.Equal(t, "min", q.Which)
	return least
}

// sectionProperty returns a property of a section, SI, by its trade symbol.
func (m *solvedModel) sectionProperty(t *testing.T, q query) float64 {
	t.Helper()
	i := slices.IndexFunc(m.model.Sections, func(s model.Section) bool { return s.Name == q.Section })
	require.GreaterOrEqual(t, i, 0, "no section %s", q.Section)
	s := &m.model.Sections[i]
	if q.Component == "Avz" || q.Component == "Avy" {
		return catalogueShearArea(t, s, q.Component)
	}
	property, ok := map[string]float64{
		"A": s.A, "Iy": s.Iy, "Iz": s.Iz, "It": s.It, "Iw": s.Iw, "Wely": s.Wy, "Welz": s.Wz, "Wply": s.Wply, "Wplz": s.Wplz,
		"iy": math.Sqrt(s.Iy / s.A), "iz": math.Sqrt(s.Iz / s.A),
	}[q.Component]
	require.True(t, ok, "no property %s", q.Component)
	return property
}

// catalogueShearArea returns the shear area that a handbook prints, that for
// resistance. A model's section holds the elastic one, for deformation.
func catalogueShearArea(t *testing.T, s *model.Section, component string) float64 {
	t.Helper()
	rolled, ok := catalogue.Find(s.Series, s.Size)
	require.True(t, ok, "%s is not in the catalogue", s.Title)
	if component == "Avy" {
		return rolled.Avy
	}
	return rolled.Avz
}

func (m *solvedModel) node(t *testing.T, name string) int {
	t.Helper()
	i := slices.IndexFunc(m.model.Nodes, func(n model.Node) bool { return n.Name == name })
	require.GreaterOrEqual(t, i, 0, "no node %s", name)
	return i
}

func (m *solvedModel) member(t *testing.T, name string) int {
	t.Helper()
	i := slices.IndexFunc(m.model.Members, func(b model.Member) bool { return b.Name == name })
	require.GreaterOrEqual(t, i, 0, "no member %s", name)
	return i
}
