package feature

import (
	"context"
	"fmt"
	"path/filepath"
	"strings"
	"sync"
	"testing"
	"time"

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

// Of a limit in a part the worst place is shown, of a group the member whose
// stress takes most of its strength, of one bar no bending.
func TestHoverShowsTheWorst(t *testing.T) {
	d := open(t, "/masts.span", `model "Masts" plane
material steel = S355
material oak = { E 10 GPa, G 0.6 GPa, density 700 kg/m3, yield 10 MPa }
section tube = pipe 100 x 5 mm of steel
section pole = rect 100 x 100 mm of oak
part mast(high) {
    node foot = (0, 0) m
    node top = (0 m, high)
    beam stem = foot -> top of tube
    support foot fixed
    limit deflection of stem <= 100 mm under Q
    limit ux at top <= 50 mm under Q
}
place low = mast(2 m) at (0, 0) m
place tall = mast(4 m) at (5, 0) m
node A = (0, 10) m
node B = (3, 10) m
bar post = A -> B of pole
support A pinned
support B holds uz
group all_of_it = low.stem, post
case Q imposed B {
    low.top: 1 kN along x
    tall.top: 1 kN along x
    B: 20 kN along x
}
`)
	require.True(t, d.settle().Resolved.Complete)
	// u = F h³/3EI with I of the pipe 168.8 cm4: 64/3·1e3/(210e9·168.8e-8) = 60.2 mm.
	assert.Contains(t, d.hover("|limit ux at top"), "**Broken**")
	assert.Contains(t, d.hover("|limit ux at top"), "| ux at tall.top | 60.2 mm |")
	assert.Contains(t, d.hover("part |mast"), "2 places: low, tall")
	assert.Contains(t, d.hover("mast(|high)"), "parameter of part mast, 2 m in low")
	// The steel has 59.2 MPa of 355, the oak 20 kN/100 cm2 = 2 MPa of 10.
	assert.Contains(t, d.hover("group |all_of_it"), "| stress | 2 MPa | post, at A | `Q` | 20 % of yield |")
	assert.NotContains(t, d.hover("bar |post"), "My |")
	assert.Contains(t, d.hover("bar |post"), "| N | 20 kN |")
}

// Hovers and hints may be asked for at the same time, while models are solved.
func TestTogether(t *testing.T) {
	d := openFile(t, "../../testdata/models/slipway.span")
	var all sync.WaitGroup
	for k := range 4 {
		all.Go(func() {
			for n := range 15 {
				s := d.snapshot()
				tree, err := s.Tree(d.path)
				if assert.NoError(t, err) {
					everything(s, d.path, (k*997+n*313)%len(tree.File.Text))
				}
			}
		})
	}
	for n := range 10 {
		d.edit([]string{"let clear   = 6 m", "let clear   = 7 m"}[n%2], []string{"let clear   = 6 m", "let clear   = 7 m"}[1-n%2])
		time.Sleep(5 * time.Millisecond)
	}
	all.Wait()
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
