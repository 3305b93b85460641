package element

import (
	"math"
	"slices"
)

// SpanLoad is one load on the length of an element, in its own axes. The zero
// value of a field means that there is none of it.
type SpanLoad struct {
	// From and To are the distances from end 1, m. Equal values make a point
	// load of Force1 and Moment1 (N, Nm); otherwise the load is spread, with
	// Force1, Moment1 per metre at From changing linearly to Force2, Moment2 at To.
	From, To         float64
	Force1, Force2   [3]float64
	Moment1, Moment2 [3]float64
	// Strain is the strain that the whole length would take if it were free:
	// αΔT for a uniform change, δ/L for a lack of fit.
	Strain float64
	// StrainPerY and StrainPerZ are its change per metre along y and z: α times
	// the temperature gradient, positive when the + side would lengthen, 1/m.
	StrainPerY, StrainPerZ float64
}

// Point returns a point load: force in N, moment in Nm.
func Point(at float64, force, moment [3]float64) SpanLoad {
	return SpanLoad{From: at, To: at, Force1: force, Moment1: moment}
}

// Line returns a spread force, N/m, changing linearly from one end to the other.
func Line(from, to float64, force1, force2 [3]float64) SpanLoad {
	return SpanLoad{From: from, To: to, Force1: force1, Force2: force2}
}

// Breaks returns the distances at which the curves of forces or their slopes
// change, sorted, each once, 0 and the length included. Places closer together
// than rounding count as one.
func (e *Element) Breaks(loads []SpanLoad) []float64 {
	breaks := []float64{0, e.length}
	for _, l := range loads {
		breaks = append(breaks, min(max(l.From, 0), e.length), min(max(l.To, 0), e.length))
	}
	slices.Sort(breaks)
	tiny := 1e-12 * e.length
	kept := breaks[:1]
	for _, b := range breaks[1:] {
		if b-kept[len(kept)-1] > tiny {
			kept = append(kept, b)
		}
	}
	kept[len(kept)-1] = e.length
	return kept
}

// FixedEnd returns the end forces that hold the element's nodes still under the
// loads: what the nodes do to the member. The equivalent loads on the nodes are
// its negative. A bar takes no torsion and no moment at its ends; the caller
// must not put a moment about x on one.
func (e *Element) FixedEnd(loads []SpanLoad) Vector {
	return e.releaseFixedEnd(e.fastFixedEnd(loads, e.Breaks(loads)))
}

// fastFixedEnd returns the held-end forces of the member before its joints. With
// nothing at end 1 the section forces follow from statics, as in a cantilever
// clamped at end 2; the forces at end 1 are those that bring its tip back to
// where it was, and those at end 2 keep the whole in equilibrium.
func (e *Element) fastFixedEnd(loads []SpanLoad, breaks []float64) Vector {
	if len(loads) == 0 || e.kind == spring {
		return Vector{}
	}
	pieces := e.statics(Vector{}, loads, breaks)
	f := e.bringBack(e.tip(pieces, loads), &pieces[len(pieces)-1])
	pieces = e.statics(f, loads, breaks)
	last := &pieces[len(pieces)-1]
	s := last.To - last.From
	f[6], f[7], f[8] = last.Courses[N].At(s), -last.Courses[Vy].At(s), -last.Courses[Vz].At(s)
	f[9], f[10], f[11] = last.Courses[T].At(s), -last.Courses[My].At(s), last.Courses[Mz].At(s)
	for _, l := range loads {
		if !l.spread(e.length) && near(l.From, e.length, e.length) {
			for i := range 3 {
				f[6+i] -= l.Force1[i]
				f[9+i] -= l.Moment1[i]
			}
		}
	}
	return f
}

// bringBack returns the forces at end 1 that bring the tip back. Where the
// member has no stiffness to do so it is statics that decides: half of the
// axial force or torque each, and shears as on a simple beam. last is the piece
// at the clamped end, with nothing at the tip.
func (e *Element) bringBack(tip movement, last *Piece) Vector {
	var f Vector
	l, s := e.length, last.To-last.From
	f[0], f[3] = last.Courses[N].At(s)/2, last.Courses[T].At(s)/2
	if e.props.EA > 0 {
		f[0] = -e.props.EA / l * tip.u
	}
	if e.props.GIt > 0 && e.kind == beam {
		f[3] = -e.props.GIt / l * tip.twist
	}
	if e.bends(e.props.EIz) {
		f[1], f[5] = e.holdAcross(e.props.EIz, e.props.GAy, tip.v, tip.slopeV)
	} else {
		f[1] = -last.Courses[Mz].At(s) / l
	}
	if e.bends(e.props.EIy) {
		var turn float64
		f[2], turn = e.holdAcross(e.props.EIy, e.props.GAz, tip.w, tip.slopeW)
		f[4] = -turn // a positive slope of w is a negative ry
	} else {
		f[2] = -last.Courses[My].At(s) / l
	}
	return f
}

// bends reports whether the member's ends pass moments on.
func (e *Element) bends(ei float64) bool { return e.kind == beam && ei > 0 }

// holdAcross returns the force, and the moment that turns with the slope, that
// bring end 1 back from a movement w and a slope, end 2 held.
func (e *Element) holdAcross(ei, gav, w, slope float64) (force, moment float64) {
	l := e.length
	phi := ShearParameter(ei, gav, l)
	c := ei / (l * (1 + phi))
	return -c * (12*w/(l*l) + 6*slope/l), -c * (6*w/l + (4+phi)*slope)
}

// movement is that of the cantilever's tip, end 1.
type movement struct{ u, v, w, twist, slopeV, slopeW float64 }

// tip returns the movement of the free end 1 of the cantilever clamped at end 2
// under section forces that start from nothing. Integrated from a tip at rest
// the curve ends at end 2 with what the tip must have had the other way.
func (e *Element) tip(pieces []Piece, loads []SpanLoad) movement {
	var end movement
	strain, perY, perZ := initialStrain(loads)
	for i := range pieces {
		p := &pieces[i]
		s := p.To - p.From
		if ea := e.props.EA; ea > 0 {
			end.u += p.Courses[N].Times(1 / ea).Integral(0).At(s)
		}
		end.u += strain * s
		if git := e.props.GIt; git > 0 {
			end.twist += p.Courses[T].Times(1 / git).Integral(0).At(s)
		}
		end.w, end.slopeW = carry(end.w, end.slopeW, s, e.props.EIy, e.props.GAz, p.Courses[My], p.Courses[Vz], perZ)
		end.v, end.slopeV = carry(end.v, end.slopeV, s, e.props.EIz, e.props.GAy, p.Courses[Mz], p.Courses[Vy], perY)
	}
	return movement{
		u: -end.u, twist: -end.twist,
		w: end.slopeW*e.length - end.w, slopeW: -end.slopeW,
		v: end.slopeV*e.length - end.v, slopeV: -end.slopeV,
	}
}

// carry takes movement and slope (of the section, without shear) across a piece
// of length s.
func carry(w, slope, s, ei, gav float64, moment, shear Polynomial, perFibre float64) (float64, float64) {
	curvature := Polynomial{-perFibre}
	if ei > 0 {
		curvature = curvature.Plus(1/ei, moment)
	}
	turned := curvature.Integral(slope)
	moved := turned
	if gav > 0 {
		moved = moved.Plus(-1/gav, shear)
	}
	return moved.Integral(w).At(s), turned.At(s)
}

// initialStrain sums the strains of the loads.
func initialStrain(loads []SpanLoad) (strain, perY, perZ float64) {
	for _, l := range loads {
		strain += l.Strain
		perY += l.StrainPerY
		perZ += l.StrainPerZ
	}
	return strain, perY, perZ
}

// spread reports whether the load is spread over a length worth the name.
func (l SpanLoad) spread(length float64) bool { return math.Abs(l.To-l.From) > 1e-12*length }

// Between returns the loads on the part of a member between two places, with
// distances measured from the part's start; length is that of the whole member.
// A point load where two parts meet belongs to the one that starts there.
func Between(loads []SpanLoad, from, to, length float64) []SpanLoad {
	var part []SpanLoad
	last := near(to, length, length)
	for _, l := range loads {
		switch {
		case l.Strain != 0 || l.StrainPerY != 0 || l.StrainPerZ != 0:
			part = append(part, l)
		case !l.spread(length):
			starts := near(l.From, from, length) || l.From > from && !near(l.From, to, length)
			if starts && l.From < to || last && near(l.From, to, length) {
				l.From, l.To = l.From-from, l.From-from
				part = append(part, l)
			}
		case l.From < to && l.To > from:
			part = append(part, l.cut(max(l.From, from), min(l.To, to), from))
		}
	}
	return part
}

// cut returns the share of a spread load between two places, with distances
// measured from origin.
func (l SpanLoad) cut(from, to, origin float64) SpanLoad {
	share := l
	intensity := func(a, b, x float64) float64 { return a + (b-a)*(x-l.From)/(l.To-l.From) }
	for i := range 3 {
		share.Force1[i], share.Force2[i] = intensity(l.Force1[i], l.Force2[i], from), intensity(l.Force1[i], l.Force2[i], to)
		share.Moment1[i], share.Moment2[i] = intensity(l.Moment1[i], l.Moment2[i], from), intensity(l.Moment1[i], l.Moment2[i], to)
	}
	share.From, share.To = from-origin, to-origin
	return share
}
