package catalogue

import (
	"fmt"
	"math"
	"strconv"
)

// DimensionError says which dimension of a shape cannot be.
type DimensionError struct {
	// Index counts the dimensions in the order in which the shape takes them,
	// from 0.
	Index int
	// Name is the dimension in words: "wall", "depth".
	Name string
	// Value is what was given, m.
	Value float64
	// Problem is a sentence for people, without a full stop.
	Problem string
}

// Error returns the sentence.
func (e *DimensionError) Error() string { return e.Problem }

// Bounds of what a dimension of a shape may be, m: wide enough for anything
// built, narrow enough that no property overflows or vanishes.
const (
	smallest = 1e-7
	largest  = 1e4
)

// Rect is a solid rectangle, width along y by depth along z, m. Torsion by the
// series of St Venant, shear areas 5/6·A.
func Rect(width, depth float64) (Section, error) {
	s := shape("rect", Dimension{"b", "width", width}, Dimension{"h", "depth", depth})
	if err := s.possible(); err != nil {
		return Section{}, err
	}
	s.finish(outline{[][]piece{rectangle(width, depth, 0)}})
	s.It = torsionRectangle(width, depth)
	s.shearOf(5.0 / 6)
	return s, nil
}

// Round is a solid circle of a diameter, m. Shear areas 9/10·A.
func Round(diameter float64) (Section, error) {
	s := shape("round", Dimension{"d", "diameter", diameter})
	if err := s.possible(); err != nil {
		return Section{}, err
	}
	s.finish(outline{[][]piece{rectangle(diameter, diameter, diameter/2)}})
	s.It = s.Iy + s.Iz
	s.shearOf(9.0 / 10)
	return s, nil
}

// shearOf sets all shear areas to a share of the area.
func (s *Section) shearOf(share float64) {
	s.Asy = share * s.A
	s.Asz, s.Avy, s.Avz = s.Asy, s.Asy, s.Asy
}

// Pipe is a round tube by its outer diameter and wall, m: the same as a CHS of
// the catalogue.
func Pipe(diameter, wall float64) (Section, error) {
	s := shape("pipe", Dimension{"d", "outer diameter", diameter}, Dimension{"t", "wall", wall})
	if err := s.possible(); err != nil {
		return Section{}, err
	}
	if wall >= diameter/2 {
		return Section{}, s.refuse(1, "a wall of %s leaves no hole in a pipe of %s: make it less than %s, or write round %s",
			mm(wall), mm(diameter), mm(diameter/2), mm(diameter))
	}
	s.ring(diameter, wall)
	return s, nil
}

// Tube is a rectangular tube with sharp corners, depth along z by width along y
// by wall, m: the order of the trade, tube 100 x 60 x 4 stands upright. Rolled
// tubes have rounded corners and some 2 to 4 % less area: they are the SHS and
// RHS of the catalogue. Torsion as in EN 10210-2, annex A.3, with corner radius 0.
func Tube(depth, width, wall float64) (Section, error) {
	s := shape("tube", Dimension{"h", "depth", depth}, Dimension{"b", "width", width}, Dimension{"t", "wall", wall})
	if err := s.possible(); err != nil {
		return Section{}, err
	}
	if least := min(depth, width); wall >= least/2 {
		return Section{}, s.refuse(2, "a wall of %s leaves no hole in a tube of %s: make it less than %s, or write rect",
			mm(wall), mm(least), mm(least/2))
	}
	s.box(depth, width, wall, 0, 0)
	s.Notes = append(s.Notes, "sharp corners as written; rolled SHS and RHS of the catalogue have rounded ones and less area")
	return s, nil
}

// Angle is an angle with sharp corners: the leg along z, the leg along y, the
// thickness, m. Rolled angles, with root and toe radii, are the L of the
// catalogue. Shear areas 5/6 of a leg (common practice).
func Angle(depth, width, thickness float64) (Section, error) {
	s := shape("angle", Dimension{"h", "upright leg", depth}, Dimension{"b", "level leg", width}, Dimension{"t", "thickness", thickness})
	if err := s.possible(); err != nil {
		return Section{}, err
	}
	if least := min(depth, width); thickness >= least {
		return Section{}, s.refuse(2, "a thickness of %s fills a leg of %s: make it less than %s, or write rect",
			mm(thickness), mm(least), mm(least))
	}
	s.angle(depth, width, thickness, 0, 0)
	s.Notes = append(s.Notes, "sharp corners as written; rolled L of the catalogue have root and toe radii")
	return s, nil
}

// shape begins a section of a word of the language.
func shape(word string, dimensions ...Dimension) Section {
	title := word
	for i, d := range dimensions {
		if i > 0 {
			title += " ×"
		}
		title += " " + decimal(d.Value*1000)
	}
	return Section{Title: title + " mm", Shape: word, Dimensions: dimensions}
}

// possible checks each dimension by itself.
func (s *Section) possible() error {
	for i, d := range s.Dimensions {
		switch {
		case math.IsNaN(d.Value) || math.IsInf(d.Value, 0):
			return s.refuse(i, "the %s of the %s is not a number", d.Name, s.Shape)
		case d.Value <= 0:
			return s.refuse(i, "the %s of the %s is %s: make it more than 0", d.Name, s.Shape, mm(d.Value))
		case d.Value < smallest:
			return s.refuse(i, "the %s of the %s is %s, thinner than anything built: check the unit", d.Name, s.Shape, mm(d.Value))
		case d.Value > largest:
			return s.refuse(i, "the %s of the %s is %s m, larger than anything built: check the unit", d.Name, s.Shape, decimal(d.Value))
		}
	}
	return nil
}

func (s *Section) refuse(index int, problem string, values ...any) error {
	d := s.Dimensions[index]
	return &DimensionError{Index: index, Name: d.Name, Value: d.Value, Problem: fmt.Sprintf(problem, values...)}
}

// mm writes a length for people.
func mm(metres float64) string { return decimal(metres*1000) + " mm" }

// decimal writes a number with at most seven digits that count, so that 0.1143 m
// reads 114.3 mm.
func decimal(value float64) string {
	rounded, err := strconv.ParseFloat(strconv.FormatFloat(value, 'g', 7, 64), 64)
	if err != nil {
		return strconv.FormatFloat(value, 'g', 7, 64)
	}
	if size := math.Abs(rounded); size != 0 && size < 1e-6 || size >= 1e9 {
		return strconv.FormatFloat(rounded, 'g', -1, 64)
	}
	return strconv.FormatFloat(rounded, 'f', -1, 64)
}
