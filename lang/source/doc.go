// Package source holds the text of a file and says where things are in it.
//
// It is the only place in spanwright that converts between positions. The
// coordinate systems, all of them:
//
//   - offset: bytes from the start of the file, from 0. Everything inside
//     spanwright speaks offsets; a [Span] is a half-open pair of them.
//   - [Position]: for people, as in "file:line:column". Line and column count
//     from 1, the column in Unicode code points.
//   - [Point]: for the language server protocol. Line and character count
//     from 0; the character counts code units of an [Encoding], UTF-16 unless
//     client and server have agreed on UTF-8.
//
// A line ends with "\n", "\r\n" or a lone "\r", as the protocol has it.
//
// What does not live here: reading files from disk, tokens, anything that
// knows what the text means.
package source
