package glyph

import (
	"fmt"
	"image"
	"testing"

	"levelspan/assets/font"
	"levelspan/game/scene"
)

var scales = []float64{0.25, 1, 1.25, 2, 3}

// Each glyph has its own pixels within the image, none on its edge, and a frame of empty ones around it.
func TestPlaces(t *testing.T) {
	for _, scale := range scales {
		a := New(scale)
		owner := make([]int32, len(a.Image.Pix))
		id := int32(0)
		for s := range scene.StyleCount {
			for i := range font.Count() {
				g := a.At(s, i)
				id++
				if (g.W == 0) != (len(new(font.Outliner).Outline(s.Weight(), i)) == 0) {
					t.Fatalf("scale %g style %d %q: width %d", scale, s, font.Rune(i), g.W)
				}
				r := image.Rect(int(g.X), int(g.Y), int(g.X+g.W), int(g.Y+g.H))
				if !r.In(a.Image.Rect) {
					t.Fatalf("scale %g style %d %q at %v of %v", scale, s, font.Rune(i), r, a.Image.Rect)
				}
				for y := r.Min.Y; y < r.Max.Y; y++ {
					for x := r.Min.X; x < r.Max.X; x++ {
						k := a.Image.PixOffset(x, y)
						if owner[k] != 0 {
							t.Fatalf("scale %g: style %d %q shares a pixel", scale, s, font.Rune(i))
						}
						owner[k] = id
					}
				}
			}
		}
		ink := 0
		for y := 0; y+1 < a.Image.Rect.Dy(); y++ {
			for x := 0; x+1 < a.Image.Rect.Dx(); x++ {
				k := y*a.Image.Stride + x
				if a.Image.Pix[k] != 0 && owner[k] == 0 && (x >= white || y >= white) {
					t.Fatalf("scale %g: ink at %d,%d belongs to nobody", scale, x, y)
				}
				if owner[k] != 0 {
					ink++
					if r, d := owner[k+1], owner[k+a.Image.Stride]; r != 0 && r != owner[k] || d != 0 && d != owner[k] {
						t.Fatalf("scale %g: glyphs touch at %d,%d", scale, x, y)
					}
				}
			}
		}
		if full := len(a.Image.Pix); scale >= 1 && ink < full*6/10 {
			t.Errorf("scale %g: %d of %d pixels used", scale, ink, full)
		}
		if a.Image.Rect.Dx() > 2048 || a.Image.Rect.Dy() > 2048 {
			t.Errorf("scale %g: %v is too large a texture for some hardware", scale, a.Image.Rect)
		}
	}
}

func TestWhite(t *testing.T) {
	a := New(1)
	x, y := int(a.WhiteX), int(a.WhiteY)
	for dy := -1; dy <= 1; dy++ {
		for dx := -1; dx <= 1; dx++ {
			if a.Image.AlphaAt(x+dx, y+dy).A != 255 {
				t.Errorf("neighbour %d,%d of the white texel is not white", dx, dy)
			}
		}
	}
}

// Flat letters have hard edges: the feet of "E" stand on the baseline and its top on a whole pixel, as full as its
// stem, at every style and scale.
func TestRowsAreHard(t *testing.T) {
	for _, scale := range []float64{1, 2, 3} {
		a := New(scale)
		for s := range scene.StyleCount {
			g, _ := a.Lookup(s, 'E')
			if int(g.Top)+int(g.H) != 0 {
				t.Errorf("scale %g style %d: E ends %d below the baseline", scale, s, int(g.Top)+int(g.H))
			}
			most := func(row int) (v uint8) {
				for x := range int(g.W) {
					v = max(v, a.Image.AlphaAt(int(g.X)+x, int(g.Y)+row).A)
				}
				return v
			}
			bottom, middle := most(int(g.H)-1), most(int(g.H)/3)
			if bottom < 250 || middle < 180 {
				t.Errorf("scale %g style %d: bottom row %d, stem %d of 255", scale, s, bottom, middle)
			}
		}
	}
}

// A minus is never faint: each bar of the signs made of bars has a row of full cover, and none half covered beside it.
func TestSignsAreClear(t *testing.T) {
	for _, scale := range []float64{1, 1.25, 1.5, 2, 3} {
		a := New(scale)
		for s := range scene.StyleCount {
			for r, want := range map[rune]int{'−': 1, '-': 1, '–': 1, '—': 1, '=': 2, '±': 2, '+': 1} {
				g, _ := a.Lookup(s, r)
				var rows []uint8 // cover along the left part of the sign, where only bars are
				for y := range int(g.H) {
					rows = append(rows, a.Image.AlphaAt(int(g.X)+int(g.W)/4, int(g.Y)+y).A)
				}
				bars, on := 0, false
				for _, v := range rows {
					if v > 5 && v < 250 {
						t.Fatalf("scale %g style %d %q: rows %v", scale, s, r, rows)
					}
					if v >= 250 && !on {
						bars++
					}
					on = v >= 250
				}
				if bars != want {
					t.Errorf("scale %g style %d %q: %d bars in %v", scale, s, r, bars, rows)
				}
			}
		}
	}
}

// Digits advance alike, whole pixels at whole scales.
func TestAdvances(t *testing.T) {
	for _, scale := range []float64{1, 2, 3} {
		a := New(scale)
		for s := range scene.StyleCount {
			_, want := a.Lookup(s, '0')
			for _, r := range "123456789" {
				if _, got := a.Lookup(s, r); got != want || got != float64(int(got)) {
					t.Errorf("scale %g style %d: %q advances %g, 0 advances %g", scale, s, r, got, want)
				}
			}
		}
	}
}

// The ink of a character is where its outline is: the weight of all coverage is the outline's area.
func TestInkIsTheOutlinesArea(t *testing.T) {
	const scale = 3
	a := New(scale)
	var o font.Outliner
	for _, r := range "LHTI" { // straight sides
		i := font.Index(r)
		s := scene.FigureBig
		sum, area := 0.0, 0.0
		g := a.At(s, i)
		for y := range int(g.H) {
			for x := range int(g.W) {
				sum += float64(a.Image.AlphaAt(int(g.X)+x, int(g.Y)+y).A) / 255
			}
		}
		var px, py, sx, sy float64
		for _, seg := range o.Outline(s.Weight(), i) {
			if seg.Verb == font.MoveTo {
				area += px*sy - sx*py
				sx, sy = seg.X, seg.Y
			} else {
				area += px*seg.Y - seg.X*py
			}
			px, py = seg.X, seg.Y
		}
		area = abs(area+px*sy-sx*py) / 2
		k := s.Size() * scale / font.UnitsPerEm
		if want := area * k * k; abs(sum/want-1) > 0.03 {
			t.Errorf("%q: ink %.1f pixels, outline %.1f", r, sum, want)
		}
	}
}

func abs(v float64) float64 { return max(v, -v) }

func TestOutOfRange(t *testing.T) {
	a := New(-1)
	if a.Scale != 1 {
		t.Errorf("scale %g", a.Scale)
	}
	box := a.At(scene.Body, font.Missing)
	if a.At(200, -1) != box || a.At(scene.Body, 1<<30) != box || box.W == 0 {
		t.Error("what is not in the sets must be the box in Body")
	}
}

func TestRGBA(t *testing.T) {
	a := New(1)
	m := a.RGBA()
	if m.Rect != a.Image.Rect {
		t.Fatal(m.Rect)
	}
	for i, v := range a.Image.Pix {
		if p := m.Pix[i*4 : i*4+4]; p[0] != v || p[1] != v || p[2] != v || p[3] != v {
			t.Fatalf("pixel %d: %v of %d", i, p, v)
		}
	}
}

func BenchmarkNew(b *testing.B) {
	for _, scale := range []float64{1, 2, 3} {
		b.Run(fmt.Sprint(scale), func(b *testing.B) {
			var a *Atlas
			for range b.N {
				a = New(scale)
			}
			b.ReportMetric(float64(len(a.Image.Pix)), "pixels")
		})
	}
}
