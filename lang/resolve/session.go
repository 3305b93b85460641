package resolve

import (
	"slices"

	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// Loader fetches the files that a model uses.
type Loader interface {
	// Load returns the file at a slash-separated path, read: an open buffer where
	// there is one, else from disk. The same tree must come back as long as the
	// file has not changed. An error says in words why the file cannot be had.
	Load(path string) (*syntax.Tree, error)
}

// Session resolves the versions of one model one after the other and keeps what
// an edit does not touch. It is for one goroutine at a time; the results that
// it returns do not change and may be shared.
type Session struct {
	revision int
	symbols  table
	sheets   map[string]*sheet
	order    []*sheet // the files, those used before those that use them
	main     *sheet
	global   *scope
	touched  []*symbol
	queue    []*fragment // to be marked dirty
	header   header
	shadows  map[*fragment]*instance // parts that no place uses, resolved for their own sake
	visits   int
	budget   int // fragments of placed parts that may still be made
	geometry geometry
	lengths  lengths // of the last version's lists
}

// lengths are how long lists of the last version were.
type lengths struct {
	all   int
	kinds [lastKind]int
}

// header is what the model line says.
type header struct {
	found         bool
	title         string
	plane         bool
	secondOrder   bool
	shearFlexible bool
	gravity       float64
}

// NewSession returns a session that knows nothing yet.
func NewSession() *Session {
	return &Session{symbols: table{}, sheets: map[string]*sheet{}, global: &scope{}, shadows: map[*fragment]*instance{}}
}

// Model resolves one model afresh. A nil loader loads nothing: every use is an
// error then.
func Model(tree *syntax.Tree, loader Loader) *Result {
	return NewSession().Update(tree, loader)
}

// Update resolves a version of the model. What has not changed since the last
// one is taken over.
func (s *Session) Update(tree *syntax.Tree, loader Loader) *Result {
	s.revision++
	s.readFiles(tree, loader)
	s.placeParts()
	s.number()
	s.settleSymbols()
	for _, sh := range s.order {
		s.settleAll(sh.fragments)
	}
	for _, part := range s.shadowed() {
		s.settleAll(s.shadows[part].fragments)
	}
	return s.assemble()
}

// settleAll brings fragments and those of the parts that they place up to date.
func (s *Session) settleAll(fragments []*fragment) {
	for _, f := range fragments {
		s.settle(f)
		if f.inner != nil && f.kind == PlaceName {
			s.settleAll(f.inner.parameters)
			s.settleAll(f.inner.fragments)
		}
	}
}

// parts returns the number of parts of a position.
func (s *Session) parts() int {
	if s.header.plane {
		return 2
	}
	return 3
}

func (s *Session) modelWord() string {
	if s.header.plane {
		return "plane"
	}
	return "space"
}

// number gives every fragment its place in the order of the text.
func (s *Session) number() {
	n := 0
	var walk func([]*fragment)
	walk = func(list []*fragment) {
		for _, f := range list {
			f.order = n
			n++
			if f.inner != nil {
				walk(f.inner.parameters)
				walk(f.inner.fragments)
			}
		}
	}
	for _, sh := range s.order {
		walk(sh.fragments)
	}
	for _, part := range s.shadowed() {
		walk(s.shadows[part].parameters)
		walk(s.shadows[part].fragments)
	}
}

// declareName makes a fragment known under its name.
func (s *Session) declareName(f *fragment, name string) {
	f.name = s.symbols.get(symbolKey{f.declaresIn(), f.kind.Space(), name})
	s.touch(f.name)
	f.name.declare(f)
}

// declaresIn returns the scope that the fragment's name belongs to.
func (f *fragment) declaresIn() *scope {
	if f.parameter >= 0 {
		return f.place.inner.scope
	}
	return f.scope
}

// touch notes that the edit at hand changes a symbol's declarations.
func (s *Session) touch(symbol *symbol) {
	if !symbol.touched {
		symbol.touched, symbol.was = true, symbol.kind()
		s.touched = append(s.touched, symbol)
	}
}

// add takes a new fragment in.
func (s *Session) add(f *fragment) {
	f.state, f.must = dirty, true
	f.nameAt = f.nameSpan()
	if f.parameter < 0 {
		f.kind = kindOf(f.statement)
		if n := f.statement.Declares(); n != nil && n.Text != "" {
			s.declareName(f, n.Text)
		}
	}
}

// remove takes a fragment out, with the part that it places.
func (s *Session) remove(f *fragment) {
	if f.name != nil {
		s.touch(f.name)
		f.name.withdraw(f)
	}
	s.unplace(f)
	f.forget(s.symbols)
	s.geometry.remove(f)
}

// settleSymbols puts the declarations of the symbols that the edit touched in
// order and marks what depends on them.
func (s *Session) settleSymbols() {
	for _, symbol := range s.touched {
		if len(symbol.declarations) > 1 {
			slices.SortFunc(symbol.declarations, func(a, b *fragment) int { return a.order - b.order })
		}
		symbol.changed = s.revision
		kind := symbol.kind()
		for _, u := range symbol.users {
			if kind != symbol.was || u.fragment.dependencies[u.slot].byValue {
				s.mark(u.fragment)
			}
		}
	}
	for _, symbol := range s.touched {
		symbol.touched = false
		s.symbols.release(symbol)
	}
	s.touched = s.touched[:0]
	s.spread()
}

// mark makes a fragment one to be looked at again.
func (s *Session) mark(f *fragment) {
	if f.state == clean {
		f.state = dirty
		s.queue = append(s.queue, f)
	}
}

// spread marks everything that depends, however far, on the value of what is
// marked.
func (s *Session) spread() {
	for len(s.queue) > 0 {
		f := s.queue[len(s.queue)-1]
		s.queue = s.queue[:len(s.queue)-1]
		if f.name == nil {
			continue
		}
		for _, u := range f.name.users {
			if u.fragment.dependencies[u.slot].byValue {
				s.mark(u.fragment)
			}
		}
	}
}

// settle brings a fragment up to date. Definitions that may need each other
// without end go through the search for cycles.
func (s *Session) settle(f *fragment) {
	if f.state == clean {
		return
	}
	switch f.kind {
	case LetName, ParameterName, NodeName, GroupName, PlaceName:
		s.settleInOrder(f)
	default:
		s.refresh(f)
	}
}

// refresh evaluates a fragment if anything that it follows from has changed.
func (s *Session) refresh(f *fragment) {
	if f.state == clean {
		return
	}
	// Clean from here on: a name of the wrong kind may lead back to the fragment.
	f.state = clean
	if !f.must && !s.stale(f) {
		return
	}
	f.forget(s.symbols)
	before := f.outcome
	e := &evaluation{session: s, fragment: f, out: &outcome{}}
	e.run()
	f.outcome, f.must, f.evaluated = e.out, false, s.revision
	if !sameResult(before, f.outcome) {
		f.changed = s.revision
	}
	s.geometry.change(f)
}

// stale reports whether a name that the fragment has looked up stands for
// something else since.
func (s *Session) stale(f *fragment) bool {
	for _, d := range f.dependencies {
		if d.symbol.changed > f.evaluated {
			return true
		}
		if w := d.symbol.winner(); w != nil && d.byValue {
			s.settle(w)
			if w.changed > f.evaluated {
				return true
			}
		}
	}
	return false
}

// result is what can be compared to find out whether dependents must follow.
type result interface{ same(other any) bool }

func sameResult(before, after *outcome) bool {
	if before == nil || before.cycle != nil || after.cycle != nil {
		return false
	}
	r, ok := after.result.(result)
	if !ok {
		return before.result == nil && after.result == nil
	}
	return r.same(before.result)
}

// unitBits gives every unit of the table a bit.
var unitBits = func() map[string]uint64 {
	bits := map[string]uint64{}
	for i, u := range quantity.Units() {
		bits[u.Symbol] = 1 << i
		for n := 2; n <= 6 && u.Dimension == quantity.Length; n++ {
			bits[u.Power(n).Symbol] = 1 << i
		}
	}
	return bits
}()

func unitBit(symbol string) uint64 { return unitBits[symbol] }
