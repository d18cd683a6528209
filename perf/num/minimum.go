package num

import "math"

// Minimum narrows the place of a least value by golden section. Where the function has one minimum inside it finds
// that one; where it has more it finds one of them; an end is found as well. The place of a smooth minimum is known no
// better than the square root of the precision of the values.
type Minimum struct {
	X float64 // where the value is wanted; after the last step the place of the least value seen
	F float64 // the least value seen

	a, b           float64
	x1, f1, x2, f2 float64
	tol            float64
	state          int8
	steps          int
}

const golden = 0.61803398874989484820458683436563811772

// Start begins on a..b. The iteration ends when the interval is narrower than tol plus 1e-9 of its greater end.
func (m *Minimum) Start(a, b, tol float64) {
	*m = Minimum{a: min(a, b), b: max(a, b), tol: tol, F: math.Inf(1), X: a}
	m.x1 = m.b - golden*(m.b-m.a)
	m.x2 = m.a + golden*(m.b-m.a)
}

// Next reports whether another value is wanted, at X.
func (m *Minimum) Next() bool {
	switch m.state {
	case 0:
		m.X = m.x1
		return true
	case 1:
		m.X = m.x2
		return true
	}
	if m.b-m.a <= m.tol+1e-9*math.Abs(m.b) || m.steps >= maximumSteps {
		if m.f1 <= m.f2 {
			m.X, m.F = m.x1, m.f1
		} else {
			m.X, m.F = m.x2, m.f2
		}
		return false
	}
	m.steps++
	if m.f1 <= m.f2 {
		m.b, m.x2, m.f2 = m.x2, m.x1, m.f1
		m.x1 = m.b - golden*(m.b-m.a)
		m.X, m.state = m.x1, 2
	} else {
		m.a, m.x1, m.f1 = m.x1, m.x2, m.f2
		m.x2 = m.a + golden*(m.b-m.a)
		m.X, m.state = m.x2, 3
	}
	return true
}

// Put gives the function's value at X.
func (m *Minimum) Put(f float64) {
	if math.IsNaN(f) {
		f = math.Inf(1)
	}
	switch m.state {
	case 0:
		m.f1, m.state = f, 1
	case 1:
		m.f2, m.state = f, 4
	case 2:
		m.f1 = f
	default:
		m.f2 = f
	}
}
