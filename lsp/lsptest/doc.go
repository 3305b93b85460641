// Package lsptest is a scripted client of the Language Server Protocol, for
// tests: it starts a server in the same process, opens and edits documents,
// asks, and waits for what the server says of its own accord.
//
//	client := lsptest.Start(t, serve, lsptest.Options{})
//	client.Open("file:///m/a.span", text)
//	client.Edit("file:///m/a.span", "4 kN", "5 kN")
//	diagnostics := client.WaitDiagnostics("file:///m/a.span")
//	hover := client.Hover("file:///m/a.span", client.At("file:///m/a.span", "support |A"))
//
// It keeps its own copy of each document as a real client does, answers what
// servers ask (configuration, registration, progress, edits), and records all
// that arrives. A wait fails at once when what it waits for cannot come any
// more, and says what came instead.
//
// What does not live here: anything that knows the server or the model
// language.
package lsptest
