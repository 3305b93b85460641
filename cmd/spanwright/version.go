package main

import (
	"fmt"
	"runtime/debug"
)

type versionCommand struct{}

// version is the number of the release in work.
const version = "0.1.0"

// Run prints the version, with the revision that the binary was built from.
func (*versionCommand) Run(t *terminal) error {
	revision := ""
	if info, ok := debug.ReadBuildInfo(); ok {
		for _, s := range info.Settings {
			if s.Key == "vcs.revision" && len(s.Value) >= 12 {
				revision = " (" + s.Value[:12] + ")"
			}
		}
	}
	fmt.Fprintf(t.out, "spanwright %s%s\n", version, revision)
	return nil
}
