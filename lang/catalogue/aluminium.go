package catalogue

// aluminiums are wrought alloys of EN 1999-1-1. E = 70 GPa, G = 27 GPa, 2700 kg/m3
// and 23e-6 per K are of 3.2.5; the strengths of table 3.2b, extruded profiles
// of the usual thicknesses.
func aluminiums() []Material {
	var list []Material
	for _, r := range []struct {
		grade  string
		fo, fu float64 // MPa
		walls  string
	}{
		{"5083-H111", 110, 270, "extruded profiles"}, {"6005A-T6", 225, 270, "walls up to 5 mm"}, {"6060-T6", 140, 170, "walls up to 15 mm"},
		{"6061-T6", 240, 260, "walls up to 20 mm"}, {"6063-T6", 160, 195, "walls up to 25 mm"}, {"6082-T6", 250, 290, "walls up to 5 mm"},
	} {
		list = append(list, Material{
			Grade: r.grade, Title: "aluminium EN AW-" + r.grade, Kind: Aluminium, Source: "EN 1999-1-1:2007, table 3.2b and 3.2.5, from memory",
			E: 70 * giga, G: 27 * giga, Density: 2700, Expansion: 23e-6,
			Yield: r.fo * mega, YieldNote: "0.2 % proof strength fo, " + r.walls,
			Strengths: []Strength{{"fu", "ultimate strength", r.fu * mega}},
			Notes:     []string{"heat-affected zones at welds are weaker"},
		})
	}
	return list
}
