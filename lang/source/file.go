package source

import (
	"sort"
	"strings"
	"unicode/utf8"
)

// Encoding says what a [Point]'s character counts.
type Encoding int

const (
	// UTF16 counts 16-bit code units: the protocol's default.
	UTF16 Encoding = iota
	// UTF8 counts bytes.
	UTF8
)

// Position is a place for people: line and column count from 1, the column in
// Unicode code points.
type Position struct {
	Line, Column int
}

// Point is a place in the protocol's terms: line and character count from 0,
// the character in code units of an [Encoding].
type Point struct {
	Line, Character int
}

// File is the text of one file with its line table. It does not change: an
// edit makes a new File.
type File struct {
	// Path names the file for people and for resolving "use": a slash-separated
	// path, absolute where the file came from disk or an editor.
	Path string
	// Text is the whole text, a byte-order mark included where there is one.
	Text string

	lines []int // offset of each line's first byte; lines[0] == 0
	long  *longLines
}

// New returns a file with its line table.
func New(path, text string) *File {
	return &File{Path: path, Text: text, lines: lineStarts(text), long: &longLines{}}
}

func lineStarts(text string) []int {
	starts := make([]int, 1, 1+strings.Count(text, "\n"))
	for i := 0; i < len(text); {
		next := strings.IndexAny(text[i:], "\r\n")
		if next < 0 {
			break
		}
		i += next + 1
		if text[i-1] == '\r' && i < len(text) && text[i] == '\n' {
			i++
		}
		starts = append(starts, i)
	}
	return starts
}

// Lines returns the number of lines; an empty text has one.
func (f *File) Lines() int { return len(f.lines) }

// LineStart returns the offset of the first byte of a line, counted from 0.
// A line beyond the last one starts at the end of the text.
func (f *File) LineStart(line int) int {
	switch {
	case line < 0:
		return 0
	case line >= len(f.lines):
		return len(f.Text)
	}
	return f.lines[line]
}

// LineEnd returns the offset behind the last byte of a line's text, its line
// end not included. Lines count from 0.
func (f *File) LineEnd(line int) int {
	end := f.LineStart(line + 1)
	if line+1 >= len(f.lines) {
		return len(f.Text)
	}
	start := f.LineStart(line)
	if end > start && f.Text[end-1] == '\n' {
		end--
	}
	if end > start && f.Text[end-1] == '\r' {
		end--
	}
	return end
}

// LineAt returns the line, counted from 0, that holds the offset. Offsets
// outside the text count as its nearest end.
func (f *File) LineAt(offset int) int {
	return sort.Search(len(f.lines), func(i int) bool { return f.lines[i] > offset }) - 1 + before(offset)
}

// before is 1 for an offset before the text, whose search would give line −1.
func before(offset int) int {
	if offset < 0 {
		return 1
	}
	return 0
}

// Position returns the place of an offset for people.
func (f *File) Position(offset int) Position {
	offset = f.clamp(offset)
	line := f.LineAt(offset)
	m := f.markBefore(f.lines[line], f.LineEnd(line), func(m mark) bool { return m.offset > offset })
	return Position{Line: line + 1, Column: m.runes + utf8.RuneCountInString(f.Text[m.offset:offset]) + 1}
}

// Point returns the place of an offset in the protocol's terms. An offset
// inside a code point counts as the start of that code point.
func (f *File) Point(offset int, encoding Encoding) Point {
	offset = f.clamp(offset)
	line := f.LineAt(offset)
	start := f.lines[line]
	offset = min(offset, max(f.LineEnd(line), start))
	for offset > start && offset < len(f.Text) && !utf8.RuneStart(f.Text[offset]) {
		offset--
	}
	if encoding == UTF8 {
		return Point{line, offset - start}
	}
	m := f.markBefore(start, f.LineEnd(line), func(m mark) bool { return m.offset > offset })
	units := m.units
	for _, r := range f.Text[m.offset:offset] {
		units += unitsOf(r)
	}
	return Point{line, units}
}

// Offset returns the offset of a place in the protocol's terms. A character
// beyond the line's end counts as the line's end, as the protocol demands; a
// line beyond the last one counts as the end of the text; a character inside
// a code point counts as its start.
func (f *File) Offset(p Point, encoding Encoding) int {
	if p.Line < 0 {
		return 0
	}
	if p.Line >= len(f.lines) {
		return len(f.Text)
	}
	start, end := f.lines[p.Line], f.LineEnd(p.Line)
	if p.Character <= 0 {
		return start
	}
	if encoding == UTF8 {
		offset := min(start+p.Character, end)
		for offset > start && offset < len(f.Text) && !utf8.RuneStart(f.Text[offset]) {
			offset--
		}
		return offset
	}
	m := f.markBefore(start, end, func(m mark) bool { return m.units > p.Character })
	units := m.units
	for i, r := range f.Text[m.offset:end] {
		units += unitsOf(r)
		if units > p.Character {
			return m.offset + i
		}
	}
	return end
}

// Slice returns the text of a span, cut to the file.
func (f *File) Slice(s Span) string {
	start, end := f.clamp(s.Start), f.clamp(s.End)
	if end < start {
		return ""
	}
	return f.Text[start:end]
}

func (f *File) clamp(offset int) int { return max(0, min(offset, len(f.Text))) }

// unitsOf returns how many UTF-16 code units a code point takes. A byte that is
// not valid UTF-8 decodes to U+FFFD and counts one.
func unitsOf(r rune) int {
	if r >= 0x10000 {
		return 2
	}
	return 1
}
