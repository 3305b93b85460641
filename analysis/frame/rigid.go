package frame

// vector6 is a movement (ux, uy, uz, rx, ry, rz) or a force (Fx … Mz).
type vector6 = [6]float64

// carried returns the movement of a point at an arm from the reference point of
// a rigid body that moves by q: u + θ × arm.
func carried(q vector6, arm [3]float64) vector6 {
	q[0] += q[4]*arm[2] - q[5]*arm[1]
	q[1] += q[5]*arm[0] - q[3]*arm[2]
	q[2] += q[3]*arm[1] - q[4]*arm[0]
	return q
}

// brought returns a force at an arm from a point as force and moment at the
// point: F, M + arm × F. It is the transpose of carried.
func brought(f vector6, arm [3]float64) vector6 {
	f[3] += arm[1]*f[2] - arm[2]*f[1]
	f[4] += arm[2]*f[0] - arm[0]*f[2]
	f[5] += arm[0]*f[1] - arm[1]*f[0]
	return f
}

// toLocal turns a movement or force from global axes into axes given as rows.
func toLocal(axes *[3][3]float64, v vector6) (local vector6) {
	for i := range 3 {
		for j := range 3 {
			local[i] += axes[i][j] * v[j]
			local[3+i] += axes[i][j] * v[3+j]
		}
	}
	return local
}

// toGlobal turns a movement or force from axes given as rows into global axes.
func toGlobal(axes *[3][3]float64, v vector6) (global vector6) {
	for i := range 3 {
		for j := range 3 {
			global[j] += axes[i][j] * v[i]
			global[3+j] += axes[i][j] * v[3+i]
		}
	}
	return global
}

func dot6(a, b *vector6) float64 {
	return a[0]*b[0] + a[1]*b[1] + a[2]*b[2] + a[3]*b[3] + a[4]*b[4] + a[5]*b[5]
}

func minus(a, b [3]float64) [3]float64 { return [3]float64{a[0] - b[0], a[1] - b[1], a[2] - b[2]} }

func plus(a, b [3]float64) [3]float64 { return [3]float64{a[0] + b[0], a[1] + b[1], a[2] + b[2]} }
