package lsp

import (
	"encoding/json"
	"errors"
	"maps"
	"slices"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
	"spanwright/lsp/rpc"
)

// command carries out a command of the server on a place of a document.
type command func(r *rpc.Request, place lsp.TextDocumentPositionParams) (any, error)

// commands are the commands of the server, by name.
func (s *server) commands() map[string]command {
	return map[string]command{
		"spanwright.solveNow":      s.solveNow,
		"spanwright.showStiffness": s.showStiffness,
	}
}

func (s *server) commandNames() []string { return slices.Sorted(maps.Keys(s.commands())) }

// executeCommand answers workspace/executeCommand. Every command takes one
// argument, the place that it is about: {uri, position}.
func (s *server) executeCommand(r *rpc.Request, params *struct {
	Command   string            `json:"command"`
	Arguments []json.RawMessage `json:"arguments"`
}) (any, error) {
	run, ok := s.commands()[params.Command]
	if !ok {
		return nil, rpc.InvalidParams("there is no command %q", params.Command)
	}
	var place struct {
		URI      string       `json:"uri"`
		Position lsp.Position `json:"position"`
	}
	if len(params.Arguments) != 1 {
		return nil, rpc.InvalidParams("%s takes one argument, {uri, position}", params.Command)
	}
	if err := json.Unmarshal(params.Arguments[0], &place); err != nil {
		return nil, rpc.InvalidParams("%s: %v", params.Command, err)
	}
	return run(r, lsp.TextDocumentPositionParams{TextDocument: lsp.TextDocumentIdentifier{URI: place.URI}, Position: place.Position})
}

// solveNow solves the model of a document, whatever its size, and even where
// the user has cancelled the solve. It does not wait for the end.
func (s *server) solveNow(r *rpc.Request, place lsp.TextDocumentPositionParams) (any, error) {
	tree, err := momentOf(r).tree(place.TextDocument)
	if err != nil {
		return nil, err
	}
	s.workspace.SolveNow(tree.File.Path)
	return nil, nil
}

// showStiffness returns the stiffness at the node or of the member of a place,
// as Markdown.
func (s *server) showStiffness(r *rpc.Request, place lsp.TextDocumentPositionParams) (any, error) {
	m := momentOf(r)
	tree, offset, err := m.place(place)
	if err != nil {
		return nil, err
	}
	text, err := feature.StiffnessAt(r.Context, m.Snapshot, tree.File.Path, offset)
	if err != nil {
		return nil, refused(err)
	}
	return text, nil
}

// refused turns an error that is meant for the user into the protocol's; others
// stay what they are.
func refused(err error) error {
	var words feature.Refusal
	if errors.As(err, &words) {
		return rpc.Refuse("%s", words)
	}
	return err
}
