package main

import (
	"encoding/csv"
	"io"
	"math"
	"strconv"

	"spanwright/analysis"
	"spanwright/lang/quantity"
)

// columnsOfCSV head the one table that solve --csv writes. It opens in a
// spreadsheet as it is: plain numbers, the unit in a column of its own.
var columnsOfCSV = []string{"table", "in", "of", "quantity", "extreme", "value", "unit", "at", "at unit", "governs", "share"}

// writeCSV writes all results as one table.
func (r *report) writeCSV(w io.Writer) error {
	t := csvTable{report: r, Writer: csv.NewWriter(w), d: r.model.Display}
	t.row(columnsOfCSV...)
	t.cases()
	for _, e := range r.envelopes() {
		t.envelope(e)
	}
	for _, name := range r.only {
		if result, ok := r.results.Find(name); ok {
			t.envelope(r.results.EnvelopeOf(result.Name(), []analysis.Result{result}))
		}
	}
	if err := t.limits(); err != nil {
		return err
	}
	t.Flush()
	return t.Error()
}

type csvTable struct {
	*report
	*csv.Writer
	d quantity.Display
}

// row writes cells; an error stays in the writer.
func (t *csvTable) row(cells ...string) {
	for len(cells) < len(columnsOfCSV) {
		cells = append(cells, "")
	}
	_ = t.Write(cells)
}

// decimal writes an SI value in a unit with seven digits, as programs read it.
func decimal(value float64, u quantity.Unit) string {
	x := value / u.Factor
	if x == 0 || math.IsNaN(x) {
		return map[bool]string{true: "", false: "0"}[math.IsNaN(x)]
	}
	return strconv.FormatFloat(x, 'g', 7, 64)
}

// cases writes the reactions of each case.
func (t *csvTable) cases() {
	for _, node := range analysis.SupportedNodes(t.model) {
		name := t.model.Nodes[node].Name
		for i := range t.model.Cases {
			result := t.results.Case(i)
			if !t.wanted(name) || !t.wantedResult(result.Name()) || result.Problem() != "" {
				continue
			}
			reaction := result.Reaction(node)
			for _, f := range freedoms(t.model) {
				u := forceUnit(t.d, f)
				t.row("reaction", result.Name(), name, forceNames[f], "", decimal(reaction[f], u), u.Symbol)
			}
		}
	}
}

// envelope writes the extremes of an envelope.
func (t *csvTable) envelope(e *analysis.Envelope) {
	if e.Empty() {
		return
	}
	extreme := func(table, of, quantity, which string, g analysis.Governed, u quantity.Unit) {
		t.row(table, e.Name(), of, quantity, which, decimal(g.Value, u), u.Symbol, "", "", t.name(g))
	}
	for _, row := range e.SupportRows() {
		if node := t.model.Nodes[row.Node].Name; t.wanted(node) {
			u := forceUnit(t.d, row.Freedom)
			extreme("reaction", node, forceNames[row.Freedom], "least", row.Band.Least, u)
			extreme("reaction", node, forceNames[row.Freedom], "most", row.Band.Most, u)
		}
	}
	for node := range t.model.Nodes {
		name := t.model.Nodes[node].Name
		if !t.wanted(name) {
			continue
		}
		bands := e.Movement(node)
		for _, f := range freedoms(t.model) {
			u := movementUnit(t.d, f)
			extreme("movement", name, movementNames[f], "least", bands[f].Least, u)
			extreme("movement", name, movementNames[f], "most", bands[f].Most, u)
		}
	}
	for i := range t.model.Members {
		if name := t.model.Members[i].Name; t.wanted(name) {
			for _, g := range e.Governing(i) {
				u := unitOf(t.d, g.Quantity)
				share := ""
				if g.Share > 0 {
					share = strconv.FormatFloat(g.Share, 'g', 4, 64)
				}
				t.row("member", e.Name(), name, g.Quantity.String(), "governing", decimal(g.Value, u), u.Symbol, decimal(g.At, t.d.Length), t.d.Length.Symbol, t.name(g.Governed), share)
			}
		}
	}
}

// limits writes the answers to the limits.
func (t *csvTable) limits() error {
	answers, err := t.answers()
	if err != nil {
		return err
	}
	for _, l := range answers {
		limit := &t.model.Limits[l.Index]
		if l.Governs.Result < 0 {
			t.row("limit", "", limit.Text, "", "not checked")
			continue
		}
		u := analysis.MeasureUnit(t.d, limit)
		holds := map[bool]string{true: "holds", false: "broken"}[l.Holds]
		at := ""
		if l.Governs.Member >= 0 {
			at = decimal(l.Governs.At, t.d.Length)
		}
		share := ""
		if !math.IsInf(l.Governs.Ratio, 0) && !math.IsNaN(l.Governs.Ratio) {
			share = strconv.FormatFloat(l.Governs.Ratio, 'g', 4, 64)
		}
		t.row("limit", "", limit.Text, "", holds, decimal(l.Governs.Value, u), u.Symbol, at, map[bool]string{true: t.d.Length.Symbol}[at != ""], t.results.At(l.Governs.Result).Name(), share)
	}
	return nil
}
