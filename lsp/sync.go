package lsp

import (
	"encoding/json"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/rpc"
	"spanwright/lsp/workspace"
)

// didOpen takes a document in. One that is open already is replaced.
func (s *server) didOpen(_ *glsp.Context, params *lsp.DidOpenTextDocumentParams) error {
	d := params.TextDocument
	path := pathOf(d.URI)
	s.buffers.open(path, d.URI)
	s.workspace.Open(path, d.Version, d.Text)
	return nil
}

// didChangeParams are read by types of our own, which take any number as a
// position: to lose a change would be worse than to move it to the nearest
// place.
type didChangeParams struct {
	TextDocument struct {
		URI     string `json:"uri"`
		Version *int32 `json:"version"`
	} `json:"textDocument"`
	ContentChanges []struct {
		Range *struct {
			Start changePosition `json:"start"`
			End   changePosition `json:"end"`
		} `json:"range"`
		Text string `json:"text"`
	} `json:"contentChanges"`
}

type changePosition struct {
	Line      float64 `json:"line"`
	Character float64 `json:"character"`
}

// far is a line or character beyond every text.
const far = 1 << 30

func (p changePosition) point() source.Point {
	clamp := func(x float64) int { return int(min(max(x, 0), far)) }
	return source.Point{Line: clamp(p.Line), Character: clamp(p.Character)}
}

// didChange applies changes in the order in which they came. The protocol
// delivers them in order, so a version that does not follow the last one is
// the client's slip: it is logged, and the change applies all the same.
func (s *server) didChange(r *rpc.Request) (any, error) {
	var params didChangeParams
	if err := json.Unmarshal(r.Params, &params); err != nil {
		return nil, rpc.InvalidParams("a change that cannot be read: %v", err)
	}
	path := pathOf(params.TextDocument.URI)
	document, open := s.workspace.Snapshot().Document(path)
	if !open {
		s.log.Warn("a change of a document that is not open", "uri", params.TextDocument.URI)
		return nil, nil
	}
	version := document.Version + 1
	if params.TextDocument.Version != nil {
		if version = *params.TextDocument.Version; version <= document.Version {
			s.log.Warn("a version that does not follow the last one", "uri", params.TextDocument.URI, "last", document.Version, "now", version)
		}
	}
	changes := make([]workspace.Replacement, len(params.ContentChanges))
	for i, c := range params.ContentChanges {
		if c.Range == nil {
			changes[i] = workspace.Replacement{Whole: true, Text: c.Text}
			continue
		}
		changes[i] = workspace.Replacement{From: c.Range.Start.point(), To: c.Range.End.point(), Text: c.Text}
	}
	s.workspace.Change(path, version, changes, s.encoding)
	return nil, nil
}

// didClose lets a document go. What is on disk counts again, and may be other
// than when it was last looked at.
func (s *server) didClose(_ *glsp.Context, params *lsp.DidCloseTextDocumentParams) error {
	path := pathOf(params.TextDocument.URI)
	if !s.workspace.CloseDocument(path) {
		s.log.Warn("a document was closed that is not open", "uri", params.TextDocument.URI)
	}
	s.workspace.FilesChanged(path)
	s.published.closed(path)
	s.tokens.drop(path)
	return nil
}
