package rpc

import (
	"errors"
	"io"
	"sync"
	"time"
)

var errClosed = errors.New("the connection is closed")

// outbox writes frames in the order in which they were handed over, in a
// goroutine of its own. Its queue has no bound: with one, a client that writes
// before it reads would stop the read loop, and both would wait for ever. What
// piles up is only what the client itself has asked for.
type outbox struct {
	out io.Writer
	// broken is called once when writing fails.
	broken func()

	mu      sync.Mutex
	changed *sync.Cond
	queue   []queued
	closed  bool

	ended chan struct{} // closed when the goroutine has ended
}

// queued is a frame, or a mark that is closed when all before it is written.
type queued struct {
	frame []byte
	mark  chan struct{}
}

func newOutbox(out io.Writer, broken func()) *outbox {
	o := &outbox{out: out, broken: broken, ended: make(chan struct{})}
	o.changed = sync.NewCond(&o.mu)
	go o.write()
	return o
}

// send puts a frame into the queue.
func (o *outbox) send(frame []byte) error { return o.put(queued{frame: frame}) }

func (o *outbox) put(q queued) error {
	o.mu.Lock()
	defer o.mu.Unlock()
	if o.closed {
		return errClosed
	}
	o.queue = append(o.queue, q)
	o.changed.Signal()
	return nil
}

// flush waits until all that was sent is written, but no longer than a while.
func (o *outbox) flush(patience time.Duration) {
	mark := make(chan struct{})
	if o.put(queued{mark: mark}) != nil {
		return
	}
	timer := time.NewTimer(patience)
	defer timer.Stop()
	select {
	case <-mark:
	case <-o.ended:
	case <-timer.C:
	}
}

// close drops what is not written yet and lets the goroutine end. A write that
// waits for the client ends when its pipe is closed.
func (o *outbox) close() {
	o.mu.Lock()
	defer o.mu.Unlock()
	o.closed, o.queue = true, nil
	o.changed.Signal()
}

func (o *outbox) write() {
	defer close(o.ended)
	for {
		batch, open := o.take()
		if !open {
			return
		}
		for _, q := range batch {
			if q.mark != nil {
				close(q.mark)
				continue
			}
			if _, err := o.out.Write(q.frame); err != nil {
				o.close()
				o.broken()
				return
			}
		}
	}
}

func (o *outbox) take() (batch []queued, open bool) {
	o.mu.Lock()
	defer o.mu.Unlock()
	for len(o.queue) == 0 && !o.closed {
		o.changed.Wait()
	}
	batch, o.queue = o.queue, nil
	return batch, !o.closed
}
