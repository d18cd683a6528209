package num

import (
	"math"
	"math/rand/v2"
	"testing"
)

// randomProblem is a well-posed least-squares problem whose columns differ in size by powers of ten.
func randomProblem(g *rand.Rand, rows, n int) (a, y []float64) {
	a, y = make([]float64, rows*n), make([]float64, rows)
	for i := range rows {
		for j := range n {
			a[i*n+j] = g.NormFloat64() * math.Pow(10, float64(j%5-2))
		}
		y[i] = g.NormFloat64()
	}
	return a, y
}

func TestLeastSquaresLeavesNormalResiduals(t *testing.T) {
	g := rand.New(rand.NewPCG(6, 6))
	var l LeastSquares
	for range 200 {
		n := 1 + g.IntN(12)
		rows := n + g.IntN(30)
		a, y := randomProblem(g, rows, n)
		l.Reset(n)
		for i := range rows {
			l.Add(a[i*n:i*n+n], y[i])
		}
		x := make([]float64, n)
		if !l.Solve(x) || l.Rows() != rows {
			t.Fatal("not solved")
		}
		rss := 0.0
		r := make([]float64, rows)
		for i := range rows {
			r[i] = y[i]
			for j := range n {
				r[i] -= a[i*n+j] * x[j]
			}
			rss += r[i] * r[i]
		}
		if math.Abs(rss-l.RSS()) > 1e-9*(1+rss) {
			t.Fatalf("the residual sum of squares is %g, by the rows %g", l.RSS(), rss)
		}
		for j := range n { // A' r = 0
			dot, size := 0.0, 0.0
			for i := range rows {
				dot += a[i*n+j] * r[i]
				size += math.Abs(a[i*n+j])
			}
			if math.Abs(dot) > 1e-10*size {
				t.Fatalf("column %d and the residuals: %g", j, dot)
			}
		}
		c := make([]float64, n*n)
		if !l.Covariance(c) {
			t.Fatal("no covariance")
		}
		for p := range n { // (A'A) C = 1
			for q := range n {
				s, size := 0.0, 0.0
				for k := range n {
					d := 0.0
					for i := range rows {
						d += a[i*n+p] * a[i*n+k]
					}
					s += d * c[k*n+q]
					size += math.Abs(d * c[k*n+q])
				}
				if p == q {
					s--
				}
				if math.Abs(s) > 1e-9*(1+size) {
					t.Fatalf("A'A C misses the unit matrix by %g", s)
				}
			}
		}
	}
}

func TestLeastSquaresRefuses(t *testing.T) {
	var l LeastSquares
	x := []float64{7, 7}
	l.Reset(2)
	l.Add([]float64{1, 2}, 3)
	l.Add([]float64{2, 4}, 6)
	if l.Solve(x) || l.Covariance(make([]float64, 4)) || x[0] != 7 {
		t.Error("a singular problem was solved")
	}
	if l.Add([]float64{math.NaN(), 1}, 1) || l.Add([]float64{1, 1}, math.Inf(1)) || l.Add([]float64{1}, 1) {
		t.Error("a row that is none was taken")
	}
	l.Add([]float64{1, 0}, 1)
	if !l.Solve(x) || math.Abs(x[0]-1) > 1e-14 || math.Abs(x[1]-1) > 1e-14 {
		t.Errorf("after a third row: %g", x)
	}
	if n := testing.AllocsPerRun(20, func() {
		l.Reset(2)
		l.Add(x, 1)
	}); n != 0 {
		t.Errorf("%g allocations", n)
	}
}

func TestCholesky(t *testing.T) {
	g := rand.New(rand.NewPCG(7, 7))
	for range 200 {
		n := 1 + g.IntN(9)
		rank := 1 + g.IntN(n)
		b := make([]float64, n*rank)
		for i := range b {
			b[i] = g.NormFloat64()
		}
		a, l := make([]float64, n*n), make([]float64, n*n)
		for i := range n {
			for j := range n {
				for k := range rank {
					a[i*n+j] += b[i*rank+k] * b[j*rank+k]
				}
			}
		}
		if !Cholesky(n, a, l) {
			t.Fatal("refused")
		}
		for i := range n {
			for j := range n {
				s := 0.0
				for k := range n {
					s += l[i*n+k] * l[j*n+k]
				}
				if math.Abs(s-a[i*n+j]) > 1e-7*(1+math.Abs(a[i*n+i])+math.Abs(a[j*n+j])) {
					t.Fatalf("rank %d of %d: %g, want %g", rank, n, s, a[i*n+j])
				}
			}
		}
	}
	if Cholesky(2, []float64{1, 2, 2, 1}, make([]float64, 4)) || Cholesky(1, []float64{math.NaN()}, make([]float64, 1)) {
		t.Error("a matrix that is not positive was taken")
	}
}

func TestEigen(t *testing.T) {
	g := rand.New(rand.NewPCG(8, 8))
	for range 100 {
		n := 1 + g.IntN(12)
		a := make([]float64, n*n)
		for i := range n {
			for j := range i + 1 {
				a[i*n+j] = g.NormFloat64()
				a[j*n+i] = a[i*n+j]
			}
		}
		b := append([]float64(nil), a...)
		values, v := make([]float64, n), make([]float64, n*n)
		if !Eigen(n, b, values, v) {
			t.Fatal("refused")
		}
		for i := range n {
			if i > 0 && values[i] < values[i-1] {
				t.Fatal("not in order")
			}
			for k := range n {
				s := 0.0
				for j := range n {
					s += a[k*n+j] * v[i*n+j]
				}
				if math.Abs(s-values[i]*v[i*n+k]) > 1e-12*float64(n) {
					t.Fatalf("A v misses lambda v by %g", s-values[i]*v[i*n+k])
				}
			}
		}
	}
	if Eigen(1, []float64{math.Inf(1)}, make([]float64, 1), make([]float64, 1)) {
		t.Error("an infinite matrix was taken")
	}
}

// TestUniformIsAPermutation: the first 2^k points fall once into each of 2^k equal cells, in each dimension of the table.
func TestUniformIsAPermutation(t *testing.T) {
	for d := range sobolDimensions {
		for _, n := range []int{16, 512} {
			seen := make([]bool, n)
			for i := range n {
				x := Uniform(uint32(i), d)
				if !(x > 0 && x < 1) {
					t.Fatalf("%g is outside", x)
				}
				c := int(x * float64(n))
				if seen[c] {
					t.Fatalf("dimension %d: two of the first %d points in one cell", d, n)
				}
				seen[c] = true
			}
		}
	}
}

// TestPolynomialsArePrimitive: x is of the order 2^s - 1 modulo each polynomial; and the direction numbers are odd and small enough.
func TestPolynomialsArePrimitive(t *testing.T) {
	for i := range directions {
		d := &directions[i]
		p := 1<<d.degree | d.inner<<1 | 1
		x, order := uint32(1), 0
		for {
			x <<= 1
			if x>>d.degree&1 != 0 {
				x ^= p
			}
			order++
			if x == 1 || order > 1<<d.degree {
				break
			}
		}
		if order != 1<<d.degree-1 {
			t.Errorf("polynomial %d of degree %d has the order %d", i, d.degree, order)
		}
		for k := range int(d.degree) {
			if m := d.m[k]; m&1 == 0 || m >= 1<<(k+1) {
				t.Errorf("row %d: direction number %d is %d", i, k, m)
			}
		}
	}
}

// TestUniformIsEven: sums of a smooth function come out closer than by chance (which is about 0.04), in the dimensions of the table
// and beyond.
func TestUniformIsEven(t *testing.T) {
	for _, dims := range [][]int{{0, 1, 2, 3, 4, 5, 6, 7, 8, 9}, {8, 9, 10, 11, 12, 13, 14}, {15, 16, 17, 18, 19, 20, 21, 22}} {
		const n = 512
		mean, square := 0.0, 0.0
		for i := range n {
			s := 0.0
			for _, d := range dims {
				s += Normal(Uniform(uint32(i), d))
			}
			s /= math.Sqrt(float64(len(dims)))
			mean += s / n
			square += s * s / n
		}
		if math.Abs(mean) > 0.02 || math.Abs(square-1) > 0.05 {
			t.Errorf("dimensions %v: mean %.4f, variance %.4f", dims, mean, square)
		}
	}
}

func TestNormal(t *testing.T) {
	// Upper 2.5 % and 0.1 % points of the standard normal (tables, from memory).
	for _, c := range []struct{ p, x float64 }{{0.5, 0}, {0.975, 1.959963984540054}, {0.001, -3.090232306167813}} {
		if x := Normal(c.p); math.Abs(x-c.x) > 1e-12 {
			t.Errorf("%g: %.15g, want %.15g", c.p, x, c.x)
		}
	}
	for _, p := range []float64{0, 1, -1, 2, math.NaN(), math.Inf(1)} {
		if x := Normal(p); math.IsNaN(x) || math.Abs(x) > 9 {
			t.Errorf("%g: %g", p, x)
		}
	}
}

func TestQuantile(t *testing.T) {
	g := rand.New(rand.NewPCG(9, 9))
	for range 300 {
		n := 1 + g.IntN(40)
		x := make([]float64, n)
		for i := range x {
			x[i] = float64(g.IntN(10))
		}
		sorted := append([]float64(nil), x...)
		for i := range sorted {
			for j := i; j > 0 && sorted[j] < sorted[j-1]; j-- {
				sorted[j], sorted[j-1] = sorted[j-1], sorted[j]
			}
		}
		p := g.Float64()
		pos := min(max(p*float64(n)-0.5, 0), float64(n-1))
		k := int(pos)
		want := sorted[k]
		if k+1 < n {
			want += (pos - float64(k)) * (sorted[k+1] - sorted[k])
		}
		if got := Quantile(x, p); math.Abs(got-want) > 1e-12 {
			t.Fatalf("%g of %v: %g, want %g", p, sorted, got, want)
		}
	}
	if Quantile(nil, 0.5) != 0 {
		t.Error("no values")
	}
	if got := Quantile([]float64{1, 2, 3, 4}, math.NaN()); got != 1 {
		t.Errorf("no share: %g", got)
	}
}
