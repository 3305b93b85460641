package format

import (
	"strings"

	"spanwright/lang/syntax"
)

// row is one line of the output.
type row struct {
	blank bool
	// raw are lines of the input, byte for byte.
	raw   string
	depth int

	// kind is the kind of paragraph that the row can stand in; 0 for none.
	kind syntax.Kind
	// first and cells are the parts that line up with those of the rows around
	// it: where they start in the layout, and how many.
	first, cells int

	comment    string
	commentGap int
}

// cell is a part of a row.
type cell struct {
	start, end int // in layout.spelled
	width      int // in characters
	pad        int // blanks behind it
}

// layout walks through the file and makes rows.
type layout struct {
	tree    *syntax.Tree
	text    string
	pattern func(*syntax.Statement, []syntax.Token) syntax.Pattern
	at      int // everything before is in rows
	depth   int
	rows    []row
	off     bool // between "# format off" and "# format on"

	spelled []byte // the text of all cells
	cells   []cell
	pieces  []piece // of the statement at hand
	members []*row  // of the paragraph at hand
}

func (l *layout) cellsOf(r *row) []cell { return l.cells[r.first : r.first+r.cells] }

// layOut returns the rows of a file.
func layOut(tree *syntax.Tree, pattern func(*syntax.Statement, []syntax.Token) syntax.Pattern) *layout {
	l := &layout{tree: tree, text: tree.File.Text, pattern: pattern, rows: make([]row, 0, tree.File.Lines()+1)}
	var statements []statement
	for i := 0; i < len(tree.Units); {
		l.trivia(tree.Units[i].Start)
		n := l.cluster(i)
		statements = statements[:0]
		stays := l.off
		for j := i; j < n && !stays; j++ {
			s := tree.Units[j].Statement
			tokens := syntax.Tokens(s.Text)
			pattern := l.pattern(s, tokens)
			statements = append(statements, statement{s, tokens, pattern.Unary})
			stays = pattern.Broken
		}
		if stays {
			l.keep(i, n)
		} else {
			for j := i; j < n; j++ {
				l.statement(j, statements[j-i])
			}
		}
		i = n
	}
	l.trivia(len(l.text))
	return l
}

// statement is one that is laid out anew.
type statement struct {
	*syntax.Statement
	tokens []syntax.Token
	unary  []int // indices of tokens that are signs of one operand
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

// keep copies the lines of units i … n−1 as they are, their line ends included.
func (l *layout) keep(i, n int) {
	file := l.tree.File
	first, last := file.LineAt(l.tree.Units[i].Start), file.LineAt(l.tree.Units[n-1].End)
	l.rows = append(l.rows, row{raw: l.text[file.LineStart(first):file.LineEnd(last)]})
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
	l.rows = append(l.rows, row{raw: l.text[file.LineStart(line):file.LineEnd(line)]})
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
func (l *layout) statement(i int, s statement) {
	u := &l.tree.Units[i]
	if s.Kind == syntax.CloseKind {
		l.depth = max(0, depthOf(u.Block)-1)
	} else {
		l.depth = depthOf(u.Block)
	}
	l.spell(s)
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
