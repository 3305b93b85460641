package main

import "errors"

type serveCommand struct {
	Stdio bool `help:"Speak on standard input and output; there is no other way."`
}

// Run serves one client until it says good-bye.
func (*serveCommand) Run(t *terminal) error { return errors.New("not yet") }
