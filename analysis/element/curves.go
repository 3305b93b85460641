package element

import "math"

// Component is one section force or movement along a member.
type Component int

// The section forces, and the movements in member axes.
const (
	N Component = iota
	Vy
	Vz
	T
	My
	Mz
	U      // along x, m
	V      // along y, m
	W      // along z, m
	ThetaX // rad
	ThetaY
	ThetaZ
	// BentV and BentW are the departures along y and z from the chord, the
	// straight line between the member's ends, m.
	BentV
	BentW
	components
)

// Piece is the curve of everything between two breaks, as polynomials of the
// distance from the piece's start.
type Piece struct {
	From, To float64 // m from end 1
	Courses  [components]Polynomial
}

// Curves are the exact courses of section forces and movements of one element.
type Curves struct {
	Pieces []Piece
	// BentYKnown and BentZKnown say of y and z whether the departure from the chord could be
	// worked out: a bar across which a load acts, without bending stiffness,
	// bends by nobody knows how much.
	BentYKnown, BentZKnown bool
}

// Recover returns the curves along the element for node movements d and the
// loads on its length. breaks are the places at which pieces meet; nil stands
// for [Element.Breaks] of the loads. Given breaks must hold those and may hold
// more, so that the curves of several cases can be added piece by piece.
func (e *Element) Recover(d Vector, loads []SpanLoad, breaks []float64) *Curves {
	if breaks == nil {
		breaks = e.Breaks(loads)
	}
	if e.kind == spring {
		return e.recoverSpring(d, breaks)
	}
	fast := e.fastFixedEnd(loads, breaks)
	ends := e.memberEnds(d, fast)
	forces := e.naturalForces(d)
	for i, f := range e.releaseFixedEnd(fast) {
		forces[i] += f
	}
	c := &Curves{Pieces: e.statics(forces, loads, breaks), BentYKnown: true, BentZKnown: true}
	strain, perY, perZ := initialStrain(loads)
	e.integrateAxially(c, ends, strain)
	e.integrateTwist(c, ends)
	c.BentZKnown = e.integrateAcross(c, ends, plane{My, Vz, W, BentW, ThetaY, 2, -1}, e.props.EIy, e.props.GAz, perZ)
	c.BentYKnown = e.integrateAcross(c, ends, plane{Mz, Vy, V, BentV, ThetaZ, 1, +1}, e.props.EIz, e.props.GAy, perY)
	return c
}

// statics returns the section forces along the member from the end forces at
// end 1 and the loads: dN/dx = −qx, dVy/dx = qy, dVz/dx = qz, dT/dx = −mx,
// dMy/dx = Vz + my, dMz/dx = Vy − mz, with steps of the same signs at point
// loads. A point load right at end 2 acts outside the last section.
func (e *Element) statics(ends Vector, loads []SpanLoad, breaks []float64) []Piece {
	n, vy, vz := -ends[0], ends[1], ends[2]
	t, my, mz := -ends[3], ends[4], -ends[5]
	step := func(l SpanLoad) {
		n -= l.Force1[0]
		vy += l.Force1[1]
		vz += l.Force1[2]
		t -= l.Moment1[0]
		my += l.Moment1[1]
		mz -= l.Moment1[2]
	}
	pieces := make([]Piece, len(breaks)-1)
	for i := range pieces {
		from, to := breaks[i], breaks[i+1]
		length := to - from
		p := &pieces[i]
		p.From, p.To = from, to
		var q, m [3]Polynomial
		for _, l := range loads {
			if !l.spread(e.length) {
				if near(l.From, from, e.length) {
					step(l)
				}
				continue
			}
			addSpread(&q, &m, l, from, to, e.length)
		}
		p.Courses[N] = q[0].Times(-1).Integral(n)
		p.Courses[Vy] = q[1].Integral(vy)
		p.Courses[Vz] = q[2].Integral(vz)
		p.Courses[T] = m[0].Times(-1).Integral(t)
		p.Courses[My] = p.Courses[Vz].Plus(1, m[1]).Integral(my)
		p.Courses[Mz] = p.Courses[Vy].Plus(-1, m[2]).Integral(mz)
		n, vy, vz = p.Courses[N].At(length), p.Courses[Vy].At(length), p.Courses[Vz].At(length)
		t, my, mz = p.Courses[T].At(length), p.Courses[My].At(length), p.Courses[Mz].At(length)
	}
	return pieces
}

// near reports whether two places are the same but for rounding.
func near(a, b, length float64) bool { return math.Abs(a-b) <= 1e-12*length }

// addSpread adds the intensities of a spread load on the piece from … to, as
// polynomials of the distance from its start.
func addSpread(q, m *[3]Polynomial, l SpanLoad, from, to, length float64) {
	tiny := 1e-12 * length
	if l.From > from+tiny || l.To < to-tiny {
		return
	}
	span := l.To - l.From
	for i := range 3 {
		slope := (l.Force2[i] - l.Force1[i]) / span
		q[i][0] += l.Force1[i] + slope*(from-l.From)
		q[i][1] += slope
		slope = (l.Moment2[i] - l.Moment1[i]) / span
		m[i][0] += l.Moment1[i] + slope*(from-l.From)
		m[i][1] += slope
	}
}

// integrateAxially fills U: the straight course between the ends, and on it the
// departure that the curve of the strain gives.
func (e *Element) integrateAxially(c *Curves, ends Vector, strain float64) {
	e.integrate(c, ends[0], ends[6], U, N, e.props.EA, strain)
}

// integrateTwist fills ThetaX. A bar does not twist of itself.
func (e *Element) integrateTwist(c *Curves, ends Vector) {
	git := e.props.GIt
	if e.kind == bar {
		git = 0
	}
	e.integrate(c, ends[3], ends[9], ThetaX, T, git, 0)
}

// integrate fills the curve of a movement whose slope is force/stiffness +
// free, from its value at end 1 to that at end 2.
func (e *Element) integrate(c *Curves, first, last float64, movement, force Component, stiffness, free float64) {
	value := 0.0
	for i := range c.Pieces {
		p := &c.Pieces[i]
		slope := Polynomial{free}
		if stiffness > 0 {
			slope = slope.Plus(1/stiffness, p.Courses[force])
		}
		p.Courses[movement] = slope.Integral(value)
		value = p.Courses[movement].At(p.To - p.From)
	}
	// The strain's own elongation equals last − first but for rounding, and not
	// at all where a stiffness is missing: the straight line takes up the rest.
	tilt := (last - first - value) / e.length
	for i := range c.Pieces {
		p := &c.Pieces[i]
		p.Courses[movement][0] += first + tilt*p.From
		p.Courses[movement][1] += tilt
	}
}

// plane names what belongs together in bending one way: the curves, the end
// freedom across the member, and +1 where a positive turn tilts the member
// toward positive movement, else −1.
type plane struct {
	moment, shear, moved, bent, turned Component
	freedom                            int
	turn                               float64
}

// integrateAcross fills the movement across the member, its departure from the
// chord and the turn of the sections, and reports whether they are known. The
// departure comes from the moments alone, with both its ends at zero, so that it
// keeps its digits however far the member has moved as a whole.
func (e *Element) integrateAcross(c *Curves, ends Vector, pl plane, ei, gav, perFibre float64) bool {
	known := true
	w, slope := 0.0, 0.0
	for i := range c.Pieces {
		p := &c.Pieces[i]
		moment, shear := p.Courses[pl.moment], p.Courses[pl.shear]
		curvature := Polynomial{-perFibre}
		switch {
		case ei > 0:
			curvature = curvature.Plus(1/ei, moment)
		case moment != Polynomial{}:
			known = false
		}
		turned := curvature.Integral(slope)
		along := turned
		if gav > 0 {
			along = along.Plus(-1/gav, shear)
		}
		length := p.To - p.From
		p.Courses[pl.turned] = turned
		p.Courses[pl.bent] = along.Integral(w)
		w, slope = p.Courses[pl.bent].At(length), turned.At(length)
	}
	back := -w / e.length
	first, chord := ends[pl.freedom], (ends[pl.freedom+6]-ends[pl.freedom])/e.length
	for i := range c.Pieces {
		p := &c.Pieces[i]
		p.Courses[pl.bent][0] += back * p.From
		p.Courses[pl.bent][1] += back
		moved := p.Courses[pl.bent]
		moved[0] += first + chord*p.From
		moved[1] += chord
		p.Courses[pl.moved] = moved
		turned := p.Courses[pl.turned]
		turned[0] += back + chord
		p.Courses[pl.turned] = turned.Times(pl.turn)
	}
	return known
}

// recoverSpring returns the section forces of a spring, constant but for the
// moments of the shears about its middle, and movements on the straight line
// between the nodes.
func (e *Element) recoverSpring(d Vector, breaks []float64) *Curves {
	c := &Curves{Pieces: e.statics(e.naturalForces(d), nil, breaks), BentYKnown: true, BentZKnown: true}
	for i := range c.Pieces {
		p := &c.Pieces[i]
		for f := range 6 {
			if e.length > 0 {
				slope := (d[6+f] - d[f]) / e.length
				p.Courses[U+Component(f)] = Polynomial{d[f] + slope*p.From, slope}
			}
		}
	}
	return c
}
