package main

import (
	"errors"
	"fmt"
	"strings"

	"spanwright/lang/catalogue"
	"spanwright/lang/quantity"
	"spanwright/lang/resolve"
)

type sectionCommand struct {
	Name []string `arg:"" optional:"" help:"A section such as IPE 300 or rect 100 x 200 mm, or a series such as IPE. Without it, the list of series."`
	JSON bool     `name:"json" help:"Print as JSON in SI units."`
}

// Help adds examples to the help of the command.
func (*sectionCommand) Help() string {
	return `Examples:
    spanwright section "IPE 300"                 properties, with their source
    spanwright section IPE                       all sizes with mass and Iy
    spanwright section "tube 100 x 60 x 4 mm"    any shape of the language
    spanwright section                           all series`
}

// Run prints the properties of a section, the sizes of a series, or the series.
func (c *sectionCommand) Run(t *terminal) error {
	name := strings.Join(c.Name, " ")
	if name == "" {
		return c.allSeries(t)
	}
	if series, ok := catalogue.FindSeries(name); ok {
		return c.series(t, series)
	}
	section, problems := resolve.ProfileOf(name)
	if len(problems) > 0 {
		return errors.New(strings.TrimSuffix(problems[0].Summary, "."))
	}
	if c.JSON {
		return writeDocument(t.out, documentOfSection(&section))
	}
	c.properties(t, &section)
	return nil
}

func (c *sectionCommand) allSeries(t *terminal) error {
	s := &sheet{title: "Series of the catalogue", columns: []string{"series", "", "source"}}
	var names []string
	for _, series := range catalogue.AllSeries() {
		s.appendRow(series.Name, series.Title, series.Source)
		names = append(names, series.Name)
	}
	if c.JSON {
		return writeDocument(t.out, struct {
			Format string   `json:"format"`
			Series []string `json:"series"`
		}{"spanwright-sections/1", names})
	}
	s.write(t.out, asText)
	return nil
}

// series lists the sizes of one.
func (c *sectionCommand) series(t *terminal, series catalogue.Series) error {
	if c.JSON {
		document := struct {
			Format   string            `json:"format"`
			Sections []sectionDocument `json:"sections"`
		}{Format: "spanwright-sections/1"}
		for _, size := range catalogue.Sizes(series.Name) {
			document.Sections = append(document.Sections, documentOfSection(&size))
		}
		return writeDocument(t.out, document)
	}
	s := &sheet{title: series.Title, columns: []string{"section", "kg/m", "A cm2", "Iy cm4", "Wel,y cm3"}, numbers: map[int]bool{1: true, 2: true, 3: true, 4: true}}
	for _, size := range catalogue.Sizes(series.Name) {
		s.appendRow(size.Title, quantity.Number(size.Mass, 3), centimetres(size.A, 2), centimetres(size.Iy, 4), centimetres(size.Wely, 3))
	}
	s.write(t.out, asText)
	fmt.Fprintf(t.out, "%s. Properties are computed from the dimensions.\n", series.Source)
	return nil
}

// centimetres writes a value in a power of cm.
func centimetres(value float64, power int) string {
	cm, _ := quantity.Lookup("cm")
	return figures(value, cm.Power(power))
}

// properties prints all of one section.
func (c *sectionCommand) properties(t *terminal, s *catalogue.Section) {
	sizes := &sheet{title: s.Title, columns: []string{"", "mm", ""}, numbers: map[int]bool{1: true}}
	mm, _ := quantity.Lookup("mm")
	for _, d := range s.Dimensions {
		sizes.appendRow(d.Symbol, figures(d.Value, mm), d.Name)
	}
	sizes.write(t.out, asText)
	p := &sheet{title: "Properties (y–y is the major axis of an upright section, z points up)", columns: []string{"", "", "", ""}, numbers: map[int]bool{1: true}}
	add := func(symbol string, value float64, power int, what string) {
		if value != 0 {
			p.appendRow(symbol, centimetres(value, power), fmt.Sprintf("cm%d", power), what)
		}
	}
	add("A", s.A, 2, "area")
	add("Iy", s.Iy, 4, "second moment of area")
	add("Iz", s.Iz, 4, "")
	if s.Iyz != 0 {
		add("Iyz", s.Iyz, 4, "product moment")
		add("Iu", s.Iu, 4, "principal, major")
		add("Iv", s.Iv, 4, "principal, minor")
	}
	add("It", s.It, 4, "torsion constant")
	add("Iw", s.Iw, 6, "warping constant")
	add("Wel,y", s.Wely, 3, "elastic modulus")
	add("Wel,z", s.Welz, 3, "")
	add("Wpl,y", s.Wply, 3, "plastic modulus")
	add("Wpl,z", s.Wplz, 3, "")
	add("Av,y", s.Avy, 2, "shear area, force along y")
	add("Av,z", s.Avz, 2, "shear area, force along z")
	p.appendRow("mass", quantity.Number(s.Mass, 3), "kg/m", "of steel, 7850 kg/m3")
	if s.PublishedMass > 0 {
		p.appendRow("", quantity.Number(s.PublishedMass, 3), "kg/m", "as published")
	}
	p.write(t.out, asText)
	if s.Source != "" {
		fmt.Fprintf(t.out, "Dimensions: %s.\n", s.Source)
	}
	fmt.Fprintln(t.out, "Properties are computed from the dimensions, root radii included.")
	for _, note := range s.Notes {
		fmt.Fprintln(t.out, note)
	}
}

// sectionDocument is a section in SI: m2, m4, m6, m3, kg/m.
type sectionDocument struct {
	Format string  `json:"format"`
	Title  string  `json:"title"`
	Source string  `json:"source,omitempty"`
	A      float64 `json:"A"`
	Iy     float64 `json:"Iy"`
	Iz     float64 `json:"Iz"`
	It     float64 `json:"It"`
	Iw     float64 `json:"Iw"`
	Wely   float64 `json:"Wely"`
	Welz   float64 `json:"Welz"`
	Wply   float64 `json:"Wply"`
	Wplz   float64 `json:"Wplz"`
	Avy    float64 `json:"Avy"`
	Avz    float64 `json:"Avz"`
	Mass   float64 `json:"mass"`
}

func documentOfSection(s *catalogue.Section) sectionDocument {
	return sectionDocument{"spanwright-section/1", s.Title, s.Source, s.A, s.Iy, s.Iz, s.It, s.Iw, s.Wely, s.Welz, s.Wply, s.Wplz, s.Avy, s.Avz, s.Mass}
}
