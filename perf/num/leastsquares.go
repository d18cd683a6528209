package num

import "math"

// LeastSquares solves min |A x - y| row by row: each row is rotated into an upper triangle at once (Givens rotations), so the
// memory is that of the unknowns alone and the conditioning that of A, not of A'A. The zero value needs Reset.
//
// Source: G. H. Golub and C. F. Van Loan, Matrix Computations, sections 5.1.8 and 5.3 (from memory).
type LeastSquares struct {
	n    int
	r    []float64 // n rows of n, upper triangle
	q    []float64 // the rotated right-hand side
	work []float64
	rss  float64
	rows int
}

// Reset begins a problem of n unknowns, n at least 0.
func (l *LeastSquares) Reset(n int) {
	l.n = max(n, 0)
	l.r, l.q, l.work = zeroed(l.r, n*n), zeroed(l.q, n), zeroed(l.work, n)
	l.rss, l.rows = 0, 0
}

// zeroed is a slice of n zeros, in the memory of s where that is enough.
func zeroed(s []float64, n int) []float64 {
	n = max(n, 0)
	if cap(s) < n {
		return make([]float64, n)
	}
	s = s[:n]
	clear(s)
	return s
}

// Add takes one row of A, of which the first n entries count, with its y. A row that is not finite is left out and reported as false.
func (l *LeastSquares) Add(row []float64, y float64) bool {
	n := l.n
	w := l.work
	if len(row) < n || math.IsNaN(y) || math.IsInf(y, 0) {
		return false
	}
	for i := range n {
		if math.IsNaN(row[i]) || math.IsInf(row[i], 0) {
			return false
		}
		w[i] = row[i]
	}
	l.rows++
	for i := range n {
		b := w[i]
		if b == 0 {
			continue
		}
		r := l.r[i*n : i*n+n]
		a := r[i]
		h := math.Hypot(a, b)
		c, s := a/h, b/h
		r[i] = h
		for j := i + 1; j < n; j++ {
			t := r[j]
			r[j] = c*t + s*w[j]
			w[j] = c*w[j] - s*t
		}
		t := l.q[i]
		l.q[i] = c*t + s*y
		y = c*y - s*t
	}
	l.rss += y * y
	return true
}

// Rows is how many rows were taken.
func (l *LeastSquares) Rows() int { return l.rows }

// RSS is the residual sum of squares at the solution.
func (l *LeastSquares) RSS() float64 { return l.rss }

// Solve fills x, of at least n. It reports false, and leaves x alone, where the rows do not determine every unknown to
// working precision.
func (l *LeastSquares) Solve(x []float64) bool {
	n := l.n
	if !l.determined() || len(x) < n {
		return false
	}
	for i := n - 1; i >= 0; i-- {
		r := l.r[i*n : i*n+n]
		s := l.q[i]
		for j := i + 1; j < n; j++ {
			s -= r[j] * x[j]
		}
		x[i] = s / r[i]
	}
	return true
}

// SolveNormal fills x with the solution of A'A x = g: the step of a search whose slope is not that of the rows. It reports false where Solve
// does. x may be g.
func (l *LeastSquares) SolveNormal(g, x []float64) bool {
	n := l.n
	if !l.determined() || len(x) < n || len(g) < n {
		return false
	}
	for i := range n { // R' w = g
		s := g[i]
		for j := range i {
			s -= l.r[j*n+i] * x[j]
		}
		x[i] = s / l.r[i*n+i]
	}
	for i := n - 1; i >= 0; i-- { // R x = w
		s := x[i]
		for j := i + 1; j < n; j++ {
			s -= l.r[i*n+j] * x[j]
		}
		x[i] = s / l.r[i*n+i]
	}
	return true
}

// determined reports whether each diagonal element stands out of the rounding of its own column.
func (l *LeastSquares) determined() bool {
	n := l.n
	for j := range n {
		norm := 0.0
		for i := 0; i <= j; i++ {
			norm = math.Hypot(norm, l.r[i*n+j])
		}
		if !(math.Abs(l.r[j*n+j]) > epsilon*norm) || math.IsInf(norm, 0) {
			return false
		}
	}
	return true
}

// Covariance fills c, n rows of n, with the inverse of A'A: the covariance of the solution where each y has a variance of 1. It
// reports false where Solve does.
func (l *LeastSquares) Covariance(c []float64) bool {
	n := l.n
	if !l.determined() || len(c) < n*n {
		return false
	}
	// c = U U' with U = R^-1, upper triangular. U is built in place first, column by column.
	u := c[:n*n]
	clear(u)
	for j := range n {
		u[j*n+j] = 1 / l.r[j*n+j]
		for i := j - 1; i >= 0; i-- {
			s := 0.0
			for k := i + 1; k <= j; k++ {
				s -= l.r[i*n+k] * u[k*n+j]
			}
			u[i*n+j] = s / l.r[i*n+i]
		}
	}
	for i := range n {
		for j := i; j < n; j++ {
			s := 0.0
			for k := j; k < n; k++ {
				s += u[i*n+k] * u[j*n+k]
			}
			u[i*n+j] = s // row i beyond j and the rows below are still U
		}
	}
	for i := range n {
		for j := range i {
			u[i*n+j] = u[j*n+i]
		}
	}
	return true
}
