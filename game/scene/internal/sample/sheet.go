package sample

import (
	"math"

	"levelspan/game/scene"
)

// Sheet draws one of everything that tends to go wrong, 320 by 240 logical pixels.
func Sheet(s *scene.Scene, scale float64) {
	s.Reset(320, 240, scale, Paper)
	hairlines(s)
	strokes(s)
	fills(s)
	letters(s)
}

// hairlines are level and upright lines of whole and broken places and widths, and square frames.
func hairlines(s *scene.Scene) {
	for i := range 6 {
		v := 6.5 + 5.3*float64(i)
		w := 1 + 0.4*float64(i)
		s.Line(8, v, 60, v, w, Ink)
		s.Line(62+v, 4, 62+v, 36, w, Ink)
	}
	s.StrokeClosed([]scene.Point{{X: 110, Y: 6}, {X: 150, Y: 6}, {X: 150, Y: 34}, {X: 110, Y: 34}}, 1, Ink)
	s.StrokeClosed([]scene.Point{{X: 115, Y: 11}, {X: 145, Y: 11}, {X: 145, Y: 29}, {X: 115, Y: 29}}, 3, veil(Blue, 128))
	s.StrokeDashed([]scene.Point{{X: 8, Y: 44}, {X: 100, Y: 44}, {X: 100, Y: 52}}, 1, 6, 3, Ink)
	s.StrokeDashed([]scene.Point{{X: 8, Y: 50}, {X: 50, Y: 62}, {X: 95, Y: 58}}, 2, 6, 4, Orange)
}

// strokes are slanted lines from thin to thick, and sharp, closed and translucent turns.
func strokes(s *scene.Scene) {
	for i := range 8 {
		x := 160 + 11*float64(i)
		s.Line(x, 36, x+12, 6+3*float64(i), 0.4+0.5*float64(i), Blue)
	}
	zig := []scene.Point{{X: 14, Y: 76}, {X: 34, Y: 104}, {X: 40, Y: 74}, {X: 58, Y: 104}, {X: 60, Y: 76}, {X: 90, Y: 100}}
	s.Stroke(zig, 7, veil(Green, 128))
	star := make([]scene.Point, 0, 10)
	for i := range 10 {
		r := 20.0 - 12*float64(i%2)
		a := math.Pi * float64(i) / 5
		star = append(star, scene.Point{X: 124 + r*math.Sin(a), Y: 84 - r*math.Cos(a)})
	}
	s.Fill(star, veil(Orange, 96))
	s.StrokeClosed(star, 3, veil(Red, 150))
	curl := make([]scene.Point, 0, 120)
	for i := range 120 {
		t := float64(i) / 119
		a := 14 * t
		curl = append(curl, scene.Point{X: 180 + 26*t*math.Sin(a), Y: 84 - 26*t*math.Cos(a)})
	}
	s.Stroke(curl, 1.5, Ink)
	s.Stroke([]scene.Point{{X: 214, Y: 64}, {X: 240, Y: 100}, {X: math.NaN(), Y: 3}, {X: 250, Y: 64}, {X: 290, Y: 1e9}, {X: 296, Y: -1e300}}, 1, Red)
}

// fills are polygons, a band that pinches to nothing, discs down to a dot, rounded rectangles, gradients and clips.
func fills(s *scene.Scene) {
	s.Fill([]scene.Point{{X: 8, Y: 120}, {X: 60, Y: 116}, {X: 56, Y: 150}, {X: 40, Y: 128}, {X: 22, Y: 152}}, veil(Blue, 180))
	var u, l []scene.Point
	for i := range 40 {
		t := float64(i) / 39
		y := 134 - 12*math.Sin(5*t)
		d := 9 * math.Abs(t-0.5)
		u = append(u, scene.Point{X: 68.3 + 60*t, Y: y - d})
		l = append(l, scene.Point{X: 68.3 + 60*t, Y: y + d})
	}
	s.Band(u, l, veil(Green, 140))
	for i := range 7 {
		r := 0.4 + 1.6*float64(i)
		s.Circle(140+22*float64(i), 126.3, r, veil(Ink, 200))
	}
	s.FillRect(scene.Rect{X: 140, Y: 140, W: 40, H: 14}, 7, Orange)
	s.FillRect(scene.Rect{X: 186.4, Y: 140.4, W: 40, H: 14}, 3, veil(Orange, 128))
	s.FillRect(scene.Rect{X: 232, Y: 140, W: 20.3, H: 14}, 0, veil(Ink, 60))
	s.Gradient(scene.Rect{X: 8, Y: 160, W: 100, H: 12}, veil(Green, 0), Green, false)
	s.Gradient(scene.Rect{X: 112, Y: 158, W: 14, H: 20}, Red, veil(Red, 0), true)
	s.PushClip(scene.Rect{X: 136, Y: 160, W: 60, H: 14})
	s.Circle(150, 167, 12, Blue)
	s.Label(scene.Figure, 158, 178, scene.Left, "clip", Ink)
	s.PushClip(scene.Rect{X: 190, Y: 100, W: 60, H: 100})
	s.FillRect(scene.Rect{X: 100, Y: 100, W: 200, H: 200}, 5, veil(Red, 90))
	s.PopClip()
	s.Gradient(scene.Rect{X: 120, Y: 170, W: 40, H: 20}, Red, Green, false)
	s.PopClip()
	s.PopClip()
}

func letters(s *scene.Scene) {
	x := 8.0
	for st := range scene.StyleCount {
		s.Label(st, x, 206, scene.Left, "89", Ink)
		x += scene.Measure(st, "89") + 6
	}
	for i, t := range []string{"7", "89", "125", "6\u202f300"} {
		s.Label(scene.Small, 314, 170+15*float64(i), scene.Right, t, Ink)
	}
	s.Label(scene.Small, 8, 230, scene.Left, "± 1.7 °C · Größe é → ≤ 45° − ½ łx", Faint)
	s.Label(scene.SmallBold, 226.4, 230, scene.Center, "VX", Red)
}
