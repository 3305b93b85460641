package workspace

import (
	"context"
	"errors"
	"fmt"
	"log/slog"
	"runtime/debug"
	"sync"
	"time"

	"spanwright/lang/model"
	"spanwright/lang/resolve"
)

// solver runs the solves in the background, one at a time.
type solver struct {
	workspace *Workspace
	wake      chan struct{}

	mutex   sync.Mutex
	waiting []wish // the latest wish comes first; each model once
	running *run
	since   map[string]time.Time // since when a model waits for new numbers
}

// wish is a model that wants to be solved as it is in a snapshot.
type wish struct {
	model    string
	snapshot *Snapshot
	asked    bool // by the user, so that bounds of size do not hold
	edits    int  // that the model has seen
}

// run is a solve at work.
type run struct {
	wish
	cancel    context.CancelFunc
	abandoned bool // an edit has overtaken it, or the user gave it up
}

func newSolver(w *Workspace) *solver {
	return &solver{workspace: w, wake: make(chan struct{}, 1), since: map[string]time.Time{}}
}

// want notes that a model is to be solved, and drops what this overtakes.
func (s *solver) want(model string, snapshot *Snapshot, asked bool) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	for i := range s.waiting {
		if s.waiting[i].model == model {
			s.waiting = append(s.waiting[:i], s.waiting[i+1:]...)
			break
		}
	}
	s.waiting = append([]wish{{model, snapshot, asked, s.workspace.editsOf(model)}}, s.waiting...)
	if s.since[model].IsZero() {
		s.since[model] = time.Now()
	}
	if r := s.running; r != nil && r.model == model && time.Since(s.since[model]) < s.workspace.options.Staleness {
		r.abandoned = true
		r.cancel()
	}
	select {
	case s.wake <- struct{}{}:
	default:
	}
}

// next takes the first wish.
func (s *solver) next(ctx context.Context) (*run, context.Context) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	if len(s.waiting) == 0 {
		return nil, nil
	}
	r := &run{wish: s.waiting[0]}
	s.waiting = s.waiting[1:]
	ctx, r.cancel = context.WithCancel(ctx)
	s.running = r
	return r, ctx
}

// ended notes that a run is over. A model that has got what was wanted starts
// anew to wait for what is wanted next.
func (s *solver) ended(r *run, solved bool) {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	s.running = nil
	r.cancel()
	if !solved {
		return
	}
	delete(s.since, r.model)
	for _, other := range s.waiting {
		if other.model == r.model {
			s.since[r.model] = time.Now()
		}
	}
}

// run is the goroutine of the solves.
func (s *solver) run() {
	for {
		select {
		case <-s.workspace.context.Done():
			return
		case <-s.wake:
		}
		for {
			r, ctx := s.next(s.workspace.context)
			if r == nil {
				break
			}
			s.ended(r, s.perform(ctx, r))
		}
	}
}

// perform resolves and solves, and hands on what comes of it. It reports
// whether the model now has what was wanted, numbers or not.
func (s *solver) perform(ctx context.Context, r *run) bool {
	w := s.workspace
	resolved := r.snapshot.Resolve(r.model)
	w.publisher.want()
	if resolved == nil || resolved.Library || !resolved.Complete {
		w.publisher.solved(r.model)
		return true
	}
	if n := freedoms(resolved.Model); n > w.options.Freedoms && w.options.Freedoms > 0 && !r.asked {
		w.decline(r.model, resolved, fmt.Sprintf("the model has some %d freedoms, too many to solve while you type. Run the command “Solve now”.", n))
		return true
	}
	ended := s.announce(ctx, r)
	solution, err := guarded(ctx, resolved, w.solution(r.model))
	ended()
	switch {
	case errors.Is(err, errPanic):
		w.decline(r.model, resolved, err.Error())
		return true
	case err != nil && !s.overtaken(r):
		w.decline(r.model, resolved, "the solve was cancelled. It runs again after the next edit, or with the command “Solve now”.")
		return true
	case err != nil:
		return false
	}
	solution.serials = r.snapshot.marks()
	solution.edits = r.edits
	w.accept(r.model, solution)
	return true
}

// freedoms returns how many freedoms a model has at most.
func freedoms(m *model.Model) int {
	if m.Plane {
		return 3 * len(m.Nodes)
	}
	return 6 * len(m.Nodes)
}

// overtaken reports whether a run ended because of an edit.
func (s *solver) overtaken(r *run) bool {
	s.mutex.Lock()
	defer s.mutex.Unlock()
	return r.abandoned || s.workspace.context.Err() != nil
}

var errPanic = errors.New("the solve failed for a reason within the program; the log has it. Please report it")

// guarded solves, and turns a panic into an error.
func guarded(ctx context.Context, resolved *resolve.Result, previous *Solution) (s *Solution, err error) {
	defer func() {
		if p := recover(); p != nil {
			slog.Error("solve", "panic", p, "stack", string(debug.Stack()))
			s, err = nil, errPanic
		}
	}()
	return solve(ctx, resolved, previous)
}

// announce tells of a solve that takes longer than a moment. The function
// returned ends that.
func (s *solver) announce(ctx context.Context, r *run) (ended func()) {
	w := s.workspace
	if w.events.Started == nil {
		return func() {}
	}
	ctx, over := context.WithCancel(ctx)
	w.running.Go(func() {
		select {
		case <-ctx.Done():
			return
		case <-time.After(w.options.Slow):
		}
		ended := w.events.Started(r.model, r.cancel)
		<-ctx.Done()
		ended()
	})
	return over
}
