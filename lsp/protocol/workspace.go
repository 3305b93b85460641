package protocol

import glsp "github.com/tliron/glsp/protocol_3_16"

// WorkspaceSymbol is a symbol of the workspace whose range may be resolved
// later.
type WorkspaceSymbol struct {
	Name          string           `json:"name"`
	Kind          glsp.SymbolKind  `json:"kind"`
	Tags          []glsp.SymbolTag `json:"tags,omitempty"`
	ContainerName string           `json:"containerName,omitempty"`
	// Location is a Location, or a DocumentLocation where the client resolves.
	Location any `json:"location"`
	// Data comes back in workspaceSymbol/resolve.
	Data any `json:"data,omitempty"`
}

// DocumentLocation is a location without a range.
type DocumentLocation struct {
	URI glsp.DocumentUri `json:"uri"`
}

// WorkspaceSymbolOptions is the server's offer of workspace symbols.
type WorkspaceSymbolOptions struct {
	ResolveProvider bool `json:"resolveProvider,omitempty"`
}

// DidChangeWatchedFilesRegistrationOptions says which files to watch.
type DidChangeWatchedFilesRegistrationOptions struct {
	Watchers List[FileSystemWatcher] `json:"watchers"`
}

// FileSystemWatcher watches the files that a pattern matches.
type FileSystemWatcher struct {
	// GlobPattern is a string, or a RelativePattern where the client knows it.
	GlobPattern any `json:"globPattern"`
	// Kind is a sum of glsp's WatchKind values; nil means all.
	Kind *uint32 `json:"kind,omitempty"`
}

// RelativePattern is a pattern below a folder.
type RelativePattern struct {
	// BaseURI is a URI or a WorkspaceFolder.
	BaseURI any    `json:"baseUri"`
	Pattern string `json:"pattern"`
}
