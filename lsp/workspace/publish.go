package workspace

import (
	"maps"
	"slices"
	"sync"
	"time"

	"spanwright/lang/diagnostic"
)

// Diagnostics returns what there is to say about a file as it is in the
// snapshot: mistakes of the text, and what the newest solve found.
func (s *Snapshot) Diagnostics(path string) []diagnostic.Diagnostic {
	var list []diagnostic.Diagnostic
	for _, model := range s.live() {
		if v, ok := s.View(model); ok {
			list = append(list, v.about(path)...)
		}
	}
	return tidy(list)
}

// about returns what a model has to say about one of its files.
func (v *View) about(path string) []diagnostic.Diagnostic {
	var list []diagnostic.Diagnostic
	for _, d := range v.Resolved.Diagnostics {
		if d.File == path {
			list = append(list, d)
		}
	}
	return append(list, v.numeric(path)...)
}

// numeric returns what the solve found about a file. While the next one is at
// work, it is that of the last one, moved along with the text.
func (v *View) numeric(path string) []diagnostic.Diagnostic {
	if v.State != Current && v.State != Refused && v.State != Overtaken {
		return nil
	}
	if v.Solution == nil {
		return nil
	}
	var list []diagnostic.Diagnostic
	for _, d := range v.Solution.Diagnostics {
		if d.File != path {
			continue
		}
		if v.State != Overtaken {
			list = append(list, d)
		} else if moved, ok := v.Snapshot.follow(d, v.Solution); ok {
			list = append(list, moved)
		}
	}
	return list
}

// follow returns a diagnostic of an earlier version where it is now. Its fixes
// are left out: they were meant for that version.
func (s *Snapshot) follow(d diagnostic.Diagnostic, solution *Solution) (diagnostic.Diagnostic, bool) {
	d.Fixes = nil
	var related []diagnostic.Related
	for _, r := range d.Related {
		if span, ok := s.Follow(solution, r.File, r.Span); ok {
			r.Span = span
			related = append(related, r)
		}
	}
	d.Related = related
	if !d.Context.Empty() {
		var ok bool
		if d.Context, ok = s.Follow(solution, d.File, d.Context); !ok {
			return d, false
		}
	}
	var ok bool
	d.Subject, ok = s.Follow(solution, d.File, d.Subject)
	return d, ok
}

// tidy sorts, and drops what two models say about a file that both use.
func tidy(list []diagnostic.Diagnostic) []diagnostic.Diagnostic {
	diagnostic.Sort(list)
	return slices.CompactFunc(list, func(a, b diagnostic.Diagnostic) bool {
		return a.Name == b.Name && a.File == b.File && a.Subject == b.Subject && a.Summary == b.Summary
	})
}

// publisher says what there is to say, in order.
type publisher struct {
	workspace *Workspace
	wake      chan struct{}

	mutex   sync.Mutex
	news    bool
	results []string // models with news from the solver
	timer   *time.Timer

	said map[string]*statement // by file; of the goroutine alone
}

// statement is what was last said about a file.
type statement struct {
	opening uint64
	serial  int
	list    []diagnostic.Diagnostic
	numeric map[string]bool // keys of what the solve found
}

func newPublisher(w *Workspace) *publisher {
	return &publisher{workspace: w, wake: make(chan struct{}, 1), said: map[string]*statement{}}
}

// want asks for the newest snapshot's diagnostics.
func (p *publisher) want() {
	p.mutex.Lock()
	p.news = true
	p.mutex.Unlock()
	p.signal()
}

// solved tells that a model has a new solution or will have none.
func (p *publisher) solved(model string) {
	p.mutex.Lock()
	if !slices.Contains(p.results, model) {
		p.results = append(p.results, model)
	}
	p.news = true
	p.mutex.Unlock()
	p.signal()
}

func (p *publisher) signal() {
	select {
	case p.wake <- struct{}{}:
	default:
	}
}

// run is the goroutine that says things.
func (p *publisher) run() {
	for {
		select {
		case <-p.workspace.context.Done():
			return
		case <-p.wake:
		}
		p.mutex.Lock()
		news, results := p.news, p.results
		p.news, p.results = false, nil
		p.mutex.Unlock()
		if news {
			p.publish(p.workspace.Snapshot())
		}
		for _, model := range results {
			if p.workspace.events.Solved != nil {
				p.workspace.events.Solved(model)
			}
		}
	}
}

// publish says what has changed since the last time.
func (p *publisher) publish(s *Snapshot) {
	lists, numeric := s.everything()
	for path := range p.said {
		if _, still := lists[path]; !still {
			lists[path] = nil
		}
	}
	quiet := p.workspace.options.Pause - time.Since(p.workspace.lastEdit())
	held := false
	for _, path := range slices.Sorted(maps.Keys(lists)) {
		before := p.said[path]
		now := &statement{numeric: map[string]bool{}}
		if d, open := s.documents[path]; open {
			now.opening, now.serial = d.opening, d.serial
		}
		now.list = lists[path]
		for _, d := range numeric[path] {
			key := s.key(d)
			if quiet > 0 && (before == nil || !before.numeric[key]) {
				held = true
				continue
			}
			now.numeric[key] = true
			now.list = append(now.list, d)
		}
		now.list = tidy(now.list)
		p.say(s, path, before, now)
	}
	if held {
		p.later(quiet)
	}
}

// say publishes a statement that says something new.
func (p *publisher) say(s *Snapshot, path string, before, now *statement) {
	_, open := s.documents[path]
	if !open && len(now.list) == 0 {
		delete(p.said, path)
		if before == nil {
			return
		}
	} else {
		p.said[path] = now
	}
	if before != nil && before.opening == now.opening && before.serial == now.serial && same(before.list, now.list) {
		return
	}
	if p.workspace.events.Published != nil {
		p.workspace.events.Published(s, path, now.list)
	}
}

// later publishes again after a time without edits.
func (p *publisher) later(after time.Duration) {
	p.mutex.Lock()
	defer p.mutex.Unlock()
	if p.timer == nil {
		p.timer = time.AfterFunc(after, p.want)
		return
	}
	p.timer.Reset(after)
}

// everything returns the diagnostics of the text of all files, and those of the
// solves.
func (s *Snapshot) everything() (text, numeric map[string][]diagnostic.Diagnostic) {
	text, numeric = map[string][]diagnostic.Diagnostic{}, map[string][]diagnostic.Diagnostic{}
	for path := range s.documents {
		text[path] = nil
	}
	for _, model := range s.live() {
		v, ok := s.View(model)
		if !ok {
			continue
		}
		for _, d := range v.Resolved.Diagnostics {
			text[d.File] = append(text[d.File], d)
		}
		for _, t := range v.Resolved.Trees {
			if list := v.numeric(t.File.Path); len(list) > 0 {
				numeric[t.File.Path] = append(numeric[t.File.Path], list...)
			}
		}
	}
	return text, numeric
}

// key tells what a solve found from what else it may find: its name and the
// text of its line.
func (s *Snapshot) key(d diagnostic.Diagnostic) string {
	tree, err := s.Tree(d.File)
	if err != nil {
		return string(d.Name)
	}
	line := tree.File.LineAt(d.Subject.Start)
	return string(d.Name) + "\n" + tree.File.Text[tree.File.LineStart(line):tree.File.LineEnd(line)]
}

// same reports whether two lists say the same of the same places.
func same(a, b []diagnostic.Diagnostic) bool {
	return slices.EqualFunc(a, b, func(a, b diagnostic.Diagnostic) bool {
		return a.Name == b.Name && a.Severity == b.Severity && a.Subject == b.Subject && a.Summary == b.Summary &&
			a.Detail == b.Detail && len(a.Fixes) == len(b.Fixes) && len(a.Related) == len(b.Related)
	})
}
