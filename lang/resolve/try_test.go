package resolve

import (
	"fmt"
	"os"
	"path/filepath"
	"testing"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

type disk struct{}

func (disk) Load(p string) (*syntax.Tree, error) {
	b, err := os.ReadFile(p)
	if err != nil {
		return nil, err
	}
	return syntax.Parse(source.New(p, string(b))), nil
}

func TestTry(t *testing.T) {
	files, _ := filepath.Glob("../../testdata/*/*.span")
	more, _ := filepath.Glob("../../testdata/*/*/*.span")
	n := 0
	for _, p := range append(files, more...) {
		b, _ := os.ReadFile(p)
		r := Model(syntax.Parse(source.New(p, string(b))), disk{})
		n++
		for _, d := range r.Diagnostics {
			f := source.New("", "")
			for _, tr := range r.Trees {
				if tr.File.Path == d.File {
					f = tr.File
				}
			}
			fmt.Printf("%s:%v %s [%s]: %s\n", d.File, f.Position(d.Subject.Start), d.Severity, d.Name, d.Summary)
		}
	}
	fmt.Println(n)
}
