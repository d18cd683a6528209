package raster

import (
	"image"
	"math/rand"
	"testing"

	"levelspan/game/scene"
	"levelspan/game/scene/internal/sample"
)

// near tells whether two pictures are the same to a step: sums begin at the clip's edge, and rounding follows.
func near(t *testing.T, name string, got, want *image.RGBA) {
	t.Helper()
	if d := sample.Compare(got, want, 1); d.Count != 0 {
		t.Fatalf("%s: %+v", name, d)
	}
}

// Whatever changes, an updated picture is the one painted anew.
func TestUpdateIsRender(t *testing.T) {
	var p, fresh Painter
	var s scene.Scene
	sample.Sheet(&s, 1)
	dst := image.NewRGBA(image.Rect(0, 0, 320, 240))
	if r := p.Update(&s, dst); len(r) != 1 || r[0] != dst.Rect {
		t.Fatalf("first update painted %v", r)
	}
	if r := p.Update(&s, dst); len(r) != 0 {
		t.Fatalf("nothing changed, painted %v", r)
	}
	rng := rand.New(rand.NewSource(4))
	for n := range 150 {
		sample.Sheet(&s, 1)
		for range 1 + rng.Intn(4) {
			change(rng, &s)
		}
		p.Update(&s, dst)
		want := fresh.Render(&s, nil)
		if d := sample.Compare(dst, want, 2); d.Count != 0 {
			t.Fatalf("change %d: %+v", n, d)
		}
	}
}

// change alters a scene in one of the ways that frames differ.
func change(rng *rand.Rand, s *scene.Scene) {
	i := rng.Intn(len(s.Ops))
	op := &s.Ops[i]
	switch rng.Intn(8) {
	case 0:
		op.Color = sample.Red
	case 1:
		op.W++
	case 2:
		op.Rect.X += 3
	case 3:
		if op.P1 > op.P0 {
			s.Points[op.P0].Y += 4
		}
	case 4:
		if op.T1 > op.T0 {
			s.Text[op.T0] = 'Q'
		}
	case 5:
		s.Ops = append(s.Ops[:i], s.Ops[i+1:]...)
	case 6:
		s.Circle(300*rng.Float64(), 200*rng.Float64(), 9, sample.Green)
	case 7:
		s.Points[rng.Intn(len(s.Points))].X += 2
	}
}

// A chart that moves, a new size and a new picture are followed.
func TestUpdateFollows(t *testing.T) {
	var p, fresh Painter
	var c sample.Chart
	var s scene.Scene
	var dst *image.RGBA
	for i, w := range []float64{640, 640, 640, 700, 700} {
		c.Draw(&s, w, 480, 1, float64(i))
		if dst == nil || dst.Rect.Dx() != int(w) {
			dst = image.NewRGBA(image.Rect(0, 0, int(w), 480))
		}
		p.Update(&s, dst)
		want := fresh.Render(&s, nil)
		if d := sample.Compare(dst, want, 2); d.Count != 0 {
			t.Fatalf("frame %d: %+v", i, d)
		}
	}
}

// A small change paints little, and far apart ones apart.
func TestUpdatePaintsLittle(t *testing.T) {
	var p Painter
	s := blank(1000, 600, 1)
	s.Label(scene.Body, 20, 30, scene.Left, "44", black)
	s.Label(scene.Body, 900, 500, scene.Left, "61", black)
	dst := p.Render(s, nil)
	p.Update(s, dst)
	s.Text[1], s.Text[3] = '5', '2'
	r := p.Update(s, dst)
	painted := 0
	for _, q := range r {
		painted += area(q)
	}
	if len(r) != 2 || painted > 1500 {
		t.Errorf("painted %v", r)
	}
	near(t, "figures", dst, Render(s))
}

func TestUpdateAllocatesNothing(t *testing.T) {
	var c sample.Chart
	var s scene.Scene
	var p Painter
	dst := image.NewRGBA(image.Rect(0, 0, 1280, 800))
	phase := 0.0
	frame := func() {
		c.Draw(&s, 1280, 800, 1, phase)
		phase += 0.1
		p.Update(&s, dst)
	}
	for range 70 {
		frame()
	}
	if n := testing.AllocsPerRun(10, frame); n != 0 {
		t.Errorf("%g allocations a frame", n)
	}
}

func BenchmarkUpdate(b *testing.B) {
	var c sample.Chart
	var s scene.Scene
	var p Painter
	dst := image.NewRGBA(image.Rect(0, 0, 2560, 1600))
	for i := range b.N {
		c.Draw(&s, 1280, 800, 2, float64(i)/10)
		p.Update(&s, dst)
	}
}
