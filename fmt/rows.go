package format

import (
	"strings"

	"spanwright/lang/syntax"
)

// row is one line of the output.
type row struct {
	blank bool
	raw   bool // text is lines of the input, byte for byte
	depth int

	// kind is the kind of paragraph that the row can stand in; 0 for none.
	kind syntax.Kind
	// cells are the parts that line up with those of the rows around it; text is
	// what they make, once aligned.
	cells []string
	text  string

	comment    string
	commentGap int
}

// layout walks through the file and makes rows.
type layout struct {
	tree  *syntax.Tree
	text  string
	at    int // everything before is in rows
	depth int
	rows  []row
	off   bool // between "# format off" and "# format on"
}

// layOut returns the rows of a file.
func layOut(tree *syntax.Tree) []row {
	l := &layout{tree: tree, text: tree.File.Text}
	for i := 0; i < len(tree.Units); {
		l.trivia(tree.Units[i].Start)
		n := l.cluster(i)
		if l.off || l.mustStay(i, n) {
			l.keep(i, n)
		} else {
			for j := i; j < n; j++ {
				l.statement(j)
			}
		}
		i = n
	}
	l.trivia(len(l.text))
	return l.rows
}

// cluster returns the index behind the last unit that shares a line with unit
// i, directly or through others.
func (l *layout) cluster(i int) int {
	end := i + 1
	for end < len(l.tree.Units) && l.tree.File.LineAt(l.tree.Units[end].Start) == l.tree.File.LineAt(l.tree.Units[end-1].End) {
		end++
	}
	return end
}

// mustStay reports whether one of the units i … n−1 cannot be read.
func (l *layout) mustStay(i, n int) bool {
	for _, u := range l.tree.Units[i:n] {
		if u.Statement.Broken() {
			return true
		}
	}
	return false
}

// keep copies the lines of units i … n−1 as they are, their line ends included.
func (l *layout) keep(i, n int) {
	file := l.tree.File
	first, last := file.LineAt(l.tree.Units[i].Start), file.LineAt(l.tree.Units[n-1].End)
	l.rows = append(l.rows, row{raw: true, text: l.text[file.LineStart(first):file.LineEnd(last)]})
	for j := i; j < n; j++ {
		l.block(j)
	}
	l.at = file.LineEnd(last)
}

// block follows the opening and closing of blocks.
func (l *layout) block(i int) {
	u := &l.tree.Units[i]
	l.depth = depthOf(u.Block)
	switch {
	case u.Statement.Kind == syntax.CloseKind:
		l.depth = max(0, l.depth-1)
	case opens(u.Statement):
		l.depth++
	}
}

func opens(s *syntax.Statement) bool {
	return (s.Kind == syntax.CaseKind || s.Kind == syntax.PartKind) && strings.HasSuffix(s.Text, "{")
}

func depthOf(b syntax.Block) int {
	switch b {
	case syntax.TopLevel:
		return 0
	case syntax.InCaseOfPart:
		return 2
	}
	return 1
}

// trivia turns the blank lines and comments up to an offset into rows. The
// comment behind a statement has been taken with it.
func (l *layout) trivia(end int) {
	file := l.tree.File
	// Where the next statement starts on a line of its own, its indentation is
	// not a line to speak of.
	for l.at < end {
		line := file.LineAt(l.at)
		stop := min(file.LineEnd(line), end)
		content := trim(l.text[l.at:stop])
		wholeLine := stop == file.LineEnd(line)
		switch {
		case strings.HasPrefix(content, "#"):
			l.commentRow(line, content)
		case content == "" && wholeLine && l.at == file.LineStart(line) && stop < len(l.text):
			l.rows = append(l.rows, row{blank: true})
		}
		if stop == end {
			break
		}
		l.at = file.LineStart(line + 1)
	}
	l.at = max(l.at, end)
}

// commentRow adds a line that holds nothing but a comment.
func (l *layout) commentRow(line int, content string) {
	switch directive(content) {
	case "off":
		l.off = true
	case "on":
		l.off = false
		l.rawLine(line)
		return
	}
	if l.off {
		l.rawLine(line)
		return
	}
	l.rows = append(l.rows, row{depth: l.depth, comment: content})
}

func (l *layout) rawLine(line int) {
	file := l.tree.File
	l.rows = append(l.rows, row{raw: true, text: l.text[file.LineStart(line):file.LineEnd(line)]})
}

// directive returns "off" or "on" for the comments that switch the formatter.
func directive(comment string) string {
	words := strings.Fields(strings.TrimPrefix(comment, "#"))
	if len(words) == 2 && words[0] == "format" && (words[1] == "off" || words[1] == "on") {
		return words[1]
	}
	return ""
}

// statement adds the rows of one statement with the comment behind it.
func (l *layout) statement(i int) {
	u := &l.tree.Units[i]
	if u.Statement.Kind == syntax.CloseKind {
		l.depth = max(0, depthOf(u.Block)-1)
	} else {
		l.depth = depthOf(u.Block)
	}
	depth := l.depth
	lines := spaced(u.Statement)
	for n, line := range lines {
		r := row{depth: depth, cells: line.cells, comment: line.comment}
		if n == 0 {
			r.kind = paragraphKind(u.Statement.Kind)
		} else if !line.closes {
			r.depth++
		}
		l.rows = append(l.rows, r)
	}
	l.at = u.End
	// A comment behind the last token belongs to its line.
	file := l.tree.File
	stop := file.LineEnd(file.LineAt(u.End))
	if i+1 < len(l.tree.Units) {
		stop = min(stop, l.tree.Units[i+1].Start)
	}
	if rest := trim(l.text[u.End:stop]); strings.HasPrefix(rest, "#") {
		l.rows[len(l.rows)-1].comment = rest
		l.at = stop
	}
	l.block(i)
	l.skipLineEnd()
}

// skipLineEnd goes to the next line if nothing more stands on this one.
func (l *layout) skipLineEnd() {
	file := l.tree.File
	line := file.LineAt(l.at)
	if trim(l.text[l.at:file.LineEnd(line)]) == "" {
		l.at = file.LineStart(line + 1)
	}
}

// paragraphKind returns the kind under which statements line up: members of
// all sorts together.
func paragraphKind(k syntax.Kind) syntax.Kind {
	switch k {
	case syntax.BarKind, syntax.LinkKind, syntax.SpringKind:
		return syntax.BeamKind
	case syntax.CloseKind, syntax.CaseKind, syntax.PartKind:
		return syntax.UnknownKind
	}
	return k
}

// trim cuts blanks of all sorts off both ends.
func trim(s string) string { return strings.Trim(s, " \t\u00a0\ufeff\r\n\v\f") }
