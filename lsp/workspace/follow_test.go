package workspace

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"pgregory.net/rapid"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// TestFollow marks a place in a text, edits at random, and checks that the place
// is either lost or still holds the same text.
func TestFollow(t *testing.T) {
	rapid.Check(t, func(t *rapid.T) {
		text := rapid.StringMatching(`[a-z\n]{20,60}`).Draw(t, "text")
		start := rapid.IntRange(0, len(text)-3).Draw(t, "start")
		end := rapid.IntRange(start+1, len(text)).Draw(t, "end")
		span := source.Span{Start: start, End: end}
		file := source.New("/f", text)
		d := &Document{Path: "/f", File: file, Tree: syntax.Parse(file)}
		for range rapid.IntRange(1, 6).Draw(t, "versions") {
			var list []Replacement
			now := d.File
			for range rapid.IntRange(1, 3).Draw(t, "edits") {
				a := rapid.IntRange(0, len(now.Text)).Draw(t, "a")
				b := rapid.IntRange(a, min(len(now.Text), a+5)).Draw(t, "b")
				r := Replacement{From: now.Point(a, source.UTF8), To: now.Point(b, source.UTF8), Text: rapid.StringMatching(`[A-Z\n]{0,4}`).Draw(t, "new")}
				list = append(list, r)
				now = source.New("/f", now.Text[:a]+r.Text+now.Text[b:])
			}
			d = d.followed(0, list, source.UTF8)
			assert.Equal(t, now.Text, d.File.Text)
		}
		if moved, ok := d.follow(span, 0); ok {
			assert.Equal(t, text[start:end], d.File.Slice(moved))
		}
	})
}

// TestFollowKeepsWhatIsApart makes sure that following does not give up on
// places that no edit touches.
func TestFollowKeepsWhatIsApart(t *testing.T) {
	file := source.New("/f", "one\ntwo\nthree\n")
	d := &Document{Path: "/f", File: file, Tree: syntax.Parse(file)}
	d = d.followed(1, []Replacement{{From: source.Point{}, To: source.Point{}, Text: "zero\n"}, {From: source.Point{Line: 3}, To: source.Point{Line: 4}, Text: ""}}, source.UTF16)
	assert.Equal(t, "zero\none\ntwo\n", d.File.Text)
	_, ok := d.follow(source.Span{Start: 0, End: 3}, 0)
	assert.False(t, ok, "edits of one message are taken together")
	d2 := (&Document{Path: "/f", File: file, Tree: syntax.Parse(file)}).followed(1, []Replacement{{Text: "zero\n"}}, source.UTF16)
	moved, ok := d2.follow(source.Span{Start: 4, End: 7}, 0)
	assert.True(t, ok)
	assert.Equal(t, "two", d2.File.Slice(moved))
}
