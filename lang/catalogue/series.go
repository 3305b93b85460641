package catalogue

import (
	"slices"
	"sync"
)

// Series is a family of sections of one standard.
type Series struct {
	Name   string // "IPE"
	Title  string // "European I sections, parallel flanges"
	Source string // the standard that lays the dimensions down, and how the rows came here
	// Also lists other names that people write for it, besides blanks and case.
	Also []string
}

// shelf is a series with its sections in the order of its table.
type shelf struct {
	Series
	sizes []string
	build []func() Section // each computes its section once
}

// add puts a section on the shelf.
func (s *shelf) add(size string, publishedMass float64, dimensions []Dimension, make func(*Section)) {
	s.sizes = append(s.sizes, size)
	s.build = append(s.build, sync.OnceValue(func() Section {
		section := Section{
			Title: s.Name + " " + size, Series: s.Name, Size: size, Source: s.Source,
			Dimensions: dimensions, PublishedMass: publishedMass,
		}
		make(&section)
		return section
	}))
}

// library is everything on the shelves. It does not change once made.
type library struct {
	shelves []*shelf
	named   map[string]int   // folded name of a series → shelf
	sized   map[string]place // folded name of a section → section
}

type place struct{ shelf, size int }

// stock makes the library on first use.
var stock = sync.OnceValue(func() *library {
	l := &library{named: map[string]int{}, sized: map[string]place{}}
	for _, s := range tables() {
		l.add(s)
	}
	return l
})

// add puts a shelf into the library under all spellings of its names. Names that
// come first win.
func (l *library) add(s *shelf) {
	number := len(l.shelves)
	l.shelves = append(l.shelves, s)
	for _, name := range append([]string{s.Name}, s.Also...) {
		l.named[fold(name)] = number
		for i, size := range s.sizes {
			for _, spelling := range spellings(name, size) {
				if _, taken := l.sized[spelling]; !taken {
					l.sized[spelling] = place{number, i}
				}
			}
		}
	}
}

func (l *library) section(p place) Section {
	s := l.shelves[p.shelf].build[p.size]()
	s.Dimensions = slices.Clone(s.Dimensions)
	s.Notes = slices.Clone(s.Notes)
	return s
}

// AllSeries returns the series of the catalogue, in the order of a handbook.
func AllSeries() []Series {
	var list []Series
	for _, s := range stock().shelves {
		series := s.Series
		series.Also = slices.Clone(series.Also)
		list = append(list, series)
	}
	return list
}

// FindSeries returns a series by its name or another name of it, in any case.
func FindSeries(name string) (Series, bool) {
	l := stock()
	if i, known := l.named[fold(name)]; known {
		return l.shelves[i].Series, true
	}
	return Series{}, false
}

// Sizes returns the sections of a series in the order of its table, or nil for a
// series that is not in the catalogue.
func Sizes(series string) []Section {
	l := stock()
	i, known := l.named[fold(series)]
	if !known {
		return nil
	}
	var list []Section
	for k := range l.shelves[i].sizes {
		list = append(list, l.section(place{i, k}))
	}
	return list
}

// Find returns the section of a series and a size, in any usual spelling:
// ("IPE", "300"), ("he", "200 B"), ("UB", "406 x 178 x 54").
func Find(series, size string) (Section, bool) { return Lookup(series + " " + size) }

// Lookup returns the section that a text names, in any usual spelling: "IPE 300",
// "ipe300", "HE 200 B", "W12x26", "L 80x8", "SHS 100×100×5.0".
func Lookup(text string) (Section, bool) {
	l := stock()
	if p, found := l.sized[fold(text)]; found {
		return l.section(p), true
	}
	return Section{}, false
}
