package model

// Measure is what a limit speaks of.
type Measure int

// The measures.
const (
	Deflection     Measure = iota // Members: largest departure from the chord, m
	Movement                      // Node, Freedom: ux … rz, m or rad
	Drift                         // Node over OtherNode: horizontal movement between them, m
	Stress                        // Members: elastic normal stress, Pa
	AxialForce                    // Members, N
	ShearForce                    // Members: resultant of Vy and Vz, N
	BendingMoment                 // Members: the larger of |My| and |Mz|, Nm
	Reaction                      // Node, Freedom: Fx … Mz, N or Nm
	CriticalFactor                // lowest elastic buckling factor
	Frequency                     // lowest natural frequency, Hz
)

// Limit is an acceptance criterion.
type Limit struct {
	Measure   Measure
	Node      int // index into Nodes, or −1
	OtherNode int // index into Nodes, or −1
	Freedom   int // 0 to 5
	// Targets are the members with the bound of each, since "length" and
	// "yield" differ from member to member. A measure without members has one
	// target with Member −1.
	Targets []Target
	// AtMost: the value must not exceed the bound; otherwise not fall below it.
	AtMost bool
	// Under lists what the limit is checked in; all three may be empty only for
	// measures that know no case.
	Under Under
	// Text is the limit as written, in normal spacing.
	Text   string
	Origin Origin
}

// Target is one thing that a limit is checked for.
type Target struct {
	Member int     // index into Members, or −1
	Bound  float64 // SI
}

// Under is the set of cases, combinations and families of a limit.
type Under struct {
	Cases        []int
	Combinations []int
	Families     []int
	// Generated are full names of single combinations that a family's code asks
	// for ("ULS.S_W"). The text cannot know which there are; analysis finds
	// them, in any spelling of analysis/combine, and reports those it does not
	// find.
	Generated []string
}
