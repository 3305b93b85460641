package source

import (
	"sort"
	"sync"
)

// stride is the distance in bytes between the marks of a long line. In lines
// that are no longer, places are counted from the line's start.
const stride = 1024

// mark is a place in a long line, at the start of a code point, with what has
// been counted from the line's start to it.
type mark struct{ offset, units, runes int }

// longLines keeps marks of the long lines of a file, made when a place in one
// is first asked for. Without them, to tell n places in one line would take n
// times its length.
type longLines struct {
	mutex sync.Mutex
	marks map[int][]mark // by the line's start
}

// of returns the marks of the line that reaches from start to end.
func (l *longLines) of(text string, start, end int) []mark {
	l.mutex.Lock()
	defer l.mutex.Unlock()
	if marks, ok := l.marks[start]; ok {
		return marks
	}
	marks := []mark{{offset: start}}
	units, runes, last := 0, 0, start
	for i, r := range text[start:end] {
		if start+i-last >= stride {
			last = start + i
			marks = append(marks, mark{last, units, runes})
		}
		units += unitsOf(r)
		runes++
	}
	if l.marks == nil {
		l.marks = map[int][]mark{}
	}
	l.marks[start] = marks
	return marks
}

// markBefore returns the last mark of a line that is not behind a place, which
// behind tells; the line's start where the line is not long.
func (f *File) markBefore(start, end int, behind func(mark) bool) mark {
	if end-start <= stride || f.long == nil {
		return mark{offset: start}
	}
	marks := f.long.of(f.Text, start, end)
	return marks[sort.Search(len(marks)-1, func(i int) bool { return behind(marks[i+1]) })]
}
