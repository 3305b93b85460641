package diagram

import (
	"bytes"
	"fmt"
	"image/color"
	"math"

	"gonum.org/v1/plot/font"
	"gonum.org/v1/plot/font/liberation"
	"gonum.org/v1/plot/vg"
	"gonum.org/v1/plot/vg/vgsvg"
)

// The look of a picture: sizes in points, colours that keep apart in print and
// for colour-blind eyes, readable on light and dark ground.
const (
	pictureWidth  = vg.Length(400)
	panelHeight   = vg.Length(124)
	margin        = vg.Length(34) // left and right, for the names of nodes
	roomAbove     = vg.Length(36) // above the drawing, for its heading and a label
	roomBelow     = vg.Length(18) // below it, for a label
	textSize      = vg.Length(10)
	samplesOfStep = 32
)

var (
	ground       = color.NRGBA{0xfb, 0xfa, 0xf6, 0xff}
	ink          = color.NRGBA{0x2b, 0x2f, 0x36, 0xff}
	quiet        = color.NRGBA{0x8a, 0x90, 0x99, 0xff}
	positiveLine = color.NRGBA{0x1b, 0x6c, 0x8e, 0xff}
	positiveFill = color.NRGBA{0xbf, 0xdc, 0xe6, 0xff}
	negativeLine = color.NRGBA{0xb3, 0x4a, 0x24, 0xff}
	negativeFill = color.NRGBA{0xf2, 0xd2, 0xc2, 0xff}
)

// Picture draws courses of one member one below the other and returns the SVG
// document.
func Picture(courses ...Course) ([]byte, error) {
	height := panelHeight * vg.Length(max(len(courses), 1))
	canvas := vgsvg.New(pictureWidth, height)
	p := &painter{canvas: canvas, face: labelFace()}
	p.canvas.SetColor(ground)
	p.canvas.Fill(rectangle(0, 0, pictureWidth, height))
	for i := range courses {
		p.panel(&courses[i], height-panelHeight*vg.Length(i+1))
	}
	var b bytes.Buffer
	if _, err := canvas.WriteTo(&b); err != nil {
		return nil, fmt.Errorf("the picture cannot be written: %w", err)
	}
	return b.Bytes(), nil
}

func labelFace() font.Face {
	cache := font.NewCache(liberation.Collection())
	return cache.Lookup(font.Font{Typeface: "Liberation", Variant: "Sans"}, textSize)
}

// painter draws panels; y points up, as in vg.
type painter struct {
	canvas vg.Canvas
	face   font.Face
}

// panel draws one course with its foot at the given height.
func (p *painter) panel(c *Course, foot vg.Length) {
	f := frameOf(c, foot)
	p.text(c.Label+", "+c.Unit.Symbol, f.left, foot+panelHeight-textSize-2, start, quiet)
	if c.positive() {
		p.area(c, &f, 1, positiveFill, positiveLine)
	}
	if c.negative() {
		p.area(c, &f, -1, negativeFill, negativeLine)
	}
	p.member(c, &f)
	if c.positive() {
		p.extreme(c, &f, c.Most, positiveLine)
	}
	if c.negative() {
		p.extreme(c, &f, c.Least, negativeLine)
	}
	if !c.positive() && !c.negative() {
		p.text("zero along the whole length", (f.left+f.right)/2, f.axis+4, middle, quiet)
	}
}

// frame places a course in its panel.
type frame struct {
	left, right, axis vg.Length
	scale             float64 // points per unit of the quantity, with the sign of upward
	length            float64 // m
}

func frameOf(c *Course, foot vg.Length) frame {
	f := frame{left: margin, right: pictureWidth - margin, length: c.Length}
	above, below := math.Max(c.Most.Value, 0), math.Max(-c.Least.Value, 0)
	upward := 1.0
	if c.Flipped {
		above, below, upward = below, above, -1
	}
	low, high := foot+roomBelow, foot+panelHeight-roomAbove
	f.axis = (low + high) / 2
	if total := above + below; total > 0 {
		f.axis = low + (high-low)*vg.Length(below/total)
		f.scale = upward * float64(high-low) / total
	}
	return f
}

func (f *frame) x(at float64) vg.Length {
	if f.length <= 0 {
		return f.left
	}
	return f.left + (f.right-f.left)*vg.Length(at/f.length)
}

func (f *frame) point(at, value float64) vg.Point {
	return vg.Point{X: f.x(at), Y: f.axis + vg.Length(value*f.scale)}
}

// area fills the part of one sign between the curve and the member.
func (p *painter) area(c *Course, f *frame, sign float64, fill, line color.Color) {
	var outline vg.Path
	outline.Move(f.point(0, 0))
	var course vg.Path
	steps := append([]float64{0}, c.Steps...)
	steps = append(steps, c.Length)
	started := false
	for i := range len(steps) - 1 {
		from, to := steps[i], steps[i+1]
		if to-from <= 1e-9*c.Length {
			continue
		}
		for k := range samplesOfStep + 1 {
			share := math.Min(math.Max(float64(k)/samplesOfStep, 1e-7), 1-1e-7)
			at := from + (to-from)*share
			point := f.point(at, sign*math.Max(sign*c.Value(at), 0))
			outline.Line(point)
			if started {
				course.Line(point)
			} else {
				course.Move(point)
				started = true
			}
		}
	}
	outline.Line(f.point(c.Length, 0))
	outline.Close()
	p.canvas.SetColor(fill)
	p.canvas.Fill(outline)
	p.canvas.SetColor(line)
	p.canvas.SetLineWidth(1)
	p.canvas.Stroke(course)
}

// member draws the member itself with its end nodes.
func (p *painter) member(c *Course, f *frame) {
	var axis vg.Path
	axis.Move(f.point(0, 0))
	axis.Line(f.point(c.Length, 0))
	p.canvas.SetColor(ink)
	p.canvas.SetLineWidth(1.6)
	p.canvas.Stroke(axis)
	for _, at := range []float64{0, c.Length} {
		p.dot(f.point(at, 0), 2.4, ink)
	}
	p.text(c.First, f.left-7, f.axis-textSize/3, end, ink)
	p.text(c.Last, f.right+7, f.axis-textSize/3, start, ink)
}

// extreme marks and labels a value on the side of the curve that it is on.
func (p *painter) extreme(c *Course, f *frame, m Mark, line color.Color) {
	at := f.point(m.At, m.Value)
	p.dot(at, 2, line)
	side, x := middle, at.X
	switch {
	case at.X < f.left+50:
		side, x = start, at.X+5
	case at.X > f.right-50:
		side, x = end, at.X-5
	}
	y := at.Y + 4
	if at.Y < f.axis {
		y = at.Y - textSize - 1
	}
	p.text(c.words(m), x, y, side, line)
}

func (p *painter) dot(at vg.Point, radius vg.Length, fill color.Color) {
	var circle vg.Path
	circle.Move(vg.Point{X: at.X + radius, Y: at.Y})
	circle.Arc(at, radius, 0, 2*math.Pi)
	circle.Close()
	p.canvas.SetColor(fill)
	p.canvas.Fill(circle)
}

// anchor says which part of a text stands at its place.
type anchor int

const (
	start anchor = iota
	middle
	end
)

func (p *painter) text(text string, x, y vg.Length, a anchor, fill color.Color) {
	if text == "" {
		return
	}
	width := p.face.Width(text)
	switch a {
	case middle:
		x -= width / 2
	case end:
		x -= width
	}
	x = min(max(x, 2), pictureWidth-width-2)
	p.canvas.SetColor(fill)
	p.canvas.FillString(p.face, vg.Point{X: x, Y: y}, text)
}

func rectangle(x, y, width, height vg.Length) vg.Path {
	var r vg.Path
	r.Move(vg.Point{X: x, Y: y})
	r.Line(vg.Point{X: x + width, Y: y})
	r.Line(vg.Point{X: x + width, Y: y + height})
	r.Line(vg.Point{X: x, Y: y + height})
	r.Close()
	return r
}
