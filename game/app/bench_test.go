package app

import (
	"testing"
	"time"

	"levelspan/game/ui"
)

// BenchmarkDragStep is one frame of a drag: route, solve, curves, picture, mirror.
func BenchmarkDragStep(b *testing.B) {
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
