package catalogue

import (
	"strings"
	"unicode"
)

// fold brings the spellings of a name together: no blanks, upper case, X between
// sizes, numbers without needless zeros. "he 200 b" and "HE200B" are one name,
// and so are "CHS 114.30 × 5.0" and "chs114.3x5".
func fold(text string) string {
	var folded, number strings.Builder
	flush := func() {
		folded.WriteString(plainNumber(number.String()))
		number.Reset()
	}
	for _, r := range text {
		switch {
		case r >= '0' && r <= '9' || r == '.':
			number.WriteRune(r)
		case unicode.IsSpace(r):
			// A blank ends a number: "12 26" is not "1226".
			if number.Len() > 0 {
				flush()
				folded.WriteByte(' ')
			}
		default:
			flush()
			if r == '×' || r == '*' {
				r = 'X'
			}
			folded.WriteRune(unicode.ToUpper(r))
		}
	}
	flush()
	return dropBlanks(folded.String())
}

// plainNumber takes the zeros off the end of a decimal fraction.
func plainNumber(digits string) string {
	if whole, fraction, found := strings.Cut(digits, "."); found && !strings.Contains(fraction, ".") {
		fraction = strings.TrimRight(fraction, "0")
		if fraction == "" {
			return whole
		}
		return whole + "." + fraction
	}
	return digits
}

// dropBlanks removes blanks except those between two numbers.
func dropBlanks(text string) string {
	if !strings.Contains(text, " ") {
		return text
	}
	var kept strings.Builder
	for i := range len(text) {
		if text[i] == ' ' && (i+1 >= len(text) || !isDigit(text[i+1])) {
			continue
		}
		kept.WriteByte(text[i])
	}
	return kept.String()
}

func isDigit(c byte) bool { return c >= '0' && c <= '9' || c == '.' }

// spellings lists the folded names under which a section is found. A European
// wide-flange section is HEB 200 or HE 200 B; equal sides need not be written
// twice: L 80x8, SHS 100x5.
func spellings(series, size string) []string {
	name := fold(series)
	list := []string{name + fold(size)}
	if len(name) == 3 && strings.HasPrefix(name, "HE") {
		list = append(list, "HE"+fold(size)+name[2:])
	}
	if first, rest, found := strings.Cut(fold(size), "X"); found {
		if second, third, found := strings.Cut(rest, "X"); found && first == second {
			list = append(list, name+first+"X"+third)
		}
	}
	return list
}

// split parts a folded name into the series and the size: "IPE300" into "IPE"
// and "300", "HE200B" into "HEB" and "200".
func split(folded string) (series, size string) {
	end := strings.IndexFunc(folded, func(r rune) bool { return r >= '0' && r <= '9' || r == '.' })
	if end < 0 {
		return folded, ""
	}
	series, size = folded[:end], folded[end:]
	if series == "HE" && len(size) > 1 && strings.ContainsRune("ABM", rune(size[len(size)-1])) {
		return series + size[len(size)-1:], size[:len(size)-1]
	}
	return series, size
}
