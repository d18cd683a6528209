package raster

import (
	"math"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
)

// gentle is the cosine of the turn up to which a joint is mitred on both sides; beyond, it is round.
const gentle = 0.94

// stroke accumulates all pieces of a line as one shape, so that no pixel gets its colour twice.
func (p *Painter) stroke(s *scene.Scene, op *scene.Op) {
	parts, width := p.frame.Stroke(s, op)
	h := width / 2
	for _, part := range parts {
		if !p.begin(part.Points, h+1) {
			continue
		}
		p.polyline(part, h)
		p.cover.Spans(p.emit)
	}
}

// polyline accumulates a polyline of half width h: runs of segments that turn gently are one outline with mitred
// joints, and a disc's sector rounds the outer side of each sharper turn.
func (p *Painter) polyline(part device.Part, h float64) {
	q := part.Points
	n := len(q) // corners
	segs := n - 1
	if part.Closed {
		segs = n
	}
	var prev, first scene.Point // unit directions of the segment before, and of the first
	var l, r scene.Point        // where the outline's two sides have arrived
	for i := range segs {
		a, b := q[i], q[(i+1)%n]
		d := direction(a, b)
		if i == 0 {
			first = d
			if part.Closed {
				// Starts square; the joint to the last segment is made at the end.
				prev = direction(q[n-1], a)
			}
			l, r = side(a, d, h), side(a, d, -h)
			p.cover.Line(r.X, r.Y, l.X, l.Y)
		} else {
			l, r = p.joint(a, prev, d, h, l, r)
		}
		prev = d
		if i == segs-1 {
			el, er := side(b, d, h), side(b, d, -h)
			p.sides(l, r, el, er)
			p.cover.Line(el.X, el.Y, er.X, er.Y)
			if part.Closed {
				p.sector(b, d, first, h)
			}
		}
	}
}

// joint ends the segment that arrives at c with direction d0 and starts the one that leaves with d1.
func (p *Painter) joint(c, d0, d1 scene.Point, h float64, l, r scene.Point) (nl, nr scene.Point) {
	cos := d0.X*d1.X + d0.Y*d1.Y
	if cos > gentle {
		m := scene.Point{X: d0.X + d1.X, Y: d0.Y + d1.Y}
		k := h / (1 + cos) // (d0+d1)/(1+cos) is the mitre
		nl = scene.Point{X: c.X + m.Y*k, Y: c.Y - m.X*k}
		nr = scene.Point{X: c.X - m.Y*k, Y: c.Y + m.X*k}
		p.sides(l, r, nl, nr)
		return nl, nr
	}
	el, er := side(c, d0, h), side(c, d0, -h)
	p.sides(l, r, el, er)
	p.cover.Line(el.X, el.Y, er.X, er.Y)
	p.sector(c, d0, d1, h)
	nl, nr = side(c, d1, h), side(c, d1, -h)
	p.cover.Line(nr.X, nr.Y, nl.X, nl.Y)
	return nl, nr
}

// sides accumulates both long sides of a piece from l, r to el, er.
func (p *Painter) sides(l, r, el, er scene.Point) {
	p.cover.Line(l.X, l.Y, el.X, el.Y)
	p.cover.Line(er.X, er.Y, r.X, r.Y)
}

// sector accumulates the disc's sector that rounds the outer side of a turn.
func (p *Painter) sector(c, d0, d1 scene.Point, h float64) {
	cross, cos := d0.X*d1.Y-d0.Y*d1.X, d0.X*d1.X+d0.Y*d1.Y
	turn := math.Atan2(cross, cos)
	if turn == 0 {
		return
	}
	// The left side (up, for a line to the right) is the outer one when turning right, which is clockwise: turn > 0.
	k := h
	if turn < 0 {
		k = -h
	}
	steps := max(1, int(math.Ceil(math.Abs(turn)/(2*math.Pi)*float64(device.Sides(h)))))
	a := side(c, d0, k)
	first := a
	for i := 1; i <= steps; i++ {
		sin, cos := math.Sincos(turn * float64(i) / float64(steps))
		b := side(c, scene.Point{X: d0.X*cos - d0.Y*sin, Y: d0.X*sin + d0.Y*cos}, k)
		p.arcLine(a, b, turn)
		a = b
	}
	p.arcLine(a, c, turn)
	p.arcLine(c, first, turn)
}

// arcLine keeps the direction of a sector the same as that of the pieces, whichever way it turns.
func (p *Painter) arcLine(a, b scene.Point, turn float64) {
	if turn < 0 {
		a, b = b, a
	}
	p.cover.Line(a.X, a.Y, b.X, b.Y)
}

func direction(a, b scene.Point) scene.Point {
	dx, dy := b.X-a.X, b.Y-a.Y
	n := math.Hypot(dx, dy)
	return scene.Point{X: dx / n, Y: dy / n}
}

// side is the point at distance h to the left of p, for a line through p with direction d.
func side(p, d scene.Point, h float64) scene.Point {
	return scene.Point{X: p.X + d.Y*h, Y: p.Y - d.X*h}
}
