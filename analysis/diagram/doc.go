// Package diagram draws what happens along a member: as text for hovers
// ([Text]), and as a small picture ([Picture]). Both take a [Course], plain data
// that does not know where it came from.
//
// Text draws sizes with block characters, positive values in a row marked +,
// negative ones in a row marked −, both to one scale, with the extremes and
// their places beside the rows:
//
//	My + B       ▁▂▃▄▄▄▃▂▁   C  41 kNm at 3.72 m
//	   − B ▇▆▄▂▁             C  −86.3 kNm at B
//
// The picture draws bending moments on the tension side and movements to the
// side they go to.
//
// What does not live here: results (analysis), and drawings of the whole
// structure.
package diagram
