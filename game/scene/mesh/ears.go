package mesh

import "levelspan/game/scene"

// ears triangulates a simple polygon by cutting ears off: a convex corner whose triangle holds no reflex corner. The
// store is kept. A polygon that crosses itself still gives n-2 triangles of its own corners.
type ears struct {
	next, prev []int32
	reflex     []bool
	out        [][3]int32
	work       int
}

// maxWork bounds the corner tests of one polygon (some 10 ms); a simple polygon of maxCorners corners such as a chart
// has needs a thousandth. When it is used up, corners are cut off unseen.
const maxWork = 4 << 20

func (e *ears) cut(q []scene.Point) [][3]int32 {
	n := len(q)
	e.next, e.prev, e.reflex, e.out = e.next[:0], e.prev[:0], e.reflex[:0], e.out[:0]
	sign := 1.0
	if area(q) < 0 {
		sign = -1
	}
	for i := range n {
		e.next = append(e.next, int32((i+1)%n))
		e.prev = append(e.prev, int32((i+n-1)%n))
	}
	for i := range n {
		e.reflex = append(e.reflex, sign*e.turn(q, int32(i)) < 0)
	}
	e.work = maxWork
	i, left, stuck := int32(0), n, 0
	for left > 3 {
		// After a full round without an ear the polygon is not simple: take what comes.
		if stuck < left && e.work > 0 && !e.isEar(q, i, sign) {
			i = e.next[i]
			stuck++
			continue
		}
		p, k := e.prev[i], e.next[i]
		e.out = append(e.out, [3]int32{p, i, k})
		e.next[p], e.prev[k] = k, p
		e.reflex[p] = sign*e.turn(q, p) < 0
		e.reflex[k] = sign*e.turn(q, k) < 0
		left--
		stuck = 0
		// On from the corner after the next: ears all round give fat triangles.
		i = e.next[k]
	}
	e.out = append(e.out, [3]int32{e.prev[i], i, e.next[i]})
	return e.out
}

// turn is twice the signed area of the triangle at corner i.
func (e *ears) turn(q []scene.Point, i int32) float64 {
	return cross(q[e.prev[i]], q[i], q[e.next[i]])
}

func cross(a, b, c scene.Point) float64 {
	return (b.X-a.X)*(c.Y-a.Y) - (b.Y-a.Y)*(c.X-a.X)
}

func (e *ears) isEar(q []scene.Point, i int32, sign float64) bool {
	if e.reflex[i] {
		return false
	}
	p, k := e.prev[i], e.next[i]
	a, b, c := q[p], q[i], q[k]
	x0, x1 := min(a.X, b.X, c.X), max(a.X, b.X, c.X)
	y0, y1 := min(a.Y, b.Y, c.Y), max(a.Y, b.Y, c.Y)
	for j := e.next[k]; j != p; j = e.next[j] {
		e.work--
		if !e.reflex[j] {
			continue
		}
		v := q[j]
		if v.X < x0 || v.X > x1 || v.Y < y0 || v.Y > y1 || v == a || v == b || v == c {
			continue
		}
		if sign*cross(a, b, v) >= 0 && sign*cross(b, c, v) >= 0 && sign*cross(c, a, v) >= 0 {
			return false
		}
	}
	return true
}
