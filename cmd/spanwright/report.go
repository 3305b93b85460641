package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/jedib0t/go-pretty/v6/table"
	"github.com/jedib0t/go-pretty/v6/text"
)

// sheet is one table of a report, before anybody has decided how it looks.
type sheet struct {
	title   string
	columns []string
	numbers map[int]bool // columns of numbers, which stand to the right
	rows    [][]string
}

// appendRow adds a row of cells.
func (s *sheet) appendRow(cells ...string) { s.rows = append(s.rows, cells) }

// style is how a report is written.
type style int

const (
	asText style = iota
	asMarkdown
	asCSV
)

// write writes the sheet; one without rows is left out.
func (s *sheet) write(w io.Writer, as style) {
	if len(s.rows) == 0 {
		return
	}
	t := table.NewWriter()
	t.SetStyle(plainTable)
	header := make(table.Row, len(s.columns))
	var configs []table.ColumnConfig
	for i, c := range s.columns {
		header[i] = c
		if s.numbers[i] {
			configs = append(configs, table.ColumnConfig{Number: i + 1, Align: text.AlignRight, AlignHeader: text.AlignRight})
		}
	}
	t.SetColumnConfigs(configs)
	t.AppendHeader(header)
	for _, r := range s.rows {
		row := make(table.Row, len(r))
		for i, cell := range r {
			if row[i] = cell; as == asCSV {
				row[i] = strings.ReplaceAll(cell, "−", "-") // spreadsheets know no other minus
			}
		}
		t.AppendRow(row)
	}
	switch as {
	case asMarkdown:
		fmt.Fprintf(w, "### %s\n\n%s\n\n", s.title, t.RenderMarkdown())
	case asCSV:
		fmt.Fprintf(w, "%s\n%s\n\n", s.title, t.RenderCSV())
	default:
		fmt.Fprintf(w, "%s\n%s\n\n", s.title, t.Render())
	}
}
