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
}

// Text starts a text; Next then gives its characters.
func (f *Frame) Text(s *scene.Scene, op *scene.Op) {
	f.run = run{}
	p := points(s, op)
	if len(p) == 0 || op.T0 < 0 || op.T1 > len(s.Text) || op.T0 >= op.T1 {
		return
	}
	text := s.Text[op.T0:op.T1]
	x, y := p[0].X*f.Scale, p[0].Y*f.Scale
	if !near(scene.Point{X: x, Y: y}) {
		return
	}
	r := run{text: text, style: op.Style, y: int(math.Round(y))}
	switch op.Align {
	case scene.Center:
		x -= scene.MeasureBytes(op.Style, text) / 2 * f.Scale
	case scene.Right:
		// From the end backwards, so that the units of a column of figures stand on the same pixels at every scale.
		r.right = true
		r.sum = scene.MeasureBytes(op.Style, text)
	}
	r.at = int(math.Round(x))
	f.run = r
}

// Next is the next character: its index in the font's repertoire, and its pen position in device pixels.
func (f *Frame) Next() (index, x, y int, ok bool) {
	r := &f.run
	if len(r.text) == 0 {
		return 0, 0, 0, false
	}
	c, n := utf8.DecodeRune(r.text)
	r.text = r.text[n:]
	index = font.Index(c)
	a := scene.Advance(r.style, index)
	if r.right {
		x = r.at - int(math.Round(r.sum*f.Scale))
		r.sum -= a
	} else {
		x = r.at + int(math.Round(r.sum*f.Scale))
		r.sum += a
	}
	return index, x, r.y, true
}
