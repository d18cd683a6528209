package ui

import (
	"testing"

	"levelspan/game/scene"
)

func TestCuts(t *testing.T) {
	r := scene.Rect{X: 10, Y: 20, W: 100, H: 50}
	for name, cut := range map[string]func(scene.Rect, float64) (scene.Rect, scene.Rect){
		"top": CutTop, "bottom": CutBottom, "left": CutLeft, "right": CutRight} {
		for _, d := range []float64{-5, 0, 12, 50, 100, 1000} {
			a, b := cut(r, d)
			if area := a.W*a.H + b.W*b.H; area != r.W*r.H {
				t.Errorf("%s %v: %v and %v have an area of %v", name, d, a, b, area)
			}
			if Overlaps(a, b) || Intersect(a, r) != a || Intersect(b, r) != b {
				t.Errorf("%s %v: %v and %v", name, d, a, b)
			}
		}
	}
	if s, _ := CutBottom(r, 10); s != (scene.Rect{X: 10, Y: 60, W: 100, H: 10}) {
		t.Errorf("bottom %v", s)
	}
	if s, _ := CutRight(r, 10); s != (scene.Rect{X: 100, Y: 20, W: 10, H: 50}) {
		t.Errorf("right %v", s)
	}
}

func TestCellsFillAGrid(t *testing.T) {
	for _, r := range []scene.Rect{{X: 3, Y: 4, W: 368, H: 296}, {W: 101, H: 77}, {W: 5, H: 5}, {}} {
		for _, n := range []int{1, 2, 3, 4, 7} {
			for i := range n {
				c := Cell(r, n, n, i, i, 8)
				if c.W < 0 || c.H < 0 {
					t.Fatalf("%v in %v", c, r)
				}
				if r.W < 100 {
					continue
				}
				if i == 0 && (c.X != r.X || c.Y != r.Y) || i == n-1 && (c.X+c.W != r.X+r.W || c.Y+c.H != r.Y+r.H) {
					t.Errorf("cell %d of %d of %v: %v", i, n, r, c)
				}
				if next := Cell(r, n, n, i+1, i+1, 8); i < n-1 && next.X-c.X-c.W != 8 {
					t.Errorf("gap after cell %d of %d of %v: %v", i, n, r, next.X-c.X-c.W)
				}
			}
		}
	}
}

func TestRects(t *testing.T) {
	r := scene.Rect{X: 10, Y: 20, W: 30, H: 40}
	if g := Grow(r, 48, 20); g != (scene.Rect{X: 1, Y: 20, W: 48, H: 40}) {
		t.Errorf("Grow %v", g)
	}
	if g := Inset(r, 20); g.W != 0 || g.H != 0 {
		t.Errorf("Inset %v", g)
	}
	if g := Intersect(r, scene.Rect{X: 100, Y: 100, W: 5, H: 5}); g.W != 0 || g.H != 0 {
		t.Errorf("Intersect %v", g)
	}
	if g := Snap(scene.Rect{X: 0.4, Y: 0.6, W: 10.2, H: 10.2}); g != (scene.Rect{X: 0, Y: 1, W: 11, H: 10}) {
		t.Errorf("Snap %v", g)
	}
	if !Contains(r, 10, 20) || Contains(r, 40, 20) || Contains(r, 9.9, 20) {
		t.Error("edges")
	}
}
