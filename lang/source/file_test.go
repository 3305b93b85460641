package source

import (
	"testing"
	"unicode/utf8"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"
	"pgregory.net/rapid"
)

func TestLinesEndAsTheProtocolHasIt(t *testing.T) {
	f := New("a.span", "one\r\ntwo\rthree\n\nfive")
	require.Equal(t, 5, f.Lines())
	for line, want := range []string{"one", "two", "three", "", "five"} {
		assert.Equal(t, want, f.Text[f.LineStart(line):f.LineEnd(line)])
	}
	assert.Equal(t, 0, f.LineAt(4), "the line feed of \\r\\n belongs to its line")
	assert.Equal(t, 1, f.LineAt(5))
	assert.Equal(t, 4, f.LineAt(1000))
	assert.Equal(t, 0, f.LineAt(-3))
	assert.Equal(t, 1, New("", "").Lines())
}

func TestPositionsCountWhatTheirReadersCount(t *testing.T) {
	f := New("a.span", "x = 1\n# 🏗 梁 m")
	offset := len("x = 1\n# 🏗 梁 ")
	assert.Equal(t, Position{Line: 2, Column: 7}, f.Position(offset))
	assert.Equal(t, Point{1, 7}, f.Point(offset, UTF16))
	assert.Equal(t, Point{1, 11}, f.Point(offset, UTF8))
	assert.Equal(t, offset, f.Offset(Point{1, 7}, UTF16))
	assert.Equal(t, offset, f.Offset(Point{1, 11}, UTF8))
	crane := len("x = 1\n# ")
	assert.Equal(t, crane, f.Offset(Point{1, 3}, UTF16), "half a surrogate pair counts as its start")
	assert.Equal(t, crane, f.Offset(Point{1, 4}, UTF8), "inside a code point counts as its start")
	assert.Equal(t, Point{1, 2}, f.Point(crane+2, UTF16))
}

func TestPlacesOutsideTheTextCountAsItsEnds(t *testing.T) {
	f := New("a.span", "ab\r\ncd")
	assert.Equal(t, 2, f.Offset(Point{0, 99}, UTF16))
	assert.Equal(t, 6, f.Offset(Point{9, 0}, UTF16))
	assert.Equal(t, 0, f.Offset(Point{-1, 5}, UTF16))
	assert.Equal(t, Point{0, 2}, f.Point(3, UTF16), "between \\r and \\n counts as the line's end")
	assert.Equal(t, Point{1, 2}, f.Point(99, UTF16))
}

func TestOffsetsSurviveTheRoundTrip(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringOfN(rapid.RuneFrom([]rune("ab🏗梁é\r\n #")), 0, 60, -1).Draw(t, "text")
		f := New("p", text)
		offset := rapid.IntRange(0, len(text)).Draw(t, "offset")
		if offset < len(text) && !utf8.RuneStart(text[offset]) || offset > f.LineEnd(f.LineAt(offset)) {
			return // inside a code point or a line end: not a place of its own
		}
		for _, encoding := range []Encoding{UTF16, UTF8} {
			require.Equal(t, offset, f.Offset(f.Point(offset, encoding), encoding))
		}
	})
}

func TestApplyMakesEditsInOneGo(t *testing.T) {
	got, err := Apply("beam a", []Edit{{Span{5, 6}, "b"}, {Span{0, 0}, "# "}, {Span{4, 5}, "  "}})
	require.NoError(t, err)
	assert.Equal(t, "# beam  b", got)
	_, err = Apply("abc", []Edit{{Span{0, 2}, ""}, {Span{1, 3}, ""}})
	assert.Error(t, err)
	_, err = Apply("abc", []Edit{{Span{2, 9}, ""}})
	assert.Error(t, err)
}
