package feature

import (
	"slices"

	"spanwright/lang/resolve"
	"spanwright/lang/syntax"
)

// keyword says what a statement does, with an example.
func (h *hover) keyword(word string) bool {
	k, ok := syntax.KeywordOf(word)
	if !ok {
		return false
	}
	h.page.add("**"+k.Word+"** · "+k.Does, block(k.Form), "For example:", block(k.Example))
	return true
}

// function says what a function returns.
func (h *hover) function(word string) bool {
	functions := resolve.Functions()
	i := slices.IndexFunc(functions, func(f resolve.Function) bool { return f.Name == word })
	if i < 0 {
		return false
	}
	h.page.add("**" + functions[i].Form + "** · " + functions[i].Does)
	return true
}

// option says what a word inside a statement does.
func (h *hover) option(word string) bool {
	meaning, ok := wordMeaning(h.unit.Statement.Kind, word)
	if !ok {
		return false
	}
	h.page.add("**" + word + "** · " + meaning)
	return true
}

// meanings are what the words inside statements mean, by the kind of statement;
// UnknownKind stands for all kinds.
var meanings = map[syntax.Kind]map[string]string{
	syntax.ModelKind: {
		"plane":    "the structure lies in the x–z plane and moves in it: ux, uz, ry.",
		"space":    "the structure moves in all six freedoms.",
		"second":   "second order: equilibrium of the deformed structure.",
		"order":    "second order: equilibrium of the deformed structure.",
		"shear":    "shear flexible: beams yield to shear too (Timoshenko), by the shear areas Avy and Avz.",
		"flexible": "shear flexible: beams yield to shear too (Timoshenko), by the shear areas Avy and Avz.",
		"gravity":  "the acceleration that makes weight of mass; 9.80665 m/s2 where nothing is said.",
	},
	syntax.MaterialKind: {
		"E":         "modulus of elasticity, a stress.",
		"G":         "shear modulus, a stress; or give poisson.",
		"poisson":   "Poisson's ratio; G = E/(2 (1 + ν)).",
		"density":   "mass per volume, for self-weight.",
		"expansion": "thermal expansion for one kelvin.",
		"yield":     "the strength that limits of stress compare with.",
	},
	syntax.SectionKind: {
		"A": "area.", "Iy": "second moment of area about y, the major axis.", "Iz": "second moment of area about z.",
		"It": "St Venant torsion constant.", "Wy": "elastic section modulus about y.", "Wz": "elastic section modulus about z.",
		"Avy": "shear area for shear along y, for models that are shear flexible.", "Avz": "shear area for shear along z, for models that are shear flexible.",
		"depth": "size along z.", "width": "size along y.",
		"rect":  "a solid rectangle: width along y by depth along z.",
		"round": "a solid circle of a diameter.",
		"pipe":  "a round tube: outer diameter by wall.",
		"tube":  "a rectangular tube: depth along z by width along y by wall.",
		"angle": "an angle with sharp corners: leg along z by leg along y by thickness.",
	},
	syntax.BeamKind: memberWords,
	syntax.BarKind:  memberWords,
	syntax.LinkKind: memberWords,
	syntax.SpringKind: {
		"along":  "stiffness along the spring, a force per length.",
		"across": "stiffness across the spring, along its y or z.",
		"about":  "stiffness against turning about an axis of the spring, a moment per radian.",
	},
	syntax.SupportKind: {
		"fixed":  "holds all movements and turns.",
		"pinned": "holds all movements, leaves turns free.",
		"holds":  "holds just the freedoms named: ux uy uz rx ry rz.",
		"spring": "holds a freedom elastically, by a stiffness.",
		"turned": "the support's axes are the global ones, turned by an angle.",
		"up":     "up only: the support pushes and never pulls; the structure can lift off.",
		"only":   "up only: the support pushes and never pulls; the structure can lift off.",
	},
	syntax.MassKind: {
		"inertia": "moment of inertia about an axis, for frequencies.",
	},
	syntax.CaseKind: {
		"permanent":  "acts always: self-weight, build-up. A code takes it with an unfavourable or a favourable factor.",
		"imposed":    "people, furniture, goods, vehicles; the letter is the category of EN 1991-1-1.",
		"snow":       "snow load.",
		"wind":       "wind load. Winds that exclude each other are declared alternate.",
		"thermal":    "changes of temperature.",
		"settlement": "movements of the ground.",
		"accidental": "impact, fire and what else happens rarely.",
		"earthquake": "seismic action.",
	},
	syntax.FamilyKind: {
		"EN1990":          "combinations of EN 1990, Basis of structural design, with recommended values.",
		"ASCE7":           "combinations of ASCE 7, chapter 2.",
		"strength":        "ultimate states: EN 1990 (6.10), or ASCE 7 section 2.3.",
		"characteristic":  "serviceability, irreversible: EN 1990 (6.14).",
		"frequent":        "serviceability, reversible: EN 1990 (6.15).",
		"quasi-permanent": "serviceability, long-term effects: EN 1990 (6.16).",
		"allowable":       "allowable stress design: ASCE 7 section 2.4.",
		"rule":            "picks among the alternatives that the code leaves, as 6.10a/b.",
		"gamma":           "replaces partial factors: gamma permanent 1.35 or 1.0.",
		"psi0":            "replaces the factor of the combination value.",
		"psi1":            "replaces the factor of the frequent value.",
		"psi2":            "replaces the factor of the quasi-permanent value.",
		"xi":              "replaces the reduction of unfavourable permanent loads in 6.10b.",
	},
	syntax.LimitKind: {
		"deflection": "the largest departure of a member from its chord.",
		"drift":      "the horizontal movement of one node relative to another.",
		"stress":     "the elastic normal stress N/A ± My/Wy ± Mz/Wz at the extreme fibres.",
		"axial":      "the axial force of members, tension or compression.",
		"shear":      "the resultant of Vy and Vz.",
		"moment":     "the larger of My and Mz, in size.",
		"reaction":   "what the support does to the structure, along a global axis.",
		"critical":   "critical factor: the lowest elastic buckling factor.",
		"factor":     "critical factor: the lowest elastic buckling factor.",
		"frequency":  "the lowest natural frequency.",
		"length":     "the length of the member that is checked.",
		"yield":      "the yield strength of the member's material.",
		"under":      "the cases, combinations and families that are checked.",
		"all":        "all members.",
	},
	syntax.LoadKind: {
		"self-weight": "the weight of members by density and section, and of masses.",
		"down":        "against global z.",
		"up":          "along global z.",
		"along":       "along an axis: x, y, z, -x, local z, or a vector.",
		"about":       "a moment about an axis, by the right-hand rule.",
		"across":      "a temperature difference between two faces, positive when the + side is warmer.",
		"local":       "the member's own axes: x from first to last node, z upward, y = z × x.",
		"plan":        "on plan: per length of the member's projection on the ground.",
		"elevation":   "on elevation: per length of the member's projection on a vertical plane.",
		"pretension":  "a force that is in the member before it is loaded.",
		"length":      "the member's length.",
		"from":        "where the load begins, from the first node.",
		"at":          "the place of a point load, from the first node.",
		"to":          "where the load ends, from the first node; behind the amount: what it changes to.",
	},
	syntax.PlaceKind: {
		"turned": "turns the part by an angle about a global axis.",
		"at":     "the position of the part's origin.",
	},
	syntax.UnknownKind: {
		"pi": "3.14159…",
	},
}

var memberWords = map[string]string{
	"hinge":       "passes on no bending moment at this end.",
	"release":     "does not pass on the forces named at this end: N Vy Vz T My Mz, in member axes.",
	"joint":       "passes on the forces named by a stiffness: a semi-rigid joint.",
	"roll":        "turns the member's y and z about its x, by the right-hand rule.",
	"offset":      "a rigid piece from the node to the member's end, in global axes.",
	"tension":     "tension only: the member goes slack under compression.",
	"compression": "compression only: the member does not pull.",
	"only":        "the member acts one way only.",
}

// wordMeaning says what a word means in a kind of statement.
func wordMeaning(kind syntax.Kind, word string) (string, bool) {
	if m, ok := meanings[kind][word]; ok {
		return m, true
	}
	m, ok := meanings[syntax.UnknownKind][word]
	return m, ok
}
