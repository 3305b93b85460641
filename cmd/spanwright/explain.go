package main

import (
	"fmt"
	"strings"

	"github.com/agnivade/levenshtein"
	"github.com/jedib0t/go-pretty/v6/table"

	"spanwright/lang/diagnostic"
)

type explainCommand struct {
	Name string `arg:"" optional:"" help:"The name of a diagnostic, such as mechanism. Without it, the list."`
}

// Help adds examples to the help of the command.
func (*explainCommand) Help() string {
	return `Examples:
    spanwright explain mechanism    what it means, an example, how to mend it
    spanwright explain              the list of all names`
}

// Run explains one diagnostic, or lists them all.
func (c *explainCommand) Run(t *terminal) error {
	if c.Name == "" {
		list := table.NewWriter()
		list.SetOutputMirror(t.out)
		list.SetStyle(plainTable)
		for _, e := range diagnostic.Entries() {
			list.AppendRow(table.Row{e.Name, e.Severity, e.Title})
		}
		list.Render()
		return nil
	}
	e, ok := diagnostic.Explain(diagnostic.Name(strings.Trim(c.Name, "[]")))
	if !ok {
		if near := nearestName(c.Name); near != "" {
			return fmt.Errorf("no diagnostic is called %q. Did you mean %s?", c.Name, near)
		}
		return fmt.Errorf("no diagnostic is called %q; spanwright explain lists them", c.Name)
	}
	fmt.Fprintf(t.out, "%s (%s)\n%s\n\n%s\n", e.Name, e.Severity, e.Title, e.Explanation)
	if e.Example != "" {
		fmt.Fprintf(t.out, "\nExample\n%s\n", indented(e.Example))
	}
	if e.Mend != "" {
		fmt.Fprintf(t.out, "\nMended\n%s\n", indented(e.Mend))
	}
	return nil
}

// nearestName returns the name of a diagnostic that is nearly written so, or "".
func nearestName(name string) string {
	best, distance := "", 4
	for _, e := range diagnostic.Entries() {
		if d := levenshtein.ComputeDistance(strings.ToLower(name), string(e.Name)); d < distance {
			best, distance = string(e.Name), d
		}
	}
	return best
}

// indented moves each line of a text in by four blanks.
func indented(text string) string {
	return "    " + strings.ReplaceAll(strings.TrimRight(text, "\n"), "\n", "\n    ")
}
