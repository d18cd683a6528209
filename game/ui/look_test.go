package ui

import (
	"math"
	"testing"

	"levelspan/game/scene"
)

// lettering is one drawn text with its place.
type lettering struct {
	text string
	r    scene.Rect
}

// letters are the texts of a scene that can be seen: those under a full-window shade, out of their clip or empty do
// not count. The height of a text is that of its capitals.
func letters(s *scene.Scene) []lettering {
	var out []lettering
	clips := []scene.Rect{{W: s.Width, H: s.Height}}
	for i := range s.Ops {
		op := &s.Ops[i]
		clip := clips[len(clips)-1]
		switch op.Kind {
		case scene.OpRect:
			if op.Rect.W >= s.Width && op.Rect.H >= s.Height {
				out = out[:0]
				continue
			}
			for k := len(out) - 1; k >= 0 && op.Color.A == 255; k-- { // painted over
				if c := Intersect(op.Rect, clip); Intersect(out[k].r, c) == out[k].r {
					out = append(out[:k], out[k+1:]...)
				}
			}
		case scene.OpPushClip:
			clips = append(clips, Intersect(clip, op.Rect))
		case scene.OpPopClip:
			clips = clips[:len(clips)-1]
		case scene.OpText:
			text := string(s.Text[op.T0:op.T1])
			w, h := scene.Measure(op.Style, text), scene.CapHeight(op.Style)
			p := s.Points[op.P0]
			r := scene.Rect{X: p.X, Y: p.Y - h, W: w, H: h}
			switch op.Align {
			case scene.Center:
				r.X -= w / 2
			case scene.Right:
				r.X -= w
			}
			if r = Intersect(r, clip); text != "" && r.W > 0 && r.H > 0 {
				out = append(out, lettering{text, r})
			}
		}
	}
	return out
}

// apart fails where two texts overlap, or one leaves the window.
func checkLetters(t *testing.T, s *scene.Scene) {
	t.Helper()
	all := letters(s)
	for i, a := range all {
		if w := (scene.Rect{W: s.Width, H: s.Height}); Intersect(a.r, w) != a.r {
			t.Errorf("%q leaves the window: %v", a.text, a.r)
		}
		for _, b := range all[:i] {
			if Overlaps(a.r, b.r) {
				t.Errorf("%q at %v overlaps %q at %v", a.text, a.r, b.text, b.r)
			}
		}
	}
}

// In every picture of the gallery: no text on another, and every control named, unique, and large enough to touch.
func TestGalleryIsSound(t *testing.T) {
	for _, p := range pictures() {
		f, s := p.make()
		t.Run(p.name, func(t *testing.T) {
			checkLetters(t, s)
			checkControls(t, f, s)
		})
	}
}

func checkControls(t *testing.T, f *Frame, s *scene.Scene) {
	t.Helper()
	seen := map[string]bool{}
	var views []scene.Rect
	for _, c := range f.Controls {
		if c.Scrolls {
			views = append(views, c.Hit)
		}
	}
	for _, c := range f.Controls {
		if c.ID == "" || seen[c.ID] {
			t.Errorf("control %q is nameless or there twice", c.ID)
		}
		seen[c.ID] = true
		if c.Label == "" {
			t.Errorf("%s has no accessible name", c.ID)
		}
		if !finite(c.Bounds.X, c.Bounds.Y, c.Bounds.W, c.Bounds.H, c.Value, c.Min, c.Max, c.Step, c.Page) {
			t.Errorf("%s is not finite: %+v", c.ID, c)
		}
		cut := false
		for _, v := range views { // at the edge of a scrolled region
			cut = cut || Intersect(Grow(c.Bounds, MinTarget, MinTarget), v) == c.Hit && c.Hit != Grow(c.Bounds, MinTarget, MinTarget)
		}
		if small := c.Hit.W < MinTarget || c.Hit.H < MinTarget; small && !cut {
			t.Errorf("%s is touched on %v only", c.ID, c.Hit)
		}
	}
}

// Every control that can be seen can be hit: a press in the middle of its Bounds means it.
func TestMiddleOfBoundsHits(t *testing.T) {
	for _, p := range pictures() {
		f, _ := p.make()
		top := topLayer(f.Controls)
		for _, c := range f.Controls {
			x, y := c.Bounds.X+c.Bounds.W/2, c.Bounds.Y+c.Bounds.H/2
			if c.Role == RoleRegion || !usable(&c, top) || !Contains(c.Hit, x, y) {
				continue
			}
			if got := hit(f.Controls, top, x, y); got.ID != c.ID {
				t.Errorf("%s: the middle of %s means %s", p.name, c.ID, got.ID)
			}
		}
	}
}

// Wherever the handle is and whatever the size: labels keep apart, out from under the handle and within the area.
func TestRailLabelsKeepApart(t *testing.T) {
	for _, size := range []scene.Rect{{X: 20, Y: 20, W: 400, H: 130}, {X: 20, Y: 20, W: 250, H: 130}, {X: 20, Y: 20, W: 160, H: 300}, {X: 20, Y: 20, W: 170, H: 560}} {
		for step := 0; step <= 200; step++ {
			vertical := size.H > 200
			rl := Rail{ID: "handle/x", Title: "Density altitude, ft", Vertical: vertical, Min: -2000, Max: 18000, Filled: true,
				Ticks: AppendTicks(nil, -2000, 18000, 1000),
				Marks: []RailMark{{At: 15600, Text: "absolute"}, {At: 14900, Text: "service"}, {At: 2950, Text: "field"}, {At: 3300, Text: "yesterday"}}}
			rl.Value = rl.Min + (rl.Max-rl.Min)*float64(step)/200
			rl.ValueText = FormatNumber(rl.Value, 0) + " ft"
			if vertical {
				rl.Notes = []string{"PA 3\u202f940", "+28 °C"}
			}
			var s scene.Scene
			s.Reset(size.W+40, size.H+60, 1, scene.Color{})
			var f Frame
			f.Begin(&s, Day(), nil)
			rl.Draw(&f, size)
			all := letters(&s)
			x, y := rl.At(size)
			handle := scene.Rect{X: x - handleRadius, Y: y - handleRadius, W: 2 * handleRadius, H: 2 * handleRadius}
			for i, a := range all {
				if Overlaps(a.r, handle) {
					t.Fatalf("%v at %v: %q lies under the handle", size, rl.Value, a.text)
				}
				for _, b := range all[:i] {
					if Overlaps(a.r, b.r) {
						t.Fatalf("%v at %v: %q on %q", size, rl.Value, a.text, b.text)
					}
				}
			}
			if len(all) < 5 {
				t.Fatalf("%v at %v: only %d labels", size, rl.Value, len(all))
			}
			checkLetters(t, &s)
		}
	}
}

// A rail's drag moves its value with the finger, and its slider speaks SI.
func TestRailValues(t *testing.T) {
	area := scene.Rect{X: 20, Y: 20, W: 440, H: 130}
	rl := Rail{ID: "handle/mass", Label: "Weight", Min: 1000, Max: 1800, Value: 1600, SI: 0.45359237, Step: 1, Page: 10, ValueText: "1 600 lb"}
	x, _ := rl.At(area)
	if v := rl.Dragged(area, rl.Value, Action{X0: x, X: x + 50}); v != 1700 {
		t.Errorf("50 px of 400 for 800 lb: %v", v)
	}
	if v := rl.Dragged(area, rl.Value, Action{X0: x, X: x + 5000}); v != 1800 {
		t.Errorf("beyond the end: %v", v)
	}
	var s scene.Scene
	s.Reset(500, 200, 1, scene.Color{})
	var f Frame
	f.Begin(&s, Day(), nil)
	rl.Draw(&f, area)
	c := f.Controls[0]
	if c.Role != RoleSlider || c.Drag != AxisX || c.Value != 1600*0.45359237 || c.Step != 0.45359237 || c.Max != 1800*0.45359237 || c.Hit.W < MinTarget {
		t.Errorf("%+v", c)
	}
	up := Rail{ID: "handle/alt", Title: "Altitude", Vertical: true, Min: 0, Max: 100, Value: 50}
	tall := scene.Rect{X: 0, Y: 0, W: 160, H: 400}
	_, y := up.At(tall)
	if v := up.Dragged(tall, 50, Action{Y0: y, Y: y - 30}); v <= 50 {
		t.Errorf("up is less: %v", v)
	}
}

func TestDrawingAllocatesNothing(t *testing.T) {
	var s scene.Scene
	var f Frame
	theme := Day()
	r := held("share", "undo")
	marks := []RailMark{{At: 480, Text: "empty 480"}, {At: 800, Text: "max 800"}}
	tabs := []Choice{{ID: "tab/a", Text: "Chart", Selected: true}, {ID: "tab/b", Text: "Aeroplane"}}
	rl := Rail{ID: "handle/mass", Title: "Weight", ValueText: "760 kg", Min: 480, Max: 850, Value: 760, Filled: true, Marks: marks,
		Ticks: AppendTicks(nil, 480, 850, 50), Zones: []RailZone{{From: 800, To: 850, FadeLow: 9, Color: theme.Bad}}}
	if n := testing.AllocsPerRun(50, func() {
		s.Reset(800, 600, 1, theme.Background)
		f.Begin(&s, theme, &r)
		TabBar(&f, scene.Rect{W: 300, H: 52}, tabs, false)
		Button{ID: "share", Text: "Share", Icon: IconShare}.Draw(&f, scene.Rect{X: 400, W: 100, H: 48})
		rl.Vertical = false
		rl.Draw(&f, scene.Rect{X: 20, Y: 100, W: 400, H: 110})
		rl.Vertical = true
		rl.Draw(&f, scene.Rect{X: 500, Y: 100, W: 160, H: 400})
		f.Label(scene.Body, scene.Rect{Y: 500, W: 60, H: 20}, scene.Left, "does not fit into this", theme.Ink)
		f.Paragraph(scene.Small, scene.Rect{Y: 530, W: 90, H: 60}, "some words on several lines", theme.Ink)
	}); n != 0 {
		t.Errorf("%v allocations a frame", n)
	}
}

// Numbers that are none give a rail that can be drawn, and a slider with finite values.
func TestRailTakesGarbage(t *testing.T) {
	nan, inf := math.NaN(), math.Inf(1)
	for _, v := range [][3]float64{{nan, nan, nan}, {0, 10, nan}, {0, 10, inf}, {0, 10, -inf}, {-inf, inf, 0}, {10, 0, 5}, {5, 5, 5}} {
		for _, vertical := range []bool{false, true} {
			rl := Rail{ID: "handle/x", Title: "x", ValueText: "?", Vertical: vertical, Filled: true, Min: v[0], Max: v[1], Value: v[2],
				Ticks: []Tick{{nan, "a"}, {0, "b"}, {0, "c"}, {inf, "d"}}, Marks: []RailMark{{At: nan, Text: "m"}, {At: inf, Text: "n"}, {At: 5, Text: "o"}},
				Zones: []RailZone{{From: nan, To: 5}, {From: -inf, To: inf}, {From: 9, To: 1}, {From: 1, To: 3, FadeLow: inf}}}
			var s scene.Scene
			s.Reset(300, 300, 1, scene.Color{})
			var f Frame
			f.Begin(&s, Day(), nil)
			rl.Draw(&f, scene.Rect{W: 200, H: 200})
			checkControls(t, &f, &s)
			for _, p := range s.Points {
				if !finite(p.X, p.Y) {
					t.Errorf("%v: a point at %v", v, p)
				}
			}
			for _, op := range s.Ops {
				if !finite(op.Rect.X, op.Rect.Y, op.Rect.W, op.Rect.H) {
					t.Errorf("%v: %v", v, op.Rect)
				}
			}
		}
	}
}
