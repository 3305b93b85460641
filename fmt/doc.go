// Package format writes models in their one normal form, so that a diff shows
// the change and nothing else.
//
// It works from the tokens of the text, not from what they mean: every token
// and comment of the input is in the output. It changes blanks, line ends and a
// few spellings (units such as "mm²", exponents such as "1E+3"), never a value.
// A statement that cannot be read stays byte for byte as it is, and so does
// everything between the comments "# format off" and "# format on".
//
// The road: lines cuts the file into lines of statements, comments and blanks;
// spacing writes the tokens of a statement with the blanks between them;
// align pads the cells of paragraphs; edits turns the result into the fewest
// changes of the text.
//
// What does not live here: reading statements (lang/syntax) and writing files
// (cmd/spanwright).
//
// The folder is called fmt; import it as
//
//	format "spanwright/fmt"
package format
