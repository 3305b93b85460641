package syntax

import (
	"fmt"
	"strings"
	"testing"

	"spanwright/lang/source"
)

// long returns a model of some 10,000 statements.
func long() string {
	var b strings.Builder
	b.WriteString("model \"Long\" plane\nmaterial s = S275\nsection c = IPE 300 of s\n")
	for i := range 3330 {
		fmt.Fprintf(&b, "node N%d = (%d m, 3.5 m + %d mm)\n", i, i, i%7)
	}
	for i := range 3330 {
		fmt.Fprintf(&b, "beam b%d = N%d -> N%d of c, hinge at N%d\n", i, i, (i+1)%3330, i)
	}
	b.WriteString("case G permanent {\n")
	for i := range 3330 {
		fmt.Fprintf(&b, "    b%d from 0 m to length/2: 3.5 kN/m2 * 2.4 m down on plan\n", i)
	}
	b.WriteString("}\n")
	return b.String()
}

func BenchmarkParse(b *testing.B) {
	text := long()
	n := len(Parse(source.New("l.span", text)).Units)
	b.ReportAllocs()
	for b.Loop() {
		Parse(source.New("l.span", text))
	}
	b.ReportMetric(float64(b.Elapsed().Nanoseconds())/float64(b.N)/float64(n), "ns/statement")
}

func BenchmarkOneLineEdit(b *testing.B) {
	text := long()
	at := strings.Index(text, "N1500 = (1500")
	tree := Parse(source.New("l.span", text))
	edited := [2]*source.File{source.New("l.span", text), source.New("l.span", text[:at+9]+"7"+text[at+9:])}
	i := 0
	for b.Loop() {
		i++
		tree = tree.Reparse(edited[i%2])
	}
}
