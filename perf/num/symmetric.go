package num

import "math"

// Cholesky fills l, n rows of n, with the lower triangle whose product with its transpose is the symmetric a; only the lower triangle of
// a is read, and l may be a. A direction without variance gives a column of zeros, so a positive semidefinite matrix
// is taken; what is negative beyond rounding, or not finite, is reported as false.
func Cholesky(n int, a, l []float64) bool {
	for j := range n {
		d := a[j*n+j]
		scale := d
		for k := range j {
			d -= l[j*n+k] * l[j*n+k]
		}
		if math.IsNaN(d) || math.IsInf(d, 0) || d < -1e-9*math.Abs(scale) {
			return false
		}
		flat := !(d > 4*float64(n)*epsilon*scale)
		if flat {
			d = 0
		}
		d = math.Sqrt(d)
		for i := j + 1; i < n; i++ {
			s := a[i*n+j]
			for k := range j {
				s -= l[i*n+k] * l[j*n+k]
			}
			if flat {
				s = 0
			} else {
				s /= d
			}
			l[i*n+j] = s
		}
		l[j*n+j] = d
		for i := range j {
			l[i*n+j] = 0
		}
	}
	return true
}

// Eigen fills values, rising, and vectors, one a row, of the symmetric a of n rows, which it destroys. It uses Jacobi's rotations: each
// small eigenvalue comes out to working precision of the greatest.
//
// Source: Golub and Van Loan, Matrix Computations, section 8.5 (from memory).
func Eigen(n int, a, values, vectors []float64) bool {
	v := vectors[:n*n]
	clear(v)
	for i := range n {
		v[i*n+i] = 1
	}
	for i := range n * n {
		if math.IsNaN(a[i]) || math.IsInf(a[i], 0) {
			return false
		}
	}
	for range maximumSteps {
		off, all := 0.0, 0.0
		for i := range n {
			for j := range n {
				x := a[i*n+j] * a[i*n+j]
				all += x
				if i != j {
					off += x
				}
			}
		}
		if off <= epsilon*epsilon*all {
			break
		}
		for p := range n {
			for q := p + 1; q < n; q++ {
				rotate(n, a, v, p, q)
			}
		}
	}
	for i := range n {
		values[i] = a[i*n+i]
	}
	for i := range n { // few: selection
		m := i
		for k := i + 1; k < n; k++ {
			if values[k] < values[m] {
				m = k
			}
		}
		if m != i {
			values[i], values[m] = values[m], values[i]
			for k := range n {
				v[i*n+k], v[m*n+k] = v[m*n+k], v[i*n+k]
			}
		}
	}
	return true
}

// rotate makes a[p][q] vanish.
func rotate(n int, a, v []float64, p, q int) {
	x := a[p*n+q]
	if x == 0 {
		return
	}
	theta := (a[q*n+q] - a[p*n+p]) / (2 * x)
	t := 1 / (math.Abs(theta) + math.Hypot(theta, 1))
	if theta < 0 {
		t = -t
	}
	c := 1 / math.Hypot(t, 1)
	s := t * c
	for k := range n {
		g, h := a[p*n+k], a[q*n+k]
		a[p*n+k], a[q*n+k] = c*g-s*h, s*g+c*h
	}
	for k := range n {
		g, h := a[k*n+p], a[k*n+q]
		a[k*n+p], a[k*n+q] = c*g-s*h, s*g+c*h
	}
	for k := range n {
		g, h := v[p*n+k], v[q*n+k]
		v[p*n+k], v[q*n+k] = c*g-s*h, s*g+c*h
	}
}
