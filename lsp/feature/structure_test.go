package feature

import (
	"fmt"
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

const frames = `# Two frames of one kind,
# side by side.
use "steel.span"
model "Frames" space

part frame(wide) {
    node foot = (0, 0, 0) m
    node top  = (wide, 0, 3) m
    beam leg  = foot -> top of post
    support foot fixed
}

place F1 = frame(1 m) at (0, 0, 0) m
place F2 = frame(wide = 2 m) at (0, 5, 0) m

let load = 2 kN
let e = 1
# only this one is loaded
case Q imposed B "People" {
    F1.top: load down
    F1.leg: 1 kN/m + load/length down
}
limit deflection of F1.leg <= length/250 under Q
`

func treeOf(t *testing.T, d *desk) *syntax.Tree {
	tree, err := d.snapshot().Tree(d.path)
	require.NoError(t, err)
	return tree
}

func TestFolds(t *testing.T) {
	d := open(t, "/yard/frames.span", frames)
	assert.Equal(t, []Fold{{First: 5, Last: 9}, {First: 18, Last: 20}, {First: 0, Last: 1, Comment: true}}, Folds(treeOf(t, d)))
}

func TestLinks(t *testing.T) {
	d := open(t, "/yard/frames.span", frames)
	links := Links(treeOf(t, d))
	require.Len(t, links, 1)
	assert.Equal(t, "steel.span", d.file().Slice(links[0].Span))
	assert.Equal(t, "/yard/steel.span", links[0].Target)
	at, ok := Definition(d.snapshot(), d.path, links[0].Span.Start+2)
	require.True(t, ok)
	assert.Equal(t, Location{Path: "/yard/steel.span"}, at)
}

func TestSelections(t *testing.T) {
	d := open(t, "/yard/frames.span", frames)
	spans := Selections(treeOf(t, d), d.at("1 kN/m + lo|ad/length"))
	var texts []string
	for i, s := range spans {
		texts = append(texts, d.file().Slice(s))
		if i > 0 {
			assert.True(t, s.Start <= spans[i-1].Start && s.End >= spans[i-1].End, "each holds the one before")
		}
	}
	assert.Equal(t, []string{"load", "load/length", "1 kN/m + load/length", "F1.leg: 1 kN/m + load/length down"}, texts[:4])
	assert.True(t, strings.HasPrefix(texts[4], "case Q") && strings.HasSuffix(texts[4], "}"))
	assert.Equal(t, frames, texts[5])
}

func TestSymbols(t *testing.T) {
	d := open(t, "/yard/frames.span", frames)
	var b strings.Builder
	var write func(list []Symbol, depth int)
	write = func(list []Symbol, depth int) {
		for _, s := range list {
			fmt.Fprintf(&b, "%s%s", strings.Repeat("  ", depth), s.Name)
			if s.Detail != "" {
				fmt.Fprintf(&b, " (%s)", s.Detail)
			}
			b.WriteString("\n")
			assert.True(t, s.Whole.Start <= s.NameSpan.Start && s.NameSpan.End <= s.Whole.End, "editors refuse a name outside of its thing")
			if len(s.Children) == 0 {
				assert.Contains(t, d.file().Slice(s.NameSpan), s.Name)
			}
			for _, c := range s.Children {
				assert.True(t, s.Whole.Start <= c.Whole.Start && c.Whole.End <= s.Whole.End, "%s lies in %s", c.Name, s.Name)
			}
			write(s.Children, depth+1)
		}
	}
	write(Symbols(d.snapshot(), d.path), 0)
	assert.Equal(t, `Parts
  frame ((wide))
    Nodes
      foot ((0, 0, 0) m)
      top ((wide, 0, 3) m)
    Members
      leg (foot -> top of post)
    Supports
      foot (fixed)
  F1 (frame(1 m) at (0, 0, 0) m)
  F2 (frame(wide = 2 m) at (0, 5, 0) m)
Values
  load (2 kN)
  e (1)
Load cases
  Q (imposed B "People")
Limits
  deflection of F1.leg <= length/250 under Q
`, b.String())
}

func TestWorkspaceSymbols(t *testing.T) {
	w := library(t, sharedTexts)
	ask := func(query string) []string {
		var all []string
		for _, s := range WorkspaceSymbols(w.Snapshot(), query) {
			all = append(all, s.Name+" in "+s.Container)
		}
		return all
	}
	assert.Equal(t, []string{"post in Hut"}, ask("PST"), "once, though two models use it")
	assert.Equal(t, []string{"column in Shed"}, ask("colu"))
	assert.Equal(t, "P in Shed", ask("p")[0], "what begins so comes first")
	assert.Empty(t, ask("xyz"))
}

func TestHighlights(t *testing.T) {
	d := open(t, "/shed.span", shed)
	list := Highlights(d.snapshot(), d.path, d.at("C = (4 m, hi|gh)"))
	require.Len(t, list, 3)
	assert.True(t, list[0].Declaration)
	for i, h := range list {
		assert.Equal(t, "high", d.file().Slice(h.Span))
		assert.Equal(t, i == 0, h.Declaration)
	}
	assert.Len(t, References(d.snapshot(), d.path, d.at("let |high"), false), 2)
	place, ok := Definition(d.snapshot(), d.path, d.at("B -> |C of"))
	require.True(t, ok)
	assert.Equal(t, Location{d.path, source.Span{Start: d.at("node |C"), End: d.at("node C|")}}, place)
}

// Each word has its colour, in the order of the text, and none goes over a line's
// end.
func TestTokens(t *testing.T) {
	text := "let h = 2 kN/m2 * max(1 m, 3 m)  # a load\nmodel \"T\" plane\nnode A = (0, 0) m\nsupport A pinned\ncase Q imposed {\n    A: h * 1 m2 down\n}\n"
	d := open(t, "/t.span", text)
	whole := source.Span{Start: 0, End: len(text)}
	var all []string
	end := 0
	for _, k := range Tokens(d.snapshot(), d.path, whole) {
		require.GreaterOrEqual(t, k.Span.Start, end)
		end = k.Span.End
		word := text[k.Span.Start:k.Span.End]
		assert.NotContains(t, word, "\n")
		role := Roles()[k.Role]
		if k.Modifiers&DeclarationBit != 0 {
			role += "!"
		}
		all = append(all, word+":"+role)
	}
	assert.Equal(t, []string{
		"let:keyword", "h:variable!", "=:operator", "2:number", "kN:type", "/:operator", "m2:type", "*:operator", "max:function",
		"1:number", "m:type", "3:number", "m:type", "# a load:comment",
		"model:keyword", `"T":string`, "plane:modifier",
		"node:keyword", "A:class!", "=:operator", "0:number", "0:number", "m:type",
		"support:keyword", "A:class", "pinned:modifier",
		"case:keyword", "Q:event!", "imposed:modifier",
		"A:class", "::operator", "h:variable", "*:operator", "1:number", "m2:type", "down:keyword",
	}, all)

	part := source.Span{Start: d.at("|node A"), End: d.at("node A|")}
	assert.Len(t, Tokens(d.snapshot(), d.path, part), 2)
}

// The lens says what an edit did.
func TestLensOfAnEdit(t *testing.T) {
	d := open(t, "/shed.span", strings.Replace(shed, "{ self-weight }", "{ C: 2 kN down }", 1)+"limit deflection of r <= 20 mm under G\n")
	titles := func() string {
		var all []string
		for _, l := range Lenses(d.snapshot(), d.path) {
			all = append(all, l.Title)
		}
		return strings.Join(all, "\n")
	}
	// The column turns by M h/EI = 2 kN · 4 m · 3 m / (210 GPa · 66.67e6 mm4) =
	// 1.714 mrad; the beam's end sinks by that times 4 m and by P L³/3EI = 3.048 mm.
	assert.NotContains(t, titles(), "last edit")
	assert.Contains(t, titles(), "sum of loads Fz −2 kN ↓")
	d.edit("C: 2 kN down", "C: 4 kN down")
	d.settle()
	text := titles()
	// The tip goes aside too, by M h²/2EI = 2.571 mm: √(2.571² + 9.905²) = 10.23.
	assert.Contains(t, text, "last edit: largest movement 10.2 → 20.5 mm (C in G)")
	assert.Contains(t, text, "worst limit")
	d.edit("C: 4 kN down", "C: 4 kN do")
	d.settle()
	assert.NotContains(t, titles(), "last edit", "of what does not solve there is nothing to say")
	assert.Contains(t, titles(), "from the last version that solved")
}

// Hints are given for the lines that are asked for, by kind, and say when they
// are old.
func TestHints(t *testing.T) {
	d := open(t, "/shed.span", shed)
	ask := func(part source.Span, on HintSwitches) []string {
		var all []string
		for _, h := range Hints(d.snapshot(), d.path, part, on) {
			all = append(all, h.Label)
		}
		return all
	}
	whole := source.Span{Start: 0, End: len(d.file().Text)}
	assert.Equal(t, []string{"= 3 m"}, ask(whole, HintSwitches{Lets: true}))
	// The weight is 10.78 kN, of which 6.159 kN on an arm of 2 m.
	assert.Equal(t, []string{"↑ 10.8 kN  ↺ 12.3 kNm"}, ask(whole, HintSwitches{Supports: true}))
	assert.Equal(t, []string{"↓ 10.8 kN"}, ask(whole, HintSwitches{Cases: true}))
	assert.Equal(t, []string{"My −12.3 kNm · 8 %", "My −12.3 kNm · 8 %"}, ask(whole, HintSwitches{Members: true}))
	assert.Empty(t, ask(whole, HintSwitches{}))
	line := source.Span{Start: d.at("|beam r ="), End: d.at("beam r |=")}
	assert.Len(t, ask(line, AllHints()), 1)

	d.edit("2 m + 1 m", "2 m +")
	d.settle()
	assert.Equal(t, []string{"↑ 10.8 kN  ↺ 12.3 kNm (old)"}, ask(whole, HintSwitches{Supports: true}))
}

func TestPlain(t *testing.T) {
	markdown := "**A** · node\n\n| Reaction | Fx kN |\n| --- | ---: |\n| **ULS** most | 8 → `ULS.S` |\n| G | 12.5 |\n\n```\nMy + A ▁▂ B\n```\n\n![My](data:image/svg+xml;base64,AAAA)\n\nend"
	assert.Equal(t, "A · node\n\nReaction  Fx kN\nULS most  8 → ULS.S\nG         12.5\n\nMy + A ▁▂ B\n\nend", Plain(markdown))
}
