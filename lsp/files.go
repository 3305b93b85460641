package lsp

import (
	"path"
	"slices"
	"strings"

	"github.com/tliron/glsp"
	lsp "github.com/tliron/glsp/protocol_3_16"
)

// extension is that of model files; no other file is looked at.
const extension = ".span"

// didChangeWatchedFiles takes news of files on disk. Those that are open are
// passed over: their buffers count, and every save of one would set off a solve.
func (s *server) didChangeWatchedFiles(_ *glsp.Context, params *lsp.DidChangeWatchedFilesParams) error {
	snapshot := s.workspace.Snapshot()
	var paths []string
	for _, change := range params.Changes {
		p := pathOf(change.URI)
		if _, open := snapshot.Document(p); !open && path.Ext(p) == extension {
			paths = append(paths, p)
		}
	}
	if len(paths) > 0 {
		s.workspace.FilesChanged(paths...)
	}
	return nil
}

// folders are the folders of the workspace. They belong to the read loop.
type folders struct{ paths []string }

func (f *folders) add(uri string) {
	if p := pathOf(uri); uri != "" && !slices.Contains(f.paths, p) {
		f.paths = append(f.paths, p)
	}
}

func (f *folders) remove(uri string) {
	f.paths = slices.DeleteFunc(f.paths, func(p string) bool { return p == pathOf(uri) })
}

// didChangeWorkspaceFolders takes folders in and lets others go.
func (s *server) didChangeWorkspaceFolders(_ *glsp.Context, params *lsp.DidChangeWorkspaceFoldersParams) error {
	for _, f := range params.Event.Removed {
		s.folders.remove(f.URI)
	}
	for _, f := range params.Event.Added {
		s.folders.add(f.URI)
	}
	s.workspace.SetFolders(s.folders.paths)
	return nil
}

// nameOf returns the name of a file for people.
func nameOf(p string) string { return strings.TrimSuffix(path.Base(p), extension) }
