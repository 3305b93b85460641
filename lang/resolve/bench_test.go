package resolve

import (
	"fmt"
	"runtime"
	"strings"
	"testing"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// bigModel returns a plane girder frame of about n statements: nodes, beams,
// supports and loads.
func bigModel(n int) string {
	var b strings.Builder
	b.WriteString("model \"Big\" plane\nmaterial steel = S275\nsection sec = IPE 300 of steel\nlet h = 3 m\nlet w = 4 m\n")
	cells := n / 4
	for i := range cells {
		fmt.Fprintf(&b, "node n%d = (%d w, %d h)\n", i, i%50, i/50)
	}
	for i := range cells {
		if i%50 > 0 {
			fmt.Fprintf(&b, "beam b%d = n%d -> n%d of sec\n", i, i-1, i)
		}
		if i >= 50 {
			fmt.Fprintf(&b, "beam c%d = n%d -> n%d of sec, hinge at n%d\n", i, i-50, i, i)
		} else {
			fmt.Fprintf(&b, "support n%d pinned\n", i)
		}
	}
	b.WriteString("case G permanent {\n    self-weight\n")
	for i := range cells {
		if i%50 > 0 {
			fmt.Fprintf(&b, "    b%d from 0 m to length/2: %d kN/m down\n", i, i%9+1)
		}
	}
	b.WriteString("}\n")
	return b.String()
}

func BenchmarkFreshResolve(b *testing.B) {
	tree := syntax.Parse(source.New("big.span", bigModel(10_000)))
	b.ReportAllocs()
	for b.Loop() {
		if r := Model(tree, nil); len(r.Diagnostics) > 0 {
			b.Fatal(r.Diagnostics[0])
		}
	}
	b.ReportMetric(float64(len(tree.Units))*float64(b.N)/b.Elapsed().Seconds(), "statements/s")
}

func BenchmarkParseAndResolve(b *testing.B) {
	text := bigModel(10_000)
	statements := 0
	for b.Loop() {
		tree := syntax.Parse(source.New("big.span", text))
		Model(tree, nil)
		statements = len(tree.Units)
	}
	b.ReportMetric(float64(statements)*float64(b.N)/b.Elapsed().Seconds(), "statements/s")
}

// BenchmarkOneLineEdit types into one line in the middle of a 10,000-statement
// model; the time runs from the new text to the new diagnostics.
func BenchmarkOneLineEdit(b *testing.B) {
	for _, edit := range []struct{ name, line, a, z string }{
		{"load", "    b1201 from 0 m to length/2: 5 kN/m down\n", "5 kN/m", "7 kN/m"},
		{"node", "node n1201 = (1 w, 24 h)\n", "1 w,", "1.1 w,"},
		{"beam", "beam b1201 = n1200 -> n1201 of sec\n", "of sec", "of sec, hinge at n1200"},
		{"error", "beam b1201 = n1200 -> n1201 of sec\n", "of sec", "of q"},
	} {
		b.Run(edit.name, func(b *testing.B) {
			first := bigModel(10_000)
			if !strings.Contains(first, edit.line) {
				b.Fatal("the line is not there")
			}
			second := strings.Replace(first, edit.line, strings.Replace(edit.line, edit.a, edit.z, 1), 1)
			tree := syntax.Parse(source.New("big.span", first))
			session := NewSession()
			session.Update(tree, nil)
			texts := []string{second, first}
			i := 0
			b.ReportAllocs()
			for b.Loop() {
				tree = tree.Reparse(source.New("big.span", texts[i%2]))
				session.Update(tree, nil)
				i++
			}
		})
	}
}

func BenchmarkMemory(b *testing.B) {
	text := bigModel(10_000)
	for b.Loop() {
		var before, after runtime.MemStats
		runtime.GC()
		runtime.ReadMemStats(&before)
		tree := syntax.Parse(source.New("big.span", text))
		session := NewSession()
		r := session.Update(tree, nil)
		runtime.GC()
		runtime.ReadMemStats(&after)
		b.ReportMetric(float64(after.HeapAlloc-before.HeapAlloc)/float64(len(tree.Units)), "B/statement")
		runtime.KeepAlive(r)
		runtime.KeepAlive(session)
	}
}
