package model

import (
	"spanwright/lang/quantity"
	"spanwright/lang/source"
)

// Model is one whole structure with its loads and its acceptance criteria.
type Model struct {
	Title         string
	Plane         bool
	SecondOrder   bool
	ShearFlexible bool
	Gravity       float64 // m/s2
	Display       quantity.Display

	// Files are the texts that the model was made from, the one with the model
	// line first. Origin.File indexes it.
	Files []*source.File
	// Heading is the origin of the model line.
	Heading Origin

	Lets         []Let
	Materials    []Material
	Sections     []Section
	Nodes        []Node
	Members      []Member
	Supports     []Support
	Masses       []Mass
	Groups       []Group
	Cases        []Case
	Alternates   []Alternate
	Combinations []Combination
	Families     []Family
	Limits       []Limit

	// Places are the placed parts that things may belong to.
	Places []Place
}

// Place is one use of a part. Things of the part have the place's name in front
// of theirs ("F1.A") and the part's text as their origin.
type Place struct {
	Name   string
	Outer  int // index into Model.Places for a place inside a part, or −1
	Origin Origin
}

// Origin is the place in the text that a thing came from.
type Origin struct {
	File      int         // index into Model.Files
	Statement source.Span // the whole statement, absolute offsets
	Name      source.Span // the tight place: the declared name, or the statement's first word
	Place     int         // index into Model.Places of the placed part the thing belongs to, or −1
}

// Let is a named value, kept for hovers and hints.
type Let struct {
	Name   string
	Values []quantity.Quantity // one for a scalar, two or three for a vector
	Origin Origin
}

// Material holds what a section is made of.
type Material struct {
	Name      string
	Grade     string  // the catalogue's name, or "" for a material in braces
	E         float64 // Pa
	G         float64 // Pa
	Density   float64 // kg/m3; 0 where not given
	Expansion float64 // 1/K; 0 where not given
	Yield     float64 // Pa; 0 where not given
	Origin    Origin
}

// Section is a cross-section of a material. A value that was not given is 0.
type Section struct {
	Name     string
	Title    string  // how people call it: "IPE 300", "rect 200 × 400 mm"
	Material int     // index into Materials
	A        float64 // m2
	Iy, Iz   float64 // m4
	It       float64 // m4
	Iw       float64 // m6
	Wy, Wz   float64 // m3, elastic, of the fibre farthest from the axis
	Wply     float64 // m3, plastic; 0 where unknown
	Wplz     float64 // m3
	Avy, Avz float64 // m2, shear areas for shear along y and along z; 0: no shear deformation
	Depth    float64 // m, along z; 0 where unknown
	Width    float64 // m, along y; 0 where unknown
	Mass     float64 // kg/m
	// Series and Size are the catalogue's names ("IPE", "300"), or "".
	Series, Size string
	Origin       Origin
}

// Node is a joint of the structure.
type Node struct {
	Name     string
	Position [3]float64 // m, global
	Origin   Origin
}

// The kinds of members.
const (
	Beam   MemberKind = iota // axial force, shear, bending, torsion
	Bar                      // axial force only
	Link                     // rigid
	Spring                   // given stiffnesses between two nodes
)

// MemberKind says what a member can carry.
type MemberKind int

// String returns the language's word for the kind.
func (k MemberKind) String() string { return [...]string{"beam", "bar", "link", "spring"}[k] }

// Sense says which axial forces a one-way member takes.
type Sense int

// The senses of a member.
const (
	BothWays Sense = iota
	TensionOnly
	CompressionOnly
)

// Member is a beam, bar, link or spring between nodes.
type Member struct {
	Name string
	Kind MemberKind
	// Nodes are indices into Model.Nodes, first end to last; those between the
	// ends lie on the straight line and share the member's movement. Bars,
	// links and springs have two.
	Nodes   []int
	Section int     // index into Sections; −1 for links and springs
	Roll    float64 // rad, right-hand rule about member x
	Ends    [2]End  // at the first and the last node
	Sense   Sense
	// Stiffness of a Spring in member axes: along x, across y, across z (N/m),
	// about x, y, z (Nm/rad).
	Stiffness [6]float64
	// Length is that of the flexible part, between the ends of the offsets, m.
	Length float64
	Origin Origin
}

// End is how a member is joined to its end node.
type End struct {
	// Joint says of each member-axis force (N, Vy, Vz, T, My, Mz) how it is
	// passed on.
	Joint [6]Joint
	// Offset is the rigid piece from the node to the member's end, m, global.
	Offset [3]float64
}

// Joint is how one force passes between a member's end and its node. The zero
// value is rigid.
type Joint struct {
	Kind      JointKind
	Stiffness float64 // N/m or Nm/rad for SemiRigid
}

// JointKind distinguishes rigid, released and semi-rigid joints.
type JointKind int

// The kinds of joints.
const (
	Rigid JointKind = iota
	Released
	SemiRigid
)

// Support holds a node.
type Support struct {
	Node int
	// Freedoms are ux, uy, uz, rx, ry, rz in the support's axes.
	Freedoms [6]Restraint
	// Axes are the support's x, y, z as rows in global coordinates.
	Axes   [3][3]float64
	Turned bool // Axes are not the global ones
	// UpOnly: the restraint along the support's z pushes, never pulls.
	UpOnly bool
	// Words is how the text describes it: "pinned", "fixed, turned 30 deg".
	Words  string
	Origin Origin
}

// Restraint is what a support does to one freedom. The zero value is free.
type Restraint struct {
	Kind      RestraintKind
	Stiffness float64 // N/m or Nm/rad for Elastic
}

// RestraintKind distinguishes free, held and elastic freedoms.
type RestraintKind int

// The kinds of restraint.
const (
	Free RestraintKind = iota
	Held
	Elastic
)

// Mass is a mass at a node; it counts in frequencies and in self-weight.
type Mass struct {
	Node    int
	Mass    float64    // kg
	Inertia [3]float64 // kg·m2 about global x, y, z
	Origin  Origin
}

// Group is a named set of members.
type Group struct {
	Name    string
	Members []int // in the order written, without repeats, nested groups expanded
	Origin  Origin
}
