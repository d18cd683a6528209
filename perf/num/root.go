package num

import "math"

// maximumSteps bounds every iteration of this package. Bisection alone narrows any bracket of float64 to
// neighbouring numbers of the same binade in about 53 steps; the rest is slack for brackets that span binades.
const maximumSteps = 200

// Root narrows a bracket that holds a change of sign, by Chandrupatla's method: inverse quadratic
// interpolation where the three last points allow it, bisection elsewhere. It never leaves the bracket, and a jump
// through zero is a root like any other.
//
// Source: T. R. Chandrupatla, A new hybrid quadratic/bisection algorithm for finding the zero of a nonlinear
// function without using derivatives, Advances in Engineering Software 28 (1997) 145 (from memory).
type Root struct {
	X float64 // where the value is wanted; after the last step the root

	a, fa, b, fb, c, fc float64
	t, tol              float64
	steps               int
	done                bool
}

// Start begins on the bracket a..b with the function's values at both ends, which must not have the same sign.
// The iteration ends when the bracket is narrower than tol plus a few units in the last place of the root.
// Without a change of sign the end with the smaller magnitude is the answer at once.
func (r *Root) Start(a, fa, b, fb, tol float64) {
	*r = Root{a: b, fa: fb, b: a, fb: fa, c: a, fc: fa, t: 0.5, tol: tol}
	switch {
	case fa == 0 || fb != 0 && (fa > 0) == (fb > 0) && math.Abs(fa) <= math.Abs(fb):
		r.X, r.done = a, true
	case fb == 0 || (fa > 0) == (fb > 0):
		r.X, r.done = b, true
	}
}

// Next reports whether another value is wanted, at X. When it reports false X is the root.
func (r *Root) Next() bool {
	if r.done {
		return false
	}
	if r.steps >= maximumSteps {
		r.finish()
		return false
	}
	r.steps++
	r.X = r.a + r.t*(r.b-r.a)
	return true
}

// Put gives the function's value at X.
func (r *Root) Put(f float64) {
	if math.IsNaN(f) {
		r.finish()
		return
	}
	if (f > 0) == (r.fa > 0) {
		r.c, r.fc = r.a, r.fa
	} else {
		r.c, r.fc = r.b, r.fb
		r.b, r.fb = r.a, r.fa
	}
	r.a, r.fa = r.X, f
	best := r.a
	if math.Abs(r.fb) < math.Abs(r.fa) {
		best = r.b
	}
	width := math.Abs(r.b - r.a)
	tol := 2*epsilon*math.Abs(best) + 0.5*r.tol
	if f == 0 || width <= 2*tol {
		r.finish()
		return
	}
	share := tol / width
	xi := (r.a - r.b) / (r.c - r.b)
	phi := (r.fa - r.fb) / (r.fc - r.fb)
	r.t = 0.5
	if phi*phi < xi && (1-phi)*(1-phi) < 1-xi {
		t := r.fa/(r.fb-r.fa)*r.fc/(r.fb-r.fc) + (r.c-r.a)/(r.b-r.a)*r.fa/(r.fc-r.fa)*r.fb/(r.fc-r.fb)
		if t > 0 && t < 1 {
			r.t = t
		}
	}
	r.t = min(1-share, max(share, r.t))
}

func (r *Root) finish() {
	r.done = true
	r.X = r.a
	if math.Abs(r.fb) < math.Abs(r.fa) {
		r.X = r.b
	}
}

const epsilon = 1.0 / (1 << 52)

// Newton narrows a bracket with the help of the slope: a Newton step where it stays inside and shrinks fast enough,
// bisection elsewhere. For a function that bends one way it goes to the root from the side where it began and
// bisects never.
type Newton struct {
	X float64 // where value and slope are wanted; after the last step the root

	lo, hi, last float64
	rising       bool
	steps        int
	done         bool
}

// Start begins at x inside lo..hi. rising says that the function is negative at lo and positive at hi; else the
// other way round. An x outside is moved to the middle.
func (r *Newton) Start(lo, hi, x float64, rising bool) {
	*r = Newton{X: x, lo: lo, hi: hi, last: hi - lo, rising: rising}
	if !(x >= lo && x <= hi) {
		r.X = lo + 0.5*(hi-lo)
	}
}

// Next reports whether value and slope are wanted at X. When it reports false X is the root.
func (r *Newton) Next() bool { return !r.done && r.steps < maximumSteps }

// Put gives the function's value and slope at X.
func (r *Newton) Put(f, slope float64) {
	r.steps++
	if f == 0 || math.IsNaN(f) {
		r.done = true
		return
	}
	if (f > 0) == r.rising {
		r.hi = r.X
	} else {
		r.lo = r.X
	}
	x := r.X - f/slope
	// A step that does not halve the one before is a sign that the tangent misleads.
	if !(x >= r.lo && x <= r.hi) || math.Abs(x-r.X) > 0.5*math.Abs(r.last) && r.steps > 6 {
		x = r.lo + 0.5*(r.hi-r.lo)
	}
	r.last = x - r.X
	if math.Abs(r.last) <= 4*epsilon*math.Abs(x) || r.hi-r.lo <= 2*epsilon*math.Abs(x) {
		r.done = true
	}
	r.X = x
}
