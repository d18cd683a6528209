package mesh

import (
	"image"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
)

// rect is a filled rectangle, cut to the clip here when it is square.
func (m *Mesh) rect(op *scene.Op) {
	box := m.frame.Box(op.Rect)
	r := device.Radius(op.W*m.frame.Scale, box)
	if r == 0 {
		if box = box.Intersect(m.frame.Clip); m.enter(box) {
			m.box(box)
		}
		return
	}
	if !m.enter(box.Inset(-1)) {
		return
	}
	// The same corners from centres on the same places: one ring inside the edge, one outside.
	in := min(0.5, r)
	m.ring = device.RoundRect(m.ring[:0], box, r)
	m.convex(m.ring, box, r, in)
}

// box is a rectangle on whole pixels.
func (m *Mesh) box(b image.Rectangle) {
	m.room(4)
	i := m.base()
	x0, y0, x1, y1 := float64(b.Min.X), float64(b.Min.Y), float64(b.Max.X), float64(b.Max.Y)
	m.vert(x0, y0, 1)
	m.vert(x1, y0, 1)
	m.vert(x1, y1, 1)
	m.vert(x0, y1, 1)
	m.quad(i, i+1, i+2, i+3)
}

// convex is a rounded rectangle whose outline is ring: each point moves in by in and out by half a pixel along the
// line to the centre of its corner.
func (m *Mesh) convex(ring []scene.Point, box image.Rectangle, r, in float64) {
	n := len(ring)
	m.room(2 * n)
	base := m.base()
	cx0, cy0 := float64(box.Min.X)+r, float64(box.Min.Y)+r
	cx1, cy1 := float64(box.Max.X)-r, float64(box.Max.Y)-r
	for i, p := range ring {
		c := scene.Point{X: cx1, Y: cy1} // the quarter that RoundRect starts with
		switch 4 * i / n {
		case 1:
			c.X = cx0
		case 2:
			c.X, c.Y = cx0, cy0
		case 3:
			c.Y = cy0
		}
		dx, dy := (p.X-c.X)/r, (p.Y-c.Y)/r
		m.vert(p.X-dx*in, p.Y-dy*in, 1)
		m.vert(p.X+dx*0.5, p.Y+dy*0.5, 0)
	}
	m.rings(base, n)
}

// rings joins n pairs of an inner and an outer vertex, starting at base, to a fan and a fringe.
func (m *Mesh) rings(base, n int) {
	for i := 2; i < n; i++ {
		m.tri(base, base+2*(i-1), base+2*i)
	}
	m.fringe(base, n)
}

// fringe joins each pair to the next, and the last to the first.
func (m *Mesh) fringe(base, n int) {
	a := base + 2*(n-1)
	for i := range n {
		b := base + 2*i
		m.quad(a, a+1, b+1, b)
		a = b
	}
}

// disc is a circle. One smaller than a pixel keeps its area: a cone, lower than full coverage.
func (m *Mesh) disc(c scene.Point, r float64) {
	m.ring = append(m.ring[:0], c)
	if !m.enter(device.Extent(m.ring, r+0.5)) {
		return
	}
	inner, cover := r-0.5, 1.0
	if inner < 0 {
		inner, cover = 0, min(1, 3*r*r/((r+0.5)*(r+0.5)))
	}
	m.ring = device.Corners(m.ring[:0], scene.Point{}, 1, device.Sides(r))
	n := len(m.ring)
	m.room(2 * n)
	base := m.base()
	for _, d := range m.ring {
		m.vert(c.X+d.X*inner, c.Y+d.Y*inner, cover)
		m.vert(c.X+d.X*(r+0.5), c.Y+d.Y*(r+0.5), 0)
	}
	m.rings(base, n)
}

// gradient is a rectangle with two colours, cut to the clip here.
func (m *Mesh) gradient(op *scene.Op) {
	box := m.frame.Box(op.Rect)
	in := box.Intersect(m.frame.Clip)
	if in.Empty() || !m.enter(in) {
		return
	}
	from, to := m.premultiplied(op.Color), m.premultiplied(op.Color2)
	lo, hi, n := in.Min.X-box.Min.X, in.Max.X-box.Min.X, box.Dx()
	if op.Vertical {
		lo, hi, n = in.Min.Y-box.Min.Y, in.Max.Y-box.Min.Y, box.Dy()
	}
	a, b := between(from, to, float32(lo)/float32(n)), between(from, to, float32(hi)/float32(n))
	m.room(4)
	i := m.base()
	x0, y0, x1, y1 := float64(in.Min.X), float64(in.Min.Y), float64(in.Max.X), float64(in.Max.Y)
	if op.Vertical {
		m.Vertices = append(m.Vertices, a.at(x0, y0, 1), a.at(x1, y0, 1), b.at(x1, y1, 1), b.at(x0, y1, 1))
	} else {
		m.Vertices = append(m.Vertices, a.at(x0, y0, 1), b.at(x1, y0, 1), b.at(x1, y1, 1), a.at(x0, y1, 1))
	}
	m.quad(i, i+1, i+2, i+3)
}

func between(p, q Vertex, t float32) Vertex {
	p.R += (q.R - p.R) * t
	p.G += (q.G - p.G) * t
	p.B += (q.B - p.B) * t
	p.A += (q.A - p.A) * t
	return p
}

// text is a quad a character, cut to the clip here.
func (m *Mesh) text(s *scene.Scene, op *scene.Op) {
	f := &m.frame
	f.Text(s, op)
	for {
		index, x, y, ok := f.Next()
		if !ok {
			return
		}
		g := m.atlas.At(op.Style, index)
		if g.W == 0 {
			continue
		}
		x, y = x+int(g.Left), y+int(g.Top)
		in := image.Rect(x, y, x+int(g.W), y+int(g.H)).Intersect(f.Clip)
		if in.Empty() || !m.enter(in) {
			continue
		}
		m.room(4)
		i := m.base()
		dx, dy := int(g.X)-x, int(g.Y)-y
		for _, p := range [4]image.Point{in.Min, {X: in.Max.X, Y: in.Min.Y}, in.Max, {X: in.Min.X, Y: in.Max.Y}} {
			v := m.colour
			v.DstX, v.DstY, v.SrcX, v.SrcY = float32(p.X), float32(p.Y), float32(p.X+dx), float32(p.Y+dy)
			m.Vertices = append(m.Vertices, v)
		}
		m.quad(i, i+1, i+2, i+3)
	}
}
