package protocol

// DidChangeWatchedFilesRegistrationOptions says which files to watch.
type DidChangeWatchedFilesRegistrationOptions struct {
	Watchers List[FileSystemWatcher] `json:"watchers"`
}

// FileSystemWatcher watches the files that a pattern matches.
type FileSystemWatcher struct {
	GlobPattern string `json:"globPattern"`
}
