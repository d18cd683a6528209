package perf

import (
	"math"

	"levelspan/perf/num"
)

// segmentNodes is into how many parts the scan of a tabulated propeller divides each interval of the table.
const segmentNodes = 3

// highFactors are the scan's nodes beyond the table, as multiples of its last advance ratio.
var highFactors = [...]float64{1.08, 1.2, 1.4, 1.7}

// propellerTable is a tabulated propeller made ready: monotone cubics between the rows. Below the first row CT and CP are
// held; above the last CP is held and CT goes on with the end's slope, or level where that would rise.
type propellerTable struct {
	rows     []PropellerRow // as given, to know the same table again
	j        []float64
	y, d     []float64 // working store for the slopes
	ct, cp   []num.Cubic
	ctEnd    float64
	slopeEnd float64
	cpEnd    float64
	node     []tableNode
}

// tableNode is one point of the scan, with what no condition changes.
type tableNode struct {
	j, ct, dct float64
	r2, r3     float64 // CP^(-1/2), CP^(-1/3)
	lcp        float64 // CP'/CP
	tau        float64 // CT/J^2
}

// set readies the table; at least 3 rows of rising advance ratio. The same rows again cost only the comparison.
func (t *propellerTable) set(rows []PropellerRow) {
	if len(rows) == len(t.rows) {
		same := true
		for i := range rows {
			if rows[i] != t.rows[i] {
				same = false
				break
			}
		}
		if same {
			return
		}
	}
	t.rows = append(t.rows[:0], rows...)
	n := len(rows)
	t.j, t.y, t.d = grow(t.j, n), grow(t.y, n), grow(t.d, n)
	t.ct, t.cp = grow(t.ct, n-1), grow(t.cp, n-1)
	for i, r := range rows {
		t.j[i], t.y[i] = r.AdvanceRatio, r.ThrustCoefficient
	}
	num.MonotoneSlopes(t.j, t.y, t.d)
	for i := range t.ct {
		t.ct[i] = num.Hermite(t.j[i+1]-t.j[i], t.y[i], t.y[i+1], t.d[i], t.d[i+1])
	}
	t.ctEnd, t.slopeEnd = t.y[n-1], min(t.d[n-1], 0)
	for i, r := range rows {
		t.y[i] = r.PowerCoefficient
	}
	num.MonotoneSlopes(t.j, t.y, t.d)
	for i := range t.cp {
		t.cp[i] = num.Hermite(t.j[i+1]-t.j[i], t.y[i], t.y[i+1], t.d[i], t.d[i+1])
	}
	t.cpEnd = t.y[n-1]
	t.node = t.node[:0]
	for i := range segmentNodes - 1 {
		if j := t.j[0] * float64(i+1) / segmentNodes; j > 0 {
			t.addNode(j)
		}
	}
	for i := range t.ct {
		h := (t.j[i+1] - t.j[i]) / segmentNodes
		for k := range segmentNodes {
			t.addNode(t.j[i] + float64(k)*h)
		}
	}
	t.addNode(t.j[n-1])
	for _, f := range highFactors {
		t.addNode(t.j[n-1] * f)
	}
}

func grow[T any](s []T, n int) []T {
	if cap(s) < n {
		return make([]T, n)
	}
	return s[:n]
}

func (t *propellerTable) addNode(j float64) {
	ct, dct, cp, dcp := t.at(j)
	n := tableNode{j: j, ct: ct, dct: dct, lcp: dcp / cp, r2: 1 / math.Sqrt(cp), r3: 1 / math.Cbrt(cp), tau: math.Inf(1)}
	if j > 0 {
		n.tau = ct / (j * j)
	}
	t.node = append(t.node, n)
}

// at is CT and CP with their slopes at an advance ratio.
func (t *propellerTable) at(j float64) (ct, ctSlope, cp, cpSlope float64) {
	n := len(t.j)
	if j >= t.j[n-1] {
		return t.ctEnd + t.slopeEnd*(j-t.j[n-1]), t.slopeEnd, t.cpEnd, 0
	}
	if j <= t.j[0] {
		return t.ct[0].A, 0, t.cp[0].A, 0
	}
	lo, hi := 0, n-1
	for hi-lo > 1 {
		m := (lo + hi) / 2
		if t.j[m] <= j {
			lo = m
		} else {
			hi = m
		}
	}
	x := j - t.j[lo]
	ct, ctSlope = t.ct[lo].At(x)
	cp, cpSlope = t.cp[lo].At(x)
	return ct, ctSlope, cp, cpSlope
}

// crooked is the first interval in which J^2/CP falls or CT/J^2 rises while there is thrust, or -1. Both signs are those of the cubic
// 2 y - J y', looked at where it is least.
func (t *propellerTable) crooked() int {
	for i := range t.cp {
		h := t.j[i+1] - t.j[i]
		if leastTwist(t.cp[i], t.j[i], h) <= 0 {
			return i
		}
		// CT is monotone in an interval; falling it is right by itself.
		if up, _ := t.ct[i].At(h); up > t.ct[i].A && leastTwist(t.ct[i], t.j[i], h) <= 0 {
			return i
		}
	}
	return -1
}

// leastTwist is the least of 2 y - (j + t) y' over 0..h.
func leastTwist(c num.Cubic, j, h float64) float64 {
	a0, a1, a2, a3 := 2*c.A-j*c.B, c.B-2*j*c.C, -3*j*c.D, -c.D
	least := min(a0, a0+h*(a1+h*(a2+h*a3)))
	// Stationary points: a1 + 2 a2 t + 3 a3 t^2 = 0.
	if disc := a2*a2 - 3*a1*a3; disc > 0 {
		q := -(a2 + math.Copysign(math.Sqrt(disc), a2))
		for _, s := range [2]float64{q / (3 * a3), a1 / q} {
			if s > 0 && s < h {
				least = min(least, a0+s*(a1+s*(a2+s*a3)))
			}
		}
	}
	return least
}

// advanceOf is the advance ratio at which CT/J^2 has the value tau > 0.
func (t *propellerTable) advanceOf(tau float64) float64 {
	n := len(t.j)
	first := t.ct[0].A
	if j0 := t.j[0]; first <= tau*j0*j0 {
		return math.Sqrt(first / tau)
	}
	if je := t.j[n-1]; t.ctEnd >= tau*je*je {
		// tau J^2 - s J - (CTe - s Je) = 0, the positive root without cancellation
		s, c := t.slopeEnd, t.ctEnd-t.slopeEnd*je
		return 2 * c / (math.Sqrt(s*s+4*tau*c) - s)
	}
	lo, hi := 0, n-1
	for hi-lo > 1 {
		m := (lo + hi) / 2
		if t.ct[m].A >= tau*t.j[m]*t.j[m] {
			lo = m
		} else {
			hi = m
		}
	}
	a, b := t.j[lo], t.j[hi]
	fa := t.ct[lo].A - tau*a*a
	yb, _ := t.ct[lo].At(b - a)
	fb := yb - tau*b*b
	var r num.Newton
	r.Start(a, b, a+(b-a)*fa/(fa-fb), false)
	for r.Next() {
		y, d := t.ct[lo].At(r.X - a)
		r.Put(y-tau*r.X*r.X, d-2*tau*r.X)
	}
	return r.X
}
