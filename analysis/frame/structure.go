package frame

import (
	"errors"
	"fmt"
	"math"

	"spanwright/analysis/sparse"
	"spanwright/lang/model"
)

// Structure is a model made ready to be solved. Once [Structure.Factor] has
// returned it does not change; its states may be asked for by any number of
// goroutines.
type Structure struct {
	model    *model.Model
	bodies   []body
	bodyOf   []int        // by node
	arms     [][3]float64 // by node: from its body's reference point, m, global
	segments []segment
	first    []int // by member: its first segment; one more entry at the end
	holds    []hold
	status   status
	scale    float64 // a length typical of the model, m, to weigh turns against movements

	start    []int // by body: its first unknown
	unknowns int

	symbolic *sparse.Symbolic
	matrix   *sparse.Matrix
	factor   *sparse.Factor
	update   *update // what the stiffness has more than the factor; nil for nothing
	path     Path
	softest  float64 // relative energy of the softest suspicious shape; 1 where none was
}

// Errors of New.
var (
	// ErrSecondOrder says that the model asks for second-order analysis.
	ErrSecondOrder = errors.New("second-order analysis is not part of this version: take \"second order\" off the model line for linear results")
	// ErrTooSoft says that the stiffnesses differ so much that the numbers would
	// be lost in rounding.
	ErrTooSoft = errors.New("the stiffnesses of this structure differ so much that its movements drown in rounding: look for sections or springs that are far too soft or far too stiff")
)

// MemberError says that a member cannot be made into an element.
type MemberError struct {
	Member int // index into Model.Members
	Err    error
}

// Error names the reason.
func (e *MemberError) Error() string { return e.Err.Error() }

// Unwrap gives the reason.
func (e *MemberError) Unwrap() error { return e.Err }

// SupportError says that supports contradict each other, or hold a rigid body
// more often than statics can tell apart.
type SupportError struct {
	Node int // index into Model.Nodes
	Text string
}

// Error says what is wrong.
func (e *SupportError) Error() string { return e.Text }

// New makes a structure of a model. The error is a *MemberError, a
// *SupportError or ErrSecondOrder.
func New(m *model.Model) (*Structure, error) {
	if m.SecondOrder {
		return nil, ErrSecondOrder
	}
	return newIn(m, status{})
}

// newIn makes the structure in which some one-way parts do not act.
func newIn(m *model.Model, st status) (*Structure, error) {
	s := &Structure{model: m, status: st, scale: typicalLength(m)}
	s.joinBodies()
	if err := s.makeSegments(); err != nil {
		return nil, err
	}
	if err := s.makeHolds(); err != nil {
		return nil, err
	}
	s.dropInactive()
	s.number()
	return s, nil
}

// Freedoms returns the number of unknowns.
func (s *Structure) Freedoms() int { return s.unknowns }

// Model returns the model that the structure was made of.
func (s *Structure) Model() *model.Model { return s.model }

// typicalLength is the mean length of the members, rounded to a power of two so
// that weighing with it is exact, and so that it stays when one member changes.
func typicalLength(m *model.Model) float64 {
	sum, count := 0.0, 0
	for i := range m.Members {
		if l := m.Members[i].Length; l > 0 && !math.IsInf(l, 0) {
			sum += l
			count++
		}
	}
	if count == 0 {
		return 1
	}
	return math.Exp2(math.Round(math.Log2(sum / float64(count))))
}

// number gives the free coordinates of the bodies their places among the
// unknowns.
func (s *Structure) number() {
	s.start = make([]int, len(s.bodies)+1)
	for i := range s.bodies {
		s.start[i+1] = s.start[i] + len(s.bodies[i].basis)
	}
	s.unknowns = s.start[len(s.bodies)]
}

// freedomsOf are the freedoms that a model's nodes have.
func freedomsOf(plane bool) []int {
	if plane {
		return []int{0, 2, 4}
	}
	return []int{0, 1, 2, 3, 4, 5}
}

// nodeName returns a node's name for messages.
func (s *Structure) nodeName(node int) string { return s.model.Nodes[node].Name }

func (s *Structure) memberError(member int, err error) error {
	return &MemberError{Member: member, Err: fmt.Errorf("%s cannot be analysed: %w", s.model.Members[member].Name, err)}
}
