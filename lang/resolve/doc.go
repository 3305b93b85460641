// Package resolve turns the trees of a model's files into the model itself.
//
// It finds what every name stands for, works the expressions out with their
// dimensions, takes in the files of "use" and the parts of "place", and says of
// everything that does not fit what is wrong and what to do about it. Its doors
// are [Model], for one resolution, and [Session], for an editor: a session keeps
// what an edit does not touch.
//
// # How it works
//
// Every statement in its scope is a fragment. A fragment knows the symbols that
// it has looked up, and every symbol knows its users. An edit replaces the
// fragments of the lines that it touches; the symbols that these declared mark
// their users, those mark theirs, and what is marked is evaluated again unless
// nothing that it follows from has changed after all. What a statement comes to
// (its outcome) has places relative to the statement only, so that lines above
// may come and go.
//
// Then the flat model.Model is put together afresh from the outcomes. That
// copies, and computes nothing but indices and absolute offsets.
//
// A mistake is reported where it is and gives a value that nobody complains
// about any more: one mistake, one message. What can only be seen in the whole
// model (unused names, near names for a misspelt one, joints that do not touch)
// is found when it is put together.
//
// What does not live here: reading text (lang/syntax), properties of standard
// sections and materials (lang/catalogue), and everything that needs stiffness
// (analysis).
package resolve
