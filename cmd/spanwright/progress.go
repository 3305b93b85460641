package main

import (
	"time"

	"github.com/schollz/progressbar/v3"
)

// slow is the time after which a command shows how far it is.
const slow = time.Second

// bar shows progress on a terminal, once the work takes longer than a second.
type bar struct {
	start time.Time
	inner *progressbar.ProgressBar // nil where nobody watches
}

func progress(t *terminal, count int, word string) *bar {
	b := &bar{start: time.Now()}
	if count > 1 && colourful(t.err) {
		b.inner = progressbar.NewOptions(count, progressbar.OptionSetWriter(t.err), progressbar.OptionSetDescription(word),
			progressbar.OptionClearOnFinish(), progressbar.OptionShowCount(), progressbar.OptionThrottle(100*time.Millisecond),
			progressbar.OptionSetVisibility(false))
	}
	return b
}

// step counts one piece of work as done. It may be called by several goroutines.
func (b *bar) step() {
	if b.inner != nil {
		if time.Since(b.start) > slow {
			progressbar.OptionSetVisibility(true)(b.inner)
		}
		_ = b.inner.Add(1)
	}
}

// end takes the bar off the screen.
func (b *bar) end() {
	if b.inner != nil {
		_ = b.inner.Clear()
	}
}
