package main

import (
	"errors"
	"fmt"
	"path/filepath"
)

type externalDiffCommand struct {
	Arguments []string `arg:"" passthrough:"" help:"As git passes them: path, old file, its hash and mode, new file, its hash and mode."`
}

// Help says how git is told to use the command.
func (*externalDiffCommand) Help() string {
	return `Example:
    GIT_EXTERNAL_DIFF='spanwright external-diff' git diff main -- models`
}

// Run compares the two versions that git hands over. Its exit status is 0
// whatever the comparison says: git takes any other for a breakdown.
func (c *externalDiffCommand) Run(t *terminal) error {
	if len(c.Arguments) < 7 {
		// A path in conflict comes alone: there are no two sides to compare.
		return nil
	}
	path, old, now := c.Arguments[0], c.Arguments[1], c.Arguments[4]
	if filepath.Ext(path) != ".span" {
		return nil
	}
	fmt.Fprintf(t.out, "== %s\n", path)
	compare := compareCommand{Old: old, New: now, As: path, Threshold: 1}
	err := compare.Run(t)
	var found *foundError
	if err != nil && !errors.As(err, &found) {
		fmt.Fprintln(t.out, err) // a library, or a file that cannot be read
	}
	fmt.Fprintln(t.out)
	return nil
}
