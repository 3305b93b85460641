package lsp

import (
	"slices"
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"
)

// The edits make the one into the other, and cut no token in two.
func TestTokenEdits(t *testing.T) {
	token := rapid.SliceOfN(rapid.Uint32Range(0, 2), perToken, perToken)
	tokens := rapid.Custom(func(t *rapid.T) []uint32 {
		return slices.Concat(rapid.SliceOfN(token, 0, 12).Draw(t, "tokens")...)
	})
	rapid.Check(t, func(t *rapid.T) {
		before, after := tokens.Draw(t, "before"), tokens.Draw(t, "after")
		edited := slices.Clone(before)
		edits := tokenEdits(before, after)
		assert.LessOrEqual(t, len(edits), 1)
		for _, e := range edits {
			assert.Zero(t, e.Start%perToken)
			assert.Zero(t, e.DeleteCount%perToken)
			edited = slices.Concat(edited[:e.Start], e.Data, edited[e.Start+e.DeleteCount:])
		}
		assert.Equal(t, len(after), len(edited))
		assert.True(t, slices.Equal(after, edited))
		assert.Empty(t, tokenEdits(after, after))
	})
}

func TestTokenEditsAreSmall(t *testing.T) {
	before := []uint32{0, 0, 3, 1, 0, 1, 0, 4, 2, 0, 1, 2, 5, 3, 0}
	after := []uint32{0, 0, 3, 1, 0, 1, 0, 9, 2, 0, 1, 2, 5, 3, 0}
	edits := tokenEdits(before, after)
	assert.Len(t, edits, 1)
	assert.EqualValues(t, 5, edits[0].Start)
	assert.EqualValues(t, 5, edits[0].DeleteCount)
	assert.EqualValues(t, []uint32{1, 0, 9, 2, 0}, edits[0].Data)
}

func TestTokenCache(t *testing.T) {
	var c tokenCache
	first := c.hold("a", []uint32{1})
	second := c.hold("a", []uint32{2})
	_, ok := c.held("a", first)
	assert.False(t, ok, "the client has newer ones")
	data, ok := c.held("a", second)
	assert.True(t, ok)
	assert.Equal(t, []uint32{2}, data)
	c.drop("a")
	_, ok = c.held("a", second)
	assert.False(t, ok)
}
