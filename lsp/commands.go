package lsp

import (
	"encoding/json"
	"errors"
	"maps"
	"slices"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/syntax"
	"spanwright/lsp/feature"
	"spanwright/lsp/rpc"
)

// command carries out a command of the server on what it is about.
type command func(r *rpc.Request, on *subject) (any, error)

// subject is the one argument of every command: a document and a place in it.
type subject struct {
	URI      string       `json:"uri"`
	Position lsp.Position `json:"position"`
	// Model is the URI of the model to pin, for that command alone.
	Model string `json:"model"`
}

// subject returns the file and the offset that a command is about.
func (m *moment) subject(on *subject) (*syntax.Tree, int, error) {
	return m.place(lsp.TextDocumentPositionParams{TextDocument: lsp.TextDocumentIdentifier{URI: on.URI}, Position: on.Position})
}

const pinModelCommand = "spanwright.pinModel"

// commands are the commands of the server, by name.
func (s *server) commands() map[string]command {
	return map[string]command{
		"spanwright.solveNow":      s.solveNow,
		"spanwright.showStiffness": s.showStiffness,
		pinModelCommand:            s.pinModel,
	}
}

func (s *server) commandNames() []string { return slices.Sorted(maps.Keys(s.commands())) }

// executeCommand answers workspace/executeCommand.
func (s *server) executeCommand(r *rpc.Request, params *struct {
	Command   string            `json:"command"`
	Arguments []json.RawMessage `json:"arguments"`
}) (any, error) {
	run, ok := s.commands()[params.Command]
	if !ok {
		return nil, rpc.InvalidParams("there is no command %q", params.Command)
	}
	var on subject
	if len(params.Arguments) != 1 {
		return nil, rpc.InvalidParams("%s takes one argument, {uri, position}", params.Command)
	}
	if err := json.Unmarshal(params.Arguments[0], &on); err != nil {
		return nil, rpc.InvalidParams("%s: %v", params.Command, err)
	}
	return run(r, &on)
}

// solveNow solves the model of a document, whatever its size, and even where
// the user has cancelled the solve. It does not wait for the end.
func (s *server) solveNow(r *rpc.Request, on *subject) (any, error) {
	tree, _, err := momentOf(r).subject(on)
	if err != nil {
		return nil, err
	}
	s.workspace.SolveNow(tree.File.Path)
	return nil, nil
}

// showStiffness returns the stiffness at the node or of the member of a place,
// as Markdown.
func (s *server) showStiffness(r *rpc.Request, on *subject) (any, error) {
	m := momentOf(r)
	tree, offset, err := m.subject(on)
	if err != nil {
		return nil, err
	}
	text, err := feature.StiffnessAt(r.Context, m.Snapshot, tree.File.Path, offset)
	if err != nil {
		return nil, refused(err)
	}
	return text, nil
}

// pinModel says through which model a shared file is looked at, when several
// use it.
func (s *server) pinModel(r *rpc.Request, on *subject) (any, error) {
	m := momentOf(r)
	tree, _, err := m.subject(on)
	if err != nil {
		return nil, err
	}
	path, model := tree.File.Path, pathOf(on.Model)
	if !slices.Contains(m.Models(path), model) {
		return nil, rpc.Refuse("%s does not use %s.", nameOf(model), nameOf(path))
	}
	s.workspace.Pin(path, model)
	s.refreshNumbers()
	return nil, nil
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
