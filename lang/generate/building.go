package generate

import (
	"fmt"
	"strings"
)

// Building is a space frame of columns and beams, clamped at the ground.
type Building struct{ Storeys, Bays, Rows int }

// Hundred, Thousand and TenThousand are buildings of about so many members.
var (
	Hundred     = Building{3, 3, 2}
	Thousand    = Building{7, 6, 7}
	TenThousand = Building{14, 14, 16}
)

// Members returns the number of members.
func (b Building) Members() int {
	columns := (b.Bays + 1) * (b.Rows + 1)
	beams := b.Bays*(b.Rows+1) + (b.Bays+1)*b.Rows
	return b.Storeys * (columns + beams)
}

// The lines of a building that benchmarks edit, each in it once.
const (
	LoadToEdit    = "9 kN/m down"
	SectionToEdit = "rect 100 x 200 mm"
)

// Text returns the building as a model with four load cases, twenty written
// combinations of a family and a limit.
func (b Building) Text() string {
	var t strings.Builder
	t.WriteString(`model "Building" space
material steel = { E 210 GPa, G 81 GPa, density 7850 kg/m3, yield 235 MPa }
section girder = ` + SectionToEdit + ` of steel
section post = rect 200 x 200 mm of steel
`)
	for storey := range b.Storeys + 1 {
		b.level(&t, storey)
	}
	t.WriteString("case G permanent {\n    self-weight\n}\ncase Q imposed B {\n")
	fmt.Fprintf(&t, "    x1_1_0: %s\n", LoadToEdit)
	for bay := 2; bay <= b.Bays; bay++ {
		fmt.Fprintf(&t, "    x1_%d_0: 7 kN/m down\n", bay)
	}
	fmt.Fprintf(&t, "}\ncase W wind {\n    n%d_0_0: 12 kN along x\n}\n", b.Storeys)
	fmt.Fprintf(&t, "case S snow {\n    n%d_%d_0: 7 kN down\n}\n", b.Storeys, b.Bays)
	for i := range 20 {
		f := float64(i)
		fmt.Fprintf(&t, "combination ULS.c%d = %g G + %g Q + %g W + %g S\n", i, 1+0.02*f, 1.5-0.05*f, 0.1*f-1, 0.07*f)
	}
	fmt.Fprintf(&t, "limit ux at n%d_0_0 <= 80 mm under ULS\n", b.Storeys)
	return t.String()
}

// level writes the nodes of a storey, and the columns and beams that end there.
func (b Building) level(t *strings.Builder, i int) {
	for j := range b.Bays + 1 {
		for k := range b.Rows + 1 {
			fmt.Fprintf(t, "node n%d_%d_%d = (%d, %d, %g) m\n", i, j, k, 5*j, 6*k, 3.5*float64(i))
			if i == 0 {
				fmt.Fprintf(t, "support n%d_%d_%d fixed\n", i, j, k)
				continue
			}
			fmt.Fprintf(t, "beam c%d_%d_%d = n%d_%d_%d -> n%d_%d_%d of post\n", i, j, k, i-1, j, k, i, j, k)
			if j > 0 {
				fmt.Fprintf(t, "beam x%d_%d_%d = n%d_%d_%d -> n%d_%d_%d of girder\n", i, j, k, i, j-1, k, i, j, k)
			}
			if k > 0 {
				fmt.Fprintf(t, "beam y%d_%d_%d = n%d_%d_%d -> n%d_%d_%d of girder\n", i, j, k, i, j, k-1, i, j, k)
			}
		}
	}
}
