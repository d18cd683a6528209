package raster

import (
	"image"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
	"levelspan/game/scene/glyph"
)

// shadow is what the last Update painted: the scene, and for each operation its clip and the pixels it may touch.
type shadow struct {
	scene scene.Scene
	clips []image.Rectangle
	boxes []image.Rectangle
	dst   *image.RGBA
}

// maxParts bounds the rectangles that Update returns.
const maxParts = 24

// Update brings dst from the scene of the last Update to s by painting only what differs, and returns the rectangles
// that it painted (valid until the next call): none when nothing changed, the whole picture when the size, the scale
// or dst is another. Nobody else may have painted on dst in between.
func (p *Painter) Update(s *scene.Scene, dst *image.RGBA) []image.Rectangle {
	old, now := &p.shadows[p.turn&1], &p.shadows[p.turn&1^1]
	p.turn++
	now.scene.CopyFrom(s)
	now.dst = dst
	p.outline(s, now)
	p.dirty = p.dirty[:0]
	a, b := &old.scene, &now.scene
	if old.dst != dst || a.Width != b.Width || a.Height != b.Height || a.Scale != b.Scale || a.Background != b.Background {
		p.mark(p.frame.Bounds)
	} else {
		p.compare(old, now)
	}
	for _, r := range p.dirty {
		p.paint(s, dst, r, now.boxes)
	}
	return p.dirty
}

// outline notes each operation's clip and pixels.
func (p *Painter) outline(s *scene.Scene, to *shadow) {
	f := &p.frame
	f.Begin(s)
	if p.atlas == nil || p.atlas.Scale != f.Scale {
		p.atlas = glyph.OnDemand(f.Scale)
	}
	to.clips, to.boxes = to.clips[:0], to.boxes[:0]
	for i := range s.Ops {
		op := &s.Ops[i]
		switch op.Kind {
		case scene.OpPushClip:
			f.Push(op.Rect)
		case scene.OpPopClip:
			f.Pop()
		}
		to.clips = append(to.clips, f.Clip)
		to.boxes = append(to.boxes, p.extent(s, op).Intersect(f.Clip))
	}
}

// extent is the pixels that an operation may touch.
func (p *Painter) extent(s *scene.Scene, op *scene.Op) (box image.Rectangle) {
	f := &p.frame
	switch op.Kind {
	case scene.OpFill:
		return device.Extent(f.Polygon(s, op), 1)
	case scene.OpBand:
		for next := 0; ; {
			var u, l []scene.Point
			u, l, next = f.Band(s, op, next)
			if len(u) == 0 {
				return box
			}
			box = box.Union(device.Extent(u, 1)).Union(device.Extent(l, 1))
		}
	case scene.OpStroke:
		parts, width := f.Stroke(s, op)
		for _, q := range parts {
			box = box.Union(device.Extent(q.Points, width/2+1))
		}
	case scene.OpRect, scene.OpGradient:
		return f.Box(op.Rect)
	case scene.OpCircle:
		if c, r, ok := f.Disc(s, op); ok {
			p.outer = append(p.outer[:0], c)
			return device.Extent(p.outer, r+1)
		}
	case scene.OpText:
		f.Text(s, op)
		for {
			index, x, y, ok := f.Next()
			if !ok {
				return box
			}
			if g := p.atlas.At(op.Style, index); g.W > 0 {
				x, y = x+int(g.Left), y+int(g.Top)
				box = box.Union(image.Rect(x, y, x+int(g.W), y+int(g.H)))
			}
		}
	}
	return box
}

// compare marks the pixels of every operation that one scene has and the other has not. Frames of one screen mostly
// have the same operations with other numbers; otherwise only the beginning and the end that they share are matched.
func (p *Painter) compare(old, now *shadow) {
	a, b := &old.scene, &now.scene
	n, m := len(a.Ops), len(b.Ops)
	equal := func(i, j int) bool {
		return old.clips[i] == now.clips[j] && scene.SameOp(a, i, b, j)
	}
	if n == m {
		for i := range n {
			if !equal(i, i) {
				p.mark(old.boxes[i])
				p.mark(now.boxes[i])
			}
		}
		return
	}
	head := 0
	for head < n && head < m && equal(head, head) {
		head++
	}
	for n > head && m > head && equal(n-1, m-1) {
		n--
		m--
	}
	for i := head; i < n; i++ {
		p.mark(old.boxes[i])
	}
	for j := head; j < m; j++ {
		p.mark(now.boxes[j])
	}
}

// mark adds a rectangle to the list, joined to another when that costs few more pixels or the list is full.
func (p *Painter) mark(r image.Rectangle) {
	const spare = 4096 // pixels that are cheaper to paint than to walk the scene once more
	for !r.Empty() {
		best, least := -1, spare
		if len(p.dirty) == maxParts {
			least = int(^uint(0) >> 1)
		}
		for i, q := range p.dirty {
			if more := area(r.Union(q)) - area(r) - area(q); more < least {
				best, least = i, more
			}
		}
		if best < 0 {
			p.dirty = append(p.dirty, r)
			return
		}
		q := p.dirty[best]
		if r.In(q) {
			return
		}
		// The joined one may now meet others.
		r = r.Union(q)
		last := len(p.dirty) - 1
		p.dirty[best] = p.dirty[last]
		p.dirty = p.dirty[:last]
	}
}

func area(r image.Rectangle) int { return r.Dx() * r.Dy() }
