package syntax

// Expressions calls visit for each expression of a statement's tree, in the
// order of the text.
func (s *Statement) Expressions(visit func(*Expression)) {
	see := func(e *Expression) {
		if e != nil {
			visit(e)
		}
	}
	all := func(list []*Expression) {
		for _, e := range list {
			see(e)
		}
	}
	switch n := s.Tree.(type) {
	case *ModelStatement:
		for _, o := range n.Options {
			see(o.Value)
		}
	case *ShowStatement:
		all(n.Units)
	case *LetStatement:
		see(n.Value)
	case *MaterialStatement:
		properties(n.Properties, see)
	case *SectionStatement:
		properties(n.Properties, see)
		if n.Profile != nil {
			all(n.Profile.Sizes)
		}
	case *NodeStatement:
		see(n.Position)
	case *MemberStatement:
		for _, o := range n.Options {
			see(o.Value)
			see(o.Rate)
		}
	case *SupportStatement:
		for _, i := range n.Items {
			if i.Spring != nil {
				see(i.Spring.Rate)
			}
			if i.Turned != nil {
				see(i.Turned.Angle)
			}
		}
	case *MassStatement:
		see(n.Value)
		for _, i := range n.Inertia {
			see(i.Value)
		}
	case *CombinationStatement:
		see(n.Sum)
	case *FamilyStatement:
		for _, o := range n.Options {
			see(o.Value)
			see(o.Or)
		}
	case *LimitStatement:
		see(n.Bound)
	case *PlaceStatement:
		all(n.Values)
		see(n.At)
		for _, t := range n.Turned {
			see(t.Angle)
		}
	case *SelfWeightLine:
		see(n.Factor)
	case *LoadLine:
		see(n.At)
		see(n.From)
		see(n.Until)
		see(n.Amount)
		see(n.To)
		for _, m := range n.How {
			for _, d := range []*Direction{m.Along, m.About} {
				if d != nil {
					see(d.Vector)
				}
			}
		}
	}
}

func properties(list []*Property, see func(*Expression)) {
	for _, p := range list {
		see(p.Value)
	}
}

// Walk calls visit for a node and everything below it, outermost first.
func Walk(n Node, visit func(Node)) {
	if n == nil {
		return
	}
	visit(n)
	switch n := n.(type) {
	case *UnaryNode:
		Walk(n.X, visit)
	case *BinaryNode:
		Walk(n.X, visit)
		Walk(n.Y, visit)
	case *GroupNode:
		Walk(n.X, visit)
	case *VectorNode:
		for _, p := range n.Parts {
			Walk(p, visit)
		}
	case *CallNode:
		for _, a := range n.Arguments {
			Walk(a, visit)
		}
	}
}

// Declares returns the name that a statement declares, also of a broken one, or
// nil.
func (s *Statement) Declares() *Name {
	switch n := s.Tree.(type) {
	case *LetStatement:
		return n.Name
	case *MaterialStatement:
		return n.Name
	case *SectionStatement:
		return n.Name
	case *NodeStatement:
		return n.Name
	case *MemberStatement:
		return n.Name
	case *GroupStatement:
		return n.Name
	case *CaseStatement:
		return n.Name
	case *CombinationStatement:
		return n.Name
	case *FamilyStatement:
		return n.Name
	case *PartStatement:
		return n.Name
	case *PlaceStatement:
		return n.Name
	}
	return nil
}
