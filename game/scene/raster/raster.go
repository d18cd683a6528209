// Package raster paints a scene into an RGBA picture on the processor, with exact coverage and no window: for
// goldens, pictures to share, print, and as a surface where there is no graphics hardware.
package raster

import (
	"image"

	"levelspan/game/scene"
	"levelspan/game/scene/device"
	"levelspan/game/scene/glyph"
	"levelspan/game/scene/internal/cover"
)

// Painter paints scenes. It keeps its stores and the atlas of the last scale, so that painting allocates nothing once
// warm. The zero value is ready; it is not for two goroutines at once.
type Painter struct {
	atlas *glyph.Atlas
	frame device.Frame
	cover cover.Rasterizer
	dst   *image.RGBA
	ink   ink
	outer []scene.Point
	emit  func(y, x0, x1 int, alpha uint8)

	shadows [2]shadow // of Update: the last scene and the one before, in turn
	turn    int
	dirty   []image.Rectangle
}

// Render paints a scene into a new picture of its size in device pixels.
func Render(s *scene.Scene) *image.RGBA {
	var p Painter
	return p.Render(s, nil)
}

// Render paints the whole scene over dst, which is used again when its size fits and made anew otherwise.
func (p *Painter) Render(s *scene.Scene, dst *image.RGBA) *image.RGBA {
	w, h := s.DeviceSize()
	if dst == nil || dst.Rect != image.Rect(0, 0, w, h) {
		dst = image.NewRGBA(image.Rect(0, 0, w, h))
	}
	p.Paint(s, dst, dst.Rect)
	return dst
}

// UseAtlas gives the painter an atlas made elsewhere, so that two back ends share one.
func (p *Painter) UseAtlas(a *glyph.Atlas) { p.atlas = a }

// Paint paints the part of the scene within dirty, and leaves the other pixels of dst alone. dst's origin is the
// scene's.
func (p *Painter) Paint(s *scene.Scene, dst *image.RGBA, dirty image.Rectangle) {
	p.paint(s, dst, dirty, nil)
}

// paint paints within dirty; boxes, if not nil, are the pixels that each operation may touch.
func (p *Painter) paint(s *scene.Scene, dst *image.RGBA, dirty image.Rectangle, boxes []image.Rectangle) {
	f := &p.frame
	f.Begin(s)
	if p.atlas == nil || p.atlas.Scale != f.Scale {
		p.atlas = glyph.OnDemand(f.Scale)
	}
	if p.emit == nil {
		p.emit = p.span
	}
	p.dst = dst
	f.Clip = f.Clip.Intersect(dirty).Intersect(dst.Rect)
	b := newInk(s.Background)
	for y := f.Clip.Min.Y; y < f.Clip.Max.Y; y++ {
		b.set(row(dst, y, f.Clip.Min.X, f.Clip.Max.X))
	}
	for i := range s.Ops {
		op := &s.Ops[i]
		if boxes != nil && op.Kind != scene.OpPushClip && op.Kind != scene.OpPopClip && !boxes[i].Overlaps(f.Clip) {
			continue
		}
		p.op(s, op)
	}
	p.dst = nil
}

func (p *Painter) op(s *scene.Scene, op *scene.Op) {
	f := &p.frame
	switch op.Kind {
	case scene.OpPushClip:
		f.Push(op.Rect)
		return
	case scene.OpPopClip:
		f.Pop()
		return
	}
	if f.Clip.Empty() {
		return
	}
	p.ink = newInk(op.Color)
	if p.ink.a == 0 && op.Kind != scene.OpGradient {
		return
	}
	switch op.Kind {
	case scene.OpFill:
		if q := f.Polygon(s, op); q != nil && p.begin(q, 0) {
			p.loop(q)
			p.cover.Spans(p.emit)
		}
	case scene.OpBand:
		p.band(s, op)
	case scene.OpStroke:
		p.stroke(s, op)
	case scene.OpRect:
		p.rect(op)
	case scene.OpGradient:
		p.gradient(op)
	case scene.OpCircle:
		if c, r, ok := f.Disc(s, op); ok {
			p.outer = device.Circle(p.outer[:0], c, r)
			if p.begin(p.outer, 0) {
				p.loop(p.outer)
				p.cover.Spans(p.emit)
			}
		}
	case scene.OpText:
		p.text(s, op)
	}
}

// begin starts a shape with these points and a margin around them; false when it lies outside the clip.
func (p *Painter) begin(q []scene.Point, margin float64) bool {
	box := device.Extent(q, margin).Intersect(p.frame.Clip)
	if box.Empty() {
		return false
	}
	p.cover.Begin(box)
	return true
}

func (p *Painter) loop(q []scene.Point) {
	a := q[len(q)-1]
	for _, b := range q {
		p.cover.Line(a.X, a.Y, b.X, b.Y)
		a = b
	}
}

func (p *Painter) band(s *scene.Scene, op *scene.Op) {
	for next := 0; ; {
		var u, l []scene.Point
		u, l, next = p.frame.Band(s, op, next)
		if len(u) == 0 {
			return
		}
		// With a margin, since an edge may be flat, and a union leaves out what is empty.
		box := device.Extent(u, 1).Union(device.Extent(l, 1)).Intersect(p.frame.Clip)
		if box.Empty() {
			continue
		}
		p.cover.Begin(box)
		for i := 1; i < len(u); i++ {
			p.cover.Line(u[i-1].X, u[i-1].Y, u[i].X, u[i].Y)
			p.cover.Line(l[i].X, l[i].Y, l[i-1].X, l[i-1].Y)
		}
		n := len(u) - 1
		p.cover.Line(u[n].X, u[n].Y, l[n].X, l[n].Y)
		p.cover.Line(l[0].X, l[0].Y, u[0].X, u[0].Y)
		p.cover.Spans(p.emit)
	}
}

func (p *Painter) rect(op *scene.Op) {
	box := p.frame.Box(op.Rect)
	if r := device.Radius(op.W*p.frame.Scale, box); r > 0 {
		p.outer = device.RoundRect(p.outer[:0], box, r)
		if p.begin(p.outer, 0) {
			p.loop(p.outer)
			p.cover.Spans(p.emit)
		}
		return
	}
	box = box.Intersect(p.frame.Clip)
	for y := box.Min.Y; y < box.Max.Y; y++ {
		p.ink.over(row(p.dst, y, box.Min.X, box.Max.X))
	}
}

func (p *Painter) gradient(op *scene.Op) {
	box := p.frame.Box(op.Rect)
	in := box.Intersect(p.frame.Clip)
	if in.Empty() {
		return
	}
	from, to := newInk(op.Color), newInk(op.Color2)
	if op.Vertical {
		for y := in.Min.Y; y < in.Max.Y; y++ {
			c := mix(from, to, y-box.Min.Y, box.Dy())
			c.over(row(p.dst, y, in.Min.X, in.Max.X))
		}
		return
	}
	for y := in.Min.Y; y < in.Max.Y; y++ {
		line := row(p.dst, y, in.Min.X, in.Max.X)
		for x := in.Min.X; x < in.Max.X; x++ {
			c := mix(from, to, x-box.Min.X, box.Dx())
			c.over(line[(x-in.Min.X)*4 : (x-in.Min.X)*4+4])
		}
	}
}

func (p *Painter) text(s *scene.Scene, op *scene.Op) {
	f := &p.frame
	tex := p.atlas.Image
	f.Text(s, op)
	for {
		index, x, y, ok := f.Next()
		if !ok {
			return
		}
		g := p.atlas.At(op.Style, index)
		if g.W == 0 {
			continue
		}
		x, y = x+int(g.Left), y+int(g.Top)
		in := image.Rect(x, y, x+int(g.W), y+int(g.H)).Intersect(f.Clip)
		for v := in.Min.Y; v < in.Max.Y; v++ {
			k := (int(g.Y)+v-y)*tex.Stride + int(g.X) + in.Min.X - x
			p.ink.mask(row(p.dst, v, in.Min.X, in.Max.X), tex.Pix[k:k+in.Dx()])
		}
	}
}

// span is the painter's end of cover.Rasterizer.Spans.
func (p *Painter) span(y, x0, x1 int, alpha uint8) {
	line := row(p.dst, y, x0, x1)
	if alpha == 255 {
		p.ink.over(line)
		return
	}
	p.ink.scaled(alpha).over(line)
}

func row(m *image.RGBA, y, x0, x1 int) []uint8 {
	k := (y-m.Rect.Min.Y)*m.Stride - m.Rect.Min.X*4
	return m.Pix[k+x0*4 : k+x1*4 : k+x1*4]
}
