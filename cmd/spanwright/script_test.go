package main

import (
	"bytes"
	"encoding/json"
	"os"
	"path/filepath"
	"testing"

	"github.com/rogpeppe/go-internal/testscript"
	"github.com/santhosh-tekuri/jsonschema/v6"
	"github.com/stretchr/testify/require"
)

func TestMain(m *testing.M) {
	testscript.Main(m, map[string]func(){"spanwright": main})
}

// TestScripts plays the sessions of testdata/script. A script finds the shipped
// models in $MODELS.
func TestScripts(t *testing.T) {
	data, err := filepath.Abs("../../testdata")
	require.NoError(t, err)
	testscript.Run(t, testscript.Params{
		Dir:                 filepath.Join(data, "script"),
		RequireExplicitExec: true,
		Setup: func(e *testscript.Env) error {
			e.Setenv("MODELS", filepath.Join(data, "models"))
			e.Setenv("REVIEW", filepath.Join(data, "review"))
			e.Setenv("ROOT", filepath.Dir(data))
			e.Setenv("HOME", e.WorkDir)
			return nil
		},
		Cmds: map[string]func(*testscript.TestScript, bool, []string){
			"status": status,
			"sarif": func(ts *testscript.TestScript, _ bool, args []string) {
				obeys(ts, filepath.Join(data, "sarif", "sarif-schema-2.1.0.json"), args)
			},
			"json": func(ts *testscript.TestScript, _ bool, args []string) { isJSON(ts, args) },
		},
	})
}

// status runs spanwright and checks its exit status: status 1 check a.span. What
// it prints can be looked at as after exec.
func status(ts *testscript.TestScript, _ bool, args []string) {
	want := args[0]
	err := ts.Exec("spanwright", args[1:]...)
	got := "0"
	if err != nil {
		got = "1"
		if bytes.Contains([]byte(err.Error()), []byte("exit status 2")) {
			got = "2"
		}
	}
	if got != want {
		ts.Fatalf("exit status %s, not %s: %v", got, want, err)
	}
}

// obeys holds a file against a JSON schema.
func obeys(ts *testscript.TestScript, schema string, args []string) {
	compiled, err := jsonschema.NewCompiler().Compile(schema)
	ts.Check(err)
	document, err := jsonschema.UnmarshalJSON(bytes.NewReader([]byte(ts.ReadFile(args[0]))))
	ts.Check(err)
	ts.Check(compiled.Validate(document))
}

// isJSON checks that a file is one JSON document with a format of a name.
func isJSON(ts *testscript.TestScript, args []string) {
	var document struct{ Format string }
	ts.Check(json.Unmarshal([]byte(ts.ReadFile(args[0])), &document))
	if document.Format != args[1] {
		ts.Fatalf("format %q, not %q", document.Format, args[1])
	}
}

// TestNothingIsLeftBehind checks that a file that cannot be written is whole
// afterwards, with nothing beside it.
func TestNothingIsLeftBehind(t *testing.T) {
	folder := t.TempDir()
	path := filepath.Join(folder, "a.span")
	require.NoError(t, os.WriteFile(path, []byte("node A=(0,0)m\n"), 0o640))
	var out, problems bytes.Buffer
	require.Equal(t, statusWell, run([]string{"format", "-w", path}, &terminal{in: &bytes.Buffer{}, out: &out, err: &problems}))
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	require.Equal(t, "node A = (0, 0) m\n", string(text))
	info, err := os.Stat(path)
	require.NoError(t, err)
	require.Equal(t, os.FileMode(0o640), info.Mode().Perm())
	entries, err := os.ReadDir(folder)
	require.NoError(t, err)
	require.Len(t, entries, 1)
}
