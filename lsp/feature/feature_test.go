package feature

import (
	"flag"
	"math"
	"os"
	"path/filepath"
	"regexp"
	"strconv"
	"strings"
	"testing"
	"time"

	"github.com/aymanbagabas/go-udiff"
	"github.com/stretchr/testify/require"

	"spanwright/lang/source"
	"spanwright/lsp/workspace"
)

var update = flag.Bool("update", false, "write the golden files")

// desk is a workspace with a model open.
type desk struct {
	t      testing.TB
	w      *workspace.Workspace
	solved chan string
	path   string
	number int32
}

// open opens a model and waits until it has been looked at.
func open(t testing.TB, path, text string) *desk {
	d := &desk{t: t, solved: make(chan string, 10000), path: path, number: 1}
	d.w = workspace.New(workspace.Options{Pause: time.Millisecond, Staleness: time.Second, Slow: time.Minute},
		workspace.Events{Solved: func(model string) { d.solved <- model }})
	t.Cleanup(d.w.Close)
	d.w.Open(path, 1, text)
	d.settle()
	return d
}

// openFile opens a file of the test data.
func openFile(t testing.TB, name string) *desk {
	path, err := filepath.Abs(filepath.FromSlash(name))
	require.NoError(t, err)
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	return open(t, filepath.ToSlash(path), string(text))
}

// settle waits until nothing is being solved.
func (d *desk) settle() workspace.View {
	d.t.Helper()
	for {
		v, ok := d.w.Snapshot().View(d.path)
		require.True(d.t, ok)
		if v.State != workspace.Overtaken {
			return v
		}
		select {
		case <-d.solved:
		case <-time.After(20 * time.Second):
			d.t.Fatal("no solution: ", v.Words())
		}
	}
}

func (d *desk) snapshot() *workspace.Snapshot { return d.w.Snapshot() }

func (d *desk) file() *source.File {
	document, ok := d.w.Snapshot().Document(d.path)
	require.True(d.t, ok)
	return document.File
}

// at is the offset of the "|" in a text that stands once in the file.
func (d *desk) at(marked string) int {
	d.t.Helper()
	before, after, ok := strings.Cut(marked, "|")
	require.True(d.t, ok)
	require.Equal(d.t, 1, strings.Count(d.file().Text, before+after), "%q", before+after)
	return strings.Index(d.file().Text, before+after) + len(before)
}

// edit replaces a text that stands once in the file.
func (d *desk) edit(old, text string) {
	d.t.Helper()
	file := d.file()
	require.Equal(d.t, 1, strings.Count(file.Text, old), "%q", old)
	at := strings.Index(file.Text, old)
	d.number++
	d.w.Change(d.path, d.number, []workspace.Replacement{{From: file.Point(at, source.UTF8), To: file.Point(at+len(old), source.UTF8), Text: text}}, source.UTF8)
}

func (d *desk) hover(marked string) string {
	d.t.Helper()
	h, ok := HoverAt(d.t.Context(), d.snapshot(), d.path, d.at(marked), HoverOptions{})
	if !ok {
		return ""
	}
	return h.Markdown
}

// unstable are the words that differ from run to run, or from one processor to
// another: the time of a solve, and what is nothing but rounding.
var unstable = regexp.MustCompile(`Solved in [0-9.]+ (µs|ms|s)|equilibrium \S+|backward error \S+`)

// golden compares a text with a file of the test data.
func golden(t *testing.T, name, text string) {
	t.Helper()
	text = unstable.ReplaceAllStringFunc(text, func(s string) string { return s[:strings.LastIndexAny(strings.TrimRight(s, "µms "), " ")] + " …" })
	path := filepath.Join("testdata", filepath.FromSlash(name))
	if *update {
		require.NoError(t, os.MkdirAll(filepath.Dir(path), 0o755))
		require.NoError(t, os.WriteFile(path, []byte(text), 0o644))
		return
	}
	want, err := os.ReadFile(path)
	require.NoError(t, err)
	if diff := udiff.Unified(name, "now", string(want), text); diff != "" && !alike(string(want), text) {
		t.Error(diff)
	}
}

var numeral = regexp.MustCompile(`−?[0-9]+(\.[0-9]+)?(e−?[0-9]+)?`)

// alike reports whether two texts are equal but for the last digit of numbers,
// which rounding decides: 31.25 is 31.2 or 31.3.
func alike(a, b string) bool {
	if numeral.ReplaceAllString(a, "#") != numeral.ReplaceAllString(b, "#") {
		return false
	}
	x, y := numeral.FindAllString(a, -1), numeral.FindAllString(b, -1)
	value := func(s string) float64 {
		v, _ := strconv.ParseFloat(strings.ReplaceAll(s, "−", "-"), 64)
		return v
	}
	for i := range x {
		if u, v := value(x[i]), value(y[i]); math.Abs(u-v) > 0.011*math.Max(math.Abs(u), math.Abs(v)) {
			return false
		}
	}
	return true
}

func TestAlike(t *testing.T) {
	require.True(t, alike("Fz 31.2 ↑ in S", "Fz 31.3 ↑ in S"))
	require.False(t, alike("Fz 31.2 ↑ in S", "Fz 31.9 ↑ in S"))
	require.False(t, alike("Fz 31.2 ↑ in S", "Fz −31.2 ↑ in S"))
	require.False(t, alike("Fz 31.2 ↑ in S", "Fz 31.2 ↓ in S"))
}

const shed = `# A shed.
model "Shed" plane

let high = 2 m + 1 m

material steel = { E 210 GPa, G 81 GPa, density 7850 kg/m3, yield 235 MPa }
section post = rect 100 mm x 200 mm of steel

node A = (0, 0) m
node B = (0 m, high)
node C = (4 m, high)

beam c = A -> B of post
beam r = B -> C of post

support A fixed

case G permanent { self-weight }
`
