// Package protocol holds the message types of the Language Server Protocol
// 3.17 that the module glsp, which knows 3.16, lacks or loses data in. The
// ranges list of formatting is from 3.18.
//
// What lives here: plain structs with their JSON names, the method names, and
// [ClientCapabilities], the flat list of what a client said it can do. What
// does not: any decision of the server, and any type that glsp has and
// decodes well; those are used from glsp/protocol_3_16 directly.
//
// Two habits keep the wire right:
//   - a list the protocol demands is a [List], which encodes nil as [];
//   - a field that may hold one of several shapes is an any, which survives
//     decoding and encoding again without loss (glsp's own types drop the
//     code of a diagnostic and half of an insert-or-replace edit).
package protocol
