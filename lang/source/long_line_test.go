package source

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"
)

// Places in long lines are those that counting from the line's start gives.
func TestPlacesInLongLines(t *testing.T) {
	piece := rapid.SampledFrom([]string{"a", "é", "漢", "𝛼", "🏗", "\xff", strings.Repeat("x", 700), strings.Repeat("🏗é", 300), "\n", "\r\n"})
	rapid.Check(t, func(t *rapid.T) {
		text := strings.Join(rapid.SliceOfN(piece, 0, 40).Draw(t, "pieces"), "")
		marked, plain := New("a", text), New("a", text)
		plain.long = nil
		for range 20 {
			offset := rapid.IntRange(-1, len(text)+1).Draw(t, "offset")
			p := plain.Point(offset, UTF16)
			assert.Equal(t, p, marked.Point(offset, UTF16))
			assert.Equal(t, plain.Position(offset), marked.Position(offset))
			assert.Equal(t, plain.Offset(p, UTF16), marked.Offset(p, UTF16))
			p.Character += rapid.IntRange(0, 2000).Draw(t, "further")
			assert.Equal(t, plain.Offset(p, UTF16), marked.Offset(p, UTF16))
		}
	})
}
