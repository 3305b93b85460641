package resolve

import (
	"slices"

	"spanwright/lang/syntax"
)

// sheet is one file of a session.
type sheet struct {
	path      string
	tree      *syntax.Tree
	fragments []*fragment // of the statements that stand outside of parts
	seen      int         // revision that last used the file
}

// line is a statement in its place in a file.
type line struct {
	statement *syntax.Statement
	unit      int
	block     syntax.Block
}

// instance is a part as one of its places makes it.
type instance struct {
	part       *fragment
	opening    *syntax.Statement // the part's, that the parameters were made from
	scope      *scope
	parameters []*fragment
	fragments  []*fragment
	shadow     bool // made only to check a part that nothing places
}

// expansion says why a place makes nothing of its part.
type expansion uint8

const (
	expanded expansion = iota
	noPart
	placesItself
	overBudget
)

// maxPlaced bounds the lines that all placed parts may come to.
const maxPlaced = 400_000

// maxNesting bounds how deep parts may place parts.
const maxNesting = 24

// arrange brings a sheet's fragments in line with its tree.
func (s *Session) arrange(sh *sheet, tree *syntax.Tree) {
	if sh.tree == tree {
		return
	}
	sh.tree = tree
	lines := make([]line, 0, len(tree.Units))
	for i := range tree.Units {
		u := &tree.Units[i]
		if u.Block == syntax.InPart || u.Block == syntax.InCaseOfPart || u.Statement.Kind == syntax.CloseKind {
			continue
		}
		lines = append(lines, line{u.Statement, i, u.Block})
	}
	sh.fragments = s.match(sh.fragments, lines, func(l line) *fragment {
		return &fragment{sheet: sh, statement: l.statement, scope: s.global, parameter: -1}
	})
	for _, f := range sh.fragments {
		if f.kind == PartName {
			f.body = bodyOf(tree, f.unit)
		}
	}
}

// bodyOf returns the lines of the part that opens at a unit.
func bodyOf(tree *syntax.Tree, opening int) []line {
	var body []line
	for i := opening + 1; i < len(tree.Units); i++ {
		u := &tree.Units[i]
		if u.Block != syntax.InPart && u.Block != syntax.InCaseOfPart || u.Statement.Kind == syntax.CloseKind && u.Block == syntax.InPart {
			break
		}
		if u.Statement.Kind != syntax.CloseKind {
			body = append(body, line{u.Statement, i, u.Block})
		}
	}
	return body
}

// match takes over the fragments of lines that are still there, makes new ones
// and removes those that are gone.
func (s *Session) match(old []*fragment, lines []line, create func(line) *fragment) []*fragment {
	n := min(len(old), len(lines))
	head := 0
	for head < n && old[head].statement == lines[head].statement {
		head++
	}
	tail := 0
	for tail < n-head && old[len(old)-1-tail].statement == lines[len(lines)-1-tail].statement {
		tail++
	}
	spare := map[*syntax.Statement][]*fragment{}
	for _, f := range old[head : len(old)-tail] {
		spare[f.statement] = append(spare[f.statement], f)
	}
	fragments := make([]*fragment, len(lines))
	copy(fragments, old[:head])
	copy(fragments[len(lines)-tail:], old[len(old)-tail:])
	var fresh []*fragment
	for i := head; i < len(lines)-tail; i++ {
		if same := spare[lines[i].statement]; len(same) > 0 {
			fragments[i], spare[lines[i].statement] = same[0], same[1:]
			// Where a name is declared twice, the order decides.
			if f := fragments[i]; f.name != nil {
				s.touch(f.name)
			}
			continue
		}
		fragments[i] = create(lines[i])
		fresh = append(fresh, fragments[i])
	}
	for _, f := range old[head : len(old)-tail] {
		if same := spare[f.statement]; len(same) > 0 && slices.Contains(same, f) {
			s.remove(f)
		}
	}
	for _, f := range fresh {
		s.add(f)
	}
	var owner *fragment
	for i, f := range fragments {
		f.unit = lines[i].unit
		var mine *fragment
		switch lines[i].block {
		case syntax.InCase, syntax.InCaseOfPart:
			mine = owner
		default:
			owner = nil
			if f.kind == CaseName {
				owner = f
			}
		}
		if f.owner != mine {
			f.owner = mine
			f.must = true
			s.mark(f)
		}
	}
	return fragments
}

// placeParts makes what the places of the model want of their parts.
func (s *Session) placeParts() {
	s.number()
	for _, symbol := range s.touched {
		if len(symbol.declarations) > 1 {
			slices.SortFunc(symbol.declarations, func(a, b *fragment) int { return a.order - b.order })
		}
	}
	s.budget = maxPlaced
	placed := map[*fragment]bool{}
	for _, sh := range s.order {
		for _, f := range sh.fragments {
			if f.kind == PlaceName {
				s.expand(f, nil, placed)
			}
		}
	}
	s.shadow(placed)
}

// expand makes the instance of a place, with those of the places inside it.
// Around are the parts being placed around it.
func (s *Session) expand(f *fragment, around []*fragment, placed map[*fragment]bool) {
	part, why := s.partOf(f, around)
	if part != nil && f.name.winner() == f {
		placed[part] = true
	}
	if f.expansion != why {
		f.expansion, f.must = why, true
		s.mark(f)
	}
	if why != expanded {
		s.unplace(f)
		return
	}
	if f.inner == nil || f.inner.part != part {
		s.unplace(f)
		f.inner = &instance{part: part, scope: &scope{outer: s.global, place: f.full()}}
	}
	s.fill(f, f.inner)
	s.budget -= len(f.inner.fragments)
	around = append(around, part)
	for _, inside := range f.inner.fragments {
		if inside.kind == PlaceName {
			s.expand(inside, around, placed)
		}
	}
}

// full returns the fragment's name as spoken of from outside its scope.
func (f *fragment) full() string {
	if f.name == nil {
		return f.kind.String()
	}
	return f.name.full()
}

// partOf returns the part that a place names, and why it cannot be placed.
func (s *Session) partOf(f *fragment, around []*fragment) (*fragment, expansion) {
	tree, ok := f.statement.Tree.(*syntax.PlaceStatement)
	if !ok || tree.Part == nil || f.name == nil {
		return nil, noPart
	}
	symbol := s.symbols[symbolKey{s.global, Parts, tree.Part.Text}]
	if symbol == nil || symbol.winner() == nil {
		return nil, noPart
	}
	part := symbol.winner()
	switch {
	case f.name.winner() != f:
		return part, noPart
	case f.statement.Broken():
		return part, noPart
	case slices.Contains(around, part) || len(around) >= maxNesting:
		return part, placesItself
	case s.budget < len(part.body):
		return part, overBudget
	}
	return part, expanded
}

// fill brings the fragments of an instance in line with its part.
func (s *Session) fill(f *fragment, in *instance) {
	if in.opening != in.part.statement {
		for _, p := range in.parameters {
			s.remove(p)
		}
		in.opening, in.parameters = in.part.statement, nil
		if tree, ok := in.part.statement.Tree.(*syntax.PartStatement); ok {
			for i, p := range tree.Parameters {
				parameter := &fragment{sheet: f.sheet, statement: f.statement, unit: f.unit, scope: f.scope, place: f, parameter: i, kind: ParameterName, partStatement: in.part.statement}
				in.parameters = append(in.parameters, parameter)
				s.declareName(parameter, p.Text)
				s.add(parameter)
			}
		}
	}
	for _, p := range in.parameters {
		p.unit = f.unit
	}
	in.fragments = s.match(in.fragments, in.part.body, func(l line) *fragment {
		return &fragment{sheet: in.part.sheet, statement: l.statement, scope: in.scope, place: f, parameter: -1}
	})
}

// unplace takes out what a place has made of its part.
func (s *Session) unplace(f *fragment) {
	if f.inner == nil || f.kind != PlaceName {
		return
	}
	for _, inside := range f.inner.fragments {
		s.remove(inside)
	}
	for _, p := range f.inner.parameters {
		s.remove(p)
	}
	f.inner = nil
}

// shadow makes an instance, of parameters without a value, of each part that
// nothing places, so that its lines are checked all the same.
func (s *Session) shadow(placed map[*fragment]bool) {
	wanted := map[*fragment]bool{}
	for _, sh := range s.order {
		for _, f := range sh.fragments {
			if f.kind == PartName && !placed[f] && s.header.found {
				wanted[f] = true
			}
		}
	}
	for part, in := range s.shadows {
		if !wanted[part] || in.opening != part.statement {
			s.unplace(in.scope.holder)
			delete(s.shadows, part)
		}
	}
	for part := range wanted {
		in := s.shadows[part]
		if in == nil {
			holder := &fragment{sheet: part.sheet, statement: part.statement, unit: part.unit, scope: s.global, parameter: -1, kind: PlaceName}
			in = &instance{part: part, scope: &scope{outer: s.global, place: "part " + part.full(), holder: holder}, shadow: true}
			holder.inner, holder.outcome = in, &outcome{result: &placeResult{turn: identity}}
			s.shadows[part] = in
		}
		in.scope.holder.unit = part.unit
		s.fill(in.scope.holder, in)
	}
}

// shadowed returns the parts that nothing places, in the order of the text.
func (s *Session) shadowed() []*fragment {
	list := make([]*fragment, 0, len(s.shadows))
	for part := range s.shadows {
		list = append(list, part)
	}
	slices.SortFunc(list, func(a, b *fragment) int { return a.order - b.order })
	return list
}
