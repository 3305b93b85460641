package workspace

import (
	"context"
	"maps"
	"slices"
	"sync"
	"sync/atomic"
	"time"

	"spanwright/lang/diagnostic"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// Events are what a workspace has to tell. They are called one at a time.
type Events struct {
	// Published says what there is to say about a file, as it is in a snapshot.
	// Nothing is said twice for one version, and never for one that is older.
	Published func(s *Snapshot, path string, list []diagnostic.Diagnostic)
	// Solved says that a model has a new solution, or that a solve was given up:
	// hints, lenses and pulled diagnostics are to be asked for again.
	Solved func(model string)
	// Started says that a solve has begun that takes longer than a moment; the
	// function returned is called when it ends. Cancel gives it up. May be nil.
	Started func(model string, cancel func()) (ended func())
}

// Options set the pace.
type Options struct {
	// Pause is how long nothing must be typed before new numeric diagnostics are
	// shown. Staleness is how old numbers may become while somebody types, before
	// a solve is let through. Slow is the time after which a solve is announced.
	Pause, Staleness, Slow time.Duration
	// Freedoms bounds the size of models that are solved while somebody types.
	// What is larger is solved on command only. 0 stands for no bound.
	Freedoms int
}

// DefaultOptions return the pace for people.
func DefaultOptions() Options {
	return Options{Pause: 300 * time.Millisecond, Staleness: 2 * time.Second, Slow: time.Second, Freedoms: 600_000}
}

// Workspace is everything that an editor has open. See the package's
// documentation for the rules of its threads.
type Workspace struct {
	options Options
	events  Events
	newest  atomic.Pointer[Snapshot]

	changing sync.Mutex // held while a new snapshot is made of the newest one
	opening  uint64

	mutex     sync.Mutex // guards what follows
	resolvers map[string]*resolver
	solutions map[string]*Solution
	declined  map[string]declined
	edited    map[string]time.Time // by document, the time of its last edit
	edits     map[string]int       // by model, edits that it has seen

	solver    *solver
	publisher *publisher
	context   context.Context
	stop      context.CancelFunc
	running   sync.WaitGroup
}

// New returns an empty workspace. Close ends its goroutines.
func New(options Options, events Events) *Workspace {
	w := &Workspace{
		options: options, events: events,
		resolvers: map[string]*resolver{}, solutions: map[string]*Solution{}, declined: map[string]declined{},
		edited: map[string]time.Time{}, edits: map[string]int{},
	}
	w.context, w.stop = context.WithCancel(context.Background())
	first := &Snapshot{workspace: w, disk: &disk{}, resolutions: map[string]*resolution{}}
	first.files = sync.OnceValue(first.allFiles)
	w.newest.Store(first)
	w.publisher = newPublisher(w)
	w.solver = newSolver(w)
	w.running.Go(w.publisher.run)
	w.running.Go(w.solver.run)
	return w
}

// Close ends all background work and waits for it.
func (w *Workspace) Close() {
	w.stop()
	w.running.Wait()
}

// Snapshot returns everything as it is now.
func (w *Workspace) Snapshot() *Snapshot { return w.newest.Load() }

// Open takes a document in. Opening again replaces the text.
func (w *Workspace) Open(path string, version int32, text string) {
	w.changing.Lock()
	defer w.changing.Unlock()
	w.opening++
	file := source.New(path, text)
	d := &Document{Path: path, Version: version, File: file, Tree: syntax.Parse(file), opening: w.opening}
	s := w.Snapshot()
	documents := maps.Clone(s.documents)
	if documents == nil {
		documents = map[string]*Document{}
	}
	documents[path] = d
	// A new name may satisfy a use that has failed so far: everything that
	// looked for the path is looked at again.
	w.advance(s.next(documents, path))
}

// Change applies replacements to a document. It reports whether it is open.
func (w *Workspace) Change(path string, version int32, replacements []Replacement, encoding source.Encoding) bool {
	w.changing.Lock()
	defer w.changing.Unlock()
	s := w.Snapshot()
	d, ok := s.documents[path]
	if !ok {
		return false
	}
	documents := maps.Clone(s.documents)
	documents[path] = d.followed(version, replacements, encoding)
	w.mutex.Lock()
	w.edited[path] = time.Now()
	w.mutex.Unlock()
	w.advance(s.next(documents, path))
	return true
}

// CloseDocument lets a document go; the file on disk counts again.
func (w *Workspace) CloseDocument(path string) bool {
	w.changing.Lock()
	defer w.changing.Unlock()
	s := w.Snapshot()
	if _, ok := s.documents[path]; !ok {
		return false
	}
	documents := maps.Clone(s.documents)
	delete(documents, path)
	w.mutex.Lock()
	delete(w.edited, path)
	w.mutex.Unlock()
	w.advance(s.next(documents, path))
	w.forget()
	return true
}

// FilesChanged says that files have been made, written or deleted on disk.
func (w *Workspace) FilesChanged(paths ...string) {
	w.changing.Lock()
	defer w.changing.Unlock()
	s := w.Snapshot()
	index := maps.Clone(s.index)
	if index == nil {
		index = map[string]known{}
	}
	for _, p := range paths {
		s.disk.forget(p)
		delete(index, p)
		if below(s.folders, p) {
			if tree, err := s.disk.tree(p); err == nil {
				index[p] = about(tree)
			}
		}
	}
	n := s.next(s.documents, paths...)
	n.index = index
	w.advance(n)
}

// SetFolders sets the folders of the workspace. Their files are looked through
// in the background.
func (w *Workspace) SetFolders(folders []string) {
	w.changing.Lock()
	defer w.changing.Unlock()
	s := w.Snapshot()
	n := s.next(s.documents, "")
	n.folders = slices.Clone(folders)
	w.advance(n)
	w.running.Go(func() { w.look(n.folders, n.disk) })
}

// look takes the files of the folders into the index.
func (w *Workspace) look(folders []string, d *disk) {
	index := scan(w.context, folders, d)
	w.changing.Lock()
	defer w.changing.Unlock()
	s := w.Snapshot()
	if !slices.Equal(folders, s.folders) {
		return // they have been set anew since
	}
	n := s.next(s.documents, "")
	n.index = index
	w.advance(n)
}

// Pin says through which model a shared file is looked at. An empty model ends
// that.
func (w *Workspace) Pin(path, model string) {
	w.changing.Lock()
	defer w.changing.Unlock()
	s := w.Snapshot()
	n := s.next(s.documents, "")
	n.pins = maps.Clone(s.pins)
	if n.pins == nil {
		n.pins = map[string]string{}
	}
	if n.pins[path] = model; model == "" {
		delete(n.pins, path)
	}
	w.advance(n)
}

// SolveNow solves the model of a file, whatever its size, and even where it has
// been given up before.
func (w *Workspace) SolveNow(path string) {
	s := w.Snapshot()
	w.solver.want(s.ModelOf(path), s, true)
}

// advance makes a snapshot the newest, and starts what follows: diagnostics at
// once, solves of the models that are not what they were in the background.
func (w *Workspace) advance(s *Snapshot) {
	w.newest.Store(s)
	for _, model := range s.live() {
		if !s.settled(model) {
			w.mutex.Lock()
			w.edits[model]++
			w.mutex.Unlock()
			w.solver.want(model, s, false)
		}
	}
	w.publisher.want()
}

// live returns the models that are solved in the background: those that are
// open, and those through which open shared files are looked at.
func (s *Snapshot) live() []string {
	seen := map[string]bool{}
	for path := range s.documents {
		seen[s.ModelOf(path)] = true
	}
	return slices.Sorted(maps.Keys(seen))
}

// settled reports whether the model's resolution has been taken over from the
// snapshot before, so that there is nothing new about it.
func (s *Snapshot) settled(model string) bool {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	r := s.resolutions[model]
	return r != nil && r.loaded != nil
}

// resolver returns the resolver of a model.
func (w *Workspace) resolver(model string) *resolver {
	w.mutex.Lock()
	defer w.mutex.Unlock()
	r := w.resolvers[model]
	if r == nil {
		r = &resolver{session: resolve.NewSession()}
		w.resolvers[model] = r
	}
	return r
}

func (w *Workspace) solution(model string) *Solution {
	w.mutex.Lock()
	defer w.mutex.Unlock()
	return w.solutions[model]
}

// declined is a version of a model that is not solved, and why.
type declined struct {
	resolved *resolve.Result
	reason   string
}

// accept makes a solution the model's own.
func (w *Workspace) accept(model string, s *Solution) {
	w.mutex.Lock()
	w.solutions[model] = s
	delete(w.declined, model)
	w.mutex.Unlock()
	w.publisher.solved(model)
}

// decline notes why a version of a model is not solved.
func (w *Workspace) decline(model string, resolved *resolve.Result, reason string) {
	w.mutex.Lock()
	w.declined[model] = declined{resolved, reason}
	w.mutex.Unlock()
	w.publisher.solved(model)
}

// declinedFor returns why a version of a model is not solved, or "".
func (w *Workspace) declinedFor(model string, resolved *resolve.Result) string {
	w.mutex.Lock()
	defer w.mutex.Unlock()
	if d := w.declined[model]; d.resolved == resolved {
		return d.reason
	}
	return ""
}

func (w *Workspace) editsOf(model string) int {
	w.mutex.Lock()
	defer w.mutex.Unlock()
	return w.edits[model]
}

// editsSince returns how many edits the model has seen since a solution.
func (w *Workspace) editsSince(model string, s *Solution) int {
	w.mutex.Lock()
	defer w.mutex.Unlock()
	return w.edits[model] - s.edits
}

// lastEdit returns when somebody last typed.
func (w *Workspace) lastEdit() time.Time {
	w.mutex.Lock()
	defer w.mutex.Unlock()
	var last time.Time
	for _, t := range w.edited {
		if t.After(last) {
			last = t
		}
	}
	return last
}

// forget drops what is kept for models that nobody looks at any more.
func (w *Workspace) forget() {
	live := w.Snapshot().live()
	w.mutex.Lock()
	defer w.mutex.Unlock()
	for model := range w.resolvers {
		if !slices.Contains(live, model) {
			delete(w.resolvers, model)
			delete(w.solutions, model)
			delete(w.declined, model)
			delete(w.edits, model)
		}
	}
}
