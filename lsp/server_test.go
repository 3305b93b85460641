package lsp

import (
	"context"
	"io"
	"log/slog"
	"os"
	"path/filepath"
	"testing"
	"time"

	"github.com/stretchr/testify/require"

	"spanwright/lsp/lsptest"
	"spanwright/lsp/protocol"
	"spanwright/lsp/workspace"
)

// quick is a pace for tests: warnings do not wait for a pause.
func quick() workspace.Options {
	o := workspace.DefaultOptions()
	o.Pause = time.Millisecond
	return o
}

func serveQuick(ctx context.Context, conn io.ReadWriteCloser, log *slog.Logger) int {
	return Serve(ctx, conn, Options{Log: log, Version: "test", Pace: quick()})
}

func start(t *testing.T, options lsptest.Options) *lsptest.Client {
	t.Helper()
	return lsptest.Start(t, serveQuick, options)
}

// pushing are the capabilities of a client that does not pull diagnostics.
func pushing() map[string]any {
	return lsptest.Set(lsptest.Capabilities(), nil, "textDocument", "diagnostic")
}

// frame is a small sound model.
const frame = `model "Shed" plane
material steel = S235
section post = HEA 100 of steel
node A = (0, 0) m
node B = (0, 3) m
beam c = A -> B of post
support A fixed
case W wind {
    B: 4 kN along x
}
`

const uri = "file:///nowhere/shed.span"

// model returns a shipped model.
func model(t *testing.T, name string) string {
	t.Helper()
	text, err := os.ReadFile(filepath.Join("..", "testdata", "models", name))
	require.NoError(t, err)
	return string(text)
}

func codes(list []protocol.Diagnostic) []string {
	all := []string{}
	for _, d := range list {
		all = append(all, d.Code.(string))
	}
	return all
}
