package mesh

import (
	"math"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
)

// A line, and a band, is a strip of rows of four vertices across it: outside and inside of the fringe on one side,
// inside and outside on the other. A joint is one row, or, rounded, several that turn about a common inner corner, so
// that no two triangles of a line overlap and a translucent line is even.

// strip is the last row, and where it is in the batch: -1 when it has not been appended to it.
type strip struct {
	last [4]Vertex
	at   int
}

// move starts a strip with a row.
func (m *Mesh) move(row [4]Vertex) { m.row.last, m.row.at = row, -1 }

// link continues the strip to a row.
func (m *Mesh) link(row [4]Vertex) {
	if m.room(8) || m.row.at < 0 {
		m.row.at = m.base()
		m.Vertices = append(m.Vertices, m.row.last[:]...)
	}
	a, b := m.row.at, m.base()
	m.Vertices = append(m.Vertices, row[:]...)
	m.quad(a, a+1, b+1, b)
	m.quad(a+1, a+2, b+2, b+1)
	m.quad(a+2, a+3, b+3, b+2)
	m.row.last, m.row.at = row, b
}

// pen is what the rows of a line have in common.
type pen struct {
	inner, outer float64 // half widths within and without the fringe
	cover        float64
	steps        float64 // rows to a full turn of a round joint
}

func newPen(width float64) pen {
	h := width / 2
	p := pen{inner: h - 0.5, outer: h + 0.5, cover: 1, steps: float64(device.Sides(h + 0.5))}
	if p.inner < 0 {
		// Thinner than a pixel: a ridge with the area of the line.
		p.inner, p.cover = 0, 2*width/(1+width)
	}
	return p
}

func (m *Mesh) stroke(s *scene.Scene, op *scene.Op) {
	parts, width := m.frame.Stroke(s, op)
	if len(parts) == 0 {
		return
	}
	p := newPen(width)
	for _, part := range parts {
		if m.enter(device.Extent(part.Points, p.outer+1)) {
			m.polyline(part, p)
		}
	}
}

func (m *Mesh) polyline(part device.Part, p pen) {
	q, n := part.Points, len(part.Points)
	segs := n - 1
	var d0, d1 scene.Point // unit directions before and after the corner
	var l0, l1 float64     // lengths of the segments there
	if part.Closed {
		segs = n
		d0, l0 = direction(q[n-1], q[0])
	}
	firstD, firstL := direction(q[0], q[1])
	visible := true // the segment before the corner is within the clip
	for i := range segs {
		a, b := q[i], q[(i+1)%n]
		d1, l1 = direction(a, b)
		switch {
		case i > 0:
			m.joint(p, a, d0, d1, min(l0, l1), visible, false)
		case part.Closed:
			m.joint(p, a, d0, d1, min(l0, l1), false, true)
		default:
			m.cap(p, a, d1, l1)
		}
		visible = m.sees(a, b, p.outer)
		d0, l0 = d1, l1
	}
	if part.Closed {
		m.joint(p, q[0], d0, firstD, min(l0, firstL), visible, false)
	} else {
		m.lastCap(p, q[n-1], d0, l0, visible)
	}
}

// sees tells whether a segment may show within the clip.
func (m *Mesh) sees(a, b scene.Point, margin float64) bool {
	c := m.frame.Clip
	return max(a.X, b.X)+margin >= float64(c.Min.X) && min(a.X, b.X)-margin <= float64(c.Max.X) &&
		max(a.Y, b.Y)+margin >= float64(c.Min.Y) && min(a.Y, b.Y)-margin <= float64(c.Max.Y)
}

// step continues the strip to a row, or starts it anew when the piece between is not to be seen.
func (m *Mesh) step(row [4]Vertex, visible bool) {
	if visible {
		m.link(row)
	} else {
		m.move(row)
	}
}

// gentle is the cosine of the turn up to which a joint is one mitred row.
const gentle = 0.94

// joint is the rows at corner c between directions d0 and d1; reach is the length of the shorter segment. With start
// it is the last of them only, where a closed line begins.
func (m *Mesh) joint(p pen, c, d0, d1 scene.Point, reach float64, visible, start bool) {
	cos, cross := d0.X*d1.X+d0.Y*d1.Y, d0.X*d1.Y-d0.Y*d1.X
	if cos > gentle {
		k := 1 / (1 + cos)
		m.step(m.across(p, c, scene.Point{X: (d0.X + d1.X) * k, Y: (d0.Y + d1.Y) * k}), visible)
		return
	}
	// The inner corner lies on the bisector, at most as far back as the shorter segment reaches.
	turn := math.Atan2(cross, cos)
	tan := math.Abs(math.Tan(turn / 2))
	back := func(h float64) scene.Point {
		t := min(h*tan, reach)
		s := math.Copysign(h, turn) // towards the right when turning right
		return scene.Point{X: c.X - d0.X*t - d0.Y*s, Y: c.Y - d0.Y*t + d0.X*s}
	}
	in, out := back(p.inner), back(p.outer)
	steps := max(1, int(math.Ceil(math.Abs(turn)/(2*math.Pi)*p.steps)))
	for i := 0; i <= steps; i++ {
		sin, cos := math.Sincos(turn * float64(i) / float64(steps))
		d := scene.Point{X: d0.X*cos - d0.Y*sin, Y: d0.X*sin + d0.Y*cos}
		row := m.across(p, c, d)
		if turn > 0 {
			row[2], row[3] = m.colour.at(in.X, in.Y, p.cover), m.colour.at(out.X, out.Y, 0)
		} else {
			row[1], row[0] = m.colour.at(in.X, in.Y, p.cover), m.colour.at(out.X, out.Y, 0)
		}
		if start {
			m.move(row)
		} else {
			m.step(row, visible || i > 0)
		}
	}
}

// across is the row at c for direction d; a mitre has a d longer than 1.
func (m *Mesh) across(p pen, c, d scene.Point) [4]Vertex {
	// left of d on the screen is (d.Y, -d.X)
	return [4]Vertex{
		m.colour.at(c.X+d.Y*p.outer, c.Y-d.X*p.outer, 0),
		m.colour.at(c.X+d.Y*p.inner, c.Y-d.X*p.inner, p.cover),
		m.colour.at(c.X-d.Y*p.inner, c.Y+d.X*p.inner, p.cover),
		m.colour.at(c.X-d.Y*p.outer, c.Y+d.X*p.outer, 0),
	}
}

// cap is the two rows of a blunt start at c, a fringe apart.
func (m *Mesh) cap(p pen, c, d scene.Point, length float64) {
	k := min(0.5, length/2)
	row := m.across(p, scene.Point{X: c.X - d.X*0.5, Y: c.Y - d.Y*0.5}, d)
	m.move(clear(row))
	m.link(m.across(p, scene.Point{X: c.X + d.X*k, Y: c.Y + d.Y*k}, d))
}

// lastCap is the two rows of a blunt end.
func (m *Mesh) lastCap(p pen, c, d scene.Point, length float64, visible bool) {
	k := min(0.5, length/2)
	m.step(m.across(p, scene.Point{X: c.X - d.X*k, Y: c.Y - d.Y*k}, d), visible)
	m.link(clear(m.across(p, scene.Point{X: c.X + d.X*0.5, Y: c.Y + d.Y*0.5}, d)))
}

// clear is a row without coverage.
func clear(row [4]Vertex) [4]Vertex {
	for i := range row {
		row[i].R, row[i].G, row[i].B, row[i].A = 0, 0, 0, 0
	}
	return row
}

func direction(a, b scene.Point) (d scene.Point, length float64) {
	dx, dy := b.X-a.X, b.Y-a.Y
	length = math.Hypot(dx, dy)
	return scene.Point{X: dx / length, Y: dy / length}, length
}
