package frame

import "fmt"

// PathKind says how much of the work of the last version served again.
type PathKind int

// The paths, least work first.
const (
	Nothing   PathKind = iota // no unknowns: statics alone
	LoadsOnly                 // the factor served again: one solve
	Updated                   // the factor served again, with what has changed beside it
	Numeric                   // the symbolic phase served again
	Symbolic                  // everything anew
)

// Path is the way that a solve took.
type Path struct {
	Kind PathKind
	// Rank is that of the change beside the factor, for Updated.
	Rank int
}

// String returns the way in words.
func (p Path) String() string {
	switch p.Kind {
	case Nothing:
		return "nothing to factorise"
	case LoadsOnly:
		return "loads only: factor kept"
	case Updated:
		return fmt.Sprintf("few stiffnesses changed: factor kept, change of rank %d beside it", p.Rank)
	case Numeric:
		return "same connections: order kept, factorised anew"
	case Symbolic:
		return "ordered and factorised anew"
	}
	return fmt.Sprintf("path %d", int(p.Kind))
}
