// Package rpc carries the Language Server Protocol between a client and the
// server: it reads and writes messages, keeps their order, and holds the server
// to the protocol's rules, so that the server itself is only answers.
//
// What lives here:
//
//   - the frames and messages on the wire ([jsonrpc2.ObjectStream] of our own,
//     because the stock one gives up on the first malformed message);
//   - the life of a connection: initialize, shutdown, exit, exit status;
//   - requests: which run when, cancellation, errors and their codes, panics;
//   - calls to the client, and progress that it shows.
//
// What does not: anything that knows what a method means.
//
// # Threads
//
// One goroutine, the read loop, takes messages in the order they came. It runs
// notifications to their end, so a change of text is in place before the next
// message is looked at. For a request it calls [Service.Prepare], which takes a
// snapshot of the state as of this message, and starts a goroutine that answers
// from the snapshot; a semaphore bounds how many answer at once. So no request
// sees a text newer than itself, a cancellation is read while its request
// runs, and a handler may call the client and wait. Handlers of notifications
// and Prepare run on the read loop: they must be quick and must not wait for
// the client; what takes longer they hand to [Connection.Go].
//
// Messages to the client go through a queue that a goroutine of its own
// writes, in the order in which they were handed over. Nothing ever waits for a
// client that does not read.
package rpc
