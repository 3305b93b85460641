package feature

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/generate"
	"spanwright/lang/syntax"
)

// models are the demo models by their names.
func models(t testing.TB) []string {
	list, err := filepath.Glob("../../testdata/models/*.span")
	require.NoError(t, err)
	require.NotEmpty(t, list)
	return list
}

// What the demo models say, of the first statements of each kind: the goldens are
// read by an engineer.
func TestHoversOfTheModels(t *testing.T) {
	for _, name := range models(t) {
		base := strings.TrimSuffix(filepath.Base(name), ".span")
		if base == "lookout" {
			continue // it is the same on four sides: which one governs, rounding decides
		}
		t.Run(base, func(t *testing.T) {
			golden(t, "hover/"+base+".md", hovers(openFile(t, name)))
		})
	}
}

// hovers asks at each token of the first two statements of each kind, and of the
// first six loads, and writes each block of the
// answers once.
func hovers(d *desk) string {
	var b strings.Builder
	seen, statements := map[string]bool{}, map[syntax.Kind]int{}
	s := d.snapshot()
	tree, err := s.Tree(d.path)
	require.NoError(d.t, err)
	for i := range tree.Units {
		u := &tree.Units[i]
		statements[u.Statement.Kind]++
		if n := statements[u.Statement.Kind]; n > 6 || n > 2 && u.Statement.Kind != syntax.LoadKind {
			continue
		}
		for _, token := range syntax.Tokens(u.Statement.Text) {
			if token.Trivia() {
				continue
			}
			h, ok := HoverAt(context.Background(), s, d.path, u.Start+int(token.Start), HoverOptions{})
			var blocks []string
			for _, block := range strings.Split(h.Markdown, "\n\n") {
				if !seen[block] {
					seen[block] = true
					blocks = append(blocks, block)
				}
			}
			if !ok || len(blocks) == 0 {
				continue
			}
			line := tree.File.LineAt(u.Start)
			fmt.Fprintf(&b, "<!-- %s in line %d -->\n\n%s\n\n", tree.File.Slice(h.Span), line+1, strings.Join(blocks, "\n\n"))
		}
	}
	return b.String()
}

// A hover never shows numbers of another model without saying so, and none where
// there are none.
func TestHoverSaysWhoseNumbersItShows(t *testing.T) {
	d := open(t, "/shed.span", shed)
	// 0.1 m · 0.2 m · 7 m · 7850 kg/m3 · 9.80665 m/s2 = 10.8 kN.
	assert.Contains(t, d.hover("support |A fixed"), "10.8 ↑")
	assert.Contains(t, d.hover("support |A fixed"), "this version")

	d.edit("let high = 2 m + 1 m", "let high = 2 m + ")
	d.settle()
	assert.Contains(t, d.hover("support |A fixed"), "10.8 ↑")
	assert.Contains(t, d.hover("support |A fixed"), "Model incomplete: shown for the last version that solved")
	assert.Contains(t, d.hover("let |high"), "cannot be worked out")

	d.edit("let high = 2 m + ", "let high = 2 m + 1 m")
	d.edit("support A fixed", "support A pinned")
	d.settle()
	text := d.hover("support |A pinned")
	assert.NotContains(t, text, "10.8")
	assert.Contains(t, text, "No numbers: The structure can move without resistance")
}

func TestHoverOfValues(t *testing.T) {
	d := open(t, "/shed.span", shed+`
let a = (0, 3.2) m
let b = 12 kN/m2 * high
let e = 5 kN/m^2
let turn = 30 deg
let n = 3
case S snow { r from 0 m to length/2: 4 kN/m down }
`)
	for marked, want := range map[string]string{
		"(0, |3.2) m":           "320 cm",
		"|12 kN/m2":             "= 12000 Pa = 12 kPa",
		"12 |kN/m2":             "= 12000 Pa = 12 kPa",
		"12 kN/|m2 * high":      "= 12000 Pa = 12 kPa",
		"|5 kN/m^2":             "= 5000 Pa = 5 kPa",
		"let |b":                "36 kN/m",
		"|30 deg":               "0.5236 rad",
		"= 2 |m + 1 m":          "200 cm",
		"E |210 GPa":            "= 210000 MPa",
		"density |7850 kg":      "7.85 t/m3",
		"to |length/2":          "the member's length",
		"|4 kN/m down":          "4 N/mm",
		"4 kN/m |down":          "against global z",
		"S |snow":               "snow load",
		"|rect 100":             "second moment about y",
		"support A |fixed":      "holds all movements and turns",
		"|fixed":                "holds all",
		"model \"Shed\" |plane": "1 support",
	} {
		assert.Contains(t, d.hover(marked), want, marked)
	}
	assert.Empty(t, d.hover("let n = |3"), "a plain number says it all")
	assert.Empty(t, d.hover("let| high"), "a blank is nothing")
	assert.Empty(t, d.hover("# A |shed"))
	assert.Contains(t, d.hover("|4 kN/m down"), "Fz −8 kN ↓")
	assert.Contains(t, d.hover("|4 kN/m down"), "It acts at x = 1 m")
}

// The resultant of loads is what the solver puts on the structure.
func TestResultantIsThatOfTheSolver(t *testing.T) {
	for _, name := range models(t) {
		d := openFile(t, name)
		v, _ := d.snapshot().View(d.path)
		m := v.Resolved.Model
		for i := range m.Cases {
			got, want := resultant(m, m.Cases[i].Loads), v.Solution.Results.Case(i).Equilibrium().Applied
			assert.InDeltaSlice(t, want[:], got[:], 1e-9*(1+largest(want[:])), "%s, case %s", name, m.Cases[i].Name)
		}
	}
}

// The shares of a load add up to it.
func TestSupportsShareALoad(t *testing.T) {
	d := open(t, "/two.span", `model "Two" plane
material steel = S275
section joist = IPE 200 of steel
node A = (0, 0) m
node B = (6, 0) m
beam b = A -> B of joist
support A pinned
support B holds uz
case Q imposed B {
    b at 2 m: 9 kN down
    b: 1 kN/m down
}
`)
	text := d.hover("at 2 m: |9 kN")
	assert.Contains(t, text, "| A | 6 ↑ |", "9 kN · 4 m/6 m")
	assert.Contains(t, text, "| B | 3 ↑ |")
	assert.NotContains(t, text, "do not add up")
}

func TestLineOfAction(t *testing.T) {
	point, ok := lineOfAction([6]float64{0, 0, -10, 0, 30, 0})
	assert.True(t, ok)
	assert.Equal(t, [3]float64{3, 0, 0}, point, "10 down at x = 3 turns x toward −z, which is positive about y")
	_, ok = lineOfAction([6]float64{0, 0, -10, 0, 30, 5})
	assert.False(t, ok, "a wrench")
	_, ok = lineOfAction([6]float64{0, 0, 0, 0, 30, 5})
	assert.False(t, ok)
}

// BenchmarkHover measures hovers in settled models. Aim: below 10 ms for 10,000
// members.
func BenchmarkHover(b *testing.B) {
	for _, building := range []generate.Building{generate.Thousand, generate.TenThousand} {
		d := open(b, "/building.span", building.Text())
		for _, place := range []string{"node |n1_1_1 =", "|support n0_1_1 fixed", "beam |c1_1_1 =", "case |Q", "limit |ux", "|model", "x1_1_0: |9 kN"} {
			b.Run(fmt.Sprintf("%d/%s", building.Members(), strings.ReplaceAll(place, " ", "_")), func(b *testing.B) {
				at := d.at(place)
				for b.Loop() {
					_, ok := HoverAt(b.Context(), d.snapshot(), d.path, at, HoverOptions{})
					require.True(b, ok)
				}
			})
		}
	}
}

// BenchmarkHoverAfterEdit measures the first hover of a version: what is only
// made when it is asked for is made then.
func BenchmarkHoverAfterEdit(b *testing.B) {
	for _, place := range []string{"node |n1_1_1 =", "beam |c1_1_1 =", "x1_2_0: |7 kN"} {
		b.Run(strings.ReplaceAll(place, " ", "_"), func(b *testing.B) {
			d := open(b, "/building.span", generate.TenThousand.Text())
			at, n := d.at(place), 0
			for b.Loop() {
				b.StopTimer()
				d.edit([]string{"9 kN/m down", "8 kN/m down"}[n%2], []string{"9 kN/m down", "8 kN/m down"}[1-n%2])
				d.settle()
				n++
				b.StartTimer()
				_, ok := HoverAt(b.Context(), d.snapshot(), d.path, at, HoverOptions{})
				require.True(b, ok)
			}
		})
	}
}
