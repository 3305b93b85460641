package feature

import (
	"math"

	"spanwright/analysis"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
)

// limit writes the answer to a limit: value, margin, place, and what comes next.
func (h *hover) limit() {
	var written *model.Limit
	for i := range h.model.Limits {
		if o := h.model.Limits[i].Origin; o.File == h.file && o.Statement.Start == h.unit.Start {
			written = &h.model.Limits[i]
			break
		}
	}
	if written == nil || !h.solved {
		return
	}
	answer, ok := h.numbers.limitAnswer(written)
	if !ok {
		return
	}
	n := h.numbers
	if answer.Governs.Result < 0 {
		h.page.add("**Not checked** · " + answer.Problem)
		return
	}
	solved := &n.model.Limits[answer.Index]
	verdict := "Holds"
	if !answer.Holds {
		verdict = "Broken"
	}
	if answer.Problem != "" {
		h.page.add(answer.Problem)
	}
	h.page.add("**" + verdict + "** · " + solved.Text + h.margin(solved, &answer.Governs))
	var rows [][]string
	for _, v := range append([]analysis.Verdict{answer.Governs}, answer.Next...) {
		rows = append(rows, h.verdict(solved, &v))
	}
	h.page.add(table([]string{"", "value>", "bound>", "share>", "where", "in"}, rows))
}

// limitAnswer finds the answer to a limit of the text among those of the solved
// model: the one that reads the same. What stands in a part has one for each
// place; the worst counts.
func (n *numbers) limitAnswer(l *model.Limit) (*analysis.Limit, bool) {
	var worst *analysis.Limit
	for i := range n.solution.Limits {
		a := &n.solution.Limits[i]
		if n.model.Limits[a.Index].Text != l.Text {
			continue
		}
		if worst == nil || a.Governs.Result < 0 || worst.Governs.Result >= 0 && a.Governs.Ratio > worst.Governs.Ratio {
			worst = a
		}
	}
	return worst, worst != nil
}

// margin says how far a value is from its bound.
func (h *hover) margin(l *model.Limit, v *analysis.Verdict) string {
	room := v.Bound - v.Value
	if !l.AtMost {
		room = -room
	}
	text := quantity.Write(math.Abs(room), analysis.MeasureUnit(h.numbers.display, l), 3)
	if room < 0 {
		return " · over by " + text
	}
	return " · margin " + text
}

func (h *hover) verdict(l *model.Limit, v *analysis.Verdict) []string {
	n := h.numbers
	u := analysis.MeasureUnit(n.display, l)
	where := ""
	if v.Member >= 0 && !math.IsNaN(v.At) {
		where = placeWords(n.model, v.Member, v.At)
	}
	in := ""
	if v.Result >= 0 {
		in = code(n.results.At(v.Result).Name())
	}
	return []string{analysis.MeasureWords(n.model, l, v.Member), quantity.Write(v.Value, u, 3), quantity.Write(v.Bound, u, 3), analysis.ShareWords(v.Ratio), where, in}
}
