package main

import "github.com/jedib0t/go-pretty/v6/table"

// plainTable is the look of all tables: columns apart by blanks, no lines.
var plainTable = func() table.Style {
	s := table.Style{Name: "plain", Box: table.StyleBoxDefault, Format: table.FormatOptions{}, Options: table.OptionsNoBordersAndSeparators}
	s.Box.PaddingLeft, s.Box.PaddingRight = "", "   "
	return s
}()
