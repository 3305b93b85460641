package main

import (
	"fmt"
	"io"
	"strings"

	"github.com/fatih/color"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
)

// teller shows the diagnostics of one model to people.
type teller struct {
	project  *project
	terminal *terminal
}

// place is where a diagnostic stands, from 1.
type place struct{ line, column, endLine, endColumn int }

func (s *teller) place(d *diagnostic.Diagnostic) place { return s.placeOf(d.File, d.Subject) }

func (s *teller) placeOf(path string, span source.Span) place {
	file := s.project.file(path)
	if file == nil {
		return place{1, 1, 1, 1}
	}
	start, end := file.Position(span.Start), file.Position(span.End)
	return place{start.Line, start.Column, end.Line, end.Column}
}

// tell writes diagnostics, a line each, with what belongs to them moved in.
func (s *teller) tell(w io.Writer, list []diagnostic.Diagnostic) {
	paint := map[diagnostic.Severity]func(string) string{
		diagnostic.Error: painter(w, color.FgRed, color.Bold), diagnostic.Warning: painter(w, color.FgYellow),
		diagnostic.Information: painter(w, color.FgCyan), diagnostic.Hint: painter(w, color.Faint),
	}
	for i := range list {
		d := &list[i]
		at := s.place(d)
		fmt.Fprintf(w, "%s:%d:%d: %s: %s [%s]\n", d.File, at.line, at.column, paint[d.Severity](d.Severity.String()), d.Summary, d.Name)
		if d.Detail != "" {
			fmt.Fprintln(w, indented(d.Detail))
		}
		for _, r := range d.Related {
			at := s.placeOf(r.File, r.Span)
			fmt.Fprintf(w, "    %s:%d:%d: %s\n", r.File, at.line, at.column, strings.TrimSpace(r.Message))
		}
	}
}

// gravest leaves out what is no error or warning.
func gravest(list []diagnostic.Diagnostic) []diagnostic.Diagnostic {
	var kept []diagnostic.Diagnostic
	for _, d := range list {
		if d.Severity <= diagnostic.Warning {
			kept = append(kept, d)
		}
	}
	return kept
}
