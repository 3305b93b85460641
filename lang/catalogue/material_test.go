package catalogue

import (
	"testing"

	"github.com/stretchr/testify/assert"
)

// TestGrades holds grades in usual spellings to values of their standards.
func TestGrades(t *testing.T) {
	for _, c := range []struct {
		text, grade string
		E, yield    float64 // GPa, MPa
		density     float64 // kg/m3
	}{
		{"s355", "S355", 210, 355, 7850}, {"A992", "A992", 199.948, 344.738, 7850}, {"a572 50", "A572-50", 199.948, 344.738, 7850},
		{"c30/37", "C30/37", 32.837, 0, 2549.29}, {"C24", "C24", 11, 24, 420}, {"gl 24h", "GL24h", 11.5, 24, 420}, {"D40", "D40", 13, 40, 660},
		{"EN-AW 6082-T6", "6082-T6", 70, 250, 2700},
	} {
		m, found := FindGrade(c.text)
		if assert.True(t, found, c.text) {
			assert.Equal(t, c.grade, m.Grade)
			assert.InDelta(t, c.E, m.E/1e9, 5e-4*c.E, c.text)
			assert.InDelta(t, c.yield, m.Yield/1e6, 1e-3, c.text)
			assert.InDelta(t, c.density, m.Density, 1e-2, c.text)
		}
	}
	// Table 3.1 of EN 1992-1-1 prints Ecm rounded to GPa.
	for grade, E := range map[string]float64{"C12/15": 27, "C20/25": 30, "C25/30": 31, "C30/37": 33, "C40/50": 35, "C50/60": 37, "C60/75": 39, "C90/105": 44} {
		m, _ := FindGrade(grade)
		assert.InDelta(t, E, m.E/1e9, 0.5, grade)
	}
	seen := map[string]bool{}
	for _, m := range AllGrades() {
		assert.False(t, seen[foldGrade(m.Grade)], "%s stands twice", m.Grade)
		seen[foldGrade(m.Grade)] = true
		assert.NotEmpty(t, m.Source, m.Grade)
		assert.Greater(t, m.E, m.G, m.Grade)
		assert.Greater(t, m.Density, 300.0, m.Grade)
	}
	assert.Greater(t, len(seen), 75)
}
