package resolve

import (
	"fmt"
	"math"
	"strings"

	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// check looks at the model as a whole, for what no statement can know by itself.
func (a *assembly) check() {
	a.checkTabs()
	if a.header.found {
		a.checkProperties()
		a.checkSupports()
		a.checkSettlements()
		a.checkGeometry()
		a.checkSizes()
		a.checkLooseNodes()
		a.checkUnused()
	}
}

// checkTabs asks for spaces, once in a file.
func (a *assembly) checkTabs() {
	for _, sh := range a.order {
		file := sh.tree.File
		at := strings.IndexByte(file.Text, '\t')
		if at < 0 {
			continue
		}
		d := diagnostic.Diagnostic{Name: "tab-character", Severity: diagnostic.Information, File: sh.path, Subject: source.Span{Start: at, End: at + 1},
			Summary: "Write spaces instead of tabs: columns line up in every editor then. Formatting the file does it."}
		fix := diagnostic.Fix{Title: "Write spaces for all tabs", Preferred: true}
		for i := at; i >= 0 && len(fix.Edits) < 2000; {
			fix.Edits = append(fix.Edits, diagnostic.Edit{Edit: source.Edit{Span: source.Span{Start: i, End: i + 1}, New: "    "}})
			next := strings.IndexByte(file.Text[i+1:], '\t')
			if next < 0 {
				break
			}
			i += 1 + next
		}
		d.Fixes = []diagnostic.Fix{fix}
		a.diagnostics = append(a.diagnostics, d)
	}
}

// checkProperties finds sections and materials that lack what their members or
// loads need: one message for each, with the first that needs it.
func (a *assembly) checkProperties() {
	m := a.model
	type need struct {
		section int
		word    string
	}
	told := map[need]bool{}
	require := func(i int, word string, value float64, why string) {
		member := &m.Members[i]
		key := need{member.Section, word}
		if value > 0 || told[key] {
			return
		}
		told[key] = true
		f := a.sectionFragment(member.Section)
		a.note(f, f.nameSpan(), diagnostic.Error, "missing-property",
			fmt.Sprintf("Give section %s its %s: %s %s needs it%s.", m.Sections[member.Section].Name, word, member.Kind, member.Name, why))
	}
	type use struct {
		section int
		rolled  bool
		kind    model.MemberKind
	}
	seen := map[use]bool{}
	for i := range m.Members {
		member := &m.Members[i]
		if member.Section < 0 {
			continue
		}
		rolled := m.Plane && math.Abs(math.Sin(member.Roll)) > 0.5
		key := use{member.Section, rolled, member.Kind}
		if seen[key] || member.Kind != model.Beam {
			continue
		}
		seen[key] = true
		s := &m.Sections[member.Section]
		switch {
		case m.Plane && rolled:
			require(i, "Iz", s.Iz, ", rolled onto its side as it is,")
		case m.Plane:
			require(i, "Iy", s.Iy, " for its bending")
			if turned := a.turns[member.Section]; turned != 0 {
				f := a.sectionFragment(member.Section)
				a.note(f, f.nameSpan(), diagnostic.Error, "not-in-plane",
					fmt.Sprintf("Make the model one in space, or %s a bar: a beam of %s bends out of the plane, since the section is not symmetric.", member.Name, s.Title))
			}
		default:
			require(i, "Iy", s.Iy, " for bending about y")
			require(i, "Iz", s.Iz, " for bending about z")
			require(i, "It", s.It, " for torsion")
		}
	}
	for _, f := range a.kinds[syntax.SectionKind] {
		if f.index >= 0 && seen[use{f.index, false, model.Beam}] && !m.Plane {
			a.requireG(f.index)
		}
	}
	a.checkLoadProperties()
}

// requireG asks for a shear modulus where torsion needs one.
func (a *assembly) requireG(section int) {
	i := a.model.Sections[section].Material
	if a.model.Materials[i].G > 0 || a.told["G"+itoa(i)] {
		return
	}
	a.told["G"+itoa(i)] = true
	f := a.materialFragment(i)
	a.note(f, f.nameSpan(), diagnostic.Error, "missing-property",
		fmt.Sprintf("Give material %s its shear modulus: write G or poisson in its braces. Beams of %s in space need it for torsion.", a.model.Materials[i].Name, a.model.Sections[section].Name))
}

// checkLoadProperties finds what self-weight and temperature need.
func (a *assembly) checkLoadProperties() {
	m := a.model
	require := func(member int, word string, value float64, load string) {
		if m.Members[member].Section < 0 {
			return
		}
		i := m.Sections[m.Members[member].Section].Material
		if value > 0 || a.told[word+itoa(i)] {
			return
		}
		f := a.materialFragment(i)
		if f.outcome.result.(*materialResult).given(word) {
			return // written as zero, on purpose
		}
		a.told[word+itoa(i)] = true
		a.note(f, f.nameSpan(), diagnostic.Error, "missing-property",
			fmt.Sprintf("Give material %s its %s: %s of %s needs it.", m.Materials[i].Name, word, load, m.Members[member].Name))
	}
	for c := range m.Cases {
		for l := range m.Cases[c].Loads {
			load := &m.Cases[c].Loads[l]
			switch load.Kind {
			case model.SelfWeight:
				if load.Members != nil {
					for _, i := range load.Members {
						a.requireDensity(i, require)
					}
					continue
				}
				for i := range m.Members {
					a.requireDensity(i, require)
				}
			case model.Warming, model.Gradient:
				if section := m.Members[load.Member].Section; section >= 0 {
					require(load.Member, "expansion", m.Materials[m.Sections[section].Material].Expansion, "the temperature")
				}
			}
		}
	}
}

func (a *assembly) requireDensity(i int, require func(int, string, float64, string)) {
	if section := a.model.Members[i].Section; section >= 0 {
		require(i, "density", a.model.Materials[a.model.Sections[section].Material].Density, "the self-weight")
	}
}

// sectionFragment returns the fragment that a section of the model comes from.
func (a *assembly) sectionFragment(section int) *fragment {
	for _, f := range a.kinds[syntax.SectionKind] {
		if f.index == section {
			return f
		}
	}
	return a.kinds[syntax.SectionKind][0]
}

func (a *assembly) materialFragment(material int) *fragment {
	for _, f := range a.kinds[syntax.MaterialKind] {
		if f.index == material {
			return f
		}
	}
	return a.kinds[syntax.MaterialKind][0]
}

// checkSupports finds nodes with two supports.
func (a *assembly) checkSupports() {
	first := map[int]*fragment{}
	for _, f := range a.kinds[syntax.SupportKind] {
		if f.index < 0 {
			continue
		}
		node := a.model.Supports[f.index].Node
		before := first[node]
		if before == nil {
			first[node] = f
			continue
		}
		found := &finding{Diagnostic: diagnostic.Diagnostic{Name: "support-twice", Severity: diagnostic.Error, Subject: f.nameSpan(),
			Summary: fmt.Sprintf("Write all that holds %s in one line, with commas: another support stands there already.", a.model.Nodes[node].Name)}}
		found.relate(before, "the first support")
		a.locate(f, found)
	}
}

// checkSettlements finds settlements of freedoms that nothing holds.
func (a *assembly) checkSettlements() {
	var supports map[int]*model.Support
	for _, f := range a.kinds[syntax.LoadKind] {
		r := f.outcome.result.(*loadResult)
		for i := range r.loads {
			load := &r.loads[i].load
			if load.Kind != model.NodeMove && load.Kind != model.NodeTurn {
				continue
			}
			if supports == nil {
				supports = map[int]*model.Support{}
				for j := range a.model.Supports {
					supports[a.model.Supports[j].Node] = &a.model.Supports[j]
				}
			}
			node := r.loads[i].target.winner()
			if node == nil || node.index < 0 || holds(supports[node.index], load) {
				continue
			}
			d := a.note(f, r.amount, diagnostic.Error, "settles-free-node",
				fmt.Sprintf("Hold %s in this direction by a support first: a settlement moves what is held, and it is free to move so.", node.full()))
			if s := supports[node.index]; s != nil {
				d.Related = append(d.Related, diagnostic.Related{File: a.model.Files[s.Origin.File].Path, Span: s.Origin.Name, Message: "its support"})
			}
			break
		}
	}
}

// holds reports whether a support holds all of a prescribed movement.
func holds(s *model.Support, load *model.Load) bool {
	if s == nil {
		return false
	}
	base := 0
	if load.Kind == model.NodeTurn {
		base = 3
	}
	for i := range 3 {
		part := model.Dot(s.Axes[i], load.Start)
		if math.Abs(part) > 1e-9*math.Sqrt(model.Dot(load.Start, load.Start)) && s.Freedoms[base+i].Kind == model.Free {
			return false
		}
	}
	return true
}

// shortest is the length (m) below which a member is probably a slip in a unit.
const shortest = 0.015

// checkSizes finds members far too short or long to be meant, once.
func (a *assembly) checkSizes() {
	short, long := 0, 0
	var firstShort, firstLong *fragment
	for _, f := range a.kinds[syntax.BeamKind] {
		if f.index < 0 {
			continue
		}
		m := &a.model.Members[f.index]
		if m.Kind == model.Link || m.Kind == model.Spring {
			continue
		}
		switch {
		case m.Length < shortest:
			if short++; firstShort == nil {
				firstShort = f
			}
		case m.Length > 20e3:
			if long++; firstLong == nil {
				firstLong = f
			}
		}
	}
	if firstShort != nil {
		a.tooShort(firstShort, short)
	} else if firstLong != nil {
		m := &a.model.Members[firstLong.index]
		a.note(firstLong, firstLong.nameSpan(), diagnostic.Warning, "implausible-value",
			fmt.Sprintf("Check the units of the nodes of %s: it is %s long%s.", m.Name, showLength(m.Length), others(long)))
	}
}

func others(n int) string {
	switch {
	case n == 2:
		return ", and one other member is alike"
	case n > 2:
		return fmt.Sprintf(", and %d other members are alike", n-1)
	}
	return ""
}

// tooShort says that a member is too short to be meant, at the number in mm that
// is behind it where there is one.
func (a *assembly) tooShort(f *fragment, count int) {
	m := &a.model.Members[f.index]
	length := quantity.Write(m.Length, quantity.Metric().Movement, 3)
	r := f.outcome.result.(*memberResult)
	for _, node := range r.nodes {
		tree, ok := node.statement.Tree.(*syntax.NodeStatement)
		if !ok || tree.Position == nil {
			continue
		}
		var small *syntax.BinaryNode
		syntax.Walk(tree.Position.Root, func(n syntax.Node) {
			b, ok := n.(*syntax.BinaryNode)
			if !ok || b.Op != syntax.Joined || small != nil {
				return
			}
			unit, ok := b.Y.(*syntax.NameNode)
			if number, isNumber := b.X.(*syntax.NumberNode); ok && (!isNumber || number.Value != 0) && unit.Text == "mm" {
				small = b
			}
		})
		if small == nil {
			continue
		}
		unit := small.Y.Place()
		found := &finding{Diagnostic: diagnostic.Diagnostic{Name: "implausible-value", Severity: diagnostic.Warning, Subject: small.Span,
			Summary: fmt.Sprintf("Did you mean m instead of mm? %s is only %s long so%s.", m.Name, length, others(count))}}
		found.fix("Write m", unit, "m").relate(f, "%s", m.Name)
		a.locate(node, found)
		return
	}
	a.note(f, f.nameSpan(), diagnostic.Warning, "implausible-value",
		fmt.Sprintf("Check the units of the nodes of %s: it is only %s long%s.", m.Name, length, others(count)))
}
