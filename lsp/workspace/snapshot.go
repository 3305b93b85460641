package workspace

import (
	"maps"
	"slices"
	"sync"

	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
)

// Snapshot is everything that is open at one moment. It does not change, and
// any number of goroutines may ask it.
type Snapshot struct {
	workspace *Workspace
	documents map[string]*Document
	disk      *disk
	index     map[string]known // files of the folders, as they are on disk
	folders   []string
	pins      map[string]string // shared file → its model

	files func() map[string]known // index, with the open documents in it

	mutex       sync.Mutex
	resolutions map[string]*resolution // by the model's path
}

// resolution is a model of a snapshot, resolved when it is first asked for.
type resolution struct {
	once   sync.Once
	result *resolve.Result // nil until once is done, and for a file that cannot be read
	loaded map[string]bool // every path that was asked for, found or not
}

// next returns a snapshot that sees other documents, and shares the resolutions
// that do not read any of the changed files. With no changed files given all
// are dropped.
func (s *Snapshot) next(documents map[string]*Document, changed ...string) *Snapshot {
	n := &Snapshot{
		workspace: s.workspace, documents: documents, disk: s.disk,
		index: s.index, folders: s.folders, pins: s.pins,
		resolutions: map[string]*resolution{},
	}
	n.files = sync.OnceValue(n.allFiles)
	if len(changed) == 0 {
		return n
	}
	s.mutex.Lock()
	defer s.mutex.Unlock()
	for model, r := range s.resolutions {
		if r.untouched(model, changed) {
			n.resolutions[model] = r
		}
	}
	return n
}

// untouched reports whether the resolution is done and read none of the files.
func (r *resolution) untouched(model string, changed []string) bool {
	if r.loaded == nil || slices.Contains(changed, model) {
		return false
	}
	for _, c := range changed {
		if r.loaded[c] {
			return false
		}
	}
	return true
}

// Document returns an open file.
func (s *Snapshot) Document(path string) (*Document, bool) {
	d, ok := s.documents[path]
	return d, ok
}

// Documents returns the open files, sorted by path.
func (s *Snapshot) Documents() []*Document {
	return slices.SortedFunc(maps.Values(s.documents), func(a, b *Document) int {
		if a.Path < b.Path {
			return -1
		}
		return 1
	})
}

// Tree returns a file, read: the open buffer where there is one, else from
// disk.
func (s *Snapshot) Tree(path string) (*syntax.Tree, error) {
	if d, ok := s.documents[path]; ok {
		return d.Tree, nil
	}
	return s.disk.tree(path)
}

// Folders returns the workspace's folders, as slash-separated paths.
func (s *Snapshot) Folders() []string { return s.folders }

// Files returns the paths of all files known: open ones, and those in the
// workspace's folders, sorted.
func (s *Snapshot) Files() []string { return slices.Sorted(maps.Keys(s.files())) }

// Models returns the models that a file belongs to, sorted: itself if it is
// one, else those that use it.
func (s *Snapshot) Models(path string) []string {
	files := s.files()
	if files[path].model {
		return []string{path}
	}
	return users(files, path)
}

// ModelOf returns the path of the model through which a file is looked at: the
// file itself if it is a model or no model uses it; else the pinned one, an
// open one, or the first by name.
func (s *Snapshot) ModelOf(path string) string {
	models := s.Models(path)
	if pinned := s.pins[path]; slices.Contains(models, pinned) {
		return pinned
	}
	for _, m := range models {
		if _, open := s.documents[m]; open {
			return m
		}
	}
	if len(models) > 0 {
		return models[0]
	}
	return path
}

func (s *Snapshot) allFiles() map[string]known {
	files := maps.Clone(s.index)
	if files == nil {
		files = map[string]known{}
	}
	for p, d := range s.documents {
		files[p] = about(d.Tree)
	}
	return files
}

// Resolve returns a model of the snapshot, resolved: nil where the file can not
// be read.
func (s *Snapshot) Resolve(model string) *resolve.Result {
	s.mutex.Lock()
	r := s.resolutions[model]
	if r == nil {
		r = &resolution{}
		s.resolutions[model] = r
	}
	s.mutex.Unlock()
	r.once.Do(func() {
		result, loaded := s.workspace.resolver(model).resolve(model, s)
		s.mutex.Lock()
		defer s.mutex.Unlock()
		r.result, r.loaded = result, loaded
	})
	return r.result
}

// resolver resolves the versions of one model, one at a time.
type resolver struct {
	mutex   sync.Mutex
	session *resolve.Session
}

// loader notes what a resolution reads.
type loader struct {
	snapshot *Snapshot
	loaded   map[string]bool
}

// Load returns the tree of a file.
func (l loader) Load(path string) (*syntax.Tree, error) {
	l.loaded[path] = true
	return l.snapshot.Tree(path)
}

func (r *resolver) resolve(model string, s *Snapshot) (*resolve.Result, map[string]bool) {
	l := loader{s, map[string]bool{model: true}}
	tree, err := s.Tree(model)
	if err != nil {
		return nil, l.loaded
	}
	r.mutex.Lock()
	defer r.mutex.Unlock()
	return r.session.Update(tree, l), l.loaded
}
