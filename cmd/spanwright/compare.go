package main

import (
	"context"
	"fmt"

	"spanwright/analysis/compare"
	"spanwright/lang/diagnostic"
)

type compareCommand struct {
	Old       string  `arg:"" help:"The model before: a file, or REVISION:PATH of the git repository." predictor:"file"`
	New       string  `arg:"" help:"The model after: the same." predictor:"file"`
	Markdown  bool    `xor:"form" help:"Print for a comment in a pull request, details folded."`
	JSON      bool    `name:"json" xor:"form" help:"Print everything as JSON in SI units."`
	Threshold float64 `default:"1" help:"Tell differences from this percentage of the largest value of their kind."`
	As        string  `placeholder:"PATH" help:"Look for used files where this path stands, as git's external diff needs it."`
}

// Help adds examples to the help of the command.
func (*compareCommand) Help() string {
	return `What changed is told by meaning, not by line: order, units and spelling do not count, and renamed things are recognised. Exit status 1 says that a limit is newly broken or that the new model has no results.

Examples:
    spanwright compare old.span new.span
    spanwright compare main:models/roof.span models/roof.span
    spanwright compare HEAD~3:roof.span HEAD:roof.span --markdown`
}

// Run compares two models.
func (c *compareCommand) Run(t *terminal) error {
	if c.Threshold < 0 || c.Threshold > 100 {
		return fmt.Errorf("--threshold takes a percentage from 0 to 100, not %g", c.Threshold)
	}
	ctx := context.Background()
	old, err := c.side(ctx, c.Old, t)
	if err != nil {
		return err
	}
	now, err := c.side(ctx, c.New, t)
	if err != nil {
		return err
	}
	// A threshold of nothing still hides solver noise.
	options := compare.Options{Threshold: max(c.Threshold/100, 1e-12)}
	comparison, err := compare.Of(ctx, old.Side, now.Side, options)
	if err != nil {
		return err
	}
	w := comparisonWriter{out: t.out, comparison: comparison, old: old, now: now}
	switch {
	case c.JSON:
		err = w.json()
	case c.Markdown:
		w.markdown()
	default:
		w.text()
	}
	if err != nil {
		return err
	}
	if comparison.NewUnsolved || comparison.NewlyBroken() > 0 {
		return &foundError{}
	}
	return nil
}

// side is one of two models to compare.
type side struct {
	compare.Side
	project  *project
	problems []diagnostic.Diagnostic // why it has no numbers
}

// side reads and solves one model.
func (c *compareCommand) side(ctx context.Context, argument string, t *terminal) (*side, error) {
	p, err := openRevision(argument, c.As, t)
	if err != nil {
		return nil, err
	}
	if p.Library {
		return nil, fmt.Errorf("%s has no model line: it holds declarations for other files, and nothing to compare", argument)
	}
	s := &side{project: p}
	s.Model = p.Model
	if s.Results, err = p.solve(ctx); err != nil {
		return nil, err
	}
	if s.Results == nil || !s.Results.Solved() {
		if s.problems, err = p.diagnostics(ctx, s.Results); err != nil {
			return nil, err
		}
	}
	return s, nil
}

// reason says in a sentence why a side has no numbers.
func (s *side) reason() string {
	for _, d := range s.problems {
		if d.Severity == diagnostic.Error {
			return d.Summary
		}
	}
	return "There is no load case."
}
