package feature

import (
	"regexp"
	"strings"
	"unicode/utf8"
)

// page is Markdown under construction: blocks with a blank line between.
type page struct{ blocks []string }

func (p *page) add(blocks ...string) {
	for _, b := range blocks {
		if b = strings.TrimRight(b, "\n "); b != "" {
			p.blocks = append(p.blocks, b)
		}
	}
}

func (p *page) String() string { return strings.Join(p.blocks, "\n\n") }

// table writes a Markdown table; the columns whose heading ends in ">" are
// aligned to the right. Without rows it writes nothing.
func table(headings []string, rows [][]string) string {
	if len(rows) == 0 {
		return ""
	}
	var b strings.Builder
	line := func(cells []string) {
		b.WriteString("|")
		for i := range headings {
			cell := ""
			if i < len(cells) {
				cell = strings.ReplaceAll(cells[i], "|", "\\|")
			}
			b.WriteString(" " + cell + " |")
		}
		b.WriteString("\n")
	}
	plainHeadings, rule := make([]string, len(headings)), make([]string, len(headings))
	for i, h := range headings {
		plainHeadings[i], rule[i] = strings.TrimSuffix(h, ">"), "---"
		if strings.HasSuffix(h, ">") {
			rule[i] = "---:"
		}
	}
	line(plainHeadings)
	line(rule)
	for _, r := range rows {
		line(r)
	}
	return b.String()
}

// code is a word in the fixed-width font.
func code(s string) string {
	if s == "" {
		return ""
	}
	return "`" + s + "`"
}

// block is lines in the fixed-width font.
func block(s string) string { return "```\n" + strings.TrimRight(s, "\n") + "\n```" }

var (
	picture = regexp.MustCompile(`!\[[^\]]*\]\([^)]*\)`)
	emphase = regexp.MustCompile("\\*\\*|`")
)

// Plain returns Markdown as text for clients that show it as it is: tables in
// columns, marks and pictures left out.
func Plain(markdown string) string {
	markdown = picture.ReplaceAllString(markdown, "")
	var out []string
	var rows [][]string
	fenced := false
	flush := func() {
		out = append(out, columns(rows)...)
		rows = nil
	}
	for _, line := range strings.Split(markdown, "\n") {
		switch {
		case strings.HasPrefix(line, "```"):
			fenced = !fenced
		case fenced:
			out = append(out, line)
		case strings.HasPrefix(line, "|"):
			if cells := cellsOf(line); !strings.HasPrefix(cells[0], "---") {
				rows = append(rows, cells)
			}
		default:
			flush()
			out = append(out, emphase.ReplaceAllString(line, ""))
		}
	}
	flush()
	return strings.Trim(regexp.MustCompile("\n{3,}").ReplaceAllString(strings.Join(out, "\n"), "\n\n"), "\n")
}

func cellsOf(line string) []string {
	line = strings.TrimSuffix(strings.TrimPrefix(line, "|"), "|")
	cells := strings.Split(strings.ReplaceAll(line, "\\|", "\x00"), "|")
	for i, c := range cells {
		cells[i] = emphase.ReplaceAllString(strings.TrimSpace(strings.ReplaceAll(c, "\x00", "|")), "")
	}
	return cells
}

// columns lines rows up.
func columns(rows [][]string) []string {
	var widths []int
	for _, r := range rows {
		for i, c := range r {
			if i == len(widths) {
				widths = append(widths, 0)
			}
			widths[i] = max(widths[i], utf8.RuneCountInString(c))
		}
	}
	lines := make([]string, len(rows))
	for i, r := range rows {
		var b strings.Builder
		for j, c := range r {
			b.WriteString(c + strings.Repeat(" ", widths[j]-utf8.RuneCountInString(c)+2))
		}
		lines[i] = strings.TrimRight(b.String(), " ")
	}
	return lines
}
