package element

import (
	"errors"
	"fmt"
	"math"
)

// Vector is twelve end movements or end forces.
type Vector = [12]float64

// Matrix is a 12 × 12 matrix, row-major.
type Matrix = [144]float64

// Properties are the stiffnesses of a cross-section.
type Properties struct {
	EA       float64 // N
	EIy, EIz float64 // Nm2: bending about y (in the x–z plane) and about z
	GIt      float64 // Nm2
	// GAy and GAz are the shear stiffnesses along y and along z, N. Zero: no
	// shear deformation.
	GAy, GAz float64
}

// Element is one straight prismatic member with its joints at both ends. It
// does not change once it is made, and is safe for concurrent use.
type Element struct {
	kind   kind
	length float64
	props  Properties
	joints Vector // +Inf rigid, 0 released, else the stiffness of the joint
	// springs are the stiffnesses of a spring, in the order of its deformations.
	springs [6]float64

	full      Matrix // stiffness with rigid joints
	condensed Matrix // stiffness as the nodes see it
	// inner and flexibility lead from the nodes to the member's own ends: see
	// condense.
	inner       Matrix
	flexibility Matrix
	jointed     bool
}

type kind int

const (
	beam kind = iota
	bar
	spring
)

// Errors that New can wrap.
var (
	// ErrLength says that the length is zero, negative or not a number.
	ErrLength = errors.New("the length must be above zero")
	// ErrProperties says that a stiffness is negative or not a number.
	ErrProperties = errors.New("stiffnesses must be finite and not negative")
	// ErrLoose says that the joints let the member itself move without
	// resistance.
	ErrLoose = errors.New("the releases let the member move freely")
)

// LooseError names the force that both ends release, or that has no stiffness
// to pass it on.
type LooseError struct {
	// Freedom is 0 to 5 for N, Vy, Vz, T, My, Mz.
	Freedom int
}

// Error says which force is released.
func (e *LooseError) Error() string {
	return fmt.Sprintf("%v: %s is released at both ends", ErrLoose, [...]string{"N", "Vy", "Vz", "T", "My", "Mz"}[e.Freedom])
}

// Unwrap gives ErrLoose.
func (e *LooseError) Unwrap() error { return ErrLoose }

// New returns a beam: axial force, bending and shear both ways, torsion. The
// joints are for N, Vy, Vz, T, My, Mz at end 1 and at end 2: +Inf rigid, 0
// released, otherwise a stiffness in N/m or Nm/rad. Errors wrap ErrLength,
// ErrProperties or ErrLoose.
func New(length float64, props Properties, joints Vector) (*Element, error) {
	if err := validate(length, props); err != nil {
		return nil, err
	}
	e := &Element{kind: beam, length: length, props: props, joints: joints, full: beamStiffness(length, props)}
	if err := e.condense(); err != nil {
		return nil, err
	}
	return e, nil
}

// NewBar returns a bar: axial force only. A load across it reaches its ends as
// on a simple beam; its bending stiffness, where given, only serves the
// movement between the ends.
func NewBar(length float64, props Properties) (*Element, error) {
	if err := validate(length, props); err != nil {
		return nil, err
	}
	e := &Element{kind: bar, length: length, props: props, joints: Rigid()}
	k := props.EA / length
	e.condensed[at(0, 0)], e.condensed[at(6, 6)] = k, k
	e.condensed[at(0, 6)], e.condensed[at(6, 0)] = -k, -k
	return e, nil
}

// NewSpring returns a spring between two nodes with stiffnesses along x, across
// y and z (N/m) and about x, y, z (Nm/rad). The springs sit at mid-length, with
// rigid arms to both nodes, so that the forces they carry are in equilibrium
// whatever the length; a length of zero is allowed.
func NewSpring(length float64, stiffness [6]float64) (*Element, error) {
	if length < 0 || math.IsNaN(length) || math.IsInf(length, 0) {
		return nil, ErrLength
	}
	for _, k := range stiffness {
		if k < 0 || math.IsNaN(k) || math.IsInf(k, 0) {
			return nil, ErrProperties
		}
	}
	e := &Element{kind: spring, length: length, joints: Rigid(), springs: stiffness}
	deformation := springDeformation(length)
	for i := range 12 {
		for j := range 12 {
			for d := range 6 {
				e.condensed[at(i, j)] += deformation[d][i] * stiffness[d] * deformation[d][j]
			}
		}
	}
	return e, nil
}

// springDeformation gives the six relative movements at mid-length, a row each,
// from the twelve end movements.
func springDeformation(length float64) [6]Vector {
	var b [6]Vector
	for d := range 6 {
		b[d][d], b[d][6+d] = -1, 1
	}
	half := length / 2
	// Across y: u + half·rz at end 1 meets u − half·rz of end 2; across z with −ry.
	b[1][5], b[1][11] = -half, -half
	b[2][4], b[2][10] = half, half
	return b
}

func validate(length float64, props Properties) error {
	if !(length > 0) || math.IsInf(length, 0) {
		return ErrLength
	}
	for _, v := range []float64{props.EA, props.EIy, props.EIz, props.GIt, props.GAy, props.GAz} {
		if v < 0 || math.IsNaN(v) || math.IsInf(v, 0) {
			return ErrProperties
		}
	}
	return nil
}

// Rigid returns the joints of a member that is fast at both ends.
func Rigid() Vector {
	var j Vector
	for i := range j {
		j[i] = math.Inf(1)
	}
	return j
}

// Length returns the length in m.
func (e *Element) Length() float64 { return e.length }

// Properties returns the section stiffnesses that the element was made with.
func (e *Element) Properties() Properties { return e.props }

// Stiffness returns the stiffness that the nodes see: entry (i, j) is the force
// at freedom i for a unit movement at j, all others held; releases and
// semi-rigid joints are condensed. The caller must not change it.
func (e *Element) Stiffness() *Matrix { return &e.condensed }

// EndForces returns the end forces, what the nodes do to the member, for node
// movements d and the loads on its length.
func (e *Element) EndForces(d Vector, loads []SpanLoad) Vector {
	f := e.naturalForces(d)
	for i, held := range e.FixedEnd(loads) {
		f[i] += held
	}
	return f
}

// at returns the place of (row, column) in a Matrix.
func at(row, column int) int { return 12*row + column }

// Same reports whether two elements are the same to the last digit, so that one
// can stand for the other.
func Same(a, b *Element) bool {
	return a.kind == b.kind && a.length == b.length && a.props == b.props && a.joints == b.joints && a.springs == b.springs
}
