package model

import "math"

// FlexibleEnds returns the two ends of a member's flexible part: its end nodes
// moved by the offsets, m, global.
func (m *Model) FlexibleEnds(member int) (first, last [3]float64) {
	b := &m.Members[member]
	first, last = m.Nodes[b.Nodes[0]].Position, m.Nodes[b.Nodes[len(b.Nodes)-1]].Position
	for i := range 3 {
		first[i] += b.Ends[0].Offset[i]
		last[i] += b.Ends[1].Offset[i]
	}
	return first, last
}

// MemberAxes returns the member's axes x, y, z as rows in global coordinates,
// roll included. The flexible part must have a length.
func (m *Model) MemberAxes(member int) [3][3]float64 {
	first, last := m.FlexibleEnds(member)
	return AxesAlong([3]float64{last[0] - first[0], last[1] - first[1], last[2] - first[2]}, m.Members[member].Roll)
}

// verticalSlope is the horizontal share of a direction below which a member
// counts as vertical: well above rounding, well below any slope that is meant.
const verticalSlope = 1e-9

// AxesAlong returns the axes x, y, z, as rows in global coordinates, of a
// member along a direction (which must not be zero), turned by roll (rad)
// about x: z lies in the vertical plane through the member, upward, and
// y = z × x; a vertical member takes y along global y.
func AxesAlong(direction [3]float64, roll float64) [3][3]float64 {
	length := math.Sqrt(Dot(direction, direction))
	x := [3]float64{direction[0] / length, direction[1] / length, direction[2] / length}
	var y [3]float64
	if horizontal := math.Hypot(x[0], x[1]); horizontal < verticalSlope {
		// A vertical member: y along global y.
		x = [3]float64{0, 0, math.Copysign(1, x[2])}
		y = [3]float64{0, 1, 0}
	} else {
		// y = Z × x, horizontal, of length one.
		y = [3]float64{-x[1] / horizontal, x[0] / horizontal, 0}
	}
	z := Cross(x, y)
	if roll == 0 {
		return [3][3]float64{x, y, z}
	}
	s, c := math.Sincos(roll)
	var ry, rz [3]float64
	for i := range 3 {
		ry[i] = c*y[i] + s*z[i]
		rz[i] = c*z[i] - s*y[i]
	}
	return [3][3]float64{x, ry, rz}
}

// Dot returns the inner product of two vectors.
func Dot(a, b [3]float64) float64 { return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] }

// Cross returns the vector product a × b.
func Cross(a, b [3]float64) [3]float64 {
	return [3]float64{a[1]*b[2] - a[2]*b[1], a[2]*b[0] - a[0]*b[2], a[0]*b[1] - a[1]*b[0]}
}
