// Package svg writes a scene as SVG 1.1 text, in logical pixels and unsnapped, for sheets that are printed or enlarged.
package svg

import (
	"math"

	"levelspan/assets/font"
	"levelspan/game/scene"
	"levelspan/game/scene/device"
)

// Options of a document. The zero value is good for the screen.
type Options struct {
	// Outlines draws each character as its outline: the document looks the same where the typeface is not
	// installed. The text stays readable for programs as the label of its group. Otherwise text is text, in the
	// typeface when installed or else in a common one, fitted to the width that the layout counted on.
	Outlines bool
	Title    string // of the document; may be empty
}

// fallback is the families asked for when text is text.
const fallback = font.Family + ", 'DejaVu Sans', Verdana, sans-serif"

// Append appends the document to dst and returns the extended buffer. Whatever the scene holds, the result is
// well-formed XML without a number that is none.
func Append(dst []byte, s *scene.Scene, opt Options) []byte {
	w := writer{b: dst, s: s, opt: opt, id: s.Hash()}
	w.frame.Begin(s)
	w.frame.Exact()
	width, height := size(s.Width), size(s.Height)
	w.str(`<svg xmlns="http://www.w3.org/2000/svg" xmlns:xlink="http://www.w3.org/1999/xlink"`)
	w.num(" width", width)
	w.num(" height", height)
	w.str(` viewBox="0 0 `)
	w.float(width)
	w.str(" ")
	w.float(height)
	w.str("\" role=\"img\">\n")
	if opt.Title != "" {
		w.str("<title>")
		w.text([]byte(opt.Title))
		w.str("</title>\n")
	}
	if opt.Outlines {
		w.glyphs()
	}
	w.rect(scene.Rect{W: width, H: height}, 0)
	w.fill(s.Background)
	w.str("/>\n")
	depth := 0
	for i := range s.Ops {
		op := &s.Ops[i]
		switch op.Kind {
		case scene.OpPushClip:
			depth++
			w.clip(op.Rect)
		case scene.OpPopClip:
			if depth > 0 {
				depth--
				w.str("</g>\n")
			}
		default:
			w.op(op)
		}
	}
	for range depth {
		w.str("</g>\n")
	}
	w.str("</svg>\n")
	return w.b
}

func size(v float64) float64 {
	if !(v > 0) {
		return 0
	}
	return min(v, scene.MaxSide)
}

func (w *writer) op(op *scene.Op) {
	if op.Color.A == 0 && op.Kind != scene.OpGradient {
		return
	}
	switch op.Kind {
	case scene.OpFill:
		if q := w.frame.Polygon(w.s, op); q != nil {
			w.str(`<path d="`)
			w.path(q, true)
			w.str(`"`)
			w.fill(op.Color)
			w.str("/>\n")
		}
	case scene.OpBand:
		w.band(op)
	case scene.OpStroke:
		w.stroke(op)
	case scene.OpRect:
		if usable(op.Rect) {
			w.rect(op.Rect, op.W)
			w.fill(op.Color)
			w.str("/>\n")
		}
	case scene.OpGradient:
		if usable(op.Rect) {
			w.gradient(op)
		}
	case scene.OpCircle:
		if c, r, ok := w.frame.Disc(w.s, op); ok {
			w.str("<circle")
			w.num(" cx", c.X)
			w.num(" cy", c.Y)
			w.num(" r", r)
			w.fill(op.Color)
			w.str("/>\n")
		}
	case scene.OpText:
		w.label(op)
	}
}

func (w *writer) band(op *scene.Op) {
	for next := 0; ; {
		var u, l []scene.Point
		u, l, next = w.frame.Band(w.s, op, next)
		if len(u) == 0 {
			return
		}
		w.str(`<path d="`)
		w.path(u, false)
		for i := len(l) - 1; i >= 0; i-- {
			w.str("L")
			w.point(l[i])
		}
		w.str(`Z"`)
		w.fill(op.Color)
		w.str("/>\n")
	}
}

func (w *writer) stroke(op *scene.Op) {
	parts, width := w.frame.Stroke(w.s, op)
	for _, p := range parts {
		w.str(`<path d="`)
		w.path(p.Points, p.Closed)
		w.str(`" fill="none" stroke-linejoin="round"`)
		w.num(" stroke-width", width)
		w.paint(" stroke", op.Color)
		if op.Dash > 0 && op.Gap > 0 && op.Dash+op.Gap < device.Far {
			w.str(` stroke-dasharray="`)
			w.float(max(op.Dash, 0.01))
			w.str(" ")
			w.float(max(op.Gap, 0.01))
			w.str(`"`)
		}
		w.str("/>\n")
	}
}

func (w *writer) path(q []scene.Point, closed bool) {
	for i, p := range q {
		if i == 0 {
			w.str("M")
		} else {
			w.str("L")
		}
		w.point(p)
	}
	if closed {
		w.str("Z")
	}
}

func (w *writer) rect(r scene.Rect, radius float64) {
	w.str("<rect")
	w.num(" x", r.X)
	w.num(" y", r.Y)
	w.num(" width", r.W)
	w.num(" height", r.H)
	if radius > 0 {
		w.num(" rx", min(radius, r.W/2, r.H/2))
	}
}

// usable tells whether a rectangle has a size and numbers within reach.
func usable(r scene.Rect) bool {
	ok := func(v float64) bool { return math.Abs(v) <= device.Far }
	return r.W > 0 && r.H > 0 && ok(r.X) && ok(r.Y) && ok(r.X+r.W) && ok(r.Y+r.H)
}

func (w *writer) clip(r scene.Rect) {
	if !usable(r) {
		r = scene.Rect{} // hides everything, as a clip of no size does
	}
	w.str("<clipPath")
	w.ref(` id="`, "c")
	w.str(">")
	w.rect(r, 0)
	w.str("/></clipPath><g")
	w.ref(` clip-path="url(#`, "c")
	w.b = append(w.b[:len(w.b)-1], `)">`...)
	w.str("\n")
	w.count++
}

func (w *writer) gradient(op *scene.Op) {
	from, to := op.Color, op.Color2
	// Colours mix premultiplied here and straight in SVG: a clear end takes the other's hue.
	if from.A == 0 {
		from = scene.Color{R: to.R, G: to.G, B: to.B}
	}
	if to.A == 0 {
		to = scene.Color{R: from.R, G: from.G, B: from.B}
	}
	w.str("<linearGradient")
	w.ref(` id="`, "g")
	if op.Vertical {
		w.str(` x2="0" y2="1"`)
	}
	w.str(`><stop offset="0"`)
	w.stop(from)
	w.str(`/><stop offset="1"`)
	w.stop(to)
	w.str("/></linearGradient>")
	w.rect(op.Rect, 0)
	w.ref(` fill="url(#`, "g")
	w.b = append(w.b[:len(w.b)-1], `)"`...)
	w.str("/>\n")
	w.count++
}
