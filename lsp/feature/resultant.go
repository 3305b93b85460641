package feature

import (
	"math"

	"spanwright/lang/model"
)

// resultant returns the force and the moment about the origin that loads come
// to: Fx … Mz, global. Loads that are in balance by themselves, such as warming,
// add nothing.
func resultant(m *model.Model, loads []model.Load) (total [6]float64) {
	for i := range loads {
		addLoad(m, &loads[i], &total)
	}
	return total
}

func addLoad(m *model.Model, l *model.Load, total *[6]float64) {
	switch l.Kind {
	case model.NodeForce:
		addForce(total, l.Start, m.Nodes[l.Node].Position)
	case model.NodeMoment:
		addMoment(total, l.Start)
	case model.PointForce:
		addForce(total, inGlobal(m, l, l.Start), along(m, l.Member, l.From))
	case model.PointMoment:
		addMoment(total, inGlobal(m, l, l.Start))
	case model.LineForce, model.LineMoment:
		addLine(m, l, total)
	case model.SelfWeight:
		addWeight(m, l, total)
	}
}

// addLine adds a trapezoidal load: its force acts at the trapezoid's centroid,
// each component at its own, hence a uniform and a triangular part.
func addLine(m *model.Model, l *model.Load, total *[6]float64) {
	length := l.To - l.From
	start, end := inGlobal(m, l, l.Start), inGlobal(m, l, l.End)
	var uniform, triangle [3]float64
	for i := range 3 {
		uniform[i] = start[i] * length
		triangle[i] = (end[i] - start[i]) * length / 2
	}
	if l.Kind == model.LineMoment {
		addMoment(total, uniform)
		addMoment(total, triangle)
		return
	}
	addForce(total, uniform, along(m, l.Member, l.From+length/2))
	addForce(total, triangle, along(m, l.Member, l.From+length*2/3))
}

func addWeight(m *model.Model, l *model.Load, total *[6]float64) {
	weigh := func(b *model.Member, i int) {
		if b.Section < 0 {
			return
		}
		s := &m.Sections[b.Section]
		w := -l.Amount * m.Gravity * m.Materials[s.Material].Density * s.A * b.Length
		addForce(total, [3]float64{0, 0, w}, along(m, i, b.Length/2))
	}
	if l.Members != nil {
		for _, i := range l.Members {
			weigh(&m.Members[i], i)
		}
		return
	}
	for i := range m.Members {
		weigh(&m.Members[i], i)
	}
	for i := range m.Masses {
		addForce(total, [3]float64{0, 0, -l.Amount * m.Gravity * m.Masses[i].Mass}, m.Nodes[m.Masses[i].Node].Position)
	}
}

// inGlobal turns a load's vector into global axes.
func inGlobal(m *model.Model, l *model.Load, v [3]float64) [3]float64 {
	if l.Axes != model.Local {
		return v
	}
	axes := m.MemberAxes(l.Member)
	var g [3]float64
	for i := range 3 {
		g[i] = axes[0][i]*v[0] + axes[1][i]*v[1] + axes[2][i]*v[2]
	}
	return g
}

// along returns the point of a member's axis at a distance from its first end.
func along(m *model.Model, member int, at float64) [3]float64 {
	first, last := m.FlexibleEnds(member)
	length := m.Members[member].Length
	if length == 0 {
		return first
	}
	for i := range 3 {
		first[i] += (last[i] - first[i]) * at / length
	}
	return first
}

func addForce(total *[6]float64, f, at [3]float64) {
	moment := model.Cross(at, f)
	for i := range 3 {
		total[i] += f[i]
		total[i+3] += moment[i]
	}
}

func addMoment(total *[6]float64, moment [3]float64) {
	for i := range 3 {
		total[i+3] += moment[i]
	}
}

// lineOfAction returns the point nearest to the origin of the line along which a
// resultant acts, and false where there is none: no force, or a moment about the
// force's own direction.
func lineOfAction(total [6]float64) (point [3]float64, ok bool) {
	force, moment := [3]float64(total[:3]), [3]float64(total[3:])
	f2, m2 := model.Dot(force, force), model.Dot(moment, moment)
	if f2 == 0 {
		return point, false
	}
	if math.Abs(model.Dot(force, moment)) > 1e-9*math.Sqrt(f2*m2) {
		return point, false
	}
	point = model.Cross(force, moment)
	for i := range point {
		point[i] /= f2
	}
	return point, true
}
