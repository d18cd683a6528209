package num

import (
	"math"
	"math/rand/v2"
	"testing"
)

var functions = []struct {
	name     string
	lo, hi   float64
	root     float64
	f, slope func(x float64) float64
}{
	{"line", -1, 3, 0.5, func(x float64) float64 { return 2*x - 1 }, func(float64) float64 { return 2 }},
	{"cubic", 0, 10, 2, func(x float64) float64 { return x*x*x - 8 }, func(x float64) float64 { return 3 * x * x }},
	{"exponential", -20, 20, math.Log(7), func(x float64) float64 { return math.Exp(x) - 7 }, math.Exp},
	{"flat", -1, 2, 0.3, func(x float64) float64 { d := x - 0.3; return d * d * d }, func(x float64) float64 { d := x - 0.3; return 3 * d * d }},
	{"hyperbola", 1e-6, 100, 4, func(x float64) float64 { return 0.25 - 1/x }, func(x float64) float64 { return 1 / (x * x) }},
	{"arctangent", -50, 7, 1, func(x float64) float64 { return math.Atan(x - 1) }, func(x float64) float64 { d := x - 1; return 1 / (1 + d*d) }},
	{"step", -3, 5, 1, func(x float64) float64 {
		if x < 1 {
			return -2
		}
		return 1
	}, func(float64) float64 { return 0 }},
	{"wave", 2, 4.5, math.Pi, func(x float64) float64 { return -math.Sin(x) }, func(x float64) float64 { return -math.Cos(x) }},
}

func TestRootFinds(t *testing.T) {
	for _, c := range functions {
		for _, flip := range []bool{false, true} {
			lo, hi := c.lo, c.hi
			if flip {
				lo, hi = hi, lo
			}
			var r Root
			n := 0
			r.Start(lo, c.f(lo), hi, c.f(hi), 0)
			for r.Next() {
				if r.X < c.lo || r.X > c.hi {
					t.Fatalf("%s: %g is outside the bracket", c.name, r.X)
				}
				r.Put(c.f(r.X))
				n++
			}
			tol := 1e-15 * math.Max(1, math.Abs(c.root))
			if c.name == "flat" {
				tol = 1e-5 // the values themselves vanish there
			}
			if math.Abs(r.X-c.root) > 4*tol || n > 80 {
				t.Errorf("%s: %.17g after %d steps, want %.17g", c.name, r.X, n, c.root)
			}
		}
	}
}

func TestRootIsQuickOnSmoothFunctions(t *testing.T) {
	for _, c := range functions {
		if c.name == "flat" || c.name == "step" || c.name == "exponential" || c.name == "hyperbola" {
			continue
		}
		var r Root
		n := 0
		r.Start(c.lo, c.f(c.lo), c.hi, c.f(c.hi), 0)
		for r.Next() {
			r.Put(c.f(r.X))
			n++
		}
		if n > 16 {
			t.Errorf("%s takes %d steps", c.name, n)
		}
	}
}

func TestRootWithoutChangeOfSign(t *testing.T) {
	for _, c := range []struct{ fa, fb, want float64 }{{1, 2, 0}, {2, 1, 1}, {-1, -2, 0}, {0, 5, 0}, {5, 0, 1}, {0, 0, 0}} {
		var r Root
		r.Start(0, c.fa, 1, c.fb, 0)
		if r.Next() || r.X != c.want {
			t.Errorf("values %g and %g: %g, want %g", c.fa, c.fb, r.X, c.want)
		}
	}
}

func TestRootEndsOnGarbage(t *testing.T) {
	g := rand.New(rand.NewPCG(3, 3))
	for range 200 {
		var r Root
		n := 0
		r.Start(0, -1, 1, 1, 0)
		for r.Next() {
			y := g.Float64() - 0.5
			if g.IntN(40) == 0 {
				y = math.NaN()
			}
			r.Put(y)
			if n++; n > maximumSteps {
				t.Fatal("no end")
			}
		}
		if !(r.X >= 0 && r.X <= 1) {
			t.Errorf("%g left the bracket", r.X)
		}
	}
}

func TestRootTolerance(t *testing.T) {
	var r Root
	r.Start(0, -8, 10, 992, 0.01)
	n := 0
	for r.Next() {
		r.Put(r.X*r.X*r.X - 8)
		n++
	}
	if math.Abs(r.X-2) > 0.01 || n > 12 {
		t.Errorf("%g after %d steps", r.X, n)
	}
}

func TestNewtonFinds(t *testing.T) {
	for _, c := range functions {
		for _, start := range []float64{c.lo, c.hi, 0.5 * (c.lo + c.hi), math.NaN(), c.hi + 1} {
			var r Newton
			n := 0
			r.Start(c.lo, c.hi, start, true)
			for r.Next() {
				if r.X < c.lo || r.X > c.hi {
					t.Fatalf("%s: %g is outside the bracket", c.name, r.X)
				}
				r.Put(c.f(r.X), c.slope(r.X))
				n++
			}
			tol := 1e-15 * math.Max(1, math.Abs(c.root))
			if c.name == "flat" {
				tol = 1e-5
			}
			if math.Abs(r.X-c.root) > 4*tol || n > 120 {
				t.Errorf("%s from %g: %.17g after %d steps, want %.17g", c.name, start, r.X, n, c.root)
			}
		}
	}
}

func TestNewtonFalling(t *testing.T) {
	var r Newton
	r.Start(0, 10, 9, false)
	for r.Next() {
		r.Put(8-r.X*r.X*r.X, -3*r.X*r.X)
	}
	if math.Abs(r.X-2) > 1e-14 {
		t.Errorf("%.17g", r.X)
	}
}

func TestNewtonEndsOnGarbage(t *testing.T) {
	g := rand.New(rand.NewPCG(4, 4))
	for range 300 {
		var r Newton
		r.Start(0, 1, 0.5, true)
		n := 0
		for r.Next() {
			r.Put(g.NormFloat64(), g.NormFloat64()*float64(g.IntN(2)))
			if n++; n > maximumSteps {
				t.Fatal("no end")
			}
		}
		if !(r.X >= 0 && r.X <= 1) {
			t.Errorf("%g left the bracket", r.X)
		}
	}
}

func TestMinimumFinds(t *testing.T) {
	for _, c := range []struct {
		name      string
		a, b, x   float64
		tol       float64
		f         func(x float64) float64
		increased bool
	}{
		{"parabola", -3, 8, 1.25, 1e-7, func(x float64) float64 { return (x-1.25)*(x-1.25) + 3 }, false},
		{"corner", 0, 4, 1.7, 1e-8, func(x float64) float64 { return math.Abs(x - 1.7) }, false},
		{"left end", 2, 5, 2, 1e-7, func(x float64) float64 { return x }, true},
		{"right end", 2, 5, 5, 1e-7, func(x float64) float64 { return -x }, true},
		{"turned", 8, -3, 1.25, 1e-7, func(x float64) float64 { return (x - 1.25) * (x - 1.25) }, false},
	} {
		var m Minimum
		n := 0
		m.Start(c.a, c.b, 0)
		for m.Next() {
			m.Put(c.f(m.X))
			n++
		}
		if math.Abs(m.X-c.x) > c.tol*math.Abs(c.x) || m.F != c.f(m.X) || n > 60 {
			t.Errorf("%s: %.12g with %g after %d values, want %g", c.name, m.X, m.F, n, c.x)
		}
	}
}

func TestMinimumSurvivesNaN(t *testing.T) {
	var m Minimum
	m.Start(0, 1, 0)
	n := 0
	for m.Next() {
		m.Put(math.NaN())
		if n++; n > 2*maximumSteps {
			t.Fatal("no end")
		}
	}
	if !(m.X >= 0 && m.X <= 1) {
		t.Errorf("%g left the interval", m.X)
	}
}

func TestMonotoneSlopes(t *testing.T) {
	g := rand.New(rand.NewPCG(5, 5))
	for range 300 {
		n := 2 + g.IntN(9)
		x, y, d := make([]float64, n), make([]float64, n), make([]float64, n)
		for i := range x {
			if i > 0 {
				x[i] = x[i-1] + 0.05 + g.Float64()
			}
			y[i] = g.NormFloat64()
		}
		MonotoneSlopes(x, y, d)
		for i := 1; i < n; i++ {
			h := x[i] - x[i-1]
			c := Hermite(h, y[i-1], y[i], d[i-1], d[i])
			end, slope := c.At(h)
			if math.Abs(end-y[i]) > 1e-12 || math.Abs(slope-d[i]) > 1e-9 {
				t.Fatalf("the cubic ends at %g, slope %g, want %g, %g", end, slope, y[i], d[i])
			}
			last := y[i-1]
			for k := 1; k <= 50; k++ {
				v, _ := c.At(h * float64(k) / 50)
				if (v-last)*(y[i]-y[i-1]) < -1e-12 {
					t.Fatalf("between %g and %g it turns back", y[i-1], y[i])
				}
				last = v
			}
		}
	}
}

func TestMonotoneSlopesOfALine(t *testing.T) {
	x := []float64{0, 1, 3, 3.5, 9}
	y := make([]float64, len(x))
	d := make([]float64, len(x))
	for i := range x {
		y[i] = 4 - 2*x[i]
	}
	MonotoneSlopes(x, y, d)
	for i := range d {
		if math.Abs(d[i]+2) > 1e-14 {
			t.Errorf("slope %d of a line is %g", i, d[i])
		}
	}
}

func TestNothingAllocates(t *testing.T) {
	sum := 0.0
	if n := testing.AllocsPerRun(50, func() {
		var r Root
		r.Start(0, -8, 10, 992, 0)
		for r.Next() {
			r.Put(r.X*r.X*r.X - 8)
		}
		var w Newton
		w.Start(0, 10, 9, true)
		for w.Next() {
			w.Put(w.X*w.X*w.X-8, 3*w.X*w.X)
		}
		var m Minimum
		m.Start(0, 10, 0)
		for m.Next() {
			m.Put((m.X - 2) * (m.X - 2))
		}
		sum += r.X + w.X + m.X
	}); n != 0 || math.Abs(sum/51-6) > 1e-6 {
		t.Errorf("%g allocations, sum %g", n, sum/51)
	}
}
