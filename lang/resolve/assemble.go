package resolve

import (
	"math"
	"slices"
	"strings"

	"spanwright/lang/diagnostic"
	"spanwright/lang/model"
	"spanwright/lang/quantity"
	"spanwright/lang/syntax"
)

// assembly puts the flat model together from what the statements have come to.
// It copies; it evaluates nothing but the bounds of limits, which differ from
// member to member.
type assembly struct {
	*Session
	model       *model.Model
	diagnostics []diagnostic.Diagnostic
	kinds       [lastKind][]*fragment // those that stand in the model, by what they are
	places      []*fragment
	all         []*fragment // everything, placed parts included
	files       map[*sheet]int
	errors      bool
	unitCounts  [64]int
	nodeUnits   [64]int
	told        map[string]bool // properties whose lack has been reported
	byHand      map[string]int  // families that only names such as ULS.a make, by name
	turns       []float64       // by section: the angle to its principal axes
}

// lastKind bounds the kinds of statements.
const lastKind = int(syntax.CloseKind) + 1

func (s *Session) assemble() *Result {
	a := &assembly{Session: s, files: map[*sheet]int{}, told: map[string]bool{}}
	a.model = &model.Model{
		Title: s.header.title, Plane: s.header.plane, SecondOrder: s.header.secondOrder,
		ShearFlexible: s.header.shearFlexible, Gravity: s.header.gravity,
	}
	r := &Result{Model: a.model}
	// A version is about as long as the one before.
	a.all = make([]*fragment, 0, s.lengths.all+8)
	for k, n := range s.lengths.kinds {
		if n > 0 {
			a.kinds[k] = make([]*fragment, 0, n+8)
		}
	}
	a.addFile(s.main, r)
	for _, sh := range s.order {
		if sh != s.main {
			a.addFile(sh, r)
		}
	}
	for _, sh := range s.order {
		a.gather(sh.fragments, true)
	}
	for _, part := range s.shadowed() {
		a.gather(s.shadows[part].fragments, false)
	}
	s.lengths.all = len(a.all)
	for k := range a.kinds {
		s.lengths.kinds[k] = len(a.kinds[k])
	}
	a.build()
	a.report(r)
	r.entries = make([]entry, len(a.all))
	for i, f := range a.all {
		r.entries[i] = entry{fragment: f, outcome: f.outcome, file: int32(a.files[f.sheet]), unit: int32(f.unit)}
		if f.inner != nil {
			r.entries[i].inner = f.inner.scope
		}
	}
	r.header, r.global = s.header, s.global
	return r
}

func (a *assembly) addFile(sh *sheet, r *Result) {
	a.files[sh] = len(r.Trees)
	r.Trees = append(r.Trees, sh.tree)
	a.model.Files = append(a.model.Files, sh.tree.File)
}

// gather sorts fragments by what they are. Only those count that came to
// something, and of equal names only the first.
func (a *assembly) gather(fragments []*fragment, inModel bool) {
	for _, f := range fragments {
		a.all = append(a.all, f)
		f.index = -1
		if f.outcome != nil && inModel {
			a.count(f.outcome.units, f.statement.Kind)
		}
		if inModel && f.outcome != nil && f.outcome.result != nil && (f.name == nil || f.name.winner() == f) {
			if f.kind == PlaceName {
				f.index = len(a.places)
				a.places = append(a.places, f)
			} else {
				k := f.statement.Kind
				if k == syntax.BarKind || k == syntax.LinkKind || k == syntax.SpringKind {
					k = syntax.BeamKind // members share one slice
				}
				a.kinds[k] = append(a.kinds[k], f)
			}
		}
		if f.inner != nil && f.kind == PlaceName {
			for _, p := range f.inner.parameters {
				p.index = -1
				a.all = append(a.all, p)
			}
			a.gather(f.inner.fragments, inModel && f.index >= 0)
		}
	}
}

// count notes the units that a statement uses.
func (a *assembly) count(units uint64, kind syntax.Kind) {
	for bit := 0; units != 0; bit, units = bit+1, units>>1 {
		if units&1 == 0 {
			continue
		}
		a.unitCounts[bit]++
		if kind == syntax.NodeKind || kind == syntax.LetKind {
			a.nodeUnits[bit]++
		}
	}
}

// origin returns where a fragment stands.
func (a *assembly) origin(f *fragment) model.Origin {
	span := f.sheet.tree.Units[f.unit].Span()
	o := model.Origin{File: a.files[f.sheet], Statement: span, Name: f.nameSpan().Shift(span.Start), Place: -1}
	if f.place != nil {
		o.Place = f.place.index
	}
	return o
}

// build fills the model's slices, what others refer to first.
func (a *assembly) build() {
	m := a.model
	m.Heading = model.Origin{Place: -1}
	if f := a.firstModel(); f != nil {
		m.Heading = a.origin(f)
		if r, ok := f.result().(*modelResult); ok {
			m.Gravity = r.gravity
		}
	}
	for _, f := range a.places {
		outer := -1
		if f.place != nil {
			outer = f.place.index
		}
		m.Places = append(m.Places, model.Place{Name: f.full(), Outer: outer, Origin: a.origin(f)})
	}
	for _, f := range a.kinds[syntax.LetKind] {
		m.Lets = append(m.Lets, model.Let{Name: f.full(), Values: f.outcome.result.(*letResult).value.public().Parts, Origin: a.origin(f)})
	}
	a.buildMaterials()
	a.buildNodes()
	a.buildMembers()
	a.buildSupports()
	a.buildGroups()
	a.buildActions()
	a.buildLimits()
	m.Display = a.display()
}

func (a *assembly) buildMaterials() {
	m := a.model
	for _, f := range a.kinds[syntax.MaterialKind] {
		r := f.outcome.result.(*materialResult)
		f.index = len(m.Materials)
		m.Materials = append(m.Materials, model.Material{
			Name: f.full(), Grade: r.grade, E: r.e, G: r.g, Density: r.density, Expansion: r.expansion, Yield: r.yield, Origin: a.origin(f),
		})
	}
	for _, f := range a.kinds[syntax.SectionKind] {
		r := f.outcome.result.(*sectionResult)
		material := r.material.winner()
		if material == nil || material.index < 0 {
			continue
		}
		section := r.section
		section.Name, section.Material, section.Origin = f.full(), material.index, a.origin(f)
		section.Mass = section.A * m.Materials[material.index].Density
		a.turns = append(a.turns, r.turned)
		f.index = len(m.Sections)
		m.Sections = append(m.Sections, section)
	}
}

func (a *assembly) buildNodes() {
	nodes := a.kinds[syntax.NodeKind]
	a.model.Nodes = make([]model.Node, len(nodes))
	for i, f := range nodes {
		f.index = i
		a.model.Nodes[i] = model.Node{Name: f.full(), Position: f.outcome.result.(*nodeResult).global, Origin: a.origin(f)}
	}
}

func (a *assembly) buildMembers() {
	m := a.model
	members := a.kinds[syntax.BeamKind]
	m.Members = make([]model.Member, 0, len(members))
	joints := make([]int, 0, 2*len(members)+64) // one piece of memory for all lists of nodes
	for _, f := range members {
		r := f.outcome.result.(*memberResult)
		member := model.Member{Kind: r.kind, Section: -1, Roll: r.roll, Sense: r.sense, Length: r.length}
		start := len(joints)
		whole := true
		for _, n := range r.nodes {
			joints = append(joints, n.index)
			whole = whole && n.index >= 0
		}
		if r.section != nil {
			section := r.section.winner()
			if section == nil || section.index < 0 {
				whole = false
			} else {
				member.Section = section.index
				if turned := section.outcome.result.(*sectionResult).turned; r.kind == model.Beam {
					member.Roll += turned
				}
			}
		}
		if !whole {
			joints = joints[:start]
			continue
		}
		member.Nodes = joints[start:len(joints):len(joints)]
		if r.ends != nil {
			member.Ends = *r.ends
		}
		if r.stiffness != nil {
			member.Stiffness = *r.stiffness
		}
		member.Name, member.Origin = f.full(), a.origin(f)
		f.index = len(m.Members)
		m.Members = append(m.Members, member)
	}
}

func (a *assembly) buildSupports() {
	m := a.model
	for _, f := range a.kinds[syntax.SupportKind] {
		r := f.outcome.result.(*supportResult)
		node := r.node.winner()
		if node == nil || node.index < 0 {
			continue
		}
		f.index = len(m.Supports)
		m.Supports = append(m.Supports, model.Support{
			Node: node.index, Freedoms: r.freedoms, Axes: r.axes, Turned: r.turned, UpOnly: r.upOnly, Words: r.words, Origin: a.origin(f),
		})
	}
	for _, f := range a.kinds[syntax.MassKind] {
		r := f.outcome.result.(*massResult)
		if node := r.node.winner(); node != nil && node.index >= 0 {
			f.index = len(m.Masses)
			m.Masses = append(m.Masses, model.Mass{Node: node.index, Mass: r.mass, Inertia: r.inertia, Origin: a.origin(f)})
		}
	}
}

func (a *assembly) buildGroups() {
	m := a.model
	for _, f := range a.kinds[syntax.GroupKind] {
		r := f.outcome.result.(*groupResult)
		group := model.Group{Name: f.full(), Origin: a.origin(f)}
		for _, member := range r.members {
			if member.index >= 0 {
				group.Members = append(group.Members, member.index)
			}
		}
		f.index = len(m.Groups)
		m.Groups = append(m.Groups, group)
	}
}

// buildActions fills cases, families, combinations and alternates.
func (a *assembly) buildActions() {
	m := a.model
	for _, f := range a.kinds[syntax.CaseKind] {
		r := f.outcome.result.(*caseResult)
		if r.outer != nil {
			continue // a part's loads go to the model's own case
		}
		f.index = len(m.Cases)
		m.Cases = append(m.Cases, model.Case{Name: f.full(), Kind: r.kind, Category: r.category, Title: r.title, Origin: a.origin(f)})
	}
	a.buildLoads()
	for _, f := range a.kinds[syntax.FamilyKind] {
		r := f.outcome.result.(*familyResult)
		family := model.Family{Name: f.full(), Code: r.code, Situation: r.situation, Rule: r.rule, Origin: a.origin(f)}
		for _, o := range r.overrides {
			v := o.Override
			v.Origin = family.Origin
			if o.of != nil {
				c := o.of.winner()
				if c == nil || c.index < 0 {
					continue
				}
				v.Case = c.index
			}
			family.Overrides = append(family.Overrides, v)
		}
		f.index = len(m.Families)
		m.Families = append(m.Families, family)
	}
	a.byHand = map[string]int{}
	for _, f := range a.kinds[syntax.CombinationKind] {
		r := f.outcome.result.(*combinationResult)
		c := model.Combination{Name: f.full(), Family: -1, Origin: a.origin(f)}
		whole := true
		for i, symbol := range r.cases {
			w := symbol.winner()
			if w == nil || w.index < 0 {
				whole = false
				break
			}
			c.Factors = append(c.Factors, model.Factor{Case: w.index, Factor: r.factors[i]})
		}
		if !whole {
			continue
		}
		slices.SortFunc(c.Factors, func(x, y model.Factor) int { return x.Case - y.Case })
		c.Family = a.familyOf(r, c)
		f.index = len(m.Combinations)
		m.Combinations = append(m.Combinations, c)
	}
	for _, f := range a.kinds[syntax.AlternateKind] {
		alternate := model.Alternate{Origin: a.origin(f)}
		for _, symbol := range f.outcome.result.(*alternateResult).cases {
			if w := symbol.winner(); w != nil && w.index >= 0 {
				alternate.Cases = append(alternate.Cases, w.index)
			}
		}
		m.Alternates = append(m.Alternates, alternate)
	}
}

// familyOf returns the family of a combination named such as "ULS.a". Where no
// family line declares it, the first such name makes one by hand.
func (a *assembly) familyOf(r *combinationResult, c model.Combination) int {
	name, _, dotted := strings.Cut(c.Name, ".")
	if !dotted {
		return -1
	}
	if r.family != nil {
		if w := r.family.winner(); w != nil && w.kind == FamilyName {
			return w.index
		}
	}
	if i, ok := a.byHand[name]; ok {
		return i
	}
	a.byHand[name] = len(a.model.Families)
	a.model.Families = append(a.model.Families, model.Family{Name: name, Code: model.Written, Origin: c.Origin})
	return a.byHand[name]
}

// buildLoads puts the loads into their cases.
func (a *assembly) buildLoads() {
	m := a.model
	counts := make([]int, len(m.Cases))
	index := func(f *fragment) int {
		c := f.owner
		if c == nil || c.outcome == nil {
			return -1
		}
		if r, ok := c.result().(*caseResult); ok && r.outer != nil {
			c = r.outer.winner()
		}
		if c == nil {
			return -1
		}
		return c.index
	}
	loads := a.kinds[syntax.LoadKind]
	for _, f := range loads {
		if i := index(f); i >= 0 {
			counts[i] += len(f.outcome.result.(*loadResult).loads)
		}
	}
	for i := range m.Cases {
		m.Cases[i].Loads = make([]model.Load, 0, counts[i])
	}
	for _, f := range loads {
		i := index(f)
		if i < 0 {
			continue
		}
		r := f.outcome.result.(*loadResult)
		origin := a.origin(f)
		for _, item := range r.loads {
			if load, ok := a.place(f, r, item); ok {
				load.Origin = origin
				m.Cases[i].Loads = append(m.Cases[i].Loads, load)
			}
		}
	}
}

// place gives a load the index of what it acts on.
func (a *assembly) place(f *fragment, r *loadResult, item loadItem) (model.Load, bool) {
	load := item.load
	if item.target == nil {
		if r.group == nil {
			return load, true
		}
		w := r.group.winner()
		switch {
		case w == nil || w.index < 0:
			return load, false
		case w.kind == GroupName:
			load.Members = a.model.Groups[w.index].Members
			if load.Members == nil {
				load.Members = []int{}
			}
		default:
			load.Members = []int{w.index}
		}
		return load, true
	}
	w := item.target.winner()
	if w == nil || w.index < 0 {
		return load, false
	}
	if w.kind == NodeName {
		load.Node = w.index
		return load, true
	}
	load.Member = w.index
	if load.Axes == model.Local {
		a.turnLoad(&load)
	}
	if load.Kind == model.Gradient && load.From == facesMark {
		load.From = 0
		section := &a.model.Sections[a.model.Members[w.index].Section]
		size, word := section.Width, "width"
		if load.Axis == 2 {
			size, word = section.Depth, "depth"
		}
		if size <= 0 {
			a.note(f, r.amount, diagnostic.Error, "missing-property",
				"Give section "+section.Name+" its "+word+": a difference of temperature between the faces of "+w.name.name+" needs it.")
			return load, false
		}
		load.Amount /= size
	}
	return load, true
}

// turnLoad gives a load in member axes in the principal axes of the member's
// section, where those are others: "local z" is as people see the section stand.
func (a *assembly) turnLoad(load *model.Load) {
	member := &a.model.Members[load.Member]
	if member.Section < 0 || member.Kind != model.Beam {
		return
	}
	turned := a.turns[member.Section]
	if turned == 0 {
		return
	}
	s, c := math.Sincos(turned)
	for _, v := range []*[3]float64{&load.Start, &load.End} {
		v[1], v[2] = c*v[1]+s*v[2], c*v[2]-s*v[1]
	}
}

// buildLimits finds the members and bounds of the limits.
func (a *assembly) buildLimits() {
	m := a.model
	var bySection map[int][]int
	for _, f := range a.kinds[syntax.LimitKind] {
		r := f.outcome.result.(*limitResult)
		limit := model.Limit{Measure: r.measure, Node: -1, OtherNode: -1, Freedom: r.freedom, AtMost: r.atMost, Text: squeezed(f.statement.Text), Origin: a.origin(f)}
		whole := true
		index := func(symbol *symbol) int {
			w := symbol.winner()
			if w == nil || w.index < 0 {
				whole = false
				return -1
			}
			return w.index
		}
		if r.node != nil {
			limit.Node = index(r.node)
		}
		if r.other != nil {
			limit.OtherNode = index(r.other)
		}
		for _, symbol := range r.under {
			i := index(symbol)
			switch symbol.kind() {
			case CaseName:
				limit.Under.Cases = append(limit.Under.Cases, i)
			case CombinationName:
				limit.Under.Combinations = append(limit.Under.Combinations, i)
			default:
				limit.Under.Families = append(limit.Under.Families, i)
			}
		}
		for _, name := range r.byHand {
			i, known := a.byHand[name]
			whole = whole && known
			limit.Under.Families = append(limit.Under.Families, i)
		}
		limit.Under.Generated = r.generated
		if !whole {
			continue
		}
		var members []int
		switch {
		case r.all:
			for i := range m.Members {
				if m.Members[i].Section >= 0 {
					members = append(members, i)
				}
			}
		case r.of == nil:
			limit.Targets = []model.Target{{Member: -1, Bound: r.bound}}
		default:
			w := r.of.winner()
			switch {
			case w == nil || w.index < 0:
				continue
			case w.kind == GroupName:
				members = m.Groups[w.index].Members
			case w.kind == SectionName:
				if bySection == nil {
					bySection = map[int][]int{}
					for i := range m.Members {
						bySection[m.Members[i].Section] = append(bySection[m.Members[i].Section], i)
					}
				}
				members = bySection[w.index]
			default:
				members = []int{w.index}
			}
		}
		limit.Targets = append(limit.Targets, a.targets(f, r, members)...)
		f.index = len(m.Limits)
		m.Limits = append(m.Limits, limit)
	}
}

// targets works out the bound of each member of a limit.
func (a *assembly) targets(f *fragment, r *limitResult, members []int) []model.Target {
	list := make([]model.Target, 0, len(members))
	type size struct{ length, yield float64 }
	known := map[size]float64{}
	for _, i := range members {
		member := &a.model.Members[i]
		if member.Section < 0 {
			continue // links and springs have no stress and no deflection of their own
		}
		if !r.varies {
			list = append(list, model.Target{Member: i, Bound: r.bound})
			continue
		}
		material := &a.model.Materials[a.model.Sections[member.Section].Material]
		if r.usesYield && material.Yield <= 0 {
			a.note(f, f.nameSpan(), diagnostic.Error, "missing-property",
				"Give material "+material.Name+" its yield stress: the limit compares "+member.Name+" with it.")
			return nil
		}
		key := size{member.Length, material.Yield}
		bound, done := known[key]
		if !done {
			e := &evaluation{session: a.Session, fragment: f, out: &outcome{}, silent: true, special: sample(key.length, key.yield)}
			v := e.value(f.statement.Tree.(*syntax.LimitStatement).Bound)
			if v.isBad() || v.isVector() {
				a.note(f, f.nameSpan(), diagnostic.Error, "not-finite", "Correct the bound of this limit: it has no value for "+member.Name+".")
				return nil
			}
			bound = v.number()
			known[key] = bound
		}
		list = append(list, model.Target{Member: i, Bound: bound})
	}
	return list
}

// display returns the units for people: those of the show line, else those that
// the file uses most.
func (a *assembly) display() quantity.Display {
	customary, metric := 0, 0
	units := quantity.Units()
	for i, u := range units {
		if u.Dimension != quantity.Length && u.Dimension != quantity.Force {
			continue
		}
		if u.Customary {
			customary += a.unitCounts[i]
		} else {
			metric += a.unitCounts[i]
		}
	}
	d := quantity.Metric()
	if customary > metric {
		d = quantity.Customary()
	}
	most := func(dimension quantity.Dimension, counts *[64]int, otherwise quantity.Unit) quantity.Unit {
		best, found := 0, otherwise
		for i, u := range units {
			if u.Dimension == dimension && !u.Angle && u.Symbol != "%" && counts[i] > best && u.Customary == otherwise.Customary {
				best, found = counts[i], u
			}
		}
		return found
	}
	d.Length = most(quantity.Length, &a.nodeUnits, d.Length)
	d.Force = most(quantity.Force, &a.unitCounts, d.Force)
	if moment, ok := quantity.Lookup(momentOf[d.Force.Symbol]); ok {
		d.Moment = moment
	}
	d.Moment = most(quantity.Moment, &a.unitCounts, d.Moment)
	d.Mass = most(quantity.Mass, &a.unitCounts, d.Mass)
	for _, f := range a.kinds[syntax.ShowKind] {
		lengths := 0
		for _, u := range f.outcome.result.(*showResult).units {
			switch {
			case u.Angle:
				d.Angle = u
			case u.Dimension == quantity.Length && lengths > 0:
				d.Movement = u
			case u.Dimension == quantity.Length:
				d.Length = u
				lengths++
			case u.Dimension == quantity.Force:
				d.Force = u
			case u.Dimension == quantity.Moment:
				d.Moment = u
			case u.Dimension == quantity.Stress:
				d.Stress = u
			case u.Dimension == quantity.Mass:
				d.Mass = u
			}
		}
	}
	return d
}

// momentOf is the moment unit that goes with a force unit.
var momentOf = map[string]string{"N": "Nm", "kN": "kNm", "MN": "MNm", "lbf": "lbft", "kip": "kipft"}
