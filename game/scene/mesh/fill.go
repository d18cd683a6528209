package mesh

import (
	"math"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
)

// band is a strip whose rows stand between the two edges.
func (m *Mesh) band(s *scene.Scene, op *scene.Op) {
	for next := 0; ; {
		var u, l []scene.Point
		u, l, next = m.frame.Band(s, op, next)
		if len(u) == 0 {
			return
		}
		if m.enter(device.Extent(u, 2).Union(device.Extent(l, 2))) {
			m.between(u, l)
		}
	}
}

func (m *Mesh) between(u, l []scene.Point) {
	n := len(u)
	visible := true
	for i := range n {
		row := m.bandRow(u, l, i, u[i], l[i])
		switch i {
		case 0:
			// The blunt start: the first row a little inwards, and one without coverage outwards.
			m.move(clear(m.bandRow(u, l, 0, along(u[0], u[1], -0.5), along(l[0], l[1], -0.5))))
			row = m.bandRow(u, l, 0, along(u[0], u[1], 0.5), along(l[0], l[1], 0.5))
			m.link(row)
		case n - 1:
			row = m.bandRow(u, l, i, along(u[i], u[i-1], 0.5), along(l[i], l[i-1], 0.5))
			m.step(row, visible)
			m.link(clear(m.bandRow(u, l, i, along(u[i], u[i-1], -0.5), along(l[i], l[i-1], -0.5))))
		default:
			m.step(row, visible)
		}
		if i+1 < n {
			visible = m.sees(u[i], u[i+1], 1) || m.sees(l[i], l[i+1], 1) || m.sees(u[i], l[i+1], 1)
		}
	}
}

// along is the point at a distance from a towards b, but not past the middle.
func along(a, b scene.Point, distance float64) scene.Point {
	dx, dy := b.X-a.X, b.Y-a.Y
	length := math.Hypot(dx, dy)
	if length < 1e-9 {
		return a
	}
	k := min(distance/length, 0.5)
	return scene.Point{X: a.X + dx*k, Y: a.Y + dy*k}
}

// bandRow is row i of a band, with its edges moved to pu and pl.
func (m *Mesh) bandRow(u, l []scene.Point, i int, pu, pl scene.Point) [4]Vertex {
	nu, nl := normal(u, i), normal(l, i)
	// Where the edges have crossed, the lower one is on top.
	sign := 1.0
	if pu.Y > pl.Y {
		sign = -1
	}
	// A band thinner than a pixel is a ridge with the area of the band. Its thickness is taken across the flatter edge.
	thick := math.Abs(pl.Y-pu.Y) * max(math.Abs(nu.Y), math.Abs(nl.Y)) / max(nu.X*nu.X+nu.Y*nu.Y, 1)
	in, cover := 0.5, 1.0
	if thick < 1 {
		in, cover = thick/2, 2*thick/(1+thick)
	}
	return [4]Vertex{
		m.colour.at(pu.X+nu.X*0.5*sign, pu.Y+nu.Y*0.5*sign, 0),
		m.colour.at(pu.X-nu.X*in*sign, pu.Y-nu.Y*in*sign, cover),
		m.colour.at(pl.X+nl.X*in*sign, pl.Y+nl.Y*in*sign, cover),
		m.colour.at(pl.X-nl.X*0.5*sign, pl.Y-nl.Y*0.5*sign, 0),
	}
}

// normal is the mitre of a polyline at point i, to the left (up for a line to the right): the unit normal of a
// straight line, longer at a corner, at most 2.
func normal(q []scene.Point, i int) scene.Point {
	a, b := q[max(i-1, 0)], q[i]
	c := q[min(i+1, len(q)-1)]
	return mitre(a, b, c)
}

func mitre(a, b, c scene.Point) scene.Point {
	d0, l0 := unit(a, b)
	d1, l1 := unit(b, c)
	switch {
	case l0 == 0 && l1 == 0:
		return scene.Point{Y: -1}
	case l0 == 0:
		d0 = d1
	case l1 == 0:
		d1 = d0
	}
	// 1+cos is 1/2 where the mitre is 2 long.
	k := 1 / max(1+d0.X*d1.X+d0.Y*d1.Y, 0.5)
	return scene.Point{X: (d0.Y + d1.Y) * k, Y: -(d0.X + d1.X) * k}
}

func unit(a, b scene.Point) (scene.Point, float64) {
	d, length := direction(a, b)
	if length < 1e-9 {
		return scene.Point{}, 0
	}
	return d, length
}

// polygon is ears of the inner ring and a fringe. q is distinct neighbours, at least three.
func (m *Mesh) polygon(q []scene.Point) {
	n := len(q)
	if n > maxCorners {
		q = thin(q, maxCorners)
		n = len(q)
	}
	out := 0.5
	if area(q) < 0 {
		out = -0.5 // counter-clockwise on the screen: left is inside
	}
	m.room(2 * n)
	base := m.base()
	for i, p := range q {
		w := mitre(q[(i+n-1)%n], p, q[(i+1)%n])
		m.vert(p.X-w.X*out, p.Y-w.Y*out, 1)
		m.vert(p.X+w.X*out, p.Y+w.Y*out, 0)
	}
	for _, t := range m.ears.cut(q) {
		m.tri(base+2*int(t[0]), base+2*int(t[1]), base+2*int(t[2]))
	}
	m.fringe(base, n)
}

// maxCorners bounds the work on a polygon; a polygon with more loses some of them evenly.
const maxCorners = 4096

func thin(q []scene.Point, n int) []scene.Point {
	for i := range n {
		q[i] = q[i*len(q)/n]
	}
	return q[:n]
}

// area is twice the signed area: positive for a polygon that runs clockwise on the screen.
func area(q []scene.Point) float64 {
	sum := 0.0
	a := q[len(q)-1]
	for _, b := range q {
		sum += a.X*b.Y - b.X*a.Y
		a = b
	}
	return sum
}
