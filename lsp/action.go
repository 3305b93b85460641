package lsp

import (
	"encoding/json"
	"slices"

	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/diagnostic"
	"spanwright/lsp/feature"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// actionData comes back with an action whose edits are asked for.
type actionData struct {
	URI string `json:"uri"`
	Key string `json:"key"`
}

// codeActions answers textDocument/codeAction. Edits that take a solve are left
// for codeAction/resolve; a client that does not know it gets them at once.
func (s *server) codeActions(r *rpc.Request, params *protocol.CodeActionParams) (any, error) {
	m := momentOf(r)
	tree, span, err := m.span(params.TextDocument, params.Range)
	if err != nil {
		return nil, err
	}
	list := []protocol.CodeAction{}
	for _, a := range feature.Actions(m.Snapshot, tree.File.Path, span) {
		action := protocol.CodeAction{Title: a.Title, Kind: lsp.CodeActionKindRefactorRewrite, IsPreferred: a.Preferred}
		if a.Fix {
			action.Kind = lsp.CodeActionKindQuickFix
		}
		if !wanted(params.Context.Only, action.Kind) {
			continue
		}
		if a.Diagnostic != nil {
			action.Diagnostics = s.diagnostics(m.Snapshot, tree.File.Path, []diagnostic.Diagnostic{*a.Diagnostic})
		}
		edits := a.Edits
		if edits == nil && s.lateEdits() {
			action.Data = actionData{params.TextDocument.URI, a.Key}
			list = append(list, action)
			continue
		}
		if edits == nil {
			if action.Title, edits, err = feature.ResolveAction(r.Context, m.Snapshot, tree.File.Path, a.Key); err != nil {
				continue // there is no such change after all
			}
		}
		if action.Edit, err = m.workspaceEdit(edits); err != nil {
			return nil, err
		}
		list = append(list, action)
	}
	return list, nil
}

// wanted reports whether a client asks for actions of a kind: for all, for this
// one, or for one that it belongs to.
func wanted(only []lsp.CodeActionKind, kind lsp.CodeActionKind) bool {
	if len(only) == 0 {
		return true
	}
	for _, o := range only {
		if o == "" || o == kind || len(kind) > len(o) && kind[:len(o)] == o && kind[len(o)] == '.' {
			return true
		}
	}
	return false
}

// resolveAction answers codeAction/resolve with the edits, and says in the title
// what they come to.
func (s *server) resolveAction(r *rpc.Request, action *protocol.CodeAction) (any, error) {
	data, err := json.Marshal(action.Data)
	if err != nil {
		return action, nil
	}
	var of actionData
	if json.Unmarshal(data, &of) != nil || of.Key == "" {
		return action, nil
	}
	m := momentOf(r)
	title, edits, err := feature.ResolveAction(r.Context, m.Snapshot, pathOf(of.URI), of.Key)
	if err != nil {
		return nil, refused(err)
	}
	action.Title = title
	if action.Edit, err = m.workspaceEdit(edits); err != nil {
		return nil, err
	}
	return action, nil
}

// lateEdits reports whether the client asks for the edits of an action when it
// is chosen.
func (s *server) lateEdits() bool {
	return s.client.CodeActionData && slices.Contains(s.client.CodeActionResolve, "edit")
}
