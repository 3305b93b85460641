package catalogue

import (
	"math"
	"testing"

	"github.com/stretchr/testify/assert"
)

// TestPublishedMasses holds the area of every section to the mass that its
// standard prints: a slip of the pen in a dimension shows at once.
func TestPublishedMasses(t *testing.T) {
	checked := 0
	for _, series := range AllSeries() {
		for _, s := range Sizes(series.Name) {
			if s.PublishedMass == 0 {
				continue
			}
			checked++
			assert.InEpsilon(t, s.PublishedMass, s.Mass, 0.013, s.Title)
		}
	}
	assert.Greater(t, checked, 250)
}

// TestHandbookValues holds properties to values published in handbooks and
// computed by an independent integration over the outline: EN 10365, EN 10210-2,
// EN 10219-2 and EN 10056-1 product tables, dimensions from memory. Units: cm.
func TestHandbookValues(t *testing.T) {
	for _, c := range []struct {
		name   string
		values map[string]float64
	}{
		{"UPE 200", map[string]float64{"A": 29.005354, "Iy": 1909.2967, "Iz": 187.29672, "Wely": 190.92967, "Welz": 34.4287, "Wply": 220.09103, "Wplz": 62.196746}},
		{"SHS 100x100x5", map[string]float64{"A": 18.731748, "Iy": 279.43233, "Wely": 55.886465, "Wply": 66.358361, "It": 439.41078}},
		{"RHS 200x100x5", map[string]float64{"A": 28.731748, "Iy": 1494.643, "Iz": 505.26566, "Wely": 149.4643, "Welz": 101.05313, "Wply": 185.0171, "Wplz": 113.85836, "It": 1203.6805}},
		{"CFSHS 100x100x5", map[string]float64{"A": 18.356194, "Iy": 271.10209, "Wely": 54.220418, "Wply": 64.591445, "It": 440.51721}},
		{"CHS 114.3x5", map[string]float64{"A": 17.168804, "Iy": 256.9202, "Wely": 44.955416, "Wply": 59.774117, "It": 513.84041}},
		{"L 100x100x10", map[string]float64{"A": 19.154513, "Iy": 176.67637, "Iz": 176.67637, "Iu": 280.34729, "Iv": 73.005453, "Wely": 24.615152}},
		{"L 100x75x8", map[string]float64{"A": 13.467301, "Iy": 133.05449, "Iz": 64.079753, "Iu": 162.49086, "Iv": 34.643385, "Wely": 19.293131, "Welz": 11.388816}},
	} {
		s, found := Lookup(c.name)
		if !assert.True(t, found, c.name) {
			continue
		}
		got := map[string]float64{"A": s.A * 1e4, "Iy": s.Iy * 1e8, "Iz": s.Iz * 1e8, "Iu": s.Iu * 1e8, "Iv": s.Iv * 1e8, "It": s.It * 1e8,
			"Wely": s.Wely * 1e6, "Welz": s.Welz * 1e6, "Wply": s.Wply * 1e6, "Wplz": s.Wplz * 1e6}
		for name, want := range c.values {
			tolerance := 1e-4
			if name == "It" {
				tolerance = 1e-3
			}
			assert.InEpsilon(t, want, got[name], tolerance, "%s %s", c.name, name)
		}
	}
	angle, _ := Lookup("L 100x75x8")
	assert.InEpsilon(t, 0.54691527, math.Abs(math.Tan(angle.Alpha)), 1e-4)
}

func TestSolidRectanglesTwistAsSaintVenantSays(t *testing.T) {
	// Timoshenko and Goodier, Theory of Elasticity, table 7: It = β·b·a³.
	for ratio, beta := range map[float64]float64{1: 0.14057701, 1.5: 0.19576071, 2: 0.22868168, 4: 0.28081296, 10: 0.31232504} {
		s, err := Rect(0.1, 0.1*ratio)
		assert.NoError(t, err)
		assert.InEpsilon(t, beta, s.It/(0.1*ratio*1e-3), 1e-3)
	}
}
