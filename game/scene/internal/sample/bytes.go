package sample

import (
	"math"

	"levelspan/game/scene"
)

// odd are numbers that break drawing code.
var odd = [...]float64{math.NaN(), math.Inf(1), math.Inf(-1), 0, math.Copysign(0, -1), -1, 1e9, -1e9, 1e300, -1e300,
	math.MaxFloat64, math.SmallestNonzeroFloat64, 0.5, 1 - 1e-16, 32767.5, 1e-9}

// reader takes numbers out of bytes; after the end it gives zeros.
type reader struct{ b []byte }

func (r *reader) byte() byte {
	if len(r.b) == 0 {
		return 0
	}
	v := r.b[0]
	r.b = r.b[1:]
	return v
}

// number is mostly a place on a small picture, in quarters of a pixel, and sometimes an odd number.
func (r *reader) number() float64 {
	v := r.byte()
	if v >= 240 {
		return odd[v-240]
	}
	return float64(v)/4 + float64(r.byte()%8)/32
}

func (r *reader) color() scene.Color {
	v := r.byte()
	return scene.Color{R: v, G: v << 2, B: v << 4, A: v | r.byte()}
}

func (r *reader) rect() scene.Rect {
	return scene.Rect{X: r.number(), Y: r.number(), W: r.number(), H: r.number()}
}

func (r *reader) points() []scene.Point {
	n := int(r.byte() % 24)
	p := make([]scene.Point, n)
	for i := range p {
		p[i] = scene.Point{X: r.number(), Y: r.number()}
	}
	return p
}

// Scene builds a scene of at most 64 by 64 logical pixels out of any bytes: for fuzzing. Some operations have ranges
// that do not lie within the scene.
func Scene(b []byte) *scene.Scene {
	r := reader{b}
	var s scene.Scene
	scales := [...]float64{1, 2, 1, 2, math.NaN(), -1, 1, math.Inf(1)}
	s.Reset(min(r.number(), 64), min(r.number(), 64), scales[r.byte()%8], r.color())
	for len(r.b) > 0 && len(s.Ops) < 200 {
		r.op(&s)
	}
	return &s
}

func (r *reader) op(s *scene.Scene) {
	switch k := r.byte() % 14; k {
	case 0:
		s.Fill(r.points(), r.color())
	case 1:
		s.Band(r.points(), r.points(), r.color())
	case 2:
		s.Stroke(r.points(), r.number(), r.color())
	case 3:
		s.StrokeClosed(r.points(), r.number(), r.color())
	case 4:
		s.StrokeDashed(r.points(), r.number(), r.number(), r.number(), r.color())
	case 5:
		s.FillRect(r.rect(), r.number(), r.color())
	case 6:
		s.Gradient(r.rect(), r.color(), r.color(), r.byte()%2 == 0)
	case 7:
		s.Circle(r.number(), r.number(), r.number(), r.color())
	case 8:
		n := min(int(r.byte()%16), len(r.b))
		s.Label(scene.Style(r.byte()), r.number(), r.number(), scene.Align(r.byte()%4), string(r.b[:min(n, len(r.b))]), r.color())
	case 9:
		s.PushClip(r.rect())
	case 10, 11:
		s.PopClip()
	case 12:
		s.Line(r.number(), r.number(), r.number(), r.number(), r.number(), r.color())
	default:
		s.Ops = append(s.Ops, scene.Op{Kind: scene.OpKind(r.byte() % 12), Color: r.color(), W: r.number(),
			P0: int(int8(r.byte())), P1: int(int8(r.byte())), T0: int(int8(r.byte())), T1: int(int8(r.byte()))})
	}
}
