package mesh

import (
	"fmt"
	"image"
	"math"
	"math/rand"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/scene/glyph"
	"levelspan/game/scene/internal/sample"
	"levelspan/game/scene/raster"
)

var black = scene.Color{A: 255}

func blank(w, h, scale float64) *scene.Scene {
	s := new(scene.Scene)
	s.Reset(w, h, scale, scene.Color{R: 255, G: 255, B: 255, A: 255})
	return s
}

// draw builds a scene's mesh and draws it by the test's triangle rasteriser.
func draw(m *Mesh, s *scene.Scene) *image.RGBA {
	m.Build(s)
	w, h := s.DeviceSize()
	soft := newSoft(w, h)
	soft.draw(m)
	return soft.image()
}

// The two back ends show the same picture: on the average pixel to a quarter of a step, and hardly a pixel, at the
// end of a slanted line or the tip of a star, by more than a sixth of the range.
func TestSamePictureAsRaster(t *testing.T) {
	var m Mesh
	for _, scale := range []float64{1, 1.25, 1.5, 2, 3} {
		var s scene.Scene
		sample.Sheet(&s, scale)
		got, want := draw(&m, &s), raster.Render(&s)
		if d := sample.Compare(got, want, 42); d.Mean > 0.25 || d.Count > 40 || d.Max > 90 {
			t.Errorf("sheet at %g: %+v", scale, d)
		}
	}
	var c sample.Chart
	var s scene.Scene
	c.Draw(&s, 1280, 800, 1, 0)
	if d := sample.Compare(draw(&m, &s), raster.Render(&s), 32); d.Mean > 0.1 || d.Count > 10 || d.Max > 50 {
		t.Errorf("chart: %+v", d)
	}
}

// What stands on whole pixels is exactly the same in both: text, level and upright lines, rectangles, clips.
func TestExactlySameOnTheGrid(t *testing.T) {
	for _, scale := range []float64{1, 1.5, 2} {
		s := blank(120, 80, scale)
		s.Label(scene.Body, 4, 20, scene.Left, "89 ± 1 kt", black)
		s.Label(scene.Small, 110, 20.3, scene.Right, "6\u202f300", sample.Red)
		s.Line(5, 30, 100.2, 30, 1, black)
		s.Line(50.7, 24, 50.7, 60, 2.3, sample.Blue)
		s.FillRect(scene.Rect{X: 10, Y: 40, W: 30, H: 12.4}, 0, sample.Green)
		s.PushClip(scene.Rect{X: 60, Y: 40, W: 31, H: 30})
		s.Label(scene.FigureBig, 55, 66, scene.Left, "48", black)
		s.PopClip()
		var m Mesh
		if d := sample.Compare(draw(&m, s), raster.Render(s), 1); d.Count != 0 {
			t.Errorf("scale %g: %+v", scale, d)
		}
	}
}

// A translucent line that turns is even: nowhere two layers, except where it crosses itself.
func TestTranslucentLinesAreEven(t *testing.T) {
	var m Mesh
	for _, closed := range []bool{false, true} {
		for n := 3; n < 40; n++ {
			s := blank(80, 80, 1)
			pts := make([]scene.Point, n)
			for i := range pts {
				sin, cos := math.Sincos(5.5 * float64(i) / float64(n))
				pts[i] = scene.Point{X: 40 + 28*cos, Y: 40 + 28*sin}
			}
			if closed {
				s.StrokeClosed(pts, 6, scene.Color{A: 128})
			} else {
				s.Stroke(pts, 6, scene.Color{A: 128})
			}
			full := 0
			for i, c := range draw(&m, s).Pix {
				if c < 126 {
					t.Fatalf("closed %v %d corners: pixel %d is %d, one layer is 127", closed, n, i/4, c)
				}
				if c <= 128 {
					full++
				}
			}
			if full < 1000 {
				t.Fatalf("closed %v %d corners: only %d values of full cover", closed, n, full)
			}
		}
	}
}

// The ink of a line is its length times its width, also below a pixel.
func TestStrokesHaveTheirWidth(t *testing.T) {
	var m Mesh
	for _, w := range []float64{0.3, 0.7, 1, 1.5, 2, 5} {
		s := blank(100, 100, 1)
		s.Line(10, 10, 70, 90, w, black)
		sum := 0.0
		p := draw(&m, s)
		for i := 0; i < len(p.Pix); i += 4 {
			sum += 1 - float64(p.Pix[i])/255
		}
		if want := 100 * w; math.Abs(sum-want) > want*0.03+1 {
			t.Errorf("width %g: ink %.1f, want %.1f", w, sum, want)
		}
	}
}

// Long lines, bands and many labels are spread over batches, joined without a gap.
func TestLongLinesAreSplit(t *testing.T) {
	var m Mesh
	s := blank(1200, 300, 1)
	spiral := make([]scene.Point, 40000)
	for i := range spiral {
		r := 130 * math.Sqrt(float64(i)/40000)
		sin, cos := math.Sincos(r * 2 * math.Pi / 5)
		spiral[i] = scene.Point{X: 140 + r*cos, Y: 140 + r*sin}
	}
	s.Stroke(spiral, 2, black)
	upper, lower := make([]scene.Point, 16500), make([]scene.Point, 16500)
	for i := range upper {
		x := 1200 * float64(i) / 16499
		upper[i], lower[i] = scene.Point{X: x, Y: 285 + 5*math.Sin(x/9)}, scene.Point{X: x, Y: 298}
	}
	s.Band(upper, lower, sample.Blue)
	for range 20000 {
		s.Label(scene.Small, 305, 55, scene.Left, "8", black)
	}
	got := draw(&m, s)
	if len(m.Batches) < 4 {
		t.Errorf("%d batches for %d vertices", len(m.Batches), len(m.Vertices))
	}
	for i, b := range m.Batches {
		if b.V1-b.V0 > MaxVertices {
			t.Errorf("batch %d has %d vertices", i, b.V1-b.V0)
		}
	}
	if d := sample.Compare(got, raster.Render(s), 42); d.Count > 20 {
		t.Errorf("%+v", d)
	}
}

// A band with a flat edge, as an area down to an axis has, is filled by both back ends.
func TestFlatBand(t *testing.T) {
	var m Mesh
	s := blank(40, 40, 1)
	s.Band([]scene.Point{{X: 5, Y: 10}, {X: 20, Y: 6}, {X: 35, Y: 10}}, []scene.Point{{X: 5, Y: 30}, {X: 20, Y: 30}, {X: 35, Y: 30}}, black)
	got, want := draw(&m, s), raster.Render(s)
	if got.RGBAAt(20, 28).R != 0 || want.RGBAAt(20, 28).R != 0 || got.RGBAAt(20, 31).R != 255 || want.RGBAAt(20, 31).R != 255 {
		t.Error("the band does not reach from edge to edge")
	}
	if d := sample.Compare(got, want, 42); d.Count > 0 {
		t.Errorf("%+v", d)
	}
}

// Shapes that no clip cuts share a batch whatever clips are open.
func TestFewBatches(t *testing.T) {
	var m Mesh
	s := blank(200, 200, 1)
	for i := range 20 {
		x := 10 * float64(i)
		s.PushClip(scene.Rect{X: x, Y: 0, W: 10, H: 200})
		s.Label(scene.Small, x+1, 20, scene.Left, "88888", black) // cut, but by itself
		s.Circle(x+5, 50, 3, black)                               // not cut
		s.PopClip()
	}
	m.Build(s)
	if len(m.Batches) != 1 {
		t.Errorf("%d batches", len(m.Batches))
	}
	s.PushClip(scene.Rect{X: 50, Y: 50, W: 10, H: 10})
	s.Circle(50, 50, 9, black)
	s.PopClip()
	s.Circle(100, 50, 9, black)
	m.Build(s)
	if len(m.Batches) != 3 || m.Batches[1].Clip != image.Rect(50, 50, 60, 60) {
		t.Errorf("%+v", m.Batches)
	}
}

// A simple polygon's triangles have its area, and each is one of its inner ones: none lies outside.
func TestEarsCoverThePolygon(t *testing.T) {
	rng := rand.New(rand.NewSource(1))
	var e ears
	for k := range 500 {
		n := 3 + rng.Intn(60)
		q := make([]scene.Point, n)
		for i := range q {
			a := 2 * math.Pi * float64(i) / float64(n)
			if k%2 == 0 {
				a = -a
			}
			r := 5 + 95*rng.Float64()
			q[i] = scene.Point{X: r * math.Cos(a), Y: r * math.Sin(a)}
		}
		sum := 0.0
		tris := e.cut(q)
		if len(tris) != n-2 {
			t.Fatalf("%d triangles of %d corners", len(tris), n)
		}
		for _, c := range tris {
			v := cross(q[c[0]], q[c[1]], q[c[2]])
			if v*area(q) < -1e-9 {
				t.Fatalf("a triangle of %d corners turns the other way", n)
			}
			sum += v
		}
		if math.Abs(sum-area(q)) > 1e-6*math.Abs(area(q)) {
			t.Fatalf("%d corners: triangles have %g, polygon %g", n, sum, area(q))
		}
	}
}

// Polygons with thousands of corners, tangled ones too, are bounded in work and vertices.
func TestHugePolygons(t *testing.T) {
	rng := rand.New(rand.NewSource(1))
	var m Mesh
	s := blank(100, 100, 1)
	pts := make([]scene.Point, 50000)
	for i := range pts {
		pts[i] = scene.Point{X: 100 * rng.Float64(), Y: 100 * rng.Float64()}
	}
	s.Fill(pts, black)
	m.Build(s)
	if len(m.Vertices) > 4+2*maxCorners || len(m.Indices) > 6+9*maxCorners {
		t.Errorf("%d vertices, %d indices", len(m.Vertices), len(m.Indices))
	}
}

// The atlas stays the same object until the scale changes.
func TestAtlasIsKept(t *testing.T) {
	var m Mesh
	shared := glyph.New(1)
	m.UseAtlas(shared)
	m.Build(blank(10, 10, 1))
	m.Build(blank(20, 20, 1))
	if m.Atlas() != shared {
		t.Error("the atlas was made anew")
	}
	m.Build(blank(10, 10, 2))
	if m.Atlas() == shared || m.Atlas().Scale != 2 {
		t.Error("the atlas is of the old scale")
	}
}

func TestEmptyScenes(t *testing.T) {
	var m Mesh
	for _, s := range []*scene.Scene{{}, blank(0, 10, 1), blank(math.NaN(), 10, 1)} {
		m.Build(s)
		if len(m.Batches) != 0 || len(m.Vertices) != 0 {
			t.Errorf("%d batches, %d vertices", len(m.Batches), len(m.Vertices))
		}
	}
	s := blank(10, 10, 1)
	s.Background.A = 0
	if m.Build(s); len(m.Batches) != 0 {
		t.Errorf("nothing on nothing has %d batches", len(m.Batches))
	}
}

func TestBuildingAllocatesNothing(t *testing.T) {
	var c sample.Chart
	var s scene.Scene
	var m Mesh
	phase := 0.0
	frame := func() {
		c.Draw(&s, 1280, 800, 1, phase)
		phase += 0.1
		m.Build(&s)
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
			var m Mesh
			for i := range b.N {
				c.Draw(&s, 1280, 800, scale, float64(i)/10)
				m.Build(&s)
			}
			b.ReportMetric(float64(len(m.Vertices)), "vertices")
		})
	}
}

func BenchmarkPolygon(b *testing.B) {
	var m Mesh
	s := blank(1280, 800, 1)
	pts := make([]scene.Point, 600)
	for i := range pts {
		x := 2 * float64(i%300)
		pts[i] = scene.Point{X: x, Y: 200 + x*x/2000}
		if i >= 300 {
			x = 600 - x
			pts[i] = scene.Point{X: x, Y: 500 - 100*math.Sin(x/200)}
		}
	}
	s.Fill(pts, black)
	for i := range b.N {
		s.Points[0].X = float64(i % 3)
		m.Build(s)
	}
}
