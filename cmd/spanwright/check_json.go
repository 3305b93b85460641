package main

import (
	"encoding/json"
	"io"
	"strings"

	"github.com/owenrumney/go-sarif/v3/pkg/report/v210/sarif"

	"spanwright/lang/diagnostic"
)

// documentOfDiagnostics is the form spanwright-diagnostics/1.
type documentOfDiagnostics struct {
	Format      string               `json:"format"`
	Diagnostics []documentDiagnostic `json:"diagnostics"`
}

type documentDiagnostic struct {
	File      string            `json:"file"`
	Line      int               `json:"line"`
	Column    int               `json:"column"`
	EndLine   int               `json:"endLine"`
	EndColumn int               `json:"endColumn"`
	Severity  string            `json:"severity"`
	Name      string            `json:"name"`
	Message   string            `json:"message"`
	Detail    string            `json:"detail,omitempty"`
	Related   []documentRelated `json:"related"`
	Fix       *documentFix      `json:"fix,omitempty"`
}

type documentRelated struct {
	File    string `json:"file"`
	Line    int    `json:"line"`
	Column  int    `json:"column"`
	Message string `json:"message"`
}

type documentFix struct {
	Title string         `json:"title"`
	Edits []documentEdit `json:"edits"`
}

type documentEdit struct {
	File      string `json:"file"`
	Line      int    `json:"line"`
	Column    int    `json:"column"`
	EndLine   int    `json:"endLine"`
	EndColumn int    `json:"endColumn"`
	New       string `json:"new"`
}

// writeJSON writes all diagnostics as one JSON document.
func writeJSON(w io.Writer, models []checked) error {
	doc := documentOfDiagnostics{Format: "spanwright-diagnostics/1", Diagnostics: []documentDiagnostic{}}
	for i := range models {
		for k := range models[i].diagnostics {
			doc.Diagnostics = append(doc.Diagnostics, models[i].document(&models[i].diagnostics[k]))
		}
	}
	encoder := json.NewEncoder(w)
	encoder.SetIndent("", "  ")
	encoder.SetEscapeHTML(false)
	return encoder.Encode(doc)
}

func (s *teller) document(d *diagnostic.Diagnostic) documentDiagnostic {
	at := s.place(d)
	out := documentDiagnostic{
		File: d.File, Line: at.line, Column: at.column, EndLine: at.endLine, EndColumn: at.endColumn,
		Severity: d.Severity.String(), Name: string(d.Name), Message: d.Summary, Detail: d.Detail, Related: []documentRelated{},
	}
	for _, r := range d.Related {
		at := s.placeOf(r.File, r.Span)
		out.Related = append(out.Related, documentRelated{r.File, at.line, at.column, r.Message})
	}
	if len(d.Fixes) > 0 {
		out.Fix = &documentFix{Title: d.Fixes[0].Title, Edits: []documentEdit{}}
		for _, e := range d.Fixes[0].Edits {
			path := e.File
			if path == "" {
				path = d.File
			}
			at := s.placeOf(path, e.Span)
			out.Fix.Edits = append(out.Fix.Edits, documentEdit{path, at.line, at.column, at.endLine, at.endColumn, e.New})
		}
	}
	return out
}

// writeSARIF writes all diagnostics in SARIF 2.1.0 (OASIS standard).
func writeSARIF(w io.Writer, models []checked) error {
	report := sarif.NewReport()
	run := sarif.NewRun()
	run.Tool = sarif.NewTool()
	run.Tool.Driver = sarif.NewToolComponent().WithName("spanwright")
	run.Tool.Driver.WithVersion(version)
	for i := range models {
		for k := range models[i].diagnostics {
			models[i].addToRun(run, &models[i].diagnostics[k])
		}
	}
	report.AddRun(run)
	return report.PrettyWrite(w)
}

func (s *teller) addToRun(run *sarif.Run, d *diagnostic.Diagnostic) {
	rule := run.AddRule(string(d.Name))
	if e, ok := diagnostic.Explain(d.Name); ok {
		rule.WithDescription(e.Title)
		rule.WithHelp(sarif.NewMultiformatMessageString().WithText(e.Explanation))
	}
	level := "note"
	switch d.Severity {
	case diagnostic.Error:
		level = "error"
	case diagnostic.Warning:
		level = "warning"
	}
	at := s.place(d)
	region := sarif.NewRegion().WithStartLine(at.line).WithStartColumn(at.column).WithEndLine(at.endLine).WithEndColumn(at.endColumn)
	location := sarif.NewPhysicalLocation().WithArtifactLocation(sarif.NewArtifactLocation().WithURI(d.File)).WithRegion(region)
	run.CreateResultForRule(string(d.Name)).WithLevel(level).WithMessage(sarif.NewTextMessage(d.Summary)).
		AddLocation(sarif.NewLocationWithPhysicalLocation(location))
}

// command escapes the text of a workflow command.
func command(text string) string {
	return strings.NewReplacer("%", "%25", "\r", "%0D", "\n", "%0A").Replace(text)
}

// property escapes a property of a workflow command.
func property(text string) string {
	return strings.NewReplacer("%", "%25", "\r", "%0D", "\n", "%0A", ":", "%3A", ",", "%2C").Replace(text)
}
