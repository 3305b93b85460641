package lsp

import (
	"encoding/json"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lang/source"
	"spanwright/lsp/protocol"
	"spanwright/lsp/rpc"
)

// initializeParams is the part of initialize that is not about capabilities.
type initializeParams struct {
	RootPath         string `json:"rootPath"`
	RootURI          string `json:"rootUri"`
	WorkspaceFolders []struct {
		URI string `json:"uri"`
	} `json:"workspaceFolders"`
	Options initializationOptions `json:"initializationOptions"`
}

// initializationOptions are what a client's set-up may say at the start.
type initializationOptions struct {
	// Pictures says that the client draws SVG pictures in hovers. Others would
	// show their source.
	Pictures bool `json:"pictures"`
	// PositionEncoding "utf-16" forces that encoding on a client that offers a
	// better one and gets it wrong.
	PositionEncoding string `json:"positionEncoding"`
}

// initialize answers the request of that name. Whatever of it cannot be read is
// logged and taken for absent: a server that refuses to start helps nobody.
func (s *server) initialize(r *rpc.Request) (any, error) {
	var err error
	if s.client, err = protocol.DecodeClientCapabilities(r.Params); err != nil {
		s.log.Warn("a capability that cannot be read", "error", err)
	}
	var params initializeParams
	if err := json.Unmarshal(r.Params, &params); err != nil {
		s.log.Warn("an initialization that cannot be read in full", "error", err)
	}
	s.pictures = params.Options.Pictures
	encoding := protocol.PositionEncodingUTF16
	if s.client.OffersEncoding(protocol.PositionEncodingUTF8) && params.Options.PositionEncoding != protocol.PositionEncodingUTF16 {
		s.encoding, encoding = source.UTF8, protocol.PositionEncodingUTF8
	}
	for _, f := range params.WorkspaceFolders {
		s.folders.add(f.URI)
	}
	switch {
	case len(params.WorkspaceFolders) > 0:
	case params.RootURI != "":
		s.folders.add(params.RootURI)
	case params.RootPath != "":
		s.folders.add(uriOf(params.RootPath))
	}
	s.workspace.SetFolders(s.folders.paths)
	return protocol.InitializeResult{
		Capabilities: s.capabilities(encoding),
		ServerInfo:   &lsp.InitializeResultServerInfo{Name: "spanwright", Version: &s.version},
	}, nil
}

// initialized fetches what the client was not ready for before.
func (s *server) initialized(*glsp.Context, *lsp.InitializedParams) error {
	s.register()
	if s.client.Configuration {
		s.fetchConfiguration()
	}
	return nil
}
