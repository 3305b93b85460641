package analysis

import (
	"context"
	"errors"
	"fmt"
	"slices"

	"spanwright/analysis/combine"
	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// Diagnostics returns what there is to say about the solve: why there are no
// numbers, which combinations have none, which numbers are doubtful. They are
// sorted. Those of limits are [Results.LimitDiagnostics].
func (r *Results) Diagnostics() []diagnostic.Diagnostic { return slices.Clone(r.diagnostics) }

// LimitDiagnostics returns one diagnostic for each limit that is broken or could
// not be checked, sorted. The error is the context's.
func (r *Results) LimitDiagnostics(ctx context.Context) ([]diagnostic.Diagnostic, error) {
	limits, err := r.Limits(ctx)
	if err != nil {
		return nil, err
	}
	var list []diagnostic.Diagnostic
	for _, l := range limits {
		origin := r.model.Limits[l.Index].Origin
		for _, name := range l.Unknown {
			list = append(list, about(r.model, origin, diagnostic.UnknownCombination, fmt.Sprintf("There is no combination %s.%s", name, r.nearest(name))))
		}
		switch {
		case len(l.Unknown) > 0 && l.Governs.Result < 0:
			// Said already.
		case l.Problem != "":
			list = append(list, about(r.model, origin, diagnostic.LimitUnanswered, l.Problem))
		case !l.Holds:
			d := about(r.model, origin, diagnostic.LimitExceeded, r.Words(l))
			d.Detail = r.nextWords(l)
			list = append(list, d)
		}
	}
	diagnostic.Sort(list)
	return list, nil
}

// nextWords lists the verdicts that follow the governing one.
func (r *Results) nextWords(l Limit) string {
	words := ""
	written := &r.model.Limits[l.Index]
	for _, v := range l.Next {
		if v.Ratio < 0.5*min(l.Governs.Ratio, 1) {
			break
		}
		words += fmt.Sprintf("\n%s: %s in %s", MeasureWords(r.model, written, v.Member), quantity.Write(v.Value, MeasureUnit(r.model.Display, written), 3), r.At(v.Result).Name())
		if share := ShareWords(v.Ratio); share != "" {
			words += " (" + share + ")"
		}
	}
	if words == "" {
		return ""
	}
	return "Next:" + words
}

// nearest proposes the combinations of the family that the name begins with.
func (r *Results) nearest(name string) string {
	near := r.set.Near(name, 3)
	switch len(near) {
	case 0:
		return ""
	case 1:
		return fmt.Sprintf(" Meant %s?", near[0])
	}
	words := near[0]
	for _, n := range near[1 : len(near)-1] {
		words += ", " + n
	}
	return fmt.Sprintf(" Near in name: %s and %s.", words, near[len(near)-1])
}

// familyDiagnostics puts what went wrong in forming combinations into
// diagnostics on the families.
func familyDiagnostics(m *model.Model, problems []error) []diagnostic.Diagnostic {
	var list []diagnostic.Diagnostic
	for _, problem := range problems {
		var tooMany *combine.TooManyError
		var rule *combine.RuleError
		switch {
		case errors.As(problem, &tooMany):
			list = append(list, about(m, m.Families[tooMany.Family].Origin, diagnostic.TooManyCombinations, problem.Error()))
		case errors.As(problem, &rule):
			list = append(list, about(m, m.Families[rule.Family].Origin, diagnostic.UnknownRule, problem.Error()))
		}
	}
	return list
}

// about makes a diagnostic on a statement, with the severity that the register
// has for its name.
func about(m *model.Model, o model.Origin, name diagnostic.Name, summary string) diagnostic.Diagnostic {
	d := diagnostic.Diagnostic{Name: name, Severity: diagnostic.Error, Subject: o.Statement, Context: o.Statement, Summary: summary}
	if entry, ok := diagnostic.Explain(name); ok {
		d.Severity = entry.Severity
	}
	if o.File >= 0 && o.File < len(m.Files) {
		d.File = m.Files[o.File].Path
	}
	return d
}

// Broken counts the limits that do not hold; those that could not be checked
// are counted apart.
func Broken(limits []Limit) (broken, unchecked int) {
	for _, l := range limits {
		switch {
		case l.Problem != "":
			unchecked++
		case !l.Holds:
			broken++
		}
	}
	return broken, unchecked
}
