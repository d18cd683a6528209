package scene_test

import (
	"math"
	"testing"

	"levelspan/assets/font"
	"levelspan/game/scene"
	"levelspan/game/scene/internal/sample"
)

// Widths by hand: units of the typeface times size, rounded a letter: at 20 to the em a unit of 100 is a pixel.
func TestMeasure(t *testing.T) {
	for _, c := range []struct {
		style scene.Style
		text  string
		want  float64
	}{
		{scene.Title, "0123456789", 130},
		{scene.Title, "6 300", 59},      // four digits and a space of 700
		{scene.Title, "6\u202f300", 56}, // and a narrow space of 400
		{scene.Small, "125", 24},        // 8.45 is 8
		{scene.Body, "89", 20},          // 10.4 is 10
		{scene.FigureBig, "4", 22},      // 22.1 is 22
		{scene.Body, "", 0},
		{200, "89", 20}, // no such style: Body
	} {
		if got := scene.Measure(c.style, c.text); got != c.want {
			t.Errorf("style %d %q: %g, want %g", c.style, c.text, got, c.want)
		}
		if got := scene.MeasureBytes(c.style, []byte(c.text)); got != c.want {
			t.Errorf("style %d %q as bytes: %g, want %g", c.style, c.text, got, c.want)
		}
	}
}

// The width of any text is the sum over its characters, whole, and the same for strings and bytes even when the
// bytes are no UTF-8.
func TestMeasureAddsUp(t *testing.T) {
	for _, text := range []string{"Grüße, 45° ± 1", "\xff\xfe\x80", "ł→ρ", "a\x00b"} {
		for st := range scene.StyleCount {
			sum := 0.0
			for _, r := range text {
				sum += scene.Advance(st, font.Index(r))
			}
			if got := scene.Measure(st, text); got != sum || got != scene.MeasureBytes(st, []byte(text)) || got != math.Trunc(got) {
				t.Errorf("style %d %q: %g, sum %g", st, text, got, sum)
			}
		}
	}
}

// Rounding to whole pixels must not change the width of running text much.
func TestRoundingIsSmall(t *testing.T) {
	text := "Full-throttle climb at 72 kt, 5 000 ft: narrows VY from ± 1.7 to ± 1.1 kt"
	for st := range scene.StyleCount {
		exact := 0.0
		for _, r := range text {
			exact += float64(font.Advance(st.Weight(), font.Index(r))) * st.Size() / font.UnitsPerEm
		}
		if got := scene.Measure(st, text); math.Abs(got/exact-1) > 0.04 {
			t.Errorf("style %d: %g, unrounded %g", st, got, exact)
		}
	}
}

func TestFit(t *testing.T) {
	for _, c := range []struct {
		width float64
		want  string
	}{{-1, ""}, {12.9, ""}, {13, "8"}, {25, "8"}, {26, "88"}, {1e9, "88é"}, {math.NaN(), "88é"}} {
		if got := scene.Fit(scene.Title, "88é", c.width); got != c.want {
			t.Errorf("width %g: %q, want %q", c.width, got, c.want)
		}
	}
}

func TestHeights(t *testing.T) {
	for st := range scene.StyleCount {
		cap, asc, desc, line := scene.CapHeight(st), scene.Ascent(st), scene.Descent(st), scene.LineHeight(st)
		if cap != 0.75*st.Size() || asc <= cap || desc <= 0 || line < asc+desc || line != math.Trunc(line) {
			t.Errorf("style %d: cap %g ascent %g descent %g line %g", st, cap, asc, desc, line)
		}
	}
}

func TestDeviceSize(t *testing.T) {
	for _, c := range []struct {
		w, h, scale float64
		dw, dh      int
	}{
		{1280, 800, 1, 1280, 800}, {1280, 800, 2, 2560, 1600}, {100.1, 100, 1.5, 151, 150}, {1e9, 1, 1, scene.MaxSide, 1},
		{math.NaN(), -1, 1, 0, 0}, {10, 10, math.NaN(), 10, 10}, {10, 10, -2, 10, 10}, {10, 10, 50, 30, 30}, {10, 10, math.Inf(1), 10, 10},
		{400.0 / 3, 10, 3, 400, 30}, // a product that rounds up by its last bit is not a pixel more
	} {
		s := scene.Scene{Width: c.w, Height: c.h, Scale: c.scale}
		if w, h := s.DeviceSize(); w != c.dw || h != c.dh {
			t.Errorf("%g x %g at %g: %d x %d, want %d x %d", c.w, c.h, c.scale, w, h, c.dw, c.dh)
		}
	}
}

// Every single change shows in Equal and in Hash, and a copy is equal.
func TestEqualAndHash(t *testing.T) {
	var s, c scene.Scene
	sample.Sheet(&s, 1)
	c.CopyFrom(&s)
	if !s.Equal(&c) || s.Hash() != c.Hash() {
		t.Fatal("a copy differs")
	}
	last := len(s.Ops) - 1
	for name, change := range map[string]func(*scene.Scene){
		"width":      func(s *scene.Scene) { s.Width++ },
		"height":     func(s *scene.Scene) { s.Height++ },
		"scale":      func(s *scene.Scene) { s.Scale *= 2 },
		"background": func(s *scene.Scene) { s.Background.B ^= 1 },
		"kind":       func(s *scene.Scene) { s.Ops[last].Kind = scene.OpFill },
		"closed":     func(s *scene.Scene) { s.Ops[last].Closed = true },
		"vertical":   func(s *scene.Scene) { s.Ops[last].Vertical = true },
		"style":      func(s *scene.Scene) { s.Ops[last].Style++ },
		"align":      func(s *scene.Scene) { s.Ops[last].Align++ },
		"colour":     func(s *scene.Scene) { s.Ops[last].Color.A-- },
		"colour2":    func(s *scene.Scene) { s.Ops[last].Color2.R++ },
		"rect":       func(s *scene.Scene) { s.Ops[last].Rect.H = 1 },
		"w":          func(s *scene.Scene) { s.Ops[last].W = 1 },
		"dash":       func(s *scene.Scene) { s.Ops[last].Dash = 1 },
		"gap":        func(s *scene.Scene) { s.Ops[last].Gap = 1 },
		"p0":         func(s *scene.Scene) { s.Ops[last].P0-- },
		"t1":         func(s *scene.Scene) { s.Ops[last].T1-- },
		"point":      func(s *scene.Scene) { s.Points[3].Y = math.Nextafter(s.Points[3].Y, 0) },
		"text":       func(s *scene.Scene) { s.Text[0]++ },
		"less":       func(s *scene.Scene) { s.Ops = s.Ops[:last] },
		"zero's sign": func(s *scene.Scene) {
			s.Ops[last].Rect.X = math.Copysign(0, -1)
		},
	} {
		c.CopyFrom(&s)
		change(&c)
		if s.Equal(&c) || s.Hash() == c.Hash() {
			t.Errorf("%s: the change does not show", name)
		}
	}
	// The sheet holds a NaN, which must not make it differ from itself.
	if !s.Equal(&s) {
		t.Error("a scene differs from itself")
	}
}

// The same drawing elsewhere in the store is the same operation.
func TestSameOp(t *testing.T) {
	var s, u scene.Scene
	sample.Sheet(&s, 1)
	u.Reset(320, 240, 1, sample.Paper)
	u.Label(scene.Small, 1, 2, scene.Left, "before", sample.Ink)
	n := len(u.Ops)
	for i := range s.Ops {
		op := s.Ops[i]
		op.P0, op.P1, op.T0, op.T1 = op.P0+1, op.P1+1, op.T0+len("before"), op.T1+len("before")
		if op.Kind != scene.OpText {
			op.T0, op.T1 = 0, 0
		}
		u.Ops = append(u.Ops, op)
	}
	u.Points, u.Text = append(u.Points, s.Points...), append(u.Text, s.Text...)
	for i := range s.Ops {
		if s.Ops[i].P1 > s.Ops[i].P0 && !scene.SameOp(&s, i, &u, i+n) {
			t.Errorf("operation %d differs", i)
		}
		if i > 0 && scene.SameOp(&s, i-1, &u, i+n) {
			t.Errorf("operation %d is the one before", i)
		}
	}
}

// A frame allocates nothing once the scene is warm.
func TestBuildingAllocatesNothing(t *testing.T) {
	var c sample.Chart
	var s, old scene.Scene
	phase := 0.0
	frame := func() {
		c.Draw(&s, 1280, 800, 1, phase)
		phase += 0.1
		if s.Equal(&old) {
			t.Error("frames do not differ")
		}
		old.CopyFrom(&s)
		if s.Hash() != old.Hash() {
			t.Error("a copy's hash differs")
		}
	}
	frame()
	if n := testing.AllocsPerRun(20, frame); n != 0 {
		t.Errorf("%g allocations a frame", n)
	}
}

func BenchmarkMeasure(b *testing.B) {
	texts := [...]string{"394 ± 70 ft/min", "Steepest climb", "6\u202f300"}
	sum := 0.0
	for i := range b.N {
		sum += scene.Measure(scene.Small, texts[i%len(texts)])
	}
	if sum == 0 {
		b.Fatal("no width")
	}
}

func BenchmarkHash(b *testing.B) {
	var c sample.Chart
	var s scene.Scene
	c.Draw(&s, 1280, 800, 1, 0)
	var h uint64
	for i := range b.N {
		s.Points[0].X = float64(i)
		h ^= s.Hash()
	}
	if h == 0 {
		b.Fatal("no hash")
	}
}
