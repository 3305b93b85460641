package workspace

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"spanwright/lang/source"
)

// building is a space frame of storeys, bays and rows with twenty combinations.
func building(storeys, bays, rows int) string {
	var b strings.Builder
	b.WriteString(`model "Building" space
material steel = { E 210 GPa, G 81 GPa, density 7850 kg/m3, yield 235 MPa }
section plank = rect 100 x 200 mm of steel
section post = rect 200 x 200 mm of steel
`)
	for i := range storeys + 1 {
		for j := range bays + 1 {
			for k := range rows + 1 {
				fmt.Fprintf(&b, "node n%d_%d_%d = (%d, %d, %g) m\n", i, j, k, 5*j, 6*k, 3.5*float64(i))
				if i == 0 {
					fmt.Fprintf(&b, "support n%d_%d_%d fixed\n", i, j, k)
					continue
				}
				fmt.Fprintf(&b, "beam c%d_%d_%d = n%d_%d_%d -> n%d_%d_%d of post\n", i, j, k, i-1, j, k, i, j, k)
				if j > 0 {
					fmt.Fprintf(&b, "beam x%d_%d_%d = n%d_%d_%d -> n%d_%d_%d of plank\n", i, j, k, i, j-1, k, i, j, k)
				}
				if k > 0 {
					fmt.Fprintf(&b, "beam y%d_%d_%d = n%d_%d_%d -> n%d_%d_%d of plank\n", i, j, k, i, j, k-1, i, j, k)
				}
			}
		}
	}
	b.WriteString("case G permanent {\n    self-weight\n}\ncase Q imposed B {\n")
	for j := 1; j <= bays; j++ {
		fmt.Fprintf(&b, "    x1_%d_0: 9 kN/m down\n", j)
	}
	fmt.Fprintf(&b, "}\ncase W wind {\n    n%d_0_0: 12 kN along x\n}\ncase S snow {\n    n%d_%d_0: 7 kN down\n}\n", storeys, storeys, bays)
	for i := range 20 {
		fmt.Fprintf(&b, "combination ULS.c%d = %g G + %g Q + %g W + %g S\n", i, 1+0.02*float64(i), 1.5-0.05*float64(i), 0.1*float64(i)-1, 0.07*float64(i))
	}
	b.WriteString("family ULS by EN1990 strength\n")
	fmt.Fprintf(&b, "limit ux at n%d_0_0 <= 80 mm under ULS\n", storeys)
	return b.String()
}

// BenchmarkKeystroke measures from an edit to the solution that belongs to it,
// for a change of a load and of a section's size.
func BenchmarkKeystroke(b *testing.B) {
	for _, size := range []struct{ storeys, bays, rows int }{{3, 3, 2}, {7, 6, 7}, {14, 14, 16}} {
		text := building(size.storeys, size.bays, size.rows)
		members := strings.Count(text, "\nbeam ")
		for _, edit := range []struct{ name, old, one, two string }{
			{"load", "9 kN/m down", "9 kN/m down", "8 kN/m down"},
			{"section", "rect 100 x 200 mm", "rect 100 x 200 mm", "rect 110 x 200 mm"},
		} {
			b.Run(fmt.Sprintf("%d/%s", members, edit.name), func(b *testing.B) {
				solved := make(chan string, 1000)
				w := New(hasty(), Events{Solved: func(m string) { solved <- m }})
				defer w.Close()
				w.Open("/m.span", 1, text)
				<-solved
				v, _ := w.Snapshot().View("/m.span")
				if v.State != Current {
					b.Fatal(v.Words(), v.Resolved.Diagnostics)
				}
				at := strings.Index(text, edit.old)
				n := int32(1)
				b.ResetTimer()
				for b.Loop() {
					n++
					d, _ := w.Snapshot().Document("/m.span")
					by := edit.one
					if n%2 == 0 {
						by = edit.two
					}
					w.Change("/m.span", n, []Replacement{{From: d.File.Point(at, source.UTF16), To: d.File.Point(at+len(edit.old), source.UTF16), Text: by}}, source.UTF16)
					for {
						<-solved
						if v, _ = w.Snapshot().View("/m.span"); v.State == Current {
							break
						}
					}
				}
				b.ReportMetric(float64(v.Solution.Took)/float64(time.Millisecond), "solve-ms")
			})
		}
	}
}
