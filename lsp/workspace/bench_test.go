package workspace

import (
	"fmt"
	"strings"
	"testing"
	"time"

	"spanwright/lang/generate"
	"spanwright/lang/source"
)

// BenchmarkKeystroke measures from an edit to the solution that belongs to it,
// for a change of a load and of a section's size.
func BenchmarkKeystroke(b *testing.B) {
	for _, building := range []generate.Building{generate.Hundred, generate.Thousand, generate.TenThousand} {
		text := building.Text()
		for _, edit := range []struct{ name, old, one, two string }{
			{"load", generate.LoadToEdit, generate.LoadToEdit, "8 kN/m down"},
			{"section", generate.SectionToEdit, generate.SectionToEdit, "rect 110 x 200 mm"},
		} {
			b.Run(fmt.Sprintf("%d/%s", building.Members(), edit.name), func(b *testing.B) {
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
