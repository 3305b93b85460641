package resolve

import (
	"cmp"
	"slices"
	"strings"

	"github.com/agnivade/levenshtein"
)

// nearest returns the names that a word was probably meant to be, the nearest
// first, three at the most.
func nearest(word string, names []string) []string {
	type candidate struct {
		name     string
		distance int
	}
	// One slip in short names, two in longer ones.
	most := 1
	if len(word) > 3 {
		most = 2
	}
	if len(word) > 8 {
		most = 3
	}
	var found []candidate
	lower := strings.ToLower(word)
	for _, name := range names {
		if name == word || name == "" || abs(len(name)-len(word)) > most {
			continue
		}
		d := levenshtein.ComputeDistance(lower, strings.ToLower(name))
		switch {
		case strings.EqualFold(name, word):
		case d > most || d >= len(word) || d >= len(name):
			continue
		}
		found = append(found, candidate{name, d})
	}
	slices.SortFunc(found, func(a, b candidate) int {
		return cmp.Or(cmp.Compare(a.distance, b.distance), cmp.Compare(a.name, b.name))
	})
	var list []string
	for _, c := range found {
		if len(list) < 3 && !slices.Contains(list, c.name) {
			list = append(list, c.name)
		}
	}
	return list
}

func abs(x int) int {
	if x < 0 {
		return -x
	}
	return x
}

// either joins names as alternatives: "A", "A or B", "A, B or C".
func either(names []string) string { return joinWords(names, "or") }

// both joins names as a whole: "A", "A and B", "A, B and C".
func both(names []string) string { return joinWords(names, "and") }

func joinWords(names []string, word string) string {
	if len(names) < 2 {
		return strings.Join(names, "")
	}
	last := len(names) - 1
	return strings.Join(names[:last], ", ") + " " + word + " " + names[last]
}
