package cover

import (
	"image"
	"image/color"
	"math"
	"math/rand"
	"slices"
	"testing"
)

type pt struct{ x, y float64 }

// star is a polygon around the middle of a w by h picture that may reach outside it.
func star(rng *rand.Rand, n int, w, h float64) []pt {
	p := make([]pt, n)
	for i := range p {
		a := 2 * math.Pi * float64(i) / float64(n)
		r := (0.1 + 0.8*rng.Float64()) * w
		p[i] = pt{w/2 + r*math.Cos(a), h/2 + r*math.Sin(a)}
	}
	return p
}

func fill(z *Rasterizer, clip image.Rectangle, polys ...[]pt) *image.Alpha {
	m := image.NewAlpha(image.Rect(-64, -64, 128, 128))
	z.Begin(clip)
	for _, p := range polys {
		for i, b := range p {
			a := p[(i+len(p)-1)%len(p)]
			z.Line(a.x, a.y, b.x, b.y)
		}
	}
	z.Spans(func(y, x0, x1 int, alpha uint8) {
		for x := x0; x < x1; x++ {
			m.SetAlpha(x, y, color.Alpha{A: alpha})
		}
	})
	return m
}

// slow is the coverage by the definition: on 128 lines a row, the parts between crossings, cut exactly in x.
func slow(w, h int, p []pt) []float64 {
	const lines = 128
	cover := make([]float64, w*h)
	var xs []float64
	for k := range h * lines {
		y := (float64(k) + 0.5) / lines
		xs = xs[:0]
		for i, b := range p {
			a := p[(i+len(p)-1)%len(p)]
			if (a.y <= y) != (b.y <= y) {
				xs = append(xs, a.x+(y-a.y)*(b.x-a.x)/(b.y-a.y))
			}
		}
		slices.Sort(xs)
		for i := 0; i+1 < len(xs); i += 2 {
			for x := max(int(xs[i]), 0); x < w && float64(x) < xs[i+1]; x++ {
				cover[k/lines*w+x] += max(min(xs[i+1], float64(x+1))-max(xs[i], float64(x)), 0) / lines
			}
		}
	}
	return cover
}

// Random stars, partly outside the picture, have the coverage of the definition.
func TestAgainstDefinition(t *testing.T) {
	rng := rand.New(rand.NewSource(1))
	var z Rasterizer
	for n := range 100 {
		w, h := 1+rng.Intn(70), 1+rng.Intn(70)
		p := star(rng, 3+rng.Intn(20), float64(w), float64(h))
		got := fill(&z, image.Rect(0, 0, w, h), p)
		for i, c := range slow(w, h, p) {
			if d := float64(got.AlphaAt(i%w, i/w).A) - c*255; math.Abs(d) > 2.5 {
				t.Fatalf("shape %d of %d x %d, pixel %d,%d: %d, want %.1f", n, w, h, i%w, i/w, got.AlphaAt(i%w, i/w).A, c*255)
			}
		}
	}
}

// A clip cuts and changes nothing else.
func TestClip(t *testing.T) {
	rng := rand.New(rand.NewSource(2))
	var z Rasterizer
	for range 300 {
		p := star(rng, 3+rng.Intn(12), 50, 50)
		whole := fill(&z, image.Rect(-64, -64, 128, 128), p)
		x, y := rng.Intn(60)-5, rng.Intn(60)-5
		clip := image.Rect(x, y, x+rng.Intn(40), y+rng.Intn(40))
		part := fill(&z, clip, p)
		for y := -64; y < 128; y++ {
			for x := -64; x < 128; x++ {
				want := uint8(0)
				if image.Pt(x, y).In(clip) {
					want = whole.AlphaAt(x, y).A
				}
				if d := int(part.AlphaAt(x, y).A) - int(want); d < -1 || d > 1 {
					t.Fatalf("clip %v pixel %d,%d: %d, want %d", clip, x, y, part.AlphaAt(x, y).A, want)
				}
			}
		}
	}
}

// A rectangle's coverage is the product of its overlaps.
func TestExactCoverage(t *testing.T) {
	var z Rasterizer
	m := fill(&z, image.Rect(0, 0, 8, 8), []pt{{1.25, 2.5}, {4.5, 2.5}, {4.5, 5.75}, {1.25, 5.75}})
	for y := range 8 {
		for x := range 8 {
			ox := max(min(float64(x+1), 4.5)-max(float64(x), 1.25), 0)
			oy := max(min(float64(y+1), 5.75)-max(float64(y), 2.5), 0)
			if want := uint8(ox*oy*255 + 0.5); m.AlphaAt(x, y).A != want {
				t.Errorf("%d,%d: %d, want %d", x, y, m.AlphaAt(x, y).A, want)
			}
		}
	}
}

// Pieces of one direction that overlap are a union: nowhere more than full, and full where any is.
func TestUnion(t *testing.T) {
	var z Rasterizer
	a := []pt{{0, 0}, {4, 0}, {4, 4}, {0, 4}}
	b := []pt{{2, 2}, {6, 2}, {6, 6}, {2, 6}}
	m := fill(&z, image.Rect(0, 0, 8, 8), a, b)
	for y := range 8 {
		for x := range 8 {
			want := uint8(0)
			if x < 4 && y < 4 || x >= 2 && x < 6 && y >= 2 && y < 6 {
				want = 255
			}
			if m.AlphaAt(x, y).A != want {
				t.Errorf("%d,%d: %d, want %d", x, y, m.AlphaAt(x, y).A, want)
			}
		}
	}
}

// Nothing of one shape is left for the next, also when the clip grows and shrinks.
func TestReuse(t *testing.T) {
	rng := rand.New(rand.NewSource(3))
	var z Rasterizer
	for range 100 {
		fill(&z, image.Rect(0, 0, rng.Intn(60), rng.Intn(60)), star(rng, 9, 50, 50))
		if m := fill(&z, image.Rect(0, 0, 60, 60)); m.Pix[0] != 0 || maxOf(m.Pix) != 0 {
			t.Fatal("an empty shape has pixels")
		}
	}
}

func maxOf(p []uint8) (v uint8) {
	for _, x := range p {
		v = max(v, x)
	}
	return v
}

func TestAllocatesNothing(t *testing.T) {
	var z Rasterizer
	sum := 0
	emit := func(y, x0, x1 int, alpha uint8) { sum += x1 - x0 }
	shape := func() {
		z.Begin(image.Rect(0, 0, 100, 100))
		z.Line(10, 10, 90, 20)
		z.Line(90, 20, 50, 80)
		z.Line(50, 80, 10, 10)
		z.Spans(emit)
	}
	shape()
	if n := testing.AllocsPerRun(20, shape); n != 0 || sum == 0 {
		t.Errorf("%g allocations, %d pixels", n, sum)
	}
}

func BenchmarkCurve(b *testing.B) {
	var z Rasterizer
	sum := 0
	emit := func(y, x0, x1 int, alpha uint8) { sum += x1 - x0 }
	for i := range b.N {
		z.Begin(image.Rect(0, 0, 700, 430))
		off := float64(i%7) / 7
		for k := range 300 {
			x0, x1 := float64(k)*2.3, float64(k+1)*2.3
			y0, y1 := 200+150*math.Sin(x0/100)+off, 200+150*math.Sin(x1/100)+off
			z.Line(x0, y0, x1, y1)
			z.Line(x1, y1+2, x0, y0+2)
		}
		z.Spans(emit)
	}
}
