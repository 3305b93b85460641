package catalogue

// rowTimber is a strength class: GPa, kg/m3, MPa.
type rowTimber struct {
	grade         string
	E, G, density float64
	fm, ft, fc    float64
}

// timbers are the strength classes of EN 338 (C softwood, D hardwood) and EN 14080
// (GL glued laminated timber, h homogeneous, c combined): mean stiffnesses and
// densities, characteristic strengths. The expansion along the grain of 5e-6 per
// K is common practice.
func timbers() []Material {
	var list []Material
	add := func(rows []rowTimber, title, source string) {
		for _, r := range rows {
			list = append(list, Material{
				Grade: r.grade, Title: title + " " + r.grade, Kind: Timber, Source: source + ", from memory",
				E: r.E * giga, G: r.G * giga, Density: r.density, Expansion: 5e-6,
				Yield: r.fm * mega, YieldNote: "characteristic bending strength fm,k; design values take kmod and γM",
				Strengths: []Strength{{"ft,0,k", "characteristic tension along the grain", r.ft * mega}, {"fc,0,k", "characteristic compression along the grain", r.fc * mega}},
				Notes:     []string{"creep and moisture make timber softer with time: kdef is not in E"},
			})
		}
	}
	add([]rowTimber{
		{"C14", 7, 0.44, 350, 14, 7.2, 16}, {"C16", 8, 0.5, 370, 16, 8.5, 17}, {"C18", 9, 0.56, 380, 18, 10, 18}, {"C20", 9.5, 0.59, 400, 20, 11.5, 19},
		{"C22", 10, 0.63, 410, 22, 13, 20}, {"C24", 11, 0.69, 420, 24, 14.5, 21}, {"C27", 11.5, 0.72, 430, 27, 16.5, 22}, {"C30", 12, 0.75, 460, 30, 19, 24},
		{"C35", 13, 0.81, 470, 35, 22.5, 25}, {"C40", 14, 0.88, 480, 40, 26, 27}, {"C45", 15, 0.94, 490, 45, 30, 29}, {"C50", 16, 1, 520, 50, 33.5, 30},
	}, "softwood", "EN 338:2016, table 1")
	add([]rowTimber{
		{"D18", 9.5, 0.59, 570, 18, 11, 18}, {"D24", 10, 0.63, 580, 24, 14, 21}, {"D30", 11, 0.69, 640, 30, 18, 24}, {"D35", 12, 0.75, 650, 35, 21, 25},
		{"D40", 13, 0.81, 660, 40, 24, 27}, {"D50", 14, 0.88, 740, 50, 30, 30}, {"D60", 17, 1.06, 840, 60, 36, 33}, {"D70", 20, 1.25, 960, 70, 42, 36},
	}, "hardwood", "EN 338:2016, table 3")
	add([]rowTimber{
		{"GL20h", 8.4, 0.65, 370, 20, 16, 20}, {"GL22h", 10.5, 0.65, 410, 22, 17.6, 22}, {"GL24h", 11.5, 0.65, 420, 24, 19.2, 24}, {"GL26h", 12.1, 0.65, 445, 26, 20.8, 26},
		{"GL28h", 12.6, 0.65, 460, 28, 22.3, 28}, {"GL30h", 13.6, 0.65, 480, 30, 24, 30}, {"GL32h", 14.2, 0.65, 490, 32, 25.6, 32},
	}, "glued laminated timber", "EN 14080:2013, table 5")
	add([]rowTimber{
		{"GL20c", 10.4, 0.65, 390, 20, 15, 18.5}, {"GL22c", 10.4, 0.65, 390, 22, 16, 20}, {"GL24c", 11, 0.65, 400, 24, 17, 21.5}, {"GL26c", 12, 0.65, 420, 26, 19, 23.5},
		{"GL28c", 12.5, 0.65, 420, 28, 19.5, 24}, {"GL30c", 13, 0.65, 430, 30, 19.5, 24.5}, {"GL32c", 13.5, 0.65, 440, 32, 19.5, 24.5},
	}, "glued laminated timber", "EN 14080:2013, table 4")
	return list
}
