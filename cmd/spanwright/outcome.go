package main

// The exit status of every command.
const (
	statusWell   = 0 // all is well
	statusFound  = 1 // errors or broken limits were found, or a file would change
	statusMisuse = 2 // wrong use, or input that cannot be read
)

// foundError ends a command that did its work and found something wrong, which
// it has already told.
type foundError struct{}

// Error serves the error interface; nobody reads it.
func (*foundError) Error() string { return "something was found" }
