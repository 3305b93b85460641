package format

import "spanwright/lang/syntax"

const (
	// step is what the widths of columns are rounded up to, so that most edits
	// change the blanks of their own line only.
	step = 4
	// widest is the cell beyond which a row goes its own way, so that one long
	// name does not push all others aside.
	widest = 40
)

// align lines up the cells and comments of the rows of each paragraph: a run of
// statements of one kind with no blank line between; comment lines do not end
// it.
func (l *layout) align() {
	for start := 0; start < len(l.rows); {
		r := &l.rows[start]
		if r.raw != "" || r.blank || r.cells == 0 {
			start++
			continue
		}
		end := l.paragraph(start)
		l.alignCells()
		l.alignComments()
		start = end
	}
}

// paragraph finds the rows that line up with row start, and returns the index
// behind the last one.
func (l *layout) paragraph(start int) int {
	first := &l.rows[start]
	l.members = append(l.members[:0], first)
	end := start + 1
	if first.kind == syntax.UnknownKind {
		return end
	}
	for i := start + 1; i < len(l.rows); i++ {
		r := &l.rows[i]
		if r.blank || r.raw != "" {
			break
		}
		if r.cells == 0 {
			continue // a comment line
		}
		if r.kind != first.kind || r.depth != first.depth {
			break
		}
		l.members = append(l.members, r)
		end = i + 1
	}
	return end
}

// alignCells pads each column to its width; the last cell of a row is not
// padded.
func (l *layout) alignCells() {
	columns := 0
	for _, r := range l.members {
		columns = max(columns, r.cells)
	}
	for c := range columns - 1 {
		width := 0
		for _, r := range l.members {
			if c < r.cells-1 {
				if w := l.cells[r.first+c].width; w <= widest {
					width = max(width, w)
				}
			}
		}
		if len(l.members) > 1 && !keywordColumn(l.members[0].kind, c) {
			width = roundUp(width+1) - 1
		}
		for _, r := range l.members {
			if c < r.cells-1 {
				x := &l.cells[r.first+c]
				x.pad = max(0, width-x.width)
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
func (l *layout) alignComments() {
	width, any := 0, false
	for _, r := range l.members {
		if r.comment != "" {
			any = true
			if w := l.widthOf(r); w <= 2*widest {
				width = max(width, w)
			}
		}
	}
	if !any {
		return
	}
	if len(l.members) > 1 {
		width = roundUp(width + 2)
	} else {
		width += 2
	}
	for _, r := range l.members {
		if r.comment != "" {
			r.commentGap = width - l.widthOf(r)
		}
	}
}

// widthOf returns the width of a row's cells in characters.
func (l *layout) widthOf(r *row) int {
	width := max(0, r.cells-1) // a blank between each two
	for _, c := range l.cellsOf(r) {
		width += c.width + c.pad
	}
	return width
}

func roundUp(width int) int { return (width + step - 1) / step * step }
