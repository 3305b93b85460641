package catalogue

import (
	"strconv"
	"strings"
)

const (
	en10210 = "EN 10210-2:2019, hot finished: corner radii 1.5·t outside, 1.0·t inside; sizes from memory, properties by the standard's formulas"
	en10219 = "EN 10219-2:2019, cold formed: corner radii by thickness, 2·t, 2.5·t or 3·t outside; sizes from memory, properties by the standard's formulas"
)

// sizesOf are outer sizes with the wall thicknesses that are made, mm.
type sizesOf struct {
	outer string // "100x60", or a diameter
	walls string // apart by blanks
}

var squareSizes = []sizesOf{
	{"40", "3 4 5"}, {"50", "3 4 5 6.3"}, {"60", "3 4 5 6.3 8"}, {"70", "3 4 5 6.3 8"}, {"80", "4 5 6.3 8"}, {"90", "4 5 6.3 8"},
	{"100", "4 5 6.3 8 10"}, {"120", "5 6.3 8 10 12.5"}, {"140", "5 6.3 8 10 12.5"}, {"150", "5 6.3 8 10 12.5 16"}, {"160", "5 6.3 8 10 12.5 16"},
	{"180", "5 6.3 8 10 12.5 16"}, {"200", "5 6.3 8 10 12.5 16"}, {"220", "6.3 8 10 12.5 16"}, {"250", "6.3 8 10 12.5 16"},
	{"260", "6.3 8 10 12.5 16"}, {"300", "6.3 8 10 12.5 16"}, {"350", "8 10 12.5 16"}, {"400", "10 12.5 16 20"},
}

var rectangularSizes = []sizesOf{
	{"50x30", "3 4 5"}, {"60x40", "3 4 5 6.3"}, {"80x40", "3 4 5 6.3 8"}, {"90x50", "4 5 6.3 8"}, {"100x50", "4 5 6.3 8"}, {"100x60", "4 5 6.3 8"},
	{"120x60", "4 5 6.3 8 10"}, {"120x80", "4 5 6.3 8 10"}, {"140x80", "4 5 6.3 8 10"}, {"150x100", "4 5 6.3 8 10 12.5"},
	{"160x80", "4 5 6.3 8 10 12.5"}, {"180x100", "4 5 6.3 8 10 12.5"}, {"200x100", "4 5 6.3 8 10 12.5 16"}, {"200x120", "6.3 8 10 12.5"},
	{"250x150", "6.3 8 10 12.5 16"}, {"260x180", "6.3 8 10 12.5 16"}, {"300x200", "6.3 8 10 12.5 16"}, {"350x250", "6.3 8 10 12.5 16"},
	{"400x200", "8 10 12.5 16"}, {"450x250", "8 10 12.5 16"}, {"500x300", "10 12.5 16 20"},
}

var circularSizes = []sizesOf{
	{"21.3", "2.6 3.2"}, {"26.9", "2.6 3.2"}, {"33.7", "2.6 3.2 4"}, {"42.4", "2.6 3.2 4"}, {"48.3", "2.6 3.2 4 5"}, {"60.3", "2.6 3.2 4 5"},
	{"76.1", "2.6 3.2 4 5"}, {"88.9", "3.2 4 5 6.3"}, {"101.6", "3.2 4 5 6.3 8 10"}, {"114.3", "3.2 4 5 6.3 8 10"}, {"139.7", "4 5 6.3 8 10 12.5"},
	{"168.3", "4 5 6.3 8 10 12.5"}, {"177.8", "5 6.3 8 10 12.5"}, {"193.7", "5 6.3 8 10 12.5 16"}, {"219.1", "5 6.3 8 10 12.5 16 20"},
	{"244.5", "5 6.3 8 10 12.5 16 20 25"}, {"273", "5 6.3 8 10 12.5 16 20 25"}, {"323.9", "5 6.3 8 10 12.5 16 20 25"},
	{"355.6", "6.3 8 10 12.5 16 20 25"}, {"406.4", "6.3 8 10 12.5 16 20 25"}, {"457", "6.3 8 10 12.5 16 20 25"}, {"508", "6.3 8 10 12.5 16 20 25"},
}

// each calls visit for every size with its wall, in mm.
func each(list []sizesOf, visit func(size string, h, b, t float64)) {
	for _, s := range list {
		first, second, two := strings.Cut(s.outer, "x")
		if !two {
			second = first
		}
		h, b := millimetre(first), millimetre(second)
		for _, wall := range strings.Fields(s.walls) {
			visit(first+"x"+second+"x"+wall, h, b, millimetre(wall))
		}
	}
}

// millimetre reads a number of the tables above.
func millimetre(text string) float64 {
	value, err := strconv.ParseFloat(text, 64)
	if err != nil {
		panic(err) // a slip in the tables, seen by the first test
	}
	return value
}

// hotCorners are the radii of EN 10210-2 for a wall, mm.
func hotCorners(t float64) (outer, inner float64) { return 1.5 * t, t }

// coldCorners are the radii of EN 10219-2 for a wall, mm.
func coldCorners(t float64) (outer, inner float64) {
	switch {
	case t <= 6:
		outer = 2 * t
	case t <= 10:
		outer = 2.5 * t
	default:
		outer = 3 * t
	}
	return outer, outer - t
}

func shelfBox(series Series, sizes []sizesOf, corners func(t float64) (outer, inner float64)) *shelf {
	s := &shelf{Series: series}
	each(sizes, func(size string, h, b, t float64) {
		outer, inner := corners(t)
		d := millimetres(Dimension{"h", "depth", h}, Dimension{"b", "width", b}, Dimension{"t", "wall", t},
			Dimension{"ro", "outer corner radius", outer}, Dimension{"ri", "inner corner radius", inner})
		s.add(size, 0, d, func(section *Section) {
			section.box(d[0].Value, d[1].Value, d[2].Value, d[3].Value, d[4].Value)
		})
	})
	return s
}

func shelfRing(series Series) *shelf {
	s := &shelf{Series: series}
	each(circularSizes, func(size string, diameter, _, t float64) {
		first, _, _ := strings.Cut(size, "x")
		wall := size[strings.LastIndexByte(size, 'x'):]
		d := millimetres(Dimension{"d", "diameter", diameter}, Dimension{"t", "wall", t})
		s.add(first+wall, 0, d, func(section *Section) { section.ring(d[0].Value, d[1].Value) })
	})
	return s
}

// hollows are the series of hollow sections. Those without a word are hot
// finished, as handbooks have it; CF stands for cold formed.
func hollows() []*shelf {
	return []*shelf{
		shelfBox(Series{Name: "SHS", Title: "square hollow sections, hot finished", Source: en10210, Also: []string{"HFSHS"}}, squareSizes, hotCorners),
		shelfBox(Series{Name: "RHS", Title: "rectangular hollow sections, hot finished", Source: en10210, Also: []string{"HFRHS"}}, rectangularSizes, hotCorners),
		shelfRing(Series{Name: "CHS", Title: "circular hollow sections, hot finished", Source: en10210, Also: []string{"HFCHS"}}),
		shelfBox(Series{Name: "CFSHS", Title: "square hollow sections, cold formed", Source: en10219}, squareSizes, coldCorners),
		shelfBox(Series{Name: "CFRHS", Title: "rectangular hollow sections, cold formed", Source: en10219}, rectangularSizes, coldCorners),
		shelfRing(Series{Name: "CFCHS", Title: "circular hollow sections, cold formed", Source: en10219}),
	}
}
