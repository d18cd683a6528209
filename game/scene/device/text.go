package device

import (
	"math"
	"unicode/utf8"

	"levelspan/assets/font"
	"levelspan/game/scene"
)

// run is a text on its way to pen positions.
type run struct {
	text  []byte
	style scene.Style
	right bool
	at    int     // device pixel of the start, or of the end when right
	sum   float64 // logical width before the pen, or after it when right
	y     int
	exact scene.Point // the start, unrounded
	done  float64     // width before the pen
}

// Line is a text with the exact place of its start (device pixels) and its width (logical pixels); ok is false when
// there is nothing to draw.
func (f *Frame) Line(s *scene.Scene, op *scene.Op) (text []byte, start scene.Point, width float64, ok bool) {
	p := points(s, op)
	if len(p) == 0 || op.T0 < 0 || op.T1 > len(s.Text) || op.T0 >= op.T1 {
		return
	}
	text, start = s.Text[op.T0:op.T1], f.device(p[0])
	if !near(start) {
		return
	}
	width = scene.MeasureBytes(op.Style, text)
	switch op.Align {
	case scene.Center:
		start.X -= width / 2 * f.Scale
	case scene.Right:
		start.X -= width * f.Scale
	}
	return text, start, width, near(start)
}

// Text starts a text; Next, or NextExact, then gives its characters.
func (f *Frame) Text(s *scene.Scene, op *scene.Op) {
	f.run = run{}
	text, start, width, ok := f.Line(s, op)
	if !ok {
		return
	}
	r := run{text: text, style: op.Style, exact: start, at: int(math.Round(start.X)), y: int(math.Round(start.Y))}
	if op.Align == scene.Right {
		// From the end backwards, so that the units of a column of figures stand on the same pixels at every scale.
		r.right, r.sum = true, width
		r.at = int(math.Round(s.Points[op.P0].X * f.Scale))
	}
	f.run = r
}

// Next is the next character: its index in the font's repertoire, and its pen position in device pixels.
func (f *Frame) Next() (index, x, y int, ok bool) {
	r := &f.run
	index, a, ok := r.next()
	if !ok {
		return 0, 0, 0, false
	}
	if r.right {
		x = r.at - int(math.Round(r.sum*f.Scale))
		r.sum -= a
	} else {
		x = r.at + int(math.Round(r.sum*f.Scale))
		r.sum += a
	}
	return index, x, r.y, true
}

// NextExact is Next without rounding to whole pixels.
func (f *Frame) NextExact() (index int, x, y float64, ok bool) {
	r := &f.run
	index, a, ok := r.next()
	if !ok {
		return 0, 0, 0, false
	}
	x = r.exact.X + r.done*f.Scale
	r.done += a
	return index, x, r.exact.Y, true
}

func (r *run) next() (index int, advance float64, ok bool) {
	if len(r.text) == 0 {
		return 0, 0, false
	}
	c, n := utf8.DecodeRune(r.text)
	r.text = r.text[n:]
	index = font.Index(c)
	return index, scene.Advance(r.style, index), true
}
