package main

import (
	"io"
	"os"

	"github.com/fatih/color"
	"github.com/mattn/go-isatty"
)

// terminal is where a command reads and writes: results to out, words for
// people to err.
type terminal struct {
	in  io.Reader
	out io.Writer
	err io.Writer
}

// colourful reports whether a stream is a terminal whose reader has not asked
// for plain text (no-color.org).
func colourful(w io.Writer) bool {
	f, ok := w.(*os.File)
	return ok && os.Getenv("NO_COLOR") == "" && os.Getenv("TERM") != "dumb" && isatty.IsTerminal(f.Fd())
}

// painter returns a function that paints text on a stream, or leaves it plain.
func painter(w io.Writer, attributes ...color.Attribute) func(string) string {
	c := color.New(attributes...)
	if colourful(w) {
		c.EnableColor()
	} else {
		c.DisableColor()
	}
	return func(s string) string { return c.Sprint(s) }
}
