package analysis

import "spanwright/analysis/element"

// Quantity is what is known along a member.
type Quantity int

// The section forces, the departure from the chord, and elastic stresses. The
// signs are those of the language: N > 0 is tension, My > 0 puts tension on the
// −z side.
const (
	N            Quantity = iota // N
	Vy                           // N
	Vz                           // N
	T                            // Nm
	My                           // Nm
	Mz                           // Nm
	Deflection                   // m, a size: the departure from the chord
	NormalStress                 // Pa, at the extreme fibres, tension positive
	ShearStress                  // Pa, a size: mean stress on the shear areas
	quantities
)

// String returns the trade's symbol or the language's word.
func (q Quantity) String() string {
	return [...]string{"N", "Vy", "Vz", "T", "My", "Mz", "deflection", "stress", "shear stress"}[q]
}

// sectionForces are the quantities that are section forces.
var sectionForces = [...]Quantity{N, Vy, Vz, T, My, Mz}

// component returns the curve that a section force is.
func (q Quantity) component() element.Component { return element.Component(q) }
