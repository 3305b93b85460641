package catalogue

import (
	"math"
	"slices"
	"strconv"
	"strings"
)

// Nearest suggests sections for a series and size that are not in the catalogue,
// the likeliest first, at most three, by their titles: the sizes next below and
// above of the series ("IPE 310": IPE 300, IPE 330), the same size of another
// series ("UB 203x203x46": UC 203x203x46), the series whose name is nearly
// written so ("IEP 300": IPE 300). Nothing like it: none.
func Nearest(series, size string) []string { return NearestTo(series + " " + size) }

// NearestTo is Nearest for a whole name.
func NearestTo(text string) []string {
	const most = 3
	l := stock()
	series, size := split(fold(text))
	var found []string
	suggest := func(titles ...string) {
		for _, t := range titles {
			if len(found) < most && !slices.Contains(found, t) {
				found = append(found, t)
			}
		}
	}
	if number, known := l.named[series]; known {
		for _, s := range l.shelves {
			if p, there := l.sized[fold(s.Name)+size]; there && size != "" {
				suggest(l.title(p))
			}
		}
		suggest(l.neighbours(number, size)...)
		return found
	}
	for _, name := range l.similarSeries(series) {
		if p, there := l.sized[name+size]; there {
			suggest(l.title(p))
		}
	}
	for _, name := range l.similarSeries(series) {
		suggest(l.neighbours(l.named[name], size)...)
	}
	return found
}

// NearestSeries suggests names of series for one that is not in the catalogue,
// the likeliest first.
func NearestSeries(name string) []string {
	l := stock()
	var found []string
	for _, similar := range l.similarSeries(fold(name)) {
		if title := l.shelves[l.named[similar]].Name; !slices.Contains(found, title) {
			found = append(found, title)
		}
	}
	return found
}

func (l *library) title(p place) string {
	s := l.shelves[p.shelf]
	return s.Name + " " + s.sizes[p.size]
}

// neighbours lists the sizes of a shelf that are nearest to one: below and above
// where a size is one number, the nearest three where it is several.
func (l *library) neighbours(number int, size string) []string {
	wanted := numbers(size)
	if len(wanted) == 0 {
		return nil
	}
	type candidate struct {
		index int
		apart float64
		above bool
	}
	var list []candidate
	for i, s := range l.shelves[number].sizes {
		have := numbers(fold(s))
		list = append(list, candidate{i, apart(wanted, have), have[0] > wanted[0]})
	}
	slices.SortStableFunc(list, func(a, b candidate) int {
		switch {
		case a.apart < b.apart:
			return -1
		case a.apart > b.apart:
			return 1
		}
		return 0
	})
	if len(wanted) == 1 && len(list) > 1 {
		second := slices.IndexFunc(list, func(c candidate) bool { return c.above != list[0].above })
		if second < 0 {
			second = 1
		}
		list = []candidate{list[0], list[second]}
	}
	var titles []string
	for _, c := range list[:min(3, len(list))] {
		titles = append(titles, l.title(place{number, c.index}))
	}
	return titles
}

// numbers reads the numbers of a folded size.
func numbers(size string) []float64 {
	var list []float64
	for _, part := range strings.FieldsFunc(size, func(r rune) bool { return r != '.' && (r < '0' || r > '9') }) {
		if n, err := strconv.ParseFloat(part, 64); err == nil && !math.IsInf(n, 0) {
			list = append(list, n)
		}
	}
	return list
}

// apart measures how far a size is from the wanted one: the sum of the relative
// differences, and 1 for each number that only one of them has.
func apart(wanted, have []float64) float64 {
	var sum float64
	for i := range max(len(wanted), len(have)) {
		if i >= len(wanted) || i >= len(have) || wanted[i] == 0 {
			sum++
			continue
		}
		sum += math.Abs(wanted[i]-have[i]) / wanted[i]
	}
	return sum
}

// similarSeries lists the folded names of series that differ from one in few
// letters, the most alike first.
func (l *library) similarSeries(name string) []string {
	if name == "" {
		return nil
	}
	return similar(name, func(yield func(string)) {
		for _, s := range l.shelves {
			for _, known := range append([]string{s.Name}, s.Also...) {
				yield(fold(known))
			}
		}
	})
}

// similar lists the names that can be had from one by at most two typing slips,
// and by fewer than its letters, in order of the slips.
func similar(name string, all func(yield func(string))) []string {
	const reach = 2
	var bySlips [reach + 1][]string
	length := len([]rune(name))
	all(func(known string) {
		if slips := slips(name, known, reach); slips <= reach && slips < length {
			bySlips[slips] = append(bySlips[slips], known)
		}
	})
	return slices.Concat(bySlips[:]...)
}

// slips counts the letters put in, left out, changed or swapped with their
// neighbour between two words (optimal string alignment: Damerau, A technique
// for computer detection and correction of spelling errors, 1964), or says
// limit+1 for more than the limit.
func slips(one, other string, limit int) int {
	a, b := []rune(one), []rune(other)
	if gap := len(a) - len(b); gap > limit || -gap > limit {
		return limit + 1
	}
	rows := [3][]int{make([]int, len(b)+1), make([]int, len(b)+1), make([]int, len(b)+1)}
	for j := range rows[1] {
		rows[1][j] = j
	}
	for i := 1; i <= len(a); i++ {
		before, above, row := rows[0], rows[1], rows[2]
		row[0] = i
		for j := 1; j <= len(b); j++ {
			change := above[j-1]
			if a[i-1] != b[j-1] {
				change++
			}
			row[j] = min(change, above[j]+1, row[j-1]+1)
			if i > 1 && j > 1 && a[i-1] == b[j-2] && a[i-2] == b[j-1] {
				row[j] = min(row[j], before[j-2]+1)
			}
		}
		rows[0], rows[1], rows[2] = above, row, before
	}
	return min(rows[1][len(b)], limit+1)
}
