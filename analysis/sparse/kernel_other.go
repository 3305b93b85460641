//go:build !amd64

package sparse

// hasKernel reports that there is no kernel for this kind of processor.
func hasKernel() bool { return false }

func kernel6x8(int, *float64, *float64, *float64) { panic("sparse: no kernel") }
