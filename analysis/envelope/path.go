package envelope

import (
	"math"

	"spanwright/analysis/element"
)

// Path is one quantity along a member in every basic state. It does not change
// once it is made.
type Path struct {
	// Breaks are the places at which pieces meet, the member's ends included, m
	// from the first end; one more than there are pieces.
	Breaks []float64
	states int
	// degree is that of the highest power in use; −1 where all is zero.
	degree int
	// power and control hold for piece p and state s, at (p·states + s), the
	// coefficients of powers of the distance from the piece's start, and the
	// Bernstein coefficients over the piece.
	power, control []element.Polynomial
}

// NewPath makes a path from its breaks and, for each state, the polynomial of
// each piece in the distance from the piece's start.
func NewPath(breaks []float64, courses [][]element.Polynomial) *Path {
	pieces := len(breaks) - 1
	p := &Path{Breaks: breaks, states: len(courses), power: make([]element.Polynomial, pieces*len(courses))}
	for s, course := range courses {
		for piece := range pieces {
			p.power[piece*p.states+s] = course[piece]
		}
	}
	p.finish()
	return p
}

// Blend returns the sum of paths with the same breaks and states, each times
// its weight.
func Blend(weights []float64, paths ...*Path) *Path {
	first := paths[0]
	p := &Path{Breaks: first.Breaks, states: first.states, power: make([]element.Polynomial, len(first.power))}
	for i, path := range paths {
		if weights[i] == 0 || path.degree < 0 {
			continue
		}
		for k := range p.power {
			p.power[k] = p.power[k].Plus(weights[i], path.power[k])
		}
	}
	p.finish()
	return p
}

// finish works out the degree and the Bernstein coefficients.
func (p *Path) finish() {
	p.degree = -1
	for i := range p.power {
		for k := len(p.power[i]) - 1; k > p.degree; k-- {
			if p.power[i][k] != 0 {
				p.degree = k
			}
		}
	}
	p.control = make([]element.Polynomial, len(p.power))
	for piece := range len(p.Breaks) - 1 {
		length := p.Breaks[piece+1] - p.Breaks[piece]
		for s := range p.states {
			p.control[piece*p.states+s] = bernstein(p.power[piece*p.states+s], p.degree, length)
		}
	}
}

// bernstein returns the Bernstein coefficients, of the given degree, of a
// polynomial over [0, length]: b_j = Σ_i C(j,i)/C(n,i) · a_i lengthⁱ, i ≤ j
// (Farin, chapter 5).
func bernstein(a element.Polynomial, degree int, length float64) (b element.Polynomial) {
	scaled, power := a, 1.0
	for i := range scaled {
		scaled[i] *= power
		power *= length
	}
	for j := 0; j <= degree; j++ {
		for i := 0; i <= j; i++ {
			b[j] += binomial[j][i] / binomial[degree][i] * scaled[i]
		}
	}
	return b
}

// binomial holds C(n, k) up to the degree of a Polynomial.
var binomial = [6][6]float64{{1}, {1, 1}, {1, 2, 1}, {1, 3, 3, 1}, {1, 4, 6, 4, 1}, {1, 5, 10, 10, 5, 1}}

// Zero says that the quantity is zero in all states.
func (p *Path) Zero() bool { return p.degree < 0 }

// At returns the value of a sum at x; at a break that of the piece before it if
// before is set, else that of the piece after it.
func (p *Path) At(sum Sum, x float64, before bool) float64 {
	piece := 0
	for piece+2 < len(p.Breaks) && (p.Breaks[piece+1] < x || !before && p.Breaks[piece+1] == x) {
		piece++
	}
	return p.course(piece, sum).At(x - p.Breaks[piece])
}

// course returns the coefficients of a sum on a piece.
func (p *Path) course(piece int, sum Sum) (c element.Polynomial) {
	return p.summed(p.power, piece, sum)
}

// controls returns the Bernstein coefficients of a sum on a piece.
func (p *Path) controls(piece int, sum Sum) (c element.Polynomial) {
	return p.summed(p.control, piece, sum)
}

func (p *Path) summed(of []element.Polynomial, piece int, sum Sum) (c element.Polynomial) {
	row := of[piece*p.states : (piece+1)*p.states]
	if p.degree <= 2 { // most of them: written out, this is the innermost loop
		var c0, c1, c2 float64
		for _, t := range sum {
			state := &row[t.State]
			c0 += t.Factor * state[0]
			c1 += t.Factor * state[1]
			c2 += t.Factor * state[2]
		}
		c[0], c[1], c[2] = c0, c1, c2
		return c
	}
	for _, t := range sum {
		state := &row[t.State]
		for k := range c {
			c[k] += t.Factor * state[k]
		}
	}
	return c
}

// Sum is a combination of states.
type Sum []Term

// Term is a state with its factor.
type Term struct {
	State  int
	Factor float64
}

// Peak is a value, its place and its combination.
type Peak struct {
	Value float64
	At    float64 // m from the first end
	Sum   int     // index into the sums asked about, or −1 where there are none
}

// nothing is the peak of no sums.
func nothing() Peak { return Peak{Value: math.NaN(), Sum: -1} }
