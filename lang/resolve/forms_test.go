package resolve

import (
	"strings"
	"testing"

	"github.com/stretchr/testify/assert"

	"spanwright/lang/diagnostic"
	"spanwright/lang/source"
	"spanwright/lang/syntax"
)

// workbench is a plane model with something of everything, for the forms of the
// language to be added to.
const workbench = `model "Forms" plane, gravity 9.81 m/s2
show kN, m, mm, kNm, MPa, deg
let span = 12 m
let eaves = 4.2 m
let bay = 5 m
material steel = S275
section plank = rect 200 x 400 mm of steel
node A = (0, 0) m
node B = A + (0 m, eaves)
node C = A + (span/2, eaves + 1.5 m)
node D = A + (span, eaves)
node E = A + (span, 0 m)
beam c1 = A -> B of plank
beam r1 = B -> C of plank
beam r2 = C -> D of plank
beam c2 = E -> D of plank
bar t1 = B -> D of plank
support A pinned
support E pinned
case G permanent {
    self-weight
}
case Q imposed A {
    r1: 1 kN/m down
}
case W1 wind {
    c1: 1 kN/m along x
}
case W2 wind {
    c2: 1 kN/m along -x
}
family ULS by EN1990 strength
family SLS by EN1990 characteristic
`

// spaceBench is the same in space.
const spaceBench = `model "Forms in space" space, shear flexible
material steel = S275
section plank = rect 200 x 400 mm of steel
node A = (0, 0, 0) m
node B = (4, 0, 0) m
node C = (4, 3, 1) m
beam r1 = A -> B of plank
beam r2 = B -> C of plank
support A fixed
case G permanent {
    self-weight
}
`

// planeForms are statements as the language reference writes them, one to a
// paragraph.
const planeForms = `
let rafter_length = sqrt((span/2)^2 + (1.5 m)^2)
let many = 4.2 m + 24 ft + 12 in
let factor = 12e-6 /K * 30 K + 5 %
let slope = atan2(1.5 m, span/2) + 30 deg
let line = 1.2 kip/ft + 0.35 kN/m2 * bay
let half = 0.5 (span + bay)
let product = 12 kN/m * 2
let normal = 3 mm^2 + 2 mm² + 1 mm2
let joined = 3 kN*m + 3 kN·m + 3 kN.m + 3 kNm
let several = min(1, 2, 3) + max(1, 2) + abs(-1) + hypot(3, 4) + floor(1.5) + ceil(1.5) + round(1.5) + sin(30 deg) + cos(pi) + tan(0) + asin(1) + acos(1) + atan(1)

material own = { E 210 GPa, G 81 GPa, density 7850 kg/m3, expansion 12e-6 /K, yield 235 MPa }
section s1 = IPE 300 of own
section s2 = round 24 mm of own
section s3 = pipe 114.3 x 5 mm of own
section s4 = tube 100 x 60 x 4 mm of own
section s5 = angle 80 x 80 x 8 mm of own
section s6 = { A 53.8 cm2, Iy 8360 cm4, Wy 557 cm3, depth 300 mm } of own
node P = (A + B)/2 + (-2 m, 0 m)
node Q = P + (0 m, 1 m)
node R = Q + (0 m, 1 m)
node S = R + (0 m, 1 m)
node T = S + (0 m, 1 m)
node U = T + (0 m, 1 m)
node V = U + (0 m, 1 m)
support P fixed
beam b1 = P -> Q of s1
beam b2 = Q -> R of s2
beam b3 = R -> S of s3
beam b4 = S -> T of s4
bar b5 = T -> U of s5
beam b6 = U -> V of s6

material poissonic = { E 210 GPa, poisson 0.3, density 7850 kg/m3 }
section s1 = rect 100 x 200 mm of poissonic
node P = (20, 0) m
beam b1 = E -> P of s1

node P = A + 0.3 (B - A) + (-1 m, 0 m)
link k = A -> P

node P = (14, 0) m
node Q = (16, 0) m
node R = (18, 0) m
beam through = E -> P -> Q -> R of plank, hinge at E, tension only
beam options = R -> C of plank, release My at R, offset C (0, -0.2) m, roll 90 deg
support R holds ux uz ry

node P = (14, 0) m
beam semi = E -> P of plank, joint My at P 12 MNm/rad
bar slack = D -> P of plank, compression only
support P spring uz 12 kN/mm, up only

node P = (14, 1) m
spring k1 = E -> P, along 12 kN/mm, across z 3 kN/mm, about y 5 MNm/rad
support P holds ux, spring uz 12 kN/mm, turned 30 deg

mass C 500 kg, inertia 12 kg*m2 about y

group roof = r1, r2
group frame = c1, roof, c2

case S snow "Snow, drifted on the lee slope" {
    r1: 0.6 kN/m2 * bay down on plan
    r2 from 0 m to 3 m: 4.5 kN/m to 3 kN/m down on plan
    r2 from 3 m to length: 3 kN/m down on plan
    c1: 1 kN/m along x on elevation
    r1, r2: 0.35 kN/m2 * bay down
    r2: -0.4 kN/m2 * bay along local z
    C: 4 kN down
    C: 4 kNm about y
    r1 at 2 m: 3 kN along (1, -1)
    r1 at 2 m: 3 kNm about y
    r1: 0.5 kNm/m about y
    C: 2 kN up
}

case T thermal {
    r1: 20 K
    r1: 10 K across z
    r2: 25 K/m across z
    t1: 3 mm
    t1: 12 kN pretension
}

case M settlement {
    A: 5 mm down
    E: 3 mm along x
}

case G2 permanent {
    1.1 self-weight of t1
}

case X accidental {
    C: 1 kN along x
}

case Y earthquake {
    C: 1 kN along x
}

alternate W1, W2

combination U = 1.35 G + 1.5 Q
combination ULS.a = 1.35 G + 1.5 (Q + 0.6 W1)

family quasi by EN1990 quasi-permanent
family often by EN1990 frequent

family strong by ASCE7 strength
family allowed by ASCE7 allowable

limit deflection of r1 <= length/250 under SLS
limit ux at B <= eaves/100 under SLS
limit ry at C <= 5 mrad under SLS, G
limit drift of B over A <= 14 mm under SLS
limit stress of plank <= yield under ULS
limit stress of all <= 0.9 yield under ULS
limit axial of t1 <= 100 kN under ULS
limit shear of r1 <= 120 kN under ULS
limit moment of r1 <= 80 kNm under ULS
limit reaction Fz at A >= 0 kN under ULS

part frame(width, height) {
    node foot = (0, 0) m
    node top = (0 m, height)
    node far = (width, height)
    beam post = foot -> top of plank
    beam beam_over = top -> far of plank
    support foot fixed
}
place F1 = frame(12 m, 4.2 m) at (20, 0) m
place F2 = frame(3 m, 2 m) at (40, 0) m, turned 90 deg
node tip = F1.far + (1 m, 0 m)
beam tail = F1.far -> tip of plank
`

const spaceForms = `
node P = (4, 0, 3) m
beam b = B -> P of plank, roll 30 deg, offset P (0, 0, -0.2) m, release T My at P
support P holds ux uy, turned 30 deg about z, turned 10 deg about x

node P = (0, 3, 0) m
spring k = A -> P, along 12 kN/mm, across y 3 kN/mm, about x 5 MNm/rad
support P pinned

case W wind {
    r1: 1 kN/m along y
    r1: 1 kN/m along local y
    r1 at 1 m: 3 kNm about local z
    C: 1 kN along (1, 0, 1)
    C: 2 kNm about x
}

mass C 500 kg, inertia 12 kg*m2 about z

part leg(height) {
    node foot = (0, 0, 0) m
    node head = (0 m, 0 m, height)
    beam post = foot -> head of plank
    support foot fixed
}
place L1 = leg(3 m) at (0, 9, 0) m, turned 90 deg about z
`

// TestFormsOfTheLanguage adds each paragraph of forms to a model, and wants no
// mistake to be found in it.
func TestFormsOfTheLanguage(t *testing.T) {
	for _, set := range []struct{ model, forms string }{{workbench, planeForms}, {spaceBench, spaceForms}} {
		for _, form := range strings.Split(strings.TrimSpace(set.forms), "\n\n") {
			r := Model(syntax.Parse(source.New("/forms.span", set.model+form+"\n")), nothing{})
			for _, d := range r.Diagnostics {
				if d.Severity == diagnostic.Error || d.Severity == diagnostic.Warning && d.Name != "duplicate-member" {
					assert.Fail(t, "a form is refused", "%s\n%s: %s", form, d.Name, d.Summary)
				}
			}
			assert.True(t, r.Complete, form)
		}
	}
}
