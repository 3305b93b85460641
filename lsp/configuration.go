package lsp

import (
	"context"
	"encoding/json"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"

	"spanwright/lsp/protocol"
)

// section is the name under which clients keep the settings.
const section = "spanwright"

// configuration is what a user may set. It does not change; a new one takes its
// place.
type configuration struct {
	InlayHints inlayHintSwitches `json:"inlayHints"`
	CodeLens   bool              `json:"codeLens"`
}

// inlayHintSwitches switch the kinds of hints.
type inlayHintSwitches struct {
	Supports bool `json:"supports"`
	Members  bool `json:"members"`
	Limits   bool `json:"limits"`
	Lets     bool `json:"lets"`
	Cases    bool `json:"cases"`
}

func defaultConfiguration() *configuration {
	return &configuration{
		InlayHints: inlayHintSwitches{Supports: true, Members: true, Limits: true, Lets: true, Cases: true},
		CodeLens:   true,
	}
}

// configure takes settings. What is missing, or of the wrong kind, is as by
// default.
func (s *server) configure(settings json.RawMessage) {
	c := defaultConfiguration()
	if err := json.Unmarshal(settings, c); err != nil {
		s.log.Warn("a setting is not as it should be", "section", section, "error", err)
	}
	if before := s.configuration.Swap(c); *before != *c {
		s.refreshNumbers()
	}
}

// fetchConfiguration asks the client for the settings, beside the read loop.
func (s *server) fetchConfiguration() {
	number := s.fetched.Add(1)
	s.connection.Go(func(ctx context.Context) {
		name := section
		params := lsp.ConfigurationParams{Items: []lsp.ConfigurationItem{{Section: &name}}}
		var values []json.RawMessage
		if err := s.connection.Call(ctx, string(lsp.ServerWorkspaceConfiguration), params, &values); err != nil {
			s.log.Warn("the settings cannot be had", "error", err)
			return
		}
		// An answer that a later question has overtaken is not used.
		if len(values) > 0 && s.fetched.Load() == number {
			s.configure(values[0])
		}
	})
}

// didChangeConfiguration takes new settings: from the message, where the client
// cannot be asked.
func (s *server) didChangeConfiguration(_ *glsp.Context, params *lsp.DidChangeConfigurationParams) error {
	if s.client.Configuration {
		s.fetchConfiguration()
		return nil
	}
	text, err := json.Marshal(params.Settings)
	if err != nil {
		return err
	}
	var settings map[string]json.RawMessage
	if json.Unmarshal(text, &settings) == nil && settings[section] != nil {
		s.configure(settings[section])
	}
	return nil
}

// register asks the client to tell of changes: of model files, and of no other,
// and of the settings.
func (s *server) register() {
	var wanted []lsp.Registration
	if s.client.RegisterWatchedFiles {
		wanted = append(wanted, lsp.Registration{
			ID: "files", Method: string(lsp.MethodWorkspaceDidChangeWatchedFiles),
			RegisterOptions: protocol.DidChangeWatchedFilesRegistrationOptions{
				Watchers: protocol.List[protocol.FileSystemWatcher]{{GlobPattern: "**/*.span"}},
			},
		})
	}
	if s.client.RegisterConfiguration {
		wanted = append(wanted, lsp.Registration{
			ID: "settings", Method: string(lsp.MethodWorkspaceDidChangeConfiguration),
			RegisterOptions: map[string]any{"section": section},
		})
	}
	if len(wanted) == 0 {
		return
	}
	s.connection.Go(func(ctx context.Context) {
		err := s.connection.Call(ctx, protocol.ServerClientRegisterCapability, lsp.RegistrationParams{Registrations: wanted}, nil)
		if err != nil {
			s.log.Warn("the client does not tell of changes", "error", err)
		}
	})
}
