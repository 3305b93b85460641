package lsp

import (
	"unicode/utf16"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/feature"
)

// signatureHelp answers textDocument/signatureHelp.
func (s *server) signatureHelp(context *glsp.Context, params *lsp.SignatureHelpParams) (*lsp.SignatureHelp, error) {
	tree, offset, err := s.moment(context).place(params.TextDocumentPositionParams)
	if err != nil {
		return nil, err
	}
	found, ok := feature.SignatureAt(tree, offset)
	if !ok {
		return nil, nil
	}
	help := &lsp.SignatureHelp{Signatures: make([]lsp.SignatureInformation, len(found.Signatures)), ActiveSignature: pointer(uint32(found.Active))}
	if found.Parameter >= 0 {
		help.ActiveParameter = pointer(uint32(found.Parameter))
	}
	for i, signature := range found.Signatures {
		information := lsp.SignatureInformation{Label: signature.Label, Documentation: markup(signature.Does, s.client.SignatureMarkdown())}
		information.Parameters = make([]lsp.ParameterInformation, len(signature.Parameters))
		for k, p := range signature.Parameters {
			// The protocol counts UTF-16 code units in a label, whatever the encoding
			// of positions.
			start, end := utf16Length(signature.Label[:p.Start]), utf16Length(signature.Label[:p.End])
			information.Parameters[k] = lsp.ParameterInformation{Label: []uint32{start, end}}
			if !s.client.SignatureLabelOffsets {
				information.Parameters[k].Label = signature.Label[p.Start:p.End]
			}
		}
		help.Signatures[i] = information
	}
	return help, nil
}

func utf16Length(s string) uint32 { return uint32(len(utf16.Encode([]rune(s)))) }
