package syntax

import (
	"runtime"
	"strings"
	"sync"

	"spanwright/lang/source"
)

// Parse reads a whole file. It never fails: a statement that cannot be read is
// broken, and the others stand.
func Parse(file *source.File) *Tree {
	t := cutUp(file, strings.Clone)
	readAll(t.Units)
	return t
}

// cutUp cuts a file into statements and leaves them unread. keep makes the text
// that a statement holds.
func cutUp(file *source.File, keep func(string) string) *Tree {
	t := &Tree{File: file}
	s := splitter{text: file.Text}
	for {
		before := s.block
		c, ok := s.next()
		if !ok {
			break
		}
		t.Units = append(t.Units, unitOf(file.Text, c, before, keep))
	}
	t.end = s.block
	return t
}

// unitOf returns the unit of a cut with its statement unread. A clone keeps the
// statement from holding the whole old text alive.
func unitOf(text string, c cut, before Block, keep func(string) string) Unit {
	return Unit{
		Start: c.start, End: c.end, Block: c.block, before: before, implicit: c.implicit,
		Statement: &Statement{Kind: c.kind, Text: keep(text[c.start:c.end])},
	}
}

// worthSharing is the number of statements from which reading pays on several
// goroutines.
const worthSharing = 500

// readAll reads the statements of units, on all processors where it pays.
func readAll(units []Unit) {
	workers := min(runtime.GOMAXPROCS(0), len(units)/worthSharing)
	if workers < 2 {
		for i := range units {
			units[i].Statement.read()
		}
		return
	}
	var wait sync.WaitGroup
	for w := range workers {
		share := units[len(units)*w/workers : len(units)*(w+1)/workers]
		wait.Go(func() {
			for i := range share {
				share[i].Statement.read()
			}
		})
	}
	wait.Wait()
}

// read fills the statement from its text.
func (s *Statement) read() {
	if s.Kind == CloseKind {
		return
	}
	tokens := Tokens(s.Text)
	if s.Kind == UnknownKind {
		s.Problems = []Problem{unknownStatement(s.Text, tokens)}
		return
	}
	tree, stuck := parseTree(s.Kind, s.Text, tokens)
	s.Tree = tree
	if p := s.wrong(tokens, stuck); p != nil {
		s.Problems = []Problem{*p}
	}
}

// Reparse reads a file that has come from the tree's file by an edit. What the
// edit did not touch is taken over as it is.
func (t *Tree) Reparse(file *source.File) *Tree {
	old, text := t.File.Text, file.Text
	prefix := commonPrefix(old, text)
	suffix := commonSuffix(old[prefix:], text[prefix:])
	delta := len(text) - len(old)

	// The end of a statement depends on the first word behind it, so the last
	// two statements before the edit are read again.
	kept := t.UnitBefore(prefix) - 1
	for kept > 0 && t.Units[kept-1].End >= prefix {
		kept--
	}
	kept = max(kept, 0)
	s := splitter{text: text}
	if kept < len(t.Units) {
		s.block = t.Units[kept].before
	} else {
		s.block = t.end
	}
	if kept > 0 {
		s.at = t.Units[kept-1].End
	}

	n := &Tree{File: file, Units: make([]Unit, kept, len(t.Units)+8), end: s.block}
	copy(n.Units, t.Units)
	resume := len(t.Units) // the old unit at which old and new run together again
	for {
		before := s.block
		c, ok := s.next()
		if !ok {
			n.end = s.block
			break
		}
		if c.start >= len(text)-suffix {
			if i := t.unitStarting(c.start - delta); i >= 0 && t.Units[i].before == before {
				resume, n.end = i, t.end
				break
			}
		}
		n.Units = append(n.Units, unitOf(text, c, before, strings.Clone))
	}
	n.takeOver(t, kept, resume)
	for _, u := range t.Units[resume:] {
		u.Start += delta
		u.End += delta
		n.Units = append(n.Units, u)
	}
	return n
}

// takeOver reads the new units from kept on, but takes the statements of equal
// text over from the old units kept … resume.
func (t *Tree) takeOver(old *Tree, kept, resume int) {
	spare := map[string][]*Statement{}
	for _, u := range old.Units[kept:resume] {
		spare[u.Statement.Text] = append(spare[u.Statement.Text], u.Statement)
	}
	fresh := make([]Unit, 0, len(t.Units)-kept)
	for i := kept; i < len(t.Units); i++ {
		u := &t.Units[i]
		same := spare[u.Statement.Text]
		if len(same) > 0 && same[0].Kind == u.Statement.Kind {
			u.Statement = same[0]
			spare[u.Statement.Text] = same[1:]
			continue
		}
		fresh = append(fresh, *u)
	}
	readAll(fresh) // units share their statements by address
}

// unitStarting returns the index of the unit that starts at an offset, or −1.
func (t *Tree) unitStarting(offset int) int {
	if i := t.UnitBefore(offset); i >= 0 && t.Units[i].Start == offset {
		return i
	}
	return -1
}

// commonPrefix returns how many bytes two texts share at their start.
func commonPrefix(a, b string) int {
	n := min(len(a), len(b))
	i := 0
	// Whole blocks first: the comparison of strings runs at memory speed.
	for ; i+4096 <= n && a[i:i+4096] == b[i:i+4096]; i += 4096 {
	}
	for i < n && a[i] == b[i] {
		i++
	}
	return i
}

// commonSuffix returns how many bytes two texts share at their end.
func commonSuffix(a, b string) int {
	n := min(len(a), len(b))
	i := 0
	for ; i+4096 <= n && a[len(a)-i-4096:len(a)-i] == b[len(b)-i-4096:len(b)-i]; i += 4096 {
	}
	for i < n && a[len(a)-1-i] == b[len(b)-1-i] {
		i++
	}
	return i
}
