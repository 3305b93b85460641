package main

import (
	"fmt"
	"os"
	"path/filepath"

	udiff "github.com/aymanbagabas/go-udiff"
	"github.com/google/renameio/v2"

	format "spanwright/fmt"
	"spanwright/lang/source"
)

type formatCommand struct {
	Files []string `arg:"" optional:"" name:"file" help:"Files, folders, or - for standard input." predictor:"file"`
	Write bool     `short:"w" help:"Write the result back to the file."`
	Check bool     `help:"List the files that would change; exit 1 if there are any."`
	Diff  bool     `help:"Print what would change; exit 1 if anything would."`
}

// Help adds examples to the help of the command.
func (*formatCommand) Help() string {
	return `Examples:
    spanwright format roof.span            print the normal form
    spanwright format -w models            put every model below models into normal form
    spanwright format --check .            list what is not in normal form
    cat roof.span | spanwright format -    as a filter`
}

// Run formats the files.
func (c *formatCommand) Run(t *terminal) error {
	if len(c.Files) == 0 {
		return fmt.Errorf("format needs a file, a folder, or - for standard input")
	}
	paths, err := find(c.Files, t, anyFile)
	if err != nil {
		return err
	}
	changed := false
	for _, path := range paths {
		file, err := read(path, t)
		if err != nil {
			return err
		}
		text := format.File(file)
		changed = changed || text != file.Text
		if err := c.show(t, path, file, text); err != nil {
			return err
		}
	}
	if changed && (c.Check || c.Diff) {
		return &foundError{}
	}
	return nil
}

// show does with one file's normal form what the flags ask for.
func (c *formatCommand) show(t *terminal, path string, file *source.File, text string) error {
	if c.Diff && text != file.Text {
		fmt.Fprint(t.out, udiff.Unified(path, path+" (normal form)", file.Text, text))
	}
	if c.Check && text != file.Text {
		fmt.Fprintln(t.out, path)
	}
	if c.Write && path != "-" {
		if text == file.Text {
			return nil
		}
		return replace(path, text)
	}
	if !c.Write && !c.Check && !c.Diff || path == "-" && c.Write {
		fmt.Fprint(t.out, text)
	}
	return nil
}

// replace writes a file in one step, so that at no time half of it is there. The
// file keeps its mode, and a symbolic link stays one.
func replace(path, text string) error {
	target, err := filepath.EvalSymlinks(path)
	if err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, plain(err))
	}
	info, err := os.Stat(target)
	if err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, plain(err))
	}
	if err := renameio.WriteFile(target, []byte(text), info.Mode().Perm(), renameio.IgnoreUmask()); err != nil {
		return fmt.Errorf("%s cannot be written: %w", path, plain(err))
	}
	return nil
}
