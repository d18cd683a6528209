// Package sample holds drawings for the tests and benchmarks of the back ends: a chart as the program draws it, and a
// sheet with one of everything that tends to go wrong.
package sample

import (
	"math"

	"levelspan/game/scene"
)

// Colours of the drawings.
var (
	Paper  = scene.Color{R: 0xFC, G: 0xFB, B: 0xF7, A: 255}
	Panel  = scene.Color{R: 0xF2, G: 0xEF, B: 0xE4, A: 255}
	Ink    = scene.Color{R: 0x16, G: 0x20, B: 0x2C, A: 255}
	Faint  = scene.Color{R: 0x62, G: 0x6A, B: 0x72, A: 255}
	Grid   = scene.Color{R: 0xE4, G: 0xE2, B: 0xDC, A: 255}
	Blue   = scene.Color{R: 0x0F, G: 0x57, B: 0xA8, A: 255}
	Orange = scene.Color{R: 0xC2, G: 0x50, B: 0x0F, A: 255}
	Green  = scene.Color{R: 0x13, G: 0x7A, B: 0x56, A: 255}
	Red    = scene.Color{R: 0xB3, G: 0x1E, B: 0x1E, A: 255}
)

func veil(c scene.Color, a uint8) scene.Color { c.A = a; return c }

// Chart draws a chart of eight curves with their bands, forty labels and a panel of figures, w by h logical pixels.
// phase moves the curves, for frames that differ. It allocates nothing once s and pts are warm.
type Chart struct{ upper, lower, mid []scene.Point }

// Draw resets s and draws.
func (c *Chart) Draw(s *scene.Scene, w, h, scale, phase float64) {
	s.Reset(w, h, scale, Paper)
	right := w * 0.735
	s.FillRect(scene.Rect{W: w, H: 52}, 0, Panel)
	s.FillRect(scene.Rect{X: right, Y: 52, W: w - right, H: h - 52}, 0, Panel)
	s.Label(scene.Title, 20, 33, scene.Left, "Marram", Ink)
	s.Label(scene.Small, 108, 33, scene.Left, "two-seat survey, big tyres", Faint)
	plot := scene.Rect{X: 64, Y: 88, W: right - 200, H: h - 372}
	c.grid(s, plot)
	s.PushClip(plot)
	for k := range 8 {
		c.curve(s, plot, k, phase)
	}
	s.PopClip()
	c.rails(s, plot, phase)
	c.panel(s, right+20, w-20)
}

func (c *Chart) grid(s *scene.Scene, r scene.Rect) {
	speeds := [...]string{"30", "40", "50", "60", "70", "80", "90", "100", "110", "120"}
	powers := [...]string{"0", "10", "20", "30", "40", "50", "60"}
	s.Label(scene.Small, r.X, r.Y-10, scene.Left, "Power, kW", Faint)
	for i, t := range speeds {
		x := r.X + r.W*float64(i)/float64(len(speeds)-1)
		s.Line(x, r.Y, x, r.Y+r.H, 1, Grid)
		s.Label(scene.Small, x, r.Y+r.H+76, scene.Center, t, Faint)
	}
	for i, t := range powers {
		y := r.Y + r.H*(1-float64(i)/float64(len(powers)-1))
		s.Line(r.X, y, r.X+r.W, y, 1, Grid)
		s.Label(scene.Small, r.X-10, y+5, scene.Right, t, Faint)
	}
}

func (c *Chart) curve(s *scene.Scene, r scene.Rect, k int, phase float64) {
	const n = 300
	c.upper, c.lower, c.mid = c.upper[:0], c.lower[:0], c.mid[:0]
	for i := range n {
		t := float64(i) / (n - 1)
		var y float64
		if k%2 == 0 {
			v := 0.35 + 1.3*t
			y = 0.16*v*v*v + 0.08/v + 0.02*float64(k) + 0.02*math.Sin(phase)
		} else {
			y = 0.35 + 0.75*t - 0.55*t*t + 0.02*float64(k) + 0.02*math.Cos(phase)
		}
		d := 0.015 + 0.02*math.Abs(t-0.4)
		x := r.X + r.W*t
		c.mid = append(c.mid, scene.Point{X: x, Y: r.Y + r.H*(1-y)})
		c.upper = append(c.upper, scene.Point{X: x, Y: r.Y + r.H*(1-y-d)})
		c.lower = append(c.lower, scene.Point{X: x, Y: r.Y + r.H*(1-y+d)})
	}
	col := [...]scene.Color{Blue, Orange, Green, Red}[k%4]
	s.Band(c.upper, c.lower, veil(col, 48))
	s.Stroke(c.mid, 2, col)
	m := c.mid[40+30*k]
	s.Circle(m.X, m.Y, 4, col)
	if k < 2 {
		s.Circle(m.X, m.Y, 2.5, Paper)
	}
}

func (c *Chart) rails(s *scene.Scene, r scene.Rect, phase float64) {
	y := r.Y + r.H + 40
	s.FillRect(scene.Rect{X: r.X, Y: y, W: r.W, H: 14}, 7, Grid)
	s.FillRect(scene.Rect{X: r.X + 130, Y: y, W: r.W - 320, H: 14}, 0, Green)
	s.Gradient(scene.Rect{X: r.X + 106, Y: y, W: 24, H: 14}, veil(Green, 0), Green, false)
	s.Gradient(scene.Rect{X: r.X + r.W - 190, Y: y, W: 24, H: 14}, Green, veil(Green, 0), false)
	for i, t := range [...]string{"stall", "VX", "VY", "VH"} {
		x := r.X + 130 + 90*float64(i)
		s.Line(x, y-8, x, y+14, 2, Ink)
		s.Label(scene.SmallBold, x+5, y-10, scene.Left, t, Ink)
	}
	y += 90
	x := r.X + r.W*(0.75+0.05*math.Sin(phase))
	s.FillRect(scene.Rect{X: r.X, Y: y - 3, W: r.W, H: 6}, 3, Grid)
	s.FillRect(scene.Rect{X: r.X, Y: y - 3, W: x - r.X, H: 6}, 3, Ink)
	s.Circle(x, y, 20, Ink)
	s.Circle(x, y, 17.5, Paper)
	s.Line(x-4, y-6, x-4, y+6, 2, Ink)
	s.Line(x+4, y-6, x+4, y+6, 2, Ink)
	s.Label(scene.Title, x, y-28, scene.Center, "760 kg", Ink)
	s.Label(scene.Small, r.X, y+35, scene.Left, "empty 480", Faint)
	s.Label(scene.Small, r.X+r.W, y+35, scene.Right, "max 800", Faint)
}

func (c *Chart) panel(s *scene.Scene, x0, x1 float64) {
	rows := [...]struct{ name, sub, mark, value, plus string }{
		{"Stall, clean", "45° bank 52", "VS1", "44", "± 1"},
		{"Slowest level", "set by stall", "", "44", "± 1"},
		{"Least power", "7.4 h on 57 kg", "endurance", "46", "± 2"},
		{"Steepest climb", "373 ft/nm", "VX", "54", "± 2"},
		{"Best glide", "11.1 : 1", "", "61", "± 2"},
		{"Fastest climb", "394 ± 70 ft/min", "VY", "61", "± 2"},
		{"Best range", "512 nm", "6 kt head", "65", "± 2"},
		{"Fastest level", "set by power", "VH", "89", "± 2"},
		{"Never exceed", "placard", "VNE", "125", ""},
	}
	s.Label(scene.BodyBold, x0, 86, scene.Left, "Speeds today", Ink)
	s.Label(scene.Small, x1, 86, scene.Right, "kt CAS", Faint)
	for i := range rows {
		r := &rows[i]
		y := 103 + 50*float64(i)
		col := Ink
		switch r.name[0] {
		case 'N':
			col = Red
		case 'F':
			col = Green
		}
		s.Line(x0, y, x1, y, 2, scene.Color{R: 0xE8, G: 0xE4, B: 0xD4, A: 255})
		s.Label(scene.Body, x0, y+23, scene.Left, r.name, col)
		s.Label(scene.Small, x0, y+41, scene.Left, r.sub, Faint)
		s.Label(scene.Small, (x0+x1)/2+18, y+23, scene.Center, r.mark, Faint)
		s.Label(scene.Figure, x1-48, y+33, scene.Right, r.value, col)
		s.Label(scene.Small, x1-16, y+33, scene.Right, r.plus, Faint)
	}
	s.Label(scene.Small, x0, 590, scene.Left, "Advisory. Handbook and placards govern.", Faint)
}
