package source

// Span is a half-open range of byte offsets [Start, End) in one file.
type Span struct {
	Start, End int
}

// At returns the empty span at an offset.
func At(offset int) Span { return Span{offset, offset} }

// Len returns the length of the span in bytes.
func (s Span) Len() int { return s.End - s.Start }

// Empty reports whether the span holds no byte.
func (s Span) Empty() bool { return s.End <= s.Start }

// Shift returns the span moved by delta bytes.
func (s Span) Shift(delta int) Span { return Span{s.Start + delta, s.End + delta} }

// Contains reports whether the offset lies in the span or at its end: a
// cursor behind the last letter of a word is still on the word.
func (s Span) Contains(offset int) bool { return s.Start <= offset && offset <= s.End }

// Overlaps reports whether the two spans share a byte, or one of them is
// empty and lies in the other or at its ends.
func (s Span) Overlaps(other Span) bool {
	if s.Empty() || other.Empty() {
		return s.Start <= other.End && other.Start <= s.End
	}
	return s.Start < other.End && other.Start < s.End
}

// Join returns the smallest span that holds both.
func (s Span) Join(other Span) Span {
	return Span{min(s.Start, other.Start), max(s.End, other.End)}
}
