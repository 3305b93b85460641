package syntax

import (
	"testing"

	"github.com/stretchr/testify/assert"
	"github.com/stretchr/testify/require"

	"spanwright/lang/source"
)

const portal = `# Boathouse, typical portal frame.
model "Boathouse portal" plane

let span  = 12 m
let eaves = 4.2 m
let bay   = 5 m

material steel = S275
section column = HEB 200 of steel
section rafter = IPE 300 of steel
section rod    = round 24 mm of steel

node A = (0, 0) m
node B = A + (0 m, eaves)
node C = A + (span/2, eaves + 1.5 m)
node D = A + (span, eaves)
node E = A + (span, 0 m)

beam c1 = A -> B of column
beam r1 = B -> C of rafter
beam r2 = C -> D of rafter, hinge at C
beam c2 = E -> D of column
bar  t1 = B -> D of rod, tension only

support A pinned
support E pinned

case G permanent "Self-weight and roof build-up" {
    self-weight
    r1, r2: 0.35 kN/m2 * bay down
}
case S snow "Snow, drifted on the lee slope" {
    r1: 0.6 kN/m2 * bay down on plan
    r2 from 0 m to 3 m: 4.5 kN/m to 3 kN/m down on plan
}
case W wind {
    c1: 0.7 kN/m2 * bay along x
    r2: -0.4 kN/m2 * bay along local z
}

family ULS by EN1990 strength
family SLS by EN1990 characteristic

limit deflection of r1 <= length/250 under SLS
limit reaction Fz at A >= 0 kN under ULS
limit stress of rafter <= yield under ULS
`

func TestTheReferenceModelIsRead(t *testing.T) {
	tree := Parse(source.New("boathouse.span", portal))
	for _, d := range tree.Diagnostics() {
		t.Errorf("%v: %s [%s]", tree.File.Position(d.Subject.Start), d.Summary, d.Name)
	}
	require.Len(t, tree.Units, 37)
}

// Every form of the language reference, a line each.
func TestEveryFormIsRead(t *testing.T) {
	for _, line := range []string{
		`model "T" space, second order, shear flexible, gravity 9.81 m/s2`,
		`show kN, m, mm, kNm, MPa, deg`,
		`show kN, kN/m`,
		`let a = -0.5 (a + b)^2 / sqrt(2) + atan2(1 m, 2 m)`,
		`let a = 12e-6 /K`,
		`let b = 1.2 kip/ft`,
		`let b = 5 %`,
		`material m = { E 210 GPa, G 81 GPa, density 7850 kg/m3, expansion 12e-6 /K, yield 275 MPa }`,
		"material m = {\n    E 210 GPa,\n    poisson 0.3,\n}",
		`material c = C30/37`,
		`section s = UB 406x178x54 of steel`,
		`section s = rect 200 x 400 mm of timber`,
		`section s = rect b x 2 h of timber`,
		`section s = pipe 114.3 x 5 mm of steel`,
		`section s = tube 100x60x4 mm of steel`,
		`section s = angle 80 x 80 x 8 mm of steel`,
		`section s = { A 20 cm2, Iy 300 cm4 } of steel`,
		`node N1 = (A + B)/2`,
		`node N1 = A + 0.3 (B - A)`,
		`node F = F1.B + (0, 0, 3.2) m`,
		`beam b = A -> P -> Q -> B of s, hinge at A, release My at B, joint My at B 12 MNm/rad, roll 30 deg`,
		`beam b = A -> B of s, offset A (0, 0, -0.2) m, offset B (0, 0, 0.1) m, compression only`,
		`beam b = A -> B of s, release My Mz at B`,
		`link k = A -> B`,
		`spring k = A -> B, along 12 kN/mm, across y 3 kN/mm, about z 4 kNm/rad`,
		`support A fixed`,
		`support A holds ux uz ry`,
		`support A holds ux, spring uz 12 kN/mm, turned 30 deg`,
		`support A pinned, turned 30 deg about y, turned 5 deg about z`,
		`support A holds uz, up only`,
		`mass C 500 kg, inertia 12 kg*m2 about y`,
		`group g = r1, r2, other_group`,
		`alternate W1, W2`,
		`combination ULS.a = 1.35 G + 1.5 S`,
		`combination C = 1.35 (G + H) - 0.9 * W`,
		`family QP by EN1990 quasi-permanent`,
		`family ULS by EN1990 strength, rule 6.10a/b, gamma permanent 1.35 or 1.0, psi0 imposed H 0.0, psi1 W 0.2, xi 0.85`,
		`limit ux at B <= 20 mm under SLS`,
		`limit drift of B over A <= 4.2 m/300 under SLS, SLS2`,
		`limit critical factor >= 10 under ULS`,
		`limit frequency >= 3 Hz`,
		`limit stress of all <= yield under ULS`,
		`use "path/common.span"`,
		`place F1 = frame(12 m, 4.2 m) at (0, 0, 0) m, turned 90 deg`,
		`case Q imposed A "Crowd" { b: 3 kN/m down }`,
		"case Q imposed {\n b at length/2: 3 kN down\n b: 4 kNm about y\n A: 3 kN along (1, 0, 1)\n A: 5 mm down\n A: 1 mrad about y\n}",
		"case T thermal {\n b: 20 K\n b: 15 K across z\n b: 40 K/m across y\n b: 3 mm\n b: 25 kN pretension\n b: 25 kN, pretension\n}",
		"case T wind {\n b, c: 0.3 kN/m along -x on elevation\n b: 3 kN along local -z\n b: 2 kN about local y\n 1.1 self-weight of g\n}",
		"part frame(span, eaves) {\n node A = (0, 0) m\n case G permanent {\n self-weight\n }\n}",
	} {
		tree := Parse(source.New("form.span", line))
		for _, d := range tree.Diagnostics() {
			t.Errorf("%s\n    %s [%s]", line, d.Summary, d.Name)
		}
	}
}

func TestBrokenLinesGiveOneMessageEach(t *testing.T) {
	for line, want := range map[string]string{
		`beem r1 = A -> B of s`:                  "unknown-statement",
		`beam r1 = A B of s`:                     "missing-arrow",
		`beam r1 = A of s`:                       "missing-arrow",
		`beam r1 A -> B of s`:                    "missing-equals",
		`beam = A -> B of s`:                     "missing-name",
		`beam r1 = A -> B`:                       "missing-section",
		`beam r1 = A -> B of s, hinge`:           "incomplete-option",
		`beam r1 = A -> B of s, blue`:            "unknown-option",
		`let a = 4,5 m`:                          "decimal-comma",
		`let a = (3 m + 4 m`:                     "unclosed-bracket",
		`let a = 3 m +`:                          "missing-operand",
		`let a = 3 m)`:                           "stray-bracket",
		`let a =`:                                "incomplete-statement",
		`model “Boat” plane`:                     "smart-quote",
		`model "Boat`:                            "unclosed-text",
		`model "Boat"`:                           "missing-space",
		`section s = IPE 300`:                    "missing-material",
		`support A glued`:                        "unknown-option",
		`case G { }`:                             "missing-kind",
		`case G permanent`:                       "missing-brace",
		"case G permanent {\n r1 3 kN/m down\n}": "missing-colon",
		"case G permanent {\n r1: 3 kN/m down":   "unclosed-block",
		"case G permanent {\n self-weight\nnode A = (0, 0) m": "unclosed-block",
		"r1: 3 kN/m down":    "load-outside-case",
		"}":                  "stray-brace",
		"let a = 3 ; ":       "stray-character",
		"limit ux at B 3 mm": "missing-comparison",
	} {
		diagnostics := Parse(source.New("broken.span", line)).Diagnostics()
		if assert.Len(t, diagnostics, 1, line) {
			assert.Equal(t, want, string(diagnostics[0].Name), "%s: %s", line, diagnostics[0].Summary)
			assert.LessOrEqual(t, diagnostics[0].Subject.End, len(line))
		}
	}
}
