package workspace

import (
	"context"
	"fmt"
	"math/rand/v2"
	"os"
	"path/filepath"
	"runtime"
	"strings"
	"sync"
	"testing"
	"time"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/analysis"
	"spanwright/lang/diagnostic"
	"spanwright/lang/resolve"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

const cantilever = `model "Cantilever" plane
material steel = { E 210 GPa, G 81 GPa, density 7850 kg/m3, yield 235 MPa }
section plank = rect 100 mm x 200 mm of steel
node A = (0 m, 0 m)
node B = (2 m, 0 m)
beam r = A -> B of plank
support A fixed
case P imposed {
  B: 3 kN down
}
limit deflection of r <= 10 mm under P
`

// watcher records what a workspace says.
type watcher struct {
	mutex     sync.Mutex
	published map[string][]diagnostic.Diagnostic
	versions  map[string][]int32
	solved    chan string
}

func watch(t *testing.T, o Options) (*Workspace, *watcher) {
	r := &watcher{published: map[string][]diagnostic.Diagnostic{}, versions: map[string][]int32{}, solved: make(chan string, 10000)}
	w := New(o, Events{
		Published: func(s *Snapshot, path string, list []diagnostic.Diagnostic) {
			r.mutex.Lock()
			defer r.mutex.Unlock()
			r.published[path] = list
			if d, ok := s.Document(path); ok {
				r.versions[path] = append(r.versions[path], d.Version)
			}
		},
		Solved: func(model string) { r.solved <- model },
	})
	t.Cleanup(w.Close)
	return w, r
}

func (r *watcher) names(path string) []string {
	r.mutex.Lock()
	defer r.mutex.Unlock()
	var names []string
	for _, d := range r.published[path] {
		names = append(names, string(d.Name))
	}
	return names
}

// settle waits until a file's numbers belong to its text, or are refused.
func settle(t *testing.T, w *Workspace, path string) View {
	t.Helper()
	var v View
	require.Eventually(t, func() bool {
		var ok bool
		v, ok = w.Snapshot().View(path)
		return ok && v.State != Overtaken
	}, 20*time.Second, time.Millisecond, "never settles: %s", path)
	return v
}

// replace changes the first place of a text.
func replace(t *testing.T, w *Workspace, path, old, text string) {
	t.Helper()
	d, ok := w.Snapshot().Document(path)
	require.True(t, ok)
	at := strings.Index(d.File.Text, old)
	require.GreaterOrEqual(t, at, 0, old)
	from, to := d.File.Point(at, source.UTF16), d.File.Point(at+len(old), source.UTF16)
	require.True(t, w.Change(path, d.Version+1, []Replacement{{From: from, To: to, Text: text}}, source.UTF16))
}

func hasty() Options {
	o := DefaultOptions()
	o.Pause = 0
	return o
}

func TestNumbersFollowTheText(t *testing.T) {
	w, r := watch(t, hasty())
	w.Open("/m.span", 1, cantilever)
	v := settle(t, w, "/m.span")
	require.Equal(t, Current, v.State, "%v", v.Resolved.Diagnostics)
	reaction := func(v View) float64 {
		return v.Solution.Numbers().Case(v.Solution.Case("P")).Reaction(v.Solution.Node("A"))[2]
	}
	assert.InDelta(t, 3000, reaction(v), 1e-6)
	assert.Contains(t, v.Words(), "this version")
	assert.Nil(t, v.Solution.Before)

	replace(t, w, "/m.span", "3 kN", "9 kN")
	v = settle(t, w, "/m.span")
	assert.InDelta(t, 9000, reaction(v), 1e-6)
	require.NotNil(t, v.Solution.Before)
	assert.InDelta(t, 3*v.Solution.Before.Movement, v.Solution.Effect.Movement, 1e-12)
	assert.Equal(t, "B", v.Solution.Effect.Node)

	// An error leaves the last numbers, and says so.
	replace(t, w, "/m.span", "9 kN", "9 MPa")
	v = settle(t, w, "/m.span")
	assert.Equal(t, Incomplete, v.State)
	assert.InDelta(t, 9000, reaction(v), 1e-6)
	assert.Equal(t, "Model incomplete: shown for the last version that solved, 1 edit ago", v.Words())
	require.Eventually(t, func() bool { return len(r.names("/m.span")) == 1 }, 5*time.Second, time.Millisecond)

	// A mechanism has no numbers, but reasons.
	replace(t, w, "/m.span", "9 MPa", "9 kN")
	replace(t, w, "/m.span", "support A fixed", "support A pinned")
	v = settle(t, w, "/m.span")
	assert.Equal(t, Refused, v.State)
	assert.Nil(t, v.Solution.Numbers())
	assert.True(t, strings.HasPrefix(v.Words(), "No numbers: "), v.Words())
	require.Eventually(t, func() bool { return fmt.Sprint(r.names("/m.span")) == "[mechanism]" }, 5*time.Second, time.Millisecond)

	require.True(t, w.CloseDocument("/m.span"))
	require.Eventually(t, func() bool { return len(r.names("/m.span")) == 0 }, 5*time.Second, time.Millisecond)
}

// TestNumericWarningsWait checks that a limit that breaks while somebody types
// is told after a pause, and that one that is mended goes at once.
func TestNumericWarningsWait(t *testing.T) {
	o := DefaultOptions()
	o.Pause = 150 * time.Millisecond
	w, r := watch(t, o)
	w.Open("/m.span", 1, cantilever)
	settle(t, w, "/m.span")
	start := time.Now()
	replace(t, w, "/m.span", "3 kN", "300 kN")
	v := settle(t, w, "/m.span")
	require.Equal(t, "limit-exceeded", string(v.Solution.Diagnostics[0].Name))
	if time.Since(start) < o.Pause/2 { // else the machine was too slow to look
		assert.Empty(t, r.names("/m.span"))
	}
	require.Eventually(t, func() bool { return len(r.names("/m.span")) == 1 }, 5*time.Second, time.Millisecond)
	assert.GreaterOrEqual(t, time.Since(start), o.Pause)
	// Still broken, with another number: it stays while the next edit is young.
	replace(t, w, "/m.span", "300 kN", "301 kN")
	settle(t, w, "/m.span")
	time.Sleep(20 * time.Millisecond)
	assert.Len(t, r.names("/m.span"), 1)
	replace(t, w, "/m.span", "301 kN", "1 kN")
	settle(t, w, "/m.span")
	require.Eventually(t, func() bool { return len(r.names("/m.span")) == 0 }, 5*time.Second, time.Millisecond)
}

// TestSharedFile checks that a library is looked at through the models that use
// it, that its unsaved text counts, and that only its users are solved again.
func TestSharedFile(t *testing.T) {
	folder := filepath.ToSlash(t.TempDir())
	write := func(name, text string) string {
		p := folder + "/" + name
		require.NoError(t, os.WriteFile(p, []byte(text), 0o600))
		return p
	}
	lines := strings.Split(cantilever, "\n")
	library := strings.Join(lines[1:3], "\n") + "\n"
	own := lines[0] + "\nuse \"steel.span\"\n" + strings.Join(lines[3:], "\n")
	shared := write("steel.span", library)
	one := write("one.span", own)
	two := write("two.span", own)
	other := write("other.span", cantilever)

	w, r := watch(t, hasty())
	w.SetFolders([]string{folder})
	w.Open(shared, 1, library)
	require.Eventually(t, func() bool { return w.Snapshot().ModelOf(shared) == one }, 5*time.Second, time.Millisecond)
	assert.Equal(t, []string{one, two}, w.Snapshot().Models(shared))
	w.Open(two, 1, own)
	w.Open(other, 1, cantilever)
	v := settle(t, w, shared)
	assert.Equal(t, two, v.Path, "an open model goes before one that is not")
	assert.Equal(t, []string{one}, v.Others)
	settle(t, w, other)
	before, _ := w.Snapshot().View(other)

	movement := func() float64 { return settle(t, w, two).Solution.Effect.Movement }
	soft := movement()
	replace(t, w, shared, "x 200 mm", "x 400 mm")
	assert.InEpsilon(t, soft/8, movement(), 1e-9)
	after, _ := w.Snapshot().View(other)
	assert.Same(t, before.Solution, after.Solution)
	assert.Same(t, before.Resolved, after.Resolved)

	w.Pin(shared, one)
	assert.Equal(t, one, settle(t, w, shared).Path)
	w.Pin(shared, "")

	// What is said about a file that is not open goes when nobody uses it.
	replace(t, w, two, "steel.span", "gone.span")
	require.Eventually(t, func() bool { return len(r.names(two)) > 0 }, 5*time.Second, time.Millisecond)
	write("gone.span", library)
	w.FilesChanged(folder + "/gone.span")
	settle(t, w, two)
	require.Eventually(t, func() bool { return len(r.names(two)) == 0 }, 5*time.Second, time.Millisecond, "%v", r.published)
}

// TestRandomEditsEndFresh types at random, and checks that the end is what a
// fresh start gives, that versions are said in order, and that nothing grows.
func TestRandomEditsEndFresh(t *testing.T) {
	path, err := filepath.Abs("../../testdata/models/boathouse.span")
	require.NoError(t, err)
	path = filepath.ToSlash(path)
	text, err := os.ReadFile(path)
	require.NoError(t, err)
	w, r := watch(t, hasty())
	w.Open(path, 0, string(text))
	goroutines := runtime.NumGoroutine()
	random := rand.New(rand.NewPCG(1, 2))
	edits := 400
	if testing.Short() {
		edits = 80
	}
	for i := range edits {
		d, _ := w.Snapshot().Document(path)
		at := random.IntN(len(d.File.Text) + 1)
		end := min(len(d.File.Text), at+random.IntN(4))
		piece := []string{"", "5", " ", "\n", "node Q = (1 m, 2 m)\n", "}", "#", "m"}[random.IntN(8)]
		change := Replacement{From: d.File.Point(at, source.UTF16), To: d.File.Point(end, source.UTF16), Text: piece}
		require.True(t, w.Change(path, int32(i+1), []Replacement{change}, source.UTF16))
		if i%20 == 19 { // back to something that solves
			w.Change(path, int32(i+1), []Replacement{{Whole: true, Text: string(text)}}, source.UTF16)
		}
		if random.IntN(3) == 0 {
			v, ok := w.Snapshot().View(path)
			require.True(t, ok)
			require.NotEmpty(t, v.Words())
		}
	}
	w.Change(path, int32(edits+1), []Replacement{{Whole: true, Text: string(text)}}, source.UTF16)
	v := settle(t, w, path)
	require.Equal(t, Current, v.State, v.Words())
	fresh, err := analysis.Run(context.Background(), resolve.Model(syntax.Parse(source.New(path, string(text))), v.loaderForTest()).Model, nil)
	require.NoError(t, err)
	var a, b strings.Builder
	require.NoError(t, fresh.WriteJSON(context.Background(), &a, analysis.DocumentOptions{}))
	require.NoError(t, v.Solution.Results.WriteJSON(context.Background(), &b, analysis.DocumentOptions{}))
	assert.Equal(t, len(a.String()), len(b.String()))
	assert.LessOrEqual(t, runtime.NumGoroutine(), goroutines+1)
	r.mutex.Lock()
	defer r.mutex.Unlock()
	assert.IsNonDecreasing(t, r.versions[path])
}

func (v *View) loaderForTest() resolve.Loader {
	return loader{v.Snapshot, map[string]bool{}}
}

// TestTypingDoesNotStarve checks that numbers come while somebody types without
// a pause, even though each edit overtakes the solve before.
func TestTypingDoesNotStarve(t *testing.T) {
	o := hasty()
	o.Staleness = 50 * time.Millisecond
	w, r := watch(t, o)
	w.Open("/m.span", 1, grid(40, 30))
	deadline := time.Now().Add(20 * time.Second)
	solved := 0
	for i := 0; time.Now().Before(deadline) && solved < 3; i++ {
		replace(t, w, "/m.span", fmt.Sprintf("%d kN", i+1), fmt.Sprintf("%d kN", i+2))
		time.Sleep(2 * time.Millisecond)
		for len(r.solved) > 0 {
			<-r.solved
			solved++
		}
	}
	assert.GreaterOrEqual(t, solved, 3)
}

// grid is a plane frame of storeys and bays.
func grid(storeys, bays int) string {
	var b strings.Builder
	b.WriteString("model \"Grid\" plane\nmaterial steel = { E 210 GPa, G 81 GPa, density 7850 kg/m3 }\nsection plank = rect 100 mm x 200 mm of steel\n")
	for i := range storeys + 1 {
		for j := range bays + 1 {
			fmt.Fprintf(&b, "node n%d_%d = (%d m, %d m)\n", i, j, 4*j, 3*i)
			if i == 0 {
				fmt.Fprintf(&b, "support n%d_%d fixed\n", i, j)
				continue
			}
			fmt.Fprintf(&b, "beam c%d_%d = n%d_%d -> n%d_%d of plank\n", i, j, i-1, j, i, j)
			if j > 0 {
				fmt.Fprintf(&b, "beam b%d_%d = n%d_%d -> n%d_%d of plank\n", i, j, i, j-1, i, j)
			}
		}
	}
	fmt.Fprintf(&b, "case P imposed {\n  n%d_0: 1 kN down\n}\n", storeys)
	return b.String()
}
