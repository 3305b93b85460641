package catalogue

// ksi is a thousand pounds-force per square inch, Pa.
const ksi = 6894757.293168361

// americanSteels are structural steels of ASTM. E = 29,000 ksi and G = 11,200 ksi
// are of AISC 360-16, section E3 and symbols; the expansion of 6.5e-6 per °F is
// of its commentary.
func americanSteels() []Material {
	rows := []struct {
		grade  string
		fy, fu float64 // ksi
		note   string
	}{
		{"A36", 36, 58, ""}, {"A572-50", 50, 65, "grade 50"}, {"A588", 50, 70, "plates up to 4 in"}, {"A913-65", 65, 80, "grade 65"}, {"A992", 50, 65, ""},
		{"A500-B", 46, 58, "grade B, square and rectangular; round sections have 42 ksi"}, {"A500-C", 50, 62, "grade C, square and rectangular; round sections have 46 ksi"},
	}
	var list []Material
	for _, r := range rows {
		m := Material{
			Grade: r.grade, Title: "structural steel ASTM " + r.grade, Kind: Steel, Source: "AISC 360-16, user note of A3.1, and ASTM standards, from memory",
			E: 29000 * ksi, G: 11200 * ksi, Density: SteelDensity, Expansion: 11.7e-6,
			Yield: r.fy * ksi, YieldNote: "specified minimum yield stress Fy",
			Strengths: []Strength{{"Fu", "specified minimum tensile strength", r.fu * ksi}},
		}
		if r.note != "" {
			m.Notes = []string{r.note}
		}
		list = append(list, m)
	}
	return list
}
