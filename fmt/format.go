package format

import (
	"strings"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// File returns the text of a file in normal form. Files with CRLF line ends
// keep them. A text that is in normal form comes back as it is.
func File(file *source.File) string { return Tree(syntax.Parse(file)) }

// Tree returns the normal form of a file that has been read.
func Tree(tree *syntax.Tree) string {
	rows := layOut(tree)
	align(rows)
	lineEnd := "\n"
	if crlf(tree.File.Text) {
		lineEnd = "\r\n"
	}
	return write(rows, lineEnd)
}

// crlf reports whether the first line of a text ends with "\r\n".
func crlf(text string) bool {
	n := strings.IndexByte(text, '\n')
	return n > 0 && text[n-1] == '\r'
}

// indent is what one level of block is moved in by.
const indent = "    "

// write puts rows together, with at most one blank line in a row, none at the
// start, and one line end at the end.
func write(rows []row, lineEnd string) string {
	var out strings.Builder
	gap := false
	for i := range rows {
		r := &rows[i]
		if r.blank {
			gap = out.Len() > 0
			continue
		}
		if gap {
			out.WriteString(lineEnd)
			gap = false
		}
		if r.raw {
			out.WriteString(r.text)
		} else {
			line := strings.Repeat(indent, r.depth) + r.text
			if r.comment != "" {
				if r.text != "" {
					line += strings.Repeat(" ", max(r.commentGap, 2))
				}
				line += r.comment
			}
			out.WriteString(strings.TrimRight(line, " \t"))
		}
		out.WriteString(lineEnd)
	}
	return out.String()
}
