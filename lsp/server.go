package lsp

import (
	"context"
	"io"
	"log/slog"
	"sync/atomic"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
	"spanwright/lsp/workspace"
)

// server is one server with its one client.
type server struct {
	connection *rpc.Connection
	log        *slog.Logger
	version    string
	workspace  *workspace.Workspace

	// Set by initialize, before anything else is asked.
	client   protocol.ClientCapabilities
	encoding source.Encoding
	pictures bool // hovers may hold pictures

	configuration atomic.Pointer[configuration]
	fetched       atomic.Int64 // configurations asked for
	folders       folders      // of the read loop
	buffers       buffers
	published     published
	refreshes     refreshes
	tokens        tokenCache
}

// Options say how to serve.
type Options struct {
	// Log takes what goes wrong; the program's standard output belongs to the
	// protocol.
	Log *slog.Logger
	// Version is the program's, which the client may show.
	Version string
	// Pace says when models are solved.
	Pace workspace.Options
}

// Serve serves one client until it says exit or hangs up, and returns the exit
// status that the protocol prescribes. It closes conn.
func Serve(ctx context.Context, conn io.ReadWriteCloser, options Options) (status int) {
	s := &server{log: options.Log, version: options.Version}
	s.configuration.Store(defaultConfiguration())
	s.workspace = workspace.New(options.Pace, workspace.Events{
		Published: s.publish,
		Solved:    func(string) { s.refreshNumbers() },
		Started:   s.showSolve,
	})
	defer s.workspace.Close()
	return rpc.Serve(ctx, conn, options.Log, func(c *rpc.Connection) rpc.Service {
		s.connection = c
		return rpc.Service{
			Initialize: s.initialize,
			Methods:    s.methods(),
			Protocol:   s.handler(),
			Prepare:    s.prepare,
		}
	})
}

// moment is the state that a request is answered from. It does not change.
type moment struct {
	*workspace.Snapshot
	server        *server
	configuration *configuration
}

func (s *server) prepare(string) any {
	return &moment{s.workspace.Snapshot(), s, s.configuration.Load()}
}

// moment returns the state that belongs to a request which glsp dispatches.
func (s *server) moment(context *glsp.Context) *moment {
	return s.connection.Request(context).Prepared.(*moment)
}

// momentOf returns the state that belongs to a request.
func momentOf(r *rpc.Request) *moment { return r.Prepared.(*moment) }

// tree returns the file that a request speaks of: the open document, else what
// is on disk.
func (m *moment) tree(document lsp.TextDocumentIdentifier) (*syntax.Tree, error) {
	tree, err := m.Tree(pathOf(document.URI))
	if err != nil {
		return nil, rpc.InvalidParams("%s is not open and cannot be read: %v", document.URI, err)
	}
	return tree, nil
}

// place returns the file and offset that a request speaks of.
func (m *moment) place(p lsp.TextDocumentPositionParams) (*syntax.Tree, int, error) {
	tree, err := m.tree(p.TextDocument)
	if err != nil {
		return nil, 0, err
	}
	return tree, m.server.offset(tree.File, p.Position), nil
}

// span returns the file and span that a request speaks of.
func (m *moment) span(document lsp.TextDocumentIdentifier, r lsp.Range) (*syntax.Tree, source.Span, error) {
	tree, err := m.tree(document)
	if err != nil {
		return nil, source.Span{}, err
	}
	return tree, m.server.span(tree.File, r), nil
}
