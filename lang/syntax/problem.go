package syntax

import (
	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
)

// Problem is something wrong in one statement; places are relative to it.
type Problem struct {
	Name    string
	Span    source.Span
	Summary string
	Fix     *ProblemFix
}

// ProblemFix is the change that mends a problem.
type ProblemFix struct {
	Title string
	Span  source.Span
	New   string
}

// diagnose places a problem in its file.
func (p *Problem) diagnose(path string, unit *Unit) diagnostic.Diagnostic {
	d := diagnostic.Diagnostic{
		Name: diagnostic.Name(p.Name), Severity: diagnostic.Error, File: path,
		Subject: p.Span.Shift(unit.Start), Context: source.Span{Start: unit.Start, End: unit.End},
		Summary: p.Summary,
	}
	if p.Fix != nil {
		d.Fixes = []diagnostic.Fix{{
			Title: p.Fix.Title, Preferred: true,
			Edits: []diagnostic.Edit{{Edit: source.Edit{Span: p.Fix.Span.Shift(unit.Start), New: p.Fix.New}}},
		}}
	}
	return d
}
