package catalogue

const (
	mega = 1e6
	giga = 1e9
)

// rowSteel is a grade of EN 1993-1-1: fy and fu in MPa for thicknesses up to
// 40 mm, and for those above it up to 80 mm.
type rowSteel struct {
	grade, standard string
	fy, fu          float64
	fyThick         float64
	fuThick         float64
}

// europeanSteels are hot-rolled structural steels. E, G, Poisson's ratio 0.3 and
// the expansion of 12e-6 per K are of 3.2.6. G is E/2.6, which the standard
// rounds to 81 GPa.
func europeanSteels() []Material {
	rows := []rowSteel{
		{"S235", "EN 10025-2", 235, 360, 215, 360},
		{"S275", "EN 10025-2", 275, 430, 255, 410},
		{"S355", "EN 10025-2", 355, 490, 335, 470},
		{"S450", "EN 10025-2", 440, 550, 410, 550},
		{"S275N", "EN 10025-3", 275, 390, 255, 370},
		{"S355N", "EN 10025-3", 355, 490, 335, 470},
		{"S420N", "EN 10025-3", 420, 520, 390, 520},
		{"S460N", "EN 10025-3", 460, 540, 430, 540},
		{"S275M", "EN 10025-4", 275, 370, 255, 360},
		{"S355M", "EN 10025-4", 355, 470, 335, 450},
		{"S420M", "EN 10025-4", 420, 520, 390, 500},
		{"S460M", "EN 10025-4", 460, 540, 430, 530},
		{"S235W", "EN 10025-5", 235, 360, 215, 340},
		{"S355W", "EN 10025-5", 355, 490, 335, 490},
		{"S460Q", "EN 10025-6", 460, 570, 440, 550},
		{"S235H", "EN 10210-1", 235, 360, 215, 340},
		{"S275H", "EN 10210-1", 275, 430, 255, 410},
		{"S355H", "EN 10210-1", 355, 510, 335, 490},
		{"S275NH", "EN 10210-1", 275, 390, 255, 370},
		{"S355NH", "EN 10210-1", 355, 490, 335, 470},
		{"S420NH", "EN 10210-1", 420, 540, 390, 520},
		{"S460NH", "EN 10210-1", 460, 560, 430, 550},
		{"S420", "EN 10025-3 and -4 (S420N, S420M)", 420, 520, 390, 500},
		{"S460", "EN 10025-3 and -4 (S460N, S460M)", 460, 540, 430, 530},
	}
	var list []Material
	for _, r := range rows {
		list = append(list, Material{
			Grade: r.grade, Title: "structural steel " + r.grade, Kind: Steel,
			Source: "EN 1993-1-1:2005, table 3.1 and 3.2.6 (" + r.standard + "), from memory",
			E:      210 * giga, G: 210 * giga / 2.6, Density: SteelDensity, Expansion: 12e-6,
			Yield: r.fy * mega, YieldNote: "yield strength fy for thicknesses up to 40 mm",
			Strengths: []Strength{{"fu", "ultimate strength up to 40 mm", r.fu * mega}},
			Steps: []ThicknessStep{
				{0.040, r.fy * mega, r.fu * mega},
				{0.080, r.fyThick * mega, r.fuThick * mega},
			},
		})
	}
	return list
}
