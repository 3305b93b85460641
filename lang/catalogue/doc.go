// Package catalogue holds the standard cross-sections and materials of the
// trade, and computes the properties of cross-sections from their dimensions.
//
// Tables hold only what a standard lays down: dimensions and, for a check, the
// mass per metre that it prints. Everything else is computed:
//
//   - A shape draws its boundary from straight lines and arcs (outline.go).
//     Area, centroid and second moments are boundary integrals by Green's
//     theorem, root radii, toe radii and sloping flanges included (moments.go);
//     plastic moduli are integrals over the halves beside the equal-area axis,
//     and elastic shear areas come from Zhuravskii's shear stresses (halves.go).
//   - Torsion and warping constants follow the published formulas of each kind
//     of section (torsion.go, channel.go).
//
// Find and Lookup answer for a series and size in any usual spelling
// ("IPE300", "HE 200 B", "W12x26"); Rect, Round, Pipe, Tube and Angle build the
// shapes of the language; FindGrade answers for a material.
//
// # Axes
//
// y–y is the major axis of an upright I, z points up, as in EN 1993-1-1. The
// boundary of a section is given about its centroid. A channel's web is on the
// −y side; an angle's corner is at −y, −z, so its legs point to +y and +z, and
// its y and z are parallel to the legs as in the tables of EN 10056-1. Iy and Iz
// of an angle are therefore not principal values. Properties.Iyz, Iu, Iv and
// Alpha tell the rest, and Section.Principal gives the same section about its
// principal axes. An analysis that takes Iy and Iz alone bends an angle about
// axes parallel to its legs, as if it were held against moving sideways.
//
// # Two kinds of shear area
//
// Avy and Avz are those of EN 1993-1-1, 6.2.6(3), for resistance: what section
// tables print. Asy and Asz are elastic: shear force over G times mean shear
// strain, 5/6 of the area for a rectangle. A shear-flexible analysis takes Asy
// and Asz. For an I the two differ by about a quarter: 25.7 and 20.6 cm2 for an
// IPE 300. Where EN 1993-1-1 gives no area for resistance (solid shapes,
// angles), Avy and Avz are the elastic ones.
//
// # Units
//
// Everything is in SI: m, m2, m4, m6, kg/m, Pa, kg/m3, 1/K. The tables in the
// source are in mm, inches and kg/m as the standards print them.
//
// # Sources
//
// Each table names its standard. Rows were written from memory of the standard
// and are checked against the masses that it prints; "from memory" beside a
// table says so.
//
// What does not live here: reading the language (lang/syntax), the sections of a
// particular model (lang/model), stresses and limits (analysis/limit).
package catalogue
