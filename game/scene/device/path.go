package device

import (
	"math"

	"levelspan/game/scene"
)

// Part is one polyline of a stroke, device pixels; at least two points, none on its neighbour.
type Part struct {
	Points []scene.Point
	Closed bool
	p0, p1 int
}

// maxDashed bounds the points of a dashed stroke; what would follow is left out.
const maxDashed = 1 << 15

// tiny is a distance, device pixels, below which two points are one: too small to be seen, and curves with more points
// than that cost for nothing.
const tiny = 1.0 / 16

// Polygon is the outline of a fill; nil when fewer than three points are left. Points that are no numbers are left
// out, and far ones brought to the limit. The result is valid until the next call on f.
func (f *Frame) Polygon(s *scene.Scene, op *scene.Op) []scene.Point {
	f.pts = f.pts[:0]
	for _, p := range points(s, op) {
		p.X *= f.Scale
		p.Y *= f.Scale
		if number(p) {
			f.add(scene.Point{X: clamp(p.X), Y: clamp(p.Y)})
		}
	}
	for len(f.pts) > 2 && same(f.pts[0], f.pts[len(f.pts)-1]) {
		f.pts = f.pts[:len(f.pts)-1]
	}
	if len(f.pts) < 3 {
		return nil
	}
	return f.pts
}

// add appends a point unless it repeats the last.
func (f *Frame) add(p scene.Point) {
	if n := len(f.pts); n > 0 && same(f.pts[n-1], p) {
		return
	}
	f.pts = append(f.pts, p)
}

func same(p, q scene.Point) bool { return math.Abs(p.X-q.X) < tiny && math.Abs(p.Y-q.Y) < tiny }

// Band is the two edges of a band, of equal length n >= 2, in pairs of numbers; a pair that is no pair of numbers
// ends the piece, and the next piece is asked for with from = next. When nothing is left n is 0.
func (f *Frame) Band(s *scene.Scene, op *scene.Op, from int) (upper, lower []scene.Point, next int) {
	p := points(s, op)
	half := len(p) / 2
	for from < half {
		f.pts = f.pts[:0]
		i := from
		for ; i < half; i++ {
			u, l := f.device(p[i]), f.device(p[half+i])
			if !number(u) || !number(l) {
				break
			}
			u, l = scene.Point{X: clamp(u.X), Y: clamp(u.Y)}, scene.Point{X: clamp(l.X), Y: clamp(l.Y)}
			if n := len(f.pts); n > 0 && same(f.pts[n-2], u) && same(f.pts[n-1], l) {
				continue
			}
			f.pts = append(f.pts, u, l)
		}
		from = i + 1
		if n := len(f.pts); n >= 4 {
			// Apart again: upper edges first.
			for k := 0; k < n; k += 2 {
				f.pts = append(f.pts, f.pts[k])
			}
			for k := 1; k < n; k += 2 {
				f.pts = append(f.pts, f.pts[k])
			}
			return f.pts[n : n+n/2], f.pts[n+n/2:], from
		}
	}
	return nil, nil, half
}

func (f *Frame) device(p scene.Point) scene.Point {
	return scene.Point{X: p.X * f.Scale, Y: p.Y * f.Scale}
}

// Stroke is the polylines of a stroke and its width. A point that is no number interrupts the line. Lines that are all
// level or upright are put on whole pixels. The result is valid until the next call on f.
func (f *Frame) Stroke(s *scene.Scene, op *scene.Op) (parts []Part, width float64) {
	width = op.W * f.Scale
	p := points(s, op)
	if !(width > 0) || len(p) < 2 {
		return nil, 0
	}
	width = min(width, MaxWidth)
	f.pts, f.parts = f.pts[:0], f.parts[:0]
	dash, gap := op.Dash*f.Scale, op.Gap*f.Scale
	if !f.exact && square(p, op.Closed) {
		width = max(1, math.Round(width))
		dash, gap = math.Round(dash), math.Round(gap)
		f.snapped(p, width, op.Closed)
	} else {
		f.free(p, op.Closed)
	}
	if !f.exact && op.Dash > 0 && op.Gap > 0 {
		f.dashed(max(dash, 1), max(gap, 1))
	}
	for i := range f.parts {
		q := &f.parts[i]
		q.Points = f.pts[q.p0:q.p1:q.p1]
	}
	return f.parts, width
}

// square tells whether every segment is level or upright and every point near.
func square(p []scene.Point, closed bool) bool {
	if closed {
		if a, b := p[0], p[len(p)-1]; a.X != b.X && a.Y != b.Y {
			return false
		}
	}
	for i, b := range p {
		if !(math.Abs(b.X) <= Far/scene.MaxScale && math.Abs(b.Y) <= Far/scene.MaxScale) {
			return false
		}
		if i > 0 && p[i-1].X != b.X && p[i-1].Y != b.Y {
			return false
		}
	}
	return true
}

// snapped puts a square path where a line of this whole width covers whole pixels.
func (f *Frame) snapped(p []scene.Point, width float64, closed bool) {
	first, last := 1, len(p)-2 // the nearest other places of the two ends
	for first < len(p) && p[first] == p[0] {
		first++
	}
	if first == len(p) {
		return // one place only
	}
	for p[last] == p[len(p)-1] {
		last--
	}
	for i, q := range p {
		if i > 0 && i < first || i > last && i < len(p)-1 {
			continue // still at an end
		}
		d := f.device(q)
		c := scene.Point{X: centre(d.X, width), Y: centre(d.Y, width)}
		// The ends of an open line stop on a pixel's edge along the line.
		if !closed && i == 0 {
			c = blunt(d, c, q.Y == p[first].Y)
		} else if !closed && i == len(p)-1 {
			c = blunt(d, c, q.Y == p[last].Y)
		}
		f.add(c)
	}
	f.end(0, closed)
}

func blunt(d, c scene.Point, level bool) scene.Point {
	if level {
		return scene.Point{X: math.Round(d.X), Y: c.Y}
	}
	return scene.Point{X: c.X, Y: math.Round(d.Y)}
}

func centre(v, width float64) float64 { return math.Round(v-width/2) + width/2 }

// end closes the part that began at p0, unless it is no line.
func (f *Frame) end(p0 int, closed bool) {
	n := len(f.pts)
	for closed && n-p0 > 1 && same(f.pts[p0], f.pts[n-1]) {
		n--
		f.pts = f.pts[:n]
	}
	if n-p0 < 2 {
		f.pts = f.pts[:p0]
		return
	}
	f.parts = append(f.parts, Part{Closed: closed && n-p0 > 2, p0: p0, p1: n})
}

// free takes any path. When a point is far or no number, the path is taken segment by segment, each cut at the limit.
func (f *Frame) free(p []scene.Point, closed bool) {
	whole := true
	for _, q := range p {
		if !near(f.device(q)) { // false for what is no number, too
			whole = false
			break
		}
	}
	if whole {
		for _, q := range p {
			f.add(f.device(q))
		}
		f.end(0, closed)
		return
	}
	n := len(p)
	if closed {
		n++
	}
	p0 := len(f.pts)
	for i := 1; i < n; i++ {
		a, b := f.device(p[i-1]), f.device(p[i%len(p)])
		if !number(a) || !number(b) || !cut(&a, &b) {
			f.end(p0, false)
			p0 = len(f.pts)
			continue
		}
		if k := len(f.pts); k > p0 && !same(f.pts[k-1], a) {
			f.end(p0, false)
			p0 = len(f.pts)
		}
		if len(f.pts) == p0 {
			f.pts = append(f.pts, a)
		}
		f.add(b)
	}
	f.end(p0, false)
}

// cut shortens a segment to what lies within the limit; false when nothing does.
func cut(a, b *scene.Point) bool {
	if near(*a) && near(*b) {
		return true
	}
	// Halved first: the difference of two finite numbers may overflow.
	dx, dy := b.X/2-a.X/2, b.Y/2-a.Y/2
	t0, t1 := 0.0, 2.0
	clip := func(from, d float64) {
		if d == 0 {
			if math.Abs(from) > Far {
				t1 = -1
			}
			return
		}
		u, v := (-Far-from)/d, (Far-from)/d
		t0, t1 = max(t0, min(u, v)), min(t1, max(u, v))
	}
	clip(a.X, dx)
	clip(a.Y, dy)
	if !(t0 < t1) {
		return false
	}
	p := scene.Point{X: clamp(a.X + t0*dx), Y: clamp(a.Y + t0*dy)}
	q := scene.Point{X: clamp(a.X + t1*dx), Y: clamp(a.Y + t1*dy)}
	if !number(p) || !number(q) {
		return false
	}
	*a, *b = p, q
	return true
}

// dashed replaces the parts by their dashes, each part starting with one. dash and gap are at least 1.
func (f *Frame) dashed(dash, gap float64) {
	f.dash = append(f.dash[:0], f.pts...)
	old := len(f.parts)
	f.pts = f.pts[:0]
	for k := range old {
		part := f.parts[k]
		q := f.dash[part.p0:part.p1]
		n := len(q)
		if part.Closed {
			n++
		}
		left, on, p0 := dash, true, len(f.pts)
		f.pts = append(f.pts, q[0])
		for i := 1; i < n; i++ {
			a, b := q[i-1], q[i%len(q)]
			length := math.Hypot(b.X-a.X, b.Y-a.Y)
			for at := 0.0; at < length && len(f.pts) < maxDashed; {
				step := min(left, length-at)
				at += step
				left -= step
				p := scene.Point{X: a.X + (b.X-a.X)*at/length, Y: a.Y + (b.Y-a.Y)*at/length}
				if on {
					f.add(p)
				}
				if left > 1e-6 {
					continue
				}
				if on {
					f.end(p0, false)
					left = gap
				} else {
					p0 = len(f.pts)
					f.pts = append(f.pts, p)
					left = dash
				}
				on = !on
			}
		}
		if on {
			f.end(p0, false)
		}
	}
	f.parts = append(f.parts[:0], f.parts[old:]...)
}
