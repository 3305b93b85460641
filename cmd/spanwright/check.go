package main

import (
	"context"
	"fmt"
	"io"
	"runtime"
	"slices"

	"golang.org/x/sync/errgroup"

	"spanwright/lang/diagnostic"
)

type checkCommand struct {
	Files  []string `arg:"" optional:"" name:"file" help:"Models, or folders with models below. Without any, this folder." predictor:"file"`
	Output string   `enum:"text,json,sarif,github" default:"text" help:"Form of the output: text, json, sarif or github."`
}

// Help adds examples to the help of the command.
func (*checkCommand) Help() string {
	return `Examples:
    spanwright check roof.span                  one model
    spanwright check models                     every model below a folder
    spanwright check --output github .          annotations in a workflow
    spanwright check --output sarif . > a.sarif for code scanning`
}

// checked is one model with all there is to say about it.
type checked struct {
	teller
	diagnostics []diagnostic.Diagnostic
}

// Run checks the models.
func (c *checkCommand) Run(t *terminal) error {
	if len(c.Files) == 0 {
		c.Files = []string{"."}
	}
	paths, err := find(c.Files, t, isModel)
	if err != nil {
		return err
	}
	models, err := checkAll(paths, t)
	if err != nil {
		return err
	}
	write := map[string]func(io.Writer, []checked) error{"text": writeText, "json": writeJSON, "sarif": writeSARIF, "github": writeGitHub}[c.Output]
	if err := write(t.out, models); err != nil {
		return err
	}
	for i := range models {
		if hasErrors(models[i].diagnostics) {
			return &foundError{}
		}
	}
	return nil
}

// checkAll checks models side by side, and returns them in the order of their
// paths.
func checkAll(paths []string, t *terminal) ([]checked, error) {
	models := make([]checked, len(paths))
	bar := progress(t, len(paths), "checking")
	group, ctx := errgroup.WithContext(context.Background())
	group.SetLimit(runtime.GOMAXPROCS(0))
	for i, path := range paths {
		group.Go(func() error {
			p, err := open(path, t)
			if err != nil {
				return err
			}
			results, err := p.solve(ctx)
			if err != nil {
				return err
			}
			models[i] = checked{teller: teller{project: p, terminal: t}}
			models[i].diagnostics, err = p.diagnostics(ctx, results)
			bar.step()
			return err
		})
	}
	err := group.Wait()
	bar.end()
	return dropRepeats(models), err
}

// dropRepeats leaves out what a file that several models use was said before.
func dropRepeats(models []checked) []checked {
	type said struct {
		file, text string
		start      int
	}
	seen := map[said]bool{}
	for i := range models {
		models[i].diagnostics = slices.DeleteFunc(models[i].diagnostics, func(d diagnostic.Diagnostic) bool {
			key := said{d.File, d.Summary, d.Subject.Start}
			if models[i].project != nil && d.File == models[i].project.path {
				return false
			}
			again := seen[key]
			seen[key] = true
			return again
		})
	}
	return models
}

// writeText writes the diagnostics for people.
func writeText(w io.Writer, models []checked) error {
	for i := range models {
		models[i].tell(w, models[i].diagnostics)
	}
	return nil
}

// writeGitHub writes them as workflow commands, which show as annotations.
func writeGitHub(w io.Writer, models []checked) error {
	for i := range models {
		for k := range models[i].diagnostics {
			d := &models[i].diagnostics[k]
			at := models[i].place(d)
			level := "notice"
			switch d.Severity {
			case diagnostic.Error:
				level = "error"
			case diagnostic.Warning:
				level = "warning"
			}
			if _, err := fmt.Fprintf(w, "::%s file=%s,line=%d,col=%d,endLine=%d,endColumn=%d,title=%s::%s\n", level, property(d.File),
				at.line, at.column, at.endLine, at.endColumn, property(string(d.Name)), command(d.Summary)); err != nil {
				return err
			}
		}
	}
	return nil
}
