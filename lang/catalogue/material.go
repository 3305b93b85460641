package catalogue

import (
	"slices"
	"strings"
	"sync"
)

// Material is a grade of a standard.
type Material struct {
	Grade  string // as the standard writes it: "S275", "C30/37", "GL24h", "6082-T6"
	Title  string // "structural steel S275"
	Kind   Kind
	Source string // the standard and its table

	E         float64 // Pa, mean modulus of elasticity, along the grain for timber
	G         float64 // Pa, shear modulus
	Density   float64 // kg/m3, mean, for self-weight
	Expansion float64 // 1/K, coefficient of linear thermal expansion; along the grain for timber

	// Yield is the characteristic strength that a limit on stress compares with,
	// Pa. YieldNote says which one it is.
	Yield     float64
	YieldNote string

	// Strengths are further characteristic values that the standard gives.
	Strengths []Strength
	// Steps are the yield strengths by thickness, thin first; nil where the
	// standard has no steps. Yield is that of the first.
	Steps []ThicknessStep
	// Notes say in words what a reader should know.
	Notes []string
}

// Poisson is the ratio that belongs to E and G of an isotropic material:
// E/2G − 1. For timber, which is not isotropic, it has no meaning.
func (m *Material) Poisson() float64 { return m.E/(2*m.G) - 1 }

// Strength is one characteristic value of a material.
type Strength struct {
	Symbol string  // fu, fck, ft,0,k
	Name   string  // in words
	Value  float64 // Pa
}

// ThicknessStep is the strength of steel up to a thickness.
type ThicknessStep struct {
	UpTo     float64 // m, nominal thickness, included
	Yield    float64 // Pa
	Ultimate float64 // Pa
}

// Kind is what a material is made of.
type Kind int

// The kinds of material.
const (
	Steel Kind = iota
	Concrete
	Timber
	Aluminium
)

// String returns the word for the kind.
func (k Kind) String() string { return [...]string{"steel", "concrete", "timber", "aluminium"}[k] }

// grades holds the materials in the order of their standards, and where to find
// them by folded name.
var grades = sync.OnceValue(func() (g struct {
	list   []Material
	byName map[string]int
}) {
	g.list = slices.Concat(europeanSteels(), americanSteels(), concretes(), timbers(), aluminiums())
	g.byName = map[string]int{}
	for i, m := range g.list {
		g.byName[foldGrade(m.Grade)] = i
	}
	return g
})

// foldGrade brings the spellings of a grade together: no blanks, hyphens or
// underscores, case aside.
func foldGrade(text string) string {
	name := strings.ToUpper(strings.NewReplacer(" ", "", "-", "", "_", "", "\t", "").Replace(text))
	return strings.TrimPrefix(name, "ENAW")
}

// FindGrade returns a material by its grade: "S275", "c30/37", "GL 24h",
// "EN-AW 6082-T6". C24 is timber and C25/30 concrete: a concrete grade has both
// its numbers.
func FindGrade(text string) (Material, bool) {
	g := grades()
	if i, known := g.byName[foldGrade(text)]; known {
		return g.list[i].clone(), true
	}
	return Material{}, false
}

// AllGrades returns all materials in the order of their standards.
func AllGrades() []Material {
	var list []Material
	for _, m := range grades().list {
		list = append(list, m.clone())
	}
	return list
}

func (m Material) clone() Material {
	m.Strengths, m.Steps, m.Notes = slices.Clone(m.Strengths), slices.Clone(m.Steps), slices.Clone(m.Notes)
	return m
}

// NearestGrade suggests grades for one that is not in the catalogue, the
// likeliest first, at most three: "S276" gives S275.
func NearestGrade(text string) []string {
	const most = 3
	name := foldGrade(text)
	if name == "" {
		return nil
	}
	g := grades()
	var found []string
	suggest := func(grade string) {
		if len(found) < most && !slices.Contains(found, grade) {
			found = append(found, grade)
		}
	}
	// The first number alone, or the grade without what follows it: "C30" is
	// C30/37, "S355J2" is S355.
	for _, m := range g.list {
		known := foldGrade(m.Grade)
		if strings.HasPrefix(known, name+"/") || strings.HasPrefix(name, known) {
			suggest(m.Grade)
		}
	}
	for _, known := range similar(name, func(yield func(string)) {
		for _, m := range g.list {
			yield(foldGrade(m.Grade))
		}
	}) {
		suggest(g.list[g.byName[known]].Grade)
	}
	return found
}
