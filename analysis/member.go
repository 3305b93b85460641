package analysis

import (
	"spanwright/analysis/element"
	"spanwright/analysis/envelope"
	"spanwright/analysis/limit"
	"spanwright/lang/model"
)

// Member is one result along one physical member.
type Member struct {
	result Result
	member int
	along  *envelope.Member
}

// Extreme is a value and its place.
type Extreme struct {
	Value float64 // SI
	At    float64 // m from the member's first end
}

// Length is that of the member's flexible part, m.
func (m Member) Length() float64 { return m.result.results.model.Members[m.member].Length }

// Ends returns what the nodes do to the first and the last end: Fx … Mz in
// member axes, N and Nm.
func (m Member) Ends() (ends [2][6]float64) {
	for end := range 2 {
		ends[end] = summed(m.result.subject().sum, func(state int) [6]float64 {
			return m.result.results.states[state].Ends(m.member)[end]
		})
	}
	return ends
}

// Force returns a section force at a distance from the first end, N or Nm. At a
// step it is that toward the last end, at the last end that toward the first.
func (m Member) Force(q Quantity, at float64) float64 {
	return m.value(q.component(), at)
}

// ForceBefore is Force, but at a step it is that toward the first end.
func (m Member) ForceBefore(q Quantity, at float64) float64 {
	return m.along.At(q.component(), m.result.subject().sum, at, true)
}

func (m Member) value(c element.Component, at float64) float64 {
	breaks := m.along.Breaks()
	return m.along.At(c, m.result.subject().sum, at, at >= breaks[len(breaks)-1])
}

// Movement returns the movement of the member's axis and the turn of its section
// at a distance from the first end: ux … rz, global, m and rad.
func (m Member) Movement(at float64) (global [6]float64) {
	axes := m.result.results.memberAxes(m.member)
	for k, c := range []element.Component{element.U, element.V, element.W} {
		moved, turned := m.value(c, at), m.value(c+3, at)
		for i := range 3 {
			global[i] += axes[k][i] * moved
			global[i+3] += axes[k][i] * turned
		}
	}
	return global
}

// MovementRange returns the largest and the smallest movement (freedom 0 to 2) or
// turn (3 to 5) of the member's sections, global, m or rad.
func (m Member) MovementRange(freedom int) (most, least Extreme) {
	axes := m.result.results.memberAxes(m.member)
	first := element.U + element.Component(freedom/3*3)
	weights := []float64{axes[0][freedom%3], axes[1][freedom%3], axes[2][freedom%3]}
	path := envelope.Blend(weights, m.along.Path(first), m.along.Path(first+1), m.along.Path(first+2))
	high, low := path.Extremes(m.result.sums())
	return Extreme{high.Value, high.At}, Extreme{low.Value, low.At}
}

// Range returns the largest and the smallest value of a quantity along the
// member, and false where it cannot be known. Deflection and shear stress are
// sizes; their smallest value is given as zero.
func (m Member) Range(q Quantity) (most, least Extreme, known bool) {
	band, known := bandOf(m.result.results.model, m.member, m.along, q, m.result.sums())
	return Extreme{band.Most.Value, band.Most.At}, Extreme{band.Least.Value, band.Least.At}, known
}

// Sag returns the extremes of the departure from the chord along one of the
// member's own axes (1: y, 2: z), m, positive toward the axis, and false where it
// cannot be known.
func (m Member) Sag(axis int) (most, least Extreme, known bool) {
	if !m.along.BentKnown {
		return Extreme{}, Extreme{}, false
	}
	high, low := m.along.Path(element.BentV + element.Component(axis-1)).Extremes(m.result.sums())
	return Extreme{high.Value, high.At}, Extreme{low.Value, low.At}, true
}

// Steps returns the places at which courses may jump or turn, both ends
// included, m.
func (m Member) Steps() []float64 { return m.along.Breaks() }

// Departure returns the departure from the chord along one of the member's own
// axes (1: y, 2: z) at a distance from the first end, m. It counts only where
// [Member.Sag] is known.
func (m Member) Departure(axis int, at float64) float64 {
	return m.value(element.BentV+element.Component(axis-1), at)
}

// Index is the member's index into Model.Members.
func (m Member) Index() int { return m.member }

// Model is the model that the member belongs to.
func (m Member) Model() *model.Model { return m.result.results.model }

// memberAxes returns the member's axes as rows; those of a member without length
// are the global ones.
func (r *Results) memberAxes(member int) [3][3]float64 {
	if r.model.Members[member].Length == 0 {
		return [3][3]float64{{1, 0, 0}, {0, 1, 0}, {0, 0, 1}}
	}
	return r.model.MemberAxes(member)
}

// bandOf returns the extremes of a quantity along a member over sums, and false
// where it cannot be known. Governed.Result is the number of the sum.
func bandOf(m *model.Model, member int, along *envelope.Member, q Quantity, sums []envelope.Sum) (Band, bool) {
	size := func(peaks []envelope.Peak) (Band, bool) {
		if len(peaks) == 0 {
			return Band{}, false
		}
		return Band{Most: governed(peaks[0])}, true
	}
	switch q {
	case Deflection:
		if !along.BentKnown {
			return Band{}, false
		}
		return size(envelope.Largest(sums, 1, along.Path(element.BentV), along.Path(element.BentW)))
	case NormalStress, ShearStress:
		section := m.Members[member].Section
		if section < 0 {
			return Band{}, false
		}
		if q == ShearStress {
			peaks, lacks := limit.ShearStress(&m.Sections[section], along, sums, 1)
			if lacks != "" {
				return Band{}, false
			}
			return size(peaks)
		}
		stress, lacks := limit.StressOf(&m.Sections[section], along)
		if lacks != "" || len(sums) == 0 {
			return Band{}, false
		}
		return Band{Most: governed(stress.Tension(sums, 1)[0]), Least: governed(stress.Compression(sums, 1)[0])}, true
	}
	most, least := along.Path(q.component()).Extremes(sums)
	return Band{Most: governed(most), Least: governed(least)}, len(sums) > 0
}

func governed(p envelope.Peak) Governed { return Governed{Value: p.Value, At: p.At, Result: p.Sum} }
