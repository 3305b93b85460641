package compare

import (
	"regexp"
	"strings"

	"spanwright/lang/model"
)

// How a thing has changed.
type Way string

// The ways.
const (
	Added   Way = "added"
	Removed Way = "removed"
	Changed Way = "changed"
	Renamed Way = "renamed"
)

// Change is one thing that is not as it was.
type Change struct {
	Way  Way
	Kind Kind
	// Word is what people call the thing: "beam", "section"; Name its name, the
	// new one where it was renamed.
	Word, Name string
	// OldName is the name before, of renamed things.
	OldName string
	// What says what was added or removed, in words.
	What string
	// Differences are the attributes that changed.
	Differences []Difference
}

// Difference is one attribute that is not as it was.
type Difference struct{ Label, Before, After string }

// matching finds out what corresponds to what.
type matching struct {
	renamed map[Kind]map[string]string // old name → new name
	changes []Change
}

// match compares two models kind by kind.
func match(old, now *model.Model) *matching {
	m := &matching{renamed: map[Kind]map[string]string{}}
	a, b := &describer{old, now.Display}, &describer{now, now.Display}
	for _, list := range []func(*describer) []thing{
		(*describer).header, (*describer).materials, (*describer).sections, (*describer).nodes, (*describer).members, (*describer).supports,
		(*describer).masses, (*describer).groups, (*describer).cases, (*describer).loads, (*describer).alternates, (*describer).combinations,
		(*describer).families, (*describer).limits,
	} {
		m.kind(list(a), list(b))
	}
	return m
}

// follow returns an old name as it is now.
func (m *matching) follow(kind Kind, name string) string {
	if now, ok := m.renamed[kind][name]; ok {
		return now
	}
	return name
}

// followText returns a text with the names in it as they are now.
func followText(renamed map[Kind]map[string]string, text string) string {
	if len(renamed) == 0 {
		return text
	}
	return word.ReplaceAllStringFunc(text, func(name string) string {
		for _, names := range renamed {
			if now, ok := names[name]; ok {
				return now
			}
		}
		return name
	})
}

// word is a name in a text, qualified ones as a whole.
var word = regexp.MustCompile(`[\pL_][\pL\pN_.]*`)

// signature is all that is said of a thing, old names as they are now.
func (m *matching) signature(t *thing, old bool) string {
	var b strings.Builder
	for _, a := range t.attributes {
		b.WriteString(a.label + "=" + m.keyOf(a, old) + "\n")
	}
	return b.String()
}

func (m *matching) keyOf(a attribute, old bool) string {
	switch {
	case !old || a.ref == "":
		return a.key
	case a.ref == anyText:
		return followText(m.renamed, a.key)
	}
	return m.follow(a.ref, a.key)
}

// kind compares the things of one kind.
func (m *matching) kind(old, now []thing) {
	left := map[string][]*thing{} // new things not yet matched, by name
	for i := range now {
		left[now[i].name] = append(left[now[i].name], &now[i])
	}
	take := func(name string, fits func(*thing) bool) *thing {
		for i, t := range left[name] {
			if fits(t) {
				left[name] = append(left[name][:i:i], left[name][i+1:]...)
				return t
			}
		}
		return nil
	}
	// What is the same comes first, so that of several things under one name
	// those that differ are told.
	var open []*thing
	for i := range old {
		t := &old[i]
		signature := m.signature(t, true)
		if take(m.nameNow(t), func(n *thing) bool { return m.signature(n, false) == signature }) == nil {
			open = append(open, t)
		}
	}
	var gone []*thing
	for _, t := range open {
		if n := take(m.nameNow(t), func(*thing) bool { return t.kind != Load }); n != nil {
			m.changed(t, n)
		} else {
			gone = append(gone, t)
		}
	}
	m.renames(gone, now, left)
}

// nameNow is the name under which a thing would be found now: that of what it
// belongs to may have changed.
func (m *matching) nameNow(t *thing) string {
	switch t.kind {
	case Support, MassKind:
		return m.follow(Node, t.name)
	case Load:
		return m.follow(Case, t.name)
	case Limit:
		return followText(m.renamed, t.name)
	}
	return t.name
}

// changed notes what differs between two things of one name.
func (m *matching) changed(old, now *thing) {
	c := Change{Way: Changed, Kind: now.kind, Word: now.word, Name: now.name}
	before, after := labelled(old.attributes), labelled(now.attributes)
	for _, label := range union(old.attributes, now.attributes) {
		x, y := before[label], after[label]
		if len(x) == 1 && len(y) == 1 {
			if m.keyOf(x[0], true) != m.keyOf(y[0], false) {
				c.Differences = append(c.Differences, difference(label, x[0].show, y[0].show))
			}
			continue
		}
		if a, b := m.joined(x, true), m.joined(y, false); a != b {
			c.Differences = append(c.Differences, Difference{label, shown(x), shown(y)})
		}
	}
	if len(c.Differences) > 0 {
		m.changes = append(m.changes, c)
	}
}

// difference writes an attribute that changed; where people would see no
// difference it says that there is one.
func difference(label, before, after string) Difference {
	if before == after {
		after += ", in its properties"
	}
	return Difference{label, before, after}
}

func labelled(list []attribute) map[string][]attribute {
	by := map[string][]attribute{}
	for _, a := range list {
		by[a.label] = append(by[a.label], a)
	}
	return by
}

func union(a, b []attribute) []string {
	var labels []string
	seen := map[string]bool{}
	for _, list := range [][]attribute{a, b} {
		for _, x := range list {
			if !seen[x.label] {
				seen[x.label] = true
				labels = append(labels, x.label)
			}
		}
	}
	return labels
}

func (m *matching) joined(list []attribute, old bool) string {
	var parts []string
	for _, a := range list {
		parts = append(parts, m.keyOf(a, old))
	}
	return strings.Join(parts, "\n")
}

func shown(list []attribute) string {
	var parts []string
	for _, a := range list {
		parts = append(parts, a.show)
	}
	return strings.Join(parts, ", ")
}

// renames pairs what is gone with what is new where they say the same, and
// notes the rest as removed and added.
func (m *matching) renames(gone []*thing, now []thing, left map[string][]*thing) {
	bySignature := map[string][]*thing{}
	for i := range now {
		t := &now[i]
		for _, n := range left[t.name] {
			if n == t && t.named {
				s := m.signature(t, false)
				bySignature[s] = append(bySignature[s], t)
			}
		}
	}
	taken := map[*thing]bool{}
	for _, t := range gone {
		s := m.signature(t, true)
		if t.named && len(bySignature[s]) > 0 {
			n := bySignature[s][0]
			bySignature[s] = bySignature[s][1:]
			taken[n] = true
			if m.renamed[t.kind] == nil {
				m.renamed[t.kind] = map[string]string{}
			}
			m.renamed[t.kind][t.name] = n.name
			m.changes = append(m.changes, Change{Way: Renamed, Kind: t.kind, Word: t.word, Name: n.name, OldName: t.name})
			continue
		}
		m.changes = append(m.changes, Change{Way: Removed, Kind: t.kind, Word: t.word, Name: t.name, What: summary(t)})
	}
	for i := range now {
		t := &now[i]
		for _, n := range left[t.name] {
			if n == t && !taken[t] {
				m.changes = append(m.changes, Change{Way: Added, Kind: t.kind, Word: t.word, Name: t.name, What: summary(t)})
			}
		}
	}
}

// summary says in short what a thing is.
func summary(t *thing) string {
	var parts []string
	for _, a := range t.attributes {
		switch {
		case t.kind == MemberKind && (a.label == "from" || a.label == "to" || a.label == "section"),
			t.kind == Load && a.label != "case",
			t.kind == Section, t.kind == Node, t.kind == Limit, t.kind == Support && a.label == "holds":
			parts = append(parts, a.show)
		}
	}
	switch {
	case t.kind == MemberKind && len(parts) == 3:
		return parts[0] + " → " + parts[1] + ", " + parts[2]
	case t.kind == Load && len(parts) == 2:
		return parts[0] + ": " + parts[1]
	}
	return strings.Join(parts, ", ")
}
