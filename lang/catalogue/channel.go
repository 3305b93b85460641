package catalogue

import "math"

// channel makes a rolled channel with its web on the −y side. The inner faces of
// the flanges have a slope (0 for parallel flanges): tf is their thickness at
// the distance at from the back of the web. r1 rounds the roots, r2 the toes.
//
// The shear centre and the warping constant are those of the thin-walled middle
// line (V. Z. Vlasov, Thin-walled elastic beams, 1961), with b = width − tw/2 and
// h = depth − tf:
//
//	e  = 3·b²·tf/(6·b·tf + h·tw) from the middle of the web, away from the flanges
//	Iw = tf·b³·h²/12 · (3·b·tf + 2·h·tw)/(6·b·tf + h·tw)
//
// Shear areas for resistance: A − 2·b·tf + (tw + r)·tf along the web (EN 1993-1-1,
// 6.2.6(3)b), both flanges across it (common practice).
func (s *Section) channel(h, b, tw, tf, r1, r2, slope, at float64) {
	z := h / 2
	thickness := func(y float64) float64 { return tf + slope*(at-y) }
	root, toe := z-thickness(tw), z-thickness(b)
	s.finish(outline{[][]piece{loop(
		corner{0, -z, 0}, corner{b, -z, 0}, corner{b, -toe, r2}, corner{tw, -root, r1},
		corner{tw, root, r1}, corner{b, toe, r2}, corner{b, z, 0}, corner{0, z, 0},
	)}})
	s.It = torsionChannel(h, b, tw, tf, r1)
	wide, high := b-tw/2, h-tf
	e := 3 * wide * wide * tf / (6*wide*tf + high*tw)
	s.Iw = tf * cube(wide) * high * high / 12 * (3*wide*tf + 2*high*tw) / (6*wide*tf + high*tw)
	s.YShear, s.ZShear = s.YMin+tw/2-e, 0
	s.Avz = s.A - 2*b*tf + (tw+r1)*tf
	s.Avy = 2 * b * tf
	s.Notes = append(s.Notes, "the shear centre is "+decimal(math.Round((e-tw/2)*1e4)/10)+" mm behind the back of the web: a load through the web twists the section")
}

// rowU is a rolled channel: mm, kg/m.
type rowU struct {
	size                 string
	h, b, tw, tf, r1, r2 float64
	mass                 float64
}

func shelfU(series Series, rows []rowU, slope func(row rowU) (slope, at float64)) *shelf {
	s := &shelf{Series: series}
	for _, row := range rows {
		d := millimetres(
			Dimension{"h", "depth", row.h}, Dimension{"b", "width", row.b}, Dimension{"tw", "web thickness", row.tw},
			Dimension{"tf", "flange thickness", row.tf}, Dimension{"r1", "root radius", row.r1}, Dimension{"r2", "toe radius", row.r2})
		incline, at := slope(row)
		s.add(row.size, row.mass, d, func(section *Section) {
			section.channel(d[0].Value, d[1].Value, d[2].Value, d[3].Value, d[4].Value, d[5].Value, incline, at/1000)
		})
	}
	return s
}

func shelfUPE() *shelf {
	return shelfU(Series{Name: "UPE", Title: "European channels, parallel flanges", Source: en10365}, []rowU{
		{"80", 80, 50, 4, 7, 10, 0, 7.9}, {"100", 100, 55, 4.5, 7.5, 10, 0, 9.82}, {"120", 120, 60, 5, 8, 12, 0, 12.1},
		{"140", 140, 65, 5, 9, 12, 0, 14.5}, {"160", 160, 70, 5.5, 9.5, 12, 0, 17}, {"180", 180, 75, 5.5, 10.5, 12, 0, 19.7},
		{"200", 200, 80, 6, 11, 13, 0, 22.8}, {"220", 220, 85, 6.5, 12, 13, 0, 26.6}, {"240", 240, 90, 7, 12.5, 15, 0, 30.2},
		{"270", 270, 95, 7.5, 13.5, 15, 0, 35.2}, {"300", 300, 100, 9.5, 15, 15, 0, 44.4}, {"330", 330, 105, 11, 16, 18, 0, 53.2},
		{"360", 360, 110, 12, 17, 18, 0, 61.2}, {"400", 400, 115, 13.5, 18, 18, 0, 72.2},
	}, func(rowU) (float64, float64) { return 0, 0 })
}

func shelfUPN() *shelf {
	return shelfU(Series{Name: "UPN", Title: "European channels, tapered flanges", Source: en10365, Also: []string{"UNP", "U"}}, []rowU{
		{"80", 80, 45, 6, 8, 8, 4, 8.64}, {"100", 100, 50, 6, 8.5, 8.5, 4.5, 10.6}, {"120", 120, 55, 7, 9, 9, 4.5, 13.4},
		{"140", 140, 60, 7, 10, 10, 5, 16}, {"160", 160, 65, 7.5, 10.5, 10.5, 5.5, 18.8}, {"180", 180, 70, 8, 11, 11, 5.5, 22},
		{"200", 200, 75, 8.5, 11.5, 11.5, 6, 25.3}, {"220", 220, 80, 9, 12.5, 12.5, 6.5, 29.4}, {"240", 240, 85, 9.5, 13, 13, 6.5, 33.2},
		{"260", 260, 90, 10, 14, 14, 7, 37.9}, {"280", 280, 95, 10, 15, 15, 7.5, 41.8}, {"300", 300, 100, 10, 16, 16, 8, 46.2},
		{"320", 320, 100, 14, 17.5, 17.5, 8.75, 59.5}, {"350", 350, 100, 14, 16, 16, 8, 60.6}, {"380", 380, 102, 13.5, 16, 16, 8, 63.1},
		{"400", 400, 110, 14, 18, 18, 9, 71.8},
	}, func(row rowU) (float64, float64) {
		if row.h <= 300 {
			return 0.08, row.b / 2
		}
		return 0.05, (row.b + row.tw) / 2 // in the middle of the free flange
	})
}
