package main

import (
	"encoding/json"
	"fmt"
	"io"
	"math"
	"strings"

	"spanwright/analysis"
	"spanwright/analysis/compare"
	"spanwright/lang/quantity"
)

// comparisonWriter writes a comparison.
type comparisonWriter struct {
	out        io.Writer
	comparison *compare.Comparison
	old, now   *side
}

// headline says in one line what changed and what that did to limits.
func (w *comparisonWriter) headline() string {
	c := w.comparison
	if c.Empty() {
		return "no change in the model"
	}
	counts := map[string]int{}
	var order []string
	for _, change := range c.Changes {
		what := string(change.Kind)
		if counts[what] == 0 {
			order = append(order, what)
		}
		counts[what]++
	}
	var parts []string
	for _, what := range order {
		parts = append(parts, plural(counts[what], what))
	}
	text := listed(parts) + " changed"
	switch {
	case c.NewUnsolved:
		text += "; the new model has no results"
	case c.NewlyBroken() > 0:
		text += "; " + plural(c.NewlyBroken(), "limit") + " newly broken"
	case c.Mended() > 0:
		text += "; " + plural(c.Mended(), "limit") + " mended"
	}
	return text
}

func plural(n int, what string) string {
	switch {
	case n == 1:
		return "1 " + what
	case strings.HasSuffix(what, "mass"):
		return fmt.Sprintf("%d %ses", n, what)
	case strings.HasSuffix(what, "y"):
		return fmt.Sprintf("%d %sies", n, strings.TrimSuffix(what, "y"))
	}
	return fmt.Sprintf("%d %ss", n, what)
}

// listed joins words: "a, b and c".
func listed(parts []string) string {
	if len(parts) < 2 {
		return strings.Join(parts, "")
	}
	return strings.Join(parts[:len(parts)-1], ", ") + " and " + parts[len(parts)-1]
}

// changeWords says what happened to one thing. quote marks names.
func changeWords(c *compare.Change, quote func(string) string) string {
	name := c.Word + " " + quote(c.Name)
	switch c.Way {
	case compare.Renamed:
		return fmt.Sprintf("%s %s renamed to %s", c.Word, quote(c.OldName), quote(c.Name))
	case compare.Added, compare.Removed:
		if c.Kind == compare.Load {
			name = "load in case " + quote(c.Name)
		}
		if c.What != "" {
			name += " (" + c.What + ")"
		}
		return name + " " + string(c.Way)
	}
	var parts []string
	for _, d := range c.Differences {
		label := d.Label + " "
		if d.Label == "size" || d.Label == "says" || d.Label == "holds" {
			label = ""
		}
		parts = append(parts, label+d.Before+" → "+d.After)
	}
	return name + " " + strings.Join(parts, ", ")
}

// difference writes before, after, difference and percent of a value.
func difference(before, after float64, u quantity.Unit, percent float64) (b, a, d, p string) {
	b, a, d = figures(before, u), figures(after, u), signed(figures(after-before, u))
	switch {
	case b == a:
		return b, a, "0", ""
	case before*after < 0 && b != "0" && a != "0":
		p = "changes sign"
	case !math.IsNaN(percent) && !math.IsInf(percent, 0):
		p = signed(quantity.Number(percent, 2)) + " %"
	}
	return b, a, d, p
}

func signed(number string) string {
	if strings.HasPrefix(number, "−") || number == "0" {
		return number
	}
	return "+" + number
}

// shareOf writes a value of a limit with its share: "31.4 mm (127 %)".
func shareOf(value, ratio float64, u quantity.Unit) string {
	if math.IsNaN(value) {
		return ""
	}
	text := quantity.Write(value, u, 3)
	if share := analysis.ShareWords(ratio); share != "" {
		text += " (" + share + ")"
	}
	return text
}

// governsWords says where and in what a limit governs.
func governsWords(l *compare.LimitChange) string {
	if l.Where == "" {
		return l.In
	}
	return l.In + ", " + l.Where
}

// effectSheet is the table of effects of one topic, or of all.
func (w *comparisonWriter) effectSheet(title string, list []compare.Effect) *sheet {
	s := &sheet{title: title, columns: []string{"", "in", "before", "after", "", "difference", "", ""}, numbers: map[int]bool{2: true, 3: true, 5: true, 6: true}}
	for i := range list {
		e := &list[i]
		b, a, d, p := difference(e.Before, e.After, e.Unit, e.Percent())
		what := e.What
		if e.Extreme == "most" || e.Extreme == "least" {
			what += ", " + e.Extreme
		}
		in := e.In
		if in == "" {
			in = e.Family
		}
		s.appendRow(what, in, b, a, e.Unit.Symbol, d, p, e.Place)
	}
	return s
}

// unsolved says which side has no numbers, and why.
func (w *comparisonWriter) unsolved() string {
	switch c := w.comparison; {
	case c.NewUnsolved:
		return "The new model has no results. " + w.now.reason()
	case c.OldUnsolved && w.old.project.path == "/dev/null":
		return ""
	case c.OldUnsolved:
		return "The old model has no results, so there is nothing to compare with. " + w.old.reason()
	}
	return ""
}

// massWords says what the change did to the mass.
func (w *comparisonWriter) massWords() string {
	c := w.comparison
	u := w.now.Model.Display.Mass
	if math.Abs(c.MassAfter-c.MassBefore) <= 1e-6*math.Max(c.MassAfter, c.MassBefore) {
		return "Mass unchanged, " + quantity.Write(c.MassAfter, u, 4) + "."
	}
	return fmt.Sprintf("Mass %s → %s.", quantity.Number(c.MassBefore/u.Factor, 4), quantity.Write(c.MassAfter, u, 4))
}

// topics are the effects gathered for tables.
func (w *comparisonWriter) topics() []*sheet {
	var sheets []*sheet
	for _, topic := range []compare.Topic{compare.Reactions, compare.Forces, compare.Stresses, compare.Movements} {
		var list []compare.Effect
		for _, e := range w.comparison.Effects {
			if e.Topic == topic {
				list = append(list, e)
			}
		}
		sheets = append(sheets, w.effectSheet(strings.ToUpper(string(topic[:1]))+string(topic[1:])+", most changed first", list))
	}
	return sheets
}

func plainQuote(s string) string { return s }

// text writes the comparison for a terminal.
func (w *comparisonWriter) text() {
	fmt.Fprintf(w.out, "%s: %s\n\n", w.now.Model.Title, w.headline())
	if w.comparison.Empty() {
		return
	}
	fmt.Fprintln(w.out, "Changed in the model")
	for i := range w.comparison.Changes {
		fmt.Fprintln(w.out, "    "+changeWords(&w.comparison.Changes[i], plainQuote))
	}
	fmt.Fprintln(w.out)
	if reason := w.unsolved(); reason != "" {
		fmt.Fprintf(w.out, "%s\n\n", reason)
	}
	limits := &sheet{title: "Limits", columns: []string{"", "limit", "before", "after", "bound", "governs"}, numbers: map[int]bool{2: true, 3: true, 4: true}}
	for i := range w.comparison.Limits {
		l := &w.comparison.Limits[i]
		limits.appendRow(string(l.Fate), l.Text, shareOf(l.ValueBefore, l.RatioBefore, l.Unit), shareOf(l.ValueAfter, l.RatioAfter, l.Unit), bound(l), governsWords(l))
	}
	limits.write(w.out, asText)
	for _, s := range w.topics() {
		s.write(w.out, asText)
	}
	fmt.Fprintf(w.out, "%s\n\n%s\n", w.massWords(), caution)
}

func bound(l *compare.LimitChange) string {
	if math.IsNaN(l.BoundAfter) {
		return ""
	}
	return quantity.Write(l.BoundAfter, l.Unit, 3)
}

// mostShown is the number of effects and changes that stay unfolded in a comment.
const mostShown = 8

// markdown writes the comparison for a comment: the essence on one screen, the
// rest folded.
func (w *comparisonWriter) markdown() {
	c := w.comparison
	code := func(s string) string { return "`" + s + "`" }
	headline := w.headline()
	if c.NewlyBroken() > 0 || c.NewUnsolved {
		before, after, _ := strings.Cut(headline, "; ")
		headline = before + "; **" + after + "**"
	}
	fmt.Fprintf(w.out, "**%s**: %s\n\n", w.now.Model.Title, headline)
	if c.Empty() {
		return
	}
	if reason := w.unsolved(); reason != "" {
		fmt.Fprintf(w.out, "%s\n\n", reason)
	}
	if len(c.Limits) > 0 {
		fmt.Fprintln(w.out, "| limit | before | after | bound | governs |\n|---|---:|---:|---:|---|")
		for i := range c.Limits {
			l := &c.Limits[i]
			after := shareOf(l.ValueAfter, l.RatioAfter, l.Unit)
			if l.Fate == compare.Broken || l.Fate == compare.StillBroken {
				after = "**" + after + "**"
			}
			fmt.Fprintf(w.out, "| %s (%s) | %s | %s | %s | %s |\n", l.Text, l.Fate, shareOf(l.ValueBefore, l.RatioBefore, l.Unit), after, bound(l), governsWords(l))
		}
		fmt.Fprintln(w.out)
	}
	var changes []string
	for i := range c.Changes {
		changes = append(changes, changeWords(&c.Changes[i], code))
	}
	fmt.Fprintf(w.out, "Changed in the model: %s.\n\n", strings.Join(changes[:min(len(changes), mostShown)], "; "))
	if len(changes) > mostShown {
		fold(w.out, fmt.Sprintf("%s more", plural(len(changes)-mostShown, "change")), "- "+strings.Join(changes[mostShown:], "\n- "))
	}
	if len(c.Effects) > 0 {
		var largest []string
		for _, e := range w.largest() {
			b, a, _, p := difference(e.Before, e.After, e.Unit, e.Percent())
			if p != "" {
				p = " (" + p + ")"
			}
			at := ""
			if e.Place != "" {
				at = " at " + e.Place
			}
			largest = append(largest, fmt.Sprintf("%s%s %s → %s %s%s", e.What, at, b, a, e.Unit.Symbol, p))
		}
		fmt.Fprintf(w.out, "Largest effects in %s: %s. ", c.Effects[0].Family, strings.Join(largest, "; "))
	}
	fmt.Fprintf(w.out, "%s\n\n", w.massWords())
	var all strings.Builder
	for _, s := range w.topics() {
		s.write(&all, asMarkdown)
	}
	if all.Len() > 0 {
		fold(w.out, "All reactions, forces, stresses and movements that changed", strings.TrimSpace(all.String()))
	}
	fmt.Fprintln(w.out, "<sub>"+caution+"</sub>")
}

// largest returns the weightiest effect of each topic, and then the next ones.
func (w *comparisonWriter) largest() []compare.Effect {
	var list []compare.Effect
	family := w.comparison.Effects[0].Family
	seen := map[compare.Topic]int{}
	for _, e := range w.comparison.Effects {
		if e.Family == family && seen[e.Topic] < 2 {
			seen[e.Topic]++
			list = append(list, e)
		}
	}
	return list
}

func fold(w io.Writer, title, text string) {
	fmt.Fprintf(w, "<details>\n<summary>%s</summary>\n\n%s\n\n</details>\n\n", title, text)
}

// The JSON document of a comparison, in SI units.
type comparisonDocument struct {
	Format      string                `json:"format"`
	Title       string                `json:"title"`
	Changes     []changeDocument      `json:"changes"`
	Limits      []limitChangeDocument `json:"limits"`
	Effects     []effectDocument      `json:"effects"`
	Mass        [2]float64            `json:"mass"`
	NewlyBroken int                   `json:"newlyBroken"`
	Mended      int                   `json:"mended"`
	OldProblem  string                `json:"oldProblem,omitempty"`
	NewProblem  string                `json:"newProblem,omitempty"`
}

type changeDocument struct {
	Way         string               `json:"way"`
	Kind        string               `json:"kind"`
	Name        string               `json:"name"`
	OldName     string               `json:"oldName,omitempty"`
	What        string               `json:"what,omitempty"`
	Differences []differenceDocument `json:"differences,omitempty"`
}

type differenceDocument struct {
	Of     string `json:"of"`
	Before string `json:"before"`
	After  string `json:"after"`
}

type limitChangeDocument struct {
	Limit       string   `json:"limit"`
	Fate        string   `json:"fate"`
	Before      *float64 `json:"before"`
	After       *float64 `json:"after"`
	Bound       *float64 `json:"bound"`
	RatioBefore *float64 `json:"ratioBefore"`
	RatioAfter  *float64 `json:"ratioAfter"`
	In          string   `json:"in,omitempty"`
	Where       string   `json:"where,omitempty"`
}

type effectDocument struct {
	Topic   string   `json:"topic"`
	Family  string   `json:"family"`
	What    string   `json:"what"`
	Extreme string   `json:"extreme,omitempty"`
	Before  float64  `json:"before"`
	After   float64  `json:"after"`
	Percent *float64 `json:"percent"`
	In      string   `json:"in,omitempty"`
	Where   string   `json:"where,omitempty"`
}

// json writes the comparison for programs.
func (w *comparisonWriter) json() error {
	c := w.comparison
	d := comparisonDocument{Format: "spanwright-comparison/1", Title: w.now.Model.Title, Mass: [2]float64{c.MassBefore, c.MassAfter},
		Changes: []changeDocument{}, Limits: []limitChangeDocument{}, Effects: []effectDocument{}, NewlyBroken: c.NewlyBroken(), Mended: c.Mended()}
	if c.OldUnsolved {
		d.OldProblem = w.old.reason()
	}
	if c.NewUnsolved {
		d.NewProblem = w.now.reason()
	}
	for _, x := range c.Changes {
		y := changeDocument{Way: string(x.Way), Kind: string(x.Kind), Name: x.Name, OldName: x.OldName, What: x.What}
		for _, z := range x.Differences {
			y.Differences = append(y.Differences, differenceDocument{z.Label, z.Before, z.After})
		}
		d.Changes = append(d.Changes, y)
	}
	for _, l := range c.Limits {
		d.Limits = append(d.Limits, limitChangeDocument{l.Text, string(l.Fate), finiteOrNull(l.ValueBefore), finiteOrNull(l.ValueAfter), finiteOrNull(l.BoundAfter),
			finiteOrNull(l.RatioBefore), finiteOrNull(l.RatioAfter), l.In, l.Where})
	}
	for i := range c.Effects {
		e := &c.Effects[i]
		d.Effects = append(d.Effects, effectDocument{string(e.Topic), e.Family, e.What, e.Extreme, e.Before, e.After, finiteOrNull(e.Percent()), e.In, e.Place})
	}
	encoder := json.NewEncoder(w.out)
	encoder.SetIndent("", "  ")
	encoder.SetEscapeHTML(false)
	return encoder.Encode(d)
}
