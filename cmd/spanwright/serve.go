package main

import (
	"context"
	"errors"
	"io"
	"log/slog"
	"os/signal"
	"syscall"

	"spanwright/lsp"
	"spanwright/lsp/workspace"
)

type serveCommand struct {
	Stdio bool `help:"Speak on standard input and output; there is no other way."`
}

// Run serves one client until it says good-bye. The exit status is the
// protocol's: 0 after shutdown and exit, else 1.
func (*serveCommand) Run(t *terminal) error {
	ctx, stop := signal.NotifyContext(context.Background(), syscall.SIGINT, syscall.SIGTERM)
	defer stop()
	log := slog.New(slog.NewTextHandler(t.err, nil))
	slog.SetDefault(log)
	status := lsp.Serve(ctx, pipes{t.in, t.out}, lsp.Options{Log: log, Version: version, Pace: workspace.DefaultOptions()})
	if status != statusWell {
		return &foundError{}
	}
	return nil
}

// pipes are the two ends of a connection on standard input and output.
type pipes struct {
	io.Reader
	io.Writer
}

// Close closes those that can be closed.
func (p pipes) Close() error {
	var errs []error
	for _, end := range []any{p.Reader, p.Writer} {
		if c, ok := end.(io.Closer); ok {
			errs = append(errs, c.Close())
		}
	}
	return errors.Join(errs...)
}
