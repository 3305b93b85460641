package lsp

import (
	"context"
	"errors"
	"sync"
	"time"

	"github.com/sourcegraph/jsonrpc2"

	"spanwright/lsp/protocol"
)

// refreshPatience is how long a client may take to answer a refresh.
const refreshPatience = 10 * time.Second

// refreshes asks the client to ask again. Of each kind one request is under way
// at most, and one more waits.
type refreshes struct {
	mutex   sync.Mutex
	wanted  map[string]bool
	running bool
}

// refreshNumbers asks the client to ask again for all that shows numbers.
func (s *server) refreshNumbers() {
	s.refresh(
		protocol.ServerWorkspaceInlayHintRefresh,
		protocol.ServerWorkspaceCodeLensRefresh,
		protocol.ServerWorkspaceSemanticTokensRefresh,
	)
}

// refresh asks the client to ask again for some things, where it knows how to.
func (s *server) refresh(methods ...string) {
	can := map[string]bool{
		protocol.ServerWorkspaceInlayHintRefresh:      s.client.RefreshInlayHints,
		protocol.ServerWorkspaceCodeLensRefresh:       s.client.RefreshCodeLenses,
		protocol.ServerWorkspaceSemanticTokensRefresh: s.client.RefreshSemanticTokens,
		protocol.ServerWorkspaceDiagnosticRefresh:     s.client.RefreshDiagnostics,
	}
	f := &s.refreshes
	f.mutex.Lock()
	defer f.mutex.Unlock()
	if f.wanted == nil {
		f.wanted = map[string]bool{}
	}
	for _, m := range methods {
		if can[m] {
			f.wanted[m] = true
		}
	}
	if !f.running && len(f.wanted) > 0 {
		f.running = true
		s.connection.Go(s.sendRefreshes)
	}
}

// sendRefreshes sends what is wanted until nothing is.
func (s *server) sendRefreshes(ctx context.Context) {
	for {
		wanted := s.refreshes.take()
		if len(wanted) == 0 || ctx.Err() != nil {
			return
		}
		var all sync.WaitGroup
		for method := range wanted {
			all.Go(func() {
				ctx, cancel := context.WithTimeout(ctx, refreshPatience)
				defer cancel()
				err := s.connection.Call(ctx, method, nil, nil)
				if err != nil && ctx.Err() == nil && !errors.Is(err, jsonrpc2.ErrClosed) {
					s.log.Info("a refresh failed", "method", method, "error", err)
				}
			})
		}
		all.Wait()
	}
}

// take returns what is wanted, and notes the end when nothing is.
func (f *refreshes) take() map[string]bool {
	f.mutex.Lock()
	defer f.mutex.Unlock()
	wanted := f.wanted
	f.wanted = nil
	f.running = len(wanted) > 0
	return wanted
}

// showSolve shows a solve that takes long, so that the user may cancel it.
func (s *server) showSolve(model string, cancel func()) (ended func()) {
	if !s.client.WorkDoneProgress {
		return func() {}
	}
	ctx, progress := s.connection.StartProgress(context.Background(), "Solving "+nameOf(model))
	stop := context.AfterFunc(ctx, cancel)
	return func() {
		stop()
		progress.End("")
	}
}
