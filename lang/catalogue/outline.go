package catalogue

import (
	"math"
	"slices"
)

// An outline is a boundary of straight pieces and arcs: the outer loop
// anticlockwise, holes clockwise, so that the material is on the left.
type outline struct{ loops [][]piece }

// piece is a straight line from (y0, z0) to (y1, z1), or, where radius is not 0,
// the arc about (cy, cz) from angle from through the signed angle sweep, which
// has the same ends.
type piece struct {
	y0, z0, y1, z1 float64
	radius         float64
	cy, cz         float64
	from, sweep    float64
}

// corner is a vertex of a polygon, rounded with a radius where that is not 0.
// The radius is a fillet at a re-entrant corner and a rounding at an outer one.
type corner struct{ y, z, radius float64 }

// loop joins corners by straight lines and puts tangent arcs at rounded ones.
func loop(corners ...corner) []piece {
	type rounding struct {
		yIn, zIn, yOut, zOut float64 // where the arc begins and ends
		arc                  *piece
	}
	count := len(corners)
	rounded := make([]rounding, count)
	for i, c := range corners {
		before, after := corners[(i+count-1)%count], corners[(i+1)%count]
		rounded[i] = rounding{c.y, c.z, c.y, c.z, nil}
		if c.radius == 0 {
			continue
		}
		arc := tangentArc(before, c, after)
		rounded[i] = rounding{arc.y0, arc.z0, arc.y1, arc.z1, &arc}
	}
	pieces := make([]piece, 0, 2*count)
	for i, r := range rounded {
		if r.arc != nil {
			pieces = append(pieces, *r.arc)
		}
		next := rounded[(i+1)%count]
		if math.Hypot(next.yIn-r.yOut, next.zIn-r.zOut) > 1e-12 {
			pieces = append(pieces, piece{y0: r.yOut, z0: r.zOut, y1: next.yIn, z1: next.zIn})
		}
	}
	return pieces
}

// tangentArc rounds the corner between two straight lines.
func tangentArc(before, at, after corner) piece {
	inY, inZ := unit(at.y-before.y, at.z-before.z)
	outY, outZ := unit(after.y-at.y, after.z-at.z)
	sweep := math.Atan2(inY*outZ-inZ*outY, inY*outY+inZ*outZ) // left turns are positive
	reach := at.radius * math.Tan(math.Abs(sweep)/2)          // from the corner to the tangent points
	side := math.Copysign(1, sweep)
	p := piece{
		y0: at.y - reach*inY, z0: at.z - reach*inZ,
		y1: at.y + reach*outY, z1: at.z + reach*outZ,
		radius: at.radius, sweep: sweep,
	}
	p.cy, p.cz = p.y0-side*at.radius*inZ, p.z0+side*at.radius*inY
	p.from = math.Atan2(p.z0-p.cz, p.y0-p.cy)
	return p
}

func unit(y, z float64) (float64, float64) {
	length := math.Hypot(y, z)
	return y / length, z / length
}

// rectangle is an upright rectangle about the origin with rounded corners.
func rectangle(width, depth, radius float64) []piece {
	y, z := width/2, depth/2
	return loop(corner{-y, -z, radius}, corner{y, -z, radius}, corner{y, z, radius}, corner{-y, z, radius})
}

// reversed turns an outer loop into a hole.
func reversed(pieces []piece) []piece {
	back := make([]piece, 0, len(pieces))
	for _, p := range slices.Backward(pieces) {
		p.y0, p.z0, p.y1, p.z1 = p.y1, p.z1, p.y0, p.z0
		p.from, p.sweep = p.from+p.sweep, -p.sweep
		back = append(back, p)
	}
	return back
}

// each visits every piece.
func (o outline) each(visit func(*piece)) {
	for _, pieces := range o.loops {
		for i := range pieces {
			visit(&pieces[i])
		}
	}
}

// mapped returns the outline with every piece changed.
func (o outline) mapped(change func(*piece)) outline {
	loops := make([][]piece, len(o.loops))
	for i, pieces := range o.loops {
		loops[i] = slices.Clone(pieces)
	}
	moved := outline{loops}
	moved.each(change)
	return moved
}

// moved shifts the outline.
func (o outline) moved(dy, dz float64) outline {
	return o.mapped(func(p *piece) {
		p.y0, p.y1, p.cy = p.y0+dy, p.y1+dy, p.cy+dy
		p.z0, p.z1, p.cz = p.z0+dz, p.z1+dz, p.cz+dz
	})
}

// turned turns the outline about the origin, anticlockwise.
func (o outline) turned(angle float64) outline {
	sin, cos := math.Sincos(angle)
	turn := func(y, z float64) (float64, float64) { return cos*y - sin*z, sin*y + cos*z }
	return o.mapped(func(p *piece) {
		p.y0, p.z0 = turn(p.y0, p.z0)
		p.y1, p.z1 = turn(p.y1, p.z1)
		p.cy, p.cz = turn(p.cy, p.cz)
		p.from += angle
	})
}

// lying turns the outline by a quarter, exactly: what was along −y is along z.
func (o outline) lying() outline {
	return o.mapped(func(p *piece) {
		p.y0, p.z0 = p.z0, -p.y0
		p.y1, p.z1 = p.z1, -p.y1
		p.cy, p.cz = p.cz, -p.cy
		p.from -= math.Pi / 2
	})
}

// at returns the place at a share t of the piece, from 0 to 1.
func (p *piece) at(t float64) (y, z float64) {
	if p.radius == 0 {
		return p.y0 + t*(p.y1-p.y0), p.z0 + t*(p.z1-p.z0)
	}
	sin, cos := math.Sincos(p.from + t*p.sweep)
	return p.cy + p.radius*cos, p.cz + p.radius*sin
}

// extremes returns the bounds of the outline.
func (o outline) extremes() (yMin, yMax, zMin, zMax float64) {
	yMin, zMin = math.Inf(1), math.Inf(1)
	yMax, zMax = math.Inf(-1), math.Inf(-1)
	include := func(y, z float64) {
		yMin, yMax = min(yMin, y), max(yMax, y)
		zMin, zMax = min(zMin, z), max(zMax, z)
	}
	o.each(func(p *piece) {
		include(p.y0, p.z0)
		include(p.y1, p.z1)
		if p.radius == 0 {
			return
		}
		low, high := min(p.from, p.from+p.sweep), max(p.from, p.from+p.sweep)
		for quarter := math.Ceil(low / (math.Pi / 2)); quarter*math.Pi/2 < high; quarter++ {
			include(p.at((quarter*math.Pi/2 - p.from) / p.sweep))
		}
	})
	return yMin, yMax, zMin, zMax
}

// polygons replaces arcs by chords.
func (o outline) polygons(perQuarter int) [][]Point {
	var all [][]Point
	for _, pieces := range o.loops {
		var points []Point
		for i := range pieces {
			p := &pieces[i]
			chords := 1
			if p.radius != 0 {
				chords = max(1, int(math.Ceil(math.Abs(p.sweep)/(math.Pi/2)*float64(perQuarter)-1e-9)))
			}
			for k := range chords {
				y, z := p.at(float64(k) / float64(chords))
				points = append(points, Point{y, z})
			}
		}
		all = append(all, points)
	}
	return all
}
