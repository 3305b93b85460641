package main

import (
	"errors"
	"fmt"
	"os"
	"strings"

	"github.com/alecthomas/kong"
	kongcompletion "github.com/jotaen/kong-completion"
	"github.com/posener/complete"
)

// commands is the command line as kong reads it.
type commands struct {
	Check      checkCommand              `cmd:"" help:"Report mistakes and broken limits."`
	Format     formatCommand             `cmd:"" help:"Write models in normal form."`
	Solve      solveCommand              `cmd:"" help:"Print reactions, movements, member forces and limits."`
	Compare    compareCommand            `cmd:"" help:"Say what changed between two models, and what that did."`
	External   externalDiffCommand       `cmd:"" name:"external-diff" help:"Compare as git's external diff."`
	Section    sectionCommand            `cmd:"" help:"Print the properties of a section, or the sizes of a series."`
	Stiffness  stiffnessCommand          `cmd:"" help:"Print the stiffness of the structure at a node, or of a member."`
	Explain    explainCommand            `cmd:"" help:"Say what a diagnostic means and how to mend it."`
	Serve      serveCommand              `cmd:"" help:"Run the language server on standard input and output."`
	Version    versionCommand            `cmd:"" help:"Print the version."`
	Completion kongcompletion.Completion `cmd:"" help:"Print how to switch on completion in bash, zsh or fish."`
}

const description = `Text models of frames and trusses: check them, format them, solve them, and serve them to an editor.

Results are for use by, or under the responsible charge of, a qualified structural engineer; local codes, national annexes and licensed practice decide.`

func main() {
	os.Exit(run(os.Args[1:], &terminal{in: os.Stdin, out: os.Stdout, err: os.Stderr}))
}

// run carries out one command line and returns the exit status.
func run(arguments []string, t *terminal) int {
	if len(arguments) == 0 && os.Getenv("COMP_LINE") == "" {
		fmt.Fprint(t.out, firstSteps)
		return statusWell
	}
	status := statusWell
	exited := false
	parser, err := kong.New(&commands{},
		kong.Name("spanwright"), kong.Description(description),
		kong.UsageOnError(), kong.ConfigureHelp(kong.HelpOptions{Compact: true}),
		kong.Writers(t.out, t.err),
		kong.Exit(func(code int) { status, exited = code, true }),
		kong.Bind(t),
	)
	if err != nil {
		fmt.Fprintln(t.err, "spanwright:", err)
		return statusMisuse
	}
	kongcompletion.Register(parser, kongcompletion.WithPredictor("file", complete.PredictOr(complete.PredictFiles("*.span"), complete.PredictDirs("*"))))
	context, err := parser.Parse(arguments)
	if exited {
		return status
	}
	if err != nil {
		fmt.Fprintf(t.err, "spanwright: %s. Try spanwright --help.\n", strings.TrimSuffix(err.Error(), "?"))
		return statusMisuse
	}
	err = context.Run()
	var found *foundError
	switch {
	case err == nil:
		return statusWell
	case errors.As(err, &found):
		return statusFound
	}
	fmt.Fprintln(t.err, "spanwright:", err)
	return statusMisuse
}

const firstSteps = `spanwright: text models of frames and trusses.

Try first
    spanwright check FILE          mistakes and broken limits
    spanwright solve FILE          reactions, movements, member forces, limits
    spanwright format -w FILE      normal form, in place
    spanwright explain             the list of diagnostics
    spanwright --help              all commands

In an editor, the language server is: spanwright serve
`
