package resolve

import (
	"fmt"
	"slices"
	"strings"
	"testing"

	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// shelf is a loader of texts held in memory, read again only when they change.
type shelf struct {
	texts map[string]string
	trees map[string]*syntax.Tree
}

func (s *shelf) Load(path string) (*syntax.Tree, error) {
	text, ok := s.texts[path]
	if !ok {
		return nil, fmt.Errorf("there is no %s", path)
	}
	if tree := s.trees[path]; tree != nil {
		if tree.File.Text == text {
			return tree, nil
		}
		s.trees[path] = tree.Reparse(source.New(path, text))
		return s.trees[path], nil
	}
	s.trees[path] = syntax.Parse(source.New(path, text))
	return s.trees[path], nil
}

// lineDraw draws a line of a model from few names, so that names are missing,
// doubled, circular and of the wrong kind often enough.
func lineDraw() *rapid.Generator[string] {
	return rapid.Custom(func(t *rapid.T) string {
		pick := func(list ...string) string { return rapid.SampledFrom(list).Draw(t, "pick") }
		value := func() string {
			return pick("a", "b", "2 m", "3 m", "a + b", "2 a", "b/2", "c", "1 kN", "A", "(B - A)", "5", "0", "a + 1 kN", "hypot(a, b)", "nn", "1 mm")
		}
		node := func() string { return pick("A", "B", "C", "D", "E", "F1.P", "F1.Q", "F2.P", "Z") }
		switch rapid.IntRange(0, 22).Draw(t, "kind") {
		case 0, 1:
			return "let " + pick("a", "b", "c", "A", "m2") + " = " + value()
		case 2, 3, 4, 5:
			return "node " + pick("A", "B", "C", "D", "E") + " = " + pick("(0, 0) m", "(4, 0) m", "(4 m, a)", "A + (a, b)", "(0, 3) m", "B + (1, 0) m", "(2, 0) m", "(A + B)/2", "D", "(1, 2)", "(4, 3) m", "E + (1, 1) m")
		case 6, 7, 8, 9:
			return pick("beam ", "bar ", "link ", "beam ") + pick("m1", "m2", "m3", "r", "A") + " = " + node() + " -> " + node() + pick("", " -> "+node()) + pick("", " of sec", " of sec", " of q", " of sec, hinge at A", " of sec, roll 90 deg", " of sec, tension only", " of sec, offset A (0, 0.1) m")
		case 10:
			return "section " + pick("sec", "q") + " = " + pick("IPE 300 of steel", "{ A 10 cm2 } of steel", "rect 100 x 200 mm of steel", "IPE 310 of wood", "{ A 10 cm2, Iy 100 cm4 } of wood")
		case 11:
			return "material " + pick("steel", "wood") + " = " + pick("S275", "{ E 210 GPa, poisson 0.3 }", "S276", "{ E 11 GPa, density 500 kg/m3, yield 20 MPa }", "{ E a }")
		case 12:
			return "support " + node() + pick(" pinned", " fixed", " holds uz", " spring uz 3 kN/mm", ", up only", " holds uy", " pinned, turned 30 deg")
		case 13:
			return "case " + pick("G", "S", "W") + pick(" permanent {", " snow {", " wind \"t\" {", " {")
		case 14, 15, 16, 17:
			return "    " + pick("m1", "m2", "A", "r, m1", "g", "self-weight", "m3 at a", "m1 from 0 m to length/2", "F1.x", "m1 at length") + pick(": 3 kN/m down", ": 3 kN down", ": 2 kNm about y", ": 20 K", ": 3 kN/m down on plan", ": a down", "", ": 10 K across z")
		case 18:
			return "}"
		case 19:
			return "group " + pick("g", "h") + " = " + pick("m1", "m1, m2", "h, m3", "g", "A")
		case 20:
			return pick("combination U = 1.35 G + 1.5 S", "combination U.a = G + W", "family ULS by EN1990 strength", "alternate S, W", "combination U = a G", "limit deflection of m1 <= length/250 under G", "limit stress of all <= yield under ULS", "limit uz at A <= a under G, U", "limit reaction Fz at A >= 0 kN under ULS.G", "use \"lib.span\"", "mass A 5 kg")
		case 21:
			return pick("part f(w, h) {", "part f(w) {", "part g {", "place F1 = f(4 m, 3 m) at (10, 0) m", "place F1 = f(a, b)", "place F2 = f(1 m, 2 m) at A, turned 90 deg", "node P = (0, 0) m", "node Q = (w, h)", "beam x = P -> Q of sec", "place F3 = g")
		}
		return pick("# a comment", "", "model \"T\" plane", "model \"T\" space", "show kN, m", "nonsense", "let = 3", "node A = (0, 0")
	})
}

var librarySample = []string{"material steel = S275", "section q = IPE 200 of steel", "section sec = HEA 100 of steel\nlet b = 5 m", "let a = a + 1 m", "material steel = S9", "model \"x\" plane", "use \"lib.span\"", "node L = (0, 9) m", "let c = 2 m\n\n"}

// TestIncrementalEqualsFresh edits a model at random; after every edit the
// session's result must be what a fresh resolution gives.
func TestIncrementalEqualsFresh(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		lines := append([]string{"model \"T\" plane", "material steel = S275", "section sec = IPE 300 of steel"}, rapid.SliceOfN(lineDraw(), 0, 40).Draw(t, "lines")...)
		loader := &shelf{texts: map[string]string{}, trees: map[string]*syntax.Tree{}}
		session := NewSession()
		tree := syntax.Parse(source.New("dir/main.span", strings.Join(lines, "\n")))
		session.Update(tree, loader)
		for range rapid.IntRange(1, 12).Draw(t, "edits") {
			for range rapid.IntRange(1, 3).Draw(t, "changes") {
				at := rapid.IntRange(0, len(lines)).Draw(t, "at")
				switch rapid.IntRange(0, 5).Draw(t, "edit") {
				case 0, 1:
					lines = slices.Insert(slices.Clone(lines), at, lineDraw().Draw(t, "line"))
				case 2:
					if at < len(lines) {
						lines = slices.Delete(slices.Clone(lines), at, at+1)
					}
				case 3:
					if at < len(lines) {
						lines = slices.Clone(lines)
						lines[at] = lineDraw().Draw(t, "line")
					}
				case 4:
					if at+1 < len(lines) {
						lines = slices.Clone(lines)
						lines[at], lines[at+1] = lines[at+1], lines[at]
					}
				case 5:
					if rapid.Bool().Draw(t, "gone") {
						delete(loader.texts, "dir/lib.span")
					} else {
						loader.texts["dir/lib.span"] = strings.Join(rapid.SliceOfN(rapid.SampledFrom(librarySample), 0, 4).Draw(t, "library"), "\n")
					}
				}
			}
			text := strings.Join(lines, "\n")
			tree = tree.Reparse(source.New("dir/main.span", text))
			got := session.Update(tree, loader)
			want := Model(syntax.Parse(source.New("dir/main.span", text)), &shelf{texts: loader.texts, trees: map[string]*syntax.Tree{}})
			require.Equal(t, want.Diagnostics, got.Diagnostics, "%s", text)
			for _, m := range []*Result{want, got} {
				m.Model.Files = nil
			}
			require.Equal(t, want.Model, got.Model, "%s", text)
			require.Equal(t, want.Complete, got.Complete)
		}
	})
}
