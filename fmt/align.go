package format

import (
	"strings"
	"unicode/utf8"

	"spanwright/lang/syntax"
)

const (
	// step is what the widths of columns are rounded up to, so that most edits
	// change the blanks of their own line only.
	step = 4
	// widest is the cell beyond which a row goes its own way, so that one long
	// name does not push all others aside.
	widest = 40
)

// align joins the cells of all rows, those of a paragraph in columns. A
// paragraph is a run of statements of one kind with no blank line between;
// comment lines do not end it.
func align(rows []row) {
	for start := 0; start < len(rows); {
		if rows[start].raw || rows[start].blank || len(rows[start].cells) == 0 {
			start++
			continue
		}
		members, end := paragraph(rows, start)
		alignCells(members)
		alignComments(members)
		start = end
	}
}

// paragraph returns the rows that line up with row start, and the index behind
// the last one.
func paragraph(rows []row, start int) ([]*row, int) {
	first := &rows[start]
	members := []*row{first}
	if first.kind == syntax.UnknownKind {
		return members, start + 1
	}
	end := start + 1
	for i := start + 1; i < len(rows); i++ {
		r := &rows[i]
		if r.blank || r.raw {
			break
		}
		if len(r.cells) == 0 {
			continue // a comment line
		}
		if r.kind != first.kind || r.depth != first.depth {
			break
		}
		members = append(members, r)
		end = i + 1
	}
	return members, end
}

// alignCells pads each column to its width; the last cell of a row is not
// padded.
func alignCells(members []*row) {
	columns := 0
	for _, r := range members {
		columns = max(columns, len(r.cells))
	}
	for c := range columns {
		width := 0
		for _, r := range members {
			if c < len(r.cells)-1 {
				if w := utf8.RuneCountInString(r.cells[c]); w <= widest {
					width = max(width, w)
				}
			}
		}
		if len(members) > 1 && !keywordColumn(members[0].kind, c) {
			width = roundUp(width+1) - 1
		}
		for _, r := range members {
			if c >= len(r.cells) {
				continue
			}
			if c > 0 {
				r.text += " "
			}
			r.text += r.cells[c]
			if c < len(r.cells)-1 {
				r.text += strings.Repeat(" ", max(0, width-utf8.RuneCountInString(r.cells[c])))
			}
		}
	}
}

// keywordColumn reports whether a column holds the key words of members, which
// are padded to the longest and no further.
func keywordColumn(kind syntax.Kind, column int) bool {
	return kind == syntax.BeamKind && column == 0
}

// alignComments puts the comments behind the rows of a paragraph into one
// column.
func alignComments(members []*row) {
	width := 0
	for _, r := range members {
		if r.comment != "" {
			if w := utf8.RuneCountInString(r.text); w <= 2*widest {
				width = max(width, w)
			}
		}
	}
	if len(members) > 1 {
		width = roundUp(width + 2)
	} else {
		width += 2
	}
	for _, r := range members {
		r.commentGap = width - utf8.RuneCountInString(r.text)
	}
}

func roundUp(width int) int { return (width + step - 1) / step * step }
