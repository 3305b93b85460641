package sparse

import "golang.org/x/sys/cpu"

// hasKernel reports whether the processor knows the instructions of kernel6x8.
func hasKernel() bool { return cpu.X86.HasAVX2 && cpu.X86.HasFMA }

// kernel6x8 computes c, 6 × 8 by rows, as the sum over k ≥ 1 of a column of 6
// numbers of a times a row of 8 numbers of b.
//
//go:noescape
func kernel6x8(k int, a, b, c *float64)
