package device

import (
	"image"
	"math"
	"testing"

	"levelspan/game/scene"
)

func frame(scale float64) (*scene.Scene, *Frame) {
	s, f := new(scene.Scene), new(Frame)
	s.Reset(100, 100, scale, scene.Color{})
	f.Begin(s)
	return s, f
}

func TestBox(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, c := range []struct {
		scale float64
		r     scene.Rect
		want  image.Rectangle
	}{
		{1, scene.Rect{X: 1, Y: 2, W: 3, H: 4}, image.Rect(1, 2, 4, 6)},
		{2, scene.Rect{X: 1.2, Y: 2, W: 3, H: 4}, image.Rect(2, 4, 8, 12)},
		{1.5, scene.Rect{X: 1, Y: 1, W: 1, H: 1}, image.Rect(2, 2, 3, 3)},
		{1, scene.Rect{X: 0.6, Y: 0, W: 0.3, H: 1}, image.Rect(1, 0, 2, 1)},       // thin keeps a pixel
		{1, scene.Rect{X: 0.6, Y: 0, W: 0.2, H: 1}, image.Rectangle{}},            // nearly nothing is nothing
		{1, scene.Rect{X: 5, Y: 5, W: -1, H: 1}, image.Rectangle{}},               // no size
		{1, scene.Rect{X: nan, Y: 0, W: 1, H: 1}, image.Rectangle{}},              // no number
		{1, scene.Rect{X: 0, Y: 0, W: inf, H: 1}, image.Rectangle{}},              // no number
		{1, scene.Rect{X: -1e9, Y: 0, W: 2e9, H: 1}, image.Rect(-Far, 0, Far, 1)}, // cut at the limit
	} {
		_, f := frame(c.scale)
		if got := f.Box(c.r); got != c.want {
			t.Errorf("scale %g %+v: %v, want %v", c.scale, c.r, got, c.want)
		}
	}
}

func TestClips(t *testing.T) {
	_, f := frame(2)
	f.Pop() // one too many does no harm
	f.Push(scene.Rect{X: 10, Y: 10, W: 50, H: 50})
	f.Push(scene.Rect{X: 40, Y: 0, W: 50, H: 30})
	if f.Clip != image.Rect(80, 20, 120, 60) {
		t.Errorf("nested clip %v", f.Clip)
	}
	f.Push(scene.Rect{X: math.NaN(), Y: 0, W: 50, H: 30})
	if !f.Clip.Empty() {
		t.Errorf("a clip that is no rectangle leaves %v", f.Clip)
	}
	f.Pop()
	f.Pop()
	if f.Clip != image.Rect(20, 20, 120, 120) {
		t.Errorf("after leaving %v", f.Clip)
	}
	f.Pop()
	f.Pop()
	if f.Clip != f.Bounds {
		t.Errorf("at last %v", f.Clip)
	}
}

// A level or upright line covers whole pixels at every place, width and scale: its edges are whole numbers.
func TestSquareLinesAreSnapped(t *testing.T) {
	for _, scale := range []float64{1, 1.25, 1.5, 2, 3} {
		for _, w := range []float64{0.3, 1, 1.4, 2, 3.7} {
			for _, y := range []float64{10, 10.2, 10.5, 10.9} {
				s, f := frame(scale)
				s.Line(3.3, y, 40.8, y, w, scene.Color{A: 255})
				s.StrokeClosed([]scene.Point{{X: y, Y: y}, {X: 40, Y: y}, {X: 40, Y: 30}, {X: y, Y: 30}}, w, scene.Color{A: 255})
				for i := range s.Ops {
					parts, width := f.Stroke(s, &s.Ops[i])
					if len(parts) != 1 || width < 1 || width != math.Trunc(width) || math.Abs(width-w*scale) > 0.7 {
						t.Fatalf("scale %g width %g: %d parts of width %g", scale, w, len(parts), width)
					}
					for k, p := range parts[0].Points {
						edge := p.Y - width/2
						if edge != math.Trunc(edge) || math.Abs(p.Y-s.Points[s.Ops[i].P0+k].Y*scale) > 0.5 {
							t.Errorf("scale %g width %g: edge at %g, asked for %g", scale, w, edge, s.Points[s.Ops[i].P0+k].Y*scale)
						}
						if end := p.X; i == 0 && end != math.Trunc(end) {
							t.Errorf("scale %g: the line ends at %g", scale, end)
						}
					}
				}
			}
		}
	}
}

// A gap in the data is a gap in the line, never a bridge.
func TestNotANumberInterrupts(t *testing.T) {
	s, f := frame(1)
	nan := math.NaN()
	pts := []scene.Point{{X: 0, Y: 1}, {X: 1, Y: 2}, {X: nan, Y: 2}, {X: 3, Y: 4}, {X: 4, Y: 6}, {X: 5, Y: math.Inf(1)}, {X: 6, Y: 1}}
	s.Stroke(pts, 1, scene.Color{A: 255})
	s.StrokeClosed(pts, 1, scene.Color{A: 255})
	parts, _ := f.Stroke(s, &s.Ops[0])
	if len(parts) != 2 || parts[0].Points[1] != pts[1] || parts[1].Points[0] != pts[3] || len(parts[1].Points) != 2 {
		t.Errorf("%+v", parts)
	}
	parts, _ = f.Stroke(s, &s.Ops[1])
	if len(parts) != 3 || parts[2].Points[0] != pts[6] || parts[2].Points[1] != pts[0] {
		t.Errorf("closed: %+v", parts)
	}
	s.Band([]scene.Point{{X: 0, Y: 1}, {X: 1, Y: 1}, {X: 2, Y: nan}, {X: 3, Y: 1}, {X: 4, Y: 1}},
		[]scene.Point{{X: 0, Y: 3}, {X: 1, Y: 3}, {X: 2, Y: 3}, {X: 3, Y: 3}, {X: 4, Y: 3}}, scene.Color{A: 255})
	u, l, next := f.Band(s, &s.Ops[2], 0)
	if len(u) != 2 || len(l) != 2 || u[1].X != 1 || l[1].Y != 3 {
		t.Errorf("first piece %v %v", u, l)
	}
	if u, _, next = f.Band(s, &s.Ops[2], next); len(u) != 2 || u[0].X != 3 {
		t.Errorf("second piece %v", u)
	}
	if u, _, _ = f.Band(s, &s.Ops[2], next); len(u) != 0 {
		t.Errorf("third piece %v", u)
	}
}

// A line that leaves for a far place keeps its direction.
func TestFarPointsKeepTheDirection(t *testing.T) {
	s, f := frame(1)
	for _, k := range []float64{1e5, 1e9, 1e300, math.MaxFloat64 / 4} {
		s.Reset(100, 100, 1, scene.Color{})
		s.Stroke([]scene.Point{{X: 10, Y: 20}, {X: 10 + 2*k, Y: 20 + k}, {X: 10 - 4*k, Y: 20 - 3*k}}, 1, scene.Color{A: 255})
		parts, _ := f.Stroke(s, &s.Ops[0])
		if len(parts) == 0 {
			t.Fatalf("%g: nothing left", k)
		}
		p := parts[0].Points
		if p[0] != (scene.Point{X: 10, Y: 20}) || math.Abs((p[1].Y-20)/(p[1].X-10)-0.5) > 1e-9 {
			t.Errorf("%g: %v", k, p)
		}
		for _, q := range parts {
			for _, p := range q.Points {
				if !near(p) {
					t.Errorf("%g: %v is beyond the limit", k, p)
				}
			}
		}
	}
}

// Points on one place are one: no segment without a direction leaves, dashed or not, closed or not.
func TestNoSegmentWithoutDirection(t *testing.T) {
	s, f := frame(1)
	p := scene.Point{X: 5, Y: 5}
	q := scene.Point{X: 9, Y: 8}
	almost := scene.Point{X: 5.001, Y: 5}
	c := scene.Color{A: 255}
	s.Stroke([]scene.Point{p, p, p}, 1, c)
	s.StrokeClosed([]scene.Point{p, q, almost, p, almost}, 1, c)
	s.StrokeDashed([]scene.Point{p, q, q, almost, p, {X: 9, Y: 8.5}}, 1, 5, 5, c)
	s.StrokeDashed([]scene.Point{p, {X: 8, Y: 9}, {X: 20, Y: 25}}, 1, 5, 5, c) // a dash ends on a corner
	for i := range s.Ops {
		parts, _ := f.Stroke(s, &s.Ops[i])
		for _, part := range parts {
			n := len(part.Points)
			for k, b := range part.Points {
				if k == 0 && !part.Closed {
					continue
				}
				if same(part.Points[(k+n-1)%n], b) {
					t.Errorf("operation %d: %v", i, part.Points)
				}
			}
		}
		if (i == 0) != (len(parts) == 0) {
			t.Errorf("operation %d: %d parts", i, len(parts))
		}
	}
}

// Dashes are as long as asked for and cover the path's share.
func TestDashes(t *testing.T) {
	s, f := frame(1)
	s.StrokeDashed([]scene.Point{{X: 0, Y: 0}, {X: 30, Y: 40}, {X: 60, Y: 0}}, 1, 6, 4, scene.Color{A: 255})
	parts, _ := f.Stroke(s, &s.Ops[0])
	if len(parts) != 10 {
		t.Fatalf("%d dashes on 100 pixels", len(parts))
	}
	for i, p := range parts {
		sum := 0.0
		for k := 1; k < len(p.Points); k++ {
			sum += math.Hypot(p.Points[k].X-p.Points[k-1].X, p.Points[k].Y-p.Points[k-1].Y)
		}
		if math.Abs(sum-6) > 0.02 {
			t.Errorf("dash %d is %g long", i, sum)
		}
	}
}

// The units of right-aligned figures share their pixels, and no pen position depends on a fraction of the place.
func TestFiguresStandStill(t *testing.T) {
	for _, scale := range []float64{1, 1.25, 1.5, 2, 2.625, 3} {
		var want []int
		for _, text := range []string{"7", "89", "125", "6 300"} {
			for _, dx := range []float64{0, 0.1, 0.2} {
				s, f := frame(scale)
				s.Label(scene.Figure, 60+dx/scale, 50, scene.Right, text, scene.Color{A: 255})
				f.Text(s, &s.Ops[0])
				var xs []int
				for {
					_, x, _, ok := f.Next()
					if !ok {
						break
					}
					xs = append([]int{x}, xs...)
				}
				for i := range min(len(xs), len(want), 3) {
					if xs[i] != want[i] {
						t.Errorf("scale %g %q: digit %d from the right at %d, want %d", scale, text, i, xs[i], want[i])
					}
				}
				if len(xs) > len(want) {
					want = xs
				}
			}
		}
	}
}

func TestAlignment(t *testing.T) {
	for _, c := range []struct {
		align scene.Align
		want  int
	}{{scene.Left, 50}, {scene.Center, 30}, {scene.Right, 11}} {
		s, f := frame(1)
		s.Label(scene.Title, 50, 20.4, c.align, "125", scene.Color{A: 255}) // 39 wide
		f.Text(s, &s.Ops[0])
		if _, x, y, ok := f.Next(); !ok || math.Abs(float64(x-c.want)) > 1 || y != 20 {
			t.Errorf("align %d: pen at %d, %d", c.align, x, y)
		}
	}
}

// Ranges that do not lie within the scene are nothing.
func TestBadRanges(t *testing.T) {
	s, f := frame(1)
	s.Stroke([]scene.Point{{X: 1, Y: 1}, {X: 2, Y: 3}, {X: 5, Y: 3}, {X: 5, Y: 9}}, 1, scene.Color{A: 255})
	s.Text = append(s.Text, "abc"...)
	for _, r := range [][2]int{{-1, 2}, {0, 5}, {3, 1}, {4, 4}, {math.MaxInt, math.MinInt}} {
		op := scene.Op{W: 2, P0: r[0], P1: r[1], T0: r[0], T1: r[1]}
		parts, _ := f.Stroke(s, &op)
		u, _, _ := f.Band(s, &op, 0)
		_, _, disc := f.Disc(s, &op)
		f.Text(s, &op)
		_, _, _, ok := f.Next()
		if len(parts) > 0 || len(u) > 0 || disc || ok || f.Polygon(s, &op) != nil {
			t.Errorf("%v gives something", r)
		}
	}
}

// A circle's sides stay within a twentieth of a pixel of it.
func TestSides(t *testing.T) {
	for r := 0.1; r < 300; r *= 1.3 {
		n := Sides(r)
		if sag := r * (1 - math.Cos(math.Pi/float64(n))); sag > 0.0501 || n%4 != 0 {
			t.Errorf("radius %g: %d sides, off by %g", r, n, sag)
		}
	}
}
