package app

import (
	"image"
	"testing"
	"time"

	"levelspan/game/scene/raster"
	"levelspan/game/ui"
)

// BenchmarkDragStep is one frame of a drag: route, solve, curves, picture, mirror.
func BenchmarkDragStep(b *testing.B) { benchmarkDrag(b, func(*App) {}) }

// BenchmarkDragPaint is the same with what the software surface does about it: find what differs, and paint it.
func BenchmarkDragPaint(b *testing.B) {
	picture := image.NewRGBA(image.Rect(0, 0, 1280, 800))
	var painter raster.Painter
	area, n := 0, 0
	benchmarkDrag(b, func(a *App) {
		n++
		for _, r := range painter.Update(a.Scene(), picture) {
			area += r.Dx() * r.Dy()
		}
	})
	b.ReportMetric(float64(area)/float64(n), "px/op")
}

func benchmarkDrag(b *testing.B, shown func(*App)) {
	app := New(&testHost{}, nil)
	in := Input{Width: 1280, Height: 800, Scale: 1}
	app.Step(in)
	var x, y float64
	for _, c := range app.Controls() {
		if c.ID == handleMass {
			x, y = middle(c.Bounds)
		}
	}
	send := func(kind ui.EventKind, x float64) {
		in.Now += 16 * time.Millisecond
		in.Events = append(in.Events[:0], ui.Event{Kind: kind, Pointer: 1, X: x, Y: y, Time: in.Now})
		app.Step(in)
		shown(app)
	}
	send(ui.PointerDown, x)
	send(ui.PointerMove, x-20)
	b.ReportAllocs()
	for i := 0; b.Loop(); i++ {
		send(ui.PointerMove, x-20-float64(i%200))
	}
}

// BenchmarkIdleStep is a frame in which nothing happened.
func BenchmarkIdleStep(b *testing.B) {
	app := New(&testHost{}, nil)
	in := Input{Width: 1280, Height: 800, Scale: 1}
	app.Step(in)
	b.ReportAllocs()
	for b.Loop() {
		app.Step(in)
	}
}
