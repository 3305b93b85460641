// Package workspace holds what an editor has open, and keeps the numbers of its
// models up to date in the background.
//
//	s := w.Snapshot()               // everything open, as it is now; never changes
//	document, _ := s.Document(path) // one buffer
//	view := s.View(path)            // the model that the file belongs to: names, values, numbers
//
// # How it works
//
// Every edit makes a new immutable [Snapshot]; whoever answers a request takes
// one first and looks at nothing else. A snapshot resolves a model when it is
// first asked for, in the model's own resolve session, and shares with its
// predecessor whatever the edit did not touch.
//
// One goroutine solves. One solve runs and, per model, the latest snapshot
// waits. An edit cancels the solve that it overtakes, unless the numbers have
// been older than [Options.Staleness] for so long that a solve must be let
// through. A finished solve becomes the model's [Solution]; every [View] says
// how its numbers and the text are related ([View.State]).
//
// # Threads
//
// Everything may be called from anywhere. The methods that change what is open
// (Open, Change, CloseDocument, FilesChanged, SetFolders, Pin) do nothing slow
// but reading what was changed; the server calls them on its read loop, in the
// order of the messages. [Events] come from the workspace's own goroutines:
// Published and Solved from one, in order; Started from others.
//
// What does not live here: what is shown to people (lsp/feature), and the
// protocol (lsp).
package workspace
