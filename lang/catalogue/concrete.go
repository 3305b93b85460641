package catalogue

import (
	"fmt"
	"math"
)

// concretes are those of EN 1992-1-1, table 3.1: Ecm = 22·(fcm/10)^0.3 GPa with
// fcm = fck + 8 MPa. Poisson's ratio 0.2 for uncracked concrete and the
// expansion of 10e-6 per K are of 3.1.3; 25 kN/m3 for reinforced concrete is of
// EN 1991-1-1, table A.1. Concrete has no yield strength: stresses in it, cracked
// or not, are no matter of one number.
func concretes() []Material {
	var list []Material
	for _, r := range []struct{ cylinder, cube int }{
		{12, 15}, {16, 20}, {20, 25}, {25, 30}, {30, 37}, {35, 45}, {40, 50}, {45, 55}, {50, 60}, {55, 67}, {60, 75}, {70, 85}, {80, 95}, {90, 105},
	} {
		fck := float64(r.cylinder)
		E := 22 * math.Pow((fck+8)/10, 0.3) * giga
		list = append(list, Material{
			Grade: fmt.Sprintf("C%d/%d", r.cylinder, r.cube), Title: fmt.Sprintf("concrete C%d/%d", r.cylinder, r.cube), Kind: Concrete,
			Source: "EN 1992-1-1:2004, table 3.1 and 3.1.3, from memory",
			E:      E, G: E / 2.4, Density: 25e3 / 9.80665, Expansion: 10e-6,
			Strengths: []Strength{{"fck", "characteristic cylinder strength", fck * mega}, {"fcm", "mean cylinder strength", (fck + 8) * mega}},
			Notes:     []string{"E is the secant modulus of uncracked concrete at 28 days: cracks and creep make it softer"},
		})
	}
	return list
}
