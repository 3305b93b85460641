// Package lsp is the language server: it speaks the Language Server Protocol
// 3.17 with one client, and answers from the text and the numbers that lsp/workspace
// keeps.
//
// What lives here: the protocol's side of every feature. One thin file per
// group of methods, named as the file of lsp/feature that knows the answer; it
// turns places into offsets, asks, and turns the answer into the protocol's
// types. Beside them what only the server knows: what client and server have
// agreed on (initialize.go), which text is open (sync.go), what the client was
// told (publish.go, refresh.go), and its settings (configuration.go).
//
// What does not: what is said about a model (lsp/feature), when it is solved
// (lsp/workspace), and how messages travel (lsp/rpc, whose documentation holds
// the rules of the threads).
//
// # How a request is answered
//
// rpc calls prepare on the read loop, which takes a [moment]: the snapshot of
// all text and numbers, and the settings, as of this message. The method then
// runs in a goroutine of its own and looks at nothing but its moment.
package lsp
