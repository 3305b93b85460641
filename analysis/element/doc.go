// Package element knows one straight prismatic member on its own: its
// stiffness, the forces that hold its ends under loads, and the exact course of
// forces and movements between the ends.
//
// # Axes, order and signs
//
// Everything is in the member's own axes: x from end 1 to end 2, y, z. End
// movements and end forces are vectors of twelve numbers,
//
//	ux uy uz rx ry rz at end 1, ux uy uz rx ry rz at end 2
//	Fx Fy Fz Mx My Mz at end 1, Fx Fy Fz Mx My Mz at end 2
//
// right-handed; end forces are what the nodes do to the member. Matrices are
// 12 × 12, row-major. Section forces between the ends have the signs of the
// language: N > 0 is tension, My > 0 puts tension on the −z side, Mz > 0 puts
// tension on the −y side, Vz = dMy/dx and Vy = dMz/dx where no moment is
// applied, T > 0 by the right-hand rule on the face that looks along +x. So, at
// end 1, N = −Fx, Vy = Fy, Vz = Fz, T = −Mx, My = My, Mz = −Mz.
//
// # Theory
//
// Small movements, linear elastic material. Bending is Bernoulli–Euler where
// the shear stiffness is zero ("no shear deformation") and Timoshenko where it
// is given; torsion is St Venant's. Stiffness, end forces and the curves are
// the exact solutions of the differential equations, so no mesh is needed.
//
// What does not live here: nodes, global axes, rigid offsets, assembly
// (analysis/frame), and cross-sections (lang/catalogue).
package element
