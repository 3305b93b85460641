package rpc

import (
	"sync"
	"time"
)

// tasks counts goroutines, so that the end of a connection can wait for them.
type tasks struct {
	mu      sync.Mutex
	running int
	closed  bool
	idle    chan struct{} // closed when none runs; nil while nobody waits
}

// begin counts one more, unless the end has come.
func (t *tasks) begin() bool {
	t.mu.Lock()
	defer t.mu.Unlock()
	if !t.closed {
		t.running++
	}
	return !t.closed
}

func (t *tasks) end() {
	t.mu.Lock()
	defer t.mu.Unlock()
	t.running--
	if t.running == 0 && t.idle != nil {
		close(t.idle)
		t.idle = nil
	}
}

// close lets no more begin.
func (t *tasks) close() {
	t.mu.Lock()
	defer t.mu.Unlock()
	t.closed = true
}

// wait waits until none runs, but no longer than a while. It reports whether
// none runs.
func (t *tasks) wait(patience time.Duration) bool {
	t.mu.Lock()
	if t.running == 0 {
		t.mu.Unlock()
		return true
	}
	if t.idle == nil {
		t.idle = make(chan struct{})
	}
	idle := t.idle
	t.mu.Unlock()
	timer := time.NewTimer(patience)
	defer timer.Stop()
	select {
	case <-idle:
		return true
	case <-timer.C:
		return false
	}
}
