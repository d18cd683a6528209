package perf

import (
	"math"

	"levelspan/perf/num"
)

// The general path: every question answered from f.at alone, over nodes of the parameter. It takes any thrust
// curve; tabulated propellers need it, and the tests hold the closed forms of the others to it.

// point is one node of the scan.
type point struct {
	p, v, t float64
}

// excess is T - D, N.
func (f *flight) excess(q *point) float64 { return q.t - f.drag.at(q.v) }

// scan fills the solver's nodes for f from the stall upwards until the thrust is below the drag beyond the speed of least drag. A
// flight that was scanned last is not scanned again.
func (z *Solver) scan(f *flight) {
	if z.scanned == f.serial && f.serial != 0 {
		return
	}
	z.scanned = f.serial
	nodes := z.nodes[:0]
	p := f.param(f.stall)
	_, t, _ := f.at(p)
	last := point{p, f.stall, t}
	nodes = append(nodes, last)
	factor := 1.06
	if f.kind == Tabulated {
		factor = 1.5
		for i := range f.table.node {
			g := &f.table.node[i]
			if g.j <= p*(1+1e-9) {
				continue
			}
			n := f.nodeRevs(g)
			last = point{g.j, g.j * n * f.dia, f.rhoD4 * n * n * g.ct}
			nodes = append(nodes, last)
		}
	}
	top := f.leastDrag()
	for i := 0; i < 400 && (last.v < top || f.excess(&last) >= 0 || len(nodes) < 3); i++ {
		p = last.p * factor
		v, t, _ := f.at(p)
		last = point{p, v, t}
		nodes = append(nodes, last)
	}
	z.nodes = nodes
}

// What a search maximises.
const (
	ofThrust = iota // T - D
	ofPower         // (T - D) V
)

func (f *flight) merit(q *point, of int) float64 {
	x := f.excess(q)
	if of == ofPower {
		x *= q.v
	}
	return x
}

// meritSlope is the derivative of the merit against V.
func (f *flight) meritSlope(p float64, of int) (value, slope float64, q point) {
	v, t, dt := f.at(p)
	q = point{p, v, t}
	x, dx := t-f.drag.at(v), dt-f.drag.slope(v)
	if of == ofPower {
		return x * v, x + v*dx, q
	}
	return x, dx, q
}

// scanMaximum is the greatest merit at or above the stall: every hump of the nodes is refined.
func (f *flight) scanMaximum(nodes []point, of int) (best point, value float64) {
	value = math.Inf(-1)
	n := len(nodes)
	before := math.Inf(-1)
	here := f.merit(&nodes[0], of)
	for i := range nodes {
		after := math.Inf(-1)
		if i+1 < n {
			after = f.merit(&nodes[i+1], of)
		}
		if here >= before && here >= after {
			q, m := f.refine(nodes, i, of)
			if m > value {
				best, value = q, m
			}
		}
		before, here = here, after
	}
	return best, value
}

// refine finds the local maximum around node i.
func (f *flight) refine(nodes []point, i, of int) (point, float64) {
	m, d, q := f.meritSlope(nodes[i].p, of)
	if i == 0 {
		q.v = nodes[0].v
	}
	lo, hi := i, i
	if d > 0 && i+1 < len(nodes) {
		hi = i + 1
	} else if d < 0 && i > 0 {
		lo = i - 1
	} else {
		return q, m
	}
	_, dlo, _ := f.meritSlope(nodes[lo].p, of)
	_, dhi, _ := f.meritSlope(nodes[hi].p, of)
	if dlo > 0 && dhi < 0 {
		var r num.Root
		r.Start(nodes[lo].p, dlo, nodes[hi].p, dhi, 0)
		for r.Next() {
			_, d, _ = f.meritSlope(r.X, of)
			r.Put(d)
		}
		m2, _, q2 := f.meritSlope(r.X, of)
		if m2 >= m {
			return q2, m2
		}
		return q, m
	}
	var g num.Minimum
	g.Start(nodes[lo].p, nodes[hi].p, 0)
	for g.Next() {
		v, _, _ := f.meritSlope(g.X, of)
		g.Put(-v)
	}
	if -g.F > m {
		_, _, q = f.meritSlope(g.X, of)
		return q, -g.F
	}
	return q, m
}

// scanBand is the stretch of speeds around the maximum best where T >= D.
func (f *flight) scanBand(nodes []point, best point) (slow, fast float64, stalled bool) {
	below := best
	slow, stalled = nodes[0].v, true
	for i := len(nodes) - 1; i >= 0; i-- {
		if nodes[i].p >= best.p {
			continue
		}
		if f.excess(&nodes[i]) < 0 {
			slow, stalled = f.cross(nodes[i].p, below.p), false
			break
		}
		below = nodes[i]
	}
	above := best
	fast = best.v
	for i := range nodes {
		if nodes[i].p <= best.p {
			continue
		}
		if f.excess(&nodes[i]) < 0 {
			fast = f.cross(above.p, nodes[i].p)
			break
		}
		above = nodes[i]
		fast = above.v
	}
	return slow, fast, stalled
}

// cross is the speed between two parameters where T = D.
func (f *flight) cross(a, b float64) float64 {
	fa, _, _ := f.meritSlope(a, ofThrust)
	fb, _, _ := f.meritSlope(b, ofThrust)
	var r num.Root
	r.Start(a, fa, b, fb, 0)
	for r.Next() {
		x, _, _ := f.meritSlope(r.X, ofThrust)
		r.Put(x)
	}
	v, _, _ := f.at(r.X)
	return v
}
