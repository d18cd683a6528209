package raster

import (
	"flag"
	"fmt"
	"image"
	"math/rand"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/scene/glyph"
	"levelspan/game/scene/internal/sample"
)

var update = flag.Bool("update", false, "write the goldens instead of comparing with them")

var black = scene.Color{A: 255}

// blank is an empty white scene.
func blank(w, h, scale float64) *scene.Scene {
	s := new(scene.Scene)
	s.Reset(w, h, scale, scene.Color{R: 255, G: 255, B: 255, A: 255})
	return s
}

func TestGoldens(t *testing.T) {
	var p Painter
	for _, scale := range []float64{1, 1.5, 2} {
		var s scene.Scene
		sample.Sheet(&s, scale)
		sample.Golden(t, p.Render(&s, nil), fmt.Sprintf("sheet-%g", scale), *update)
	}
	var c sample.Chart
	var s scene.Scene
	c.Draw(&s, 1280, 800, 0.5, 0)
	sample.Golden(t, p.Render(&s, nil), "chart", *update)
}

// A level line of one logical pixel at any place is whole rows of the full colour.
func TestHairlinesAreCrisp(t *testing.T) {
	for _, scale := range []float64{1, 1.25, 1.5, 2, 3} {
		for k := range 10 {
			s := blank(20, 20, scale)
			v := 8 + float64(k)/10
			s.Line(2, v, 18, v, 1, black)
			s.Line(v, 2, v, 18, 1, black)
			for i, c := range Render(s).Pix {
				if i%4 != 3 && c != 0 && c != 255 {
					t.Fatalf("scale %g at %g: a value of %d", scale, v, c)
				}
			}
		}
	}
}

// A translucent line has one colour inside however it turns: no pixel is darker than a single layer.
func TestTranslucentLinesAreEven(t *testing.T) {
	rng := rand.New(rand.NewSource(1))
	for range 50 {
		s := blank(60, 60, 1)
		pts := make([]scene.Point, 12)
		for i := range pts {
			pts[i] = scene.Point{X: 60 * rng.Float64(), Y: 60 * rng.Float64()}
		}
		s.Stroke(pts, 5, scene.Color{A: 128})
		full := 0
		for i, c := range Render(s).Pix {
			if c < 127 {
				t.Fatalf("pixel %d is %d, one layer is 127", i/4, c)
			}
			if c == 127 {
				full++
			}
		}
		if full < 1000 {
			t.Fatalf("only %d values of full cover", full)
		}
	}
}

// The ink of a line is its length times its width.
func TestStrokesHaveTheirWidth(t *testing.T) {
	for _, w := range []float64{0.3, 0.7, 1, 1.5, 2, 5} {
		s := blank(100, 100, 1)
		s.Line(10, 10, 70, 90, w, black)
		sum := 0.0
		m := Render(s)
		for i := 0; i < len(m.Pix); i += 4 {
			sum += 1 - float64(m.Pix[i])/255
		}
		if want := 100 * w; sum < want*0.98-1 || sum > want*1.02+1 {
			t.Errorf("width %g: ink %.1f, want %.1f", w, sum, want)
		}
	}
}

// Painting a part gives the pixels of the whole there, and leaves the others alone.
func TestDirtyPart(t *testing.T) {
	var s scene.Scene
	sample.Sheet(&s, 1)
	var p Painter
	whole := p.Render(&s, nil)
	rng := rand.New(rand.NewSource(2))
	for range 40 {
		x, y := rng.Intn(340)-10, rng.Intn(260)-10
		dirty := image.Rect(x, y, x+rng.Intn(100), y+rng.Intn(100))
		part := image.NewRGBA(whole.Rect)
		for i := range part.Pix {
			part.Pix[i] = 77
		}
		p.Paint(&s, part, dirty)
		for y := range part.Rect.Dy() {
			for x := range part.Rect.Dx() {
				k := part.PixOffset(x, y)
				for i := range 4 {
					want := uint8(77)
					if image.Pt(x, y).In(dirty) {
						want = whole.Pix[k+i]
					}
					if d := int(part.Pix[k+i]) - int(want); d < -1 || d > 1 {
						t.Fatalf("part %v pixel %d,%d: %d, want %d", dirty, x, y, part.Pix[k+i], want)
					}
				}
			}
		}
	}
}

// Clips of clips confine, and end.
func TestClip(t *testing.T) {
	s := blank(40, 40, 1)
	s.PushClip(scene.Rect{X: 10, Y: 10, W: 20, H: 20})
	s.PushClip(scene.Rect{X: 20, Y: 0, W: 20, H: 40})
	big := scene.Rect{X: -5, Y: -5, W: 100, H: 100}
	s.FillRect(big, 0, black)
	s.FillRect(big, 4, black)
	s.Gradient(big, black, black, true)
	s.Circle(20, 20, 50, black)
	s.Label(scene.FigureBig, 0, 30, scene.Left, "888888", black)
	s.PopClip()
	s.PopClip()
	s.FillRect(scene.Rect{X: 0, Y: 39, W: 1, H: 1}, 0, black)
	m := Render(s)
	for y := range 40 {
		for x := range 40 {
			want := uint8(255)
			if image.Pt(x, y).In(image.Rect(20, 10, 30, 30)) || x == 0 && y == 39 {
				want = 0
			}
			if got := m.RGBAAt(x, y).R; got != want {
				t.Fatalf("%d,%d: %d, want %d", x, y, got, want)
			}
		}
	}
}

// A gradient begins and ends within half a step of its colours, and never turns back.
func TestGradient(t *testing.T) {
	for _, vertical := range []bool{false, true} {
		s := blank(64, 64, 1)
		s.Gradient(scene.Rect{W: 64, H: 64}, black, scene.Color{R: 255, G: 255, B: 255, A: 255}, vertical)
		m := Render(s)
		last := -1
		for i := range 64 {
			x, y := i, 5
			if vertical {
				x, y = 5, i
			}
			v := int(m.RGBAAt(x, y).R)
			if want := (2*i + 1) * 255 / 128; v < last || v < want-1 || v > want+1 {
				t.Errorf("vertical %v step %d: %d after %d", vertical, i, v, last)
			}
			last = v
		}
	}
}

// Text is the atlas's pixels at whole positions.
func TestTextIsTheAtlas(t *testing.T) {
	a := glyph.New(2)
	var p Painter
	p.UseAtlas(a)
	s := blank(40, 40, 2)
	s.Label(scene.Body, 10.1, 20.2, scene.Left, "R", black)
	m := p.Render(s, nil)
	g, _ := a.Lookup(scene.Body, 'R')
	for y := range int(g.H) {
		for x := range int(g.W) {
			got := m.RGBAAt(20+int(g.Left)+x, 40+int(g.Top)+y).R
			if want := 255 - a.Image.AlphaAt(int(g.X)+x, int(g.Y)+y).A; got != want {
				t.Fatalf("%d,%d: %d, want %d", x, y, got, want)
			}
		}
	}
}

func TestDiv255(t *testing.T) {
	for v := range uint32(255*255 + 1) {
		if want := (2*v + 255) / 510; div255(v) != want {
			t.Fatalf("%d: %d, want %d", v, div255(v), want)
		}
	}
}

// Two channels at a time is the same as one by one.
func TestFade(t *testing.T) {
	rng := rand.New(rand.NewSource(3))
	for range 200000 {
		d, k := rng.Uint32(), uint32(rng.Intn(256))
		want := div255(d&255*k) | div255(d>>8&255*k)<<8 | div255(d>>16&255*k)<<16 | div255(d>>24*k)<<24
		if got := fade(d, k); got != want {
			t.Fatalf("%08x times %d: %08x, want %08x", d, k, got, want)
		}
	}
}

func TestEmptyScene(t *testing.T) {
	if m := Render(new(scene.Scene)); !m.Rect.Empty() {
		t.Errorf("an empty scene is %v", m.Rect)
	}
}

func TestPaintingAllocatesNothing(t *testing.T) {
	var c sample.Chart
	var s scene.Scene
	var p Painter
	var m *image.RGBA
	phase := 0.0
	frame := func() {
		c.Draw(&s, 1280, 800, 1, phase)
		phase += 0.1
		m = p.Render(&s, m)
	}
	for range 70 { // a full turn of the phase: every store has its greatest size
		frame()
	}
	if n := testing.AllocsPerRun(10, frame); n != 0 {
		t.Errorf("%g allocations a frame", n)
	}
}

func BenchmarkChart(b *testing.B) {
	for _, scale := range []float64{1, 2} {
		b.Run(fmt.Sprint(scale), func(b *testing.B) {
			var c sample.Chart
			var s scene.Scene
			var p Painter
			var m *image.RGBA
			for i := range b.N {
				c.Draw(&s, 1280, 800, scale, float64(i)/10)
				m = p.Render(&s, m)
			}
		})
	}
}

// BenchmarkPart is a frame in which only the weight handle moved.
func BenchmarkPart(b *testing.B) {
	var c sample.Chart
	var s scene.Scene
	var p Painter
	c.Draw(&s, 1280, 800, 1, 0)
	m := p.Render(&s, nil)
	for range b.N {
		p.Paint(&s, m, image.Rect(500, 600, 760, 700))
	}
}
