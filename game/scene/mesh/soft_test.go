package mesh

import (
	"image"
	"math"
)

// soft draws a mesh as graphics hardware does: pixel centres, the top-left rule, nearest texel, premultiplied over.
// It is slow and plain on purpose.
type soft struct {
	w, h int
	pix  []float32 // premultiplied r, g, b, a
}

func newSoft(w, h int) *soft { return &soft{w, h, make([]float32, w*h*4)} }

func (s *soft) draw(m *Mesh) {
	tex := m.Atlas().Image
	for _, b := range m.Batches {
		v := m.Vertices[b.V0:b.V1]
		idx := m.Indices[b.I0:b.I1]
		for i := 0; i+2 < len(idx); i += 3 {
			s.triangle(tex, b.Clip, v[idx[i]], v[idx[i+1]], v[idx[i+2]])
		}
	}
}

func (s *soft) triangle(tex *image.Alpha, clip image.Rectangle, a, b, c Vertex) {
	// Places on a 1/256 pixel grid, as hardware does, so that shared edges agree.
	ax, ay, bx, by, cx, cy := fix(a.DstX), fix(a.DstY), fix(b.DstX), fix(b.DstY), fix(c.DstX), fix(c.DstY)
	area := (bx-ax)*(cy-ay) - (by-ay)*(cx-ax)
	if area == 0 {
		return
	}
	if area < 0 {
		b, c = c, b
		bx, by, cx, cy = cx, cy, bx, by
		area = -area
	}
	clip = clip.Intersect(image.Rect(0, 0, s.w, s.h))
	x0, x1 := max(int(min(ax, bx, cx)>>8), clip.Min.X), min(int(max(ax, bx, cx)>>8)+1, clip.Max.X)
	y0, y1 := max(int(min(ay, by, cy)>>8), clip.Min.Y), min(int(max(ay, by, cy)>>8)+1, clip.Max.Y)
	for y := y0; y < y1; y++ {
		for x := x0; x < x1; x++ {
			px, py := int64(x)<<8+128, int64(y)<<8+128
			wa, wb, wc := edge(bx, by, cx, cy, px, py), edge(cx, cy, ax, ay, px, py), edge(ax, ay, bx, by, px, py)
			if !in(wa, bx, by, cx, cy) || !in(wb, cx, cy, ax, ay) || !in(wc, ax, ay, bx, by) {
				continue
			}
			fa, fb, fc := float32(wa)/float32(area), float32(wb)/float32(area), float32(wc)/float32(area)
			u := a.SrcX*fa + b.SrcX*fb + c.SrcX*fc
			v := a.SrcY*fa + b.SrcY*fb + c.SrcY*fc
			t := float32(tex.AlphaAt(int(math.Floor(float64(u))), int(math.Floor(float64(v)))).A) / 255
			al := (a.A*fa + b.A*fb + c.A*fc) * t
			d := s.pix[(y*s.w+x)*4:]
			d[0] = (a.R*fa+b.R*fb+c.R*fc)*t + d[0]*(1-al)
			d[1] = (a.G*fa+b.G*fb+c.G*fc)*t + d[1]*(1-al)
			d[2] = (a.B*fa+b.B*fb+c.B*fc)*t + d[2]*(1-al)
			d[3] = al + d[3]*(1-al)
		}
	}
}

func fix(v float32) int64 { return int64(math.Round(float64(v) * 256)) }

func edge(ax, ay, bx, by, px, py int64) int64 { return (bx-ax)*(py-ay) - (by-ay)*(px-ax) }

// in is the top-left rule for a triangle that runs clockwise on the screen.
func in(w, ax, ay, bx, by int64) bool {
	return w > 0 || w == 0 && (ay == by && bx > ax || by < ay)
}

func (s *soft) image() *image.RGBA {
	m := image.NewRGBA(image.Rect(0, 0, s.w, s.h))
	for i, v := range s.pix {
		m.Pix[i] = uint8(min(max(v, 0), 1)*255 + 0.5)
	}
	return m
}
