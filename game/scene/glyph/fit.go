package glyph

import (
	"image"
	"math"

	"levelspan/assets/font"
	"levelspan/game/scene"
	"levelspan/game/scene/internal/cover"
)

// shapes keeps the outlines of both weights while an atlas is made.
type shapes struct {
	segs  []font.Segment
	start [font.WeightCount][]int
}

func (s *shapes) load() {
	var o font.Outliner
	for w := range font.WeightCount {
		for i := range font.Count() {
			s.start[w] = append(s.start[w], len(s.segs))
			s.segs = append(s.segs, o.Outline(w, i)...)
		}
		s.start[w] = append(s.start[w], len(s.segs))
	}
}

func (s *shapes) of(w font.Weight, index int) []font.Segment {
	return s.segs[s.start[w][index]:s.start[w][index+1]]
}

// fit maps font units to device pixels. Across it only scales. Upwards it also moves the two heights that the eye
// reads as lines, the tops of small letters and of capitals, to whole pixels (the baseline is one already), and
// stretches what lies between: the rows of text get hard edges, and shapes change by less than half a pixel.
type fit struct {
	scale  float64 // device pixels per font unit
	xh, ch float64 // the two heights after fitting, device pixels
	bars   bars    // of a sign made of bars, in place of the two heights
}

func newFit(s scene.Style, scale float64) fit {
	k := s.Size() * scale / font.UnitsPerEm
	return fit{scale: k, xh: math.Round(font.XHeight * k), ch: math.Round(font.CapHeight * k)}
}

func (f *fit) x(u float64) float64 { return u * f.scale }

// y is downwards, 0 on the baseline.
func (f *fit) y(u float64) float64 {
	if f.bars.n > 0 {
		return -f.bars.y(u, f.scale)
	}
	switch {
	case u <= 0:
		return -u * f.scale
	case u <= font.XHeight:
		return -u * f.xh / font.XHeight
	case u <= font.CapHeight:
		return -f.xh - (u-font.XHeight)*(f.ch-f.xh)/(font.CapHeight-font.XHeight)
	}
	return -f.ch - (u-font.CapHeight)*f.scale
}

// bounds is a glyph without its place in the atlas: the pixels that the outline may touch.
func (f *fit) bounds(segs []font.Segment) Glyph {
	if len(segs) == 0 {
		return Glyph{}
	}
	x0, y0, x1, y1 := math.Inf(1), math.Inf(1), math.Inf(-1), math.Inf(-1)
	put := func(x, y float64) {
		x, y = f.x(x), f.y(y)
		if x < x0 { // not min and max: see cover
			x0 = x
		}
		if x > x1 {
			x1 = x
		}
		if y < y0 {
			y0 = y
		}
		if y > y1 {
			y1 = y
		}
	}
	for _, s := range segs {
		put(s.X, s.Y)
		if s.Verb == font.CurveTo {
			put(s.X1, s.Y1)
			put(s.X2, s.Y2)
		}
	}
	l, t, r, b := math.Floor(x0), math.Floor(y0), math.Ceil(x1), math.Ceil(y1)
	return Glyph{W: uint16(r - l), H: uint16(b - t), Left: int16(l), Top: int16(t)}
}

// draw rasterises an outline into its place.
func (f *fit) draw(z *cover.Rasterizer, segs []font.Segment, g Glyph, dst *image.Alpha) {
	z.Begin(image.Rect(0, 0, int(g.W), int(g.H)))
	ox, oy := -float64(g.Left), -float64(g.Top)
	var px, py, sx, sy float64
	for _, s := range segs {
		x, y := f.x(s.X)+ox, f.y(s.Y)+oy
		switch s.Verb {
		case font.MoveTo:
			z.Line(px, py, sx, sy)
			sx, sy = x, y
		case font.LineTo:
			z.Line(px, py, x, y)
		case font.CurveTo:
			curve(z, px, py, f.x(s.X1)+ox, f.y(s.Y1)+oy, f.x(s.X2)+ox, f.y(s.Y2)+oy, x, y)
		}
		px, py = x, y
	}
	z.Line(px, py, sx, sy)
	z.Spans(func(y, x0, x1 int, alpha uint8) {
		row := dst.Pix[(int(g.Y)+y)*dst.Stride+int(g.X):]
		for x := x0; x < x1; x++ {
			row[x] = alpha
		}
	})
}

// curve flattens a cubic to a twentieth of a pixel: the number of pieces follows from its second differences.
func curve(z *cover.Rasterizer, x0, y0, x1, y1, x2, y2, x3, y3 float64) {
	dx := max(math.Abs(x0-2*x1+x2), math.Abs(x1-2*x2+x3))
	dy := max(math.Abs(y0-2*y1+y2), math.Abs(y1-2*y2+y3))
	n := max(1, min(int(math.Ceil(math.Sqrt(0.75*(dx+dy)/0.05))), 32))
	px, py := x0, y0
	for i := 1; i <= n; i++ {
		t := float64(i) / float64(n)
		u := 1 - t
		a, b, c, d := u*u*u, 3*u*u*t, 3*u*t*t, t*t*t
		x, y := a*x0+b*x1+c*x2+d*x3, a*y0+b*y1+c*y2+d*y3
		if i == n {
			x, y = x3, y3
		}
		z.Line(px, py, x, y)
		px, py = x, y
	}
}
