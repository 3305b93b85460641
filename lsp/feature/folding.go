package feature

import (
	"strings"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Fold is a run of lines that an editor can fold away.
type Fold struct {
	// First and Last are lines, counted from 0.
	First, Last int
	Comment     bool
}

// Folds returns the blocks of cases and parts, statements over several lines,
// and runs of comment lines.
func Folds(tree *syntax.Tree) []Fold {
	var folds []Fold
	file := tree.File
	for i := range tree.Units {
		u := &tree.Units[i]
		first, last := file.LineAt(u.Start), file.LineAt(u.End)
		if closing := closingOf(tree, i); closing >= 0 {
			// The brace stays in sight.
			last = file.LineAt(tree.Units[closing].Start) - 1
		}
		if last > first {
			folds = append(folds, Fold{First: first, Last: last})
		}
	}
	return append(folds, commentFolds(file)...)
}

func commentFolds(file *source.File) []Fold {
	var folds []Fold
	start := -1
	for line := range file.Lines() + 1 {
		comment := line < file.Lines() && strings.HasPrefix(strings.TrimLeft(file.Text[file.LineStart(line):file.LineEnd(line)], " \t"), "#")
		switch {
		case comment && start < 0:
			start = line
		case !comment && start >= 0:
			if line-start > 1 {
				folds = append(folds, Fold{First: start, Last: line - 1, Comment: true})
			}
			start = -1
		}
	}
	return folds
}

// closingOf returns the index of the brace that closes the block that unit i
// opens, or −1 where it opens none or the brace is missing.
func closingOf(tree *syntax.Tree, i int) int {
	switch tree.Units[i].Statement.Kind {
	case syntax.CaseKind, syntax.PartKind:
		return tree.Closing(i)
	}
	return -1
}
