package format

import (
	"strings"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// File returns the text of a file in normal form. Files with CRLF line ends
// keep them. A text that is in normal form comes back as it is.
func File(file *source.File) string {
	var patterns syntax.Patterns
	return write(layOut(syntax.Outline(file), patterns.Of))
}

// Tree returns the normal form of a file that has been read.
func Tree(tree *syntax.Tree) string { return write(layOut(tree, syntax.PatternOf)) }

// crlf reports whether the first line of a text ends with "\r\n".
func crlf(text string) bool {
	n := strings.IndexByte(text, '\n')
	return n > 0 && text[n-1] == '\r'
}

const (
	// indent is what one level of block is moved in by.
	indent = "    "
	blanks = "                                                                "
)

// write puts rows together, with at most one blank line in a row, none at the
// start, and one line end at the end.
func write(l *layout) string {
	l.align()
	lineEnd := "\n"
	if crlf(l.text) {
		lineEnd = "\r\n"
	}
	out := make([]byte, 0, len(l.text)+len(l.text)/4)
	gap := false
	for i := range l.rows {
		r := &l.rows[i]
		if r.blank {
			gap = len(out) > 0
			continue
		}
		if gap {
			out = append(out, lineEnd...)
			gap = false
		}
		if r.raw != "" {
			out = append(out, r.raw...)
		} else {
			out = l.writeRow(out, r)
		}
		out = append(out, lineEnd...)
	}
	return string(out)
}

// writeRow adds one row that is laid out anew.
func (l *layout) writeRow(out []byte, r *row) []byte {
	for range r.depth {
		out = append(out, indent...)
	}
	cells := l.cellsOf(r)
	for c := range cells {
		if c > 0 {
			out = append(out, ' ')
		}
		out = append(out, l.spelled[cells[c].start:cells[c].end]...)
		if c < len(cells)-1 {
			out = pad(out, cells[c].pad)
		}
	}
	if r.comment != "" {
		if len(cells) > 0 {
			out = pad(out, max(r.commentGap, 2))
		}
		out = append(out, r.comment...)
	}
	for len(out) > 0 && (out[len(out)-1] == ' ' || out[len(out)-1] == '\t') {
		out = out[:len(out)-1]
	}
	return out
}

func pad(out []byte, n int) []byte {
	for ; n > len(blanks); n -= len(blanks) {
		out = append(out, blanks...)
	}
	return append(out, blanks[:n]...)
}
