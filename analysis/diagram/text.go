package diagram

import (
	"math"
	"strings"
	"unicode/utf8"
)

// blocks are the sizes that a row can show, none first.
var blocks = []rune(" ▁▂▃▄▅▆▇█")

// Text draws a course with rows of block characters, width characters wide, for
// a fixed-width font. Each line ends without a line end's blank; there is one
// line for each sign that the curve takes, and one that says so where it is
// zero throughout.
func Text(c Course, width int) string {
	if width < 1 {
		width = 1
	}
	if !c.positive() && !c.negative() {
		return c.Label + " 0 along the whole length"
	}
	var lines []string
	label := c.Label
	if c.positive() {
		lines = append(lines, c.row(label, "+", 1, c.Most, width))
		label = strings.Repeat(" ", utf8.RuneCountInString(label))
	}
	if c.negative() {
		lines = append(lines, c.row(label, "−", -1, c.Least, width))
	}
	return strings.Join(lines, "\n")
}

// row draws the values of one sign.
func (c *Course) row(label, mark string, sign float64, extreme Mark, width int) string {
	var b strings.Builder
	b.WriteString(label + " " + mark + " " + c.First + " ")
	for i := range width {
		b.WriteRune(c.block(sign, i, width))
	}
	b.WriteString(" " + c.Last + "  " + c.words(extreme))
	return b.String()
}

// block returns the character of one place: the size of the largest value of
// the sign in its stretch, the exact extreme included.
func (c *Course) block(sign float64, i, width int) rune {
	from, to := c.Length*float64(i)/float64(width), c.Length*float64(i+1)/float64(width)
	size := 0.0
	const samples = 4
	for k := range samples + 1 {
		size = math.Max(size, sign*c.Value(from+(to-from)*float64(k)/samples))
	}
	for _, m := range []Mark{c.Most, c.Least} {
		if m.At >= from && (m.At < to || i == width-1) {
			size = math.Max(size, sign*m.Value)
		}
	}
	share := size / c.largest()
	if share < negligible || math.IsNaN(share) {
		return blocks[0]
	}
	level := int(math.Round(share * float64(len(blocks)-1)))
	return blocks[min(max(level, 1), len(blocks)-1)]
}
